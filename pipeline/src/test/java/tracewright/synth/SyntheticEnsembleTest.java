package tracewright.synth;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertNotEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.HashMap;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import tracewright.study.ConfigurationId;
import tracewright.study.Study;

@DisplayNameGeneration(ReplaceUnderscores.class)
class SyntheticEnsembleTest {

    /**
     * Largest pull allowed among a few dozen: a standard normal exceeds 4.5 once in 150,000 draws. Seeds are fixed, so a test that
     * passes once passes always; a wrong factor of the size looked for gives pulls of 10 and more.
     */
    private static final double LARGEST_PULL = 4.5;
    private static final int REPETITIONS = 2000;
    private static final List<String> OPERATORS = List.of("loop.light", "loop.strange", "action-density.flow1.0", "action-density.flow3.0");

    /** One source at a fixed time; twelve configurations with tau_int = 2, so that 1 - v is far from 1. */
    private static Truth shortChain(double tauInt, int configurations) {
        Truth.Ensemble e = InventedTheory.ensemble().withSources(new Truth.Sources(1, 13, 1, 0)).withConfigurations(configurations)
            .withTauInt(tauInt);
        return InventedTheory.truth().withEnsembles(List.of(e));
    }

    /** Values by observable and configuration. */
    private static Map<String, List<double[]>> values(SyntheticEnsemble ensemble) {
        Map<String, List<double[]>> all = new HashMap<>();
        ensemble.read(o -> true, c -> true, (o, c, s, v) -> all.computeIfAbsent(o.id(), id -> new ArrayList<>()).add(v));
        return all;
    }

    @Test
    void given_many_short_chains_when_vacuum_subtracted_products_are_averaged_then_every_ratio_is_the_true_one_times_1_minus_v() {
        int n = 12;
        Truth truth = shortChain(2, n);
        double v = Autoregression.withTauInt(2).varianceOfMean(n);
        Replicas replicas = new Replicas();
        Map<String, Double> expected = new LinkedHashMap<>();
        for (int k = 0; k < REPETITIONS; k++) {
            SyntheticEnsemble ensemble = SyntheticEnsemble.generate(truth, "oak", k);
            Map<String, List<double[]>> all = values(ensemble);
            for (int[] point : new int[][] {{3, 0}, {3, 3}, {6, 2}, {6, 5}, {9, 4}}) {
                for (String operator : OPERATORS) {
                    String name = operator + Arrays.toString(point);
                    double product = subtracted(all, operator, point[0], 13 + point[1]);
                    replicas.add(name, product / ensemble.expectedTwoPoint("nucleon", point[0]));
                    expected.computeIfAbsent(name, id -> (1 - v) * trueRatio(truth, operator, point[0], point[1]));
                }
            }
        }
        Map<String, Double> pulls = replicas.pulls(expected);
        assertTrue(pulls.values().stream().allMatch(p -> Math.abs(p) < LARGEST_PULL), pulls::toString);
        expected.replaceAll((name, value) -> value / (1 - v));
        Map<String, Double> withoutFactor = replicas.pulls(expected);
        assertTrue(withoutFactor.values().stream().anyMatch(p -> Math.abs(p) > 2 * LARGEST_PULL), "the factor 1 - v must be visible: " + withoutFactor);
    }

    /** mean(C2 X) - mean(C2) mean(X), all on one chain, X on the given time slice. */
    private static double subtracted(Map<String, List<double[]>> all, String operator, int t, int slice) {
        List<double[]> c = all.get("nucleon.two-point");
        List<double[]> x = all.get(operator);
        double product = 0;
        double meanC = 0;
        double meanX = 0;
        for (int i = 0; i < c.size(); i++) {
            double value = x.get(i)[slice % 16];
            product += c.get(i)[t] * value / c.size();
            meanC += c.get(i)[t] / c.size();
            meanX += value / c.size();
        }
        return product - meanC * meanX;
    }

