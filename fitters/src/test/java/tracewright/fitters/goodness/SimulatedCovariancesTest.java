package tracewright.fitters.goodness;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;
import tracewright.fitters.linalg.Symmetric;

@DisplayNameGeneration(ReplaceUnderscores.class)
class SimulatedCovariancesTest {

    private static final int P = 4;
    private static final int REPETITIONS = 20_000;

    /** Errors 1, 10, 100, 1000, correlations 0.7^|i - j|. */
    private static double[] truth() {
        double[] s = new double[P * P];
        double[] error = {1, 10, 100, 1000};
        for (int i = 0; i < P * P; i++) {
            double r = 1;
            for (int k = 0; k < Math.abs(i / P - i % P); k++) {
                r *= 0.7;
            }
            s[i] = error[i / P] * error[i % P] * r;
        }
        return s;
    }

    @ParameterizedTest
    @CsvSource({"12, false", "12, true", "3, false", "3, true"})
    void given_a_truth_then_mean_and_variance_of_the_estimates_are_those_of_wishart(int blocks, boolean vectors) {
        double[] s = truth();
        SimulatedCovariances draws = new SimulatedCovariances(s, P, blocks, 3);
        double[] sum = new double[P * P];
        double[] squares = new double[P * P];
        for (int j = 0; j < REPETITIONS; j++) {
            double[] star = vectors ? draws.nextWithBlocks() : draws.next();
            for (int i = 0; i < star.length; i++) {
                sum[i] += star[i];
                squares[i] += (star[i] - s[i]) * (star[i] - s[i]);
            }
        }
        for (int i = 0; i < P * P; i++) {
            // Wishart with g - 1 degrees of freedom: variance (S_ij^2 + S_ii S_jj)/(g - 1).
            double variance = (s[i] * s[i] + s[i / P * (P + 1)] * s[i % P * (P + 1)]) / (blocks - 1);
            assertEquals(s[i], sum[i] / REPETITIONS, 4.5 * Math.sqrt(variance / REPETITIONS));
            // Its fourth moment is below 15 times its square: relative error sqrt(14/n); four times that.
            assertEquals(variance, squares[i] / REPETITIONS, 4 * Math.sqrt(14.0 / REPETITIONS) * variance);
        }
    }

    @ParameterizedTest
    @ValueSource(booleans = {false, true})
    void given_fewer_blocks_than_points_then_the_estimate_has_one_rank_less_than_blocks(boolean vectors) {
        SimulatedCovariances draws = new SimulatedCovariances(truth(), P, 3, 3);
        double[] star = vectors ? draws.nextWithBlocks() : draws.next();
        double[] r = star.clone();
        for (int i = 0; i < P * P; i++) {
            r[i] /= Math.sqrt(star[i / P * (P + 1)] * star[i % P * (P + 1)]);
        }
        Symmetric e = Symmetric.of(r, P);
        assertTrue(e.value(1) > 1e-3);
        assertEquals(0, e.value(2), 1e-13);
    }

    @Test
    void given_blocks_then_they_have_no_mean_and_make_up_the_estimate() {
        SimulatedCovariances draws = new SimulatedCovariances(truth(), P, 12, 3);
        double[] star = draws.nextWithBlocks();
        double[] x = draws.blocks();
        double[] again = new double[P * P];
        for (int k = 0; k < 12; k++) {
            for (int i = 0; i < P * P; i++) {
                again[i] += x[k * P + i / P] * x[k * P + i % P] / 11;
            }
        }
        assertArrayEquals(star, again, 1e-9);   // entries up to 1e6, a dozen roundings
        for (int i = 0; i < P; i++) {
            double mean = 0;
            for (int k = 0; k < 12; k++) {
                mean += x[k * P + i];
            }
            assertEquals(0, mean, 1e-11);
        }
    }

    @ParameterizedTest
    @ValueSource(ints = {1, 2, 3, 7, 40})
    void given_degrees_of_freedom_then_the_deviates_are_chi_squared(int n) {
        Normals normals = new Normals(9);
        double[] p = new double[2000];
        for (int i = 0; i < p.length; i++) {
            p[i] = Tails.chiSquared(normals.nextChiSquared(n), n);
        }
        assertTrue(Uniform.distance(p) < Uniform.oneInAThousand(p.length), "distance " + Uniform.distance(p));
    }

    @Test
    void given_a_seed_then_the_deviates_are_normal() {
        Normals normals = new Normals(10);
        double[] p = new double[5000];
        for (int i = 0; i < p.length; i++) {
            p[i] = Tails.normal(normals.next());
        }
        assertTrue(Uniform.distance(p) < Uniform.oneInAThousand(p.length), "distance " + Uniform.distance(p));
    }
}
