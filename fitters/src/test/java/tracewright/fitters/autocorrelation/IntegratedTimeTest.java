package tracewright.fitters.autocorrelation;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertInstanceOf;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;
import static tracewright.fitters.ReferenceData.doubles;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.Collections;
import java.util.List;
import java.util.Random;
import java.util.stream.IntStream;
import org.apache.commons.math3.special.Erf;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;
import tools.jackson.databind.JsonNode;
import tracewright.fitters.Chains;
import tracewright.fitters.ReferenceData;

@DisplayNameGeneration(ReplaceUnderscores.class)
class IntegratedTimeTest {

    private static double[][] chains(JsonNode streams) {
        double[][] chains = new double[streams.size()][];
        for (int r = 0; r < chains.length; r++) {
            chains[r] = doubles(streams.get(r));
        }
        return chains;
    }

    /** Sums over 2,000 values: 1e-13 relative, and the window amplifies it by less than a hundred. */
    private static void assertNumber(JsonNode expected, String name, double found) {
        double e = expected.get(name).asDouble();
        assertEquals(e, found, 1e-10 * Math.abs(e), name);
    }

    /** autocorrelation.json: estimates of the cited paper with numpy, exact times of the chains beside them; two streams in the third. */
    @ParameterizedTest
    @ValueSource(ints = {0, 1, 2})
    void given_autoregressive_chains_when_measured_then_the_estimate_is_that_of_the_file_and_covers_the_exact_time(int i) {
        JsonNode data = ReferenceData.read("autocorrelation").get("cases").get(i);
        IntegratedTime.Estimate e = assertInstanceOf(IntegratedTime.Measured.class, IntegratedTime.ofChains(chains(data.get("streams")))).estimate();
        JsonNode expected = data.get("expected");
        assertEquals(expected.get("window").asInt(), e.window());
        assertNumber(expected, "tau_int", e.tau());
        assertNumber(expected, "tau_int_error", e.tauError());
        assertNumber(expected, "mean", e.mean());
        assertNumber(expected, "error_of_mean", e.errorOfMean());
        assertNumber(expected, "error_of_error", e.errorOfError());
        assertEquals(data.get("exact").get("tau_int").asDouble(), e.tau(), 3 * e.tauError());
    }

    /** autocorrelation_ratio.json, 40 digits: mean(x)/mean(y) from its linearised fluctuation and from delete-one pseudo-values. */
    @Test
    void given_a_ratio_in_two_streams_when_measured_by_either_route_then_both_are_those_of_the_file() {
        JsonNode data = ReferenceData.read("autocorrelation_ratio");
        double[][] x = {doubles(data.get("streams").get(0).get("x")), doubles(data.get("streams").get(1).get("x"))};
        double[][] y = {doubles(data.get("streams").get(0).get("y")), doubles(data.get("streams").get(1).get("y"))};
        int n = x[0].length + x[1].length;
        double sx = Arrays.stream(x).flatMapToDouble(Arrays::stream).sum();
        double sy = Arrays.stream(y).flatMapToDouble(Arrays::stream).sum();
        double ratio = sx / sy;
        double[][] projected = new double[2][];
        double[][] pseudo = new double[2][];
        for (int r = 0; r < 2; r++) {
            int stream = r;
            projected[r] = IntStream.range(0, x[r].length).mapToDouble(i -> (x[stream][i] - ratio * y[stream][i]) / (sy / n)).toArray();
            pseudo[r] = IntStream.range(0, x[r].length).mapToDouble(i -> n * ratio - (n - 1) * (sx - x[stream][i]) / (sy - y[stream][i])).toArray();
        }
        assertEstimate(data.get("projected"), IntegratedTime.ofChains(projected).estimate());
        assertEstimate(data.get("pseudo_values"), IntegratedTime.ofChains(pseudo).estimate());
    }

    private static void assertEstimate(JsonNode expected, IntegratedTime.Estimate e) {
        assertEquals(expected.get("window").asInt(), e.window());
        for (String name : List.of("tau_int", "tau_int_error", "error_of_mean", "error_of_error")) {
            double found = name.equals("tau_int") ? e.tau() : name.equals("tau_int_error") ? e.tauError()
                : name.equals("error_of_mean") ? e.errorOfMean() : e.errorOfError();
            assertNumber(expected, name, found);
        }
    }

