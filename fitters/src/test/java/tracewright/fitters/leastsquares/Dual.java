package tracewright.fitters.leastsquares;

/** A value with its derivatives by all parameters: exact Jacobians of test problems without writing them out. Immutable. */
final class Dual {

    private final double value;
    private final double[] gradient;

    private Dual(double value, double[] gradient) {
        this.value = value;
        this.gradient = gradient;
    }

    static Dual constant(double value, int parameters) {
        return new Dual(value, new double[parameters]);
    }

    /** Parameter j as a variable. */
    static Dual parameter(double[] p, int j) {
        double[] g = new double[p.length];
        g[j] = 1;
        return new Dual(p[j], g);
    }

    double value() {
        return value;
    }

    double derivative(int j) {
        return gradient[j];
    }

    private Dual chain(double result, double slope) {
        double[] g = gradient.clone();
        for (int j = 0; j < g.length; j++) {
            g[j] *= slope;
        }
        return new Dual(result, g);
    }

    private Dual combine(double result, double slope, Dual y, double ySlope) {
        double[] g = gradient.clone();
        for (int j = 0; j < g.length; j++) {
            g[j] = slope * g[j] + ySlope * y.gradient[j];
        }
        return new Dual(result, g);
    }

    Dual plus(Dual y) {
        return combine(value + y.value, 1, y, 1);
    }

    Dual plus(double c) {
        return chain(value + c, 1);
    }

    Dual minus(Dual y) {
        return combine(value - y.value, 1, y, -1);
    }

    Dual times(Dual y) {
        return combine(value * y.value, y.value, y, value);
    }

    Dual times(double c) {
        return chain(value * c, c);
    }

    Dual over(Dual y) {
        double q = value / y.value;
        return combine(q, 1 / y.value, y, -q / y.value);
    }

    Dual negated() {
        return times(-1);
    }

    Dual squared() {
        return times(this);
    }

    Dual exp() {
        double e = StrictMath.exp(value);
        return chain(e, e);
    }

    Dual log() {
        return chain(StrictMath.log(value), 1 / value);
    }

    Dual arctan() {
        return chain(StrictMath.atan(value), 1 / (1 + value * value));
    }

    /** This to a power that depends on the parameters. */
    Dual power(Dual y) {
        return log().times(y).exp();
    }

    Dual power(double y) {
        return chain(StrictMath.pow(value, y), y * StrictMath.pow(value, y - 1));
    }

    /** Base x, a constant, to this power. */
    Dual exponentOf(double x) {
        double v = StrictMath.pow(x, value);
        return chain(v, v * StrictMath.log(x));
    }
}
