package tracewright.fitters.sampled;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static tracewright.fitters.ReferenceData.doubles;
import static tracewright.fitters.ReferenceData.ints;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import tools.jackson.databind.JsonNode;
import tracewright.fitters.ReferenceData;

/**
 * Two ensembles (unequal jackknife, plain bootstrap), two correlated inputs, one choice; eight numbers and their covariances
 * by group, computed with 40 digits from the definitions: sampled_numbers.json.
 */
@DisplayNameGeneration(ReplaceUnderscores.class)
class SampledNumberReferenceTest {

    private static final JsonNode DATA = ReferenceData.read("sampled_numbers");

    /** Names of the groups in the file and in the program. */
    private static final Map<String, String> KEYS = Map.of("ensemble alpha (jackknife)", "alpha", "ensemble beta (bootstrap)", "beta",
        "input a, Z", "input:aZ", "choice k", "choice:k");

    private static List<SampledNumber> numbers() {
        JsonNode c = DATA.get("central");
        SampledNumber x = SampledNumber.of(c.get("x").asDouble(), alpha(), doubles(DATA.get("jackknife").get("x")));
        SampledNumber u = SampledNumber.of(c.get("u").asDouble(), alpha(), doubles(DATA.get("jackknife").get("u")));
        double[] draws = doubles(DATA.get("bootstrap").get("y"));
        SampledNumber y = SampledNumber.of(c.get("y").asDouble(), plainBootstrap(draws.length), draws);
        JsonNode s = DATA.get("input").get("covariance");
        List<SampledNumber> inputs = SampledNumber.inputs("aZ", new double[] {c.get("a").asDouble(), c.get("Z").asDouble()}, new double[] {
            s.get(0).get(0).asDouble(), s.get(0).get(1).asDouble(), s.get(1).get(0).asDouble(), s.get(1).get(1).asDouble()});
        SampledNumber k = SampledNumber.exact(c.get("k").asDouble()).withChoice("k", doubles(DATA.get("choice").get("weights")),
            doubles(DATA.get("choice").get("k")));
        SampledNumber a = inputs.get(0);
        SampledNumber z = inputs.get(1);
        SampledNumber f = SampledNumber.evaluate(v -> v[0] * v[1] * v[2] * v[3] / v[4], x, y, z, k, a);
        SampledNumber h = SampledNumber.evaluate(v -> StrictMath.log(v[0] / v[1]), x, u);
        return List.of(x, u, y, a, z, f, h, f.dividedBy(y.times(z)));
    }

    private static SampleGroup alpha() {
        int[] sizes = ints(DATA.get("jackknife").get("block_sizes"));
        List<BlockLabel> labels = new ArrayList<>();
        for (int i = 0; i < sizes.length; i++) {
            labels.add(new BlockLabel("a", i));
        }
        return SampleGroup.jackknife("alpha", labels, sizes);
    }

    /** The file uses the plain weight 1/(B - 1). Which blocks were drawn does not enter. */
    private static SampleGroup plainBootstrap(int draws) {
        double[] shares = new double[2 * draws];
        java.util.Arrays.fill(shares, 0.5);
        return SampleGroup.bootstrap("beta", List.of(new BlockLabel("b", 0), new BlockLabel("b", 1)), new int[] {1, 1}, 1.0 / (draws - 1), shares);
    }

    @Test
    void given_eight_numbers_when_formed_from_each_other_then_central_values_are_those_of_the_file() {
        double[] expected = doubles(DATA.get("central_values"));
        List<SampledNumber> numbers = numbers();
        for (int i = 0; i < expected.length; i++) {
            assertEquals(expected[i], numbers.get(i).central(), 4 * Math.ulp(expected[i]));   // four operations at most
        }
    }

    @Test
    void given_any_two_of_them_when_their_covariance_is_split_by_group_then_each_part_is_that_of_the_file() {
        List<SampledNumber> numbers = numbers();
        int compared = 0;
        for (Map.Entry<String, JsonNode> part : DATA.get("covariance_by_group").properties()) {
            String key = KEYS.get(part.getKey());
            for (int i = 0; i < numbers.size(); i++) {
                for (int j = 0; j < numbers.size(); j++) {
                    double found = SampledNumber.covarianceByGroup(numbers.get(i), numbers.get(j)).getOrDefault(key, 0.0);
                    assertEquals(part.getValue().get(i).get(j).asDouble(), found, tolerance(i, j), key + " " + i + " " + j);
                    compared++;
                }
            }
        }
        assertEquals(4 * 64, compared);
    }

    @Test
    void given_any_two_of_them_when_the_groups_are_summed_then_the_covariance_is_that_of_the_file() {
        List<SampledNumber> numbers = numbers();
        for (int i = 0; i < numbers.size(); i++) {
            for (int j = 0; j < numbers.size(); j++) {
                double expected = DATA.get("covariance").get(i).get(j).asDouble();
                assertEquals(expected, SampledNumber.covariance(numbers.get(i), numbers.get(j)), tolerance(i, j));
            }
        }
    }

    /** 1e-11 of the product of the errors: sixteen digits less the three lost when samples are subtracted from a centre, and some room. */
    private static double tolerance(int i, int j) {
        JsonNode c = DATA.get("covariance");
        return 1e-11 * Math.sqrt(c.get(i).get(i).asDouble() * c.get(j).get(j).asDouble());
    }
}
