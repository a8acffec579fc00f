package tracewright.fitters.leastsquares;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertInstanceOf;
import static org.junit.jupiter.api.Assertions.assertTrue;

import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;
import tools.jackson.databind.JsonNode;
import tracewright.fitters.ReferenceData;
import tracewright.fitters.linalg.Cholesky;

@DisplayNameGeneration(ReplaceUnderscores.class)
class LinearFitTest {

    /**
     * Linear regression of the NIST/ITL Statistical Reference Datasets, 15 certified digits. Double precision loses the condition
     * of the scaled design, and with it all but these digits; Wampler4 and 5 are Wampler3 with residuals 1e2 and 1e4 times larger.
     */
    @ParameterizedTest(name = "{0} to {1} digits")
    @CsvSource({"Norris,12", "Pontius,12", "NoInt1,12", "Longley,10", "Wampler1,9", "Wampler2,9", "Wampler3,9", "Wampler4,7", "Wampler5,5", "Filip,7"})
    void given_a_certified_linear_set_when_fitted_then_the_certified_digits_come_out(String name, int digits) {
        JsonNode set = ReferenceData.read("nist/linear-" + name);
        double[] certified = ReferenceData.doubles(set.get("certified"));
        int q = certified.length;
        int rows = set.get("data").size();
        double[] design = new double[rows * q];
        double[] y = new double[rows];
        for (int i = 0; i < rows; i++) {
            double[] row = ReferenceData.doubles(set.get("data").get(i));
            y[i] = row[0];
            for (int j = 0; j < q; j++) {
                design[i * q + j] = term(name, row, j);
            }
        }
        LinearFit fit = solved(LinearFit.of(design, y, q));
        requireDigits(digits, certified, fit.parameters(), name);
        // Exact data (Wampler1, 2) have certified deviations of zero, which rounding cannot give.
        double[] deviations = ReferenceData.doubles(set.get("standard_deviation"));
        if (deviations[0] != 0) {
            double[] found = new double[q];
            for (int j = 0; j < q; j++) {
                found[j] = Math.sqrt(fit.chiSquared() / (rows - q) * fit.covariance()[j * q + j]);
            }
            requireDigits(digits, deviations, found, name + " deviations");
        }
    }

    private static double term(String name, double[] row, int j) {
        if (name.equals("NoInt1")) {
            return row[1];
        }
        if (name.equals("Longley")) {
            return j == 0 ? 1 : row[j];
        }
        double power = 1;
        for (int k = 0; k < j; k++) {
            power *= row[1];
        }
        return power;
    }

    /** Correlated data, computed with 40 digits, see the file's {@code source}. The last case may lose its condition: 1e-15 of it. */
    @ParameterizedTest
    @ValueSource(ints = {0, 1, 2})
    void given_correlated_data_when_fitted_then_parameters_covariance_and_chi_squared_are_those_of_40_digits(int which) {
        JsonNode c = ReferenceData.read("gls").get("cases").get(which);
        double tolerance = which < 2 ? 1e-12 : 1e-15 * c.get("condition_of_whitened_design").asDouble();
        int q = c.get("parameters").size();
        LinearFit fit = solved(LinearFit.weighted(flat(c.get("design")), ReferenceData.doubles(c.get("y")), linv(c.get("covariance")), q));
        requireClose(ReferenceData.doubles(c.get("parameters")), fit.parameters(), tolerance);
        requireCovariance(flat(c.get("parameter_covariance")), fit.covariance(), q, tolerance);
        assertEquals(c.get("chi2").asDouble(), fit.chiSquared(), tolerance * c.get("chi2").asDouble());
    }

    /** Cubic with Gaussian priors and correlated data, computed with 40 digits, see the file's {@code source}. */
    @Test
    void given_priors_on_every_parameter_when_fitted_then_posterior_and_its_data_part_are_those_of_40_digits() {
        JsonNode c = ReferenceData.read("priors");
        double[] widths = ReferenceData.doubles(c.get("prior_width"));
        LinearFit fit = solved(LinearFit.weighted(flat(c.get("design")), ReferenceData.doubles(c.get("y")), linv(c.get("covariance")), 4,
            LinearFit.Priors.of(ReferenceData.doubles(c.get("prior_mean")), widths)));
        requireClose(ReferenceData.doubles(c.get("parameters")), fit.parameters(), 1e-11);
        requireCovariance(flat(c.get("posterior_covariance")), fit.covariance(), 4, 1e-11);
        requireCovariance(flat(c.get("variance_from_data_only")), fit.covarianceFromData(), 4, 1e-11);
        double[] rest = fit.covariance();
        for (int i = 0; i < rest.length; i++) {
            rest[i] -= fit.covarianceFromData()[i];
        }
        requireCovariance(flat(c.get("variance_from_priors")), rest, 4, 1e-11);
        assertEquals(c.get("chi2_data").asDouble(), fit.chiSquared(), 1e-11 * fit.chiSquared());
        assertEquals(c.get("chi2_prior").asDouble(), fit.priorChiSquared(), 1e-11);
        assertEquals(c.get("effective_parameters").asDouble(), fit.effectiveParameters(), 1e-11);
    }

    @Test
    void given_a_column_that_is_twice_another_when_fitted_then_the_message_says_dependent() {
        LinearFit.Outcome outcome = LinearFit.of(new double[] {1, 2, 3, 6, 5, 10}, new double[] {1, 2, 3}, 2);
        String reason = assertInstanceOf(LinearFit.Outcome.Failed.class, outcome).reason();
        assertTrue(reason.contains("2 terms are linearly dependent") && reason.contains("3 points"), reason);
    }

    private static LinearFit solved(LinearFit.Outcome outcome) {
        return assertInstanceOf(LinearFit.Outcome.Solved.class, outcome).fit();
    }

    private static double[] linv(JsonNode covariance) {
        return Cholesky.of(flat(covariance), covariance.size()).orElseThrow().inverseLower();
    }

    private static double[] flat(JsonNode rows) {
        int columns = rows.get(0).size();
        double[] flat = new double[rows.size() * columns];
        for (int i = 0; i < flat.length; i++) {
            flat[i] = rows.get(i / columns).get(i % columns).asDouble();
        }
        return flat;
    }

    private static void requireClose(double[] expected, double[] found, double relative) {
        for (int j = 0; j < expected.length; j++) {
            assertEquals(expected[j], found[j], relative * Math.abs(expected[j]), "entry " + j);
        }
    }

    /** Within a fraction of the diagonal's scale. */
    private static void requireCovariance(double[] expected, double[] found, int q, double fraction) {
        for (int i = 0; i < q; i++) {
            for (int j = 0; j < q; j++) {
                double scale = Math.sqrt(Math.abs(expected[i * q + i] * expected[j * q + j]));
                assertEquals(expected[i * q + j], found[i * q + j], fraction * scale, "entry " + i + ", " + j);
            }
        }
    }

    /** Digits in agreement: -log10 of the relative difference. */
    private static void requireDigits(int digits, double[] expected, double[] found, String what) {
        for (int j = 0; j < expected.length; j++) {
            double off = Math.abs(found[j] - expected[j]) / Math.abs(expected[j]);
            assertTrue(off <= StrictMath.pow(10, -digits), what + " " + j + ": " + found[j] + " for " + expected[j] + ", relative " + off);
        }
    }
}
