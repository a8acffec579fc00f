package tracewright.fitters.leastsquares;

import java.util.List;
import java.util.Optional;

/** A function of parameters at fixed points, with its derivatives. Immutable and safe for several threads. */
public interface FitModel {

    /** Number of points. */
    int points();

    /** Names of the parameters, in their order. */
    List<String> parameterNames();

    /** Number of parameters. */
    default int parameters() {
        return parameterNames().size();
    }

    /**
     * @param p        parameters; read
     * @param values   [point]; overwritten
     * @param jacobian [point][parameter] flat; overwritten
     */
    void evaluate(double[] p, double[] values, double[] jacobian);

    /** Numbers of work space that {@link #evaluate(double[], double[], double[], double[])} wants; models themselves hold none. */
    default int scratch() {
        return 0;
    }

    /**
     * The same, without allocating anything.
     *
     * @param scratch at least {@link #scratch()} long, the caller's own; overwritten
     */
    default void evaluate(double[] p, double[] values, double[] jacobian, double[] scratch) {
        evaluate(p, values, jacobian);
    }

    /** Values alone [point]; for curves in plots and other cold places. */
    default double[] values(double[] p) {
        double[] values = new double[points()];
        evaluate(p, values, new double[points() * parameters()]);
        return values;
    }

    /**
     * Start values found without a user's hint, the most promising first; at least one.
     *
     * @param y      data [point]; read
     * @param errors their standard errors [point]; read
     */
    List<double[]> starts(double[] y, double[] errors);

    /** Why a minimum is not to be believed (a state too many, say); empty if there is no such reason. */
    default Optional<String> undetermined(double[] p) {
        return Optional.empty();
    }
}
