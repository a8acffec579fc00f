package tracewright.fitters.leastsquares;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import tracewright.fitters.leastsquares.LevenbergMarquardt.Descent;
import tracewright.fitters.leastsquares.LevenbergMarquardt.Scaling;
import tracewright.fitters.sampled.SampleGroup;
import tracewright.fitters.sampled.SampledVector;

/**
 * Minima of all samples of a fit, each from the central one, with the centre's weight.
 *
 * <p>Jackknife samples lie near the centre, so they are solved by steps with the centre's metric and the sample's exact gradient,
 * p -= (J0^T W J0)^-1 J(p)^T W (f(p) - y), and by Levenberg-Marquardt where these do not settle; bootstrap samples by
 * Levenberg-Marquardt. A jackknife sample far from the centre is fitted again from three starts. No sample is ever left out:
 * a missing jackknife sample biases the variance, and numbers with missing draws could not meet those of other fits.
 */
final class SampleRefits {

    private static final int SAMPLE_STEPS = 200;
    private static final int METRIC_STEPS = 30;
    private static final double METRIC_TOLERANCE = 1e-9;
    private static final double JUMP = 3;
    private static final int OTHER_STARTS = 2;
    /** Of the standard error of chi-squared, to which g samples contribute; one that held half of it alone is looked at again. */
    private static final double CHI_SQUARED_JUMP = 0.5;

    private final SampledVector data;
    private final FitModel model;
    private final WhitenedModel whitened;
    private final double[] dataErrors;
    private final double[] p0;
    private final double chiSquared;
    private final double spreadOfChiSquared;
    private final double[] errors;
    private final int q;
    private final double[] rows;        // [sample][parameter]
    private final double[] metric;      // (J0^T W J0)^-1
    private final double[] tolerance;
    private final double[] p;
    private final double[] gradient;
    private double lastChiSquared;

    /**
     * @param covariance of the parameters; read
     * @param dataErrors [point]; read
     */
    SampleRefits(SampledVector data, FitModel model, WhitenedModel whitened, Descent.Converged centre, double[] covariance, double[] dataErrors) {
        this.data = data;
        this.model = model;
        this.whitened = whitened;
        this.dataErrors = dataErrors;
        this.q = model.parameters();
        this.p0 = centre.parameters();
        this.chiSquared = centre.chiSquared();
        this.spreadOfChiSquared = Math.sqrt(4 * chiSquared + 2.0 * (model.points() - q));
        this.errors = roots(covariance, 1);
        this.rows = new double[data.sampleCount() * q];
        this.metric = LinearFit.inverseNormal(whitened.whitenedJacobian(p0), model.points(), q).orElseGet(() -> new double[0]);
        this.tolerance = metric.length == 0 ? new double[0] : roots(metric, METRIC_TOLERANCE);
        this.p = new double[q];
        this.gradient = new double[q];
    }

    private double[] roots(double[] matrix, double factor) {
        double[] roots = new double[q];
        for (int j = 0; j < q; j++) {
            roots[j] = factor * Math.sqrt(matrix[j * q + j]);
        }
        return roots;
    }

    /** Fits all samples; the reason if one of them has no minimum that belongs to the central one. */
    Optional<String> run() {
        for (int k = 0; k < data.sampleCount(); k++) {
            double[] row = data.sampleRow(k);
            whitened.data(row);
            Optional<String> failure = sample(k, row);
            if (failure.isPresent()) {
                return failure;
            }
            System.arraycopy(p, 0, rows, k * q, q);
        }
        return Optional.empty();
    }

    double[] rows() {
        return rows;
    }

    private Optional<String> sample(int k, double[] row) {
        boolean jackknife = data.group().kind() == SampleGroup.Kind.JACKKNIFE;
        boolean found = jackknife && metric.length > 0 && metricSteps() || warm(p0);
        if (!found || jackknife && far(k)) {
            Optional<String> failure = threeStarts(row);
            if (failure.isPresent()) {
                return failure.map(f -> "sample " + k + " of " + data.sampleCount() + ": " + f);
            }
        }
        return jumped(k).map(j -> String.format(Locale.ROOT,
            "undetermined: in sample %d of %d the parameter %s moves from %.4g to %.4g, far more than its error %.2g allows",
            k, data.sampleCount(), model.parameterNames().get(j), p0[j], p[j], errors[j]));
    }

    private boolean warm(double[] start) {
        if (whitened.machine().descend(start, Scaling.WARM, SAMPLE_STEPS) instanceof Descent.Converged c) {
            System.arraycopy(c.parameters(), 0, p, 0, q);
            lastChiSquared = c.chiSquared();
            return true;
        }
        return false;
    }

    /** The lowest minimum from the centre and from the sample's own first start values. */
    private Optional<String> threeStarts(double[] row) {
        List<double[]> starts = new ArrayList<>(List.of(p0));
        model.starts(row, dataErrors).stream().limit(OTHER_STARTS).forEach(starts::add);
        Optional<Descent.Converged> best = Optional.empty();
        String reason = "";
        for (double[] start : starts) {
            Descent d = whitened.machine().cold(start, SAMPLE_STEPS);
            if (d instanceof Descent.Failed f) {
                reason = f.reason();
            } else if (d instanceof Descent.Converged c && (best.isEmpty() || c.chiSquared() < best.get().chiSquared())) {
                best = Optional.of(c);
            }
        }
        best.ifPresent(c -> System.arraycopy(c.parameters(), 0, p, 0, q));
        return best.isPresent() ? Optional.empty() : Optional.of(reason);
    }

    /** More than one error between a jackknife sample and the centre, or a chi-squared that jumps. */
    private boolean far(int k) {
        for (int j = 0; j < q; j++) {
            if (!(Math.abs(p[j] - p0[j]) <= errors[j])) {
                return true;
            }
        }
        return Math.sqrt(data.group().weight(k)) * Math.abs(lastChiSquared - chiSquared) > CHI_SQUARED_JUMP * spreadOfChiSquared;
    }

    /**
     * A parameter whose deviation in one sample, weighted as it enters the variance, is many times its error: the sample fell into
     * another minimum. To first order the weighted squares of all deviations sum to the error's square, so this cannot be noise.
     */
    private Optional<Integer> jumped(int k) {
        double weight = Math.sqrt(data.group().weight(k));
        for (int j = 0; j < q; j++) {
            if (!(weight * Math.abs(p[j] - p0[j]) <= JUMP * errors[j])) {
                return Optional.of(j);
            }
        }
        return Optional.empty();
    }

    /** Steps with the frozen metric from the centre into {@code p}; false if they do not settle. */
    private boolean metricSteps() {
        System.arraycopy(p0, 0, p, 0, q);
        double before = Double.POSITIVE_INFINITY;
        int growing = 0;
        for (int n = 0; n < METRIC_STEPS; n++) {
            lastChiSquared = whitened.gradient(p, gradient);
            double largest = metricStep();
            if (!Double.isFinite(largest)) {
                return false;
            }
            if (largest < 1) {
                return true;
            }
            growing = largest > before ? growing + 1 : 0;
            if (growing > 2) {
                return false;
            }
            before = largest;
        }
        return false;
    }

    /** One step; its largest component in units of the tolerance. */
    private double metricStep() {
        double largest = 0;
        for (int j = 0; j < q; j++) {
            double x = 0;
            for (int k = 0; k < q; k++) {
                x += metric[j * q + k] * gradient[k];
            }
            largest = Math.max(largest, Math.abs(x) / tolerance[j]);
            p[j] -= x;
        }
        return largest;
    }
}
