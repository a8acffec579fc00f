package tracewright.analysis;

import tracewright.fitters.sampled.SampledVector;

/** Effective masses for plots, NaN where a correlator is too noisy to have one. */
final class EffectiveMass {

    private static final int STEPS = 60;

    private EffectiveMass() {
    }

    /** a m(t) = ln C(t)/C(t+1), [t] for t = 0 .. length - 2. */
    static SampledVector open(SampledVector c2) {
        return c2.map(c2.length() - 1, (in, out) -> {
            for (int t = 0; t < out.length; t++) {
                double ratio = in[t] / in[t + 1];
                out[t] = ratio > 0 && in[t] > 0 ? StrictMath.log(ratio) : Double.NaN;
            }
        });
    }

    /** Solution m of C(t)/C(t+1) = cosh(m (T/2 - t))/cosh(m (T/2 - t - 1)), [t] for t = 0 .. T/2 - 1; input is t = 0 .. T/2. */
    static SampledVector periodic(SampledVector c2) {
        int half = c2.length() - 1;
        return c2.map(half, (in, out) -> {
            for (int t = 0; t < half; t++) {
                out[t] = solve(in[t] / in[t + 1], half - t);
            }
        });
    }

    private static double solve(double ratio, int distance) {
        if (!(ratio > 1)) {
            return Double.NaN;
        }
        double low = 0;
        double high = StrictMath.log(ratio) + 1;   // the exponential's value is the solution far from the middle; cosh needs a larger one
        while (coshRatio(high, distance) < ratio && high < 50) {
            high *= 2;
        }
        for (int i = 0; i < STEPS; i++) {
            double middle = 0.5 * (low + high);
            if (coshRatio(middle, distance) < ratio) {
                low = middle;
            } else {
                high = middle;
            }
        }
        return 0.5 * (low + high);
    }

    /** cosh(m d)/cosh(m (d - 1)) without overflow. */
    private static double coshRatio(double m, int d) {
        return StrictMath.exp(m) * (1 + StrictMath.exp(-2 * m * d)) / (1 + StrictMath.exp(-2 * m * (d - 1)));
    }
}
