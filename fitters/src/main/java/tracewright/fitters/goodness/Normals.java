package tracewright.fitters.goodness;

/**
 * Random deviates as a pure function of a seed, for simulations inside the library: a 64-bit counter through a mixing function
 * (Steele, Lea, Flood, OOPSLA 2014, doi:10.1145/2660193.2660195).
 */
final class Normals {

    private long state;
    private double spare;
    private boolean hasSpare;

    Normals(long seed) {
        this.state = seed;
    }

    /** Uniform in [0, 1). */
    private double uniform() {
        state += 0x9E3779B97F4A7C15L;
        long z = state;
        z = (z ^ (z >>> 30)) * 0xBF58476D1CE4E5B9L;
        z = (z ^ (z >>> 27)) * 0x94D049BB133111EBL;
        z ^= z >>> 31;
        return (z >>> 11) * 0x1p-53;
    }

    /** Standard normal, in pairs by the polar method; Marsaglia, Bray, SIAM Review 6 (1964) 260. */
    double next() {
        if (hasSpare) {
            hasSpare = false;
            return spare;
        }
        while (true) {
            double u = 2 * uniform() - 1;
            double v = 2 * uniform() - 1;
            double r = u * u + v * v;
            if (r > 0 && r < 1) {
                double f = Math.sqrt(-2 * StrictMath.log(r) / r);
                spare = v * f;
                hasSpare = true;
                return u * f;
            }
        }
    }

    /** Chi-squared with n degrees of freedom, by rejection from a cubed normal; Marsaglia, Tsang, ACM Trans. Math. Softw. 26 (2000) 363. */
    double nextChiSquared(int n) {
        if (n == 1) {
            double z = next();
            return z * z;
        }
        double d = 0.5 * n - 1.0 / 3;
        double c = 1 / Math.sqrt(9 * d);
        while (true) {
            double x = next();
            double v = 1 + c * x;
            v *= v * v;
            if (v > 0 && StrictMath.log(1 - uniform()) < 0.5 * x * x + d - d * v + d * StrictMath.log(v)) {
                return 2 * d * v;
            }
        }
    }
}
