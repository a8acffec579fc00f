package tracewright.fitters.averaging;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;
import static tracewright.fitters.ReferenceData.doubles;

import java.util.ArrayList;
import java.util.List;
import java.util.stream.IntStream;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import tools.jackson.databind.JsonNode;
import tracewright.fitters.ReferenceData;
import tracewright.fitters.sampled.BlockLabel;
import tracewright.fitters.sampled.SampleGroup;
import tracewright.fitters.sampled.SampledNumber;

/** Twelve windows and six windows with samples, weights from Q + 2 k + 2 d; 40 digits: model_average.json, model_average_samples.json. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class ModelAverageTest {

    private static final JsonNode SIX = ReferenceData.read("model_average_samples");
    private static final String ENSEMBLE = "A";

    private static SampleGroup group(String ensemble, int blocks) {
        return SampleGroup.jackknife(ensemble, IntStream.range(0, blocks).mapToObj(k -> new BlockLabel("a", k)).toList(),
            IntStream.range(0, blocks).map(k -> 10).toArray());
    }

    private static double counted(JsonNode fit) {
        return ModelAverage.criterion(fit.get("chi2").asDouble(), fit.get("parameters").asInt(), fit.get("cut").asInt());
    }

    private static SampledNumber six(int i) {
        JsonNode blocks = SIX.get("samples_by_block");
        double[] samples = IntStream.range(0, blocks.size()).mapToDouble(k -> blocks.get(k).get(i).asDouble()).toArray();
        return SampledNumber.of(SIX.get("fits").get(i).get("value").asDouble(), group(ENSEMBLE, samples.length), samples);
    }

    private static List<ModelAverage.Candidate> sixCandidates(double... factors) {
        List<ModelAverage.Candidate> all = new ArrayList<>();
        for (int i = 0; i < 6; i++) {
            all.add(new ModelAverage.Candidate("w" + i, six(i), counted(SIX.get("fits").get(i)), factors.length == 0 ? 1 : factors[i]));
        }
        return all;
    }

    private static double file(String key) {
        return SIX.get(key).asDouble();
    }

    @Test
    void given_twelve_windows_then_weights_mean_and_spread_are_the_reference() {
        JsonNode data = ReferenceData.read("model_average");
        List<ModelAverage.Candidate> candidates = new ArrayList<>();
        for (JsonNode fit : data.get("fits")) {
            candidates.add(new ModelAverage.Candidate("first " + fit.get("cut"), SampledNumber.exact(fit.get("value").asDouble()), counted(fit), 1));
        }
        ModelAverage a = ModelAverage.of("E0", candidates);
        assertArrayEquals(doubles(data.get("weights")), a.weights(), 1e-12);
        assertEquals(data.get("mean").asDouble(), a.value().central(), 1e-12);
        assertEquals(data.get("between_variance").asDouble(), a.value().varianceByGroup().get("choice:E0"), 1e-12 * data.get("between_variance").asDouble());
        double within = 0;
        for (int i = 0; i < 12; i++) {
            double error = data.get("fits").get(i).get("error").asDouble();
            within += a.weight(i) * error * error;
        }
        assertEquals(data.get("within_variance").asDouble(), within, 1e-12 * within);
    }

    @Test
    void given_six_windows_with_samples_then_every_part_is_the_reference() {
        ModelAverage a = ModelAverage.of("E0", sixCandidates());
        assertArrayEquals(doubles(SIX.get("weights")), a.weights(), 1e-12);
        assertEquals(file("mean"), a.value().central(), 1e-12);
        assertArrayEquals(doubles(SIX.get("samples_of_mean")), a.value().samples(ENSEMBLE), 1e-12);
        // Squares of deviations that are a hundredth of the values: 1e-12 of the values is some 1e-10 of a variance.
        assertEquals(file("statistical_variance_of_mean"), a.value().varianceByGroup().get(ENSEMBLE), 1e-12 * file("statistical_variance_of_mean"));
        assertEquals(file("between_variance"), a.value().varianceByGroup().get("choice:E0"), 1e-12 * file("between_variance"));
        assertEquals(file("total_variance"), a.value().variance(), 1e-12 * file("total_variance"));
        assertEquals(file("effective_models"), a.effectiveNumber(), 1e-12 * file("effective_models"));
        assertEquals(2, a.value().groups().size());
    }

    @Test
    void given_the_published_form_then_it_exceeds_ours_by_the_noise_of_the_differences() {
        ModelAverage a = ModelAverage.of("E0", sixCandidates());
        double mean = 0;
        double noise = 0;
        for (int i = 0; i < 6; i++) {
            mean += a.weight(i) * six(i).variance();
            SampledNumber difference = six(i).minus(a.value());
            noise += a.weight(i) * difference.varianceByGroup().get(ENSEMBLE);
        }
        assertEquals(file("mean_of_variances"), mean, 1e-12 * mean);
        assertEquals(file("noise_part_of_between"), noise, 1e-11 * noise);
        assertEquals(mean, a.value().varianceByGroup().get(ENSEMBLE) + noise, 1e-12 * mean);
    }

    @Test
    void given_expected_chi_squared_instead_of_counts_then_the_weights_are_the_same() {
        List<ModelAverage.Candidate> byExpectation = new ArrayList<>();
        for (int i = 0; i < 6; i++) {
            JsonNode fit = SIX.get("fits").get(i);
            double expected = fit.get("points").asInt() - fit.get("parameters").asInt();
            byExpectation.add(new ModelAverage.Candidate("w" + i, six(i), ModelAverage.criterion(fit.get("chi2").asDouble(), expected), 1));
        }
        // 16 points in the largest set: the criteria differ by 32, exactly.
        assertEquals(32, counted(SIX.get("fits").get(2)) - byExpectation.get(2).criterion());
        assertArrayEquals(doubles(SIX.get("weights")), ModelAverage.of("E0", byExpectation).weights(), 1e-12);
    }

    @Test
    void given_noise_factors_then_they_add_a_group_with_their_mean_excess() {
        double[] factors = {1.1, 1.2, 1.3, 1.4, 1.5, 1.6};
        SampledNumber value = ModelAverage.of("E0", sixCandidates(factors)).value();
        double excess = 0;
        for (int i = 0; i < 6; i++) {
            excess += SIX.get("weights").get(i).asDouble() * (factors[i] - 1);
        }
        double added = value.varianceByGroup().get("fit:E0");
        assertEquals(excess * file("statistical_variance_of_mean"), added, 1e-11 * added);
        assertEquals(file("total_variance") + added, value.variance(), 1e-11 * value.variance());
        assertArrayEquals(new double[] {value.central() + Math.sqrt(added)}, value.samples("fit:E0"), 1e-15);
    }

    @Test
    void given_one_candidate_then_nothing_was_chosen_and_its_noise_stays() {
        SampledNumber x = six(0);
        SampledNumber plain = ModelAverage.of("E0", List.of(new ModelAverage.Candidate("only", x, 1e5, 1))).value();
        assertEquals(List.of(ENSEMBLE), plain.groups().stream().map(SampleGroup::key).toList());
        assertEquals(x.central(), plain.central());
        assertArrayEquals(x.samples(ENSEMBLE), plain.samples(ENSEMBLE));
        SampledNumber noisy = ModelAverage.of("E0", List.of(new ModelAverage.Candidate("only", x, 1e5, 1.5))).value();
        assertEquals(List.of(ENSEMBLE, "fit:E0"), noisy.groups().stream().map(SampleGroup::key).toList());
        assertEquals(1.5 * x.variance(), noisy.variance(), 1e-13 * x.variance());
    }

    @Test
    void given_a_negligible_candidate_then_it_stays_in_the_list_and_leaves_the_value() {
        List<ModelAverage.Candidate> three = new ArrayList<>(sixCandidates().subList(2, 4));
        SampledNumber without = ModelAverage.of("E0", three).value();
        // exp(-30/2) = 3e-7 of the heaviest; so far away that with that weight it would move the mean by 3e-4.
        double criterion = Math.min(three.get(0).criterion(), three.get(1).criterion()) + 30;
        three.add(new ModelAverage.Candidate("far", six(0).shifted(1000), criterion, 1.9));
        ModelAverage a = ModelAverage.of("E0", three);
        assertEquals(StrictMath.exp(-15), a.weight(2) / Math.max(a.weight(0), a.weight(1)), 1e-18);
        assertEquals(1, a.weight(0) + a.weight(1) + a.weight(2), 1e-15);
        assertEquals(without.central(), a.value().central(), 1e-15);
        assertEquals(without.variance(), a.value().variance(), 1e-15);
        assertEquals(2, a.value().samples("choice:E0").length);
        assertTrue(a.value().groups().stream().noneMatch(g -> g.key().equals("fit:E0")));
    }

    @Test
    void given_two_candidates_of_which_one_is_negligible_then_nothing_was_chosen() {
        ModelAverage a = ModelAverage.of("E0", List.of(new ModelAverage.Candidate("a", six(0), 0, 1), new ModelAverage.Candidate("b", six(1), 100, 1)));
        assertEquals(List.of(ENSEMBLE), a.value().groups().stream().map(SampleGroup::key).toList());
        assertEquals(six(0).central(), a.value().central());
    }

    @Test
    void given_criteria_far_below_zero_or_above_then_nothing_underflows() {
        for (double shift : new double[] {-1e5, 1e5}) {
            List<ModelAverage.Candidate> moved = sixCandidates().stream()
                .map(c -> new ModelAverage.Candidate(c.label(), c.value(), c.criterion() + shift, 1)).toList();
            assertArrayEquals(doubles(SIX.get("weights")), ModelAverage.of("E0", moved).weights(), 1e-10);   // 1e5 costs five digits
        }
    }

    @Test
    void given_constants_with_errors_in_the_values_then_their_variance_has_no_noise_of_covariances() {
        SampledNumber z = SampledNumber.input("z", 2, 0.5);
        ModelAverage a = ModelAverage.of("E0", List.of(new ModelAverage.Candidate("a", six(0).times(z), 0, 1.5),
            new ModelAverage.Candidate("b", six(1).times(z), 0, 1.5)));
        assertEquals(0.5 * a.value().varianceByGroup().get(ENSEMBLE), a.value().varianceByGroup().get("fit:E0"), 1e-12);
    }

    @Test
    void given_fits_to_other_blocks_or_ensembles_then_both_are_named() {
        SampledNumber other = SampledNumber.of(1, group("B", 3), new double[] {1, 2, 3});
        SampledNumber shorter = SampledNumber.of(1, group(ENSEMBLE, 3), new double[] {1, 2, 3});
        for (SampledNumber x : List.of(other, shorter)) {
            String message = assertThrows(IllegalArgumentException.class, () -> ModelAverage.of("E0",
                List.of(new ModelAverage.Candidate("long", six(0), 0, 1), new ModelAverage.Candidate("short", x, 0, 1)))).getMessage();
            assertTrue(message.contains("E0") && message.contains("fit short") && message.contains("fit long") && message.contains("same blocks"), message);
        }
    }

    @Test
    void given_nothing_to_average_or_a_candidate_without_sense_then_it_is_refused() {
        assertThrows(IllegalArgumentException.class, () -> ModelAverage.of("E0", List.of()));
        assertThrows(IllegalArgumentException.class, () -> new ModelAverage.Candidate("a", six(0), Double.NaN, 1));
        assertThrows(IllegalArgumentException.class, () -> new ModelAverage.Candidate("a", six(0), 0, 0.9));
        assertThrows(IllegalArgumentException.class, () -> new ModelAverage.Candidate("a", six(0), 0, Double.POSITIVE_INFINITY));
    }
}