    /** R(t, tau) from the truth's own numbers, written out here once more. */
    private static double trueRatio(Truth truth, String operator, int t, int tau) {
        TruthBudget.Lattice exact = TruthBudget.of(truth.theory(), truth.ensemble("oak"), "nucleon").lattice(truth.theory());
        double gap = 0.6 * 0.113 / 0.1973269804593025;
        boolean gluon = operator.startsWith("action");
        double g00 = switch (operator) {
            case "loop.light" -> exact.lightDisconnected();
            case "loop.strange" -> exact.strange();
            case "action-density.flow1.0" -> exact.density() * (1 - 0.04);
            default -> exact.density() * (1 - 0.12);
        };
        double end = 0.7 * StrictMath.exp(-gap * t);
        double transition = Math.sqrt(0.7) * (gluon ? -0.1 : -0.2) * (StrictMath.exp(-gap * tau) + StrictMath.exp(-gap * (t - tau)));
        return g00 * (1 + transition + (gluon ? 0.8 : 0.5) * end) / (1 + end);
    }

    @Test
    void given_many_chains_when_correlators_and_slices_are_averaged_then_their_means_are_the_true_ones() {
        Truth truth = shortChain(1, 10);
        Replicas replicas = new Replicas();
        Map<String, Double> expected = new LinkedHashMap<>();
        for (int k = 0; k < REPETITIONS; k++) {
            SyntheticEnsemble ensemble = SyntheticEnsemble.generate(truth, "oak", k);
            Map<String, List<double[]>> all = values(ensemble);
            for (int t : new int[] {0, 4, 10}) {
                for (String hadron : List.of("pion", "nucleon")) {
                    replicas.add(hadron + t, all.get(hadron + ".two-point").get(7)[t]);
                    expected.put(hadron + t, ensemble.expectedTwoPoint(hadron, t));
                }
            }
            for (String operator : OPERATORS) {
                replicas.add(operator, all.get(operator).get(3)[5]);
            }
            for (int tau : new int[] {0, 2, 4}) {
                // Without what it shares with the two-point function, the connected one is precise enough to tell one tau from another.
                double shared = connectedRatio(truth, tau) * all.get("nucleon.two-point").get(4)[5];
                replicas.add("connected" + tau, all.get("nucleon.connected.light.t5").get(4)[tau] - shared);
                expected.put("connected" + tau, 0.0);
            }
        }
        // Vacuum values: 12^3 = 1728 sites.
        expected.putAll(Map.of("loop.light", -0.35 * 1728, "loop.strange", -0.30 * 1728, "action-density.flow1.0", 0.085 * 1728,
            "action-density.flow3.0", 0.025 * 1728));
        Map<String, Double> pulls = replicas.pulls(expected);
        assertTrue(pulls.values().stream().allMatch(p -> Math.abs(p) < LARGEST_PULL), pulls::toString);
    }

    /** Rconn(5, tau) from the truth's own numbers. */
    private static double connectedRatio(Truth truth, int tau) {
        double g = TruthBudget.of(truth.theory(), truth.ensemble("oak"), "nucleon").lattice(truth.theory()).lightConnected();
        TwoStates states = new TwoStates(1, 1, 0.6 * 0.113 / 0.1973269804593025, 0.7);
        return states.ratio(new TwoStates.Elements(g, -0.15 * g, 0.6 * g), 5, tau);
    }

    @Test
    void given_many_chains_when_a_two_point_function_varies_then_its_variance_is_the_sum_of_signal_and_noise() {
        Truth truth = shortChain(1, 2);
        SyntheticEnsemble one = SyntheticEnsemble.generate(truth, "oak");
        Replicas replicas = new Replicas();
        for (int k = 0; k < REPETITIONS; k++) {
            List<double[]> c = values(SyntheticEnsemble.generate(truth, "oak", k)).get("nucleon.two-point");
            for (int t : new int[] {2, 8, 13}) {
                replicas.add("t" + t, c.get(1)[t] / one.expectedTwoPoint("nucleon", t));
            }
        }
        for (int t : new int[] {2, 8, 13}) {
            // The sample variance of n Gaussian numbers has a relative error of sqrt(2/n).
            double allowed = LARGEST_PULL * Math.sqrt(2.0 / REPETITIONS);
            assertEquals(1, replicas.variance("t" + t) / one.relativeVariance("nucleon", t), allowed, "t = " + t);
        }
    }

