package tracewright.fitters.models;

import java.util.Locale;
import java.util.Optional;

/** Ordered energies from free parameters: E_0, then E_n = E_{n-1} + exp(delta_n). */
final class Spectrum {

    /** A gap outside these limits (lattice units) says that the data do not resolve the state. */
    private static final double SMALLEST_GAP = 0.02;
    private static final double LARGEST_GAP = 10;

    private Spectrum() {
    }

    /** Energies of {@code states} states; {@code p} holds E_0, delta_1, delta_2 ... first. */
    static double[] energies(double[] p, int states) {
        double[] e = new double[states];
        e[0] = p[0];
        for (int n = 1; n < states; n++) {
            e[n] = e[n - 1] + StrictMath.exp(p[n]);
        }
        return e;
    }

    /** Energy n alone, without allocating. */
    static double energy(double[] p, int n) {
        double e = p[0];
        for (int k = 1; k <= n; k++) {
            e += StrictMath.exp(p[k]);
        }
        return e;
    }

    static Optional<String> undetermined(double[] p, int states) {
        if (!(p[0] > 0)) {
            return Optional.of(String.format(Locale.ROOT, "the ground-state energy is %.4g", p[0]));
        }
        for (int n = 1; n < states; n++) {
            double gap = StrictMath.exp(p[n]);
            if (gap < SMALLEST_GAP || gap > LARGEST_GAP) {
                return Optional.of(String.format(Locale.ROOT, "gap %d runs to %.4g lattice units; the data do not resolve %d states", n, gap, n + 1));
            }
        }
        return Optional.empty();
    }
}
