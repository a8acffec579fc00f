package tracewright.fitters.goodness;

/**
 * The integral I = (1/pi) int_0^inf Im[ exp(K(s) - s q) (2 c u + i)/s ] du along the parabola s(u) = s0 + c u^2 + i u through the
 * saddle point s0 of exp(K(s) - s q)/s, with K(s) = -1/2 sum_i log(1 - 2 lambda_i s) and the largest lambda equal to one.
 * <pre>
 *  K'(s0) = q + 1/s0;   k2 = K''(s0) + 1/s0^2,  k3 = K'''(s0) - 2/s0^3,   c = max(k3/(6 k2), sqrt(k2)/10)
 * </pre>
 * The integrand is smooth and falls like a Gaussian, so the trapezoid rule converges faster than any power of its step. On this
 * path the real part of 1 - 2 lambda s may change sign, but its phase stays between -pi and 0: the principal logarithm of each
 * single factor is the right one, while that of their product would not be.
 */
final class SaddlePath {

    private static final int BISECTIONS = 1100;
    /** The path ends where the integrand has fallen by e^-38 = 3e-17. */
    private static final double NEGLIGIBLE = StrictMath.exp(-38);
    private static final double GROWTH = 1.2;
    private static final double TOLERANCE = 1e-13;
    private static final int FIRST_STEPS = 16;
    private static final int MOST_STEPS = 1 << 14;

    private final double q;
    private final double[] lambda;
    private final double s0;
    private final double k2;
    private final double c;
    /** K(s0) - s0 q, taken out of every exponent. */
    private final double top;
    /** Real and imaginary part of the integrand at the last point asked for. */
    private double re;
    private double im;

    private SaddlePath(double q, double[] lambda, double s0) {
        this.q = q;
        this.lambda = lambda;
        this.s0 = s0;
        double second = 1 / (s0 * s0);
        double third = -2 / (s0 * s0 * s0);
        double exponent = -s0 * q;
        for (double l : lambda) {
            double d = 1 - 2 * l * s0;
            second += 2 * l * l / (d * d);
            third += 8 * l * l * l / (d * d * d);
            exponent -= 0.5 * StrictMath.log(d);
        }
        this.k2 = second;
        this.c = Math.max(third / (6 * second), 0.1 * Math.sqrt(second));
        this.top = exponent;
    }

    /** @param right whether the saddle between 0 and 1/2 is meant, or the one below zero */
    static SaddlePath of(double q, double[] lambda, boolean right) {
        return new SaddlePath(q, lambda, saddle(q, lambda, right));
    }

    /** Root of K'(s) - q - 1/s, which increases on both sides, by bisection down to neighbouring doubles. */
    private static double saddle(double q, double[] lambda, boolean right) {
        double low = right ? 0 : -1;
        double high = right ? 0.5 : 0;
        while (!right && slope(low, q, lambda) > 0) {
            low *= 2;
        }
        for (int i = 0; i < BISECTIONS; i++) {
            double middle = 0.5 * (low + high);
            if (middle == low || middle == high) {
                break;
            }
            if (slope(middle, q, lambda) < 0) {
                low = middle;
            } else {
                high = middle;
            }
        }
        return right ? high == 0.5 ? low : high : low;
    }

    private static double slope(double s, double q, double[] lambda) {
        double slope = -q - 1 / s;
        for (double l : lambda) {
            slope += l / (1 - 2 * l * s);
        }
        return slope;
    }

    /** I, to 1e-13 of itself or to rounding. */
    double integral() {
        double end = end();
        double h = end / FIRST_STEPS;
        double sum = 0.5 * at(0) + sum(h, h, FIRST_STEPS);
        for (int steps = FIRST_STEPS; steps < MOST_STEPS; steps *= 2) {
            double before = sum * h;
            sum += sum(0.5 * h, h, steps);
            h *= 0.5;
            if (Math.abs(sum * h - before) <= TOLERANCE * Math.abs(before)) {
                break;
            }
        }
        return sum * h * StrictMath.exp(top) / Math.PI;
    }

    private double end() {
        at(0);
        double least = magnitude() * NEGLIGIBLE;
        double end = 1 / Math.sqrt(k2);
        at(end);
        while (magnitude() > least) {
            end *= GROWTH;
            at(end);
        }
        return end;
    }

    private double magnitude() {
        return Math.sqrt(re * re + im * im);
    }

    /** Sum of the integrand over {@code n} points from {@code first} in steps of {@code h}. */
    private double sum(double first, double h, int n) {
        double sum = 0;
        for (int i = 0; i < n; i++) {
            sum += at(first + i * h);
        }
        return sum;
    }

    /** Im[ exp(K(s) - s q - top) (2 c u + i)/s ] at s = x + i u, x = s0 + c u^2; leaves both parts in the fields. */
    private double at(double u) {
        double x = s0 + c * u * u;
        double exponent = -x * q - top;
        double phase = -u * q;
        for (double l : lambda) {
            double a = 1 - 2 * l * x;
            double b = -2 * l * u;
            exponent -= 0.25 * StrictMath.log(a * a + b * b);
            phase -= 0.5 * StrictMath.atan2(b, a);
        }
        double size = StrictMath.exp(exponent) / (x * x + u * u);
        double fr = size * (2 * c * u * x + u);
        double fi = size * (x - 2 * c * u * u);
        double cos = StrictMath.cos(phase);
        double sin = StrictMath.sin(phase);
        re = fr * cos - fi * sin;
        im = fr * sin + fi * cos;
        return im;
    }
}