    @Test
    void given_sixty_values_of_a_slow_chain_when_measured_then_the_answer_is_a_lower_bound_and_the_length_that_would_do() {
        JsonNode data = ReferenceData.read("autocorrelation_ratio").get("too_short");
        IntegratedTime.TooShort t = assertInstanceOf(IntegratedTime.TooShort.class, IntegratedTime.ofChains(doubles(data.get("series"))));
        assertEstimate(data.get("estimate"), t.estimate());
        assertEquals((long) Math.ceil(50 * (t.estimate().tau() + t.estimate().tauError())), t.configurationsNeeded());
        assertTrue(t.reason().contains("60 configurations are fewer than 50 times"), t.reason());
    }

    /** NIST StRD univariate data: mean, standard deviation (n - 1) and lag-one autocorrelation sum d_i d_(i+1) / sum d_i^2. */
    @ParameterizedTest
    @CsvSource({"Lew, 1e-13, 1e-13", "Lottery, 1e-13, 1e-13", "Mavro, 1e-13, 1e-13", "Michelso, 1e-13, 1e-13", "NumAcc1, 1e-13, 1e-13",
        "NumAcc2, 1e-13, 1e-13", "NumAcc3, 1e-9, 1e-9", "NumAcc4, 1e-8, 1e-8", "PiDigits, 1e-13, 1e-13"})
    void given_certified_data_when_measured_then_mean_deviation_and_lag_one_are_the_certified_ones(String name, double deviation, double lag) {
        JsonNode data = ReferenceData.read("nist/univariate-" + name);
        double[] x = doubles(data.get("data"));
        int n = x.length;
        Series series = Series.ofChains(x);
        double[] zero = new double[2];
        double[] one = new double[2];
        series.products(0, zero);
        series.products(1, one);
        double mean = data.get("mean").asDouble();
        assertEquals(mean, IntegratedTime.ofChains(x).estimate().mean(), 1e-13 * Math.abs(mean));
        double sigma = data.get("standard_deviation").asDouble();
        assertEquals(sigma, Math.sqrt(IntegratedTime.ofChains(x).estimate().variance() * n / (n - 1.0)), deviation * sigma);
        double r = data.get("lag1_autocorrelation").asDouble();
        assertEquals(r, one[0] / zero[0], lag * Math.max(1, Math.abs(r)));
        assertEquals(n - 1, one[1], 0);
    }

    @Test
    void given_configurations_in_any_order_when_measured_then_every_bit_is_the_same() {
        double[] chain = Chains.autoregressive(500, 2, new Random(1));
        List<Integer> order = new ArrayList<>(IntStream.range(0, 500).boxed().toList());
        Collections.shuffle(order, new Random(2));
        List<String> streams = order.stream().map(i -> i < 300 ? "a" : "b").toList();
        long[] trajectories = order.stream().mapToLong(i -> 4L * i + 7).toArray();
        double[] values = order.stream().mapToDouble(i -> chain[i]).toArray();
        IntegratedTime.Estimate shuffled = IntegratedTime.measure(streams, trajectories, values).estimate();
        IntegratedTime.Estimate sorted = IntegratedTime.ofChains(Arrays.copyOf(chain, 300), Arrays.copyOfRange(chain, 300, 500)).estimate();
        assertEquals(sorted.tau(), shuffled.tau(), 0);
        assertEquals(4, shuffled.spacing());
        assertEquals(4 * sorted.tau(), shuffled.tauTrajectories(), 0);
    }

    @Test
    void given_a_stream_when_reversed_then_the_time_is_the_same() {
        double[] chain = Chains.autoregressive(800, 3, new Random(3));
        double[] reversed = IntStream.range(0, 800).mapToDouble(i -> chain[799 - i]).toArray();
        double tau = IntegratedTime.ofChains(chain).estimate().tau();
        assertEquals(tau, IntegratedTime.ofChains(reversed).estimate().tau(), 1e-12 * tau);
    }

    /** The exact time is that of the chain, in steps, whether or not configurations are missing; so is the error of what is left. */
    @ParameterizedTest
    @ValueSource(doubles = {0.05, 0.4})
    void given_a_chain_with_configurations_missing_when_measured_then_the_time_of_the_chain_is_covered(double missing) {
        int repetitions = 200;
        double tau = 3;
        double sum = 0;
        double squares = 0;
        double claimed = 0;
        Random random = new Random(4);
        for (int r = 0; r < repetitions; r++) {
            double[] chain = Chains.autoregressive(2000, tau, random);
            int[] kept = IntStream.range(0, 2000).filter(i -> random.nextDouble() >= missing).toArray();
            IntegratedTime.Estimate e = IntegratedTime.measure(Collections.nCopies(kept.length, "s"), IntStream.of(kept).mapToLong(i -> 10L * i).toArray(),
                IntStream.of(kept).mapToDouble(i -> chain[i]).toArray()).estimate();
            sum += e.tau();
            squares += e.mean() * e.mean();
            claimed += e.errorOfMean() * e.errorOfMean();
        }
        // One estimate scatters by tau sqrt(4 W/N) = 0.6, 200 of them by 0.04, and truncation costs a few per cent (section 5 of the paper).
        assertEquals(tau, sum / repetitions, 0.2);
        // Scatter of the mean of squares of 200 normal numbers: 10 % of it; three of these.
        assertEquals(1, claimed / squares, 0.3);
    }

