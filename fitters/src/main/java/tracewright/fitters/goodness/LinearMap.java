package tracewright.fitters.goodness;

import tracewright.fitters.linalg.Cholesky;
import tracewright.fitters.linalg.Triangular;

/**
 * The linear map of a fit at its minimum, H = A J^T W with A = (J^T W J)^-1, and P = 1 - J H, for a weight W = Linv^T Linv. For a
 * covariance S of the points,
 * <pre>
 *   covariance of the parameters   H S H^T = A M A,   M = (W J)^T S (W J)
 *   mean of the minimum            tr(W P S P^T) = tr(W S) - tr(A M)
 *   its distribution               eigenvalues of R (Linv S Linv^T) R,   R = 1 - (Linv J) A (Linv J)^T
 * </pre>
 * Matrices are flat, row-major: J [point][parameter].
 */
final class LinearMap {

    private final int p;
    private final int q;
    private final double[] linv;
    private final double[] whitened;   // Linv J, [point][parameter]
    private final double[] weighted;   // W J, [point][parameter]
    private final double[] a;          // A, [parameter][parameter]

    private LinearMap(int p, int q, double[] linv, double[] whitened, double[] a) {
        this.p = p;
        this.q = q;
        this.linv = linv;
        this.whitened = whitened;
        this.weighted = product(transposed(linv, p, p), whitened, p, p, q);
        this.a = a;
    }

    /**
     * @param linv     [point][point], lower triangular; kept
     * @param jacobian [point][parameter], read
     * @throws ArithmeticException if the parameters are not determined
     */
    static LinearMap of(double[] linv, double[] jacobian, int p, int q) {
        double[] whitened = jacobian.clone();
        Triangular.multiply(linv, p, whitened, q);
        double[] normal = product(transposed(whitened, p, q), whitened, q, p, q);
        return new LinearMap(p, q, linv, whitened, scaledInverse(normal, q));
    }

    /** Inverse of a normal matrix, taken with unit diagonal, so that the units of the parameters do not matter. */
    private static double[] scaledInverse(double[] normal, int q) {
        double[] scale = new double[q];
        for (int j = 0; j < q; j++) {
            scale[j] = 1 / Math.sqrt(normal[j * q + j]);
        }
        double[] unit = normal.clone();
        for (int i = 0; i < q * q; i++) {
            unit[i] *= scale[i / q] * scale[i % q];
        }
        double[] inverse = Cholesky.of(unit, q).map(Cholesky::inverse)
            .orElseThrow(() -> new ArithmeticException("the parameters are not determined: normal matrix is singular"));
        for (int i = 0; i < q * q; i++) {
            inverse[i] *= scale[i / q] * scale[i % q];
        }
        return inverse;
    }

    /** M. */
    private double[] middle(double[] s) {
        return product(transposed(weighted, p, q), product(s, weighted, p, p, q), q, p, q);
    }

    /** H S H^T, [parameter][parameter]. */
    double[] sandwich(double[] s) {
        return product(product(a, middle(s), q, q, q), a, q, q, q);
    }

    /** E[Q] = tr(W P S P^T). */
    double expected(double[] s) {
        double trace = 0;
        double[] white = whitenedCovariance(s);
        for (int i = 0; i < p; i++) {
            trace += white[i * p + i];
        }
        double[] parameters = product(a, middle(s), q, q, q);
        for (int j = 0; j < q; j++) {
            trace -= parameters[j * q + j];
        }
        return trace;
    }

    /** The matrix whose nonzero eigenvalues weight the chi-squares of Q, [point][point]. */
    double[] residualCovariance(double[] s) {
        double[] projector = projector();
        return product(product(projector, whitenedCovariance(s), p, p, p), projector, p, p, p);
    }

    /** Linv S Linv^T. */
    private double[] whitenedCovariance(double[] s) {
        double[] half = s.clone();
        Triangular.multiply(linv, p, half, p);
        double[] white = transposed(half, p, p);
        Triangular.multiply(linv, p, white, p);
        return white;
    }

    /** R, the projector onto residuals in the whitened frame. */
    private double[] projector() {
        double[] projector = product(product(whitened, a, p, q, q), transposed(whitened, p, q), p, q, p);
        for (int i = 0; i < p * p; i++) {
            projector[i] = (i / p == i % p ? 1 : 0) - projector[i];
        }
        return projector;
    }

    /** x [rows][inner] times y [inner][columns]. */
    private static double[] product(double[] x, double[] y, int rows, int inner, int columns) {
        double[] z = new double[rows * columns];
        for (int i = 0; i < rows; i++) {
            for (int k = 0; k < inner; k++) {
                double f = x[i * inner + k];
                for (int j = 0; j < columns; j++) {
                    z[i * columns + j] += f * y[k * columns + j];
                }
            }
        }
        return z;
    }

    private static double[] transposed(double[] x, int rows, int columns) {
        double[] t = new double[rows * columns];
        for (int i = 0; i < rows; i++) {
            for (int j = 0; j < columns; j++) {
                t[j * rows + i] = x[i * columns + j];
            }
        }
        return t;
    }
}
