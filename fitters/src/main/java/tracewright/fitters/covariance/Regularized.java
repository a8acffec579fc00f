package tracewright.fitters.covariance;

/** A correlation matrix after its rule, and how much the rule changed. */
public final class Regularized {

    private final double[] matrix;   // R' [i][j]
    private final double shrinkage;
    private final int raised;

    /** Takes the array over. */
    Regularized(double[] matrix, double shrinkage, int raised) {
        this.matrix = matrix;
        this.shrinkage = shrinkage;
        this.raised = raised;
    }

    /** R', copy [i][j] flat. */
    public double[] toArray() {
        return matrix.clone();
    }

    /** lambda of the shrinkage towards the unit matrix; zero for other rules. */
    public double shrinkage() {
        return shrinkage;
    }

    /** Number of eigenvalues raised to the floor; zero for other rules. */
    public int raised() {
        return raised;
    }
}
