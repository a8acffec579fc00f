package tracewright.fitters.goodness;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Arrays;
import java.util.List;
import java.util.Random;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.MethodSource;
import tracewright.fitters.GaussianBlocks;
import tracewright.fitters.covariance.CovarianceRule;
import tracewright.fitters.sampled.SampledVector;

/** What may not change a fit, and what may. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class FitLawsTest {

    private static final int P = 7;
    private static final double[] LINE = LinearFit.line(P);
    private static final SampledVector DATA = GaussianBlocks.jackknife(GaussianBlocks.draw(40, new double[] {3, 3.1, 3.2, 3.3, 3.4, 3.5, 3.6},
        new double[] {0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7}, 0.7, new Random(21)));
    /** Rounding times the condition of the weights, about 1e2, and of the minimum, whose residuals are a few percent of the data. */
    private static final double RELATIVE = 1e-12;

    static List<CovarianceRule> rules() {
        return List.of(new CovarianceRule.Full(), new CovarianceRule.Shrunk(), new CovarianceRule.Floored(0.1), new CovarianceRule.Diagonal());
    }

    private static LinearFit fit(SampledVector data, CovarianceRule rule, double[] design) {
        return LinearFit.of(data, rule, design, 3);
    }

    private static SampledVector map(double[] matrix) {
        return DATA.map(P, (in, out) -> {
            for (int i = 0; i < P; i++) {
                out[i] = 0;
                for (int j = 0; j < P; j++) {
                    out[i] += matrix[i * P + j] * in[j];
                }
            }
        });
    }

    private static double[] times(double[] matrix, double[] design) {
        int q = design.length / P;
        double[] out = new double[P * q];
        for (int i = 0; i < P; i++) {
            for (int j = 0; j < P; j++) {
                for (int c = 0; c < q; c++) {
                    out[i * q + c] += matrix[i * P + j] * design[j * q + c];
                }
            }
        }
        return out;
    }

    private static void sameFit(LinearFit a, LinearFit b, double relative) {
        assertEquals(a.chiSquared(), b.chiSquared(), relative * a.chiSquared());
        assertEquals(a.parameters().a(), b.parameters().a(), relative * Math.abs(a.parameters().a()));
        assertEquals(a.parameters().b(), b.parameters().b(), relative);
        assertArrayEquals(a.quality().covariance(), b.quality().covariance(), relative);
        assertArrayEquals(a.quality().lambda(), b.quality().lambda(), relative);
        assertEquals(a.quality().expected(), b.quality().expected(), relative * a.quality().expected());
    }

    @ParameterizedTest
    @MethodSource("rules")
    void given_points_in_another_order_then_the_fit_is_the_same(CovarianceRule rule) {
        int[] order = {3, 0, 6, 1, 5, 2, 4};
        double[] design = new double[2 * P];
        for (int i = 0; i < P; i++) {
            System.arraycopy(LINE, 2 * order[i], design, 2 * i, 2);
        }
        LinearFit before = fit(DATA, rule, LINE);
        LinearFit after = fit(DATA.select(order), rule, design);
        sameFit(before, after, RELATIVE);
        // Where p comes from a simulation, the same random numbers fall on other points.
        assertEquals(before.quality().pValue(), after.quality().pValue(), rule.readsBlocks() ? 0.02 : 1e-11);
        assertEquals(before.quality().noiseFactor(), after.quality().noiseFactor(), rule.weighsByInverse() ? 0 : 0.08);
    }

    @ParameterizedTest
    @MethodSource("rules")
    void given_a_constant_added_to_the_data_of_a_constant_then_only_the_constant_moves(CovarianceRule rule) {
        double[] ones = new double[P];
        Arrays.fill(ones, 1);
        double[] shift = new double[P];
        Arrays.fill(shift, 10);
        LinearFit before = fit(DATA, rule, ones);
        LinearFit after = fit(DATA.shiftedBy(shift, 1), rule, ones);
        assertEquals(before.chiSquared(), after.chiSquared(), 1e-11 * before.chiSquared());   // residuals are 1e-2 of the data now
        assertEquals(before.parameters().a() + 10, after.parameters().a(), 1e-12);
        assertEquals(before.quality().pValue(), after.quality().pValue(), 1e-11);
    }

    @ParameterizedTest
    @MethodSource("rules")
    void given_seven_times_the_data_then_errors_are_seven_times_larger_and_p_and_factor_the_same(CovarianceRule rule) {
        double[] seven = new double[P * P];
        for (int i = 0; i < P; i++) {
            seven[i * P + i] = 7;
        }
        LinearFit before = fit(DATA, rule, LINE);
        LinearFit after = fit(map(seven), rule, LINE);
        assertEquals(before.chiSquared(), after.chiSquared(), RELATIVE * before.chiSquared());
        assertEquals(7 * before.parameters().a(), after.parameters().a(), RELATIVE * 21);
        for (int i = 0; i < 4; i++) {
            assertEquals(49 * before.quality().covariance()[i], after.quality().covariance()[i], RELATIVE * 49);
        }
        assertEquals(before.quality().pValue(), after.quality().pValue(), 1e-11);
        assertEquals(before.quality().noiseFactor(), after.quality().noiseFactor(), 1e-11);
    }

    @ParameterizedTest
    @MethodSource("rules")
    void given_parameters_in_other_units_then_p_and_factor_are_the_same(CovarianceRule rule) {
        double[] design = LINE.clone();
        for (int i = 0; i < P; i++) {
            design[2 * i + 1] *= 1e6;
        }
        LinearFit before = fit(DATA, rule, LINE);
        LinearFit after = fit(DATA, rule, design);
        assertEquals(before.parameters().b(), 1e6 * after.parameters().b(), 1e-11);
        assertEquals(before.quality().covariance()[3], 1e12 * after.quality().covariance()[3], 1e-11);
        assertEquals(before.quality().pValue(), after.quality().pValue(), 1e-11);
        assertEquals(before.quality().noiseFactor(), after.quality().noiseFactor(), 1e-10);
    }

    @Test
    void given_an_invertible_mixture_of_the_points_then_the_full_fit_is_the_same_and_the_others_are_not() {
        double[] mixture = new Random(8).doubles(P * P, -1, 1).toArray();
        for (int i = 0; i < P; i++) {
            mixture[i * P + i] += 2;
        }
        for (CovarianceRule rule : rules()) {
            LinearFit before = fit(DATA, rule, LINE);
            LinearFit after = fit(map(mixture), rule, times(mixture, LINE));
            if (rule.weighsByInverse()) {
                sameFit(before, after, 1e-10);   // the mixture's condition, about 10, comes in twice
                assertEquals(before.quality().pValue(), after.quality().pValue(), 1e-10);
            } else {
                assertTrue(Math.abs(before.chiSquared() - after.chiSquared()) > 1e-3 * before.chiSquared(), rule.word());
                assertTrue(Math.abs(before.quality().expected() - after.quality().expected()) > 1e-3, rule.word());
            }
        }
    }

    @Test
    void given_correlated_points_and_the_diagonal_rule_then_the_variance_of_a_constant_is_that_of_a_weighted_mean() {
        // Constant through p points with the diagonal rule: H = w_i/sum w, variance sum_ij w_i S_ij w_j/(sum w)^2, by hand.
        double[] ones = new double[P];
        Arrays.fill(ones, 1);
        double[] s = DATA.covariance();
        double total = 0;
        double sandwich = 0;
        for (int i = 0; i < P; i++) {
            total += 1 / s[i * P + i];
            for (int j = 0; j < P; j++) {
                sandwich += s[i * P + j] / (s[i * P + i] * s[j * P + j]);
            }
        }
        double expected = sandwich / (total * total);
        assertEquals(expected, fit(DATA, new CovarianceRule.Diagonal(), ones).quality().covariance()[0], 1e-13 * expected);
        // The inverse of the sum of weights would be the variance of independent points only.
        assertTrue(expected > 1.3 / total);
    }
}
