package tracewright.fitters.leastsquares;

/** Damped normal equations of a few parameters on flat arrays. Nothing is allocated. */
final class NormalKernels {

    private NormalKernels() {
    }

    /**
     * Normal matrix and gradient with columns divided by their scales: n = D^-1 J^T J D^-1, g = D^-1 J^T r.
     *
     * @param jacobian [rows][q]; read
     * @param r        [rows]; read
     * @param scale    D [q], positive; read
     * @param n        [q][q], lower triangle overwritten
     * @param g        [q], overwritten
     */
    static void form(double[] jacobian, double[] r, double[] scale, int rows, int q, double[] n, double[] g) {
        for (int j = 0; j < q; j++) {
            g[j] = 0;
            for (int k = 0; k <= j; k++) {
                n[j * q + k] = 0;
            }
        }
        for (int i = 0; i < rows; i++) {
            int at = i * q;
            for (int j = 0; j < q; j++) {
                double x = jacobian[at + j];
                g[j] += x * r[i];
                for (int k = 0; k <= j; k++) {
                    n[j * q + k] += x * jacobian[at + k];
                }
            }
        }
        for (int j = 0; j < q; j++) {
            g[j] /= scale[j];
            for (int k = 0; k <= j; k++) {
                n[j * q + k] /= scale[j] * scale[k];
            }
        }
    }

    /**
     * Solves (n + damping) s = -g by Cholesky.
     *
     * @param n      [q][q], lower triangle read
     * @param factor [q][q], overwritten
     * @param s      [q], overwritten
     * @return false if the squared ratio of the pivots exceeds {@code condition}: s is then not to be used
     */
    static boolean solve(double[] n, double[] g, double damping, int q, double condition, double[] factor, double[] s) {
        double most = 0;
        double least = Double.POSITIVE_INFINITY;
        for (int i = 0; i < q; i++) {
            for (int j = 0; j <= i; j++) {
                double sum = n[i * q + j] + (i == j ? damping : 0);
                for (int k = 0; k < j; k++) {
                    sum -= factor[i * q + k] * factor[j * q + k];
                }
                if (i > j) {
                    factor[i * q + j] = sum / factor[j * q + j];
                } else {
                    most = Math.max(most, sum);
                    least = Math.min(least, sum);
                    factor[i * q + i] = Math.sqrt(sum);
                }
            }
        }
        if (!(most <= condition * least) || !Double.isFinite(most)) {
            return false;
        }
        substitute(factor, g, q, s);
        return true;
    }

    /** s = -(L L^T)^-1 g. */
    private static void substitute(double[] l, double[] g, int q, double[] s) {
        for (int i = 0; i < q; i++) {
            double sum = -g[i];
            for (int k = 0; k < i; k++) {
                sum -= l[i * q + k] * s[k];
            }
            s[i] = sum / l[i * q + i];
        }
        for (int i = q - 1; i >= 0; i--) {
            double sum = s[i];
            for (int k = i + 1; k < q; k++) {
                sum -= l[k * q + i] * s[k];
            }
            s[i] = sum / l[i * q + i];
        }
    }
}
