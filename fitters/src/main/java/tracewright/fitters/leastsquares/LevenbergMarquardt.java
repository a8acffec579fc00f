package tracewright.fitters.leastsquares;

import java.util.Arrays;
import java.util.Locale;
import tracewright.fitters.linalg.Householder;
import tracewright.fitters.linalg.Symmetric;

/**
 * Minimum of |r(p)|^2 for whitened residuals r by damped Gauss-Newton steps: Levenberg 1944; Marquardt 1963; scaling of More,
 * Lect. Notes Math. 630 (1978) 105; damping by the gain ratio of a step. Converged when the predicted relative decrease is below
 * 1e-12 and no scaled step component exceeds 1e-10, both free of units; full Gauss-Newton steps by QR then polish the last digits.
 *
 * <p>A step comes from the scaled normal matrix where that is small and well conditioned, else from QR of the augmented system.
 * One object is the work space of one thread: descents may follow each other, and nothing is allocated inside them.
 */
public final class LevenbergMarquardt {

    private static final double SMALL_DECREASE = 1e-12;
    private static final double SMALL_STEP = 1e-10;
    private static final double EXACT = 1e-13;
    private static final double WARM_STEP = 1e-9;
    /** Promised relative decrease below which an actual one is lost in rounding and must not judge a step. */
    private static final double FLAT = 1e-9;
    /** Relative steps below this are rounding. */
    private static final double ROUNDING = 1e-13;
    /**
     * Full steps end when they stop shrinking, after two or three as a rule. Residuals that are large against the curvature make
     * them shrink by a constant factor only (0.67 for one certified set), and then some forty are needed to reach rounding.
     */
    private static final int POLISH_STEPS = 60;
    private static final double ACCEPTED_GAIN = 1e-4;
    private static final double LARGEST_DAMPING = 1e30;
    /** Limits within which the normal matrix loses no digit that a step needs. */
    private static final int MOST_NORMAL_COLUMNS = 10;
    private static final double LARGEST_NORMAL_CONDITION = 1e6;

    /** Whitened residuals and their derivatives. */
    @FunctionalInterface
    public interface Residuals {

        /**
         * @param p        parameters; read
         * @param r        [row]; overwritten
         * @param jacobian [row][parameter]; overwritten
         */
        void evaluate(double[] p, double[] r, double[] jacobian);
    }

    /** How column norms scale the damping. */
    public enum Scaling {
        /** Largest norm so far; starts cautiously. */
        GROWING(1e3),
        /** Current norm, or a tenth of the last scale if that is more; starts boldly. */
        FORGETTING(1),
        /**
         * As before, nearly undamped, from a start within a few errors of the minimum of whitened residuals, whose unit is an error:
         * where the sum of squares is flat to rounding it goes on undamped until a step moves no residual by more than 1e-9 of it.
         */
        WARM(1e-8);

        private final double firstDamping;

        Scaling(double firstDamping) {
            this.firstDamping = firstDamping;
        }

        double next(double before, double norm) {
            double floor = this == GROWING ? before : 0.1 * before;
            return Math.max(norm, floor);
        }
    }

    /** What came of a descent. */
    public sealed interface Descent {

        /** A minimum. */
        final class Converged implements Descent {
            private final double[] parameters;
            private final double chiSquared;
            private final int steps;

            Converged(double[] parameters, double chiSquared, int steps) {
                this.parameters = parameters;
                this.chiSquared = chiSquared;
                this.steps = steps;
            }

            public double[] parameters() {
                return parameters.clone();
            }

            public double chiSquared() {
                return chiSquared;
            }

            public int steps() {
                return steps;
            }
        }

        /** None, why, and how far it came. */
        final class Failed implements Descent {
            private final String reason;
            private final double[] last;
            private final double chiSquared;

            Failed(String reason, double[] last, double chiSquared) {
                this.reason = reason;
                this.last = last.clone();
                this.chiSquared = chiSquared;
            }

            public String reason() {
                return reason;
            }

            /** Where the descent ended, copy. */
            public double[] last() {
                return last.clone();
            }

            /** Sum of squares there; not finite if the model was not. */
            public double chiSquared() {
                return chiSquared;
            }
        }
    }

    private final Residuals residuals;
    private final int rows;
    private final int columns;
    private final double yNorm;
    private final double[] p;
    private final double[] next;
    private final double[] best;
    private final double[] scale;
    private final double[] step;
    private double[] r;
    private double[] jacobian;
    private double[] trial;          // of the point that is tried; changes places with r when it is accepted
    private double[] trialJacobian;
    private final double[] a;        // [rows + columns][columns], work space of the augmented system
    private final double[] b;
    private final double[] normal;   // [columns][columns] scaled, of the current point
    private final double[] gradient;
    private final double[] factor;
    private final double[] scaledStep;
    private double predicted;

