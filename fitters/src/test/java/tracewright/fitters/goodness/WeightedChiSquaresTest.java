package tracewright.fitters.goodness;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;
import static tracewright.fitters.ReferenceData.doubles;

import java.util.Arrays;
import java.util.Random;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import tools.jackson.databind.JsonNode;
import tracewright.fitters.ReferenceData;

@DisplayNameGeneration(ReplaceUnderscores.class)
class WeightedChiSquaresTest {

    /**
     * weighted_chi2.json by Imhof's integral with 25 digits, weighted_chi2_more.json by a contour integral with 34 digits; their doubles
     * carry 16 digits. The rule stops at a change of 1e-13.
     */
    @ParameterizedTest
    @ValueSource(strings = {"weighted_chi2", "weighted_chi2_more"})
    void given_weights_of_the_reference_then_the_tail_has_twelve_digits(String file) {
        for (JsonNode c : ReferenceData.read(file).get("cases")) {
            double p = c.get("p").asDouble();
            assertEquals(p, WeightedChiSquares.upperTail(c.get("q").asDouble(), doubles(c.get("weights"))), 1e-12 * p, c.toString());
        }
    }

    @ParameterizedTest
    @ValueSource(ints = {1, 2, 3, 10, 41, 200})
    void given_equal_weights_then_both_tails_are_those_of_chi_squared(int f) {
        double[] lambda = new double[f];
        Arrays.fill(lambda, 2.5);
        for (double ratio : new double[] {1e-6, 0.02, 0.5, 0.999, 1, 1.001, 1.5, 3, 6}) {
            double p = Tails.chiSquared(ratio * f, f);
            // The library's own tail is good to about 1e-12 relative; far below the mean both are one.
            assertEquals(p, WeightedChiSquares.upperTail(2.5 * ratio * f, lambda), 2e-12 * p + 1e-300, f + " at " + ratio);
        }
    }

    @Test
    void given_two_equal_weights_then_the_tails_are_exponentials() {
        double[] lambda = {1, 1};
        for (double q : new double[] {1e-10, 1e-3, 1, 2, 3, 100, 1000}) {
            double upper = StrictMath.exp(-q / 2);
            double lower = -StrictMath.expm1(-q / 2);
            assertEquals(upper, WeightedChiSquares.upperTail(q, lambda), 1e-12 * upper);
            assertEquals(lower, WeightedChiSquares.lowerTail(q, lambda), 1e-12 * lower);
        }
    }

    @Test
    void given_weights_twice_each_then_the_tail_is_the_sum_of_exponentials() {
        double[] distinct = {3, 1, 0.4, 0.05};
        double[] lambda = {3, 3, 1, 1, 0.4, 0.4, 0.05, 0.05};
        for (double q : new double[] {0.01, 0.5, 3, 8.9, 20, 90}) {
            // Partial fractions: P = sum_i exp(-q/(2 a_i)) prod_(j != i) a_i/(a_i - a_j).
            double p = 0;
            double size = 0;
            for (double a : distinct) {
                double term = StrictMath.exp(-q / (2 * a));
                for (double b : distinct) {
                    term *= a == b ? 1 : a / (a - b);
                }
                p += term;
                size = Math.max(size, Math.abs(term));
            }
            assertEquals(p, WeightedChiSquares.upperTail(q, lambda), 1e-12 * size);
        }
    }

    @Test
    void given_any_weights_then_the_tails_add_to_one_and_fall_and_do_not_depend_on_order_or_unit() {
        double[] lambda = new Random(4).doubles(25, 1e-4, 3).toArray();
        double[] other = lambda.clone();
        for (int i = 0; i < 25; i++) {
            other[i] = 7 * lambda[24 - i];
        }
        double before = 1;
        for (double q = 1; q < 200; q *= 1.3) {
            double p = WeightedChiSquares.upperTail(q, lambda);
            assertEquals(1, p + WeightedChiSquares.lowerTail(q, lambda), 1e-15);
            assertEquals(p, WeightedChiSquares.upperTail(7 * q, other), 1e-12 * p);
            assertTrue(p <= before);
            before = p;
        }
        assertTrue(before < 1e-6);
    }

    @Test
    void given_a_sum_that_is_not_positive_or_infinite_then_the_tail_is_one_or_zero() {
        double[] lambda = {1, 2};
        assertEquals(1, WeightedChiSquares.upperTail(0, lambda));
        assertEquals(1, WeightedChiSquares.upperTail(-3, lambda));
        assertEquals(0, WeightedChiSquares.lowerTail(0, lambda));
        assertEquals(0, WeightedChiSquares.upperTail(Double.POSITIVE_INFINITY, lambda));
        assertEquals(1, WeightedChiSquares.lowerTail(Double.POSITIVE_INFINITY, lambda));
        assertEquals(0, WeightedChiSquares.upperTail(1e6, lambda));
    }

    @Test
    void given_no_weight_or_one_that_is_not_positive_or_a_sum_that_is_no_number_then_it_is_refused() {
        assertThrows(IllegalArgumentException.class, () -> WeightedChiSquares.upperTail(1, new double[0]));
        assertThrows(IllegalArgumentException.class, () -> WeightedChiSquares.upperTail(1, new double[] {1, 0}));
        assertThrows(IllegalArgumentException.class, () -> WeightedChiSquares.upperTail(1, new double[] {Double.NaN}));
        assertThrows(IllegalArgumentException.class, () -> WeightedChiSquares.upperTail(Double.NaN, new double[] {1}));
    }
}
