package tracewright.fitters.covariance;

import java.util.Locale;
import java.util.Optional;
import tracewright.fitters.linalg.Cholesky;
import tracewright.fitters.sampled.SampledVector;

/**
 * The weight W of a fit to a vector of sampled numbers, frozen: W = (s R' s)^-1 = Linv^T Linv with the errors s and the
 * correlation matrix R' after its rule. S = covariance of the mean as estimated, without any rule.
 */
public final class Weighting {

    /** An inverse of a matrix with a larger condition number than this keeps fewer than four digits. */
    private static final double LARGEST_CONDITION = 1e12;

    private final CovarianceRule rule;
    private final int blocks;
    private final double[] errors;       // [i]
    private final double[] covariance;   // S [i][j]
    private final double[] linv;         // [i][j], lower triangular
    private final Regularized regularized;

    private Weighting(CovarianceRule rule, int blocks, double[] errors, double[] covariance, double[] linv, Regularized regularized) {
        this.rule = rule;
        this.blocks = blocks;
        this.errors = errors;
        this.covariance = covariance;
        this.linv = linv;
        this.regularized = regularized;
    }

    /**
     * Weight from a vector's own samples; the number of blocks is that of the ensemble. Shrinkage reads the deviations of the blocks:
     * pseudo-values of a jackknife, influences of the blocks on a bootstrap, which takes three draws per block.
     *
     * @throws IllegalArgumentException if the samples are not those of one ensemble
     */
    public static WeightingOutcome of(SampledVector data, CovarianceRule rule) {
        if (!data.group().isEnsemble()) {
            throw new IllegalArgumentException("the weight of a fit comes from the noise of an ensemble, not from " + data.group());
        }
        int blocks = data.group().labels().size();
        Optional<WeightingOutcome> flat = withoutError(data.errors());
        if (flat.isPresent()) {
            return flat.get();
        }
        Optional<double[]> deviations = rule.readsBlocks() ? BlockDeviations.of(data) : Optional.of(new double[0]);
        return deviations.isPresent() ? of(data.covariance(), data.length(), rule, blocks, deviations.get()) : new WeightingOutcome.Refused(
            "covariance " + rule.word() + " needs the deviations of " + blocks + " blocks, and " + data.sampleCount() + " bootstrap draws of "
                + data.group().key() + " do not determine them", "draw three bootstrap samples per block, use the jackknife, or covariance floored or diagonal");
    }

    /**
     * Weight from a covariance of the mean.
     *
     * @param covariance S [i][j], read
     * @param blocks     independent blocks g behind the covariance
     * @param deviations [k][i] deviations of those blocks from their mean, in any common scale per point, of equal variance; read by
     *                   shrinkage only, otherwise they may be empty
     */
    public static WeightingOutcome of(double[] covariance, int points, CovarianceRule rule, int blocks, double[] deviations) {
        double[] errors = new double[points];
        for (int i = 0; i < points; i++) {
            errors[i] = Math.sqrt(covariance[i * points + i]);
        }
        Optional<WeightingOutcome> flat = withoutError(errors);
        return flat.isPresent() ? flat.get() : of(covariance.clone(), errors, Correlation.of(covariance, errors, deviations), rule, blocks);
    }

    private static WeightingOutcome of(double[] covariance, double[] errors, Correlation correlation, CovarianceRule rule, int blocks) {
        int points = errors.length;
        Regularized regularized = rule.regularize(correlation);
        Cholesky.Outcome factored = Cholesky.factor(regularized.toArray(), points);
        if (factored instanceof Cholesky.Outcome.NotPositive stopped) {
            return refused(rule, points, blocks, rank(points, blocks) + "no inverse: "
                + String.format(Locale.ROOT, "point %d depends on those before it to %.1e of its variance", stopped.pivot(), Math.abs(stopped.fraction())));
        }
        Cholesky factor = ((Cholesky.Outcome.Factored) factored).factor();
        double condition = factor.condition();
        if (!(condition <= LARGEST_CONDITION)) {
            return refused(rule, points, blocks, rank(points, blocks)
                + String.format(Locale.ROOT, "condition number %.1e of its correlations; need at most %.0e", condition, LARGEST_CONDITION));
        }
        return new WeightingOutcome.Usable(new Weighting(rule, blocks, errors, covariance, scaled(factor.inverseLower(), errors), regularized));
    }

    /** L^-1 of the correlations times 1/s. */
    private static double[] scaled(double[] linv, double[] errors) {
        int n = errors.length;
        for (int i = 0; i < n; i++) {
            for (int j = 0; j <= i; j++) {
                linv[i * n + j] /= errors[j];
            }
        }
        return linv;
    }

    private static Optional<WeightingOutcome> withoutError(double[] errors) {
        for (int i = 0; i < errors.length; i++) {
            if (!(errors[i] > 0) || Double.isInfinite(errors[i])) {
                return Optional.of(new WeightingOutcome.Refused("point " + i + " of " + errors.length + " has error " + errors[i] + ", so that it has no weight",
                    "leave the point out, or look why it does not vary over the samples"));
            }
        }
        return Optional.empty();
    }

    private static String rank(int points, int blocks) {
        return blocks <= points ? "rank <= " + (blocks - 1) + " and " : "";
    }

    private static WeightingOutcome refused(CovarianceRule rule, int points, int blocks, String what) {
        return new WeightingOutcome.Refused(name(rule, points, blocks) + " has " + what, advice());
    }

    private static String name(CovarianceRule rule, int points, int blocks) {
        return "covariance " + points + "x" + points + " (" + rule.word() + ") from " + blocks + " blocks";
    }

    private static String advice() {
        return "use fewer points (thin the window, start later), covariance diagonal or floored, covariance shrunk, or more and shorter blocks"
            + " if the autocorrelation allows";
    }

    /**
     * Why a fit with this many parameters should not be made: too few blocks for its degrees of freedom. Only a weight that is the
     * inverse of the estimate itself can be refused here.
     */
    public Optional<WeightingOutcome.Refused> tooFewBlocks(int parameters) {
        int f = points() - parameters;
        int most = InverseNoise.mostDegreesOfFreedom(blocks);
        if (!rule.weighsByInverse() || f <= most) {
            return Optional.empty();
        }
        String factor = blocks - f - 2 > 0
            ? String.format(Locale.ROOT, "its noise multiplies the variance by %.2f", InverseNoise.factor(f, blocks)) : "its noise has no bound";
        return Optional.of(new WeightingOutcome.Refused(name(rule, points(), blocks) + " is too noisy for a fit with " + f + " degrees of freedom: "
            + factor + "; at most " + most + " are useful", advice()));
    }

    public CovarianceRule rule() {
        return rule;
    }

    public int points() {
        return errors.length;
    }

    /** Independent blocks behind the covariance, g. */
    public int blocks() {
        return blocks;
    }

    /** Errors of the points, copy [i]. */
    public double[] errors() {
        return errors.clone();
    }

    /** S as estimated, copy [i][j]. */
    public double[] covariance() {
        return covariance.clone();
    }

    /** Linv with W = Linv^T Linv, copy [i][j], lower triangular. */
    public double[] linv() {
        return linv.clone();
    }

    /** lambda of the shrinkage; zero for other rules. */
    public double shrinkage() {
        return regularized.shrinkage();
    }

    /** Number of eigenvalues of the correlation matrix raised to the floor; zero for other rules. */
    public int raisedEigenvalues() {
        return regularized.raised();
    }
}