    /**
     * @param yNorm norm of the whitened data, for which residuals of 1e-13 count as exact
     */
    public LevenbergMarquardt(Residuals residuals, int rows, int columns, double yNorm) {
        if (rows < columns || columns < 1) {
            throw new IllegalArgumentException(rows + " residuals cannot determine " + columns + " parameters");
        }
        this.residuals = residuals;
        this.rows = rows;
        this.columns = columns;
        this.yNorm = yNorm;
        this.p = new double[columns];
        this.next = new double[columns];
        this.best = new double[columns];
        this.scale = new double[columns];
        this.step = new double[columns];
        this.r = new double[rows];
        this.jacobian = new double[rows * columns];
        this.trial = new double[rows];
        this.trialJacobian = new double[rows * columns];
        this.a = new double[(rows + columns) * columns];
        this.b = new double[rows + columns];
        this.normal = new double[columns * columns];
        this.gradient = new double[columns];
        this.factor = new double[columns * columns];
        this.scaledStep = new double[columns];
    }

    /** Both ways of scaling from one start; the lower minimum. */
    public Descent cold(double[] start, int mostSteps) {
        Descent first = descend(start, Scaling.FORGETTING, mostSteps);
        Descent second = descend(start, Scaling.GROWING, mostSteps);
        if (first instanceof Descent.Converged x && (!(second instanceof Descent.Converged y) || x.chiSquared() <= y.chiSquared())) {
            return first;
        }
        return second;
    }

    /** One descent. */
    public Descent descend(double[] start, Scaling scaling, int mostSteps) {
        double q = begin(start, scaling);
        if (!Double.isFinite(q)) {
            return failed("the model is not finite at the start values ");
        }
        double damping = scaling.firstDamping;
        double growth = 2;
        for (int n = 1; n <= mostSteps && damping <= LARGEST_DAMPING; n++) {
            if (!step(damping)) {
                return singular();
            }
            if (scaling == Scaling.WARM && predicted <= FLAT * q) {
                return fullSteps(n);
            }
            if (settled(q)) {
                return polish(n);
            }
            double qNext = tryStep();
            double gain = (q - qNext) / predicted;
            if (gain > ACCEPTED_GAIN && Double.isFinite(qNext)) {
                accept(scaling);
                q = qNext;
                double x = 2 * gain - 1;
                damping *= Math.max(1.0 / 3, 1 - x * x * x);
                growth = 2;
            } else {
                damping *= growth;
                growth *= 2;
            }
        }
        return unsettled(damping, q, mostSteps);
    }

    /** Sets out from a start; its sum of squares. */
    private double begin(double[] start, Scaling scaling) {
        System.arraycopy(start, 0, p, 0, columns);
        residuals.evaluate(p, r, jacobian);
        Arrays.fill(scale, 0);
        rescale(scaling);
        return square(r);
    }

    /** Damping that grew without end at a sum of squares that is flat has only rounding left; polish decides. */
    private Descent unsettled(double damping, double q, int mostSteps) {
        if (damping <= LARGEST_DAMPING) {
            return failed("no minimum within " + mostSteps + " steps; last at ");
        }
        return predicted <= FLAT * q ? polish(mostSteps) : failed("no descent from ");
    }

    private boolean settled(double q) {
        return predicted <= SMALL_DECREASE * q && smallStep() || Math.sqrt(q) <= EXACT * yNorm;
    }

    private double tryStep() {
        for (int j = 0; j < columns; j++) {
            next[j] = p[j] + step[j];
        }
        residuals.evaluate(next, trial, trialJacobian);
        return square(trial);
    }

    private void accept(Scaling scaling) {
        System.arraycopy(next, 0, p, 0, columns);
        double[] t = r;
        r = trial;
        trial = t;
        t = jacobian;
        jacobian = trialJacobian;
        trialJacobian = t;
        rescale(scaling);
    }

    /** Scales and normal matrix of a new point. */
    private void rescale(Scaling scaling) {
        Arrays.fill(step, 0);
        for (int i = 0, at = 0; i < rows; i++) {
            for (int j = 0; j < columns; j++, at++) {
                step[j] += jacobian[at] * jacobian[at];
            }
        }
        for (int j = 0; j < columns; j++) {
            scale[j] = scaling.next(scale[j], Math.sqrt(step[j]));
            if (!(scale[j] > 0)) {
                scale[j] = 1;
            }
        }
        NormalKernels.form(jacobian, r, scale, rows, columns, normal, gradient);
    }

    /** Minimises |J s + r|^2 + damping |D s|^2 into {@code step}; sets what the linear model promises. */
    private boolean step(double damping) {
        if (columns <= MOST_NORMAL_COLUMNS
            && NormalKernels.solve(normal, gradient, damping, columns, LARGEST_NORMAL_CONDITION, factor, scaledStep)) {
            for (int j = 0; j < columns; j++) {
                step[j] = scaledStep[j] / scale[j];
            }
        } else if (!augmentedStep(damping)) {
            return false;
        }
        predicted = predictedDecrease(damping);
        return true;
    }

