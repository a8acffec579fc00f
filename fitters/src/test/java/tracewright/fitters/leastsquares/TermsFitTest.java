package tracewright.fitters.leastsquares;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.IOException;
import java.io.InputStream;
import java.util.ArrayList;
import java.util.List;
import java.util.SplittableRandom;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import tools.jackson.databind.JsonNode;
import tools.jackson.databind.ObjectMapper;
import tracewright.fitters.sampled.SampledNumber;

@DisplayNameGeneration(ReplaceUnderscores.class)
class TermsFitTest {

    /**
     * Pearson's data with York's weights, answer as published: York, Can. J. Phys. 44 (1966) 1079; York et al., Am. J. Phys. 72
     * (2004) 367; digits beyond the printed ones from the minimum of sum (y - a - b x)^2/(sy^2 + b^2 sx^2), see the file's note.
     */
    @Test
    void given_errors_on_both_axes_when_fitted_then_the_published_straight_line_comes_out() throws IOException {
        JsonNode data = resource("abscissa_errors.json");
        List<SampledNumber> y = new ArrayList<>();
        List<List<SampledNumber>> design = new ArrayList<>();
        for (int i = 0; i < data.get("x").size(); i++) {
            y.add(SampledNumber.input("y" + i, data.get("y").get(i).asDouble(), 1 / Math.sqrt(data.get("weight_y").get(i).asDouble())));
            SampledNumber x = SampledNumber.input("x" + i, data.get("x").get(i).asDouble(), 1 / Math.sqrt(data.get("weight_x").get(i).asDouble()));
            design.add(List.of(SampledNumber.exact(1), x));
        }
        TermsFit fit = TermsFit.of("line", y, design);
        assertEquals(data.get("intercept").asDouble(), fit.parameters().get(0).central(), 1e-9);
        assertEquals(data.get("slope").asDouble(), fit.parameters().get(1).central(), 1e-9);
        assertEquals(data.get("chi2").asDouble(), fit.chiSquared(), 1e-9);
        assertEquals(data.get("dof").asInt(), fit.degreesOfFreedom());
    }

    /** Two unknowns, two data: b by elimination, y = 3 + 2 x through (1, 5) and (4, 11). */
    @Test
    void given_as_many_terms_as_data_when_fitted_then_the_solution_is_exact_and_nothing_is_tested() {
        List<SampledNumber> y = List.of(SampledNumber.input("u", 5, 0.1), SampledNumber.input("v", 11, 0.2));
        List<List<SampledNumber>> design = List.of(
            List.of(SampledNumber.exact(1), SampledNumber.exact(1)), List.of(SampledNumber.exact(1), SampledNumber.exact(4)));
        TermsFit fit = TermsFit.of("exact", y, design);
        assertEquals(3, fit.parameters().get(0).central(), 1e-13);
        assertEquals(2, fit.parameters().get(1).central(), 1e-13);
        assertEquals(0, fit.degreesOfFreedom());
        // By hand: b0 = (4 u - v)/3, so its error is sqrt(16 0.01 + 0.04)/3.
        assertEquals(Math.sqrt(0.16 + 0.04) / 3, fit.parameters().get(0).error(), 1e-13);
    }

    /** Weighted mean of 1(1) and 4(2): weights 1 and 1/4, mean 1.6, variance 0.8, chi-squared 9/5. */
    @Test
    void given_two_measurements_of_one_number_when_fitted_then_the_weighted_mean_comes_out() {
        TermsFit fit = TermsFit.of("mean", List.of(SampledNumber.input("u", 1, 1), SampledNumber.input("v", 4, 2)),
            List.of(List.of(SampledNumber.exact(1)), List.of(SampledNumber.exact(1))));
        assertEquals(1.6, fit.parameters().get(0).central(), 1e-13);
        assertEquals(0.8, fit.parameters().get(0).variance(), 1e-13);
        assertEquals(1.8, fit.chiSquared(), 1e-13);
        // P(chi-squared with one degree of freedom > 1.8) = erfc(sqrt(0.9)) = 0.179712494879 (scipy 1.11, stats.chi2.sf).
        assertEquals(0.179712494879, fit.pValue(), 1e-10);
    }

    /** One-sigma intervals of both coefficients cover 68.3 % over 2,000 data sets within three binomial errors (0.031). */
    @Test
    void given_many_synthetic_lines_with_errors_on_both_axes_when_fitted_then_the_intervals_cover() {
        SplittableRandom random = new SplittableRandom(20260412);
        int repetitions = 2000;
        int[] covered = new int[2];
        double[] truth = {1.5, -0.7};
        for (int r = 0; r < repetitions; r++) {
            List<SampledNumber> y = new ArrayList<>();
            List<List<SampledNumber>> design = new ArrayList<>();
            for (int e = 0; e < 6; e++) {
                double x = 0.3 + e;
                design.add(List.of(SampledNumber.exact(1), SampledNumber.input("x" + e, x + 0.05 * normal(random), 0.05)));
                y.add(SampledNumber.input("y" + e, truth[0] + truth[1] * x + 0.1 * normal(random), 0.1));
            }
            TermsFit fit = TermsFit.of("line", y, design);
            for (int j = 0; j < 2; j++) {
                covered[j] += Math.abs(fit.parameters().get(j).central() - truth[j]) < fit.parameters().get(j).error() ? 1 : 0;
            }
        }
        double three = 3 * Math.sqrt(0.683 * 0.317 / repetitions);
        assertEquals(0.683, covered[0] / (double) repetitions, three);
        assertEquals(0.683, covered[1] / (double) repetitions, three);
    }

    @Test
    void given_proportional_terms_when_fitted_then_the_message_says_that_they_are_dependent() {
        List<SampledNumber> y = List.of(SampledNumber.input("u", 1, 1), SampledNumber.input("v", 4, 2));
        SampledNumber two = SampledNumber.exact(2);
        IllegalArgumentException e = assertThrows(IllegalArgumentException.class, () -> TermsFit.of("alder.mass", y,
            List.of(List.of(SampledNumber.exact(1), two), List.of(SampledNumber.exact(1), two))));
        assertTrue(e.getMessage().contains("alder.mass") && e.getMessage().contains("linearly dependent"), e.getMessage());
    }

    private static double normal(SplittableRandom random) {
        return Math.sqrt(-2 * StrictMath.log(1 - random.nextDouble())) * StrictMath.cos(2 * Math.PI * random.nextDouble());
    }

    private static JsonNode resource(String name) throws IOException {
        try (InputStream in = TermsFitTest.class.getResourceAsStream("/tracewright/fitters/" + name)) {
            return new ObjectMapper().readTree(in);
        }
    }
}
