package tracewright.fitters.leastsquares;

/** Products with a lower triangular matrix, in place: whitening of vectors and Jacobians. Nothing is allocated. */
final class WhiteningKernels {

    private WhiteningKernels() {
    }

    /**
     * x &lt;- Linv x, last row first, so that rows above are still the old ones.
     *
     * @param linv [n][n], lower triangle read
     * @param x    [n], overwritten
     */
    static void vector(double[] linv, double[] x, int n) {
        for (int i = n - 1; i >= 0; i--) {
            double sum = 0;
            int row = i * n;
            for (int k = 0; k <= i; k++) {
                sum += linv[row + k] * x[k];
            }
            x[i] = sum;
        }
    }

    /**
     * out &lt;- Linv^T x.
     *
     * @param linv [n][n], lower triangle read
     * @param x    [n]; read
     * @param out  [n], overwritten
     */
    static void transposed(double[] linv, double[] x, double[] out, int n) {
        for (int i = 0; i < n; i++) {
            out[i] = 0;
            double factor = x[i];
            int row = i * n;
            for (int k = 0; k <= i; k++) {
                out[k] += linv[row + k] * factor;
            }
        }
    }

    /**
     * J &lt;- Linv J, last row first; four columns at a time in scalar accumulators, which is what makes it fast.
     *
     * @param linv [n][n], lower triangle read
     * @param j    [n][q] interleaved, overwritten
     */
    static void matrix(double[] linv, double[] j, int n, int q) {
        int fours = q - q % 4;
        for (int i = n - 1; i >= 0; i--) {
            for (int c = 0; c < fours; c += 4) {
                fourColumns(linv, j, i, n, q, c);
            }
            for (int c = fours; c < q; c++) {
                oneColumn(linv, j, i, n, q, c);
            }
        }
    }

    private static void fourColumns(double[] linv, double[] j, int i, int n, int q, int c) {
        double a0 = 0;
        double a1 = 0;
        double a2 = 0;
        double a3 = 0;
        int row = i * n;
        int at = c;
        for (int k = 0; k <= i; k++, at += q) {
            double l = linv[row + k];
            a0 += l * j[at];
            a1 += l * j[at + 1];
            a2 += l * j[at + 2];
            a3 += l * j[at + 3];
        }
        at -= q;
        j[at] = a0;
        j[at + 1] = a1;
        j[at + 2] = a2;
        j[at + 3] = a3;
    }

    private static void oneColumn(double[] linv, double[] j, int i, int n, int q, int c) {
        double sum = 0;
        int row = i * n;
        int at = c;
        for (int k = 0; k <= i; k++, at += q) {
            sum += linv[row + k] * j[at];
        }
        j[at - q] = sum;
    }
}