    @Test
    void given_two_streams_of_different_mean_when_measured_then_their_agreement_is_improbable() {
        double[] a = Chains.autoregressive(1000, 1, new Random(5));
        double[] b = Chains.autoregressive(1000, 1, new Random(6));
        assertTrue(IntegratedTime.ofChains(a, b).estimate().streamAgreement() > 0.01);
        double[] shifted = Arrays.stream(b).map(x -> x + 0.5).toArray();
        assertTrue(IntegratedTime.ofChains(a, shifted).estimate().streamAgreement() < 0.01);
        assertEquals(1, IntegratedTime.ofChains(a).estimate().streamAgreement(), 0);
    }

    /** Tails of chi-squared in closed form: erfc(sqrt(q/2)) with one degree of freedom, exp(-q/2) with two. */
    @Test
    void given_two_or_three_streams_when_compared_then_the_probability_is_that_of_one_degree_of_freedom_less() {
        double[][] chains = {Chains.autoregressive(400, 1, new Random(8)), Chains.autoregressive(700, 1, new Random(9)),
            Chains.autoregressive(500, 1, new Random(10))};
        double q2 = disagreement(chains[0], chains[1]);
        assertEquals(Erf.erfc(Math.sqrt(q2 / 2)), IntegratedTime.ofChains(chains[0], chains[1]).estimate().streamAgreement(), 1e-12);
        assertEquals(StrictMath.exp(-disagreement(chains) / 2), IntegratedTime.ofChains(chains).estimate().streamAgreement(), 1e-12);
    }

    /** sum_r N_r (mean_r - mean)^2 / C, with C = N times the squared error of the mean. */
    private static double disagreement(double[]... chains) {
        IntegratedTime.Estimate e = IntegratedTime.ofChains(chains).estimate();
        double sum = 0;
        for (double[] chain : chains) {
            double d = Arrays.stream(chain).average().orElseThrow() - e.mean();
            sum += chain.length * d * d;
        }
        return sum / (e.configurations() * e.errorOfMean() * e.errorOfMean());
    }

    @Test
    void given_a_window_longer_than_a_quarter_of_a_stream_when_measured_then_the_chain_is_too_short() {
        double[] chain = Chains.autoregressive(3000, 5, new Random(7));
        double[][] pieces = IntStream.range(0, 60).mapToObj(r -> Arrays.copyOfRange(chain, 50 * r, 50 * r + 50)).toArray(double[][]::new);
        IntegratedTime.TooShort t = assertInstanceOf(IntegratedTime.TooShort.class, IntegratedTime.ofChains(pieces));
        assertTrue(t.reason().contains("stream of 50 steps"), t.reason());
    }

    @Test
    void given_a_trend_when_measured_then_no_window_closes() {
        double[] trend = IntStream.range(0, 100).mapToDouble(i -> i).toArray();
        assertInstanceOf(IntegratedTime.TooShort.class, IntegratedTime.ofChains(trend));
    }

    @Test
    void given_a_constant_when_measured_then_it_counts_as_independent_and_exact() {
        IntegratedTime.Estimate e = IntegratedTime.ofChains(new double[] {2, 2, 2}).estimate();
        assertEquals(0.5, e.tau(), 0);
        assertEquals(0, e.errorOfMean(), 0);
    }

    @Test
    void given_bad_series_when_measured_then_the_message_names_the_configuration() {
        String twice = assertThrows(IllegalArgumentException.class, () -> IntegratedTime.measure(List.of("a", "b", "a"), new long[] {7, 7, 7},
            new double[3])).getMessage();
        assertTrue(twice.contains("trajectory 7 of stream a occurs twice"), twice);
        String nan = assertThrows(IllegalArgumentException.class, () -> IntegratedTime.measure(List.of("a", "a"), new long[] {7, 8},
            new double[] {1, Double.NaN})).getMessage();
        assertTrue(nan.contains("stream a, trajectory 8"), nan);
    }
}
