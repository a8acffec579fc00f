package tracewright.fitters.sampled;

import java.util.stream.IntStream;
import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.DecompositionSolver;
import org.apache.commons.math3.linear.MatrixUtils;
import org.apache.commons.math3.linear.QRDecomposition;
import org.apache.commons.math3.linear.RealMatrix;

/**
 * Influence a_k = P_k - theta_J of each block on a number, P_k its pseudo-values: by definition from a jackknife, by
 * regression from a bootstrap, whose samples are to first order
 * <pre>
 *   x_b = theta + sum_k u_bk a_k,      sum_k p_k a_k = 0,      p_k = m_k/N
 * </pre>
 */
final class BlockInfluence {

    /** Draws per block below which the regression is not attempted. */
    static final int DRAWS_PER_BLOCK = 3;

    private BlockInfluence() {
    }

    /**
     * Influences from jackknife samples: a_k = -(x_k - c)(N - m_k)/m_k.
     *
     * @param x [k]; read
     */
    static double[] ofJackknife(SampleGroup group, double central, double[] x) {
        double c = group.centre(central, x, 0, 1);
        long total = group.configurations();
        double[] a = new double[x.length];
        for (int k = 0; k < a.length; k++) {
            int m = group.blockSize(k);
            a[k] = -(x[k] - c) * (double) (total - m) / m;
        }
        return a;
    }

    /**
     * Influences from bootstrap samples by least squares; empty when there are fewer than three draws per block or the
     * draws leave some combination of blocks undetermined.
     *
     * @param x [b]; read
     */
    static double[] ofBootstrap(SampleGroup group, double central, double[] x) {
        double[] operator = group.influence();
        int draws = x.length;
        double c = group.centre(central, x, 0, 1);
        double[] a = new double[operator.length / draws];
        for (int k = 0; k < a.length; k++) {
            double sum = 0;
            for (int b = 0; b < draws; b++) {
                sum += operator[k * draws + b] * (x[b] - c);
            }
            a[k] = sum;
        }
        return a;
    }

    /**
     * Pseudo-inverse of the shares [draw][block] followed by the projection onto sum_k p_k a_k = 0.
     *
     * @return [block][draw] flat; empty when not determined
     */
    static double[] operator(double[] shares, int draws, int[] sizes) {
        int g = sizes.length;
        if (shares.length == 0 || draws < DRAWS_PER_BLOCK * g) {
            return new double[0];
        }
        RealMatrix u = new Array2DRowRealMatrix(draws, g);
        for (int b = 0; b < draws; b++) {
            for (int k = 0; k < g; k++) {
                u.setEntry(b, k, shares[b * g + k]);
            }
        }
        // Shares are of size 1/g; a diagonal of R below 1e-9/g is a block that was never drawn or a repeated draw.
        DecompositionSolver solver = new QRDecomposition(u, 1e-9 / g).getSolver();
        return solver.isNonSingular() ? projected(solver.solve(MatrixUtils.createRealIdentityMatrix(draws)), sizes) : new double[0];
    }

    private static double[] projected(RealMatrix inverse, int[] sizes) {
        int g = sizes.length;
        int draws = inverse.getColumnDimension();
        double total = IntStream.of(sizes).asLongStream().sum();
        double[] operator = new double[g * draws];
        for (int b = 0; b < draws; b++) {
            double mean = 0;
            for (int k = 0; k < g; k++) {
                mean += sizes[k] / total * inverse.getEntry(k, b);
            }
            for (int k = 0; k < g; k++) {
                operator[k * draws + b] = inverse.getEntry(k, b) - mean;
            }
        }
        return operator;
    }
}
