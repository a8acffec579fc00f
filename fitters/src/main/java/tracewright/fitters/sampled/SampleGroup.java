package tracewright.fitters.sampled;

import static java.util.Objects.requireNonNull;

import java.util.Arrays;
import java.util.List;
import java.util.stream.IntStream;

/**
 * One independent cause of uncertainty, and the estimator that turns a number's samples into a variance:
 * <pre>
 *   cov(x, y) = sum_k w_k (x_k - c(x)) (y_k - c(y))
 * </pre>
 * with weights w_k and centre c as in the table of the kinds below. A group holds no number's samples; it says how many
 * there are and how they are combined. Groups with equal keys are the same cause.
 */
public final class SampleGroup implements Comparable<SampleGroup> {

    /** How the samples of a group came about, hence their weight and centre. */
    public enum Kind {
        /** Delete-a-block jackknife of one ensemble: w_k = (N - m_k)/(g m_k), c = sum_k (1 - p_k) x_k / (g - 1). */
        JACKKNIFE,
        /** Block bootstrap of one ensemble: one common weight, c = mean of the samples. */
        BOOTSTRAP,
        /** Constants with errors: samples at +1 and -1 along each column of a Cholesky factor, w = 1/2, c = central. */
        INPUT,
        /** Alternatives with probabilities p_k: w_k = p_k, c = central value. */
        CHOICE,
        /** Columns of a factor of an added covariance: w = 1, c = central value. */
        FIT_NOISE
    }

    private final Kind kind;
    private final String key;
    private final double[] weights;         // [k]
    private final double[] centre;          // [k], coefficients of the centre; empty: the centre is the central value
    private final List<BlockLabel> labels;  // [block], empty unless an ensemble group
    private final int[] sizes;              // [block], configurations in each block, empty unless an ensemble group
    private final double[] shares;          // [draw][block] u_bk of a bootstrap, empty otherwise

    private SampleGroup(Kind kind, String key, double[] weights, double[] centre, List<BlockLabel> labels, int[] sizes, double[] shares) {
        this.kind = requireNonNull(kind, "kind");
        this.key = requireNonNull(key, "key");
        this.weights = weights;
        this.centre = centre;
        this.labels = List.copyOf(labels);
        this.sizes = sizes;
        this.shares = shares;
    }

    /**
     * Jackknife over blocks of unequal size; Busing, Meijer, van der Leeden, Statistics and Computing 9 (1999) 3, in the
     * weight form that makes the variance of a mean of independent data unbiased.
     *
     * @param ensemble name of the ensemble, which is the group's key
     * @param labels   [block], in Monte Carlo order
     * @param sizes    [block], configurations m_k per block, each positive
     * @throws IllegalArgumentException if there are fewer than two blocks or one holds more than half of all configurations
     */
    public static SampleGroup jackknife(String ensemble, List<BlockLabel> labels, int[] sizes) {
        int g = sizes.length;
        if (g < 2 || labels.size() != g) {
            throw new IllegalArgumentException("a jackknife of " + ensemble + " needs two blocks or more, one label each; got "
                + g + " sizes and " + labels.size() + " labels");
        }
        long total = IntStream.of(sizes).asLongStream().sum();
        double[] w = new double[g];
        double[] c = new double[g];
        for (int k = 0; k < g; k++) {
            if (sizes[k] < 1 || 2L * sizes[k] > total) {
                throw new IllegalArgumentException("block " + labels.get(k) + " of " + ensemble + " holds " + sizes[k] + " of " + total
                    + " configurations; a jackknife needs every block between one configuration and half of all");
            }
            w[k] = (double) (total - sizes[k]) / ((double) g * sizes[k]);
            c[k] = (1 - sizes[k] / (double) total) / (g - 1);
        }
        return new SampleGroup(Kind.JACKKNIFE, ensemble, w, c, labels, sizes.clone(), new double[0]);
    }

