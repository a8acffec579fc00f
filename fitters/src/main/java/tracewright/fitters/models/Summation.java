package tracewright.fitters.models;

import java.util.List;
import tracewright.fitters.leastsquares.FitModel;

/**
 * Ratio summed over insertion times: S(t) = c + g00 t, corrections O(t exp(-Delta t)); Maiani et al., Nucl. Phys. B293 (1987) 420;
 * Capitani et al., arXiv:1205.0180.
 */
public final class Summation implements FitModel {

    private final int[] separations;

    public Summation(int[] separations) {
        if (separations.length < 2) {
            throw new IllegalArgumentException("a slope needs two separations or more; got " + separations.length);
        }
        this.separations = separations.clone();
    }

    @Override
    public int points() {
        return separations.length;
    }

    @Override
    public List<String> parameterNames() {
        return List.of("c", "g00");
    }

    @Override
    public void evaluate(double[] p, double[] values, double[] jacobian) {
        for (int i = 0; i < separations.length; i++) {
            values[i] = p[0] + p[1] * separations[i];
            jacobian[2 * i] = 1;
            jacobian[2 * i + 1] = separations[i];
        }
    }

    @Override
    public List<double[]> starts(double[] y, double[] errors) {
        int last = separations.length - 1;
        double slope = (y[last] - y[0]) / (separations[last] - separations[0]);
        return List.of(new double[] {y[0] - slope * separations[0], slope});
    }
}
