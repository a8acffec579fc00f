package tracewright.fitters.models;

import java.util.Arrays;
import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.EigenDecomposition;
import org.apache.commons.math3.linear.RealMatrix;
import org.apache.commons.math3.linear.SingularValueDecomposition;

/**
 * Energies of a sum of exponentials out of consecutive times without start values; Hua, Sarkar, IEEE Trans. ASSP 38 (1990) 814.
 * <pre>
 *   open        H0_ij = c(i + j),               H1_ij = c(i + j + 1)                   eigenvalues of H0^+ H1: exp(-(E - m))
 *   periodic    H0_ij = C(i + j) + C(i - j),    H1_ij = H0_(i+1)j + H0_(i-1)j          eigenvalues: 2 cosh E
 * </pre>
 * with c(t) = C(t) exp(m t), m the effective mass, so that no entry is drowned by others. H0^+ keeps at most one singular value
 * per state and none below three times the norm of the same matrix made of errors.
 */
final class MatrixPencil {

    private static final double NOISE = 3;
    private static final double ROUNDING = 1e-12;

    private MatrixPencil() {
    }

    /** Energies, ascending; fewer than the states, or none, when noise hides them. */
    static double[] energies(SpectralSum sum, double mass, double[] y, double[] errors) {
        int n = sum.points();
        int size = sum.periodic() ? (n - 1) / 3 : n / 2;
        if (size < 2) {
            return new double[0];
        }
        double tilt = sum.periodic() ? 0 : mass;
        double[] c = tilted(y, tilt);
        double[] noise = tilted(errors, tilt);
        RealMatrix h0 = sum.periodic() ? folded(c, size, 0) : hankel(c, size, 0);
        RealMatrix h1 = sum.periodic() ? folded(c, size, 1).add(folded(c, size, -1)) : hankel(c, size, 1);
        double floor = NOISE * (sum.periodic() ? folded(noise, size, 0) : hankel(noise, size, 0)).getFrobeniusNorm();
        double[] roots = eigenvalues(h0, h1, floor, sum.states());
        double[] energies = Arrays.stream(roots).map(z -> energy(z, sum.periodic(), tilt)).filter(e -> e > 0).sorted().toArray();
        return energies;
    }

    /** NaN if no positive energy belongs to the root. */
    private static double energy(double z, boolean periodic, double tilt) {
        if (periodic) {
            double half = 0.5 * z;
            return half > 1 ? StrictMath.log(half + Math.sqrt(half * half - 1)) : Double.NaN;
        }
        return z > 0 ? tilt - StrictMath.log(z) : Double.NaN;
    }

    private static double[] tilted(double[] y, double mass) {
        double[] c = new double[y.length];
        for (int i = 0; i < c.length; i++) {
            c[i] = y[i] * StrictMath.exp(mass * i);
        }
        return c;
    }

    private static RealMatrix hankel(double[] c, int size, int shift) {
        RealMatrix h = new Array2DRowRealMatrix(c.length - size, size);
        for (int i = 0; i < h.getRowDimension(); i++) {
            for (int j = 0; j < size; j++) {
                h.setEntry(i, j, c[i + j + shift]);
            }
        }
        return h;
    }

    /** Rows around every time that has {@code size} neighbours on both sides. */
    private static RealMatrix folded(double[] c, int size, int shift) {
        int rows = c.length - 2 * size;
        RealMatrix h = new Array2DRowRealMatrix(rows, size);
        for (int i = 0; i < rows; i++) {
            for (int j = 0; j < size; j++) {
                int centre = i + size + shift;
                h.setEntry(i, j, c[centre + j] + c[centre - j]);
            }
        }
        return h;
    }

    /** Real eigenvalues of Sigma^-1 U^T H1 V on the leading singular vectors of H0. */
    private static double[] eigenvalues(RealMatrix h0, RealMatrix h1, double floor, int most) {
        SingularValueDecomposition svd = new SingularValueDecomposition(h0);
        double[] s = svd.getSingularValues();
        int rank = 0;
        while (rank < Math.min(most, s.length) && s[rank] > Math.max(floor, ROUNDING * s[0])) {
            rank++;
        }
        if (rank == 0) {
            return new double[0];
        }
        RealMatrix u = svd.getU().getSubMatrix(0, h0.getRowDimension() - 1, 0, rank - 1);
        RealMatrix v = svd.getV().getSubMatrix(0, h0.getColumnDimension() - 1, 0, rank - 1);
        RealMatrix reduced = u.transpose().multiply(h1).multiply(v);
        for (int i = 0; i < rank; i++) {
            for (int j = 0; j < rank; j++) {
                reduced.multiplyEntry(i, j, 1 / s[i]);
            }
        }
        EigenDecomposition e = new EigenDecomposition(reduced);
        double[] real = e.getRealEigenvalues();
        double[] imaginary = e.getImagEigenvalues();
        int count = 0;
        for (int i = 0; i < rank; i++) {
            if (imaginary[i] == 0) {
                real[count++] = real[i];
            }
        }
        return Arrays.copyOf(real, count);
    }
}
