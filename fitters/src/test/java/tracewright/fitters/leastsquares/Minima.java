package tracewright.fitters.leastsquares;

import java.util.Comparator;
import java.util.List;
import tracewright.fitters.leastsquares.LevenbergMarquardt.Descent;

/** Cold fits with independent errors, for tests of models. */
public final class Minima {

    private Minima() {
    }

    /** The lowest minimum from a model's own starts. */
    public static Descent.Converged lowest(FitModel model, double[] y, double[] errors) {
        return lowest(model, y, errors, model.starts(y, errors));
    }

    /** The lowest minimum from given starts. */
    public static Descent.Converged lowest(FitModel model, double[] y, double[] errors, List<double[]> starts) {
        double[] linv = new double[y.length * y.length];
        for (int i = 0; i < y.length; i++) {
            linv[i * y.length + i] = 1 / errors[i];
        }
        WhitenedModel whitened = new WhitenedModel(model, linv);
        whitened.data(y);
        return starts.stream().map(s -> whitened.machine().cold(s, 2000))
            .filter(Descent.Converged.class::isInstance).map(Descent.Converged.class::cast)
            .min(Comparator.comparingDouble(Descent.Converged::chiSquared))
            .orElseThrow(() -> new AssertionError("no start of " + starts.size() + " converges"));
    }
}
