package tracewright.fitters.covariance;

/** What came of making the weight of a fit. */
public sealed interface WeightingOutcome {

    /** A weight that can be used. */
    record Usable(Weighting weighting) implements WeightingOutcome {
    }

    /**
     * None.
     *
     * @param reason what was found and what was expected, with numbers
     * @param advice what can be done, in the order in which it is best tried
     */
    record Refused(String reason, String advice) implements WeightingOutcome {
    }
}
