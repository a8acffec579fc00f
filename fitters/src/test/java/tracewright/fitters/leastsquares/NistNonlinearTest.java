package tracewright.fitters.leastsquares;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertInstanceOf;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.math.BigDecimal;
import java.math.MathContext;
import java.util.Arrays;
import java.util.Map;
import java.util.stream.Stream;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.Arguments;
import org.junit.jupiter.params.provider.MethodSource;
import org.junit.jupiter.params.provider.ValueSource;
import tools.jackson.databind.JsonNode;
import tracewright.fitters.ReferenceData;
import tracewright.fitters.leastsquares.LevenbergMarquardt.Descent;

/**
 * Nonlinear regression of the NIST/ITL Statistical Reference Datasets (StRD): data, two starts and certified values with 11
 * digits, from the files in {@code nist/}.
 */
@DisplayNameGeneration(ReplaceUnderscores.class)
class NistNonlinearTest {

    /** y at a row of abscissas. */
    private interface Curve {
        Dual at(Dual[] b, double[] x);
    }

    private static final Curve GAUSS = (b, x) -> b[1].times(-x[0]).exp().times(b[0])
        .plus(bell(b[2], b[3], b[4], x[0])).plus(bell(b[5], b[6], b[7], x[0]));
    private static final Curve CUBICS = (b, x) -> cubic(b[0], b[1], b[2], b[3], x[0])
        .over(cubic(constantLike(b[0], 1), b[4], b[5], b[6], x[0]));
    private static final Curve LANCZOS = (b, x) -> b[1].times(-x[0]).exp().times(b[0])
        .plus(b[3].times(-x[0]).exp().times(b[2])).plus(b[5].times(-x[0]).exp().times(b[4]));
    private static final Curve SATURATION = (b, x) -> b[0].times(b[1].times(-x[0]).exp().negated().plus(1));

    private static final Map<String, Curve> CURVES = Map.ofEntries(
        Map.entry("Bennett5", (b, x) -> b[0].times(b[1].plus(x[0]).power(constantLike(b[2], -1).over(b[2])))),
        Map.entry("BoxBOD", SATURATION),
        Map.entry("Chwirut2", (b, x) -> b[0].times(-x[0]).exp().over(b[1].plus(b[2].times(x[0])))),
        Map.entry("DanWood", (b, x) -> b[0].times(b[1].exponentOf(x[0]))),
        Map.entry("Eckerle4", (b, x) -> b[0].over(b[1]).times(b[2].negated().plus(x[0]).over(b[1]).squared().times(-0.5).exp())),
        Map.entry("Gauss1", GAUSS),
        Map.entry("Gauss2", GAUSS),
        Map.entry("Gauss3", GAUSS),
        Map.entry("Hahn1", CUBICS),
        Map.entry("Lanczos1", LANCZOS),
        Map.entry("Lanczos2", LANCZOS),
        Map.entry("Lanczos3", LANCZOS),
        Map.entry("MGH09", (b, x) -> b[0].times(b[1].times(x[0]).plus(x[0] * x[0])).over(b[2].times(x[0]).plus(x[0] * x[0]).plus(b[3]))),
        Map.entry("MGH10", (b, x) -> b[0].times(b[1].over(b[2].plus(x[0])).exp())),
        Map.entry("MGH17", (b, x) -> b[0].plus(b[1].times(b[3].times(-x[0]).exp())).plus(b[2].times(b[4].times(-x[0]).exp()))),
        Map.entry("Misra1a", SATURATION),
        Map.entry("Misra1b", (b, x) -> b[0].times(b[1].times(x[0] / 2).plus(1).power(-2).negated().plus(1))),
        Map.entry("Misra1c", (b, x) -> b[0].times(b[1].times(2 * x[0]).plus(1).power(-0.5).negated().plus(1))),
        Map.entry("Nelson", (b, x) -> b[0].minus(b[1].times(x[0]).times(b[2].times(-x[1]).exp()))),
        Map.entry("Rat43", (b, x) -> b[0].over(b[1].minus(b[2].times(x[0])).exp().plus(1).power(constantLike(b[3], 1).over(b[3])))),
        Map.entry("Roszman1", (b, x) -> b[0].minus(b[1].times(x[0])).minus(b[2].over(b[3].negated().plus(x[0])).arctan().times(1 / Math.PI))),
        Map.entry("Thurber", CUBICS));

