package tracewright.fitters.linalg;

/**
 * Products with a lower triangular matrix L [n][n], flat, row-major, of which only the lower triangle is read.
 *
 * <p>Products in place go from the last row to the first, so that the rows above are still the old ones. Jacobians are interleaved,
 * [point][parameter]: the running sums of one row then live in registers, which is why up to 4 and 8 columns at once are written out.
 */
public final class Triangular {

    private Triangular() {
    }

    /**
     * x &lt;- L x.
     *
     * @param x [n], overwritten
     */
    public static void multiply(double[] l, int n, double[] x) {
        for (int i = n - 1; i >= 0; i--) {
            double sum = 0;
            int row = i * n;
            for (int k = 0; k <= i; k++) {
                sum += l[row + k] * x[k];
            }
            x[i] = sum;
        }
    }

    /**
     * J &lt;- L J.
     *
     * @param j [n][columns], overwritten
     */
    public static void multiply(double[] l, int n, double[] j, int columns) {
        int done = 0;
        while (columns - done >= 8) {
            eight(l, n, j, columns, done);
            done += 8;
        }
        if (columns - done >= 4) {
            four(l, n, j, columns, done);
            done += 4;
        }
        int left = columns - done;
        if (left == 3) {
            three(l, n, j, columns, done);
        } else if (left == 2) {
            two(l, n, j, columns, done);
        } else if (left == 1) {
            one(l, n, j, columns, done);
        }
    }

    private static void eight(double[] l, int n, double[] j, int columns, int first) {
        for (int i = n - 1; i >= 0; i--) {
            double a0 = 0;
            double a1 = 0;
            double a2 = 0;
            double a3 = 0;
            double a4 = 0;
            double a5 = 0;
            double a6 = 0;
            double a7 = 0;
            int row = i * n;
            int at = first;
            for (int k = 0; k <= i; k++) {
                double x = l[row + k];
                a0 += x * j[at];
                a1 += x * j[at + 1];
                a2 += x * j[at + 2];
                a3 += x * j[at + 3];
                a4 += x * j[at + 4];
                a5 += x * j[at + 5];
                a6 += x * j[at + 6];
                a7 += x * j[at + 7];
                at += columns;
            }
            at -= columns;
            j[at] = a0;
            j[at + 1] = a1;
            j[at + 2] = a2;
            j[at + 3] = a3;
            j[at + 4] = a4;
            j[at + 5] = a5;
            j[at + 6] = a6;
            j[at + 7] = a7;
        }
    }

    private static void four(double[] l, int n, double[] j, int columns, int first) {
        for (int i = n - 1; i >= 0; i--) {
            double a0 = 0;
            double a1 = 0;
            double a2 = 0;
            double a3 = 0;
            int row = i * n;
            int at = first;
            for (int k = 0; k <= i; k++) {
                double x = l[row + k];
                a0 += x * j[at];
                a1 += x * j[at + 1];
                a2 += x * j[at + 2];
                a3 += x * j[at + 3];
                at += columns;
            }
            at -= columns;
            j[at] = a0;
            j[at + 1] = a1;
            j[at + 2] = a2;
            j[at + 3] = a3;
        }
    }

    private static void three(double[] l, int n, double[] j, int columns, int first) {
        for (int i = n - 1; i >= 0; i--) {
            double a0 = 0;
            double a1 = 0;
            double a2 = 0;
            int row = i * n;
            int at = first;
            for (int k = 0; k <= i; k++) {
                double x = l[row + k];
                a0 += x * j[at];
                a1 += x * j[at + 1];
                a2 += x * j[at + 2];
                at += columns;
            }
            at -= columns;
            j[at] = a0;
            j[at + 1] = a1;
            j[at + 2] = a2;
        }
    }

    private static void two(double[] l, int n, double[] j, int columns, int first) {
        for (int i = n - 1; i >= 0; i--) {
            double a0 = 0;
            double a1 = 0;
            int row = i * n;
            int at = first;
            for (int k = 0; k <= i; k++) {
                double x = l[row + k];
                a0 += x * j[at];
                a1 += x * j[at + 1];
                at += columns;
            }
            at -= columns;
            j[at] = a0;
            j[at + 1] = a1;
        }
    }

    private static void one(double[] l, int n, double[] j, int columns, int column) {
        for (int i = n - 1; i >= 0; i--) {
            double a = 0;
            int row = i * n;
            for (int k = 0; k <= i; k++) {
                a += l[row + k] * j[k * columns + column];
            }
            j[i * columns + column] = a;
        }
    }

    /** L^-1, zero above the diagonal; the diagonal of {@code l} must not vanish. */
    public static double[] inverse(double[] l, int n) {
        double[] inverse = new double[n * n];
        for (int j = 0; j < n; j++) {
            inverse[j * n + j] = 1 / l[j * n + j];
            for (int i = j + 1; i < n; i++) {
                double sum = 0;
                for (int k = j; k < i; k++) {
                    sum -= l[i * n + k] * inverse[k * n + j];
                }
                inverse[i * n + j] = sum / l[i * n + i];
            }
        }
        return inverse;
    }

    /** L L^T, symmetric to the bit. */
    public static double[] timesTranspose(double[] l, int n) {
        double[] product = new double[n * n];
        for (int i = 0; i < n; i++) {
            for (int j = 0; j <= i; j++) {
                double sum = 0;
                for (int k = 0; k <= j; k++) {
                    sum += l[i * n + k] * l[j * n + k];
                }
                product[i * n + j] = sum;
                product[j * n + i] = sum;
            }
        }
        return product;
    }

    /** L^T L, symmetric to the bit. */
    public static double[] transposeTimesSelf(double[] l, int n) {
        double[] product = new double[n * n];
        for (int i = 0; i < n; i++) {
            for (int j = 0; j <= i; j++) {
                double sum = 0;
                for (int k = i; k < n; k++) {
                    sum += l[k * n + i] * l[k * n + j];
                }
                product[i * n + j] = sum;
                product[j * n + i] = sum;
            }
        }
        return product;
    }
}
