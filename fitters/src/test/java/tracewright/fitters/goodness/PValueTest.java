package tracewright.fitters.goodness;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Arrays;
import java.util.Random;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import tracewright.fitters.GaussianBlocks;
import tracewright.fitters.covariance.CovarianceRule;

/**
 * A thousand data sets drawn from a straight line through six points, Gaussian and correlated: p of the true model is uniform.
 *
 * <p>Only Hotelling's distribution is exact. The weighted tails take the estimated S as if it were exact; with 6,000 sets of 40 blocks
 * their distance from uniform was 0.028 (diagonal), 0.047 (floored) and 0.022 (shrunk), and 5.6, 7.6 and 5.2 percent lay below 0.05. To that
 * comes the noise of a thousand sets: the distance that they exceed once in a thousand trials, and three binomial errors.
 */
@DisplayNameGeneration(ReplaceUnderscores.class)
class PValueTest {

    private static final int SETS = 1000;
    private static final int POINTS = 6;
    private static final double LEVEL = 0.05;

    private static FitQuality[] qualities(CovarianceRule rule, int blocks, long seed) {
        Random random = new Random(seed);
        double[] scale = new double[POINTS];
        double[] truth = new double[POINTS];
        for (int i = 0; i < POINTS; i++) {
            scale[i] = 1 + 0.3 * i;
            truth[i] = 2 - 0.1 * i;
        }
        FitQuality[] all = new FitQuality[SETS];
        for (int n = 0; n < SETS; n++) {
            double[][] x = GaussianBlocks.draw(blocks, truth, scale, 0.6, random);
            all[n] = LinearFit.of(GaussianBlocks.jackknife(x), rule, LinearFit.line(POINTS), n).quality();
        }
        return all;
    }

    private static void uniform(FitQuality[] all, double distance, double rejected) {
        double[] p = Arrays.stream(all).mapToDouble(FitQuality::pValue).toArray();
        double d = Uniform.distance(p);
        assertTrue(d < distance + Uniform.oneInAThousand(SETS), "distance " + d);
        double below = Arrays.stream(p).filter(x -> x < LEVEL).count() / (double) SETS;
        assertEquals(rejected, below, 3 * Math.sqrt(rejected * (1 - rejected) / SETS));
    }

    @Test
    void given_twenty_blocks_and_the_full_covariance_then_hotelling_is_uniform_and_plain_chi_squared_is_not() {
        FitQuality[] all = qualities(new CovarianceRule.Full(), 20, 1);
        uniform(all, 0, LEVEL);
        double[] plain = Arrays.stream(all).mapToDouble(q -> Tails.chiSquared(q.chiSquared(), q.degreesOfFreedom())).toArray();
        assertTrue(Uniform.distance(plain) > 1.5 * Uniform.oneInAThousand(SETS));
        double mean = Arrays.stream(all).mapToDouble(FitQuality::chiSquared).average().orElseThrow();
        // Q of mean 4 * 19/14 has a relative width near sqrt(2/4) times 1.3.
        assertEquals(all[0].expectedWithNoise(), mean, 4 * 0.9 * all[0].expectedWithNoise() / Math.sqrt(SETS));
    }

    @Test
    void given_diagonal_weights_then_the_weighted_tail_is_uniform_to_three_hundredths() {
        uniform(qualities(new CovarianceRule.Diagonal(), 40, 2), 0.028, 0.056);
    }

    @Test
    void given_floored_weights_then_the_weighted_tail_is_uniform_to_five_hundredths() {
        uniform(qualities(new CovarianceRule.Floored(0.1), 40, 3), 0.047, 0.076);
    }

    @Test
    void given_shrunk_weights_then_the_rescaled_tail_is_uniform_to_two_hundredths() {
        uniform(qualities(new CovarianceRule.Shrunk(), 40, 4), 0.022, 0.052);
    }
}
