package tracewright.fitters.autocorrelation;

import java.util.Locale;
import org.apache.commons.math3.special.Gamma;

/**
 * The windowed sum of {@link IntegratedTime}. Where configurations are missing, Gamma(t) is the mean over the pairs that
 * exist, and the variance of the mean counts each pair once:
 * <pre>
 *   var = (Gamma(0) + 2 sum_{t=1..W} f(t) Gamma(t)) / N,        f(t) = pairs(t) / (N - R t)
 * </pre>
 * f is 1 for R complete streams, so that var = C(W)/N, and less when gaps thin the pairs out; it is held below one.
 */
final class WindowedEstimate {

    /** Ratio of the decay time to the integrated time that the automatic window assumes: S of the paper. */
    private static final double S = 1.5;

    private final Series series;
    private final int n;
    private final long shortest;     // steps in the shortest stream
    private final double variance;   // Gamma(0)
    private double sum;              // C(W)
    private double thinned;          // the same with f(t)
    private double weights;          // 1 + 2 sum f(t)
    private int window;

    private WindowedEstimate(Series series) {
        this.series = series;
        this.n = series.size();
        this.shortest = series.shortestExtent();
        double[] products = new double[2];
        series.products(0, products);
        this.variance = products[0] / n;
        this.sum = variance;
        this.thinned = variance;
        this.weights = 1;
    }

    static IntegratedTime of(Series series) {
        WindowedEstimate e = new WindowedEstimate(series);
        if (e.variance == 0) {
            return new IntegratedTime.Measured(new IntegratedTime.Estimate(series.mean(), 0, 0, 0, 0.5, 0, 1, series.spacing(), e.n, 1));
        }
        boolean closed = e.widen();
        return e.judge(closed);
    }

    /** Widens the window until it closes by itself; false if it does not below half the shortest stream. */
    private boolean widen() {
        double[] products = new double[2];
        double last = variance;
        while (2L * (window + 1) < shortest) {
            window++;
            series.products(window, products);
            // No pair at this distance (odd spacings): the value at the distance before stands in.
            last = products[1] > 0 ? products[0] / products[1] : last;
            double f = products[1] == 0 ? 0 : products[1] / Math.max(n - (double) series.streams() * window, products[1]);
            sum += 2 * last;
            thinned += 2 * f * last;
            weights += 2 * f;
            if (sum > 0 && thinned > 0 && closes(sum / (2 * variance))) {
                return true;
            }
        }
        return false;
    }

    private boolean closes(double tau) {
        if (tau <= 0.5) {
            return true;
        }
        double decay = S / StrictMath.log((2 * tau + 1) / (2 * tau - 1));
        return StrictMath.exp(-window / decay) - decay / Math.sqrt((double) window * n) < 0;
    }

    private IntegratedTime judge(boolean closed) {
        IntegratedTime.Estimate e = estimate();
        double upper = e.tau() + e.tauError();
        long needed = (long) Math.ceil(IntegratedTime.TIMES_NEEDED * upper);
        if (!closed) {
            return new IntegratedTime.TooShort(e, Math.max(needed, 2L * n), "no window closes below half the shortest stream of "
                + shortest + " steps");
        }
        if (n < needed) {
            return new IntegratedTime.TooShort(e, needed, String.format(Locale.ROOT,
                "%d configurations are fewer than %d times the integrated time of %.2f + %.2f steps", n, IntegratedTime.TIMES_NEEDED, e.tau(),
                e.tauError()));
        }
        if (4L * window > shortest) {
            return new IntegratedTime.TooShort(e, Math.max(needed, (long) Math.ceil(4.0 * window * n / shortest)), "the window of " + window
                + " steps is longer than a quarter of the shortest stream of " + shortest + " steps");
        }
        return new IntegratedTime.Measured(e);
    }

    /** Bias correction Gamma(t) += var for t up to the window, then all figures. */
    private IntegratedTime.Estimate estimate() {
        double bias = Math.max(thinned, 0) / n;
        double corrected = variance + bias;
        double tau = Math.max(sum + (2 * window + 1) * bias, 0) / (2 * corrected);
        double varianceOfMean = Math.max(thinned + weights * bias, 0) / n;
        double error = Math.sqrt(varianceOfMean);
        double tauError = tau * Math.sqrt(4 * Math.max(window + 0.5 - tau, 0) / n);
        double errorOfError = error * Math.sqrt((window + 0.5) / n);
        return new IntegratedTime.Estimate(series.mean(), error, errorOfError, variance, tau, tauError, window, series.spacing(), n,
            agreement(varianceOfMean * n));
    }

    /** Tail probability of sum_r N_r (mean_r - mean)^2 / C for chi-squared with R - 1 degrees of freedom. */
    private double agreement(double c) {
        double q = 0;
        for (int r = 0; r < series.streams(); r++) {
            double d = series.shiftOf(r);
            q += series.sizeOf(r) * d * d;
        }
        return series.streams() < 2 || c <= 0 ? 1 : Gamma.regularizedGammaQ((series.streams() - 1) / 2.0, q / c / 2);
    }
}
