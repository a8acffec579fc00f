package tracewright.fitters.leastsquares;

import java.util.Arrays;
import java.util.Optional;
import tracewright.fitters.linalg.Householder;

/**
 * Linear least squares, min |Linv (y - X b)|^2 plus Gaussian priors, through Householder QR of the whitened design with its
 * columns scaled to unit norm, and one step of refinement. The normal equations, which square the condition, are never formed.
 * <pre>
 *   covariance          (X^T W X + P)^-1,  W = Linv^T Linv,  P = diag(1/width^2)      right as an error only where W = S^-1
 *   effective number    tr(X^T W X (X^T W X + P)^-1), the parameters that the data decide; all of them without priors
 * </pre>
 */
public final class LinearFit {

    private final double[] parameters;
    private final double[] covariance;
    private final double[] fromData;
    private final double dataChiSquared;
    private final double priorChiSquared;
    private final double effectiveParameters;

    private LinearFit(double[] parameters, double[] covariance, double[] fromData, double dataChiSquared, double priorChiSquared, double effective) {
        this.parameters = parameters;
        this.covariance = covariance;
        this.fromData = fromData;
        this.dataChiSquared = dataChiSquared;
        this.priorChiSquared = priorChiSquared;
        this.effectiveParameters = effective;
    }

    /** What came of a fit. */
    public sealed interface Outcome {

        /** The minimum. */
        record Solved(LinearFit fit) implements Outcome {
        }

        /** None, and why. */
        record Failed(String reason) implements Outcome {
        }
    }

    /** Independent Gaussian priors, one for each parameter. */
    public static final class Priors {
        private final double[] means;
        private final double[] widths;

        private Priors(double[] means, double[] widths) {
            this.means = means;
            this.widths = widths;
        }

        /** @param widths positive, of the same length */
        public static Priors of(double[] means, double[] widths) {
            if (means.length != widths.length || !Arrays.stream(widths).allMatch(w -> w > 0)) {
                throw new IllegalArgumentException(means.length + " prior means need as many positive widths; got " + Arrays.toString(widths));
            }
            return new Priors(means.clone(), widths.clone());
        }
    }

    /**
     * With unit weights.
     *
     * @param design X [point][parameter] flat; read
     * @param y      [point]; read
     */
    public static Outcome of(double[] design, double[] y, int parameters) {
        return solve(design.clone(), y.clone(), parameters, Priors.of(new double[0], new double[0]));
    }

    /**
     * With the weight W = Linv^T Linv.
     *
     * @param linv [point][point] flat, lower triangular; read
     */
    public static Outcome weighted(double[] design, double[] y, double[] linv, int parameters) {
        return weighted(design, y, linv, parameters, Priors.of(new double[0], new double[0]));
    }

    /** With priors on every parameter, or with empty ones on none. */
    public static Outcome weighted(double[] design, double[] y, double[] linv, int parameters, Priors priors) {
        double[] x = design.clone();
        double[] z = y.clone();
        WhiteningKernels.vector(linv, z, z.length);
        WhiteningKernels.matrix(linv, x, z.length, parameters);
        return solve(x, z, parameters, priors);
    }

    /** Fit of whitened data; the arguments become this method's own. */
    private static Outcome solve(double[] x, double[] z, int q, Priors priors) {
        int points = z.length;
        int rows = points + priors.means.length;
        if (rows < q || q < 1 || x.length != points * q || priors.means.length != 0 && priors.means.length != q) {
            return new Outcome.Failed(points + " points and " + priors.means.length + " priors cannot determine " + q + " parameters");
        }
        double[] a = Arrays.copyOf(x, rows * q);
        double[] b = Arrays.copyOf(z, rows);
        for (int j = 0; j < priors.means.length; j++) {
            a[(points + j) * q + j] = 1 / priors.widths[j];
            b[points + j] = priors.means[j] / priors.widths[j];
        }
        Optional<double[]> solution = refined(a, b, rows, q);
        Optional<double[]> inverse = inverseNormal(a, rows, q);
        if (solution.isEmpty() || inverse.isEmpty()) {
            return new Outcome.Failed("the " + q + " terms are linearly dependent on these " + points + " points");
        }
        double[] p = solution.get();
        double[] fromData = dataPart(inverse.get(), x, points, q);
        double data = sumOfSquares(a, b, p, 0, points, q);
        double prior = sumOfSquares(a, b, p, points, rows, q);
        return new Outcome.Solved(new LinearFit(p, inverse.get(), fromData, data, prior, effective(inverse.get(), priors, q)));
    }

