package tracewright.fitters.models;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Optional;
import java.util.stream.IntStream;
import tracewright.fitters.leastsquares.FitModel;
import tracewright.fitters.linalg.Householder;

/**
 * Two- and three-point functions of one operator at source and sink with two states in common:
 * <pre>
 *  C2(t)      = A0 [ exp(-E0 t) + r exp(-E1 t) ],                                        E1 = E0 + exp(delta)
 *  C3(t, tau) = A0 [ g00 exp(-E0 t) + b01 (exp(-E1 (t - tau) - E0 tau) + exp(-E0 (t - tau) - E1 tau)) + b11 exp(-E1 t) ]
 * </pre>
 * with b01 = sqrt(r) g01 and b11 = r g11, which leaves the sign of r free. Data: C2 at the given times, then C3 at the given
 * points, which may have been averaged with t - tau. Parameters E0, delta, A0, r, g00, b01, b11.
 */
public final class TwoStateJoint implements FitModel {

    private static final List<String> NAMES = List.of("E0", "delta", "A0", "r", "g00", "b01", "b11");

    private final int[] twoPointTimes;
    private final int[] sinks;
    private final int[] insertions;
    private final int longest;    // largest time in either part
    private final int q;          // 7, or 6 without b11

    /** With all seven parameters. */
    public TwoStateJoint(int[] twoPointTimes, int[] sinks, int[] insertions) {
        this(twoPointTimes, sinks, insertions, true);
    }

    /**
     * @param twoPointTimes t of each two-point entry
     * @param sinks         source-sink separation of each three-point entry
     * @param insertions    insertion time of each three-point entry, 0 .. separation
     * @param excitedElement whether b11 is a parameter; it is zero otherwise
     */
    public TwoStateJoint(int[] twoPointTimes, int[] sinks, int[] insertions, boolean excitedElement) {
        if (sinks.length != insertions.length) {
            throw new IllegalArgumentException(sinks.length + " separations for " + insertions.length + " insertion times");
        }
        if (twoPointTimes.length == 0 || sinks.length == 0) {
            throw new IllegalArgumentException("a joint fit needs both kinds of data; got " + twoPointTimes.length + " two-point and "
                + sinks.length + " three-point entries");
        }
        this.twoPointTimes = twoPointTimes.clone();
        this.sinks = sinks.clone();
        this.insertions = insertions.clone();
        for (int i = 0; i < sinks.length; i++) {
            if (insertions[i] < 0 || insertions[i] > sinks[i]) {
                throw new IllegalArgumentException("insertion time " + insertions[i] + " outside 0.." + sinks[i]);
            }
        }
        this.longest = IntStream.concat(IntStream.of(twoPointTimes), IntStream.of(sinks)).max().orElse(0);
        this.q = excitedElement ? 7 : 6;
    }

    @Override
    public int points() {
        return twoPointTimes.length + sinks.length;
    }

    @Override
    public List<String> parameterNames() {
        return NAMES.subList(0, q);
    }

    @Override
    public int scratch() {
        return 2 * (longest + 1);
    }

    @Override
    public void evaluate(double[] p, double[] values, double[] jacobian) {
        evaluate(p, values, jacobian, new double[scratch()]);
    }

    /** Tables of exp(-E0 t) and exp(-gap t) serve all points. */
    @Override
    public void evaluate(double[] p, double[] values, double[] jacobian, double[] scratch) {
        double gap = StrictMath.exp(p[1]);
        int excited = longest + 1;
        for (int t = 0; t <= longest; t++) {
            scratch[t] = StrictMath.exp(-p[0] * t);
            scratch[excited + t] = StrictMath.exp(-gap * t);
        }
        int n = twoPointTimes.length;
        for (int i = 0; i < n; i++) {
            int t = twoPointTimes[i];
            twoPoint(p, gap, t, scratch[t], scratch[excited + t], values, jacobian, i);
        }
        for (int i = 0; i < sinks.length; i++) {
            int t = sinks[i];
            threePoint(p, gap, t, insertions[i], scratch[t], scratch[excited + t - insertions[i]], scratch[excited + insertions[i]],
                values, jacobian, n + i);
        }
    }

