package tracewright.fitters.models;

import java.util.List;
import java.util.Optional;
import tracewright.fitters.leastsquares.FitModel;
import tracewright.fitters.leastsquares.SeparableModel;

/**
 * C(t) = sum_n A_n [exp(-E_n t) + exp(-E_n (T - t))], E_n = E_0 + sum_{k&lt;=n} exp(delta_k).
 * Parameters as in {@link Exponentials}.
 */
public final class PeriodicExponentials implements FitModel {

    private final SpectralSum sum;

    /**
     * @param extent T
     * @param states one to four
     */
    public PeriodicExponentials(int[] times, int extent, int states) {
        if (extent < 1) {
            throw new IllegalArgumentException("a periodic correlator of " + extent + " time slices");
        }
        this.sum = new SpectralSum(times, extent, states);
    }

    @Override
    public int points() {
        return sum.points();
    }

    @Override
    public List<String> parameterNames() {
        return Exponentials.names(sum.states());
    }

    @Override
    public void evaluate(double[] p, double[] values, double[] jacobian) {
        sum.whole(p, values, jacobian);
    }

    @Override
    public List<double[]> starts(double[] y, double[] errors) {
        return new ExponentialStarts(sum).of(y, errors);
    }

    @Override
    public Optional<String> undetermined(double[] p) {
        return Spectrum.undetermined(p, sum.states());
    }

    /** This model with its amplitudes as the linear parameters; nonlinear are E0, delta1 ... */
    public SeparableModel separable() {
        return sum;
    }
}
