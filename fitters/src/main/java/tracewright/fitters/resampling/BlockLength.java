package tracewright.fitters.resampling;

import static java.util.Objects.requireNonNull;

import java.util.Locale;
import tracewright.fitters.autocorrelation.IntegratedTime;

/**
 * Block length from an integrated autocorrelation time. Blocks of m configurations leave a bias -tau/(2 m) in the error and
 * a noise sqrt(m/(2 N)); the sum of their squares is least at
 * <pre>
 *   m = (tau^2 N)^(1/3)            tau in configurations
 * </pre>
 * (the scaling of U. Wolff, Comput. Phys. Commun. 156 (2004) 143, section 5). The rule takes this length, but at least four
 * times tau, and leaves at least twenty blocks.
 */
public sealed interface BlockLength {

    /** Blocks shorter than this many integrated times leave more than an eighth of the variance out. */
    int TIMES_TAU = 4;

    /** Fewer blocks than this make the error itself uncertain by more than a sixth. */
    int FEWEST_BLOCKS = 20;

    /**
     * A length that satisfies both conditions.
     *
     * @param trajectories   length in trajectories, a whole number of configurations
     * @param configurations length in configurations
     * @param blocks         about how many blocks it leaves
     */
    record Chosen(int trajectories, int configurations, int blocks) implements BlockLength {
    }

    /**
     * No length satisfies both conditions.
     *
     * @param reason which condition fails and by how much
     * @param advice what can be done
     */
    record Impossible(String reason, String advice) implements BlockLength {
        public Impossible {
            requireNonNull(reason, "reason");
            requireNonNull(advice, "advice");
        }
    }

    /**
     * Applies the rule.
     *
     * @param tauTrajectories integrated time of the slowest number that matters, in <em>trajectories</em>; less than half
     *                        a spacing counts as half a spacing
     * @param spacing         trajectories from one configuration to the next
     * @param configurations  surviving configurations in all streams, N
     */
    static BlockLength choose(double tauTrajectories, int spacing, int configurations) {
        if (!(tauTrajectories >= 0) || Double.isInfinite(tauTrajectories) || spacing < 1 || configurations < 1) {
            throw new IllegalArgumentException("no block length for an integrated time of " + tauTrajectories + " trajectories, a spacing of "
                + spacing + " and " + configurations + " configurations");
        }
        double tau = Math.max(tauTrajectories / spacing, 0.5);
        long least = (long) Math.ceil(TIMES_TAU * tau * (1 - 1e-12));   // 4 tau, forgiving the rounding of tau
        long most = configurations / FEWEST_BLOCKS;
        if (least > most) {
            return impossible(tau, configurations, least, most);
        }
        long best = Math.round(StrictMath.cbrt(tau * tau * configurations));
        int m = (int) Math.min(Math.max(best, least), most);
        return new Chosen(Math.multiplyExact(m, spacing), m, configurations / m);
    }

    /** The rule for a measured time; a chain too short for its integrated time gives no length. */
    static BlockLength choose(IntegratedTime slowest) {
        if (slowest instanceof IntegratedTime.TooShort tooShort) {
            return new Impossible("the integrated time is not known: " + tooShort.reason(), "use " + tooShort.configurationsNeeded()
                + " configurations, or set the length by hand and quote the neighbour term");
        }
        IntegratedTime.Estimate e = slowest.estimate();
        return choose(e.tauTrajectories(), Math.toIntExact(e.spacing()), e.configurations());
    }

    private static Impossible impossible(double tau, int n, long least, long most) {
        String reason = String.format(Locale.ROOT, "blocks of %d configurations (%d times the integrated time of %.2f) leave %d blocks of %d"
            + " configurations, fewer than %d; %d blocks of %d configurations are only %.2f times the integrated time",
            least, TIMES_TAU, tau, n / least, n, FEWEST_BLOCKS, FEWEST_BLOCKS, most, most / tau);
        return new Impossible(reason, String.format(Locale.ROOT, "use %d configurations or more, or set the length by hand and quote the"
            + " neighbour term", least * FEWEST_BLOCKS));
    }
}