    /**
     * Block bootstrap of one ensemble with one weight for all draws.
     *
     * @param weight the calibrated weight of a draw (1/(draws - 1) for the plain estimator)
     * @param shares [draw][block] flat, the share u_bk of each block in each draw's mean; each row sums to one
     */
    public static SampleGroup bootstrap(String ensemble, List<BlockLabel> labels, int[] sizes, double weight, double[] shares) {
        int blocks = sizes.length;
        if (blocks < 2 || labels.size() != blocks || shares.length % blocks != 0 || shares.length / blocks < 2) {
            throw new IllegalArgumentException("a bootstrap of " + ensemble + " needs two blocks and two draws or more; got " + blocks
                + " blocks and " + shares.length + " shares");
        }
        int draws = shares.length / blocks;
        double[] w = new double[draws];
        double[] c = new double[draws];
        Arrays.fill(w, weight);
        Arrays.fill(c, 1.0 / draws);
        return new SampleGroup(Kind.BOOTSTRAP, ensemble, w, c, labels, sizes.clone(), shares.clone());
    }

    /** Constants with errors that vary along {@code columns} independent directions; key {@code input:<name>}. */
    public static SampleGroup input(String name, int columns) {
        return centred(Kind.INPUT, "input:" + name, filled(2 * columns, 0.5));
    }

    /** Alternatives with probabilities that sum to one; key {@code choice:<name>}. */
    public static SampleGroup choice(String name, double[] probabilities) {
        return centred(Kind.CHOICE, "choice:" + name, probabilities.clone());
    }

    /** One alternative whose distance from the central value is the error; key {@code choice:<name>}. */
    public static SampleGroup variation(String name) {
        return centred(Kind.CHOICE, "choice:" + name, new double[] {1});
    }

    /** Added covariance given by the columns of a factor; key {@code fit:<name>}. */
    public static SampleGroup fitNoise(String name, int columns) {
        return centred(Kind.FIT_NOISE, "fit:" + name, filled(columns, 1));
    }

    private static SampleGroup centred(Kind kind, String key, double[] weights) {
        if (weights.length == 0) {
            throw new IllegalArgumentException("group " + key + " has no sample");
        }
        return new SampleGroup(kind, key, weights, new double[0], List.of(), new int[0], new double[0]);
    }

    private static double[] filled(int n, double value) {
        double[] a = new double[n];
        Arrays.fill(a, value);
        return a;
    }

    public Kind kind() {
        return kind;
    }

    /** The group's name in variance tables: the ensemble, {@code input:x}, {@code choice:x} or {@code fit:x}. */
    public String key() {
        return key;
    }

    /** Number of samples. */
    public int size() {
        return weights.length;
    }

    public double weight(int sample) {
        return weights[sample];
    }

    /** Whether this is the gauge noise of an ensemble. */
    public boolean isEnsemble() {
        return kind == Kind.JACKKNIFE || kind == Kind.BOOTSTRAP;
    }

    /** Blocks in Monte Carlo order; empty unless {@link #isEnsemble()}. */
    public List<BlockLabel> labels() {
        return labels;
    }

    /** Configurations in block {@code block}. */
    public int blockSize(int block) {
        return sizes[block];
    }

    /** Share u_bk of block {@code block} in the mean of bootstrap draw {@code draw}. */
    public double share(int draw, int block) {
        return shares[draw * sizes.length + block];
    }

    /**
     * Centre c(x) of a number's samples.
     *
     * @param samples flat array holding the number's samples at {@code offset + k * stride}; read
     */
    public double centre(double central, double[] samples, int offset, int stride) {
        if (centre.length == 0) {
            return central;
        }
        double sum = 0;
        for (int k = 0; k < centre.length; k++) {
            sum += centre[k] * (samples[offset + k * stride] - central);
        }
        return central + sum;
    }

    @Override
    public int compareTo(SampleGroup other) {
        return key.compareTo(other.key);
    }

    /** Same cause, same samples: equal key, kind, weights, labels and block sizes. */
    @Override
    public boolean equals(Object o) {
        return o == this || o instanceof SampleGroup g && key.equals(g.key) && kind == g.kind && labels.equals(g.labels)
            && Arrays.equals(sizes, g.sizes) && Arrays.equals(weights, g.weights);
    }

    @Override
    public int hashCode() {
        return key.hashCode();
    }

    @Override
    public String toString() {
        return key + " (" + kind + ", " + size() + " samples)";
    }
}
