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
        /** Alternatives with probabilities p_k: w_k = p_k, c = sum_k p_k x_k; a single variation: w = 1, c = central value. */
        CHOICE,
        /** Columns of a factor of an added covariance: w = 1, c = central value. */
        FIT_NOISE
    }

    private final Kind kind;
    private final String key;
    private final double[] weights;         // [k]
    private final double[] centre;          // [k], coefficients of the centre; empty: the centre is the central value
    private final Blocks blocks;            // empty unless an ensemble group
    private final Draws draws;              // empty unless a bootstrap
    private volatile double[] influence;    // [block][draw], see influence(); computed once, always to the same bits

    /** Blocks of an ensemble: labels and sizes [block], length in trajectories or 0 when it is not known. */
    private record Blocks(List<BlockLabel> labels, int[] sizes, long length) {
        static final Blocks NONE = new Blocks(List.of(), new int[0], 0);
    }

    /** What a bootstrap drew: shares u_bk [draw][block]; multiplicities c_bk alike, empty when only the shares are known. */
    private record Draws(double[] shares, int[] multiplicities) {
        static final Draws NONE = new Draws(new double[0], new int[0]);
    }

    private SampleGroup(Kind kind, String key, double[] weights, double[] centre, Blocks blocks, Draws draws) {
        this.kind = requireNonNull(kind, "kind");
        this.key = requireNonNull(key, "key");
        this.weights = weights;
        this.centre = centre;
        this.blocks = blocks;
        this.draws = draws;
    }

    /** Jackknife over blocks whose length in trajectories is not known; see {@link #jackknife(String, List, int[], long)}. */
    public static SampleGroup jackknife(String ensemble, List<BlockLabel> labels, int[] sizes) {
        return jackknife(ensemble, labels, sizes, 0);
    }

    /**
     * Jackknife over blocks of unequal size; Busing, Meijer, van der Leeden, Statistics and Computing 9 (1999) 3, in the
     * weight form that makes the variance of a mean of independent data unbiased.
     *
     * @param ensemble    name of the ensemble, which is the group's key
     * @param labels      [block], in Monte Carlo order
     * @param sizes       [block], configurations m_k per block, each positive
     * @param blockLength trajectories per cell of the grid that the labels count; 0 when not known
     * @throws IllegalArgumentException if there are fewer than two blocks or one holds more than half of all configurations
     */
    public static SampleGroup jackknife(String ensemble, List<BlockLabel> labels, int[] sizes, long blockLength) {
        Blocks blocks = blocks(ensemble, labels, sizes, blockLength);
        int g = sizes.length;
        long total = IntStream.of(sizes).asLongStream().sum();
        double[] w = new double[g];
        double[] c = new double[g];
        for (int k = 0; k < g; k++) {
            if (2L * sizes[k] > total) {
                throw new IllegalArgumentException("block " + labels.get(k) + " of " + ensemble + " holds " + sizes[k] + " of " + total
                    + " configurations; a jackknife needs every block between one configuration and half of all");
            }
            w[k] = (double) (total - sizes[k]) / ((double) g * sizes[k]);
            c[k] = (1 - sizes[k] / (double) total) / (g - 1);
        }
        return new SampleGroup(Kind.JACKKNIFE, ensemble, w, c, blocks, Draws.NONE);
    }

    /**
     * Block bootstrap of one ensemble with one weight for all draws, as read from a file: multiplicities are recovered from the
     * shares. {@link #bootstrapOf} makes one from the multiplicities themselves.
     *
     * @param weight the calibrated weight of a draw (1/(draws - 1) for the plain estimator)
     * @param shares [draw][block] flat, the share u_bk of each block in each draw's mean; each row sums to one
     */
    public static SampleGroup bootstrap(String ensemble, List<BlockLabel> labels, int[] sizes, double weight, double[] shares) {
        return bootstrap(ensemble, labels, sizes, 0, weight, shares);
    }

    /**
     * Block bootstrap as read from a file, with its block length.
     *
     * @param blockLength as for the jackknife
     * @param weight      the weight of a draw
     * @param shares      [draw][block] flat
     */
    public static SampleGroup bootstrap(String ensemble, List<BlockLabel> labels, int[] sizes, long blockLength, double weight, double[] shares) {
        Blocks blocks = blocks(ensemble, labels, sizes, blockLength);
        requireRows(ensemble, sizes.length, shares.length);
        return bootstrap(ensemble, blocks, weight, new Draws(shares.clone(), RecoveredDraws.multiplicities(sizes, shares)));
    }

    /**
     * Block bootstrap from the multiplicities that were drawn, with the calibrated weight of {@link #calibratedWeight}.
     *
     * @param blockLength    as for the jackknife
     * @param multiplicities [draw][block] flat, c_bk; no row may be all zero
     */
    public static SampleGroup bootstrapOf(String ensemble, List<BlockLabel> labels, int[] sizes, long blockLength, int[] multiplicities) {
        Blocks blocks = blocks(ensemble, labels, sizes, blockLength);
        requireRows(ensemble, sizes.length, multiplicities.length);
        double[] shares = shares(ensemble, sizes, multiplicities);
        return bootstrap(ensemble, blocks, calibratedWeight(sizes, shares), new Draws(shares, multiplicities.clone()));
    }

    private static SampleGroup bootstrap(String ensemble, Blocks blocks, double weight, Draws drawn) {
        int draws = drawn.shares.length / blocks.sizes.length;
        return new SampleGroup(Kind.BOOTSTRAP, ensemble, filled(draws, weight), filled(draws, 1.0 / draws), blocks, drawn);
    }

    private static void requireRows(String ensemble, int blocks, int entries) {
        if (entries % blocks != 0 || entries / blocks < 2) {
            throw new IllegalArgumentException("a bootstrap of " + ensemble + " with " + blocks + " blocks needs two draws or more with one entry"
                + " for each; got " + entries + " entries");
        }
    }

    private static Blocks blocks(String ensemble, List<BlockLabel> labels, int[] sizes, long length) {
        if (sizes.length < 2 || labels.size() != sizes.length) {
            throw new IllegalArgumentException("resampling " + ensemble + " needs two blocks or more, one label each; got "
                + sizes.length + " sizes and " + labels.size() + " labels");
        }
        for (int k = 0; k < sizes.length; k++) {
            if (sizes[k] < 1) {
                throw new IllegalArgumentException("block " + labels.get(k) + " of " + ensemble + " holds " + sizes[k] + " configurations");
            }
            if (k > 0 && labels.get(k - 1).compareTo(labels.get(k)) >= 0) {
                throw new IllegalArgumentException("blocks of " + ensemble + " are not in Monte Carlo order, each once: "
                    + labels.get(k - 1) + " before " + labels.get(k));
            }
        }
        return new Blocks(List.copyOf(labels), sizes.clone(), length);
    }

    private static double[] shares(String ensemble, int[] sizes, int[] multiplicities) {
        int g = sizes.length;
        double[] u = new double[multiplicities.length];
        for (int at = 0; at + g <= u.length; at += g) {
            long drawn = 0;
            for (int k = 0; k < g; k++) {
                drawn += (long) multiplicities[at + k] * sizes[k];
            }
            if (drawn < 1) {
                throw new IllegalArgumentException("draw " + at / g + " of " + ensemble + " holds no configuration");
            }
            for (int k = 0; k < g; k++) {
                u[at + k] = (double) ((long) multiplicities[at + k] * sizes[k]) / drawn;
            }
        }
        return u;
    }

    /**
     * Weight of a bootstrap draw that makes the variance of a mean of independent data unbiased for the draws at hand,
     * <pre>
     *   w = (1/N) / sum_b sum_k (u_bk - ubar_k)^2 / m_k,     ubar_k = mean of u_bk over the draws
     * </pre>
     * since such a mean has samples sum_k u_bk ybar_k and var(ybar_k) = s^2/m_k. Replaces 1/(draws - 1).
     *
     * @param sizes  [block], configurations m_k
     * @param shares [draw][block] flat, u_bk
     */
    public static double calibratedWeight(int[] sizes, double[] shares) {
        int g = sizes.length;
        int draws = shares.length / g;
        double spread = 0;
        for (int k = 0; k < g; k++) {
            double mean = 0;
            for (int b = 0; b < draws; b++) {
                mean += shares[b * g + k];
            }
            mean /= draws;
            double squares = 0;
            for (int b = 0; b < draws; b++) {
                double d = shares[b * g + k] - mean;
                squares += d * d;
            }
            spread += squares / sizes[k];
        }
        return 1.0 / (IntStream.of(sizes).asLongStream().sum() * spread);
    }

    /** Constants with errors that vary along {@code columns} independent directions; key {@code input:<name>}. */
    public static SampleGroup input(String name, int columns) {
        return centred(Kind.INPUT, "input:" + name, filled(2 * columns, 0.5));
    }

    /** Alternatives with probabilities that sum to one; key {@code choice:<name>}. */
    public static SampleGroup choice(String name, double[] probabilities) {
        double sum = 0;
        for (double p : probabilities) {
            sum += p;
        }
        if (!(Math.abs(sum - 1) <= 1e-9)) {
            throw new IllegalArgumentException("probabilities of choice " + name + " sum to " + sum + ", not to one");
        }
        return new SampleGroup(Kind.CHOICE, "choice:" + name, probabilities.clone(), probabilities.clone(), Blocks.NONE, Draws.NONE);
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
        return new SampleGroup(kind, key, weights, new double[0], Blocks.NONE, Draws.NONE);
    }

    /** This group with the central value as the centre; what {@link #join} makes of jackknives. */
    public SampleGroup aboutCentral() {
        return new SampleGroup(kind, key, weights, new double[0], blocks, draws);
    }

    /** Whether the centre is the central value itself. */
    public boolean isAboutCentral() {
        return centre.length == 0;
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
        return blocks.labels;
    }

    /** Configurations in block {@code block}. */
    public int blockSize(int block) {
        return blocks.sizes[block];
    }

    /** Copy of the configurations per block [block]. */
    public int[] blockSizes() {
        return blocks.sizes.clone();
    }

    /** Configurations in all blocks, N. */
    public long configurations() {
        return IntStream.of(blocks.sizes).asLongStream().sum();
    }

    /** Trajectories per cell of the grid that the labels count; 0 when not known. */
    public long blockLength() {
        return blocks.length;
    }

    /** Share u_bk of block {@code block} in the mean of bootstrap draw {@code draw}. */
    public double share(int draw, int block) {
        if (!hasShares()) {
            throw new IllegalStateException(this + " knows no shares of its blocks");
        }
        return draws.shares[draw * blocks.sizes.length + block];
    }

    /** Whether {@link #share} can be asked: a bootstrap, unless joined from groups whose multiplicities are not known. */
    public boolean hasShares() {
        return draws.shares.length > 0;
    }

    /** Multiplicities c_bk, [draw][block] flat; empty when they are not known, or for another kind. */
    public int[] multiplicities() {
        return draws.multiplicities.clone();
    }

    /**
     * The group on which numbers of two block sets of one ensemble meet: union of the labels, for each the larger size.
     * Jackknives meet about the central value, so that a block absent from one of them has deviation zero there;
     * bootstraps meet draw by draw. Groups of any other kind must be equal.
     *
     * @throws IllegalArgumentException if the two are not resamplings of one kind, on one grid, with equally many draws
     */
    SampleGroup join(SampleGroup other) {
        return equals(other) ? this : GroupUnion.of(this, other);
    }

    /** Bootstrap on the union of the blocks of two; without shares if {@code multiplicities} are not known. */
    static SampleGroup joinedBootstrap(SampleGroup a, SampleGroup b, List<BlockLabel> labels, int[] sizes, long length, int[] multiplicities) {
        if (multiplicities.length > 0) {
            return bootstrapOf(a.key, labels, sizes, length, multiplicities);
        }
        double weight = Math.sqrt(a.weights[0] * b.weights[0]);
        return new SampleGroup(Kind.BOOTSTRAP, a.key, filled(a.size(), weight), a.centre, new Blocks(labels, sizes, length), Draws.NONE);
    }

    /**
     * Operator [block][draw] flat that turns bootstrap deviations into block influences, see {@link BlockInfluence}; empty
     * when the draws do not determine it.
     */
    double[] influence() {
        double[] known = influence;
        if (known == null) {
            known = BlockInfluence.operator(draws.shares, size(), blocks.sizes);
            influence = known;
        }
        return known;
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

    /** Same cause, same samples: equal key, kind, weights, centre, labels, block sizes, block length and shares. */
    @Override
    public boolean equals(Object o) {
        return o == this || o instanceof SampleGroup g && key.equals(g.key) && kind == g.kind && Arrays.equals(weights, g.weights)
            && Arrays.equals(centre, g.centre) && blocks.length == g.blocks.length && Arrays.equals(blocks.sizes, g.blocks.sizes)
            && blocks.labels.equals(g.blocks.labels) && Arrays.equals(draws.shares, g.draws.shares);
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
