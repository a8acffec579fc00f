package tracewright.fitters.autocorrelation;

import static java.util.Objects.requireNonNull;

import java.util.List;

/**
 * Integrated autocorrelation time of one series over several Markov streams, or the reason why the chain is too short for it.
 * The estimate is that of U. Wolff, Comput. Phys. Commun. 156 (2004) 143, hep-lat/0306017, erratum 176 (2007) 383, with its
 * automatic window at S = 1.5:
 * <pre>
 *   Gamma(t) = mean of d_i d_j over the pairs of one stream that are t apart,     C(W) = Gamma(0) + 2 sum_{t=1..W} Gamma(t)
 *   tau      = C(W) / (2 Gamma(0)),  after Gamma(t) += C(W)/N for t &lt;= W,        error of the mean = sqrt(C(W)/N)
 * </pre>
 * Times count steps of the smallest spacing between two trajectories of a stream; tau is 1/2 for independent data.
 */
public sealed interface IntegratedTime {

    /** Chain length, in units of tau, below which an estimate is not to be trusted. */
    int TIMES_NEEDED = 50;

    /** What was estimated; a lower bound if the chain is too short, since short chains underestimate tau. */
    Estimate estimate();

    /**
     * A series whose integrated time is known.
     */
    record Measured(Estimate estimate) implements IntegratedTime {
        public Measured {
            requireNonNull(estimate, "estimate");
        }
    }

    /**
     * A series too short for its integrated time.
     *
     * @param estimate             lower bound
     * @param configurationsNeeded how many configurations would do, if tau is what this estimate and its error say
     * @param reason               which condition failed, with numbers
     */
    record TooShort(Estimate estimate, long configurationsNeeded, String reason) implements IntegratedTime {
        public TooShort {
            requireNonNull(estimate, "estimate");
            requireNonNull(reason, "reason");
        }
    }

    /**
     * Numbers of an estimate.
     *
     * @param mean            mean of all values
     * @param errorOfMean     standard error with autocorrelation
     * @param errorOfError    standard error of {@code errorOfMean}
     * @param variance        Gamma(0) without bias correction, the mean square of the fluctuations
     * @param tau             integrated time in steps
     * @param tauError        its standard error
     * @param window          W in steps
     * @param spacing         trajectories per step
     * @param configurations  number of values N
     * @param streamAgreement probability that the means of the streams differ as much or more by chance: chi-squared with one
     *                        less than the number of streams; below 0.01 the streams disagree (thermalisation, topology); 1 for one stream
     */
    record Estimate(double mean, double errorOfMean, double errorOfError, double variance, double tau, double tauError, int window,
                    long spacing, int configurations, double streamAgreement) {

        /** Integrated time in trajectories. */
        public double tauTrajectories() {
            return tau * spacing;
        }

        /** Standard error of {@link #tauTrajectories()}. */
        public double tauErrorTrajectories() {
            return tauError * spacing;
        }
    }

    /**
     * Measures one series. A series that does not vary has tau 1/2 with all errors zero.
     *
     * @param streams      [i], stream of each configuration, any order
     * @param trajectories [i], its trajectory number, each once in a stream
     * @param values       [i], finite
     * @throws IllegalArgumentException if lengths differ, there are fewer than two values, a value is not finite or a
     *                                  trajectory occurs twice
     */
    static IntegratedTime measure(List<String> streams, long[] trajectories, double[] values) {
        return WindowedEstimate.of(Series.of(streams, trajectories, values));
    }

    /** Measures evenly spaced streams, each in the order of the chain. */
    static IntegratedTime ofChains(double[]... chains) {
        return WindowedEstimate.of(Series.ofChains(chains));
    }
}
