package tracewright.fitters.linalg;

import java.util.Optional;

/** Lower Cholesky factor of a symmetric positive definite matrix: A = L L^T. Matrices are [n][n], flat, row-major. */
public final class Cholesky {

    private final int n;
    private final double[] lower;   // [i][j], zero above the diagonal

    private Cholesky(int n, double[] lower) {
        this.n = n;
        this.lower = lower;
    }

    /** What came of factoring a matrix. */
    public sealed interface Outcome {

        /** A is positive definite. */
        record Factored(Cholesky factor) implements Outcome {
        }

        /**
         * A is not, to rounding.
         *
         * @param pivot    row, from zero, at which the factorisation stopped
         * @param fraction what was left of that row's diagonal entry after the rows above, as a fraction of it; rounding alone
         *                 leaves n 2^-52, and NaN means that the matrix holds one
         */
        record NotPositive(int pivot, double fraction) implements Outcome {
        }
    }

    /** The factor of {@code a}, or empty where {@link #factor} says why there is none. */
    public static Optional<Cholesky> of(double[] a, int n) {
        return factor(a, n) instanceof Outcome.Factored f ? Optional.of(f.factor()) : Optional.empty();
    }

    /**
     * Factors row by row. A pivot counts as positive if more is left of it than rounding can have made.
     *
     * @param a [i][j], symmetric; only the lower triangle is read
     */
    public static Outcome factor(double[] a, int n) {
        double[] l = new double[n * n];
        for (int i = 0; i < n; i++) {
            for (int j = 0; j < i; j++) {
                l[i * n + j] = (a[i * n + j] - dot(l, i, j, n)) / l[j * n + j];
            }
            double left = a[i * n + i] - dot(l, i, i, n);
            if (!(left > n * 0x1p-52 * a[i * n + i])) {
                return new Outcome.NotPositive(i, left / a[i * n + i]);
            }
            l[i * n + i] = Math.sqrt(left);
        }
        return new Outcome.Factored(new Cholesky(n, l));
    }

    /** Product of rows i and j over the columns before j. */
    private static double dot(double[] l, int i, int j, int n) {
        double sum = 0;
        for (int k = 0; k < j; k++) {
            sum += l[i * n + k] * l[j * n + k];
        }
        return sum;
    }

    /** n. */
    public int size() {
        return n;
    }

    /** L, copy. */
    public double[] lower() {
        return lower.clone();
    }

    /** L^-1, lower triangular, so that A^-1 = L^-T L^-1. */
    public double[] inverseLower() {
        return Triangular.inverse(lower, n);
    }

    /** A^-1, symmetric to the bit. */
    public double[] inverse() {
        return Triangular.transposeTimesSelf(inverseLower(), n);
    }

    /** x with A x = b; {@code b} is read. */
    public double[] solve(double[] b) {
        double[] x = b.clone();
        for (int i = 0; i < n; i++) {
            double sum = x[i];
            for (int k = 0; k < i; k++) {
                sum -= lower[i * n + k] * x[k];
            }
            x[i] = sum / lower[i * n + i];
        }
        for (int i = n - 1; i >= 0; i--) {
            double sum = x[i];
            for (int k = i + 1; k < n; k++) {
                sum -= lower[k * n + i] * x[k];
            }
            x[i] = sum / lower[i * n + i];
        }
        return x;
    }

    /**
     * Condition number |A| |A^-1| in the norm of the largest column sum. For a symmetric matrix it is at least the ratio of its
     * extreme eigenvalues and at most n times that.
     */
    public double condition() {
        return columnNorm(Triangular.timesTranspose(lower, n)) * columnNorm(inverse());
    }

    private double columnNorm(double[] symmetric) {
        double most = 0;
        for (int i = 0; i < n; i++) {
            double sum = 0;
            for (int j = 0; j < n; j++) {
                sum += Math.abs(symmetric[i * n + j]);
            }
            most = Math.max(most, sum);
        }
        return most;
    }
}
