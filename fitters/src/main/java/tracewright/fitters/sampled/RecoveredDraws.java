package tracewright.fitters.sampled;

/**
 * Multiplicities from shares, for bootstraps that come from a file: with u_bk = c_bk m_k / sum_j c_bj m_j the ratios u_bk/m_k
 * stand to each other as small whole numbers. A common factor of all multiplicities of a draw cannot be told and is taken as one.
 */
final class RecoveredDraws {

    /** No Poisson multiplicity of mean one exceeds this: the chance is 1e-19. */
    private static final int LARGEST = 20;

    /** Shares carry sixteen digits, ratios lose one of them. */
    private static final double WHOLE = 1e-12;

    private RecoveredDraws() {
    }

    /**
     * @param sizes  [block], m_k; read
     * @param shares [draw][block] flat, u_bk; read
     * @return [draw][block] flat; empty when some draw's shares are not those of whole multiplicities
     */
    static int[] multiplicities(int[] sizes, double[] shares) {
        int[] c = new int[shares.length];
        for (int at = 0; at < c.length; at += sizes.length) {
            if (!recover(sizes, shares, at, c)) {
                return new int[0];
            }
        }
        return c;
    }

    private static boolean recover(int[] sizes, double[] shares, int at, int[] c) {
        double smallest = Double.POSITIVE_INFINITY;
        for (int k = 0; k < sizes.length; k++) {
            double ratio = shares[at + k] / sizes[k];
            smallest = ratio > 0 ? Math.min(smallest, ratio) : smallest;
        }
        for (int least = 1; least <= LARGEST && smallest < Double.POSITIVE_INFINITY; least++) {
            if (isWhole(sizes, shares, at, least / smallest, c)) {
                return true;
            }
        }
        return false;
    }

    private static boolean isWhole(int[] sizes, double[] shares, int at, double scale, int[] c) {
        for (int k = 0; k < sizes.length; k++) {
            double value = shares[at + k] / sizes[k] * scale;
            c[at + k] = (int) Math.rint(value);
            if (!(Math.abs(value - c[at + k]) <= WHOLE * Math.max(1, value))) {
                return false;
            }
        }
        return true;
    }
}
