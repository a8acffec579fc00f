package tracewright.fitters.goodness;

/**
 * Tails of Q = sum_i lambda_i z_i^2 with independent standard normal z_i, to about 1e-13 relative on the side where the tail is
 * small.
 * <pre>
 *  K(s) = -1/2 sum log(1 - 2 lambda_i s);   P(Q &gt; q) = (1/2 pi i) integral exp(K(s) - s q)/s ds  to the right of zero,
 *                                          -P(Q &lt; q) = the same to the left of zero
 * </pre>
 * The path is a parabola through the saddle point, on which nothing oscillates ({@link SaddlePath}); idea of the path: S. O. Rice,
 * SIAM J. Sci. Stat. Comput. 1 (1980) 438.
 */
public final class WeightedChiSquares {

    private WeightedChiSquares() {
    }

    /**
     * P(Q &gt; q).
     *
     * @param lambda positive weights, at least one; read
     */
    public static double upperTail(double q, double[] lambda) {
        requireWeights(lambda);
        requireNumber(q);
        double small = smallTail(q, lambda);
        return q > mean(lambda) ? small : 1 - small;
    }

    /** P(Q &lt; q), with the digits of a small lower tail. */
    public static double lowerTail(double q, double[] lambda) {
        requireWeights(lambda);
        requireNumber(q);
        double small = smallTail(q, lambda);
        return q > mean(lambda) ? 1 - small : small;
    }

    private static void requireNumber(double q) {
        if (Double.isNaN(q)) {
            throw new IllegalArgumentException("chi-squared is not a number");
        }
    }

    private static void requireWeights(double[] lambda) {
        if (lambda.length == 0) {
            throw new IllegalArgumentException("a weighted sum of no chi-squares has no distribution");
        }
        for (double l : lambda) {
            if (!(l > 0) || Double.isInfinite(l)) {
                throw new IllegalArgumentException("weight " + l + " of a chi-square is not positive and finite");
            }
        }
    }

    private static double mean(double[] lambda) {
        double sum = 0;
        for (double l : lambda) {
            sum += l;
        }
        return sum;
    }

    /** The upper tail if q is above the mean, otherwise the lower one. Scaled so that the largest weight is one. */
    private static double smallTail(double q, double[] lambda) {
        double largest = 0;
        for (double l : lambda) {
            largest = Math.max(largest, l);
        }
        double x = q / largest;
        if (x <= 0 || Double.isInfinite(x)) {
            return 0;
        }
        double[] scaled = new double[lambda.length];
        for (int i = 0; i < scaled.length; i++) {
            scaled[i] = lambda[i] / largest;
        }
        return Math.abs(SaddlePath.of(x, scaled, q > mean(lambda)).integral());
    }
}
