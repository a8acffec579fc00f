package tracewright.fitters.covariance;

/**
 * What it costs to weight a fit by the inverse of a covariance of the mean that was itself estimated from g blocks, for Gaussian
 * data, a linear model and f = points - parameters degrees of freedom.
 * <pre>
 *   true variance of a parameter / with known covariance       (g - 2)/(g - 2 - f)
 *   reported variance / with known covariance                  (g - 1 - f)/(g - 1)
 *   factor that the reported variance needs                    F = (g - 1)(g - 2)/((g - 1 - f)(g - 2 - f))
 *   mean of the minimum Q                                      f (g - 1)/(g - f - 2)
 * </pre>
 * Dodelson, Schneider, arXiv:1304.2593; Percival et al., arXiv:1312.4841; the mean from Hotelling, Ann. Math. Stat. 2 (1931) 360.
 */
public final class InverseNoise {

    /** A fit by the inverse is refused when F exceeds this. */
    public static final double LARGEST_FACTOR = 2;

    private InverseNoise() {
    }

    /** True variance of a parameter over the one with a known covariance. */
    public static double trueOverKnown(int f, int g) {
        require(f, g);
        return (g - 2.0) / (g - 2.0 - f);
    }

    /** Reported variance of a parameter over the true one with a known covariance. */
    public static double reportedOverKnown(int f, int g) {
        require(f, g);
        return (g - 1.0 - f) / (g - 1.0);
    }

    /** F, at least one. */
    public static double factor(int f, int g) {
        return trueOverKnown(f, g) / reportedOverKnown(f, g);
    }

    /** Mean of Q for a true model. */
    public static double expectedChiSquared(int f, int g) {
        require(f, g);
        return f * (g - 1.0) / (g - f - 2.0);
    }

    /** The largest f with F at most {@link #LARGEST_FACTOR}; about 0.29 g. */
    public static int mostDegreesOfFreedom(int g) {
        int f = 0;
        while (f + 1 < g - 2 && factor(f + 1, g) <= LARGEST_FACTOR) {
            f++;
        }
        return f;
    }

    private static void require(int f, int g) {
        if (f < 0 || g - f - 2 <= 0) {
            throw new IllegalArgumentException(f + " degrees of freedom from " + g + " blocks; need none or more, and two blocks more than that");
        }
    }
}
