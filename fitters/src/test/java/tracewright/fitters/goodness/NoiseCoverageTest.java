package tracewright.fitters.goodness;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Random;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import tracewright.fitters.GaussianBlocks;
import tracewright.fitters.covariance.CovarianceRule;

/** Straight lines through ten points of 40 blocks: how often the error covers the true intercept, without and with the noise factor. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class NoiseCoverageTest {

    private static final int POINTS = 10;
    private static final int BLOCKS = 40;
    /** Simulations with 600 sets elsewhere against 600 here: three times the error of the difference. */
    private static final double DIFFERENCE = 3 * Math.sqrt(2 * 0.22 / 600);

    /** Fractions of data sets whose intercept lies within one error of the truth. */
    private record Coverage(double plain, double corrected) {
    }

    private static Coverage coverage(CovarianceRule rule, int sets, long seed) {
        Random random = new Random(seed);
        double[] scale = new double[POINTS];
        for (int i = 0; i < POINTS; i++) {
            scale[i] = 1 + 0.2 * i;
        }
        int plain = 0;
        int corrected = 0;
        for (int n = 0; n < sets; n++) {
            double[][] x = GaussianBlocks.draw(BLOCKS, new double[POINTS], scale, 0.8, random);
            LinearFit fit = LinearFit.of(GaussianBlocks.jackknife(x), rule, LinearFit.line(POINTS), n);
            double square = fit.parameters().a() * fit.parameters().a();
            double variance = fit.quality().covariance()[0];
            plain += square <= variance ? 1 : 0;
            corrected += square <= variance * fit.quality().noiseFactor() ? 1 : 0;
        }
        return new Coverage(plain / (double) sets, corrected / (double) sets);
    }

    @Test
    void given_the_full_covariance_then_its_error_covers_too_little_and_with_the_factor_what_it_should() {
        int sets = 20_000;
        Coverage c = coverage(new CovarianceRule.Full(), sets, 1);
        // z^2 (1 + chi2_8/chi2_32) <= chi2_31/39 for independent z, chi2_8, chi2_32, chi2_31: four million draws give 0.568, and 0.677
        // with 39 * 38/(31 * 30) on the right. Three binomial errors.
        assertEquals(0.568, c.plain(), 3 * Math.sqrt(0.25 / sets));
        assertEquals(0.677, c.corrected(), 3 * Math.sqrt(0.22 / sets));
    }

    @Test
    void given_shrunk_weights_then_the_factor_brings_the_coverage_from_six_tenths_to_two_thirds() {
        Coverage c = coverage(new CovarianceRule.Shrunk(), 600, 4);
        assertEquals(0.61, c.plain(), DIFFERENCE);
        assertEquals(0.66, c.corrected(), DIFFERENCE);
        assertTrue(c.corrected() > c.plain() + 0.03);
    }

    @Test
    void given_floored_weights_then_the_factor_adds_three_hundredths_to_the_coverage() {
        Coverage c = coverage(new CovarianceRule.Floored(0.1), 600, 3);
        assertEquals(0.62, c.plain(), DIFFERENCE);
        assertEquals(0.65, c.corrected(), DIFFERENCE);
        assertTrue(c.corrected() > c.plain() + 0.01);
    }

    @Test
    void given_diagonal_weights_then_the_sandwich_covers_by_itself() {
        // 0.66 to 0.69 in simulations; three binomial errors of 600 sets on top.
        double plain = coverage(new CovarianceRule.Diagonal(), 600, 2).plain();
        assertEquals(0.675, plain, 0.015 + 3 * Math.sqrt(0.22 / 600));
    }
}
