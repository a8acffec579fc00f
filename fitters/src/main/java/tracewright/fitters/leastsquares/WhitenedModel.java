package tracewright.fitters.leastsquares;

/**
 * A model with a frozen weight and exchangeable data: residuals r = Linv (f - y), their Jacobian, the gradient, and the machine
 * that descends in them. One object is the work space of one thread.
 */
final class WhitenedModel {

    private final FitModel model;
    private final double[] linv;      // [point][point], lower triangular
    private final int points;
    private final int parameters;
    private final double[] scratch;
    private final double[] y;
    private final double[] values;
    private final double[] pull;
    private final double[] jacobian;
    private LevenbergMarquardt machine;

    WhitenedModel(FitModel model, double[] linv) {
        this.model = model;
        this.linv = linv;
        this.points = model.points();
        this.parameters = model.parameters();
        this.scratch = new double[model.scratch()];
        this.y = new double[points];
        this.values = new double[points];
        this.pull = new double[points];
        this.jacobian = new double[points * parameters];
    }

    /** Data for what follows, copied; the first data also set the norm below which residuals count as rounding. */
    void data(double[] row) {
        System.arraycopy(row, 0, y, 0, points);
        if (machine == null) {
            double[] z = row.clone();
            WhiteningKernels.vector(linv, z, points);
            double norm = 0;
            for (double x : z) {
                norm += x * x;
            }
            machine = new LevenbergMarquardt(this::residuals, points, parameters, Math.sqrt(norm));
        }
    }

    LevenbergMarquardt machine() {
        return machine;
    }

    private void residuals(double[] p, double[] r, double[] j) {
        model.evaluate(p, r, j, scratch);
        for (int i = 0; i < points; i++) {
            r[i] -= y[i];
        }
        WhiteningKernels.vector(linv, r, points);
        WhiteningKernels.matrix(linv, j, points, parameters);
    }

    /**
     * J^T W (f - y), without whitening the Jacobian.
     *
     * @param gradient [parameter]; overwritten
     * @return (f - y)^T W (f - y)
     */
    double gradient(double[] p, double[] gradient) {
        model.evaluate(p, values, jacobian, scratch);
        for (int i = 0; i < points; i++) {
            values[i] -= y[i];
        }
        WhiteningKernels.vector(linv, values, points);
        double q = 0;
        for (double r : values) {
            q += r * r;
        }
        WhiteningKernels.transposed(linv, values, pull, points);
        for (int j = 0; j < parameters; j++) {
            gradient[j] = 0;
        }
        for (int i = 0, at = 0; i < points; i++) {
            for (int j = 0; j < parameters; j++, at++) {
                gradient[j] += jacobian[at] * pull[i];
            }
        }
        return q;
    }

    /** Whitened Jacobian, a new array. */
    double[] whitenedJacobian(double[] p) {
        double[] j = new double[points * parameters];
        residuals(p, new double[points], j);
        return j;
    }
}
