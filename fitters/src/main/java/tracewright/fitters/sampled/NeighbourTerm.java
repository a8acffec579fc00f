package tracewright.fitters.sampled;

import static java.util.Objects.requireNonNull;

import java.util.List;

/**
 * What the correlation of neighbouring blocks says about a number's ensemble group. With d_k = sqrt(w_k) (x_k - c), g blocks
 * and the pairs (k, k+1) that are adjacent on the grid of one stream,
 * <pre>
 *   rho1 = (sum over pairs of d_k d_(k+1)) / (sum_k d_k^2) x g/pairs + 1/g        factor = max(1, 1 + 2 rho1)
 * </pre>
 * where 1/g undoes the bias from subtracting the mean. The variance of the group times {@code factor} is what a published
 * error contains, whatever the verdict: a factor that is noise is small, and without the floor at one it would undercover.
 *
 * @param rho1    correlation of neighbouring blocks
 * @param factor  of the variance, one or more
 * @param verdict whether the blocks were long enough for this number
 */
public record NeighbourTerm(double rho1, double factor, Verdict verdict) {

    /** Whether blocks were long enough. */
    public enum Verdict {
        /** Correlation of neighbours below 0.1 or compatible with zero, that is, below 1/sqrt(g). */
        LONG,
        /** Neighbours correlate; the factor repairs the error. */
        SHORT,
        /** Correlation of neighbours above 0.4: more than neighbours correlate, choose longer blocks. */
        USELESS
    }

    private static final double NEGLIGIBLE = 0.1;
    private static final double HOPELESS = 0.4;

    public NeighbourTerm {
        requireNonNull(verdict, "verdict");
    }

    private static NeighbourTerm of(double rho1, int blocks) {
        Verdict verdict = rho1 < Math.max(NEGLIGIBLE, 1 / Math.sqrt(blocks)) ? Verdict.LONG : rho1 > HOPELESS ? Verdict.USELESS : Verdict.SHORT;
        return new NeighbourTerm(rho1, Math.max(1, 1 + 2 * rho1), verdict);
    }

    /**
     * From weighted deviations; there must be one pair at least.
     *
     * @param d [block], sqrt(w_k) (x_k - c); read
     */
    static NeighbourTerm of(List<BlockLabel> labels, double[] d) {
        double squares = 0;
        for (double x : d) {
            squares += x * x;
        }
        double rho1 = squares == 0 ? 0 : lagged(labels, d, d) / squares * d.length / pairs(labels) + 1.0 / d.length;
        return of(rho1, d.length);
    }

    /** Sum over adjacent pairs of d_k e_(k+1). */
    static double lagged(List<BlockLabel> labels, double[] d, double[] e) {
        double sum = 0;
        for (int k = 0; k + 1 < d.length; k++) {
            if (adjacent(labels, k)) {
                sum += d[k] * e[k + 1];
            }
        }
        return sum;
    }

    /** Number of adjacent pairs. */
    static int pairs(List<BlockLabel> labels) {
        int pairs = 0;
        for (int k = 0; k + 1 < labels.size(); k++) {
            pairs += adjacent(labels, k) ? 1 : 0;
        }
        return pairs;
    }

    private static boolean adjacent(List<BlockLabel> labels, int k) {
        BlockLabel a = labels.get(k);
        BlockLabel b = labels.get(k + 1);
        return a.stream().equals(b.stream()) && b.index() == a.index() + 1;
    }
}
