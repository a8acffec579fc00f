package tracewright.fitters.models;

import java.util.List;
import tracewright.fitters.leastsquares.FitModel;

/** The same number at every point: f = g00. */
public record Plateau(int points) implements FitModel {

    public Plateau {
        if (points < 1) {
            throw new IllegalArgumentException("a plateau of " + points + " points");
        }
    }

    @Override
    public List<String> parameterNames() {
        return List.of("g00");
    }

    @Override
    public void evaluate(double[] p, double[] values, double[] jacobian) {
        for (int i = 0; i < points; i++) {
            values[i] = p[0];
            jacobian[i] = 1;
        }
    }

    @Override
    public List<double[]> starts(double[] y, double[] errors) {
        double sum = 0;
        for (double x : y) {
            sum += x;
        }
        return List.of(new double[] {sum / points});
    }
}
