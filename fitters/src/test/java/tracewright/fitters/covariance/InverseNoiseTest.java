package tracewright.fitters.covariance;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import tools.jackson.databind.JsonNode;
import tracewright.fitters.ReferenceData;

@DisplayNameGeneration(ReplaceUnderscores.class)
class InverseNoiseTest {

    /** A handful of roundings. */
    private static final double RELATIVE = 1e-14;

    @Test
    void given_blocks_points_and_parameters_then_the_factors_are_those_of_the_reference() {
        // covariance_noise.json: closed forms evaluated with mpmath.
        for (JsonNode c : ReferenceData.read("covariance_noise").get("cases")) {
            int g = c.get("blocks").asInt();
            int f = c.get("points").asInt() - c.get("parameters").asInt();
            same(c, "expected_chi2", InverseNoise.expectedChiSquared(f, g));
            same(c, "reported_over_known", InverseNoise.reportedOverKnown(f, g));
            same(c, "true_over_known", InverseNoise.trueOverKnown(f, g));
            same(c, "factor", InverseNoise.factor(f, g));
        }
    }

    private static void same(JsonNode c, String key, double x) {
        assertEquals(c.get(key).asDouble(), x, RELATIVE * c.get(key).asDouble(), key);
    }

    @Test
    void given_forty_blocks_then_eleven_degrees_of_freedom_are_the_most() {
        // By hand: 39 * 38/(28 * 27) = 1.960 at f = 11, 39 * 38/(27 * 26) = 2.111 at f = 12.
        assertEquals(11, InverseNoise.mostDegreesOfFreedom(40));
        // 199 * 198/(141 * 140) = 1.996 at f = 58, 199 * 198/(140 * 139) = 2.025 at f = 59.
        assertEquals(58, InverseNoise.mostDegreesOfFreedom(200));
        assertEquals(0, InverseNoise.mostDegreesOfFreedom(3));
    }

    @Test
    void given_no_degrees_of_freedom_then_the_weight_does_not_matter_and_neither_does_its_noise() {
        assertEquals(1, InverseNoise.factor(0, 10));
        assertEquals(0, InverseNoise.expectedChiSquared(0, 10));
    }

    @Test
    void given_too_few_blocks_then_both_numbers_are_named() {
        String message = assertThrows(IllegalArgumentException.class, () -> InverseNoise.factor(8, 10)).getMessage();
        assertTrue(message.contains("8 degrees of freedom from 10 blocks"), message);
    }
}
