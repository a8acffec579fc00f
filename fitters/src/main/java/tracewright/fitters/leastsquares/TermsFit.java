package tracewright.fitters.leastsquares;

import java.util.ArrayList;
import java.util.List;
import org.apache.commons.math3.distribution.ChiSquaredDistribution;
import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.CholeskyDecomposition;
import org.apache.commons.math3.linear.NonPositiveDefiniteMatrixException;
import org.apache.commons.math3.linear.QRDecomposition;
import org.apache.commons.math3.linear.RealMatrix;
import org.apache.commons.math3.linear.SingularMatrixException;
import tracewright.fitters.sampled.SampledNumber;

/**
 * Generalised linear least squares of a few numbers in a few terms where the data and the abscissas are all sampled numbers:
 * <pre>
 *  y_e = sum_j b_j X_ej,   Q(b) = r^T V(b)^-1 r,   r = y - X b,   V(b) = covariance of r
 *  minimum:  Xhat^T V^-1 (y - X b) = 0,   Xhat_j = X_j - cov(X_j, r) V^-1 r
 * </pre>
 * V counts the abscissas' share, with all correlations; Xhat are the abscissas moved to their most probable true values, so that
 * errors of the abscissas do not flatten slopes. The minimum is that of York, Can. J. Phys. 44 (1966) 1079 (the same as with the
 * true abscissas as further parameters); freezing V in the normal equations without moving the abscissas would not be.
 * Samples solve the same linear equations with V and Xhat of the centre. Degrees of freedom: data minus parameters; abscissas
 * add none. With as many parameters as data the solution is exact.
 */
public final class TermsFit {

    private static final int MOST_ROUNDS = 200;
    private static final double TOLERANCE = 1e-13;

    private final List<SampledNumber> parameters;
    private final double chiSquared;
    private final int degreesOfFreedom;
    private final double pValue;

    private TermsFit(List<SampledNumber> parameters, double chiSquared, int degreesOfFreedom) {
        this.parameters = List.copyOf(parameters);
        this.chiSquared = chiSquared;
        this.degreesOfFreedom = degreesOfFreedom;
        this.pValue = degreesOfFreedom == 0 ? 1 : 1 - new ChiSquaredDistribution(degreesOfFreedom).cumulativeProbability(chiSquared);
    }

    /**
     * @param name   for messages
     * @param y      data [e]
     * @param design X [e][j]; entries without error may be exact numbers
     * @throws IllegalArgumentException if there are fewer data than terms, the terms are linearly dependent, the residuals'
     *                                  covariance has no inverse, or the errors of the abscissas are so large that no minimum is found
     */
    public static TermsFit of(String name, List<SampledNumber> y, List<List<SampledNumber>> design) {
        int n = y.size();
        int terms = design.get(0).size();
        if (n < terms || design.size() != n) {
            throw new IllegalArgumentException(name + ": " + n + " numbers cannot determine " + terms + " coefficients");
        }
        List<SampledNumber> arguments = new ArrayList<>(y);
        design.forEach(arguments::addAll);
        SampledNumber[] all = arguments.toArray(SampledNumber[]::new);
        double[] central = arguments.stream().mapToDouble(SampledNumber::central).toArray();
        try {
            State state = n == terms ? new State(identity(n), identity(n), solve(central, n, terms, identity(n))) : minimum(name, all, central, n, terms);
            List<SampledNumber> parameters = SampledNumber.evaluateAll(terms, (in, out) ->
                System.arraycopy(solve(in, n, terms, state.instruments()), 0, out, 0, terms), all);
            double q = n == terms ? 0 : quadratic(state.inverse(), residuals(central, n, terms, state.b()));
            return new TermsFit(parameters, q, n - terms);
        } catch (SingularMatrixException e) {
            throw new IllegalArgumentException(name + ": the terms are linearly dependent on these " + n + " data", e);
        } catch (NonPositiveDefiniteMatrixException e) {
            throw new IllegalArgumentException(name + ": the covariance of the " + n + " residuals has no inverse", e);
        }
    }

    /** V^-1, the instruments Xhat^T V^-1 ([j][e]) and the coefficients. */
    private record State(RealMatrix inverse, RealMatrix instruments, double[] b) {
    }

    private static State minimum(String name, SampledNumber[] all, double[] central, int n, int terms) {
        RealMatrix c = covariance(all);
        double[] b = solve(central, n, terms, new Array2DRowRealMatrix(design(central, n, terms).transpose().getData()));
        for (int round = 0; round < MOST_ROUNDS; round++) {
            RealMatrix a = residualMap(n, terms, b);
            RealMatrix inverse = inverse(a.multiply(c).multiply(a.transpose()));
            double[] pull = inverse.operate(residuals(central, n, terms, b));
            RealMatrix moved = design(central, n, terms).subtract(shift(c.multiply(a.transpose()).operate(pull), n, terms));
            RealMatrix instruments = moved.transpose().multiply(inverse);
            double[] next = solve(central, n, terms, instruments);
            double change = 0;
            for (int j = 0; j < terms; j++) {
                change = Math.max(change, Math.abs(next[j] - b[j]) / Math.max(Math.abs(next[j]), Double.MIN_NORMAL));
            }
            b = next;
            if (change < TOLERANCE) {
                return new State(inverse, instruments, b);
            }
        }
        throw new IllegalArgumentException(name + ": no minimum after " + MOST_ROUNDS + " rounds; the errors of the abscissas are too large for these data");
    }

