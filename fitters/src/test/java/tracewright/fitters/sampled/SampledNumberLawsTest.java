package tracewright.fitters.sampled;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Arrays;
import java.util.List;
import java.util.Random;
import java.util.stream.LongStream;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;

/** What covariances, functions and alignment must obey, with answers by hand. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class SampledNumberLawsTest {

    /** Sums of some ten products of order one lose a few units in the last place. */
    private static final double ROUNDING = 1e-14;

    private static final SampleGroup EQUAL = SampleGroup.jackknife("A", labels(0, 1, 2, 3), new int[] {5, 5, 5, 5});
    private static final SampleGroup UNEQUAL = SampleGroup.jackknife("B", labels(0, 1, 2, 3, 4), new int[] {2, 5, 4, 5, 3});

    private static List<BlockLabel> labels(long... indices) {
        return LongStream.of(indices).mapToObj(i -> new BlockLabel("s", i)).toList();
    }

    private static double[] near(double central, int n, Random random) {
        return random.doubles(n).map(u -> central * (1 + 0.02 * (u - 0.5))).toArray();
    }

    private static SampledNumber random(double central, long seed) {
        Random random = new Random(seed);
        return SampledNumber.of(central, EQUAL, near(central, 4, random)).withGroup(UNEQUAL, near(central, 5, random))
            .withGroup(SampleGroup.input("i", 2), near(central, 4, random))
            .withGroup(SampleGroup.choice("c", new double[] {0.2, 0.5, 0.3}), near(central, 3, random));
    }

    @Test
    void given_three_numbers_when_two_are_combined_linearly_then_covariances_combine_alike() {
        SampledNumber x = random(1.3, 1);
        SampledNumber y = random(-0.7, 2);
        SampledNumber z = random(2.1, 3);
        SampledNumber combined = x.times(3.5).plus(y.times(-1.25));
        double expected = 3.5 * SampledNumber.covariance(x, z) - 1.25 * SampledNumber.covariance(y, z);
        assertEquals(expected, SampledNumber.covariance(combined, z), 1e-12 * combined.error() * z.error());
        assertEquals(SampledNumber.covariance(x, z), SampledNumber.covariance(z, x), 0);
    }

    @Test
    void given_a_number_of_four_groups_when_its_variance_is_split_then_the_parts_add_up_and_are_keyed_in_order() {
        SampledNumber x = random(1.3, 4);
        assertEquals(List.of("A", "B", "choice:c", "input:i"), List.copyOf(x.varianceByGroup().keySet()));
        assertEquals(x.variance(), x.varianceByGroup().values().stream().mapToDouble(Double::doubleValue).sum(), ROUNDING * x.variance());
        assertEquals(x.error() * x.error(), x.variance(), ROUNDING * x.variance());
    }

    @Test
    void given_a_number_when_taken_from_or_divided_by_itself_then_nothing_varies() {
        SampledNumber x = random(1.3, 5);
        assertEquals(0, x.minus(x).variance(), 0);
        assertEquals(1, x.dividedBy(x).central(), 0);
        assertEquals(0, x.dividedBy(x).variance(), 0);
    }

    @Test
    void given_numbers_of_different_groups_when_multiplied_then_each_group_moves_its_own_factor_only() {
        SampledNumber x = SampledNumber.input("x", 3, 0.5);
        SampledNumber y = SampledNumber.input("y", 7, 0.25);
        SampledNumber f = x.times(y);
        // By hand: (3 +- 0.5) x 7 and 3 x (7 +- 0.25).
        assertEquals(21, f.central(), 0);
        assertArrayEquals(new double[] {24.5, 17.5}, f.samples("input:x"), 0);
        assertArrayEquals(new double[] {21.75, 20.25}, f.samples("input:y"), 0);
        assertEquals(3.5 * 3.5 + 0.75 * 0.75, f.variance(), ROUNDING);
        assertEquals(7 * 0.25, SampledNumber.covariance(f, x), ROUNDING);   // df/dx times var x
    }

    @Test
    void given_four_equal_blocks_with_means_1_2_3_6_when_jackknifed_then_the_variance_is_that_of_a_mean() {
        // theta_(k) = (12 - y_k)/3; s^2 = 14/3, var = s^2/4 = 7/6.
        SampledNumber x = SampledNumber.of(3, EQUAL, new double[] {11.0 / 3, 10.0 / 3, 3, 2});
        assertEquals(7.0 / 6, x.variance(), 4 * ROUNDING);
        assertArrayEquals(new double[] {1, 2, 3, 6}, x.pseudoValues("A"), 8 * ROUNDING);
    }

    @Test
    void given_unequal_blocks_when_weighted_then_each_weight_is_n_minus_m_over_g_m() {
        // N = 19, g = 5.
        int[] m = {2, 5, 4, 5, 3};
        for (int k = 0; k < 5; k++) {
            assertEquals((19.0 - m[k]) / (5.0 * m[k]), UNEQUAL.weight(k), ROUNDING);
        }
    }

    @Test
    void given_a_number_when_shifted_then_all_its_samples_move_and_its_error_stays() {
        SampledNumber x = random(1.3, 6);
        SampledNumber y = x.shifted(10);
        assertEquals(11.3, y.central(), 4 * Math.ulp(11.3));
        assertEquals(x.samples("B")[2] + 10, y.samples("B")[2], 0);
        assertEquals(x.variance(), y.variance(), 1e-12 * x.variance());
    }

    @Test
    void given_alternatives_when_attached_as_a_choice_then_their_spread_about_their_mean_is_the_variance() {
        SampledNumber x = SampledNumber.exact(5).withChoice("w", new double[] {0.25, 0.75}, new double[] {1, 3});
        // Mean 2.5, spread 0.25 x 2.25 + 0.75 x 0.25; the central value does not enter.
        assertEquals(0.75, x.variance(), ROUNDING);
        String message = assertThrows(IllegalArgumentException.class, () -> SampleGroup.choice("w", new double[] {0.5, 0.6})).getMessage();
        assertTrue(message.contains("w") && message.contains("1.1"), message);
    }

    @Test
    void given_a_single_variation_when_attached_then_its_distance_from_the_central_value_is_the_error() {
        SampledNumber x = SampledNumber.exact(5).withGroup(SampleGroup.variation("v"), new double[] {5.25});
        assertEquals(0.25, x.error(), 0);
    }

    // ---- correlated inputs

    @Test
    void given_two_correlated_inputs_when_made_then_samples_lie_along_the_columns_of_the_cholesky_factor() {
        // S = [[4, 2], [2, 10]] = L L^T with L = [[2, 0], [1, 3]].
        List<SampledNumber> xy = SampledNumber.inputs("p", new double[] {20, 30}, new double[] {4, 2, 2, 10});
        assertArrayEquals(new double[] {22, 18, 20, 20}, xy.get(0).samples("input:p"), 0);
        assertArrayEquals(new double[] {31, 29, 33, 27}, xy.get(1).samples("input:p"), 0);
        assertEquals(2, SampledNumber.covariance(xy.get(0), xy.get(1)), ROUNDING);
    }

    @Test
    void given_fully_correlated_inputs_when_made_then_one_column_is_left_and_the_covariance_is_kept() {
        double[] s = {4, -6, 2, -6, 9, -3, 2, -3, 1};   // v v^T with v = (2, -3, 1)
        List<SampledNumber> x = SampledNumber.inputs("p", new double[] {1, 2, 3}, s);
        assertEquals(2, x.get(0).samples("input:p").length);
        for (int i = 0; i < 3; i++) {
            for (int j = 0; j < 3; j++) {
                assertEquals(s[3 * i + j], SampledNumber.covariance(x.get(i), x.get(j)), 1e-13);   // eigenvalues to a few units of 9 eps
            }
        }
    }

    @Test
    void given_a_constant_without_error_among_inputs_when_made_then_only_the_others_vary() {
        List<SampledNumber> x = SampledNumber.inputs("p", new double[] {1, 2}, new double[] {0, 0, 0, 9});
        assertEquals(0, x.get(0).variance(), 0);
        assertEquals(9, x.get(1).variance(), ROUNDING);
    }

    @Test
    void given_an_impossible_covariance_when_inputs_are_made_then_the_message_says_what_is_wrong() {
        double[] v = {1, 2, 3};
        double[] indefinite = {1, 0.9, 0.9, 0.9, 1, -0.9, 0.9, -0.9, 1};
        assertRefused("indefinite", () -> SampledNumber.inputs("p", v, indefinite));
        assertRefused("symmetric", () -> SampledNumber.inputs("p", new double[] {1, 2}, new double[] {1, 0.1, 0.2, 1}));
        assertRefused("within -1..1", () -> SampledNumber.inputs("p", new double[] {1, 2}, new double[] {1, 3, 3, 1}));
        assertRefused("variance 1", () -> SampledNumber.inputs("p", new double[] {1, 2}, new double[] {1, 0, 0, -1}));
    }

    private static void assertRefused(String part, org.junit.jupiter.api.function.Executable e) {
        String message = assertThrows(IllegalArgumentException.class, e).getMessage();
        assertTrue(message.contains(part), message);
    }

    // ---- numbers of one ensemble on different blocks

    private static final SampleGroup LEFT = SampleGroup.jackknife("A", labels(1, 2, 3, 4), new int[] {5, 5, 4, 5}, 10);
    private static final SampleGroup RIGHT = SampleGroup.jackknife("A", labels(3, 4, 5, 6, 8), new int[] {5, 5, 3, 5, 5}, 10);

    private static SampledNumber left(long seed) {
        return SampledNumber.of(2, LEFT, near(2, 4, new Random(seed)));
    }

    private static SampledNumber right(long seed) {
        return SampledNumber.of(3, RIGHT, near(3, 5, new Random(seed)));
    }

    @Test
    void given_two_block_sets_when_covariance_is_taken_then_only_shared_labels_count_with_the_root_of_both_weights() {
        SampledNumber x = left(1);
        SampledNumber y = right(2);
        double[] a = x.samples("A");
        double[] b = y.samples("A");
        double cx = LEFT.centre(2, a, 0, 1);
        double cy = RIGHT.centre(3, b, 0, 1);
        // Labels 3 and 4 are at places 2, 3 on the left and 0, 1 on the right.
        double expected = Math.sqrt(LEFT.weight(2) * RIGHT.weight(0)) * (a[2] - cx) * (b[0] - cy)
            + Math.sqrt(LEFT.weight(3) * RIGHT.weight(1)) * (a[3] - cx) * (b[1] - cy);
        assertEquals(expected, SampledNumber.covariance(x, y), 1e-12 * x.error() * y.error());
        assertEquals(expected, SampledNumber.covariance(y, x), 1e-12 * x.error() * y.error());
    }

    @Test
    void given_two_block_sets_when_numbers_are_combined_linearly_then_the_variance_is_the_sum_with_twice_the_covariance() {
        SampledNumber x = left(3);
        SampledNumber y = right(4);
        SampledNumber difference = x.minus(y);
        assertEquals(labels(1, 2, 3, 4, 5, 6, 8), difference.groups().get(0).labels());
        assertEquals(5, difference.groups().get(0).blockSize(2));   // the larger of 4 and 5
        double expected = x.variance() + y.variance() - 2 * SampledNumber.covariance(x, y);
        assertEquals(expected, difference.variance(), 1e-12 * expected);
        assertEquals(x.variance() - SampledNumber.covariance(y, x), SampledNumber.covariance(difference, x), 1e-12 * expected);
        assertEquals(x.variance(), difference.plus(y).variance(), 1e-12 * expected);   // back again: y has gone
    }

    @Test
    void given_two_block_sets_when_a_block_is_absent_from_one_then_its_sample_there_is_the_central_value() {
        SampledNumber y = right(5);
        SampledNumber f = SampledNumber.evaluate(v -> v[0], left(5), y);
        double[] onUnion = f.samples("A");
        assertArrayEquals(new double[] {2, 2, 2}, Arrays.copyOfRange(onUnion, 4, 7), 0);
        assertEquals(left(5).variance(), f.variance(), 1e-12 * f.variance());
    }

    @Test
    void given_three_block_sets_when_summed_in_any_order_then_the_variance_is_one() {
        SampledNumber x = left(6);
        SampledNumber y = right(7);
        SampleGroup whole = SampleGroup.jackknife("A", labels(2, 3, 4, 5, 6, 7), new int[] {5, 5, 5, 5, 5, 2}, 10);
        SampledNumber z = SampledNumber.of(4, whole, near(4, 6, new Random(8)));
        double variance = x.plus(y).plus(z).variance();
        assertEquals(variance, z.plus(x).plus(y).variance(), 1e-12 * variance);
        assertEquals(variance, SampledNumber.evaluate(v -> v[0] + v[1] + v[2], y, z, x).variance(), 1e-12 * variance);
    }

    @Test
    void given_bootstraps_of_two_block_sets_when_they_meet_then_draws_align_and_the_law_of_variances_holds() {
        Random random = new Random(9);
        int[] all = random.ints(40 * 6, 0, 3).toArray();
        SampleGroup five = drawn(labels(0, 1, 2, 3, 4), new int[] {4, 5, 5, 5, 5}, all, 0);
        SampleGroup four = drawn(labels(2, 3, 4, 5), new int[] {5, 5, 5, 3}, all, 2);
        SampledNumber x = SampledNumber.of(1, five, near(1, 40, random));
        SampledNumber y = SampledNumber.of(2, four, near(2, 40, random));
        SampledNumber d = x.minus(y);
        double expected = x.variance() + y.variance() - 2 * SampledNumber.covariance(x, y);
        assertEquals(expected, d.variance(), 1e-12 * expected);
        assertEquals(labels(0, 1, 2, 3, 4, 5), d.groups().get(0).labels());
        assertTrue(d.influence("A").isPresent());
    }

    @Test
    void given_a_bootstrap_from_a_file_when_only_shares_are_known_then_multiplicities_are_recovered_and_it_meets_others_alike() {
        Random random = new Random(15);
        int[] all = random.ints(40 * 6, 0, 4).toArray();
        for (int b = 0; b < 40; b++) {
            all[6 * b] = 1;   // no common factor in any draw
        }
        for (int b = 0; b < 40; b += 4) {
            System.arraycopy(new int[] {2, 3, 0, 2, 5}, 0, all, 6 * b, 5);   // nor here, where nothing was drawn once
        }
        SampleGroup made = drawn(labels(0, 1, 2, 3, 4), new int[] {4, 5, 7, 5, 5}, all, 0);
        double[] shares = new double[40 * 5];
        for (int b = 0; b < 40; b++) {
            for (int k = 0; k < 5; k++) {
                shares[5 * b + k] = made.share(b, k);
            }
        }
        SampleGroup read = SampleGroup.bootstrap("A", made.labels(), made.blockSizes(), 10, made.weight(0), shares);
        assertArrayEquals(made.multiplicities(), read.multiplicities());
        assertEquals(made, read);
        double[] noWholeNumbers = random.doubles(40 * 5).toArray();
        SampleGroup strange = SampleGroup.bootstrap("A", made.labels(), made.blockSizes(), 10, 0.02, noWholeNumbers);
        assertEquals(0, strange.multiplicities().length);
        SampledNumber x = SampledNumber.of(1, strange, near(1, 40, random));
        SampledNumber y = SampledNumber.of(2, drawn(labels(2, 3, 4, 5), new int[] {7, 5, 5, 3}, all, 2), near(2, 40, random));
        double expected = x.variance() + y.variance() - 2 * SampledNumber.covariance(x, y);
        assertEquals(expected, x.minus(y).variance(), 1e-12 * expected);
        assertTrue(x.minus(y).neighbourTerm("A").isEmpty());   // shares of the union are not known
    }

    /** Columns from.. of one table of multiplicities [draw][6]. */
    private static SampleGroup drawn(List<BlockLabel> labels, int[] sizes, int[] all, int from) {
        int[] c = new int[40 * sizes.length];
        for (int b = 0; b < 40; b++) {
            System.arraycopy(all, b * 6 + from, c, b * sizes.length, sizes.length);
        }
        return SampleGroup.bootstrapOf("A", labels, sizes, 10, c);
    }

    @Test
    void given_samples_that_cannot_be_aligned_when_they_meet_then_the_message_says_why_and_what_to_do() {
        SampledNumber x = left(10);
        SampleGroup drawn = drawn(labels(1, 2, 3, 4), new int[] {5, 5, 4, 5}, new Random(11).ints(240, 1, 3).toArray(), 0);
        SampledNumber y = SampledNumber.of(1, drawn, near(1, 40, new Random(12)));
        assertRefused("convert one", () -> x.plus(y));
        assertRefused("convert one", () -> SampledNumber.covariance(x, y));
        SampleGroup longer = SampleGroup.jackknife("A", labels(1, 2, 3, 4), new int[] {5, 5, 4, 5}, 20);
        assertRefused("10 and of 20 trajectories", () -> x.plus(SampledNumber.of(2, longer, new double[4])));
        SampleGroup otherSeed = drawn(labels(1, 2, 3, 4), new int[] {5, 5, 4, 5}, new Random(13).ints(240, 1, 3).toArray(), 0);
        assertRefused("one seed", () -> y.plus(SampledNumber.of(2, otherSeed, new double[40])));
        SampleGroup fewer = SampleGroup.bootstrapOf("A", labels(1, 2), new int[] {5, 5}, 10, new int[] {1, 0, 0, 1, 1, 1});
        assertRefused("draws", () -> y.plus(SampledNumber.of(2, fewer, new double[3])));
        SampledNumber other = SampledNumber.of(1, SampleGroup.input("i", 2), new double[4]);
        assertRefused("different names", () -> SampledNumber.input("i", 1, 0.1).plus(other));
    }

    @Test
    void given_blocks_that_make_no_jackknife_when_grouped_then_each_reason_is_named() {
        assertRefused("half of all", () -> SampleGroup.jackknife("A", labels(0, 1, 2), new int[] {5, 1, 1}));
        assertRefused("two blocks", () -> SampleGroup.jackknife("A", labels(0), new int[] {5}));
        assertRefused("Monte Carlo order", () -> SampleGroup.jackknife("A", labels(1, 0, 2), new int[] {5, 5, 5}));
        assertRefused("holds 0", () -> SampleGroup.jackknife("A", labels(0, 1, 2), new int[] {5, 0, 5}));
    }

    // ---- vectors

    @Test
    void given_jackknifed_vectors_when_bias_is_removed_then_the_central_row_is_the_mean_of_the_pseudo_values() {
        double[] samples = near(3, 5, new Random(14));
        SampledVector v = SampledVector.copyOf(UNEQUAL, new double[] {3}, samples);
        SampledVector c = v.biasCorrected();
        // theta_J = sum_k p_k P_k, P_k = h_k theta - (h_k - 1) theta_(k), h_k = N/m_k.
        int[] m = {2, 5, 4, 5, 3};
        double expected = 0;
        for (int k = 0; k < 5; k++) {
            double h = 19.0 / m[k];
            expected += (h * 3 - (h - 1) * samples[k]) / h;
        }
        assertEquals(expected, c.central(0), 1e-14 * 3);
        assertEquals(c.central(0) - 3, c.sample(4, 0) - samples[4], 1e-14 * 3);
        assertEquals(v.errors()[0], c.errors()[0], 1e-12);
    }
}
