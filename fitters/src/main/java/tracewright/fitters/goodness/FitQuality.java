package tracewright.fitters.goodness;

import java.util.Arrays;
import tracewright.fitters.covariance.InverseNoise;
import tracewright.fitters.covariance.Weighting;
import tracewright.fitters.linalg.Symmetric;

/**
 * Goodness of a fit at its minimum and covariance of its parameters.
 * <pre>
 *  covariance of the parameters   H S H^T                       (sandwich; equals (J^T W J)^-1 only for W = S^-1)
 *  full covariance                Q by Hotelling's distribution, F in closed form
 *  others                         Q ~ sum lambda_i z_i^2, p by its tail, F by simulation;
 *                                 shrunk: tail at Q (sum lambda)/E[Q*], since the shrunk matrix keeps most of the noise
 * </pre>
 * E[Q] = sum lambda = tr(W P S P^T) is that of a known covariance, which the choice among fits needs; f for the full one. Use of the
 * expected chi-squared in this field: Bruno, Sommer, arXiv:2209.14188. F multiplies the variance of the parameters for the noise of
 * the estimated covariance.
 */
public final class FitQuality {

    /** Eigenvalues below this fraction of the largest are zero to rounding. */
    private static final double ZERO = 1e-12;

    private final double chiSquared;
    private final double[] covariance;   // [parameter][parameter]
    private final double[] lambda;       // nonzero eigenvalues, descending
    private final int degreesOfFreedom;
    private final double pValue;
    private final CovarianceNoise noise;

    private FitQuality(double chiSquared, double[] covariance, double[] lambda, int degreesOfFreedom, double pValue, CovarianceNoise noise) {
        this.chiSquared = chiSquared;
        this.covariance = covariance;
        this.lambda = lambda;
        this.degreesOfFreedom = degreesOfFreedom;
        this.pValue = pValue;
        this.noise = noise;
    }

    /**
     * @param jacobian   J [point][parameter] at the minimum, read
     * @param chiSquared Q at the minimum
     * @param seed       of the simulation of the covariance's noise
     * @throws ArithmeticException      if the parameters are not determined at the minimum
     * @throws IllegalArgumentException if there are fewer points than parameters, or too few blocks for a full covariance
     */
    public static FitQuality of(Weighting w, double[] jacobian, int parameters, double chiSquared, long seed) {
        int p = w.points();
        int f = p - parameters;
        if (f < 0 || parameters < 1 || jacobian.length != p * parameters) {
            throw new IllegalArgumentException("fit of " + parameters + " parameters to " + p + " points with a Jacobian of " + jacobian.length
                + " entries; need at least one parameter, as many points, and one entry for each pair");
        }
        LinearMap map = LinearMap.of(w.linv(), jacobian, p, parameters);
        double[] v = map.sandwich(w.covariance());
        if (f == 0) {
            return new FitQuality(chiSquared, v, new double[0], 0, 1, new CovarianceNoise(1, 0));
        }
        return w.rule().weighsByInverse() ? byInverse(w, f, chiSquared, v) : byWeights(w, jacobian, map, chiSquared, v, seed);
    }

    private static FitQuality byInverse(Weighting w, int f, double chiSquared, double[] v) {
        double[] ones = new double[f];
        Arrays.fill(ones, 1);
        CovarianceNoise noise = new CovarianceNoise(InverseNoise.factor(f, w.blocks()), InverseNoise.expectedChiSquared(f, w.blocks()));
        return new FitQuality(chiSquared, v, ones, f, Tails.hotelling(chiSquared, f, w.blocks()), noise);
    }

    private static FitQuality byWeights(Weighting w, double[] jacobian, LinearMap map, double chiSquared, double[] v, long seed) {
        int parameters = jacobian.length / w.points();
        int f = w.points() - parameters;
        double[] lambda = nonzero(Symmetric.of(map.residualCovariance(w.covariance()), w.points()).values(), Math.min(f, w.blocks() - 1));
        CovarianceNoise noise = CovarianceNoise.simulate(w, jacobian, parameters, CovarianceNoise.SIMULATIONS, seed);
        double q = w.rule().readsBlocks() ? chiSquared * sum(lambda) / noise.expected() : chiSquared;
        return new FitQuality(chiSquared, v, lambda, f, WeightedChiSquares.upperTail(q, lambda), noise);
    }

    /** The first {@code most} eigenvalues that are not zero to rounding. */
    private static double[] nonzero(double[] descending, int most) {
        int n = 0;
        while (n < most && descending[n] > ZERO * descending[0]) {
            n++;
        }
        return Arrays.copyOf(descending, n);
    }

    private static double sum(double[] x) {
        double sum = 0;
        for (double y : x) {
            sum += y;
        }
        return sum;
    }

    /** Q at the minimum. */
    public double chiSquared() {
        return chiSquared;
    }

    /** Covariance of the parameters without the noise factor, copy [parameter][parameter]. */
    public double[] covariance() {
        return covariance.clone();
    }

    /** Weights of the chi-squares, largest first, copy. */
    public double[] lambda() {
        return lambda.clone();
    }

    /** E[Q] of a true model if the covariance were known; the points minus the parameters for a full covariance. */
    public double expected() {
        return sum(lambda);
    }

    /** E[Q] of a true model with the noise of the estimated covariance: in closed form for a full one, otherwise simulated. */
    public double expectedWithNoise() {
        return noise.expected();
    }

    /** Points minus parameters. */
    public int degreesOfFreedom() {
        return degreesOfFreedom;
    }

    /** Chance of a larger Q for a true model; 1 without degrees of freedom, where nothing is tested. */
    public double pValue() {
        return pValue;
    }

    /** F, at least one: a simulation that comes out below one by its own noise is no reason to trust a fit more. */
    public double noiseFactor() {
        return Math.max(1, noise.factor());
    }
}
