package tracewright.fitters.covariance;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertInstanceOf;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Arrays;
import java.util.List;
import java.util.Random;
import java.util.stream.IntStream;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.MethodSource;
import tracewright.fitters.GaussianBlocks;
import tracewright.fitters.linalg.Symmetric;
import tracewright.fitters.linalg.Triangular;
import tracewright.fitters.sampled.SampleGroup;
import tracewright.fitters.sampled.SampledVector;

@DisplayNameGeneration(ReplaceUnderscores.class)
class WeightingTest {

    private static final int POINTS = 6;
    private static final double[] TRUTH = new double[POINTS];
    private static final double[] SCALE = {1e-4, 1e-2, 1, 1, 1e2, 1e4};
    private static final double[][] BLOCKS = GaussianBlocks.draw(30, TRUTH, SCALE, 0.6, new Random(11));
    private static final SampledVector DATA = GaussianBlocks.jackknife(BLOCKS);

    static List<CovarianceRule> rules() {
        return List.of(new CovarianceRule.Full(), new CovarianceRule.Shrunk(), new CovarianceRule.Floored(0.1), new CovarianceRule.Diagonal());
    }

    static Weighting usable(WeightingOutcome outcome) {
        return assertInstanceOf(WeightingOutcome.Usable.class, outcome).weighting();
    }

    private static WeightingOutcome.Refused refused(WeightingOutcome outcome) {
        return assertInstanceOf(WeightingOutcome.Refused.class, outcome);
    }

    private static void says(String text, String... words) {
        for (String word : words) {
            assertTrue(text.contains(word), () -> "'" + word + "' is missing in: " + text);
        }
    }

    private static double[] correlation(SampledVector data) {
        int n = data.length();
        double[] s = data.covariance();
        double[] r = s.clone();
        for (int i = 0; i < n * n; i++) {
            r[i] /= Math.sqrt(s[i / n * (n + 1)] * s[i % n * (n + 1)]);
        }
        return r;
    }

    /** R' = (s^-1 Linv^-1)(s^-1 Linv^-1)^T, recovered from the weight. */
    private static double[] regularized(Weighting w) {
        int n = w.points();
        double[] l = Triangular.inverse(w.linv(), n);
        for (int i = 0; i < n * n; i++) {
            l[i] /= w.errors()[i / n];
        }
        return Triangular.timesTranspose(l, n);
    }

    @ParameterizedTest
    @MethodSource("rules")
    void given_any_rule_then_covariance_errors_and_blocks_are_those_of_the_data(CovarianceRule rule) {
        Weighting w = usable(Weighting.of(DATA, rule));
        assertArrayEquals(DATA.covariance(), w.covariance());
        assertArrayEquals(DATA.errors(), w.errors(), 1e-10);
        assertEquals(30, w.blocks());
        assertEquals(POINTS, w.points());
        assertEquals(rule, w.rule());
    }

    @Test
    void given_the_full_rule_then_the_weight_is_the_inverse_over_eight_orders_of_magnitude() {
        // Recovered to rounding times the condition of the correlations, about 20.
        assertArrayEquals(correlation(DATA), regularized(usable(Weighting.of(DATA, new CovarianceRule.Full()))), 1e-13);
    }

    @Test
    void given_the_diagonal_rule_then_the_weights_are_one_over_the_errors() {
        Weighting w = usable(Weighting.of(DATA, new CovarianceRule.Diagonal()));
        for (int i = 0; i < POINTS; i++) {
            for (int j = 0; j < POINTS; j++) {
                assertEquals(i == j ? 1 : 0, w.linv()[i * POINTS + j] * w.errors()[i], 1e-15);
            }
        }
    }

    @Test
    void given_the_shrunk_rule_then_correlations_are_multiplied_by_one_minus_the_intensity() {
        Weighting w = usable(Weighting.of(DATA, new CovarianceRule.Shrunk()));
        assertTrue(w.shrinkage() > 0 && w.shrinkage() < 1);
        double[] r = correlation(DATA);
        for (int i = 0; i < r.length; i++) {
            r[i] *= i / POINTS == i % POINTS ? 1 : 1 - w.shrinkage();
        }
        assertArrayEquals(r, regularized(w), 1e-13);
    }

