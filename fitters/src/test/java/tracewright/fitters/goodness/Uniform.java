package tracewright.fitters.goodness;

import java.util.Arrays;

/** Whether numbers are uniform between zero and one. */
final class Uniform {

    private Uniform() {
    }

    /** Largest distance between the distribution of the sample and the uniform one (Kolmogorov, Smirnov). */
    static double distance(double[] sample) {
        double[] x = sample.clone();
        Arrays.sort(x);
        double most = 0;
        for (int i = 0; i < x.length; i++) {
            most = Math.max(most, Math.max(x[i] - (double) i / x.length, (i + 1.0) / x.length - x[i]));
        }
        return most;
    }

    /** Distance that n uniform numbers exceed once in a thousand trials: 1.949/sqrt(n) for large n. */
    static double oneInAThousand(int n) {
        return 1.949 / Math.sqrt(n);
    }
}
