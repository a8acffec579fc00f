package tracewright.fitters.sampled;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.Collections;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.TreeMap;
import java.util.function.ToDoubleFunction;
import tracewright.fitters.autocorrelation.IntegratedTime;

/**
 * A measured or derived number: a central value and, for each independent cause of uncertainty that it depends on, that
 * cause's samples. Immutable; samples are stored flat, groups in the order of their keys.
 * <pre>
 *   f(x, y):     group by group over the union, with that group's sample of each argument and the central value of the others
 *   cov(x, y) =  sum over groups of  sum_k w_k (x_k - c(x)) (y_k - c(y))
 * </pre>
 * Numbers of one ensemble whose blocks differ (other cuts, other configuration lists) meet block label by block label: a
 * block that one of them lacks has the central value there, and shared blocks enter cov(x, y) with sqrt(w_k(x) w_k(y)).
 */
public final class SampledNumber {

    /** A function of several numbers with several results: reads {@code in}, writes every entry of {@code out}. Must be pure. */
    @FunctionalInterface
    public interface VectorFunction {
        void apply(double[] in, double[] out);
    }

    private final double central;
    private final SampleGroup[] groups;   // sorted by key
    private final int[] offsets;          // [group], start of its samples
    private final double[] samples;       // flat, group after group

    private SampledNumber(double central, SampleGroup[] groups, double[] samples) {
        this.central = central;
        this.groups = groups;
        this.samples = samples;
        this.offsets = new int[groups.length];
        int at = 0;
        for (int i = 0; i < groups.length; i++) {
            offsets[i] = at;
            at += groups[i].size();
        }
        if (at != samples.length) {
            throw new IllegalArgumentException("groups " + Arrays.toString(groups) + " need " + at + " samples; got " + samples.length);
        }
    }

    /** A number without uncertainty. */
    public static SampledNumber exact(double value) {
        return new SampledNumber(value, new SampleGroup[0], new double[0]);
    }

    /** A number that depends on one group. */
    public static SampledNumber of(double central, SampleGroup group, double[] samples) {
        return new SampledNumber(central, new SampleGroup[] {group}, samples.clone());
    }

    /** A constant with a standard error; its group is {@code input:<name>}. An error of zero gives an exact number. */
    public static SampledNumber input(String name, double value, double error) {
        if (!(error >= 0) || Double.isInfinite(error)) {
            throw new IllegalArgumentException("input " + name + " has error " + error + "; need a finite number, zero or more");
        }
        return error == 0 ? exact(value) : of(value, SampleGroup.input(name, 1), new double[] {value + error, value - error});
    }

    /**
     * Constants with a common covariance; all share the group {@code input:<name>}, two samples for each column of a factor.
     *
     * @param values     [i]
     * @param covariance [i][j] flat, symmetric, positive definite or semi-definite
     * @throws IllegalArgumentException if the covariance is not symmetric or indefinite
     */
    public static List<SampledNumber> inputs(String name, double[] values, double[] covariance) {
        InputFactor factor = InputFactor.of(name, covariance, values.length);
        List<SampledNumber> numbers = new ArrayList<>(values.length);
        for (int i = 0; i < values.length; i++) {
            double[] samples = new double[2 * factor.columns()];
            for (int j = 0; j < factor.columns(); j++) {
                samples[2 * j] = values[i] + factor.at(i, j);
                samples[2 * j + 1] = values[i] - factor.at(i, j);
            }
            numbers.add(samples.length == 0 ? exact(values[i]) : of(values[i], SampleGroup.input(name, factor.columns()), samples));
        }
        return Collections.unmodifiableList(numbers);
    }

    /** This number with one more group; the group must be new to it. */
    public SampledNumber withGroup(SampleGroup group, double[] groupSamples) {
        if (find(group.key()) >= 0) {
            throw new IllegalArgumentException("the number depends on " + group + " already");
        }
        return withReplaced(group, groupSamples);
    }