    private static Optional<double[]> refined(double[] a, double[] b, int rows, int q) {
        double[] p = new double[q];
        double[] r = b.clone();
        for (int round = 0; round < 2; round++) {
            double[] step = new double[q];
            double[] scaled = a.clone();
            double[] scale = scaleColumns(scaled, rows, q);
            if (!Householder.solve(scaled, r.clone(), step, rows, q)) {
                return Optional.empty();
            }
            for (int j = 0; j < q; j++) {
                p[j] += step[j] * scale[j];
            }
            for (int i = 0; i < rows; i++) {
                r[i] = residual(a, b, p, i, q);
            }
        }
        return Optional.of(p);
    }

    /** (A^T A)^-1 = R^-1 R^-T of the scaled QR; empty if the columns of A are dependent. {@code a} [row][column] is read. */
    static Optional<double[]> inverseNormal(double[] a, int rows, int q) {
        double[] r = a.clone();
        double[] scale = scaleColumns(r, rows, q);
        if (!Householder.solve(r, new double[rows], new double[q], rows, q)) {
            return Optional.empty();
        }
        double[] inverse = upperInverse(r, q);
        double[] v = new double[q * q];
        for (int i = 0; i < q; i++) {
            for (int j = 0; j <= i; j++) {
                double sum = 0;
                for (int k = i; k < q; k++) {
                    sum += inverse[i * q + k] * inverse[j * q + k];
                }
                v[i * q + j] = sum * scale[i] * scale[j];
                v[j * q + i] = v[i * q + j];
            }
        }
        return Optional.of(v);
    }

    private static double[] upperInverse(double[] r, int q) {
        double[] inverse = new double[q * q];
        for (int j = 0; j < q; j++) {
            inverse[j * q + j] = 1 / r[j * q + j];
            for (int i = j - 1; i >= 0; i--) {
                double sum = 0;
                for (int k = i + 1; k <= j; k++) {
                    sum -= r[i * q + k] * inverse[k * q + j];
                }
                inverse[i * q + j] = sum / r[i * q + i];
            }
        }
        return inverse;
    }

    /** Divides the columns by their norms in place; returns the inverse norms (one for a zero column). */
    private static double[] scaleColumns(double[] a, int rows, int q) {
        double[] scale = new double[q];
        for (int j = 0; j < q; j++) {
            double sum = 0;
            for (int i = 0; i < rows; i++) {
                sum += a[i * q + j] * a[i * q + j];
            }
            scale[j] = sum > 0 ? 1 / Math.sqrt(sum) : 1;
            for (int i = 0; i < rows; i++) {
                a[i * q + j] *= scale[j];
            }
        }
        return scale;
    }

    /** V X^T W X V, the part of the covariance that fluctuating data at fixed prior means cause. */
    private static double[] dataPart(double[] v, double[] x, int points, int q) {
        double[] part = new double[q * q];
        double[] row = new double[q];
        for (int i = 0; i < points; i++) {
            for (int j = 0; j < q; j++) {
                row[j] = 0;
                for (int k = 0; k < q; k++) {
                    row[j] += v[j * q + k] * x[i * q + k];
                }
            }
            for (int j = 0; j < q; j++) {
                for (int k = 0; k < q; k++) {
                    part[j * q + k] += row[j] * row[k];
                }
            }
        }
        return part;
    }

    /** q - tr(P V), since X^T W X = V^-1 - P. */
    private static double effective(double[] v, Priors priors, int q) {
        double effective = q;
        for (int j = 0; j < priors.widths.length; j++) {
            effective -= v[j * q + j] / (priors.widths[j] * priors.widths[j]);
        }
        return effective;
    }

    private static double sumOfSquares(double[] a, double[] b, double[] p, int from, int to, int q) {
        double sum = 0;
        for (int i = from; i < to; i++) {
            double r = residual(a, b, p, i, q);
            sum += r * r;
        }
        return sum;
    }

    private static double residual(double[] a, double[] b, double[] p, int i, int q) {
        double r = b[i];
        for (int j = 0; j < q; j++) {
            r -= a[i * q + j] * p[j];
        }
        return r;
    }

    /** Copy. */
    public double[] parameters() {
        return parameters.clone();
    }

    /** (X^T W X + P)^-1, copy [parameter][parameter]. */
    public double[] covariance() {
        return covariance.clone();
    }

    /** Part of {@link #covariance} that the data cause; the rest is the priors'. Copy. */
    public double[] covarianceFromData() {
        return fromData.clone();
    }

    /** The data's sum of squares at the minimum. */
    public double chiSquared() {
        return dataChiSquared;
    }

    /** The priors' sum of squares at the minimum. */
    public double priorChiSquared() {
        return priorChiSquared;
    }

    public double effectiveParameters() {
        return effectiveParameters;
    }
}
