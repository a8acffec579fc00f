package tracewright.fitters.goodness;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;

import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.junit.jupiter.api.Test;
import tools.jackson.databind.JsonNode;
import tools.jackson.databind.node.JsonNodeFactory;
import tracewright.fitters.ReferenceData;

/** Tails computed with mpmath, 40 digits: distributions.json, distribution_grid.json. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class TailsTest {

    private interface Tail {
        double at(JsonNode row);
    }

    private static void compare(String file, String key, Tail tail) {
        JsonNode rows = ReferenceData.read(file).path(key);
        for (JsonNode row : rows.isMissingNode() ? JsonNodeFactory.instance.arrayNode() : rows) {
            double p = row.get(row.size() - 1).asDouble();
            same(p, tail.at(row), key + " " + row);
        }
    }

    /** 1e-12, and relative 1e-10 in tails that this would not see. */
    private static void same(double expected, double p, String where) {
        assertEquals(expected, p, Math.min(1e-12, 1e-10 * expected), where);
    }

    @ParameterizedTest
    @ValueSource(strings = {"distributions", "distribution_grid"})
    void given_arguments_of_a_reference_grid_then_the_tails_are_the_reference(String file) {
        compare(file, "normal_upper", r -> Tails.normal(r.get(0).asDouble()));
        compare(file, "chi2_upper", r -> Tails.chiSquared(r.get(0).asDouble(), r.get(1).asInt()));
        compare(file, "f_upper", r -> Tails.fisher(r.get(0).asDouble(), r.get(1).asInt(), r.get(2).asInt()));
        compare(file, "student_two_sided", r -> Tails.studentTwoSided(r.get(0).asDouble(), r.get(1).asInt()));
        for (JsonNode h : ReferenceData.read(file).get("hotelling")) {
            same(h.get("p").asDouble(), Tails.hotelling(h.get("t2").asDouble(), h.get("dimension").asInt(), h.get("blocks").asInt()), h.toString());
        }
    }

    @Test
    void given_reference_quantiles_then_the_tails_there_are_the_levels() {
        JsonNode grid = ReferenceData.read("distribution_grid");
        for (JsonNode q : grid.get("chi2_upper_quantile")) {
            same(q.get(0).asDouble(), Tails.chiSquared(q.get(2).asDouble(), q.get(1).asInt()), q.toString());
        }
        for (JsonNode q : grid.get("normal_quantile_of_upper")) {
            same(q.get(0).asDouble(), Tails.normal(q.get(1).asDouble()), q.toString());
        }
    }

    @Test
    void given_degrees_of_freedom_then_one_sigma_of_student_is_the_reference() {
        JsonNode grid = ReferenceData.read("distribution_grid");
        for (JsonNode s : grid.get("student_half_width_for_68")) {
            assertEquals(s.get(1).asDouble(), Tails.studentOneSigma(s.get(0).asInt()), 1e-12);
        }
        for (JsonNode s : grid.get("student_coverage_of_one_error")) {
            assertEquals(1 - s.get(1).asDouble(), Tails.studentTwoSided(1, s.get(0).asInt()), 1e-12);
        }
    }

    @Test
    void given_the_closed_forms_of_noise_then_hotelling_at_and_above_the_mean_is_the_reference() {
        for (JsonNode c : ReferenceData.read("covariance_noise").get("cases")) {
            int f = c.get("points").asInt() - c.get("parameters").asInt();
            same(c.get("p_at_dof").asDouble(), Tails.hotelling(f, f, c.get("blocks").asInt()), c.toString());
            same(c.get("p_at_twice_dof").asDouble(), Tails.hotelling(2.0 * f, f, c.get("blocks").asInt()), c.toString());
        }
    }

    @Test
    void given_nothing_to_exceed_then_the_tail_is_one() {
        assertEquals(1, Tails.chiSquared(0, 3));
        assertEquals(1, Tails.fisher(0, 3, 5));
        assertEquals(1, Tails.studentTwoSided(0, 3));
        assertEquals(1, Tails.hotelling(0, 3, 10));
    }

    @Test
    void given_impossible_degrees_of_freedom_then_they_are_refused() {
        assertThrows(IllegalArgumentException.class, () -> Tails.chiSquared(1, 0));
        assertThrows(IllegalArgumentException.class, () -> Tails.fisher(1, 1, 0));
        assertThrows(IllegalArgumentException.class, () -> Tails.studentTwoSided(1, 0));
        assertThrows(IllegalArgumentException.class, () -> Tails.hotelling(1, 10, 10));
    }
}
