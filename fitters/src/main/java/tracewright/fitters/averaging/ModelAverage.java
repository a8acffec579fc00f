package tracewright.fitters.averaging;

import static java.util.Objects.requireNonNull;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import tracewright.fitters.sampled.SampleGroup;
import tracewright.fitters.sampled.SampledNumber;

/**
 * Average of one number over fit windows and models with Akaike-type weights; Jay, Neil, Phys. Rev. D 103 (2021) 114502,
 * arXiv:2008.01069; Neil, Sitison, arXiv:2208.14983.
 * <pre>
 *  p_i = exp(-IC_i/2)/sum,   central = sum p_i x_i,   samples likewise with p_i fixed
 *  total variance = p^T Cov p  +  sum p_i (x_i - central)^2  +  (sum p_i F_i - 1) p^T Cov p
 *                   statistical   group choice:name             group fit:name
 * </pre>
 * (Adding the mean of the single variances instead of p^T Cov p would count the noise of the differences twice.) Candidates whose
 * weight is below a millionth do not enter the value; the weights given by {@link #weights} are those of all candidates.
 */
public final class ModelAverage {

    private static final double NEGLIGIBLE = 1e-6;

    private final SampledNumber value;
    private final double[] weights;

    private ModelAverage(SampledNumber value, double[] weights) {
        this.value = value;
        this.weights = weights;
    }

    /**
     * One window or model.
     *
     * @param criterion   IC, up to a constant common to all
     * @param noiseFactor F of its covariance's noise, at least one
     */
    public record Candidate(String label, SampledNumber value, double criterion, double noiseFactor) {
        public Candidate {
            requireNonNull(label, "label");
            requireNonNull(value, "value");
            if (!Double.isFinite(criterion) || !(noiseFactor >= 1) || Double.isInfinite(noiseFactor)) {
                throw new IllegalArgumentException("fit " + label + " has criterion " + criterion + " and noise factor " + noiseFactor
                    + "; need finite numbers, the factor at least one");
            }
        }
    }

    /**
     * IC = Q - 2 E[Q], for any weight of the fit. For W = S^-1 the expected minimum is E[Q] = points - k = (largest set - d) - k with k
     * parameters and d points cut, so that this is {@link #criterion(double, int, int)} minus twice the size of the largest set, the
     * same for all fits of an average. For other weights only this form is right.
     *
     * @param chiSquared Q at the minimum
     * @param expected   E[Q] of a true model with known covariance
     */
    public static double criterion(double chiSquared, double expected) {
        return chiSquared - 2 * expected;
    }

    /**
     * IC = Q + 2 k + 2 d of a fit weighted by the inverse covariance.
     *
     * @param parameters k
     * @param cut        d, points of the largest set of the average that this fit leaves out, over all correlators
     */
    public static double criterion(double chiSquared, int parameters, int cut) {
        return chiSquared + 2.0 * parameters + 2.0 * cut;
    }

    /**
     * @param name       of the choice and fit groups
     * @param candidates at least one; their values share their ensembles, block for block
     */
    public static ModelAverage of(String name, List<Candidate> candidates) {
        if (candidates.isEmpty()) {
            throw new IllegalArgumentException("an average over no fit: " + name);
        }
        requireSharedEnsembles(name, candidates);
        double[] weights = weights(candidates);
        return new ModelAverage(value(name, candidates, weights), weights);
    }

    private static void requireSharedEnsembles(String name, List<Candidate> candidates) {
        List<SampleGroup> first = ensembles(candidates.get(0));
        for (Candidate c : candidates) {
            if (!ensembles(c).equals(first)) {
                throw new IllegalArgumentException("average " + name + ": fit " + c.label() + " depends on " + ensembles(c) + " and fit "
                    + candidates.get(0).label() + " on " + first + "; only fits to the same blocks of the same ensembles can be averaged");
            }
        }
    }

    private static List<SampleGroup> ensembles(Candidate c) {
        return c.value().groups().stream().filter(SampleGroup::isEnsemble).toList();
    }

    /** exp(-IC/2) over their sum; the smallest criterion is taken off first, so that nothing underflows that matters. */
    private static double[] weights(List<Candidate> candidates) {
        double least = candidates.stream().mapToDouble(Candidate::criterion).min().orElseThrow();
        double[] p = candidates.stream().mapToDouble(c -> StrictMath.exp(-0.5 * (c.criterion() - least))).toArray();
        normalize(p);
        return p;
    }

    private static void normalize(double[] p) {
        double sum = 0;
        for (double x : p) {
            sum += x;
        }
        for (int i = 0; i < p.length; i++) {
            p[i] /= sum;
        }
    }

    private static SampledNumber value(String name, List<Candidate> candidates, double[] weights) {
        List<Candidate> used = new ArrayList<>();
        List<Double> kept = new ArrayList<>();
        for (int i = 0; i < weights.length; i++) {
            if (weights[i] >= NEGLIGIBLE) {
                used.add(candidates.get(i));
                kept.add(weights[i]);
            }
        }
        double[] p = kept.stream().mapToDouble(Double::doubleValue).toArray();
        normalize(p);
        SampledNumber mean = mean(used, p);
        SampledNumber chosen = used.size() == 1 ? mean
            : mean.withChoice(name, p, used.stream().mapToDouble(c -> c.value().central()).toArray());
        double added = addedVariance(mean, used, p);
        return added > 0 ? chosen.withGroup(SampleGroup.fitNoise(name, 1), new double[] {mean.central() + Math.sqrt(added)}) : chosen;
    }

    private static SampledNumber mean(List<Candidate> used, double[] p) {
        return SampledNumber.evaluate(x -> {
            double sum = 0;
            for (int i = 0; i < x.length; i++) {
                sum += p[i] * x[i];
            }
            return sum;
        }, used.stream().map(Candidate::value).toArray(SampledNumber[]::new));
    }

    /** (sum p_i F_i - 1) p^T Cov p over the ensembles, whose noise the covariances share; inputs have none of it. */
    private static double addedVariance(SampledNumber mean, List<Candidate> used, double[] p) {
        double factor = 0;
        for (int i = 0; i < p.length; i++) {
            factor += p[i] * (used.get(i).noiseFactor() - 1);
        }
        Map<String, Double> variances = mean.varianceByGroup();
        double statistical = 0;
        for (SampleGroup g : mean.groups()) {
            statistical += g.isEnsemble() ? variances.get(g.key()) : 0;
        }
        return factor * statistical;
    }

    /** The average with its samples and groups. */
    public SampledNumber value() {
        return value;
    }

    /** Weights of all candidates in their order, copy; their sum is one. */
    public double[] weights() {
        return weights.clone();
    }

    /** Weight of candidate i. */
    public double weight(int i) {
        return weights[i];
    }

    /** Effective number of candidates, 1/sum p_i^2. */
    public double effectiveNumber() {
        double sum = 0;
        for (double p : weights) {
            sum += p * p;
        }
        return 1 / sum;
    }
}