    /** This number with the samples of {@code group}, in place of those it had for the same key, if any. */
    public SampledNumber withReplaced(SampleGroup group, double[] groupSamples) {
        Map<String, SampleGroup> byKey = new TreeMap<>();
        for (SampleGroup g : groups) {
            byKey.put(g.key(), g);
        }
        byKey.put(group.key(), group);
        SampleGroup[] all = byKey.values().toArray(SampleGroup[]::new);
        double[][] parts = new double[all.length][];
        for (int i = 0; i < all.length; i++) {
            parts[i] = all[i] == group ? groupSamples : samples(all[i].key());
        }
        return new SampledNumber(central, all, joined(parts));
    }

    private static double[] joined(double[][] parts) {
        int total = 0;
        for (double[] part : parts) {
            total += part.length;
        }
        double[] all = new double[total];
        int at = 0;
        for (double[] part : parts) {
            System.arraycopy(part, 0, all, at, part.length);
            at += part.length;
        }
        return all;
    }

    /**
     * This number with the spread of alternatives as the group {@code choice:<name>}.
     *
     * @param probabilities [k], sum one
     * @param alternatives  [k], the number's value under each alternative
     */
    public SampledNumber withChoice(String name, double[] probabilities, double[] alternatives) {
        return withGroup(SampleGroup.choice(name, probabilities), alternatives);
    }

    /** This number plus a constant: central value and every sample move alike. */
    public SampledNumber shifted(double by) {
        double[] moved = samples.clone();
        for (int k = 0; k < moved.length; k++) {
            moved[k] += by;
        }
        return new SampledNumber(central + by, groups, moved);
    }

    /** f of several numbers, see the class comment. */
    public static SampledNumber evaluate(ToDoubleFunction<double[]> f, SampledNumber... arguments) {
        return evaluateAll(1, (in, out) -> out[0] = f.applyAsDouble(in), arguments).get(0);
    }

    /** Several functions of the same numbers at once (a fit, a linear solve), see the class comment. */
    public static List<SampledNumber> evaluateAll(int results, VectorFunction f, SampledNumber... arguments) {
        SampleGroup[] groups = union(arguments);
        int total = 0;
        for (SampleGroup g : groups) {
            total += g.size();
        }
        double[] in = new double[arguments.length];
        double[] out = new double[results];
        for (int i = 0; i < in.length; i++) {
            in[i] = arguments[i].central;
        }
        f.apply(in, out);
        double[] centrals = out.clone();
        double[][] samples = new double[results][total];
        int at = 0;
        for (SampleGroup g : groups) {
            evaluateGroup(g, f, arguments, samples, at);
            at += g.size();
        }
        List<SampledNumber> numbers = new ArrayList<>(results);
        for (int r = 0; r < results; r++) {
            numbers.add(new SampledNumber(centrals[r], groups, samples[r]));
        }
        return Collections.unmodifiableList(numbers);
    }

    private static SampleGroup[] union(SampledNumber[] arguments) {
        TreeMap<String, SampleGroup> union = new TreeMap<>();
        for (SampledNumber x : arguments) {
            for (SampleGroup g : x.groups) {
                union.merge(g.key(), g, SampleGroup::join);
            }
        }
        return union.values().toArray(SampleGroup[]::new);
    }

    /** f at every sample of one group, written to {@code samples[result][at..]}. */
    private static void evaluateGroup(SampleGroup g, VectorFunction f, SampledNumber[] arguments, double[][] samples, int at) {
        double[] in = new double[arguments.length];
        double[] out = new double[samples.length];
        double[][] columns = new double[in.length][];
        for (int i = 0; i < in.length; i++) {
            columns[i] = arguments[i].samplesOn(g);
            in[i] = arguments[i].central;
        }
        for (int k = 0; k < g.size(); k++) {
            for (int i = 0; i < in.length; i++) {
                in[i] = columns[i].length == 0 ? arguments[i].central : columns[i][k];
            }
            f.apply(in, out);
            for (int r = 0; r < out.length; r++) {
                samples[r][at + k] = out[r];
            }
        }
    }

