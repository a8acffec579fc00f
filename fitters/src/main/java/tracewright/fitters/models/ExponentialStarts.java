package tracewright.fitters.models;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import tracewright.fitters.linalg.Householder;

/**
 * Start values of sums of exponentials: energies from a matrix pencil and from a grid around the effective mass, amplitudes by
 * linear least squares at each node (Golub, Pereyra, SIAM J. Numer. Anal. 10 (1973) 413: the linear parameters are eliminated),
 * best nodes first.
 */
final class ExponentialStarts {

    private static final double[] ENERGY_FACTORS = {1, 0.9, 0.75, 0.55};
    private static final double[] GAPS = {0.05, 0.085, 0.143, 0.243, 0.41, 0.7, 1.18, 2};
    private static final double CONTACT_GAP = 20;
    private static final int KEPT = 8;
    private static final double DISTINCT = 0.45;
    private static final double USEFUL_ERROR = 0.1;

    private static final double[] GAPS_OF_MASS = {0.5, 1, 2};
    private static final double LARGEST_MASS = 5;

    private final SpectralSum sum;
    private final int states;

    ExponentialStarts(SpectralSum sum) {
        this.sum = sum;
        this.states = sum.states();
    }

    /** A node of the grid: E_0, delta_1 .., A_0, A_1 .. and its diagonal chi-squared. */
    private record Node(double[] parameters, double chiSquared) {
    }

    List<double[]> of(double[] y, double[] errors) {
        List<Node> nodes = new ArrayList<>();
        double mass = effectiveMass(y, errors);
        pencil(mass, y, errors, nodes);
        for (double factor : ENERGY_FACTORS) {
            double[] p = new double[2 * states];
            p[0] = factor * mass;
            gaps(1, p, y, errors, nodes);
        }
        nodes.sort(Comparator.comparingDouble(Node::chiSquared));
        List<double[]> kept = new ArrayList<>();
        for (Node node : nodes) {
            if (kept.size() < KEPT && kept.stream().noneMatch(k -> close(k, node.parameters()))) {
                kept.add(node.parameters());
            }
        }
        if (kept.isEmpty()) {
            double[] p = new double[2 * states];
            p[0] = mass;
            p[states] = y[0];
            kept.add(p);
        }
        return kept;
    }

    private boolean close(double[] a, double[] b) {
        boolean close = Math.abs(a[0] - b[0]) < DISTINCT * Math.abs(a[0]) * 0.2;
        for (int n = 1; n < states; n++) {
            close &= Math.abs(a[n] - b[n]) < DISTINCT;
        }
        return close;
    }

    private void gaps(int n, double[] p, double[] y, double[] errors, List<Node> nodes) {
        if (n == states) {
            node(p.clone(), y, errors, nodes);
            return;
        }
        for (double gap : GAPS) {
            p[n] = StrictMath.log(gap);
            gaps(n + 1, p, y, errors, nodes);
        }
        if (n == states - 1) {
            p[n] = StrictMath.log(CONTACT_GAP);
            gaps(n + 1, p, y, errors, nodes);
        }
    }

    private void node(double[] p, double[] y, double[] errors, List<Node> nodes) {
        int rows = sum.points();
        double[] energies = Spectrum.energies(p, states);
        double[] a = new double[rows * states];
        double[] b = new double[rows];
        for (int i = 0; i < rows; i++) {
            b[i] = y[i] / errors[i];
            for (int n = 0; n < states; n++) {
                a[i * states + n] = sum.state(energies[n], i) / errors[i];
            }
        }
        double[] phi = a.clone();
        double[] amplitudes = new double[states];
        if (!Householder.solve(a, b.clone(), amplitudes, rows, states)) {
            return;
        }
        double q = 0;
        for (int i = 0; i < rows; i++) {
            double r = b[i];
            for (int n = 0; n < states; n++) {
                r -= phi[i * states + n] * amplitudes[n];
            }
            q += r * r;
        }
        System.arraycopy(amplitudes, 0, p, states, states);
        if (Double.isFinite(q)) {
            nodes.add(new Node(p, q));
        }
    }

    /** Nodes out of the roots of the pencil; roots that are missing stand half a mass, a mass or two masses above the last one. */
    private void pencil(double mass, double[] y, double[] errors, List<Node> nodes) {
        if (!sum.consecutive()) {
            return;
        }
        double[] roots = MatrixPencil.energies(sum, mass, y, errors);
        for (double gap : GAPS_OF_MASS) {
            double[] p = new double[2 * states];
            double last = roots.length > 0 ? roots[0] : mass;
            p[0] = last;
            for (int n = 1; n < states; n++) {
                double next = n < roots.length ? roots[n] : last + gap * mass;
                p[n] = StrictMath.log(Math.max(next - last, GAPS[0]));
                last = next;
            }
            node(p, y, errors, nodes);
        }
    }

    /** Local decay rate at the largest time whose relative error is below ten per cent. */
    private double effectiveMass(double[] y, double[] errors) {
        double mass = 0.5;
        for (int i = 0; i + 1 < sum.points(); i++) {
            boolean useful = errors[i + 1] < USEFUL_ERROR * Math.abs(y[i + 1]) || i == 0;
            if (useful && !(sum.periodic() && 2 * sum.time(i + 1) > sum.extent())) {
                double ratio = y[i] / y[i + 1];
                mass = ratio > 1 ? rate(ratio, i) : mass;
            }
        }
        return mass;
    }

    /** Mass with state(m, i)/state(m, i + 1) = ratio; by bisection where a backward part bends the logarithm. */
    private double rate(double ratio, int i) {
        double log = StrictMath.log(ratio) / (sum.time(i + 1) - sum.time(i));
        if (!sum.periodic()) {
            return log;
        }
        double low = 0;
        double high = LARGEST_MASS;
        for (int n = 0; n < 50; n++) {
            double middle = 0.5 * (low + high);
            if (sum.state(middle, i) > ratio * sum.state(middle, i + 1)) {
                high = middle;
            } else {
                low = middle;
            }
        }
        return 0.5 * (low + high);
    }
}
