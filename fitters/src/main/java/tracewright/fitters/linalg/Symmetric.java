package tracewright.fitters.linalg;

import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.EigenDecomposition;
import org.apache.commons.math3.linear.RealMatrix;

/** Eigenvalues and orthonormal eigenvectors of a symmetric matrix: A = sum_k value_k v_k v_k^T, values descending. */
public final class Symmetric {

    private final double[] values;    // [k]
    private final double[] vectors;   // [i][k], column k belongs to value k

    private Symmetric(double[] values, double[] vectors) {
        this.values = values;
        this.vectors = vectors;
    }

    /**
     * @param a [i][j], flat; the symmetric part is taken, so that rounding of one half does not matter
     * @throws IllegalArgumentException if an entry is not finite
     */
    public static Symmetric of(double[] a, int n) {
        EigenDecomposition e = new EigenDecomposition(symmetricPart(a, n));
        RealMatrix v = e.getV();
        double[] vectors = new double[n * n];
        for (int i = 0; i < n; i++) {
            for (int k = 0; k < n; k++) {
                vectors[i * n + k] = v.getEntry(i, k);
            }
        }
        return new Symmetric(e.getRealEigenvalues(), vectors);
    }

    private static RealMatrix symmetricPart(double[] a, int n) {
        RealMatrix m = new Array2DRowRealMatrix(n, n);
        for (int i = 0; i < n; i++) {
            for (int j = 0; j <= i; j++) {
                double x = 0.5 * (a[i * n + j] + a[j * n + i]);
                if (!Double.isFinite(x)) {
                    throw new IllegalArgumentException("entry " + i + ", " + j + " of a symmetric matrix is " + x);
                }
                m.setEntry(i, j, x);
                m.setEntry(j, i, x);
            }
        }
        return m;
    }

    /** Eigenvalues, largest first, copy [k]. */
    public double[] values() {
        return values.clone();
    }

    public double value(int k) {
        return values[k];
    }

    /** Component i of the eigenvector that belongs to value k. */
    public double vector(int i, int k) {
        return vectors[i * values.length + k];
    }

    /** The matrix with the same vectors and other values [k], symmetric to the bit. */
    public double[] withValues(double[] other) {
        int n = values.length;
        double[] a = new double[n * n];
        for (int i = 0; i < n; i++) {
            for (int j = 0; j <= i; j++) {
                double sum = 0;
                for (int k = 0; k < n; k++) {
                    sum += other[k] * vectors[i * n + k] * vectors[j * n + k];
                }
                a[i * n + j] = sum;
                a[j * n + i] = sum;
            }
        }
        return a;
    }
}