    /** Samples on a group of the same key, moved there if the own group differs; empty if the number does not depend on it. */
    private double[] samplesOn(SampleGroup g) {
        int i = find(g.key());
        if (i < 0) {
            return new double[0];
        }
        double[] own = samples(g.key());
        return groups[i].equals(g) ? own : GroupUnion.moved(central, own, groups[i], g);
    }

    public SampledNumber plus(SampledNumber y) {
        return evaluate(v -> v[0] + v[1], this, y);
    }

    public SampledNumber minus(SampledNumber y) {
        return evaluate(v -> v[0] - v[1], this, y);
    }

    public SampledNumber times(SampledNumber y) {
        return evaluate(v -> v[0] * v[1], this, y);
    }

    public SampledNumber dividedBy(SampledNumber y) {
        return evaluate(v -> v[0] / v[1], this, y);
    }

    public SampledNumber times(double factor) {
        return evaluate(v -> v[0] * factor, this);
    }

    public double central() {
        return central;
    }

    /** Groups in the order of their keys. */
    public List<SampleGroup> groups() {
        return List.of(groups);
    }

    /** Copy of the samples of one group [k]; throws IllegalArgumentException if the number does not depend on it. */
    public double[] samples(String key) {
        int i = require(key);
        return Arrays.copyOfRange(samples, offsets[i], offsets[i] + groups[i].size());
    }

    private int require(String key) {
        int i = find(key);
        if (i < 0) {
            throw new IllegalArgumentException("the number does not depend on " + key + "; its groups are " + Arrays.toString(groups));
        }
        return i;
    }

    private int find(String key) {
        for (int i = 0; i < groups.length; i++) {
            if (groups[i].key().equals(key)) {
                return i;
            }
        }
        return -1;
    }

    /** Sum over groups of their variances. */
    public double variance() {
        return covariance(this, this);
    }

    /** Standard error, the root of {@link #variance()}. */
    public double error() {
        return Math.sqrt(variance());
    }

    /** Variance by group, in the order of the keys; the values sum to {@link #variance()}. */
    public Map<String, Double> varianceByGroup() {
        return covarianceByGroup(this, this);
    }

    /** Covariance of two numbers, from the groups that both depend on. */
    public static double covariance(SampledNumber x, SampledNumber y) {
        double sum = 0;
        for (double part : covarianceByGroup(x, y).values()) {
            sum += part;
        }
        return sum;
    }

    /** Covariance of two numbers by group, for the groups that both depend on, in the order of the keys. */
    public static Map<String, Double> covarianceByGroup(SampledNumber x, SampledNumber y) {
        Map<String, Double> parts = new LinkedHashMap<>();
        for (int i = 0; i < x.groups.length; i++) {
            int j = y.find(x.groups[i].key());
            if (j >= 0) {
                parts.put(x.groups[i].key(), covariance(x, i, y, j));
            }
        }
        return parts;
    }

    private static double covariance(SampledNumber x, int i, SampledNumber y, int j) {
        SampleGroup g = x.groups[i].join(y.groups[j]);
        double[] d = x.weightedDeviations(g);
        double[] e = x == y ? d : y.weightedDeviations(g);
        double sum = 0;
        for (int k = 0; k < d.length; k++) {
            sum += d[k] * e[k];
        }
        return sum;
    }

    /** sqrt(w_k) (x_k - c) on a group [k]. */
    private double[] weightedDeviations(SampleGroup g) {
        double[] d = samplesOn(g);
        double c = g.centre(central, d, 0, 1);
        for (int k = 0; k < d.length; k++) {
            d[k] = Math.sqrt(g.weight(k)) * (d[k] - c);
        }
        return d;
    }

    /**
     * Pseudo-values of one ensemble group, in Monte Carlo order: the number's own time series, one value per block,
     * P_k = (N/m_k) theta - (N/m_k - 1) theta_(k). From a bootstrap they are the central value plus the blocks' influences.
     *
     * @throws IllegalArgumentException if the number does not depend on that ensemble, or its draws are fewer than three per block
     */
    public double[] pseudoValues(String key) {
        SampleGroup g = groups[require(key)];
        return part(g).pseudoValues().orElseThrow(() -> new IllegalArgumentException("no pseudo-values of " + g + ": they need "
            + BlockInfluence.DRAWS_PER_BLOCK + " bootstrap draws for each of its " + g.labels().size() + " blocks"));
    }