    @Test
    void given_uncorrelated_configurations_when_the_subtracted_product_varies_then_its_variance_is_that_of_gaussian_products() {
        int n = 50;
        Truth truth = shortChain(0.5, n);
        SyntheticEnsemble one = SyntheticEnsemble.generate(truth, "oak");
        Replicas replicas = new Replicas();
        for (int k = 0; k < REPETITIONS; k++) {
            double product = subtracted(values(SyntheticEnsemble.generate(truth, "oak", k)), "action-density.flow1.0", 8, 13 + 3);
            replicas.add("product", product / one.expectedTwoPoint("nucleon", 8));
        }
        double ratio = trueRatio(truth, "action-density.flow1.0", 8, 3);
        // Covariance of two Gaussians from n pairs, divisor n: variance (n - 1)/n^2 (Var C Var X + cov^2). Var X = 42^2.
        double expected = (n - 1.0) / (n * n) * (one.relativeVariance("nucleon", 8) * 42 * 42 + ratio * ratio);
        // Products have heavier tails than normal numbers; their kurtosis is 9, averaged over n: sqrt((2 + 9/n)/repetitions).
        assertEquals(1, replicas.variance("product") / expected, LARGEST_PULL * Math.sqrt((2 + 9.0 / n) / REPETITIONS));
    }

    @Test
    void given_a_stream_with_a_gap_when_slices_are_correlated_along_it_then_rho_decays_over_the_gap() {
        Truth.Stream stream = new Truth.Stream("a", 0, 40, 4, Optional.of(new Study.TrajectoryRange(13, 20)));
        Truth truth = InventedTheory.truth().withEnsembles(List.of(InventedTheory.ensemble().withTauInt(2).withStreams(List.of(stream))));
        SyntheticEnsemble one = SyntheticEnsemble.generate(truth, "oak");
        List<ConfigurationId> ids = one.configurations(one.observables().get(0));
        assertEquals(List.of(0L, 4L, 8L, 12L, 24L, 28L, 32L, 36L, 40L), ids.stream().map(ConfigurationId::trajectory).toList());
        Replicas replicas = new Replicas();
        for (int k = 0; k < REPETITIONS; k++) {
            List<double[]> x = values(SyntheticEnsemble.generate(truth, "oak", k)).get("action-density.flow1.0");
            for (int slice = 0; slice < 16; slice++) {
                replicas.add("next", fluctuation(x, 1, slice) * fluctuation(x, 2, slice));
                replicas.add("third", fluctuation(x, 0, slice) * fluctuation(x, 3, slice));
                replicas.add("over the gap", fluctuation(x, 3, slice) * fluctuation(x, 4, slice));
            }
        }
        Map<String, Double> pulls = replicas.pulls(Map.of("next", 0.6, "third", 0.216, "over the gap", 0.216));
        assertTrue(pulls.values().stream().allMatch(p -> Math.abs(p) < LARGEST_PULL), pulls::toString);
    }

    private static double fluctuation(List<double[]> x, int configuration, int slice) {
        return (x.get(configuration)[slice] - 0.085 * 1728) / 42;
    }

