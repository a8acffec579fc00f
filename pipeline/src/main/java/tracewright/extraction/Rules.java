package tracewright.extraction;

import tracewright.fitters.covariance.CovarianceRule;
import tracewright.study.Study;

/** The study's word for a covariance as the library's rule. */
final class Rules {

    /** Eigenvalues of the correlation matrix are raised to this fraction of the largest one when the study says {@code floored}. */
    private static final double FLOOR = 0.1;

    private Rules() {
    }

    static CovarianceRule of(Study.CovarianceChoice choice) {
        return switch (choice) {
            case FULL -> new CovarianceRule.Full();
            case SHRUNK -> new CovarianceRule.Shrunk();
            case FLOORED -> new CovarianceRule.Floored(FLOOR);
            case DIAGONAL -> new CovarianceRule.Diagonal();
        };
    }
}
