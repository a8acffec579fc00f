package tracewright.cuts;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Arrays;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Random;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.api.Test;
import tracewright.fitters.resampling.BlockLength;
import tracewright.study.ConfigurationId;
import tracewright.study.InputException;
import tracewright.study.Observable;
import tracewright.study.Study;

@DisplayNameGeneration(ReplaceUnderscores.class)
class BlockLengthDecisionTest {

    private static final Observable NUCLEON = new Observable.TwoPoint("nucleon");
    private static final Study.BlockChoice AUTO = new Study.BlockChoice(Optional.empty());

    private static Selection selection(List<ConfigurationId> ids, Settings settings) {
        return Selection.of(Labelled.of(NUCLEON, ids), List.of(NUCLEON), settings.ensemble());
    }

    private static Study.BlockChoice given(int length) {
        return new Study.BlockChoice(Optional.of(length));
    }

    /** First-order autoregression with coefficient rho and unit variance. */
    private static double[] chain(int n, double rho, long seed) {
        Random random = new Random(seed);
        double[] x = new double[n];
        x[0] = random.nextGaussian();
        for (int i = 1; i < n; i++) {
            x[i] = rho * x[i - 1] + Math.sqrt(1 - rho * rho) * random.nextGaussian();
        }
        return x;
    }

    @Tag("exact")
    @Test
    void given_a_length_in_the_study_then_it_is_taken_and_the_times_are_measured_all_the_same() {
        Selection s = selection(Labelled.run("a", 0, 2, 1000), Settings.none());
        BlockLengthDecision decision = BlockLengthDecision.of("toy", s, Map.of("x", chain(1000, 0, 1)), given(12));
        assertEquals(12, decision.length());
        assertEquals("given by the study", decision.reason());
        assertEquals(List.of("x"), decision.measured().stream().map(BlockLengthDecision.Measured::observable).toList());
        // White noise, two trajectories apart: half a spacing; 4 errors of the estimate
        assertEquals(1, decision.measured().get(0).time(), 4 * decision.measured().get(0).error());
    }

    /** Constant series have tau = 1/2 configuration by definition, so that the rule can be followed by hand. */
    @Tag("exact")
    @Test
    void given_auto_and_no_autocorrelation_then_the_rule_gives_a_length_by_hand() {
        Selection s = selection(Labelled.run("a", 0, 2, 1000), Settings.none());
        BlockLengthDecision decision = BlockLengthDecision.of("toy", s, Map.of("x", new double[1000]), AUTO);
        // (0.5^2 * 1000)^(1/3) = 6.3 configurations, rounded to 6, of 2 trajectories each
        assertEquals(12, decision.length());
        assertTrue(decision.reason().contains("of x, 1.00 trajectories"), decision.reason());
        assertEquals(List.of(), decision.warnings());
    }

    @Tag("exact")
    @Test
    void given_a_stride_then_the_rule_counts_in_the_spacing_of_the_survivors() {
        Selection s = selection(Labelled.run("a", 0, 2, 1000), Settings.none().stride(8));
        BlockLengthDecision decision = BlockLengthDecision.of("toy", s, Map.of("x", new double[1000]), AUTO);
        // 250 survivors 8 trajectories apart, tau = 4 trajectories: (0.5^2 * 250)^(1/3) = 3.97, rounded to 4 configurations
        assertEquals(32, decision.length());
    }

    @Tag("exact")
    @Test
    void given_several_series_then_the_slowest_decides() {
        Selection s = selection(Labelled.run("a", 0, 1, 4000), Settings.none());
        Map<String, double[]> series = new LinkedHashMap<>();
        series.put("fast", chain(4000, 0, 1));
        series.put("slow", chain(4000, 0.6, 2));
        BlockLengthDecision decision = BlockLengthDecision.of("toy", s, series, AUTO);
        double tau = decision.measured().get(1).time();
        // tau = (1 + rho)/(2 (1 - rho)) = 2; 4 errors of the estimate
        assertEquals(2, tau, 4 * decision.measured().get(1).error());
        assertTrue(decision.reason().contains("of slow"), decision.reason());
        assertEquals(((BlockLength.Chosen) BlockLength.choose(tau, 1, 4000)).trajectories(), decision.length());
    }