    private boolean augmentedStep(double damping) {
        System.arraycopy(jacobian, 0, a, 0, rows * columns);
        Arrays.fill(a, rows * columns, a.length, 0);
        double root = Math.sqrt(damping);
        for (int j = 0; j < columns; j++) {
            a[(rows + j) * columns + j] = root * scale[j];
        }
        for (int i = 0; i < rows; i++) {
            b[i] = -r[i];
        }
        Arrays.fill(b, rows, rows + columns, 0);
        return Householder.solve(a, b, step, rows + columns, columns);
    }

    /** |J s|^2 + 2 damping |D s|^2, the decrease that the linear model promises. */
    private double predictedDecrease(double damping) {
        double sum = 0;
        for (int i = 0; i < rows; i++) {
            double x = 0;
            for (int j = 0; j < columns; j++) {
                x += jacobian[i * columns + j] * step[j];
            }
            sum += x * x;
        }
        for (int j = 0; j < columns; j++) {
            double x = scale[j] * step[j];
            sum += 2 * damping * x * x;
        }
        return sum;
    }

    private boolean smallStep() {
        double norm = 0;
        for (int j = 0; j < columns; j++) {
            norm += scale[j] * p[j] * scale[j] * p[j];
        }
        return largestScaledStep() <= SMALL_STEP * Math.sqrt(norm);
    }

    private double largestScaledStep() {
        double most = 0;
        for (int j = 0; j < columns; j++) {
            most = Math.max(most, Math.abs(scale[j] * step[j]));
        }
        return most;
    }

    /** Undamped steps, not tested on the sum of squares, until they are small or stop shrinking. */
    private Descent fullSteps(int steps) {
        double before = Double.POSITIVE_INFINITY;
        for (int k = 0; k < POLISH_STEPS; k++) {
            if (!step(0)) {
                return singular();
            }
            double largest = largestScaledStep();
            if (!(largest < before)) {
                break;
            }
            before = largest;
            if (!Double.isFinite(tryStep())) {
                return failed("the model is not finite next to ");
            }
            accept(Scaling.WARM);
            if (largest < WARM_STEP) {
                break;
            }
        }
        return new Descent.Converged(p.clone(), square(r), steps);
    }

    /** Full Gauss-Newton steps while the largest relative step shrinks. */
    private Descent polish(int steps) {
        double before = Double.POSITIVE_INFINITY;
        System.arraycopy(p, 0, best, 0, columns);
        int n = steps;
        for (int k = 0; k < POLISH_STEPS; k++, n++) {
            if (k > 0) {
                residuals.evaluate(p, r, jacobian);
            }
            if (!fullStep()) {
                return singular();
            }
            double largest = largestRelativeStep();
            if (!(largest < before)) {
                break;
            }
            before = largest;
            for (int j = 0; j < columns; j++) {
                p[j] += step[j];
            }
            System.arraycopy(p, 0, best, 0, columns);
            if (largest < ROUNDING) {
                break;
            }
        }
        residuals.evaluate(best, r, jacobian);
        return new Descent.Converged(best.clone(), square(r), n);
    }

    /** Gauss-Newton step by QR of the Jacobian. */
    private boolean fullStep() {
        System.arraycopy(jacobian, 0, a, 0, rows * columns);
        for (int i = 0; i < rows; i++) {
            b[i] = -r[i];
        }
        return Householder.solve(a, b, step, rows, columns);
    }

    private double largestRelativeStep() {
        double largest = 0;
        for (int j = 0; j < columns; j++) {
            largest = Math.max(largest, Math.abs(step[j]) / Math.max(Math.abs(p[j]), Double.MIN_NORMAL));
        }
        return largest;
    }

    /** Names the combination of parameters that moves no residual: the last eigenvector of the normal matrix with unit columns. */
    private Descent singular() {
        Arrays.fill(scale, 0);
        rescale(Scaling.FORGETTING);
        for (int j = 0; j < columns; j++) {
            for (int k = 0; k < j; k++) {
                normal[k * columns + j] = normal[j * columns + k];
            }
        }
        if (!Double.isFinite(square(normal))) {
            return failed("the Jacobian is not finite at ");
        }
        Symmetric e = Symmetric.of(normal, columns);
        StringBuilder words = new StringBuilder();
        for (int j = 0; j < columns; j++) {
            double x = e.vector(j, columns - 1);
            if (Math.abs(x) > 0.1) {
                words.append(String.format(Locale.ROOT, "%s%.2f of parameter %d", words.length() == 0 ? "" : ", ", x, j));
            }
        }
        return failed("the data do not determine one combination (" + words + ", in units of their scales) at ");
    }

    /** Failure at the current point, which the message ends with, four digits each. */
    private Descent failed(String words) {
        String where = Arrays.stream(p).mapToObj(x -> String.format(Locale.ROOT, "%.4g", x)).toList().toString();
        return new Descent.Failed(words + where, p, square(r));
    }

    private static double square(double[] r) {
        double sum = 0;
        for (double x : r) {
            sum += x * x;
        }
        return sum;
    }
}
