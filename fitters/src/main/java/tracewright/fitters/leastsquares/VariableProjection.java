package tracewright.fitters.leastsquares;

import java.util.Arrays;
import java.util.Optional;
import tracewright.fitters.linalg.Householder;

/**
 * Least squares of a separable model with its linear parameters eliminated: Golub, Pereyra, SIAM J. Numer. Anal. 10 (1973) 413;
 * shorter Jacobian of Kaufman, BIT 15 (1975) 49. With whitened basis Phi and data z,
 * <pre>
 *   a = Phi^+ z,   r = z - Phi a,   Pi = 1 - Phi Phi^+,   D_k = dPhi/dtheta_k
 *   dr/dtheta_k = -Pi D_k a - (Phi^+)^T D_k^T r           FULL;   its first term alone: SHORT, with the same gradient J^T r
 * </pre>
 * The nonlinear parameters need start values, the linear ones do not. One object is the work space of one thread.
 */
public final class VariableProjection {

    /** Which Jacobian the descent uses. */
    public enum Jacobian {
        FULL, SHORT
    }

    private final SeparableModel model;
    private final double[] z;
    private final double[] linv;
    private final Jacobian kind;
    private final int n;
    private final int nonlinear;
    private final int linear;
    private final double[] basis;        // [point][linear], whitened
    private final double[] derivatives;  // [k][point][linear], whitened below
    private final double[] slice;        // [point][linear]
    private final double[] inverse;      // (Phi^T Phi)^-1 through QR
    private final double[] amplitudes;
    private final double[] direction;
    private final double[] pull;
    private final double[] work;
    private final double[] right;

    /**
     * @param y    [point]; read
     * @param linv [point][point] flat lower triangular, W = Linv^T Linv; read
     */
    public VariableProjection(SeparableModel model, double[] y, double[] linv, Jacobian kind) {
        this.model = model;
        this.n = model.points();
        this.nonlinear = model.nonlinear();
        this.linear = model.linear();
        this.z = y.clone();
        this.linv = linv.clone();
        WhiteningKernels.vector(this.linv, z, n);
        this.kind = kind;
        this.basis = new double[n * linear];
        this.derivatives = new double[nonlinear * n * linear];
        this.slice = new double[n * linear];
        this.inverse = new double[linear * linear];
        this.amplitudes = new double[linear];
        this.direction = new double[n];
        this.pull = new double[linear];
        this.work = new double[n * linear];
        this.right = new double[n];
    }

    /** Minimum from a start of the nonlinear parameters, by both ways of scaling. */
    public LevenbergMarquardt.Descent cold(double[] start, int mostSteps) {
        double norm = 0;
        for (double x : z) {
            norm += x * x;
        }
        return new LevenbergMarquardt(this::evaluate, n, nonlinear, Math.sqrt(norm)).cold(start, mostSteps);
    }

    /** Linear parameters that belong to theta; empty if the basis is dependent there. */
    public Optional<double[]> amplitudes(double[] theta) {
        return project(theta, new double[n]) ? Optional.of(amplitudes.clone()) : Optional.empty();
    }

    /**
     * Reduced residual and its Jacobian; not a number where the basis is dependent, which a descent rejects.
     *
     * @param r        z - Phi a [point]; overwritten
     * @param jacobian [point][nonlinear]; overwritten
     */
    public void evaluate(double[] theta, double[] r, double[] jacobian) {
        if (!project(theta, r)) {
            Arrays.fill(r, Double.NaN);
            return;
        }
        for (int k = 0; k < nonlinear; k++) {
            System.arraycopy(derivatives, k * n * linear, slice, 0, n * linear);
            WhiteningKernels.matrix(linv, slice, n, linear);
            column(r, jacobian, k);
        }
    }

    private boolean project(double[] theta, double[] r) {
        model.evaluate(theta, basis, derivatives);
        WhiteningKernels.matrix(linv, basis, n, linear);
        System.arraycopy(basis, 0, work, 0, basis.length);
        System.arraycopy(z, 0, right, 0, n);
        if (!Householder.solve(work, right, amplitudes, n, linear)) {
            return false;
        }
        invert();
        for (int i = 0; i < n; i++) {
            r[i] = z[i];
            for (int c = 0; c < linear; c++) {
                r[i] -= basis[i * linear + c] * amplitudes[c];
            }
        }
        return true;
    }

    /** (R^T R)^-1 from the triangle that the last solution left in {@code work}. */
    private void invert() {
        for (int c = 0; c < linear; c++) {
            for (int i = 0; i < linear; i++) {
                double sum = i == c ? 1 : 0;
                for (int k = 0; k < i; k++) {
                    sum -= work[k * linear + i] * pull[k];
                }
                pull[i] = sum / work[i * linear + i];
            }
            for (int i = linear - 1; i >= 0; i--) {
                double sum = pull[i];
                for (int k = i + 1; k < linear; k++) {
                    sum -= work[i * linear + k] * inverse[k * linear + c];
                }
                inverse[i * linear + c] = sum / work[i * linear + i];
            }
        }
    }

    /** Column k of the Jacobian: -(D a - Phi Phi^+ D a) [- Phi (Phi^T Phi)^-1 D^T r]. */
    private void column(double[] r, double[] jacobian, int k) {
        for (int i = 0; i < n; i++) {
            direction[i] = 0;
            for (int c = 0; c < linear; c++) {
                direction[i] += slice[i * linear + c] * amplitudes[c];
            }
        }
        for (int c = 0; c < linear; c++) {
            pull[c] = 0;
            for (int i = 0; i < n; i++) {
                pull[c] += basis[i * linear + c] * direction[i];
                if (kind == Jacobian.FULL) {
                    pull[c] -= slice[i * linear + c] * r[i];
                }
            }
        }
        for (int i = 0; i < n; i++) {
            double x = -direction[i];
            for (int c = 0; c < linear; c++) {
                double coefficient = 0;
                for (int d = 0; d < linear; d++) {
                    coefficient += inverse[c * linear + d] * pull[d];
                }
                x += basis[i * linear + c] * coefficient;
            }
            jacobian[i * nonlinear + k] = x;
        }
    }
}
