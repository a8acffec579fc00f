package tracewright.fitters.sampled;

import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.EigenDecomposition;
import org.apache.commons.math3.linear.RealMatrix;

/**
 * Factor F of a covariance, S = F F^T: lower Cholesky factor when S is positive definite, eigenvalue factor without its zero
 * columns when it is semi-definite. Works on the correlations, so that units do not decide what counts as zero.
 */
final class InputFactor {

    /** Eigenvalues of the correlations within this of zero count as zero: sixteen digits less what two printed tables lose. */
    private static final double ZERO = 1e-11;

    private final int rows;
    private final int columns;
    private final double[] values;   // [row][column]

    private InputFactor(int rows, int columns, double[] values) {
        this.rows = rows;
        this.columns = columns;
        this.values = values;
    }

    /**
     * @param covariance [i][j] flat, n x n; read
     * @throws IllegalArgumentException if it is not symmetric, not finite or indefinite
     */
    static InputFactor of(String name, double[] covariance, int n) {
        double[] scale = scales(name, covariance, n);
        EigenDecomposition eigen = new EigenDecomposition(correlations(name, covariance, scale));
        double[] lambda = eigen.getRealEigenvalues();
        double smallest = Double.POSITIVE_INFINITY;
        for (double l : lambda) {
            smallest = Math.min(smallest, l);
        }
        if (smallest < -ZERO * n) {
            throw new IllegalArgumentException("covariance of the inputs " + name + " is indefinite: its correlations have the eigenvalue "
                + smallest + "; give it with more digits or correct it");
        }
        return smallest > ZERO * n ? cholesky(covariance, n) : eigenvalueFactor(eigen, scale);
    }

    private static double[] scales(String name, double[] covariance, int n) {
        if (covariance.length != n * n) {
            throw new IllegalArgumentException("inputs " + name + ": " + n + " values need " + n * n + " covariances; got " + covariance.length);
        }
        double[] scale = new double[n];
        for (int i = 0; i < n; i++) {
            double variance = covariance[i * n + i];
            if (!(variance >= 0) || Double.isInfinite(variance)) {
                throw new IllegalArgumentException("variance " + i + " of the inputs " + name + " is " + variance
                    + "; need a finite number, zero or more");
            }
            scale[i] = Math.sqrt(variance);
        }
        return scale;
    }

    private static RealMatrix correlations(String name, double[] covariance, double[] scale) {
        int n = scale.length;
        RealMatrix r = new Array2DRowRealMatrix(n, n);
        for (int i = 0; i < n; i++) {
            for (int j = 0; j < i; j++) {
                double lower = covariance[i * n + j];
                double product = scale[i] * scale[j];
                if (lower != covariance[j * n + i] || !(Math.abs(lower) <= product * (1 + 1e-9))) {
                    throw new IllegalArgumentException("covariance " + i + ", " + j + " of the inputs " + name + " is " + lower + " and "
                        + covariance[j * n + i] + " with errors " + scale[i] + " and " + scale[j]
                        + "; need a symmetric matrix with correlations within -1..1");
                }
                double correlation = product == 0 ? 0 : lower / product;
                r.setEntry(i, j, correlation);
                r.setEntry(j, i, correlation);
            }
            r.setEntry(i, i, scale[i] == 0 ? 0 : 1);
        }
        return r;
    }

    private static InputFactor cholesky(double[] covariance, int n) {
        double[] l = new double[n * n];
        for (int i = 0; i < n; i++) {
            for (int j = 0; j <= i; j++) {
                double sum = covariance[i * n + j];
                for (int k = 0; k < j; k++) {
                    sum -= l[i * n + k] * l[j * n + k];
                }
                l[i * n + j] = i == j ? Math.sqrt(sum) : sum / l[j * n + j];
            }
        }
        return new InputFactor(n, n, l);
    }

    private static InputFactor eigenvalueFactor(EigenDecomposition eigen, double[] scale) {
        int n = scale.length;
        double[] lambda = eigen.getRealEigenvalues();
        int kept = 0;
        while (kept < n && lambda[kept] > ZERO * n) {   // sorted downwards
            kept++;
        }
        double[] f = new double[n * kept];
        for (int j = 0; j < kept; j++) {
            double root = Math.sqrt(lambda[j]);
            for (int i = 0; i < n; i++) {
                f[i * kept + j] = scale[i] * root * eigen.getV().getEntry(i, j);
            }
        }
        return new InputFactor(n, kept, f);
    }

    int rows() {
        return rows;
    }

    int columns() {
        return columns;
    }

    double at(int row, int column) {
        return values[row * columns + column];
    }
}
