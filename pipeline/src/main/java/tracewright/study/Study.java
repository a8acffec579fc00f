package tracewright.study;

import java.nio.file.Path;
import java.util.List;
import java.util.Map;
import java.util.Optional;

/** One analysis, one YAML file: what to read, how to cut it, which fits, which renormalisation, which budgets. */
public record Study(
    @Key("format of this file: tracewright-study/1") String schema,
    @Key("name of the study, used in titles and as the default name of the output folder") String name,
    @Key("seed of every random draw; the same seed gives the same bytes") long seed,
    @Key("how samples are made") Resampling resampling,
    @Key(value = "constants with errors, written 0.0904(21), each an independent cause of uncertainty that other keys refer to by name", byDefault = "{}")
        Map<String, UncertainValue> inputs,
    @Key("the ensembles") List<Ensemble> ensembles,
    @Key("the hadrons and how their energies are fitted, by name") Map<String, Hadron> hadrons,
    @Key("how matrix elements are extracted") MatrixElements matrixElements,
    @Key("how bare matrix elements become contributions to the mass") Renormalization renormalization,
    @Key("fit over the ensembles to the physical point; left out: none is made") Optional<Extrapolation> extrapolation,
    @Key("what has to hold for the run to count as good (exit status 4 otherwise)") Optional<Requirements> require) {

    /** How samples are made. */
    @Selector("method")
    public sealed interface Resampling {

        /** Delete one block at a time. */
        @Case("jackknife")
        record Jackknife() implements Resampling {
        }

        /** Block bootstrap with Poisson multiplicities that are a pure function of seed, ensemble, draw and block label. */
        @Case("bootstrap")
        record Bootstrap(@Key(value = "number of draws", byDefault = "500") int draws) implements Resampling {
        }
    }

    /** One ensemble: where its files are, its constants and its cuts. */
    public record Ensemble(
        @Key("name, used in ids: lower-case letters, digits and hyphens") String name,
        @Key("layout file that says how the data are stored, relative to this file") Path layout,
        @Key("folder from which the layout's path templates start, relative to this file") Path data,
        @Key("lattice spacing in fm: a number with error or the name of an input") InputRef spacingFm,
        @Key("bare quark masses a m by flavour, multiplicatively renormalised: numbers or names of inputs") Map<Flavor, InputRef> quarkMassLattice,
        @Key(value = "configurations that have to be there, written a:100..860 step 4; others that are missing altogether cannot be noticed", byDefault = "[]")
            List<Expected> expect,
        @Key("cuts on configurations and sources") Cuts cuts) {
    }

    /** Trajectories of one stream that should be on disk, written {@code a:100..860 step 4}. */
    public record Expected(String stream, long first, long last, long step) {
        public Expected {
            if (first < 0 || last < first || step < 1) {
                throw new IllegalArgumentException("trajectories " + first + ".." + last + " step " + step + " hold nothing; need 0 <= first <= last and step >= 1");
            }
        }
    }

    /** Cuts on the configurations and sources of one ensemble. */
    public record Cuts(
        @Key(value = "drop trajectories below this number in every stream", byDefault = "0") long thermalization,
        @Key(value = "keep only these trajectory ranges, written 100..400 (default: all)", byDefault = "[]") List<TrajectoryRange> ranges,
        @Key(value = "drop these configurations, written stream:trajectory or stream:first..last", byDefault = "[]") List<Exclusion> exclude,
        @Key(value = "keep trajectories whose number is a multiple of this", byDefault = "1") long stride,
        @Key("keep only these streams (default: all)") Optional<List<String>> streams,
        @Key("keep at most this many sources per configuration, the first by source time (default: all)") Optional<Integer> sources,
        @Key(value = "a configuration that some dataset lacks: 'error' stops, 'drop' removes it from all", byDefault = "error") Missing missing,
        @Key(value = "block length in trajectories, or 'auto' to choose it from the measured integrated autocorrelation time", byDefault = "auto")
            BlockChoice block) {

        public enum Missing {
            ERROR, DROP
        }
    }

    /** Closed range of trajectory numbers in every stream, written {@code 100..400}. */
    public record TrajectoryRange(long first, long last) {
        public TrajectoryRange {
            if (first < 0 || last < first) {
                throw new IllegalArgumentException("range " + first + ".." + last + " holds nothing; need 0 <= first <= last");
            }
        }
    }

    /** Trajectories first..last of one stream, written {@code a:120} or {@code a:120..160}. */
    public record Exclusion(String stream, long first, long last) {
        public Exclusion {
            if (first < 0 || last < first) {
                throw new IllegalArgumentException("range " + first + ".." + last + " holds nothing; need 0 <= first <= last");
            }
        }
    }

    /** Block length in trajectories; empty: chosen from the autocorrelation time. Written as a whole number or {@code auto}. */
    public record BlockChoice(Optional<Integer> length) {
    }

    /** One hadron and its energy fits. */
    public record Hadron(
        @Key("baryon: forward exponentials; meson: periodic in time and folded") Kind kind,
        @Key("scans that enter the average, each with a number of states and a range of first time slices") List<EnergyScan> fits,
        @Key("last time slice of the fits") int last,
        @Key(value = "covariance of the energy fits", byDefault = "full") CovarianceChoice covariance,
        @Key(value = "whether matrix elements and a budget are made for it", byDefault = "false") boolean budget) {

        public enum Kind {
            BARYON, MESON
        }

        /** Earliest time slice of any fit. */
        public int firstSlice() {
            return fits.stream().mapToInt(f -> f.first().first()).min().orElse(last);
        }
    }

    /** Fits of one number of states from each first time slice. */
    public record EnergyScan(
        @Key("number of states: 1, 2 or 3") int states,
        @Key("scan over the first time slice of the fit") Span first) {
    }

    /** Covariance used to weight a fit. */
    public enum CovarianceChoice {
        FULL, SHRUNK, FLOORED, DIAGONAL
    }

    /** Settings by class of operator. */
    public record MatrixElements(
        @Key("connected insertions") ElementFits connected,
        @Key("quark loops") ElementFits disconnected,
        @Key("gluon densities") ElementFits gluon) {
    }

    /** The methods tried for one class of operators; each is optional, one is published. */
    public record ElementFits(
        @Key("method whose result enters the budget") Method publish,
        @Key("constant fits to the ratio") Optional<PlateauFits> plateau,
        @Key("straight-line fits to the summed ratio") Optional<SummationFits> summation,
        @Key("simultaneous two-state fits to two- and three-point functions") Optional<TwoStateFits> twoState) {

        public enum Method {
            PLATEAU, SUMMATION, TWO_STATE;

            /** Word used in ids. */
            public String word() {
                return name().toLowerCase(java.util.Locale.ROOT).replace('_', '-');
            }
        }
    }

    /** Plateau: R(t, tau) for t in separations with first &lt;= t, and margin &lt;= tau &lt;= t - margin. */
    public record PlateauFits(
        @Key("source-sink separations that may enter") Span separations,
        @Key("scan over the smallest separation in the fit") Span first,
        @Key("scan over the distance of the insertion from source and sink") Span margin,
        @Key(value = "covariance of the fits", byDefault = "full") CovarianceChoice covariance) {
    }

    /** Summation: S(t) = sum of R(t, tau) over margin &lt;= tau &lt;= t - margin, a straight line in t. */
    public record SummationFits(
        @Key("source-sink separations that may enter") Span separations,
        @Key("scan over the smallest separation in the fit") Span first,
        @Key("distance of the insertion from source and sink in the sum") int margin,
        @Key(value = "covariance of the fits", byDefault = "full") CovarianceChoice covariance) {
    }

    /** Two-state: C2(t) for t in twoPoint range together with C3(t, tau), margin &lt;= tau &lt;= t - margin. */
    public record TwoStateFits(
        @Key("source-sink separations that may enter") Span separations,
        @Key("scan over the smallest separation in the fit") Span first,
        @Key("scan over the distance of the insertion from source and sink") Span margin,
        @Key("scan over the first time slice of the two-point function") Span twoPointFirst,
        @Key("last time slice of the two-point function") int twoPointLast,
        @Key(value = "whether the element between excited states, g11, is fitted too", byDefault = "true") boolean excitedElement,
        @Key(value = "covariance of the fits", byDefault = "full") CovarianceChoice covariance) {
    }

    /** Renormalisation of the quark and gluon parts of the trace. */
    public record Renormalization(
        @Key("number of active flavours in the beta function and gamma_m") int flavors,
        @Key("scheme of gamma_m and of the separate quark and gluon parts, for instance MSbar") String scheme,
        @Key("scale in GeV of gamma_m and of the separate quark and gluon parts") double scaleGev,
        @Key("mass anomalous dimension gamma_m = -d ln m / d ln mu at that scale: a number with error or the name of an input") InputRef gammaM,
        @Key("route of the sigma terms") SigmaRoute sigma,
        @Key("route of the gluon part") GluonRoute gluon) {
    }

    /** Route of the sigma terms. */
    @Selector("route")
    public sealed interface SigmaRoute {

        /** m_q &lt;qbar q&gt; needs no factor: chiral or staggered-type quarks. */
        @Case("invariant")
        record Invariant() implements SigmaRoute {
        }
    }

    /** Route of the gluon part (beta/2g) F^2. */
    @Selector("route")
    public sealed interface GluonRoute {

        /** Flowed action density times its one-loop small-flow-time coefficient 2 beta(g)/g^3 = -2 b0, then flow time to zero. */
        @Case("flow")
        record Flow(
            @Key("flow times in units of a^2 that enter, first and last, written 1.0..3.0") FlowWindow window,
            @Key("alpha_s at the scale of the flow; given: the size of the next order, known for the pure gauge theory, becomes a choice group")
                Optional<InputRef> truncationAlphaS) implements GluonRoute {
        }

        /** A given number that multiplies the flowed action density at one flow time. */
        @Case("given-factor")
        record GivenFactor(
            @Key("factor that multiplies a^4 E: a number with error or the name of an input") InputRef factor,
            @Key("flow time in units of a^2") double flowTime) implements GluonRoute {
        }
    }

    /** Closed window of flow times in units of a^2, written {@code 1.0..3.0}. */
    public record FlowWindow(double first, double last) {
        public FlowWindow {
            if (!(first > 0) || !(last >= first) || Double.isInfinite(last)) {
                throw new IllegalArgumentException("flow window " + first + ".." + last + " is empty; need 0 < first <= last");
            }
        }
    }

    /** Linear fit over the ensembles: O = O_0 + k1 a^2 + k2 (Mpi^2 - Mpi_phys^2), with the terms that are asked for. */
    public record Extrapolation(
        @Key("hadron whose mass squared is the chiral variable") String pion,
        @Key("physical pion mass in MeV: a number with error or the name of an input") InputRef pionMassMev,
        @Key("terms beside the constant: a2, mpi2") List<Term> terms,
        @Key(value = "ensembles left out of this fit", byDefault = "[]") List<String> drop) {

        public enum Term {
            @Case("a2")
            SPACING_SQUARED,
            @Case("mpi2")
            PION_MASS_SQUARED
        }
    }

    /** Checks that turn into exit status 4 when they fail. */
    public record Requirements(
        @Key("largest distance of any budget's closure from zero, in its own standard errors") Optional<Double> closureSigma,
        @Key("smallest p-value of the best-weighted fit of every published quantity") Optional<Double> pValue) {
    }
}
