package tracewright.fitters.resampling;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertInstanceOf;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Arrays;
import java.util.Collections;
import java.util.Random;
import java.util.stream.IntStream;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import tools.jackson.databind.JsonNode;
import tracewright.fitters.Chains;
import tracewright.fitters.ReferenceData;
import tracewright.fitters.autocorrelation.IntegratedTime;

@DisplayNameGeneration(ReplaceUnderscores.class)
class BlockLengthTest {

    /** By hand: (tau^2 N)^(1/3), at least 4 tau, at most N/20, all in configurations, times the spacing. */
    @ParameterizedTest
    @CsvSource({
        "5, 1, 4000, 46, 46",      // (25 x 4000)^(1/3) = 46.4
        "20, 4, 4000, 46, 184",    // the same in configurations of four trajectories
        "5, 1, 320, 0, 0",         // 4 tau = 20 leaves 16 blocks: impossible
        "5, 1, 400, 20, 20",       // (10000)^(1/3) = 21.5 would leave 18 blocks; N/20 = 20 is 4 tau exactly
        "5, 1, 425, 21, 21",       // 22.0 would leave 19
        "2, 1, 100000, 74, 74",    // (400000)^(1/3) = 73.7
        "0.1, 1, 1000, 6, 6",      // tau counts as 1/2: (250)^(1/3) = 6.3
        "0.51, 1, 60, 3, 3",       // (15.6)^(1/3) = 2.4988 would round below 4 tau = 2.04
        "0.5, 1, 40, 2, 2"})       // (10)^(1/3) = 2.15
    void given_a_time_in_trajectories_when_a_length_is_chosen_then_the_rule_holds(double tau, int spacing, int n, int configurations, int trajectories) {
        BlockLength length = BlockLength.choose(tau, spacing, n);
        if (configurations == 0) {
            assertInstanceOf(BlockLength.Impossible.class, length);
        } else {
            assertEquals(new BlockLength.Chosen(trajectories, configurations, n / configurations), length);
        }
    }

    @Test
    void given_too_few_configurations_when_a_length_is_chosen_then_reason_and_advice_carry_the_numbers() {
        BlockLength.Impossible i = assertInstanceOf(BlockLength.Impossible.class, BlockLength.choose(20, 2, 400));
        assertTrue(i.reason().contains("blocks of 40 configurations (4 times the integrated time of 10.00) leave 10 blocks"), i.reason());
        assertTrue(i.reason().contains("20 blocks of 20 configurations are only 2.00 times"), i.reason());
        assertTrue(i.advice().contains("800 configurations"), i.advice());
    }

    @Test
    void given_a_measured_time_when_a_length_is_chosen_then_it_counts_in_the_trajectories_of_the_series() {
        double[] chain = Chains.autoregressive(3000, 4, new Random(1));
        IntegratedTime t = IntegratedTime.measure(Collections.nCopies(3000, "s"), IntStream.range(0, 3000).mapToLong(i -> 5L * i).toArray(), chain);
        BlockLength.Chosen c = assertInstanceOf(BlockLength.Chosen.class, BlockLength.choose(t));
        assertEquals(5 * c.configurations(), c.trajectories());
        assertEquals(BlockLength.choose(t.estimate().tau(), 1, 3000), new BlockLength.Chosen(c.configurations(), c.configurations(), c.blocks()));
        BlockLength none = BlockLength.choose(IntegratedTime.ofChains(Arrays.copyOf(chain, 60)));
        assertTrue(assertInstanceOf(BlockLength.Impossible.class, none).reason().contains("60 configurations are fewer"));
    }

    /** block_length.json, 40 digits: expectation of the blocked variance of the mean over the true one, for autoregressive chains. */
    @Test
    void given_autoregressive_chains_when_blocked_then_variances_are_on_average_those_of_the_file() {
        int repetitions = 300;
        JsonNode data = ReferenceData.read("block_length").get("cases").get(0);
        int n = data.get("length").asInt();
        double tau = data.get("tau_int").asDouble();
        double exact = data.get("variance_of_mean").asDouble();
        assertEquals(exact, Chains.varianceOfMean(n, tau), 1e-12 * exact);
        JsonNode blocks = data.get("blocks");
        double[] sum = new double[blocks.size()];
        double[] squares = new double[blocks.size()];
        Random random = new Random(2);
        for (int r = 0; r < repetitions; r++) {
            double[] chain = Chains.autoregressive(n, tau, random);
            for (int i = 0; i < sum.length; i++) {
                double v = Resampling.jackknife("A", even(n, blocks.get(i).get("size").asInt())).means(chain, 1).number(0).variance() / exact;
                sum[i] += v;
                squares[i] += v * v;
            }
        }
        for (int i = 0; i < sum.length; i++) {
            double mean = sum[i] / repetitions;
            double error = Math.sqrt((squares[i] / repetitions - mean * mean) / repetitions);
            assertEquals(blocks.get(i).get("expected_over_true").asDouble(), mean, 3.5 * error, blocks.get(i).toString());
        }
    }

    static Blocking even(int n, int length) {
        boolean[] kept = new boolean[n];
        Arrays.fill(kept, true);
        return Blocking.anchored(Collections.nCopies(n, "s"), IntStream.range(0, n).asLongStream().toArray(), kept, length);
    }
}