    /**
     * Nine of the eleven certified digits for parameters, deviations and residual sum; 10.3 is the least seen. MGH09 and Thurber
     * reach them only if full steps at the end go on while they shrink, there by a constant factor.
     */
    @ParameterizedTest(name = "{0} from start {1}")
    @MethodSource("sets")
    void given_a_certified_set_and_a_published_start_when_fitted_cold_then_the_certified_digits_come_out(String name, int start) {
        JsonNode set = ReferenceData.read("nist/" + name);
        Problem problem = new Problem(set, CURVES.get(name));
        Descent.Converged fit = assertInstanceOf(Descent.Converged.class,
            problem.machine().cold(ReferenceData.doubles(set.get("start" + start)), 2000));
        requireCertified(set, problem, fit.parameters(), fit.chiSquared(), 9, 9);
    }

    static Stream<Arguments> sets() {
        return CURVES.keySet().stream().sorted().flatMap(name -> Stream.of(Arguments.of(name, 1), Arguments.of(name, 2)))
            .filter(a -> !a.get()[0].equals("Lanczos1") && !(a.get()[0].equals("MGH10") && a.get()[1].equals(1)));
    }

    /**
     * Residuals of 8e-14 on values up to 2.5: rounding the decimal data and the model to double moves each by some 3e-16 and leaves
     * the residual sum uncertain by 2 |r| 3e-16 = 2e-28, 1.6e-3 of it; the fit's own sum is held to three of these. The sum at
     * the fitted parameters, from the decimal data with exponentials of 80 digits, is stationary there and keeps six digits
     * (5.9 and 7.2 seen, three asked for); five are demanded, of the deviations too.
     */
    @ParameterizedTest
    @ValueSource(ints = {1, 2})
    void given_data_exact_to_rounding_when_fitted_then_parameters_keep_nine_digits_and_the_residual_sum_five(int start) {
        JsonNode set = ReferenceData.read("nist/Lanczos1");
        Problem problem = new Problem(set, LANCZOS);
        Descent.Converged fit = assertInstanceOf(Descent.Converged.class,
            problem.machine().cold(ReferenceData.doubles(set.get("start" + start)), 2000));
        double certified = set.get("residual_sum_of_squares").asDouble();
        assertEquals(certified, fit.chiSquared(), 3 * 1.6e-3 * certified);
        requireCertified(set, problem, fit.parameters(), exactSum(fit.parameters(), set.get("data")), 9, 5);
    }

    /** Residual sum of the decimal data, whose digits a double keeps and its binary value does not. */
    private static double exactSum(double[] p, JsonNode data) {
        BigDecimal sum = BigDecimal.ZERO;
        for (JsonNode row : data) {
            BigDecimal r = BigDecimal.valueOf(row.get(0).asDouble()).negate();
            for (int n = 0; n < 6; n += 2) {
                r = r.add(new BigDecimal(p[n]).multiply(exponential(new BigDecimal(-p[n + 1]).multiply(BigDecimal.valueOf(row.get(1).asDouble())))));
            }
            sum = sum.add(r.multiply(r));
        }
        return sum.doubleValue();
    }

    /** exp(x) for |x| &lt; 10 by its series; 120 terms leave less than 1e-70. */
    private static BigDecimal exponential(BigDecimal x) {
        MathContext digits = new MathContext(80);
        BigDecimal sum = BigDecimal.ZERO;
        BigDecimal term = BigDecimal.ONE;
        for (int n = 1; n <= 120; n++) {
            sum = sum.add(term);
            term = term.multiply(x, digits).divide(BigDecimal.valueOf(n), digits);
        }
        return sum;
    }

    /** The far start of MGH10 leads down a valley of five thousand steps, which has gone once the linear parameter is eliminated. */
    @Test
    void given_the_far_start_of_a_valley_when_the_linear_parameter_is_eliminated_then_the_certified_digits_come_out() {
        JsonNode set = ReferenceData.read("nist/MGH10");
        Problem problem = new Problem(set, CURVES.get("MGH10"));
        double[] start = ReferenceData.doubles(set.get("start1"));
        double[] linv = new double[problem.rows * problem.rows];
        for (int i = 0; i < problem.rows; i++) {
            linv[i * problem.rows + i] = 1;
        }
        VariableProjection projection = new VariableProjection(new Valley(problem.x), problem.y, linv, VariableProjection.Jacobian.FULL);
        Descent.Converged fit = assertInstanceOf(Descent.Converged.class, projection.cold(new double[] {start[1], start[2]}, 200));
        double[] theta = fit.parameters();
        double[] p = {projection.amplitudes(theta).orElseThrow()[0], theta[0], theta[1]};
        requireCertified(set, problem, p, fit.chiSquared(), 9, 9);
    }

