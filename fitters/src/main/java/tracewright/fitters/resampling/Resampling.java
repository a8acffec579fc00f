package tracewright.fitters.resampling;

import static java.util.Objects.requireNonNull;

import tracewright.fitters.sampled.SampleGroup;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.fitters.sampled.SampledVector;

/**
 * Turns values per configuration into means and functions of means with samples: a delete-one-block jackknife, or a block
 * bootstrap with Poisson multiplicities. Only block sums are kept between reading the values and making the samples.
 */
public final class Resampling {

    private final Blocking blocking;
    private final SampleGroup group;
    private final double[] multiplicities;   // [draw][block] flat; empty for a jackknife

    private Resampling(Blocking blocking, SampleGroup group, double[] multiplicities) {
        this.blocking = requireNonNull(blocking, "blocking");
        this.group = group;
        this.multiplicities = multiplicities;
    }

    /** Delete-one-block jackknife. */
    public static Resampling jackknife(String ensemble, Blocking b) {
        return new Resampling(b, SampleGroup.jackknife(ensemble, b.labels(), b.sizes(), b.length()), new double[0]);
    }

    /** Block bootstrap with the multiplicities of {@link Draws} and the weight of {@link SampleGroup#calibratedWeight}. */
    public static Resampling bootstrap(String ensemble, Blocking b, long seed, int draws) {
        int[] c = Draws.of(seed, ensemble).multiplicities(b.labels(), draws);
        return new Resampling(b, SampleGroup.bootstrapOf(ensemble, b.labels(), b.sizes(), b.length(), c), asDoubles(c));
    }

    private static double[] asDoubles(int[] c) {
        double[] out = new double[c.length];
        for (int i = 0; i < c.length; i++) {
            out[i] = c[i];
        }
        return out;
    }

    public SampleGroup group() {
        return group;
    }

    public Blocking blocking() {
        return blocking;
    }

    /**
     * Means over the surviving configurations.
     *
     * @param values [diskIndex][i] flat, every configuration on disk; those that were cut are not looked at
     * @param length entries per configuration
     */
    public SampledVector means(double[] values, int length) {
        double[] sums = ResamplingKernels.blockSums(values, length, blocking);
        return fromBlockSums(sums, length);
    }

    /**
     * Means from sums over blocks, for callers that add up configurations while they read them.
     *
     * @param sums [block][i] flat; read
     */
    public SampledVector fromBlockSums(double[] sums, int length) {
        requireSums(sums, length);
        double[] total = ResamplingKernels.total(sums, length, blocking.blocks());
        double[] central = new double[length];
        for (int i = 0; i < length; i++) {
            central[i] = total[i] / blocking.configurations();
        }
        return SampledVector.copyOf(group, central, samples(sums, total, length));
    }

    private double[] samples(double[] sums, double[] total, int length) {
        return multiplicities.length == 0 ? ResamplingKernels.jackknife(sums, total, length, blocking)
            : ResamplingKernels.bootstrap(sums, length, blocking, multiplicities);
    }

    private void requireSums(double[] sums, int length) {
        if (length < 1 || sums.length != blocking.blocks() * length) {
            throw new IllegalArgumentException(blocking.blocks() + " blocks of " + length + " entries need " + blocking.blocks() * length
                + " sums; got " + sums.length);
        }
    }

    /**
     * A function of the means, formed inside every sample.
     *
     * @param values     [diskIndex][i] flat
     * @param length     entries per configuration
     * @param outLength  results of f
     * @param f          takes a row of means
     * @param removeBias whether to take off the jackknife's estimate of the 1/N bias, from central row and samples alike; it
     *                   comes from delete-one-block means for a bootstrap too
     */
    public SampledVector derived(double[] values, int length, int outLength, SampledVector.RowFunction f, boolean removeBias) {
        double[] sums = ResamplingKernels.blockSums(values, length, blocking);
        SampledVector plain = fromBlockSums(sums, length).map(outLength, f);
        if (!removeBias) {
            return plain;
        }
        return multiplicities.length == 0 ? plain.biasCorrected() : plain.shiftedBy(bias(sums, length, plain, f), -1);
    }

    /** Jackknife estimate of the bias theta - theta_J [i]. */
    private double[] bias(double[] sums, int length, SampledVector plain, SampledVector.RowFunction f) {
        SampledVector deleted = jackknife(group.key(), blocking).fromBlockSums(sums, length).map(plain.length(), f);
        double[] corrected = deleted.biasCorrected().centralRow();
        double[] bias = plain.centralRow();
        for (int i = 0; i < bias.length; i++) {
            bias[i] -= corrected[i];
        }
        return bias;
    }

    /**
     * The number with its samples of this ensemble in this resampling's kind, to first order in the blocks' influences:
     * <pre>
     *   to a bootstrap   x_b = theta + sum_k u_bk (P_k - theta_J)
     *   to a jackknife   theta_(k) = theta - (P_k - theta_J) m_k/(N - m_k),   P_k - theta_J by least squares of x_b on u_bk
     * </pre>
     * A number of the same kind, or one that does not depend on this ensemble, comes back as it is.
     *
     * @throws IllegalArgumentException if its blocks are others, or it has fewer than three bootstrap draws per block
     */
    public SampledNumber convert(SampledNumber x) {
        return Conversion.convert(x, group);
    }
}
