package tracewright.fitters.sampled;

import static java.util.Objects.requireNonNull;

import java.util.Arrays;

/**
 * Several numbers of one ensemble with their samples: central[i] and samples[k][i], stored flat, immutable.
 * This is what correlators, ratios and fit parameters are before they become {@link SampledNumber}s.
 */
public final class SampledVector {

    /** A function of one row of numbers: reads {@code in}, writes every entry of {@code out}. Must be pure. */
    @FunctionalInterface
    public interface RowFunction {
        void apply(double[] in, double[] out);
    }

    private final SampleGroup group;
    private final int length;
    private final double[] central;   // [i]
    private final double[] samples;   // [k][i], k * length + i

    private SampledVector(SampleGroup group, double[] central, double[] samples) {
        this.group = requireNonNull(group, "group");
        this.length = central.length;
        this.central = central;
        this.samples = samples;
        if (samples.length != group.size() * length) {
            throw new IllegalArgumentException("group " + group + " needs " + group.size() + " x " + length + " samples; got " + samples.length);
        }
    }

    /**
     * Copies in.
     *
     * @param central [i]
     * @param samples [k][i] flat, one row per sample of the group
     */
    public static SampledVector copyOf(SampleGroup group, double[] central, double[] samples) {
        return new SampledVector(group, central.clone(), samples.clone());
    }

    public SampleGroup group() {
        return group;
    }

    public int length() {
        return length;
    }

    public int sampleCount() {
        return group.size();
    }

    public double central(int i) {
        return central[i];
    }

    public double sample(int k, int i) {
        return samples[k * length + i];
    }

    /** Copy of the central values [i]. */
    public double[] centralRow() {
        return central.clone();
    }

    /** Copy of sample row k [i]. */
    public double[] sampleRow(int k) {
        return Arrays.copyOfRange(samples, k * length, (k + 1) * length);
    }

    /** Entry i as a number that depends on this vector's group alone. */
    public SampledNumber number(int i) {
        double[] column = new double[group.size()];
        for (int k = 0; k < column.length; k++) {
            column[k] = samples[k * length + i];
        }
        return SampledNumber.of(central[i], group, column);
    }

    /** Entries at the given places, in that order. */
    public SampledVector select(int... indices) {
        return map(indices.length, (in, out) -> {
            for (int i = 0; i < indices.length; i++) {
                out[i] = in[indices[i]];
            }
        });
    }

    /** f applied to the central row and to every sample row. */
    public SampledVector map(int outLength, RowFunction f) {
        double[] outCentral = new double[outLength];
        double[] outSamples = new double[group.size() * outLength];
        f.apply(central.clone(), outCentral);
        double[] in = new double[length];
        double[] out = new double[outLength];
        for (int k = 0; k < group.size(); k++) {
            System.arraycopy(samples, k * length, in, 0, length);
            f.apply(in, out);
            System.arraycopy(out, 0, outSamples, k * outLength, outLength);
        }
        return new SampledVector(group, outCentral, outSamples);
    }

    /**
     * This vector with the jackknife's estimate of the 1/N bias taken off central row and samples alike, so that the central
     * row becomes theta_J = g theta - sum_k (1 - p_k) theta_(k); Quenouille, Biometrika 43 (1956) 353, for blocks of unequal
     * size as in {@link SampleGroup#jackknife}.
     *
     * @throws IllegalArgumentException unless the group is a jackknife
     */
    public SampledVector biasCorrected() {
        if (group.kind() != SampleGroup.Kind.JACKKNIFE) {
            throw new IllegalArgumentException("only delete-one-block samples give a bias estimate; these are of " + group);
        }
        double[] bias = new double[length];
        for (int k = 0; k < group.size(); k++) {
            double c = 1 - group.blockSize(k) / (double) group.configurations();
            for (int i = 0; i < length; i++) {
                bias[i] += c * (samples[k * length + i] - central[i]);
            }
        }
        return shiftedBy(bias, -1);
    }

    /** Central row and every sample row plus {@code factor} times {@code shift} [i]. */
    public SampledVector shiftedBy(double[] shift, double factor) {
        double[] c = central.clone();
        double[] s = samples.clone();
        for (int i = 0; i < length; i++) {
            c[i] += factor * shift[i];
        }
        for (int k = 0; k < group.size(); k++) {
            for (int i = 0; i < length; i++) {
                s[k * length + i] += factor * shift[i];
            }
        }
        return new SampledVector(group, c, s);
    }

    /** This vector's entries followed by {@code other}'s; both must have equal groups. */
    public SampledVector concat(SampledVector other) {
        if (!group.equals(other.group)) {
            throw new IllegalArgumentException("cannot join numbers of " + group + " with numbers of " + other.group);
        }
        int joined = length + other.length;
        double[] c = Arrays.copyOf(central, joined);
        System.arraycopy(other.central, 0, c, length, other.length);
        double[] s = new double[group.size() * joined];
        for (int k = 0; k < group.size(); k++) {
            System.arraycopy(samples, k * length, s, k * joined, length);
            System.arraycopy(other.samples, k * other.length, s, k * joined + length, other.length);
        }
        return new SampledVector(group, c, s);
    }

    /** Covariance of the entries, [i][j] flat, from the group's weights and centres: S_ij = sum_k w_k d_ki d_kj. */
    public double[] covariance() {
        double[] d = deviations();
        double[] s = new double[length * length];
        for (int k = 0; k < group.size(); k++) {
            double w = group.weight(k);
            for (int i = 0; i < length; i++) {
                double wd = w * d[k * length + i];
                int row = i * length;
                int dev = k * length;
                for (int j = 0; j <= i; j++) {
                    s[row + j] += wd * d[dev + j];
                }
            }
        }
        for (int i = 0; i < length; i++) {
            for (int j = 0; j < i; j++) {
                s[j * length + i] = s[i * length + j];
            }
        }
        return s;
    }

    /** Standard errors [i], the roots of the covariance's diagonal. */
    public double[] errors() {
        double[] d = deviations();
        double[] e = new double[length];
        for (int k = 0; k < group.size(); k++) {
            for (int i = 0; i < length; i++) {
                double x = d[k * length + i];
                e[i] += group.weight(k) * x * x;
            }
        }
        for (int i = 0; i < length; i++) {
            e[i] = Math.sqrt(e[i]);
        }
        return e;
    }

    /** Deviations of the samples from their centres, [k][i] flat. */
    public double[] deviations() {
        double[] d = samples.clone();
        for (int i = 0; i < length; i++) {
            double c = group.centre(central[i], samples, i, length);
            for (int k = 0; k < group.size(); k++) {
                d[k * length + i] -= c;
            }
        }
        return d;
    }
}
