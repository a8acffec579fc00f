package tracewright.fitters.sampled;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;
import static tracewright.fitters.ReferenceData.doubles;
import static tracewright.fitters.ReferenceData.ints;

import java.util.ArrayList;
import java.util.List;
import java.util.Random;
import java.util.stream.IntStream;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import tools.jackson.databind.JsonNode;
import tracewright.fitters.ReferenceData;
import tracewright.fitters.autocorrelation.IntegratedTime;

/** Fourteen blocks of unequal size in two streams, one with a gap; computed with 40 digits: neighbour_term.json. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class NeighbourTermTest {

    private static final JsonNode DATA = ReferenceData.read("neighbour_term");

    private static List<BlockLabel> labels() {
        List<BlockLabel> labels = new ArrayList<>();
        for (JsonNode label : DATA.get("labels")) {
            labels.add(new BlockLabel(label.get(0).asString(), label.get(1).asLong()));
        }
        return labels;
    }

    private static SampledNumber number(int i) {
        JsonNode n = DATA.get("numbers").get(i);
        int[] m = ints(DATA.get("block_sizes"));
        double[] mean = new double[2];
        for (int k = 0; k < m.length; k++) {
            mean[0] += m[k] * DATA.get("block_means").get(k).get(0).asDouble() / IntStream.of(m).sum();
            mean[1] += m[k] * DATA.get("block_means").get(k).get(1).asDouble() / IntStream.of(m).sum();
        }
        double central = i < 2 ? mean[i] : mean[0] / mean[1];
        return SampledNumber.of(central, SampleGroup.jackknife("A", labels(), m), doubles(n.get("samples")));
    }

    /** Samples are given with 17 digits, of which the deviations lose three. */
    private static double tolerance(double scale) {
        return 1e-11 * scale;
    }

    @Test
    void given_blocks_with_a_gap_when_neighbours_are_correlated_then_term_and_published_variance_are_those_of_the_file() {
        for (int i = 0; i < 3; i++) {
            JsonNode expected = DATA.get("numbers").get(i);
            SampledNumber x = number(i);
            NeighbourTerm term = x.neighbourTerm("A").orElseThrow();
            double variance = expected.get("variance").asDouble();
            assertEquals(variance, x.variance(), tolerance(variance));
            assertEquals(expected.get("rho1").asDouble(), term.rho1(), tolerance(1));
            assertEquals(expected.get("kappa").asDouble(), term.factor(), tolerance(1));
            double corrected = expected.get("corrected_variance").asDouble();
            assertEquals(corrected, x.publishedVarianceByGroup().get("A"), tolerance(corrected));
            assertEquals(Math.sqrt(corrected), x.publishedError(), tolerance(Math.sqrt(corrected)));
            assertEquals(expected.get("lagged_bilinear_variance").asDouble(), SampledNumber.laggedCovariance(x, x, "A").orElseThrow(),
                tolerance(variance));
        }
    }

    @Test
    void given_two_numbers_when_the_term_is_taken_as_a_bilinear_form_then_the_covariance_is_that_of_the_file() {
        double expected = DATA.get("lagged_bilinear_covariance_y0_y1").asDouble();
        assertEquals(expected, SampledNumber.laggedCovariance(number(0), number(1), "A").orElseThrow(), tolerance(expected));
        double plain = DATA.get("covariance_y0_y1").asDouble();
        assertEquals(plain, SampledNumber.covariance(number(0), number(1)), tolerance(plain));
        double factors = Math.sqrt(DATA.get("numbers").get(0).get("kappa").asDouble() * DATA.get("numbers").get(1).get("kappa").asDouble());
        assertEquals(factors * plain, SampledNumber.publishedCovariance(number(0), number(1)), tolerance(plain));
        assertEquals(number(2).publishedError() * number(2).publishedError(), SampledNumber.publishedCovariance(number(2), number(2)), 1e-18);
    }

    @Test
    void given_other_groups_beside_the_ensemble_when_published_then_only_the_ensemble_is_widened_and_the_parts_add_up() {
        SampledNumber x = number(0).plus(SampledNumber.input("z", 0, 0.01));
        assertEquals(1e-4, x.publishedVarianceByGroup().get("input:z"), 1e-16);
        assertEquals(x.varianceByGroup().keySet(), x.publishedVarianceByGroup().keySet());
        double sum = x.publishedVarianceByGroup().values().stream().mapToDouble(Double::doubleValue).sum();
        assertEquals(sum, x.publishedError() * x.publishedError(), 1e-15 * sum);
    }

    @Test
    void given_four_blocks_by_hand_when_one_pair_is_adjacent_then_only_it_counts() {
        List<BlockLabel> labels = List.of(new BlockLabel("a", 0), new BlockLabel("a", 1), new BlockLabel("a", 3), new BlockLabel("b", 4));
        SampledNumber x = SampledNumber.of(0, SampleGroup.jackknife("A", labels, new int[] {5, 5, 5, 5}), new double[] {2, 1, -3, 0});
        // Deviations 2, 1, -3, 0: 2 / 14 x 4/1 + 1/4.
        assertEquals(4.0 / 7 + 0.25, x.neighbourTerm("A").orElseThrow().rho1(), 1e-15);
        assertEquals(NeighbourTerm.Verdict.USELESS, x.neighbourTerm("A").orElseThrow().verdict());
    }

    @Test
    void given_no_adjacent_blocks_when_asked_then_there_is_no_term_and_the_published_variance_is_the_plain_one() {
        List<BlockLabel> labels = List.of(new BlockLabel("a", 0), new BlockLabel("a", 2), new BlockLabel("b", 3));
        SampledNumber x = SampledNumber.of(0, SampleGroup.jackknife("A", labels, new int[] {5, 5, 5}), new double[] {2, 1, -3});
        assertTrue(x.neighbourTerm("A").isEmpty());
        assertEquals(x.error(), x.publishedError(), 0);
    }

    @Test
    void given_correlations_of_all_sizes_when_judged_then_the_verdicts_follow_the_rule() {
        assertEquals(NeighbourTerm.Verdict.LONG, verdict(100, 0.05));
        assertEquals(NeighbourTerm.Verdict.SHORT, verdict(400, 0.2));
        assertEquals(NeighbourTerm.Verdict.USELESS, verdict(400, 0.6));
        assertEquals(NeighbourTerm.Verdict.LONG, verdict(30, 0.1));   // 1/sqrt(30) = 0.18
    }

    /** Verdict for a chain d_k = cos(2 pi k n/g), whose neighbours have about the correlation asked for, cos(2 pi n/g). */
    private static NeighbourTerm.Verdict verdict(int g, double rho) {
        int n = (int) Math.round(g * StrictMath.acos(rho) / (2 * Math.PI));
        List<BlockLabel> labels = IntStream.range(0, g).mapToObj(i -> new BlockLabel("a", i)).toList();
        double[] d = IntStream.range(0, g).mapToDouble(k -> StrictMath.cos(2 * Math.PI * k * n / g)).toArray();
        return NeighbourTerm.of(labels, d).verdict();
    }

    @Test
    void given_a_bootstrap_of_a_mean_when_its_neighbours_are_correlated_then_the_term_is_that_of_the_jackknife() {
        int[] m = ints(DATA.get("block_sizes"));
        SampledNumber jackknifed = number(0);
        SampledNumber drawn = drawn(m, 60);
        NeighbourTerm expected = jackknifed.neighbourTerm("A").orElseThrow();
        // The regression is exact for a mean; its condition number is below 1e2.
        assertEquals(expected.rho1(), drawn.neighbourTerm("A").orElseThrow().rho1(), 1e-11);
        double[] p = jackknifed.pseudoValues("A");
        double[] q = drawn.pseudoValues("A");
        for (int k = 0; k < m.length; k++) {
            assertEquals(p[k], q[k], 1e-11);
        }
        assertEquals(SampledNumber.laggedCovariance(jackknifed, jackknifed, "A").orElseThrow(),
            SampledNumber.laggedCovariance(drawn, drawn, "A").orElseThrow(), 1e-13);
    }

    @Test
    void given_fewer_than_three_draws_per_block_when_asked_then_there_is_no_term_and_pseudo_values_say_why() {
        SampledNumber drawn = drawn(ints(DATA.get("block_sizes")), 41);
        assertTrue(drawn.neighbourTerm("A").isEmpty());
        assertTrue(drawn.integratedTime("A").isEmpty());
        assertEquals(drawn.error(), drawn.publishedError(), 0);
        String message = assertThrows(IllegalArgumentException.class, () -> drawn.pseudoValues("A")).getMessage();
        assertTrue(message.contains("3 bootstrap draws for each of its 14 blocks"), message);
    }

    /** Mean y0 with samples sum_k u_bk y_k. */
    private static SampledNumber drawn(int[] m, int draws) {
        int[] c = new Random(3).ints((long) draws * m.length, 0, 4).toArray();
        SampleGroup group = SampleGroup.bootstrapOf("A", labels(), m, 0, c);
        double[] x = new double[draws];
        for (int b = 0; b < draws; b++) {
            for (int k = 0; k < m.length; k++) {
                x[b] += group.share(b, k) * DATA.get("block_means").get(k).get(0).asDouble();
            }
        }
        return SampledNumber.of(number(0).central(), group, x);
    }

    @Test
    void given_pseudo_values_that_follow_a_chain_when_its_time_is_measured_then_it_comes_in_units_of_blocks() {
        int g = 400;
        double[] chain = tracewright.fitters.Chains.autoregressive(g, 2, new Random(8));
        List<BlockLabel> labels = IntStream.range(0, g).mapToObj(i -> new BlockLabel("a", i)).toList();
        double mean = IntStream.range(0, g).mapToDouble(i -> chain[i]).sum() / g;
        double[] samples = IntStream.range(0, g).mapToDouble(i -> (g * mean - chain[i]) / (g - 1)).toArray();
        int[] sizes = IntStream.range(0, g).map(i -> 5).toArray();
        SampledNumber x = SampledNumber.of(mean, SampleGroup.jackknife("A", labels, sizes), samples);
        IntegratedTime.Estimate direct = IntegratedTime.ofChains(chain).estimate();
        assertEquals(direct.tau(), x.integratedTime("A").orElseThrow().estimate().tau(), 1e-10 * direct.tau());
        assertFalse(x.minus(x).integratedTime("A").isPresent());   // does not vary
    }
}
