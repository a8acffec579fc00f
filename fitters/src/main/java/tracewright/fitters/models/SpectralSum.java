package tracewright.fitters.models;

import tracewright.fitters.leastsquares.SeparableModel;

/** Sum of exponentials, open or periodic in time, with derivatives; what the models of two-point functions share. Immutable. */
final class SpectralSum implements SeparableModel {

    /** Extent that stands for no backward part. */
    static final int OPEN = 0;

    private final int[] times;
    private final int extent;
    private final int states;

    SpectralSum(int[] times, int extent, int states) {
        if (states < 1 || states > 4) {
            throw new IllegalArgumentException(states + " states; need one to four");
        }
        this.times = times.clone();
        this.extent = extent;
        this.states = states;
    }

    @Override
    public int points() {
        return times.length;
    }

    int states() {
        return states;
    }

    int time(int i) {
        return times[i];
    }

    boolean periodic() {
        return extent != OPEN;
    }

    /** T, or {@link #OPEN}. */
    int extent() {
        return extent;
    }

    /** Whether the times follow each other without a gap, as recursions need. */
    boolean consecutive() {
        for (int i = 1; i < times.length; i++) {
            if (times[i] != times[i - 1] + 1) {
                return false;
            }
        }
        return true;
    }

    @Override
    public int nonlinear() {
        return states;
    }

    @Override
    public int linear() {
        return states;
    }

    /** A state of unit amplitude at point i. */
    double state(double energy, int i) {
        double forward = StrictMath.exp(-energy * times[i]);
        return periodic() ? forward + StrictMath.exp(-energy * (extent - times[i])) : forward;
    }

    /** Its derivative by the energy. */
    private double slope(double energy, int i) {
        double forward = -times[i] * StrictMath.exp(-energy * times[i]);
        return periodic() ? forward - (extent - times[i]) * StrictMath.exp(-energy * (extent - times[i])) : forward;
    }

    /**
     * Values and derivatives by E0, delta1 .., A0, A1 ...; states from the top, since delta_n moves all energies from n on.
     *
     * @param values   [point]; overwritten
     * @param jacobian [point][2 states]; overwritten
     */
    void whole(double[] p, double[] values, double[] jacobian) {
        int q = 2 * states;
        for (int n = states - 1; n >= 0; n--) {
            double energy = Spectrum.energy(p, n);
            double amplitude = p[states + n];
            for (int i = 0; i < times.length; i++) {
                int at = i * q + n;
                int t = times[i];
                double forward = StrictMath.exp(-energy * t);
                double backward = periodic() ? StrictMath.exp(-energy * (extent - t)) : 0;
                double above = n == states - 1 ? 0 : jacobian[at + 1];
                values[i] = (n == states - 1 ? 0 : values[i]) + amplitude * (forward + backward);
                jacobian[at + states] = forward + backward;
                jacobian[at] = above - amplitude * (t * forward + (extent - t) * backward);
            }
        }
        for (int n = 1; n < states; n++) {
            double gap = StrictMath.exp(p[n]);
            for (int i = 0; i < times.length; i++) {
                jacobian[i * q + n] *= gap;
            }
        }
    }

    @Override
    public void evaluate(double[] theta, double[] basis, double[] derivatives) {
        int size = times.length * states;
        for (int n = 0; n < states; n++) {
            double energy = Spectrum.energy(theta, n);
            for (int i = 0; i < times.length; i++) {
                int at = i * states + n;
                basis[at] = state(energy, i);
                double slope = slope(energy, i);
                for (int k = 0; k < states; k++) {
                    derivatives[k * size + at] = k > n ? 0 : k == 0 ? slope : slope * StrictMath.exp(theta[k]);
                }
            }
        }
    }
}