    /** A with r = A (y, X): r_e = y_e - sum_j b_j X_ej. */
    private static RealMatrix residualMap(int n, int terms, double[] b) {
        RealMatrix a = new Array2DRowRealMatrix(n, n * (terms + 1));
        for (int e = 0; e < n; e++) {
            a.setEntry(e, e, 1);
            for (int j = 0; j < terms; j++) {
                a.setEntry(e, n + e * terms + j, -b[j]);
            }
        }
        return a;
    }

    /** cov(X_ej, r) V^-1 r as a matrix [e][j], out of the same for all arguments. */
    private static RealMatrix shift(double[] forAll, int n, int terms) {
        RealMatrix shift = new Array2DRowRealMatrix(n, terms);
        for (int e = 0; e < n; e++) {
            for (int j = 0; j < terms; j++) {
                shift.setEntry(e, j, forAll[n + e * terms + j]);
            }
        }
        return shift;
    }

    private static RealMatrix design(double[] row, int n, int terms) {
        RealMatrix x = new Array2DRowRealMatrix(n, terms);
        for (int e = 0; e < n; e++) {
            for (int j = 0; j < terms; j++) {
                x.setEntry(e, j, row[n + e * terms + j]);
            }
        }
        return x;
    }

    /** Solution b of Z (y - X b) = 0 for one row [y..., X row-major...]. */
    private static double[] solve(double[] row, int n, int terms, RealMatrix z) {
        double[] y = new double[n];
        System.arraycopy(row, 0, y, 0, n);
        RealMatrix x = z.multiply(design(row, n, terms));
        double[] scale = new double[terms];
        for (int j = 0; j < terms; j++) {
            scale[j] = 1 / x.getColumnVector(j).getNorm();
            for (int i = 0; i < x.getRowDimension(); i++) {
                x.multiplyEntry(i, j, scale[j]);
            }
        }
        double[] b = new QRDecomposition(x, 1e-12).getSolver().solve(new Array2DRowRealMatrix(z.operate(y))).getColumn(0);
        for (int j = 0; j < terms; j++) {
            b[j] *= scale[j];
        }
        return b;
    }

    private static double[] residuals(double[] row, int n, int terms, double[] b) {
        double[] r = new double[n];
        for (int e = 0; e < n; e++) {
            r[e] = row[e];
            for (int j = 0; j < terms; j++) {
                r[e] -= b[j] * row[n + e * terms + j];
            }
        }
        return r;
    }

    private static RealMatrix covariance(SampledNumber[] all) {
        RealMatrix c = new Array2DRowRealMatrix(all.length, all.length);
        for (int i = 0; i < all.length; i++) {
            for (int j = 0; j <= i; j++) {
                double x = SampledNumber.covariance(all[i], all[j]);
                c.setEntry(i, j, x);
                c.setEntry(j, i, x);
            }
        }
        return c;
    }

    /** Inverse of a covariance, taken of its correlation matrix. */
    private static RealMatrix inverse(RealMatrix v) {
        int n = v.getRowDimension();
        double[] error = new double[n];
        for (int e = 0; e < n; e++) {
            error[e] = Math.sqrt(v.getEntry(e, e));
        }
        RealMatrix correlation = v.copy();
        for (int e = 0; e < n; e++) {
            for (int f = 0; f < n; f++) {
                correlation.setEntry(e, f, v.getEntry(e, f) / (error[e] * error[f]));
            }
        }
        RealMatrix inverse = new CholeskyDecomposition(correlation, 1e-9, 1e-13).getSolver().getInverse();
        for (int e = 0; e < n; e++) {
            for (int f = 0; f < n; f++) {
                inverse.multiplyEntry(e, f, 1 / (error[e] * error[f]));
            }
        }
        return inverse;
    }

    private static double quadratic(RealMatrix inverse, double[] r) {
        double[] w = inverse.operate(r);
        double q = 0;
        for (int e = 0; e < r.length; e++) {
            q += r[e] * w[e];
        }
        return q;
    }

    private static RealMatrix identity(int n) {
        RealMatrix one = new Array2DRowRealMatrix(n, n);
        for (int i = 0; i < n; i++) {
            one.setEntry(i, i, 1);
        }
        return one;
    }

    /** Coefficients b_j, in the order of the terms. */
    public List<SampledNumber> parameters() {
        return parameters;
    }

    public double chiSquared() {
        return chiSquared;
    }

    public int degreesOfFreedom() {
        return degreesOfFreedom;
    }

    /** Chance of a larger chi-squared for a true model (chi-squared distribution; one without degrees of freedom, where nothing is tested). */
    public double pValue() {
        return pValue;
    }
}
