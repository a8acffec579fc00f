package tracewright.fitters.resampling;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertNotEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;
import static tracewright.fitters.ReferenceData.doubles;
import static tracewright.fitters.ReferenceData.ints;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.Collections;
import java.util.List;
import java.util.Random;
import java.util.stream.IntStream;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import tools.jackson.databind.JsonNode;
import tracewright.fitters.ReferenceData;
import tracewright.fitters.sampled.SampleGroup;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.fitters.sampled.SampledVector;

/** resampling.json: log(mean x/mean y) by jackknife with equal and unequal blocks and by bootstrap, with numpy; and laws. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class ResamplingTest {

    private static final JsonNode DATA = ReferenceData.read("resampling");
    private static final SampledVector.RowFunction LOG_RATIO = (in, out) -> out[0] = StrictMath.log(in[0] / in[1]);

    /** Rows (x, y) of the file. */
    private static double[] rows() {
        double[] x = doubles(DATA.get("x"));
        double[] y = doubles(DATA.get("y"));
        double[] rows = new double[2 * x.length];
        for (int i = 0; i < x.length; i++) {
            rows[2 * i] = x[i];
            rows[2 * i + 1] = y[i];
        }
        return rows;
    }

    /** Blocks of the given sizes: on disk all blocks are 20 trajectories long, of which a cut left the first m_k. */
    private static Blocking blocks(int... sizes) {
        int n = 20 * sizes.length;
        boolean[] kept = new boolean[n];
        for (int i = 0; i < n; i++) {
            kept[i] = i % 20 < sizes[i / 20];
        }
        return Blocking.anchored(Collections.nCopies(n, "s"), IntStream.range(0, n).asLongStream().toArray(), kept, 20);
    }

    /** Rows moved to where the cut left room for them; what was cut holds NaN and must not be looked at. */
    private static double[] spread(double[] rows, int length, int... sizes) {
        double[] values = new double[20 * sizes.length * length];
        Arrays.fill(values, Double.NaN);
        int from = 0;
        for (int k = 0; k < sizes.length; k++) {
            System.arraycopy(rows, from, values, 20 * k * length, sizes[k] * length);
            from += sizes[k] * length;
        }
        return values;
    }

    private static Blocking even(int n, int length) {
        boolean[] kept = new boolean[n];
        Arrays.fill(kept, true);
        return Blocking.anchored(Collections.nCopies(n, "s"), IntStream.range(0, n).asLongStream().toArray(), kept, length);
    }

    @Test
    void given_equal_and_unequal_blocks_when_jackknifed_then_samples_bias_and_variance_are_those_of_the_file() {
        for (int i = 0; i < 2; i++) {
            JsonNode expected = DATA.get("jackknife").get(i);
            int[] sizes = ints(expected.get("block_sizes"));
            Resampling r = Resampling.jackknife("A", blocks(sizes));
            SampledNumber plain = r.derived(spread(rows(), 2, sizes), 2, 1, LOG_RATIO, false).number(0);
            assertEquals(expected.get("central").asDouble(), plain.central(), 1e-12);
            assertArrayEquals(doubles(expected.get("samples")), plain.samples("A"), 1e-12);
            SampledNumber corrected = r.derived(spread(rows(), 2, sizes), 2, 1, LOG_RATIO, true).number(0);
            double bias = expected.get("bias_corrected").asDouble();
            assertEquals(bias, corrected.central(), 1e-12);
            assertEquals(plain.samples("A")[3] + bias - plain.central(), corrected.samples("A")[3], 1e-12);
            // The file has the published form, which differs by (h_k - g) x bias for unequal blocks: there 1e-3 is asked.
            double variance = expected.get("variance").asDouble();
            assertEquals(variance, plain.variance(), (i == 0 ? 1e-12 : 1e-3) * variance);
            assertEquals(variance, publishedForm(plain, sizes), 1e-12 * variance);
            assertEquals(plain.variance(), corrected.variance(), 1e-11 * variance);
        }
    }

    /** (1/g) sum_k (P_k - theta_J)^2/(h_k - 1) of Busing, Meijer, van der Leeden. */
    private static double publishedForm(SampledNumber x, int[] sizes) {
        double[] p = x.pseudoValues("A");
        double total = IntStream.of(sizes).sum();
        double mean = 0;
        for (int k = 0; k < p.length; k++) {
            mean += sizes[k] / total * p[k];
        }
        double sum = 0;
        for (int k = 0; k < p.length; k++) {
            sum += (p[k] - mean) * (p[k] - mean) / (total / sizes[k] - 1) / p.length;
        }
        return sum;
    }

    @Test
    void given_the_draws_of_the_file_when_bootstrapped_then_samples_and_plain_variance_are_those_of_the_file() {
        JsonNode expected = DATA.get("bootstrap");
        Blocking b = even(60, 5);
        int draws = expected.get("draws").size();
        double[] c = new double[draws * 12];
        for (int d = 0; d < draws; d++) {
            for (int k : ints(expected.get("draws").get(d))) {
                c[12 * d + k]++;
            }
        }
        double[] sums = ResamplingKernels.blockSums(rows(), 2, b);
        double[] means = ResamplingKernels.bootstrap(sums, 2, b, c);
        double[] shares = Arrays.stream(c).map(v -> v / 12).toArray();
        SampleGroup group = SampleGroup.bootstrap("A", b.labels(), b.sizes(), 1.0 / (draws - 1), shares);
        double[] all = ResamplingKernels.total(sums, 2, 12);
        SampledNumber x = SampledVector.copyOf(group, new double[] {all[0] / 60, all[1] / 60}, means).map(1, LOG_RATIO).number(0);
        assertArrayEquals(doubles(expected.get("samples")), x.samples("A"), 1e-12);
        double variance = expected.get("variance").asDouble();
        assertEquals(variance, x.variance(), 1e-12 * variance);
    }

    @Test
    void given_equal_blocks_when_all_multinomial_draws_of_three_blocks_are_listed_then_the_weight_undoes_their_bias() {
        // A multiplicity has variance 3 x 1/3 x 2/3, so u = c/3 has 2/27: 27 x 3 x (2/27)/4 = 3/2, and w = (1/12)/(3/2).
        // The plain 1/27 would give (g - 1)/g = 2/3 of that.
        int[] c = new int[81];
        for (int b = 0; b < 27; b++) {
            c[3 * b + b % 3]++;
            c[3 * b + b / 3 % 3]++;
            c[3 * b + b / 9]++;
        }
        SampleGroup group = SampleGroup.bootstrapOf("A", even(12, 4).labels(), new int[] {4, 4, 4}, 4, c);
        assertEquals(1.0 / 18, group.weight(7), 1e-15);
    }

    @Test
    void given_a_mean_of_independent_blocks_when_bootstrapped_then_its_variance_is_unbiased_whatever_was_drawn() {
        // E var = s^2/N exactly: with ybar_k independent of variance s^2/m_k it is w sum_b sum_k (u_bk - ubar_k)^2 s^2/m_k.
        int[] sizes = {3, 7, 5, 20, 8, 2, 10};
        SampleGroup group = Resampling.bootstrap("A", blocks(sizes), 5, 50).group();
        double expected = 0;
        for (int k = 0; k < sizes.length; k++) {
            double[] influence = new double[50];
            for (int b = 0; b < 50; b++) {
                influence[b] = group.share(b, k);
            }
            expected += SampledNumber.of(0, group, influence).variance() / sizes[k];
        }
        assertEquals(1.0 / 55, expected, 1e-15);
    }

    @Test
    void given_a_bootstrap_when_bias_is_removed_then_the_shift_is_that_of_the_jackknife() {
        int[] sizes = {3, 7, 5, 5, 8, 2, 10, 4, 6, 10};
        double[] values = spread(rows(), 2, sizes);
        Resampling r = Resampling.bootstrap("A", blocks(sizes), 17, 100);
        SampledNumber plain = r.derived(values, 2, 1, LOG_RATIO, false).number(0);
        SampledNumber corrected = r.derived(values, 2, 1, LOG_RATIO, true).number(0);
        double expected = DATA.get("jackknife").get(1).get("bias_corrected").asDouble();
        assertEquals(expected, corrected.central(), 1e-12);
        assertEquals(plain.samples("A")[42] + expected - plain.central(), corrected.samples("A")[42], 1e-12);
    }

    @Test
    void given_a_product_of_means_when_bias_is_removed_then_the_vacuum_subtracted_mean_is_unbiased_in_one_over_n() {
        // One configuration per block: mean(CX) - mean(C) mean(X), corrected, is the unbiased sample covariance, n - 1 below.
        Random random = new Random(4);
        int n = 12;
        double[] rows = new double[3 * n];
        double mc = 0;
        double mx = 0;
        double mcx = 0;
        for (int i = 0; i < n; i++) {
            double c = random.nextGaussian();
            double x = c + random.nextGaussian();
            rows[3 * i] = c;
            rows[3 * i + 1] = x;
            rows[3 * i + 2] = c * x;
            mc += c / n;
            mx += x / n;
            mcx += c * x / n;
        }
        SampledVector.RowFunction connected = (in, out) -> out[0] = in[2] - in[0] * in[1];
        double found = Resampling.jackknife("A", even(n, 1)).derived(rows, 3, 1, connected, true).central(0);
        assertEquals((mcx - mc * mx) * n / (n - 1), found, 1e-13);
    }

    @Test
    void given_a_constant_added_to_a_density_when_vacuum_subtracted_then_no_sample_moves() {
        double[] rows = rows();
        double[] with = new double[90 * 2];
        double[] without = new double[90 * 2];
        for (int i = 0; i < 60; i++) {
            without[3 * i] = rows[2 * i];
            without[3 * i + 1] = rows[2 * i + 1];
            without[3 * i + 2] = rows[2 * i] * rows[2 * i + 1];
            with[3 * i] = rows[2 * i];
            with[3 * i + 1] = rows[2 * i + 1] + 50;
            with[3 * i + 2] = rows[2 * i] * (rows[2 * i + 1] + 50);
        }
        SampledVector.RowFunction connected = (in, out) -> out[0] = in[2] - in[0] * in[1];
        Resampling r = Resampling.bootstrap("A", even(60, 5), 3, 20);
        SampledVector a = r.derived(without, 3, 1, connected, false);
        SampledVector b = r.derived(with, 3, 1, connected, false);
        for (int k = 0; k < 20; k++) {
            assertEquals(a.sample(k, 0), b.sample(k, 0), 1e-12);   // differences of numbers near 200
        }
    }

    @Test
    void given_configurations_in_any_order_on_disk_when_resampled_then_every_bit_is_the_same() {
        double[] rows = rows();
        List<Integer> order = new ArrayList<>(IntStream.range(0, 60).boxed().toList());
        Collections.shuffle(order, new Random(1));
        double[] shuffled = new double[120];
        for (int i = 0; i < 60; i++) {
            System.arraycopy(rows, 2 * order.get(i), shuffled, 2 * i, 2);
        }
        boolean[] kept = new boolean[60];
        Arrays.fill(kept, true);
        Blocking mixed = Blocking.anchored(Collections.nCopies(60, "s"), order.stream().mapToLong(i -> i).toArray(), kept, 7);
        for (boolean jackknife : new boolean[] {true, false}) {
            Resampling a = jackknife ? Resampling.jackknife("A", even(60, 7)) : Resampling.bootstrap("A", even(60, 7), 9, 40);
            Resampling b = jackknife ? Resampling.jackknife("A", mixed) : Resampling.bootstrap("A", mixed, 9, 40);
            assertEquals(a.group(), b.group());
            SampledVector x = a.means(rows, 2);
            SampledVector y = b.means(shuffled, 2);
            assertArrayEquals(x.centralRow(), y.centralRow(), 0);
            for (int k = 0; k < x.sampleCount(); k++) {
                assertArrayEquals(x.sampleRow(k), y.sampleRow(k), 0);
            }
        }
    }

    @Test
    void given_one_of_g_equal_blocks_deleted_when_the_mean_moves_then_by_mean_less_block_mean_over_g_minus_one() {
        double[] x = doubles(DATA.get("x"));
        SampledVector v = Resampling.jackknife("A", even(60, 5)).means(x, 1);
        double block = Arrays.stream(x, 15, 20).average().orElseThrow();
        assertEquals((v.central(0) - block) / 11, v.sample(3, 0) - v.central(0), 1e-14);
    }

    @Test
    void given_data_scaled_by_seven_when_resampled_then_errors_are_seven_times_as_large() {
        double[] x = doubles(DATA.get("x"));
        double[] y = Arrays.stream(x).map(v -> 7 * v).toArray();
        Resampling r = Resampling.bootstrap("A", even(60, 5), 3, 30);
        assertEquals(7 * r.means(x, 1).errors()[0], r.means(y, 1).errors()[0], 1e-13);
    }

    @Test
    void given_one_stream_split_at_a_block_boundary_when_jackknifed_then_the_error_is_the_same() {
        double[] x = doubles(DATA.get("x"));
        List<String> streams = IntStream.range(0, 60).mapToObj(i -> i < 25 ? "a" : "b").toList();
        boolean[] kept = new boolean[60];
        Arrays.fill(kept, true);
        Blocking split = Blocking.anchored(streams, IntStream.range(0, 60).asLongStream().toArray(), kept, 5);
        assertEquals(Resampling.jackknife("A", even(60, 5)).means(x, 1).errors()[0], Resampling.jackknife("A", split).means(x, 1).errors()[0], 1e-15);
    }

    @Test
    void given_two_analyses_of_the_same_data_when_compared_then_the_shift_is_zero_and_so_is_its_error() {
        double[] x = doubles(DATA.get("x"));
        for (int seed = 0; seed < 2; seed++) {
            Resampling a = seed == 0 ? Resampling.jackknife("A", without(60, 20)) : Resampling.bootstrap("A", without(60, 20), seed, 20);
            Resampling b = seed == 0 ? Resampling.jackknife("A", without(60, 20)) : Resampling.bootstrap("A", without(60, 20), seed, 20);
            SampledNumber shift = a.means(x, 1).number(0).minus(b.means(x, 1).number(0));
            assertEquals(0, shift.central(), 0);
            assertEquals(0, shift.error(), 0);
        }
    }

    /**
     * Thirty blocks, of which a cut takes the first twelve. For independent data the shift of the mean has variance
     * s^2 (1/N' - 1/N); a wrong alignment gives s^2 (1/N' + 1/N), 4 times that.
     */
    @Test
    void given_two_cuts_when_means_are_compared_then_the_error_of_the_shift_is_that_of_nested_samples() {
        Random random = new Random(6);
        int n = 300;
        double sum = 0;
        for (int repetition = 0; repetition < 400; repetition++) {
            double[] x = random.doubles(n).map(u -> Math.sqrt(12) * (u - 0.5)).toArray();
            sum += shiftVariance(x, Resampling.jackknife("A", even(n, 10)), Resampling.jackknife("A", without(n, 120)));
        }
        double exact = 1.0 / 180 - 1.0 / 300;
        // One variance from thirty blocks scatters by 26 %, 400 of them by 1.3 %: three of these; weights differ by 1/g, 3 %.
        assertEquals(1, sum / 400 / exact, 0.07);
    }

    @Test
    void given_two_cuts_when_bootstrapped_then_the_error_of_the_shift_is_that_of_nested_samples() {
        Random random = new Random(6);
        int n = 300;
        Resampling whole = Resampling.bootstrap("A", even(n, 10), 8, 200);
        Resampling cut = Resampling.bootstrap("A", without(n, 120), 8, 200);
        double sum = 0;
        for (int repetition = 0; repetition < 400; repetition++) {
            sum += shiftVariance(random.doubles(n).map(u -> Math.sqrt(12) * (u - 0.5)).toArray(), whole, cut);
        }
        double exact = 1.0 / 180 - 1.0 / 300;
        // As above, and 200 fixed draws leave 1/sqrt(200) = 7 % common to all repetitions; three of these.
        assertEquals(1, sum / 400 / exact, 0.22);
    }

    private static Blocking without(int n, int first) {
        boolean[] kept = new boolean[n];
        Arrays.fill(kept, first, n, true);
        return Blocking.anchored(Collections.nCopies(n, "s"), IntStream.range(0, n).asLongStream().toArray(), kept, 10);
    }

    private static double shiftVariance(double[] x, Resampling whole, Resampling cut) {
        return whole.means(x, 1).number(0).minus(cut.means(x, 1).number(0)).variance();
    }

    // ---- conversions

    @Test
    void given_a_mean_when_converted_to_the_other_kind_and_back_then_it_returns() {
        int[] sizes = {3, 7, 5, 5, 8, 2, 10, 4, 6, 10};
        double[] values = spread(rows(), 2, sizes);
        Resampling jackknife = Resampling.jackknife("A", blocks(sizes));
        Resampling bootstrap = Resampling.bootstrap("A", blocks(sizes), 3, 40);
        SampledNumber j = jackknife.means(values, 2).number(0).plus(SampledNumber.input("z", 0, 0.1));
        SampledNumber b = bootstrap.means(values, 2).number(0);
        assertArrayEquals(b.samples("A"), bootstrap.convert(j).samples("A"), 1e-12);
        assertArrayEquals(j.samples("A"), jackknife.convert(b).samples("A"), 1e-12);
        assertArrayEquals(j.samples("A"), jackknife.convert(bootstrap.convert(j)).samples("A"), 1e-12);
        assertEquals(0.01, bootstrap.convert(j).varianceByGroup().get("input:z"), 1e-15);
        assertEquals(0, bootstrap.convert(j).minus(b).varianceByGroup().get("A"), 1e-24);
    }

    @Test
    void given_a_ratio_when_converted_then_samples_agree_to_first_order() {
        Resampling jackknife = Resampling.jackknife("A", even(60, 5));
        Resampling bootstrap = Resampling.bootstrap("A", even(60, 5), 3, 200);
        SampledNumber j = jackknife.derived(rows(), 2, 1, LOG_RATIO, false).number(0);
        SampledNumber b = bootstrap.derived(rows(), 2, 1, LOG_RATIO, false).number(0);
        // Relative errors of the means are about 4 %, so second order is 4 % of the error; what is left must be below a tenth.
        assertTrue(bootstrap.convert(j).minus(b).error() < 0.1 * b.error());
        assertTrue(jackknife.convert(b).minus(j).error() < 0.1 * j.error());
        assertEquals(j, jackknife.convert(j));
    }

    @Test
    void given_other_blocks_or_few_draws_when_converted_then_the_message_says_why() {
        SampledNumber j = Resampling.jackknife("A", even(60, 5)).means(rows(), 2).number(0);
        String blocks = assertThrows(IllegalArgumentException.class, () -> Resampling.bootstrap("A", even(60, 6), 3, 40).convert(j)).getMessage();
        assertTrue(blocks.contains("12 blocks") && blocks.contains("10"), blocks);
        SampledNumber few = Resampling.bootstrap("A", even(60, 5), 3, 35).means(rows(), 2).number(0);
        String draws = assertThrows(IllegalArgumentException.class, () -> Resampling.jackknife("A", even(60, 5)).convert(few)).getMessage();
        assertTrue(draws.contains("three draws for each of its 12 blocks"), draws);
        assertNotEquals(few, j);
    }

    @Test
    void given_values_of_the_wrong_length_when_resampled_then_the_message_names_both_numbers() {
        String message = assertThrows(IllegalArgumentException.class, () -> Resampling.jackknife("A", even(60, 5)).means(new double[119], 2)).getMessage();
        assertTrue(message.contains("120 values") && message.contains("119"), message);
    }
}
