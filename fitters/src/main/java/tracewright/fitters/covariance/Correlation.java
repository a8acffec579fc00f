package tracewright.fitters.covariance;

/** Correlation matrix R estimated from blocks, and the deviations of those blocks where they are known. */
public final class Correlation {

    private final int points;
    private final double[] r;        // [i][j]
    private final double[] blocks;   // [k][i], any scale per point; empty when not known

    private Correlation(int points, double[] r, double[] blocks) {
        this.points = points;
        this.r = r;
        this.blocks = blocks;
    }

    /**
     * @param covariance [i][j], read
     * @param errors     [i], roots of its diagonal; read
     * @param blocks     [k][i] deviations of the blocks, or empty; kept
     */
    static Correlation of(double[] covariance, double[] errors, double[] blocks) {
        int n = errors.length;
        double[] r = new double[n * n];
        for (int i = 0; i < n; i++) {
            for (int j = 0; j < n; j++) {
                r[i * n + j] = i == j ? 1 : covariance[i * n + j] / errors[i] / errors[j];
            }
        }
        return new Correlation(n, r, blocks);
    }

    public int points() {
        return points;
    }

    /** R, copy [i][j] flat. */
    public double[] toArray() {
        return r.clone();
    }

    /** Optimal intensity of shrinkage towards the unit matrix; throws IllegalStateException if the blocks are not known. */
    public double optimalShrinkage() {
        if (blocks.length == 0) {
            throw new IllegalStateException("optimal shrinkage needs the deviations of the blocks behind the correlation");
        }
        return Shrinkage.intensity(Shrinkage.standardized(blocks, points), points);
    }
}
