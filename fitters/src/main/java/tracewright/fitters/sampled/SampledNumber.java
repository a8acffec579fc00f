package tracewright.fitters.sampled;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.Collections;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.TreeMap;
import java.util.function.ToDoubleFunction;

/**
 * A measured or derived number: a central value and, for each independent cause of uncertainty that it depends on, that
 * cause's samples. Immutable; samples are stored flat, groups in the order of their keys.
 * <pre>
 *   f(x, y):     group by group over the union, with that group's sample of each argument and the central value of the others
 *   cov(x, y) =  sum over groups of  sum_k w_k (x_k - c(x)) (y_k - c(y))
 * </pre>
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

    /** This number with one more group; the group must be new to it. */
    public SampledNumber withGroup(SampleGroup group, double[] groupSamples) {
        Map<String, SampleGroup> byKey = new TreeMap<>();
        for (SampleGroup g : groups) {
            byKey.put(g.key(), g);
        }
        if (byKey.put(group.key(), group) != null) {
            throw new IllegalArgumentException("the number depends on " + group + " already");
        }
        SampleGroup[] all = byKey.values().toArray(SampleGroup[]::new);
        double[] joined = new double[samples.length + groupSamples.length];
        int at = 0;
        for (SampleGroup g : all) {
            double[] part = g == group ? groupSamples : samples(g.key());
            System.arraycopy(part, 0, joined, at, part.length);
            at += part.length;
        }
        return new SampledNumber(central, all, joined);
    }

    /** f of several numbers, see the class comment. */
    public static SampledNumber evaluate(ToDoubleFunction<double[]> f, SampledNumber... arguments) {
        return evaluateAll(1, (in, out) -> out[0] = f.applyAsDouble(in), arguments).get(0);
    }

    /** Several functions of the same numbers at once (a fit, a linear solve), see the class comment. */
    public static List<SampledNumber> evaluateAll(int results, VectorFunction f, SampledNumber... arguments) {
        TreeMap<String, SampleGroup> union = new TreeMap<>();
        for (SampledNumber x : arguments) {
            for (SampleGroup g : x.groups) {
                SampleGroup known = union.putIfAbsent(g.key(), g);
                if (known != null && !known.equals(g)) {
                    throw new IllegalArgumentException("numbers with different samples of " + g.key() + " meet: " + known + " and " + g);
                }
            }
        }
        SampleGroup[] groups = union.values().toArray(SampleGroup[]::new);
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
            int[] places = new int[in.length];
            for (int i = 0; i < in.length; i++) {
                places[i] = arguments[i].offset(g.key());
            }
            for (int k = 0; k < g.size(); k++, at++) {
                for (int i = 0; i < in.length; i++) {
                    in[i] = places[i] < 0 ? arguments[i].central : arguments[i].samples[places[i] + k];
                }
                f.apply(in, out);
                for (int r = 0; r < results; r++) {
                    samples[r][at] = out[r];
                }
            }
        }
        List<SampledNumber> numbers = new ArrayList<>(results);
        for (int r = 0; r < results; r++) {
            numbers.add(new SampledNumber(centrals[r], groups, samples[r]));
        }
        return Collections.unmodifiableList(numbers);
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
        for (int i = 0; i < groups.length; i++) {
            if (groups[i].key().equals(key)) {
                return Arrays.copyOfRange(samples, offsets[i], offsets[i] + groups[i].size());
            }
        }
        throw new IllegalArgumentException("the number does not depend on " + key + "; its groups are " + Arrays.toString(groups));
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
        Map<String, Double> parts = new LinkedHashMap<>();
        for (int i = 0; i < groups.length; i++) {
            parts.put(groups[i].key(), covariance(this, i, this, i));
        }
        return parts;
    }

    /** Covariance of two numbers, from the groups that both depend on. */
    public static double covariance(SampledNumber x, SampledNumber y) {
        double sum = 0;
        for (int i = 0; i < x.groups.length; i++) {
            for (int j = 0; j < y.groups.length; j++) {
                if (x.groups[i].key().equals(y.groups[j].key())) {
                    sum += covariance(x, i, y, j);
                }
            }
        }
        return sum;
    }

    private static double covariance(SampledNumber x, int i, SampledNumber y, int j) {
        SampleGroup g = x.groups[i];
        if (!g.equals(y.groups[j])) {
            throw new IllegalArgumentException("numbers with different samples of " + g.key() + " meet: " + g + " and " + y.groups[j]);
        }
        double cx = g.centre(x.central, x.samples, x.offsets[i], 1);
        double cy = g.centre(y.central, y.samples, y.offsets[j], 1);
        double sum = 0;
        for (int k = 0; k < g.size(); k++) {
            sum += g.weight(k) * (x.samples[x.offsets[i] + k] - cx) * (y.samples[y.offsets[j] + k] - cy);
        }
        return sum;
    }

    private int offset(String key) {
        for (int i = 0; i < groups.length; i++) {
            if (groups[i].key().equals(key)) {
                return offsets[i];
            }
        }
        return -1;
    }

    @Override
    public String toString() {
        return central + " +- " + error();
    }
}