    @Test
    void given_two_streams_when_slices_are_correlated_between_them_then_they_are_independent() {
        List<Truth.Stream> streams = List.of(new Truth.Stream("b", 0, 1, 1, Optional.empty()), new Truth.Stream("a", 5, 6, 1, Optional.empty()));
        Truth truth = InventedTheory.truth().withEnsembles(List.of(InventedTheory.ensemble().withTauInt(5).withStreams(streams)));
        SyntheticEnsemble one = SyntheticEnsemble.generate(truth, "oak");
        assertEquals(List.of("a:5", "a:6", "b:0", "b:1"), one.configurations(one.observables().get(0)).stream().map(ConfigurationId::toString).toList());
        Replicas replicas = new Replicas();
        for (int k = 0; k < REPETITIONS; k++) {
            List<double[]> x = values(SyntheticEnsemble.generate(truth, "oak", k)).get("action-density.flow1.0");
            replicas.add("product", fluctuation(x, 1, 3) * fluctuation(x, 2, 3));
        }
        assertEquals(0, replicas.pull("product", 0), LARGEST_PULL);
    }

    @Test
    void given_many_chains_when_noise_is_compared_between_configurations_and_hadrons_then_its_correlations_are_the_true_ones() {
        Truth truth = shortChain(2, 2);
        SyntheticEnsemble one = SyntheticEnsemble.generate(truth, "oak");
        Replicas replicas = new Replicas();
        for (int k = 0; k < REPETITIONS; k++) {
            SyntheticEnsemble ensemble = SyntheticEnsemble.generate(truth, "oak", k);
            Map<String, List<double[]>> all = values(ensemble);
            double pion = deviation(ensemble, all, "pion", 0);
            replicas.add("chain", pion * deviation(ensemble, all, "pion", 1));
            replicas.add("hadrons", pion * deviation(ensemble, all, "nucleon", 0));
        }
        // Pion: N = 0.03, rho = 0.6 at tau_int = 2. Nucleon: N^2 = Var - signal; half of the noise is common.
        double nucleonNoise = Math.sqrt(one.relativeVariance("nucleon", 13) - one.signalVariance("nucleon", 13));
        Map<String, Double> pulls = replicas.pulls(Map.of("chain", 0.6 * 0.03 * 0.03, "hadrons", 0.5 * 0.03 * nucleonNoise));
        assertTrue(pulls.values().stream().allMatch(p -> Math.abs(p) < LARGEST_PULL), pulls::toString);
    }

    /** C2/Cbar - 1 at t = 13. */
    private static double deviation(SyntheticEnsemble ensemble, Map<String, List<double[]>> all, String hadron, int configuration) {
        return all.get(hadron + ".two-point").get(configuration)[13] / ensemble.expectedTwoPoint(hadron, 13) - 1;
    }

    @Test
    void given_hit_noise_when_a_loop_varies_then_its_variance_is_the_sum_of_both() {
        Truth truth = shortChain(1, 2);
        Truth.Theory t = truth.theory();
        Truth.Operators o = t.operators();
        Truth.Operators noisy = new Truth.Operators(o.light(), new Truth.SliceOperator(-0.30, 12, 9), o.densities(), o.lightStrange(), o.loopDensity(),
            o.flowTimes());
        Truth loud = truth.withTheory(new Truth.Theory(t.flavors(), t.gammaM(), t.physicalPionGev(), t.condensateGev(), t.strangeMassGev(),
            t.flowSlope(), t.pion(), t.baryons(), noisy, t.noise()));
        Replicas replicas = new Replicas();
        for (int k = 0; k < REPETITIONS; k++) {
            replicas.add("strange", values(SyntheticEnsemble.generate(loud, "oak", k)).get("loop.strange").get(1)[4]);
        }
        assertEquals(1, replicas.variance("strange") / (12 * 12 + 9 * 9), LARGEST_PULL * Math.sqrt(2.0 / REPETITIONS));
    }

    @Test
    void given_one_seed_when_read_then_its_numbers_are_moved_by_no_machine_and_no_release() {
        // Frozen: all functions used give the same bits everywhere.
        Map<String, List<double[]>> all = values(SyntheticEnsemble.generate(InventedTheory.truth(), "oak", 9));
        assertEquals(0.003720725145873206, all.get("nucleon.two-point").get(15)[3]);
        assertEquals(0.0062082614292865036, all.get("nucleon.connected.light.t5").get(15)[3]);
        assertEquals(44.29483719621191, all.get("action-density.flow2.0").get(15)[3]);
    }