    private void twoPoint(double[] p, double gap, int t, double ground, double decay, double[] values, double[] jacobian, int i) {
        double excited = ground * decay;
        double shape = ground + p[3] * excited;
        int at = i * q;
        values[i] = p[2] * shape;
        jacobian[at] = -t * values[i];
        jacobian[at + 1] = -p[2] * p[3] * gap * t * excited;
        jacobian[at + 2] = shape;
        jacobian[at + 3] = p[2] * excited;
        jacobian[at + 4] = 0;
        jacobian[at + 5] = 0;
        if (q == 7) {
            jacobian[at + 6] = 0;
        }
    }

    private void threePoint(double[] p, double gap, int t, int tau, double ground, double late, double early, double[] values, double[] jacobian, int i) {
        double both = late * early;
        double b11 = q == 7 ? p[6] : 0;
        double shape = p[4] + p[5] * (late + early) + b11 * both;
        double scale = p[2] * ground;
        int at = i * q;
        values[i] = scale * shape;
        jacobian[at] = -t * values[i];
        jacobian[at + 1] = -scale * gap * (p[5] * ((t - tau) * late + tau * early) + b11 * t * both);
        jacobian[at + 2] = ground * shape;
        jacobian[at + 3] = 0;
        jacobian[at + 4] = scale;
        jacobian[at + 5] = scale * (late + early);
        if (q == 7) {
            jacobian[at + 6] = scale * both;
        }
    }

    /**
     * g00, g01 and g11 (zero without b11) out of the parameters; empty where r is not positive, so that sqrt(r) does not exist.
     */
    public static Optional<double[]> elements(double[] p) {
        if (!(p[3] > 0)) {
            return Optional.empty();
        }
        return Optional.of(new double[] {p[4], p[5] / Math.sqrt(p[3]), p.length == NAMES.size() ? p[6] / p[3] : 0});
    }

    /** From the two-point part alone: energies and overlaps, then the elements by linear least squares. */
    @Override
    public List<double[]> starts(double[] y, double[] errors) {
        int n = twoPointTimes.length;
        List<double[]> starts = new ArrayList<>();
        for (double[] two : new Exponentials(twoPointTimes, 2).starts(Arrays.copyOf(y, n), Arrays.copyOf(errors, n))) {
            double[] p = {two[0], two[1], two[2], two[2] == 0 ? 0 : two[3] / two[2], 0, 0, 0};
            elements(p, y, errors);
            starts.add(Arrays.copyOf(p, q));
        }
        return starts;
    }

    private void elements(double[] p, double[] y, double[] errors) {
        double gap = StrictMath.exp(p[1]);
        int rows = sinks.length;
        int n = twoPointTimes.length;
        int unknown = q - 4;
        double[] a = new double[rows * unknown];
        double[] b = new double[rows];
        for (int i = 0; i < rows; i++) {
            double scale = p[2] * StrictMath.exp(-p[0] * sinks[i]) / errors[n + i];
            double late = StrictMath.exp(-gap * (sinks[i] - insertions[i]));
            double early = StrictMath.exp(-gap * insertions[i]);
            a[unknown * i] = scale;
            a[unknown * i + 1] = scale * (late + early);
            if (unknown == 3) {
                a[unknown * i + 2] = scale * late * early;
            }
            b[i] = y[n + i] / errors[n + i];
        }
        double[] x = new double[unknown];
        if (rows >= unknown && Householder.solve(a, b, x, rows, unknown)) {
            System.arraycopy(x, 0, p, 4, unknown);
        } else {
            p[4] = y[n] / (p[2] * StrictMath.exp(-p[0] * sinks[0]));
        }
    }

    @Override
    public Optional<String> undetermined(double[] p) {
        return Spectrum.undetermined(p, 2);
    }
}