    /** exp(b2/(x + b3)), the curve of MGH10 without its factor. */
    private record Valley(double[][] x) implements SeparableModel {
        @Override
        public int points() {
            return x.length;
        }

        @Override
        public int nonlinear() {
            return 2;
        }

        @Override
        public int linear() {
            return 1;
        }

        @Override
        public void evaluate(double[] theta, double[] basis, double[] derivatives) {
            for (int i = 0; i < x.length; i++) {
                double d = x[i][0] + theta[1];
                basis[i] = StrictMath.exp(theta[0] / d);
                derivatives[i] = basis[i] / d;
                derivatives[x.length + i] = -basis[i] * theta[0] / (d * d);
            }
        }
    }

    private static void requireCertified(JsonNode set, Problem problem, double[] p, double sum, double digits, double digitsOfSum) {
        String name = set.get("name").asString();
        requireDigits(digits, ReferenceData.doubles(set.get("certified")), p, name);
        requireDigits(digitsOfSum, new double[] {set.get("residual_sum_of_squares").asDouble()}, new double[] {sum}, name + " sum");
        requireDigits(digitsOfSum, ReferenceData.doubles(set.get("standard_deviation")), problem.deviations(p, sum), name + " deviations");
    }

    /** Digits in agreement: -log10 of the relative difference. */
    private static void requireDigits(double digits, double[] expected, double[] found, String what) {
        for (int j = 0; j < expected.length; j++) {
            double off = Math.abs(found[j] - expected[j]) / Math.abs(expected[j]);
            assertTrue(off <= StrictMath.pow(10, -digits), what + " " + j + ": " + found[j] + " for " + expected[j] + ", relative " + off);
        }
    }

    private static Dual constantLike(Dual b, double value) {
        return b.times(0).plus(value);
    }

    private static Dual bell(Dual height, Dual centre, Dual width, double x) {
        return centre.negated().plus(x).over(width).squared().negated().exp().times(height);
    }

    private static Dual cubic(Dual a, Dual b, Dual c, Dual d, double x) {
        return a.plus(b.times(x)).plus(c.times(x * x)).plus(d.times(x * x * x));
    }

    /** A set as a least-squares problem with unit weights. */
    private static final class Problem {
        private final Curve curve;
        private final double[][] x;
        private final double[] y;
        private final int rows;
        private final int columns;

        Problem(JsonNode set, Curve curve) {
            this.curve = curve;
            this.rows = set.get("data").size();
            this.columns = set.get("certified").size();
            this.x = new double[rows][];
            this.y = new double[rows];
            boolean logarithm = set.get("model").asString().startsWith("log[y]");
            for (int i = 0; i < rows; i++) {
                double[] row = ReferenceData.doubles(set.get("data").get(i));
                y[i] = logarithm ? StrictMath.log(row[0]) : row[0];
                x[i] = Arrays.copyOfRange(row, 1, row.length);
            }
        }

        LevenbergMarquardt machine() {
            double norm = 0;
            for (double v : y) {
                norm += v * v;
            }
            return new LevenbergMarquardt(this::residuals, rows, columns, Math.sqrt(norm));
        }

        private void residuals(double[] p, double[] r, double[] jacobian) {
            Dual[] b = new Dual[columns];
            for (int j = 0; j < columns; j++) {
                b[j] = Dual.parameter(p, j);
            }
            for (int i = 0; i < rows; i++) {
                Dual f = curve.at(b, x[i]);
                r[i] = f.value() - y[i];
                for (int j = 0; j < columns; j++) {
                    jacobian[i * columns + j] = f.derivative(j);
                }
            }
        }

        /** sqrt(RSS/(n - p) (J^T J)^-1_jj), the inverse taken with columns of unit norm. */
        double[] deviations(double[] p, double sum) {
            double[] jacobian = new double[rows * columns];
            residuals(p, new double[rows], jacobian);
            double[] inverse = LinearFit.inverseNormal(jacobian, rows, columns).orElseThrow();
            double[] s = new double[columns];
            for (int j = 0; j < columns; j++) {
                s[j] = Math.sqrt(sum / (rows - columns) * inverse[j * columns + j]);
            }
            return s;
        }
    }
}
