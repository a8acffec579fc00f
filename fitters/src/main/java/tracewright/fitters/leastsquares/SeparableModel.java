package tracewright.fitters.leastsquares;

/** A model that is linear in some parameters, f = Phi(theta) a. Immutable and safe for several threads. */
public interface SeparableModel {

    int points();

    /** Number of nonlinear parameters theta. */
    int nonlinear();

    /** Number of linear parameters a. */
    int linear();

    /**
     * @param theta       [nonlinear]; read
     * @param basis       Phi [point][linear] flat; overwritten
     * @param derivatives dPhi/dtheta_k [k][point][linear] flat; overwritten
     */
    void evaluate(double[] theta, double[] basis, double[] derivatives);
}