    @Test
    void given_one_seed_when_generated_twice_and_read_in_parts_then_every_number_has_the_same_bits() {
        Map<String, List<double[]>> first = values(SyntheticEnsemble.generate(InventedTheory.truth(), "oak", 9));
        SyntheticEnsemble again = SyntheticEnsemble.generate(InventedTheory.truth(), "oak", 9);
        for (int o = again.observables().size() - 1; o >= 0; o--) {
            String id = again.observables().get(o).id();
            again.read(x -> x.id().equals(id), c -> c.trajectory() == 40, (x, c, s, v) -> assertArrayEquals(first.get(id).get(15), v, id));
        }
        List<double[]> other = values(SyntheticEnsemble.generate(InventedTheory.truth(), "oak", 10)).get("nucleon.two-point");
        assertFalse(Arrays.equals(first.get("nucleon.two-point").get(0), other.get(0)));
    }

    @Test
    void given_a_second_baryon_when_generated_then_the_first_ones_numbers_do_not_move() {
        Truth truth = InventedTheory.truth();
        Map<String, Truth.Baryon> two = Map.of("nucleon", InventedTheory.nucleon(), "another", InventedTheory.nucleon());
        Map<String, List<double[]>> alone = values(SyntheticEnsemble.generate(truth, "oak"));
        Map<String, List<double[]>> both = values(SyntheticEnsemble.generate(truth.withTheory(truth.theory().withBaryons(two)), "oak"));
        for (String id : alone.keySet()) {
            assertArrayEquals(alone.get(id).get(20), both.get(id).get(20), id);
        }
        assertNotEquals(both.get("nucleon.two-point").get(0)[3], both.get("another.two-point").get(0)[3]);
    }

    @Test
    void given_what_a_sink_does_to_an_array_when_read_again_then_the_ensemble_has_not_changed() {
        SyntheticEnsemble ensemble = SyntheticEnsemble.generate(InventedTheory.truth(), "oak");
        double[] before = values(ensemble).get("loop.light").get(0).clone();
        ensemble.read(o -> true, c -> true, (o, c, s, v) -> {
            Arrays.fill(v, 0);
            Arrays.fill(s, 0);
        });
        assertArrayEquals(before, values(ensemble).get("loop.light").get(0));
    }

    @Test
    void given_moving_sources_when_read_then_times_follow_the_position_in_the_stream() {
        SyntheticEnsemble ensemble = SyntheticEnsemble.generate(InventedTheory.truth(), "oak");
        List<int[]> times = new ArrayList<>();
        ensemble.read(o -> o.id().equals("nucleon.two-point") || o.id().equals("nucleon.connected.light.t3"), c -> c.trajectory() == 18,
            (o, c, s, v) -> times.add(s));
        // Fifth configuration: (1 + 4 s + 4 x 3) mod 16; the connected ones use the first two.
        assertArrayEquals(new int[] {13, 1, 5, 9}, times.get(0));
        assertArrayEquals(new int[] {13, 1}, times.get(1));
    }

    @Test
    void given_the_small_theory_when_its_weights_are_squared_then_they_stay_below_a_third_of_the_mean() {
        SyntheticEnsemble ensemble = SyntheticEnsemble.generate(InventedTheory.truth(), "oak");
        for (int t = 0; t < 16; t++) {
            assertTrue(ensemble.signalVariance("nucleon", t) < 0.35, "t = " + t);
        }
        assertEquals(0, ensemble.signalVariance("pion", 5));
        // N(t) = 0.004 exp((M - 3/2 Mpi) t), a M = 0.61855..., a Mpi = 0.17179...
        double noise = 0.004 * StrictMath.exp((0.6185537589228636 - 1.5 * 0.1717960712777018) * 13);
        assertEquals(ensemble.signalVariance("nucleon", 13) + noise * noise, ensemble.relativeVariance("nucleon", 13), 1e-13);
    }
}
