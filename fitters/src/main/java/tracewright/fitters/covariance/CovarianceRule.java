package tracewright.fitters.covariance;

import tracewright.fitters.linalg.Symmetric;

/** What becomes of an estimated correlation matrix R before it weights a fit. */
public sealed interface CovarianceRule permits CovarianceRule.Full, CovarianceRule.Shrunk, CovarianceRule.Floored, CovarianceRule.Diagonal {

    /** R' out of R. */
    Regularized regularize(Correlation r);

    /** Word for reports. */
    String word();

    /** Whether the weight is the inverse of the estimate itself, whose noise is known in closed form ({@link InverseNoise}). */
    default boolean weighsByInverse() {
        return false;
    }

    /** Whether R' depends on the deviations of the blocks and not on R alone. */
    default boolean readsBlocks() {
        return false;
    }

    /** The estimate as it is. */
    record Full() implements CovarianceRule {
        @Override
        public Regularized regularize(Correlation r) {
            return new Regularized(r.toArray(), 0, 0);
        }

        @Override
        public String word() {
            return "full";
        }

        @Override
        public boolean weighsByInverse() {
            return true;
        }
    }

    /** Variances only, R' = 1. */
    record Diagonal() implements CovarianceRule {
        @Override
        public Regularized regularize(Correlation r) {
            double[] unit = new double[r.points() * r.points()];
            for (int i = 0; i < r.points(); i++) {
                unit[i * r.points() + i] = 1;
            }
            return new Regularized(unit, 0, 0);
        }

        @Override
        public String word() {
            return "diagonal";
        }
    }

    /** R' = (1 - lambda) R + lambda 1 with the optimal lambda of {@link Shrinkage}. */
    record Shrunk() implements CovarianceRule {
        @Override
        public Regularized regularize(Correlation r) {
            double lambda = r.optimalShrinkage();
            double[] shrunk = r.toArray();
            for (int i = 0; i < shrunk.length; i++) {
                shrunk[i] *= i / r.points() == i % r.points() ? 1 : 1 - lambda;
            }
            return new Regularized(shrunk, lambda, 0);
        }

        @Override
        public String word() {
            return "shrunk";
        }

        @Override
        public boolean readsBlocks() {
            return true;
        }
    }

    /**
     * Eigenvalues of R below a fraction of the largest are raised to it; the diagonal is not rescaled afterwards, so that a
     * point whose directions were raised weighs less.
     *
     * @param relative the floor over the largest eigenvalue, between 0 and 1
     */
    record Floored(double relative) implements CovarianceRule {
        public Floored {
            if (!(relative > 0) || !(relative < 1)) {
                throw new IllegalArgumentException("floor " + relative + " of the largest eigenvalue; need a number between 0 and 1");
            }
        }

        @Override
        public Regularized regularize(Correlation r) {
            Symmetric e = Symmetric.of(r.toArray(), r.points());
            double floor = relative * e.value(0);
            double[] values = e.values();
            int raised = 0;
            for (int k = 0; k < values.length; k++) {
                if (values[k] < floor) {
                    values[k] = floor;
                    raised++;
                }
            }
            return new Regularized(e.withValues(values), 0, raised);
        }

        @Override
        public String word() {
            return "floored";
        }
    }
}
