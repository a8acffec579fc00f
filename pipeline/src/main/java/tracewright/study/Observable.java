package tracewright.study;

/**
 * What one measured array is, whatever file it came from. Values handed on by the readers are in these conventions:
 * <pre>
 *  TwoPoint      [source][t]    real part, t = sink - source time 0..T-1, boundary sign removed
 *  Connected     [source][tau]  real part, tau = insertion - source time 0..separation, boundary sign removed; sum over space of the insertion; light is u + d
 *  Loop          [time]         -Tr D^-1 summed over space, averaged over hits, so that its ratio is the disconnected part of &lt;qbar q&gt;; light is u + d
 *  ActionDensity [time]         a^4 E = (1/4) a^4 G^a G^a (the coupling inside) summed over space, at a flow time given in units of a^2
 * </pre>
 */
public sealed interface Observable {

    /** Lower-case id, unique within an ensemble. */
    String id();

    /** Whether values have a source axis (correlators) or not (loops and densities). */
    boolean hasSources();

    record TwoPoint(String hadron) implements Observable {
        @Override
        public String id() {
            return hadron + ".two-point";
        }

        @Override
        public boolean hasSources() {
            return true;
        }
    }

    record Connected(String hadron, Flavor flavor, int separation) implements Observable {
        @Override
        public String id() {
            return hadron + ".connected." + flavor.word() + ".t" + separation;
        }

        @Override
        public boolean hasSources() {
            return true;
        }
    }

    record Loop(Flavor flavor) implements Observable {
        @Override
        public String id() {
            return "loop." + flavor.word();
        }

        @Override
        public boolean hasSources() {
            return false;
        }
    }

    record ActionDensity(double flowTime) implements Observable {
        @Override
        public String id() {
            return "action-density.flow" + flowTime;
        }

        @Override
        public boolean hasSources() {
            return false;
        }
    }
}
