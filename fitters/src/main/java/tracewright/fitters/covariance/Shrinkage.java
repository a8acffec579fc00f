package tracewright.fitters.covariance;

/**
 * Optimal linear shrinkage of a covariance towards a multiple of the unit matrix; Ledoit, Wolf, J. Multivariate Anal. 88 (2004)
 * 365. For n deviations z_k of p entries, with R = (1/n) sum_k z_k z_k^T and m = tr R/p,
 * <pre>
 *   d2 = sum_ij (R - m 1)_ij^2,   b2 = (1/n^2) sum_k sum_ij (z_ki z_kj - R_ij)^2,   lambda = min(b2, d2)/d2
 * </pre>
 * (both sums without the common factor 1/p of the paper). For standardised deviations R is a correlation matrix and m = 1.
 */
final class Shrinkage {

    private Shrinkage() {
    }

    /** @param z [k][i], deviations from their mean; read */
    static double intensity(double[] z, int points) {
        int n = z.length / points;
        double[] r = moments(z, points, n);
        double m = 0;
        for (int i = 0; i < points; i++) {
            m += r[i * points + i] / points;
        }
        double d2 = 0;
        double squares = 0;
        for (int i = 0; i < points; i++) {
            for (int j = 0; j < points; j++) {
                double off = r[i * points + j] - (i == j ? m : 0);
                d2 += off * off;
                squares += r[i * points + j] * r[i * points + j];
            }
        }
        double b2 = Math.max(0, (fourthPowers(z, points, n) - n * squares) / ((double) n * n));
        return d2 == 0 ? 0 : Math.min(b2, d2) / d2;
    }

    private static double[] moments(double[] z, int points, int n) {
        double[] r = new double[points * points];
        for (int k = 0; k < n; k++) {
            for (int i = 0; i < points; i++) {
                for (int j = 0; j < points; j++) {
                    r[i * points + j] += z[k * points + i] * z[k * points + j];
                }
            }
        }
        for (int i = 0; i < r.length; i++) {
            r[i] /= n;
        }
        return r;
    }

    /** sum_k |z_k|^4, of which n sum_ij R_ij^2 are the mean's, as sum_k z_ki z_kj = n R_ij. */
    private static double fourthPowers(double[] z, int points, int n) {
        double sum = 0;
        for (int k = 0; k < n; k++) {
            double length = 0;
            for (int i = 0; i < points; i++) {
                length += z[k * points + i] * z[k * points + i];
            }
            sum += length * length;
        }
        return sum;
    }

    /** Deviations with unit mean square in every column, as a new array. */
    static double[] standardized(double[] x, int points) {
        int n = x.length / points;
        double[] z = x.clone();
        for (int i = 0; i < points; i++) {
            double squares = 0;
            for (int k = 0; k < n; k++) {
                squares += x[k * points + i] * x[k * points + i];
            }
            double scale = Math.sqrt(n / squares);
            for (int k = 0; k < n; k++) {
                z[k * points + i] *= scale;
            }
        }
        return z;
    }
}