    /** Samples on a group of the same key as one of this number's, block by block. */
    private EnsemblePart part(SampleGroup g) {
        return new EnsemblePart(g, central, samplesOn(g));
    }

    /**
     * Influence P_k - theta_J of each block of an ensemble on this number [block], in Monte Carlo order; their mean with the
     * blocks' sizes as weights is zero. Empty for a bootstrap with fewer than three draws per block.
     */
    public Optional<double[]> influence(String key) {
        return part(groups[require(key)]).influence();
    }

    /**
     * Integrated autocorrelation time of the pseudo-values of one ensemble group, in units of blocks (1/2: the blocks are
     * independent). Empty when the pseudo-values are not available or do not vary.
     */
    public Optional<IntegratedTime> integratedTime(String key) {
        List<BlockLabel> labels = groups[require(key)].labels();
        return influence(key).filter(a -> Arrays.stream(a).anyMatch(x -> x != a[0])).map(a -> IntegratedTime.measure(
            labels.stream().map(BlockLabel::stream).toList(), labels.stream().mapToLong(BlockLabel::index).toArray(), a));
    }

    /**
     * Correlation of neighbouring blocks of one ensemble group and what it does to the variance. Empty when no two blocks
     * are neighbours or a bootstrap has too few draws.
     */
    public Optional<NeighbourTerm> neighbourTerm(String ensembleKey) {
        return part(groups[require(ensembleKey)]).neighbourTerm();
    }

    /** The factor of {@link #neighbourTerm} for an ensemble group where it is available, otherwise one. */
    private double publishedFactor(SampleGroup g) {
        return g.isEnsemble() ? part(g).neighbourTerm().map(NeighbourTerm::factor).orElse(1.0) : 1.0;
    }

    /** {@link #varianceByGroup()} with the ensembles' parts multiplied by the factors of their neighbour terms. */
    public Map<String, Double> publishedVarianceByGroup() {
        Map<String, Double> parts = varianceByGroup();
        for (SampleGroup g : groups) {
            parts.merge(g.key(), publishedFactor(g), (variance, factor) -> variance * factor);
        }
        return parts;
    }

    /** Root of the sum of {@link #publishedVarianceByGroup()}. */
    public double publishedError() {
        double sum = 0;
        for (double part : publishedVarianceByGroup().values()) {
            sum += part;
        }
        return Math.sqrt(sum);
    }

    /**
     * Covariance to print beside published errors: each ensemble's part times the root of the product of the two numbers'
     * factors. Its diagonal is the square of {@link #publishedError()}; as correlations stay what they were, it is positive
     * semi-definite.
     */
    public static double publishedCovariance(SampledNumber x, SampledNumber y) {
        double sum = 0;
        for (int i = 0; i < x.groups.length; i++) {
            int j = y.find(x.groups[i].key());
            if (j >= 0) {
                sum += Math.sqrt(x.publishedFactor(x.groups[i]) * y.publishedFactor(y.groups[j])) * covariance(x, i, y, j);
            }
        }
        return sum;
    }

    /**
     * Covariance of two numbers from one ensemble with its neighbour term as a bilinear form,
     * sum_k d_k e_k + sum over pairs of (d_k e_(k+1) + d_(k+1) e_k): without floor or bias correction, and maybe indefinite.
     * Empty when a bootstrap has too few draws.
     */
    public static Optional<Double> laggedCovariance(SampledNumber x, SampledNumber y, String ensembleKey) {
        SampleGroup union = x.groups[x.require(ensembleKey)].join(y.groups[y.require(ensembleKey)]);
        return x.part(union).laggedCovariance(y.part(union));
    }

    @Override
    public String toString() {
        return central + " +- " + error();
    }
}
