package tracewright.synth;

import java.nio.charset.StandardCharsets;
import org.apache.commons.rng.UniformRandomProvider;
import org.apache.commons.rng.simple.RandomSource;

/**
 * Standard normal numbers by the polar method (Marsaglia and Bray, SIAM Review 6 (1964) 260), with the logarithm that gives the
 * same bits on every machine. Its seed is a pure function of (seed, purpose), so that no draw depends on what else is drawn.
 */
final class Gaussian {

    private final UniformRandomProvider uniform;
    private double spare;
    private boolean hasSpare;

    private Gaussian(UniformRandomProvider uniform) {
        this.uniform = uniform;
    }

    static Gaussian of(long seed, String purpose) {
        long[] words = new long[4];
        long state = seed;
        for (byte b : purpose.getBytes(StandardCharsets.UTF_8)) {
            state = mixed(state ^ (b & 0xff));
        }
        for (int i = 0; i < words.length; i++) {
            state = mixed(state);
            words[i] = state;
        }
        return new Gaussian(RandomSource.XO_SHI_RO_256_PP.create(words));
    }

    /** One step of an additive generator with a 64-bit finaliser (Steele, Lea and Flood, OOPSLA 2014, doi:10.1145/2660193.2660195). */
    private static long mixed(long state) {
        long z = state + 0x9E3779B97F4A7C15L;
        z = (z ^ (z >>> 30)) * 0xBF58476D1CE4E5B9L;
        z = (z ^ (z >>> 27)) * 0x94D049BB133111EBL;
        return z ^ (z >>> 31);
    }

    double next() {
        if (hasSpare) {
            hasSpare = false;
            return spare;
        }
        while (true) {
            double x = 2 * uniform.nextDouble() - 1;
            double y = 2 * uniform.nextDouble() - 1;
            double square = x * x + y * y;
            if (square > 0 && square < 1) {
                double scale = Math.sqrt(-2 * StrictMath.log(square) / square);
                spare = y * scale;
                hasSpare = true;
                return x * scale;
            }
        }
    }

    void fill(double[] out) {
        for (int i = 0; i < out.length; i++) {
            out[i] = next();
        }
    }
}
