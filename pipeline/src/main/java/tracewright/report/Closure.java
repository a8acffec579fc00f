package tracewright.report;

import tracewright.results.Results;

/** What the closure of a budget, mass minus the sum of its terms, says. */
final class Closure {

    /** A closure that is zero with an error of zero to this part of the mass was zero by definition. */
    private static final double BY_DEFINITION = 1e-9;

    private final double value;
    private final double error;
    private final double mass;

    private Closure(double value, double error, double mass) {
        this.value = value;
        this.error = error;
        this.mass = mass;
    }

    static Closure of(Results.Budget b) {
        return new Closure(b.closure().central(), Published.error(b.closure()), b.mass().central());
    }

    /** Whether one term was defined as the difference, so that nothing was tested. */
    boolean isByDefinition() {
        double nothing = BY_DEFINITION * Math.abs(mass);
        return Math.abs(value) <= nothing && error <= nothing;
    }

    /** Closure in units of its error. */
    double sigmas() {
        return value / error;
    }

    String shownSigmas() {
        return isByDefinition() ? "by definition" : Numbers.fixed(Math.abs(sigmas()), 1) + "\u202f\u03c3";
    }

    String verdict() {
        if (isByDefinition()) {
            return "closes by definition: one term was taken as the difference, so nothing is tested";
        }
        double s = Math.abs(sigmas());
        return s < 1 ? "closes within its error" : s < 2 ? "closes within two standard errors" : s < 3 ? "is in tension" : "does not close";
    }
}