    @Test
    void given_the_floored_rule_then_low_eigenvalues_are_raised_and_the_others_stay() {
        Weighting w = usable(Weighting.of(DATA, new CovarianceRule.Floored(0.3)));
        double[] before = Symmetric.of(correlation(DATA), POINTS).values();
        double[] after = Symmetric.of(regularized(w), POINTS).values();
        double floor = 0.3 * before[0];
        assertArrayEquals(Arrays.stream(before).map(x -> Math.max(x, floor)).toArray(), after, 1e-13);
        assertEquals(Arrays.stream(before).filter(x -> x < floor).count(), w.raisedEigenvalues());
        assertTrue(w.raisedEigenvalues() > 0 && w.raisedEigenvalues() < POINTS);
        // The diagonal is not put back to one: its sum is that of the eigenvalues.
        double trace = IntStream.range(0, POINTS).mapToDouble(i -> regularized(w)[i * POINTS + i]).sum();
        assertEquals(Arrays.stream(after).sum(), trace, 1e-13);
        assertTrue(trace > POINTS + 0.01);
    }

    @ParameterizedTest
    @MethodSource("rules")
    void given_a_point_in_other_units_then_only_its_column_of_the_weight_changes(CovarianceRule rule) {
        Weighting before = usable(Weighting.of(DATA, rule));
        Weighting after = usable(Weighting.of(DATA.map(POINTS, (in, out) -> {
            System.arraycopy(in, 0, out, 0, POINTS);
            out[2] *= 7;
        }), rule));
        assertEquals(before.shrinkage(), after.shrinkage(), 1e-13);
        assertEquals(before.raisedEigenvalues(), after.raisedEigenvalues());
        for (int i = 0; i < POINTS * POINTS; i++) {
            double x = before.linv()[i];
            assertEquals(x, after.linv()[i] * (i % POINTS == 2 ? 7 : 1), 1e-12 * Math.abs(x) + 1e-13 / before.errors()[i % POINTS]);
        }
    }

    @Test
    void given_blocks_of_unequal_size_then_their_scaled_deviations_make_up_the_covariance() {
        SampledVector data = GaussianBlocks.jackknife(BLOCKS, IntStream.range(0, 30).map(k -> 2 + k % 7).toArray());
        double[] x = BlockDeviations.of(data).orElseThrow();
        double[] s = data.covariance();
        for (int i = 0; i < POINTS * POINTS; i++) {
            double sum = 0;
            for (int k = 0; k < 30; k++) {
                sum += x[k * POINTS + i / POINTS] * x[k * POINTS + i % POINTS];
            }
            assertEquals(s[i], sum, 1e-12 * data.errors()[i / POINTS] * data.errors()[i % POINTS]);
        }
        usable(Weighting.of(data, new CovarianceRule.Shrunk()));
    }

    @Test
    void given_bootstrap_draws_of_a_mean_then_the_intensity_is_that_of_the_jackknife() {
        int[] sizes = IntStream.range(0, 30).map(k -> 2 + k % 3).toArray();
        SampledVector jackknife = GaussianBlocks.jackknife(BLOCKS, sizes);
        SampledVector bootstrap = GaussianBlocks.bootstrap(BLOCKS, sizes, 200, new Random(2));
        double expected = usable(Weighting.of(jackknife, new CovarianceRule.Shrunk())).shrinkage();
        // A mean is linear in the shares, so the regression on them is exact; its condition takes some digits.
        assertEquals(expected, usable(Weighting.of(bootstrap, new CovarianceRule.Shrunk())).shrinkage(), 1e-9);
    }

    @Test
    void given_fewer_draws_than_three_per_block_when_shrunk_then_it_is_refused_and_the_other_rules_are_not() {
        SampledVector few = GaussianBlocks.bootstrap(BLOCKS, IntStream.range(0, 30).map(k -> 1).toArray(), 60, new Random(2));
        WeightingOutcome.Refused r = refused(Weighting.of(few, new CovarianceRule.Shrunk()));
        says(r.reason(), "shrunk", "30 blocks", "60 bootstrap draws of A");
        says(r.advice(), "three bootstrap samples per block", "floored");
        usable(Weighting.of(few, new CovarianceRule.Full()));
    }

