package tracewright.fitters.goodness;

import org.apache.commons.math3.special.Beta;
import org.apache.commons.math3.special.Erf;
import org.apache.commons.math3.special.Gamma;

/** Tails of the distributions that fits and errors are judged by, on the library functions of Commons Math. */
public final class Tails {

    private static final double PRECISION = 1e-15;
    private static final int MOST_TERMS = 100_000;
    private static final int BISECTIONS = 100;
    /** Chance of a normal deviate within one standard deviation, erf(1/sqrt 2). */
    private static final double ONE_SIGMA = 0.682_689_492_137_085_9;

    private Tails() {
    }

    /** P(z &gt; x) of a standard normal deviate. */
    public static double normal(double x) {
        return 0.5 * Erf.erfc(x / Math.sqrt(2));
    }

    /** P(chi-squared with f degrees of freedom &gt; q). */
    public static double chiSquared(double q, int f) {
        require(f >= 1, "chi-squared with " + f + " degrees of freedom; need at least one");
        return q <= 0 ? 1 : Gamma.regularizedGammaQ(0.5 * f, 0.5 * q, PRECISION, MOST_TERMS);
    }

    /** P(F with f1 and f2 degrees of freedom &gt; x), from the complement's own distribution, which keeps the digits of a small tail. */
    public static double fisher(double x, int f1, int f2) {
        require(f1 >= 1 && f2 >= 1, "F distribution with " + f1 + " and " + f2 + " degrees of freedom; need at least one of each");
        return x <= 0 ? 1 : Beta.regularizedBeta(f2 / (f2 + f1 * x), 0.5 * f2, 0.5 * f1, PRECISION, MOST_TERMS);
    }

    /** P(|t| &gt; x) of Student's distribution with f degrees of freedom. */
    public static double studentTwoSided(double x, int f) {
        require(f >= 1, "Student's distribution with " + f + " degrees of freedom; need at least one");
        return x == 0 ? 1 : Beta.regularizedBeta(f / (f + x * x), 0.5 * f, 0.5, PRECISION, MOST_TERMS);
    }

    /** x with P(|t| &lt; x) = 0.6827, the factor that makes an error from f + 1 blocks a one-sigma interval. */
    public static double studentOneSigma(int f) {
        double low = 0;
        double high = 2;
        for (int i = 0; i < BISECTIONS; i++) {
            double middle = 0.5 * (low + high);
            if (studentTwoSided(middle, f) > 1 - ONE_SIGMA) {
                low = middle;
            } else {
                high = middle;
            }
        }
        return 0.5 * (low + high);
    }

    /**
     * P(Q &gt; q) for the minimum of a fit weighted by the inverse of a covariance that was itself estimated from g blocks:
     * Q (g - f)/(f (g - 1)) follows the F distribution with f and g - f degrees of freedom; Hotelling, Ann. Math. Stat. 2 (1931) 360,
     * with the fitted parameters projected out.
     *
     * @param f degrees of freedom, at least one
     * @param g blocks, more than f
     */
    public static double hotelling(double q, int f, int g) {
        require(f >= 1 && g > f, f + " degrees of freedom from " + g + " blocks; need at least one, and more blocks than that");
        return fisher(q * (g - f) / (f * (g - 1.0)), f, g - f);
    }

    private static void require(boolean held, String message) {
        if (!held) {
            throw new IllegalArgumentException(message);
        }
    }
}
