package tracewright.fitters.goodness;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;
import static tracewright.fitters.ReferenceData.doubles;

import java.util.Arrays;
import java.util.Map;
import java.util.Random;
import java.util.stream.IntStream;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import tools.jackson.databind.JsonNode;
import tracewright.fitters.GaussianBlocks;
import tracewright.fitters.ReferenceData;
import tracewright.fitters.covariance.CovarianceRule;
import tracewright.fitters.covariance.Weighting;
import tracewright.fitters.sampled.SampledVector;

/** One straight line through the mean of 40 blocks under four weights; 40 digits, simulations with 20,000 repetitions: goodness.json. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class FitQualityTest {

    private static final JsonNode DATA = ReferenceData.read("goodness");
    private static final double[][] BLOCKS = IntStream.range(0, 40).mapToObj(k -> doubles(DATA.get("blocks").get(k))).toArray(double[][]::new);
    private static final SampledVector VECTOR = GaussianBlocks.jackknife(BLOCKS);
    private static final double[] LINE = LinearFit.line(10);
    private static final Map<String, CovarianceRule> RULES = Map.of("full", new CovarianceRule.Full(), "shrunk", new CovarianceRule.Shrunk(),
        "floored", new CovarianceRule.Floored(0.1), "diagonal", new CovarianceRule.Diagonal());
    private static final double RELATIVE = 1e-9;
    private static final int SIMULATIONS = 4000;

    private static JsonNode reference(String rule) {
        for (JsonNode c : DATA.get("cases")) {
            if (c.get("weighting").asString().equals(rule)) {
                return c;
            }
        }
        throw new AssertionError("no case " + rule);
    }

    private static LinearFit fit(String rule) {
        return LinearFit.of(VECTOR, RULES.get(rule), LINE, 1);
    }

    private static void same(double expected, double x) {
        assertEquals(expected, x, RELATIVE * Math.abs(expected));
    }

    @Test
    void given_the_blocks_then_their_covariance_is_the_reference() {
        for (int i = 0; i < 10; i++) {
            for (int j = 0; j < 10; j++) {
                same(DATA.get("covariance_of_mean").get(i).get(j).asDouble(), VECTOR.covariance()[i * 10 + j]);
            }
        }
    }

    @ParameterizedTest
    @ValueSource(strings = {"full", "shrunk", "floored", "diagonal"})
    void given_a_rule_then_parameters_minimum_sandwich_eigenvalues_and_expectation_are_the_reference(String rule) {
        JsonNode c = reference(rule);
        LinearFit fit = fit(rule);
        same(c.get("parameters").get(0).asDouble(), fit.parameters().a());
        same(c.get("parameters").get(1).asDouble(), fit.parameters().b());
        same(c.get("chi2").asDouble(), fit.chiSquared());
        for (int i = 0; i < 4; i++) {
            double scale = Math.sqrt(c.get("parameter_covariance").get(i / 2).get(i / 2).asDouble() * c.get("parameter_covariance").get(i % 2).get(i % 2).asDouble());
            assertEquals(c.get("parameter_covariance").get(i / 2).get(i % 2).asDouble(), fit.quality().covariance()[i], RELATIVE * scale);
        }
        assertArrayEquals(doubles(c.get("eigenvalues")), fit.quality().lambda(), RELATIVE);
        same(c.get("expected_chi2").asDouble(), fit.quality().expected());
        assertEquals(fit.chiSquared(), fit.quality().chiSquared());
        assertEquals(8, fit.quality().degreesOfFreedom());
    }

    @Test
    void given_shrunk_and_floored_then_what_the_rule_did_is_the_reference() {
        same(reference("shrunk").get("intensity").asDouble(), LinearFit.weighting(VECTOR, RULES.get("shrunk")).shrinkage());
        assertEquals(reference("floored").get("raised").asInt(), LinearFit.weighting(VECTOR, RULES.get("floored")).raisedEigenvalues());
    }

    @ParameterizedTest
    @ValueSource(strings = {"full", "shrunk", "floored", "diagonal"})
    void given_a_rule_then_the_weighted_tail_at_the_minimum_is_the_reference(String rule) {
        double p = reference(rule).get("p_weighted").asDouble();
        FitQuality quality = fit(rule).quality();
        assertEquals(p, WeightedChiSquares.upperTail(quality.chiSquared(), quality.lambda()), 1e-8 * p);
    }

    @Test
    void given_the_full_rule_then_p_is_hotelling_and_the_noise_is_in_closed_form() {
        FitQuality q = fit("full").quality();
        assertEquals(reference("full").get("p_hotelling").asDouble(), q.pValue(), 1e-8 * q.pValue());
        same(reference("full").get("variance_factor").asDouble(), q.noiseFactor());
        same(10.4, q.expectedWithNoise());   // 8 * 39/(40 - 8 - 2)
    }

    @ParameterizedTest
    @ValueSource(strings = {"floored", "diagonal"})
    void given_a_rule_that_hardly_feels_the_noise_then_p_is_the_weighted_tail(String rule) {
        double p = reference(rule).get("p_weighted").asDouble();
        assertEquals(p, fit(rule).quality().pValue(), 1e-8 * p);
    }

    @Test
    void given_the_shrunk_rule_then_p_is_the_tail_at_the_minimum_rescaled_by_the_simulated_expectation() {
        FitQuality q = fit("shrunk").quality();
        double rescaled = q.chiSquared() * q.expected() / q.expectedWithNoise();
        assertEquals(WeightedChiSquares.upperTail(rescaled, q.lambda()), q.pValue());
        assertTrue(q.pValue() > 1.1 * reference("shrunk").get("p_weighted").asDouble());
    }

    /** The file's error is of 20,000 repetitions; four times the error of both in quadrature. */
    private static double tolerance(JsonNode simulation, String key, int simulations) {
        return 4 * simulation.get(key + "_error").asDouble() * Math.sqrt(1 + 20_000.0 / simulations);
    }

    @ParameterizedTest
    @ValueSource(strings = {"full", "shrunk", "floored", "diagonal"})
    void given_a_rule_when_simulated_at_length_then_factor_and_expectation_are_the_reference(String rule) {
        JsonNode simulation = reference(rule).get("noise_simulation");
        CovarianceNoise noise = CovarianceNoise.simulate(LinearFit.weighting(VECTOR, RULES.get(rule)), LINE, 2, SIMULATIONS, 7);
        assertEquals(simulation.get("factor").asDouble(), noise.factor(), tolerance(simulation, "factor", SIMULATIONS));
        assertEquals(simulation.get("expected_chi2").asDouble(), noise.expected(), tolerance(simulation, "expected_chi2", SIMULATIONS));
    }

    @ParameterizedTest
    @ValueSource(strings = {"shrunk", "floored", "diagonal"})
    void given_a_rule_when_judged_then_its_short_simulation_is_the_reference_within_its_error(String rule) {
        JsonNode simulation = reference(rule).get("noise_simulation");
        FitQuality q = fit(rule).quality();
        assertEquals(simulation.get("factor").asDouble(), q.noiseFactor(), tolerance(simulation, "factor", CovarianceNoise.SIMULATIONS));
        assertEquals(simulation.get("expected_chi2").asDouble(), q.expectedWithNoise(), tolerance(simulation, "expected_chi2", CovarianceNoise.SIMULATIONS));
    }

    @Test
    void given_the_same_seed_then_the_same_bits_and_otherwise_not() {
        FitQuality q = LinearFit.of(VECTOR, RULES.get("shrunk"), LINE, 5).quality();
        assertEquals(q.noiseFactor(), LinearFit.of(VECTOR, RULES.get("shrunk"), LINE, 5).quality().noiseFactor());
        assertEquals(q.pValue(), LinearFit.of(VECTOR, RULES.get("shrunk"), LINE, 5).quality().pValue());
        assertTrue(q.noiseFactor() != LinearFit.of(VECTOR, RULES.get("shrunk"), LINE, 6).quality().noiseFactor());
    }

    @Test
    void given_as_many_points_as_parameters_then_nothing_is_tested_and_the_weight_makes_no_noise() {
        for (CovarianceRule rule : RULES.values()) {
            FitQuality q = LinearFit.of(VECTOR.select(0, 9), rule, new double[] {1, 0, 1, 0.9}, 1).quality();
            assertEquals(0, q.degreesOfFreedom());
            assertEquals(1, q.pValue());
            assertEquals(1, q.noiseFactor());
            assertEquals(0, q.expected());
            // The line passes through both points: the variance of its value at zero is that of the first.
            same(VECTOR.covariance()[0], q.covariance()[0]);
        }
    }

    @Test
    void given_a_factor_below_one_by_the_noise_of_its_simulation_then_one_is_reported() {
        // With 400 blocks F - 1 is of order 1/400 and the noise of 200 simulations sqrt(2/400)/sqrt(200) = 1/200.
        SampledVector many = GaussianBlocks.jackknife(GaussianBlocks.draw(400, new double[2], new double[] {1, 2}, 0.3, new Random(1)));
        Weighting w = LinearFit.weighting(many, new CovarianceRule.Diagonal());
        double[] constant = {1, 1};
        int below = 0;
        for (long seed = 0; seed < 20; seed++) {
            double simulated = CovarianceNoise.simulate(w, constant, 1, CovarianceNoise.SIMULATIONS, seed).factor();
            assertEquals(Math.max(1, simulated), FitQuality.of(w, constant, 1, 1, seed).noiseFactor());
            below += simulated < 1 ? 1 : 0;
        }
        assertTrue(below > 0);
    }

    @Test
    void given_fewer_blocks_than_points_then_only_the_directions_that_vary_are_counted() {
        SampledVector few = GaussianBlocks.jackknife(Arrays.copyOf(BLOCKS, 6));
        for (String rule : new String[] {"shrunk", "floored", "diagonal"}) {
            FitQuality q = LinearFit.of(few, RULES.get(rule), LINE, 1).quality();
            assertEquals(5, q.lambda().length);   // rank g - 1
            assertEquals(8, q.degreesOfFreedom());
            assertTrue(q.noiseFactor() >= 1 && Double.isFinite(q.noiseFactor()));
            assertTrue(q.pValue() >= 0 && q.pValue() <= 1);
        }
    }

    @Test
    void given_a_floor_so_low_that_rounding_shows_in_the_directions_without_data_then_these_are_not_counted() {
        // A rounding of 1e-16 in R over a floor of 1e-9 looks like an eigenvalue of 1e-7.
        FitQuality q = LinearFit.of(GaussianBlocks.jackknife(Arrays.copyOf(BLOCKS, 6)), new CovarianceRule.Floored(1e-9), LINE, 1).quality();
        assertEquals(5, q.lambda().length);
    }

    @Test
    void given_a_jacobian_that_does_not_determine_the_parameters_or_fit_the_points_then_that_is_said() {
        Weighting w = LinearFit.weighting(VECTOR, RULES.get("diagonal"));
        double[] twice = new double[20];
        Arrays.fill(twice, 1);
        assertTrue(assertThrows(ArithmeticException.class, () -> FitQuality.of(w, twice, 2, 1, 1)).getMessage().contains("not determined"));
        assertTrue(assertThrows(IllegalArgumentException.class, () -> FitQuality.of(w, LINE, 3, 1, 1)).getMessage().contains("20 entries"));
        assertThrows(IllegalArgumentException.class, () -> FitQuality.of(w, new double[110], 11, 1, 1));
        Weighting few = LinearFit.weighting(GaussianBlocks.jackknife(Arrays.copyOf(BLOCKS, 6)).select(0, 2, 4, 6, 8), RULES.get("full"));
        assertTrue(assertThrows(IllegalArgumentException.class, () -> FitQuality.of(few, new double[] {1, 1, 1, 1, 1}, 1, 1, 1)).getMessage()
            .contains("4 degrees of freedom from 6 blocks"));
    }
}
