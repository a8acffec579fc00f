package tracewright.fitters.models;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import tracewright.fitters.leastsquares.FitModel;
import tracewright.fitters.leastsquares.SeparableModel;

/**
 * C(t) = sum_n A_n exp(-E_n t), E_n = E_0 + sum_{k&lt;=n} exp(delta_k): energies ordered, amplitudes free.
 * Parameters E0, delta1 .., A0, A1 ...
 */
public final class Exponentials implements FitModel {

    private final SpectralSum sum;

    /** @param states one to four */
    public Exponentials(int[] times, int states) {
        this.sum = new SpectralSum(times, SpectralSum.OPEN, states);
    }

    @Override
    public int points() {
        return sum.points();
    }

    @Override
    public List<String> parameterNames() {
        return names(sum.states());
    }

    static List<String> names(int states) {
        List<String> names = new ArrayList<>();
        names.add("E0");
        for (int n = 1; n < states; n++) {
            names.add("delta" + n);
        }
        for (int n = 0; n < states; n++) {
            names.add("A" + n);
        }
        return names;
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
