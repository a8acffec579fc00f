package tracewright.fitters.linalg;

/** Least squares by Householder reflections, in place on flat row-major arrays. */
public final class Householder {

    private Householder() {
    }

    /**
     * Minimises |a x - b|.
     *
     * @param a [rows][columns], overwritten
     * @param b [rows], overwritten
     * @param x [columns], overwritten with the solution
     * @return false if a column is zero or linearly dependent on earlier ones to rounding; x is then not valid
     */
    public static boolean solve(double[] a, double[] b, double[] x, int rows, int columns) {
        double largest = 0;
        for (int j = 0; j < columns; j++) {
            double before = norm(a, 0, j, rows, columns);
            double norm = norm(a, j, j, rows, columns);
            if (!(norm > 1e-14 * before) || norm == 0) {
                return false;
            }
            largest = Math.max(largest, norm);
            reflect(a, b, j, norm, rows, columns);
        }
        for (int j = columns - 1; j >= 0; j--) {
            double sum = b[j];
            for (int k = j + 1; k < columns; k++) {
                sum -= a[j * columns + k] * x[k];
            }
            x[j] = sum / a[j * columns + j];
        }
        return true;
    }

    private static double norm(double[] a, int from, int j, int rows, int columns) {
        double most = 0;
        for (int i = from; i < rows; i++) {
            most = Math.max(most, Math.abs(a[i * columns + j]));
        }
        if (most == 0 || !Double.isFinite(most)) {
            return 0;
        }
        double sum = 0;
        for (int i = from; i < rows; i++) {
            double scaled = a[i * columns + j] / most;
            sum += scaled * scaled;
        }
        return most * Math.sqrt(sum);
    }

    /** Applies the reflection that clears column j below its diagonal; leaves R on and above it. */
    private static void reflect(double[] a, double[] b, int j, double norm, int rows, int columns) {
        double pivot = a[j * columns + j];
        double alpha = pivot > 0 ? -norm : norm;
        double head = pivot - alpha;
        double beta = -1 / (alpha * head);
        for (int k = j + 1; k < columns; k++) {
            double dot = head * a[j * columns + k];
            for (int i = j + 1; i < rows; i++) {
                dot += a[i * columns + j] * a[i * columns + k];
            }
            dot *= beta;
            a[j * columns + k] -= dot * head;
            for (int i = j + 1; i < rows; i++) {
                a[i * columns + k] -= dot * a[i * columns + j];
            }
        }
        double dot = head * b[j];
        for (int i = j + 1; i < rows; i++) {
            dot += a[i * columns + j] * b[i];
        }
        dot *= beta;
        b[j] -= dot * head;
        for (int i = j + 1; i < rows; i++) {
            b[i] -= dot * a[i * columns + j];
        }
        a[j * columns + j] = alpha;
    }
}