    @Tag("exact")
    @Test
    void given_configurations_that_were_cut_then_their_numbers_are_not_read() {
        double[] x = chain(1000, 0, 1);
        Arrays.fill(x, 0, 50, Double.NaN);
        Selection s = selection(Labelled.run("a", 0, 1, 1000), Settings.none().thermalization(50));
        double time = BlockLengthDecision.of("toy", s, Map.of("x", x), AUTO).measured().get(0).time();
        assertTrue(Double.isFinite(time), Double.toString(time));
    }

    @Tag("message")
    @Test
    void given_a_chain_too_short_for_any_length_then_the_message_says_what_to_do() {
        Selection s = selection(Labelled.run("a", 0, 1, 30), Settings.none());
        InputException e = assertThrows(InputException.class, () -> BlockLengthDecision.of("toy", s, Map.of("x", new double[30]), AUTO));
        assertEquals(InputException.Cause.USAGE, e.reason());
        assertTrue(e.getMessage().contains("no block length suits ensemble toy") && e.getMessage().contains("ensembles.toy.cuts.block")
            && e.getMessage().contains("use 40 configurations or more"), e.getMessage());
    }

    @Tag("message")
    @Test
    void given_a_chain_too_short_for_its_time_then_a_warning_names_the_series() {
        Selection s = selection(Labelled.run("a", 0, 1, 200), Settings.none());
        BlockLengthDecision decision = BlockLengthDecision.of("toy", s, Map.of("slow", chain(200, 0.9, 3)), given(20));
        assertTrue(decision.warnings().get(0).startsWith("toy, slow: "), decision.warnings().toString());
        assertEquals("toy, slow: " + decision.measured().get(0).verdict(), decision.warnings().get(0));
    }

    @Tag("message")
    @Test
    void given_streams_with_different_means_then_a_warning_says_so() {
        List<ConfigurationId> ids = new java.util.ArrayList<>(Labelled.run("a", 0, 1, 500));
        ids.addAll(Labelled.run("b", 0, 1, 500));
        double[] x = chain(1000, 0, 1);
        for (int i = 500; i < 1000; i++) {
            x[i] += 1;
        }
        // A difference of one with an error of sqrt(2/500) = 0.06
        List<String> warnings = BlockLengthDecision.of("toy", selection(ids, Settings.none()), Map.of("x", x), given(5)).warnings();
        assertTrue(warnings.stream().anyMatch(w -> w.startsWith("toy, x: the streams' means differ")), warnings.toString());
    }

    @Tag("message")
    @Test
    void given_a_length_that_leaves_one_block_then_the_message_says_that_two_are_needed() {
        Selection s = selection(Labelled.run("a", 0, 1, 100), Settings.none());
        InputException e = assertThrows(InputException.class, () -> BlockLengthDecision.of("toy", s, Map.of("x", new double[100]), given(1000)));
        assertEquals(InputException.Cause.USAGE, e.reason());
        assertTrue(e.getMessage().contains("blocks of 1000 trajectories leave 1 block of the 100 configurations of ensemble toy"), e.getMessage());
    }

    @Tag("message")
    @Test
    void given_cuts_that_leave_one_configuration_then_it_is_a_problem_of_the_study_and_not_our_bug() {
        Selection s = selection(Labelled.run("a", 0, 1, 100), Settings.none().range(7, 7));
        for (Study.BlockChoice choice : List.of(AUTO, given(1))) {
            InputException e = assertThrows(InputException.class, () -> BlockLengthDecision.of("toy", s, Map.of("x", new double[100]), choice));
            assertEquals(InputException.Cause.USAGE, e.reason());
            assertTrue(e.getMessage().contains("the cuts of ensemble toy leave 1 of its 100 configurations; an error needs two"), e.getMessage());
        }
    }
}