    @Test
    void given_more_points_than_blocks_then_the_full_covariance_is_refused_with_its_rank_and_the_others_are_not() {
        SampledVector data = GaussianBlocks.jackknife(Arrays.copyOf(BLOCKS, 5));
        WeightingOutcome.Refused r = refused(Weighting.of(data, new CovarianceRule.Full()));
        says(r.reason(), "covariance 6x6 (full) from 5 blocks", "rank <= 4", "no inverse", "point 4");
        says(r.advice(), "fewer points", "diagonal or floored", "shrunk", "blocks");
        for (CovarianceRule rule : rules().subList(1, 4)) {
            usable(Weighting.of(data, rule));
        }
    }

    @Test
    void given_two_points_correlated_to_thirteen_digits_then_the_condition_number_refuses_them() {
        double[] almost = {4, 4 * (1 - 1e-13), 4 * (1 - 1e-13), 4};
        // Condition (1 + r)/(1 - r) = 2e13; at 1e-11 it is 2e11 and passes.
        says(refused(Weighting.of(almost, 2, new CovarianceRule.Full(), 50, new double[0])).reason(), "condition number 2.0e+13", "at most 1e+12");
        usable(Weighting.of(new double[] {4, 4 * (1 - 1e-11), 4 * (1 - 1e-11), 4}, 2, new CovarianceRule.Full(), 50, new double[0]));
        usable(Weighting.of(almost, 2, new CovarianceRule.Floored(0.01), 50, new double[0]));
    }

    @ParameterizedTest
    @MethodSource("rules")
    void given_a_point_that_does_not_vary_or_is_not_a_number_then_it_is_named(CovarianceRule rule) {
        for (double value : new double[] {0, Double.NaN}) {
            SampledVector flat = DATA.map(POINTS, (in, out) -> {
                System.arraycopy(in, 0, out, 0, POINTS);
                out[3] = value;
            });
            WeightingOutcome.Refused r = refused(Weighting.of(flat, rule));
            says(r.reason(), "point 3 of 6", Double.toString(value));
            says(r.advice(), "leave the point out");
        }
    }

    @Test
    void given_forty_blocks_and_fourteen_points_then_two_parameters_are_refused_and_three_are_not() {
        double[] ones = new double[14];
        Arrays.fill(ones, 1);
        SampledVector data = GaussianBlocks.jackknife(GaussianBlocks.draw(40, new double[14], ones, 0.5, new Random(1)));
        Weighting w = usable(Weighting.of(data, new CovarianceRule.Full()));
        WeightingOutcome.Refused r = w.tooFewBlocks(2).orElseThrow();
        // 39 * 38/(27 * 26) = 2.11
        says(r.reason(), "14x14", "40 blocks", "12 degrees of freedom", "2.11", "at most 11");
        assertTrue(w.tooFewBlocks(3).isEmpty());
        for (CovarianceRule rule : rules().subList(1, 4)) {
            assertTrue(usable(Weighting.of(data, rule)).tooFewBlocks(2).isEmpty());
        }
    }

    @Test
    void given_too_few_blocks_for_any_mean_of_the_inverse_then_that_is_said() {
        double[] unit = {1, 0, 0, 0, 1, 0, 0, 0, 1};
        Weighting w = usable(Weighting.of(unit, 3, new CovarianceRule.Full(), 4, new double[0]));
        says(w.tooFewBlocks(1).orElseThrow().reason(), "2 degrees of freedom", "no bound", "at most 0");
    }

    @Test
    void given_samples_of_a_constant_then_they_are_no_ensemble() {
        SampledVector input = SampledVector.copyOf(SampleGroup.input("a", 1), new double[] {1}, new double[] {2, 0});
        assertThrows(IllegalArgumentException.class, () -> Weighting.of(input, new CovarianceRule.Full()));
    }

    @Test
    void given_no_blocks_when_shrunk_from_a_bare_covariance_then_it_is_an_error_of_the_caller() {
        assertThrows(IllegalStateException.class, () -> Weighting.of(new double[] {1, 0, 0, 1}, 2, new CovarianceRule.Shrunk(), 9, new double[0]));
    }

    @Test
    void given_a_floor_outside_zero_to_one_then_it_is_refused() {
        for (double relative : new double[] {0, 1, -0.1, Double.NaN}) {
            assertThrows(IllegalArgumentException.class, () -> new CovarianceRule.Floored(relative));
        }
    }
}
