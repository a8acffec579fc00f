package tracewright.fitters.covariance;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;
import static tracewright.fitters.ReferenceData.doubles;

import java.util.Random;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import tools.jackson.databind.JsonNode;
import tracewright.fitters.GaussianBlocks;
import tracewright.fitters.ReferenceData;

/** Twelve deviations of eight points; computed with numpy and by a second program: shrinkage.json. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class ShrinkageTest {

    private static final JsonNode DATA = ReferenceData.read("shrinkage");
    private static final int POINTS = 8;

    private static double[] flat(JsonNode rows) {
        double[] x = new double[rows.size() * rows.get(0).size()];
        for (int i = 0; i < rows.size(); i++) {
            System.arraycopy(doubles(rows.get(i)), 0, x, i * rows.get(0).size(), rows.get(0).size());
        }
        return x;
    }

    static double[] centred(double[] x, int points) {
        double[] z = x.clone();
        int n = x.length / points;
        for (int i = 0; i < points; i++) {
            double mean = 0;
            for (int k = 0; k < n; k++) {
                mean += x[k * points + i] / n;
            }
            for (int k = 0; k < n; k++) {
                z[k * points + i] -= mean;
            }
        }
        return z;
    }

    /** (1/n) sum_k z_k z_k^T. */
    private static double[] moments(double[] z, int points) {
        int n = z.length / points;
        double[] r = new double[points * points];
        for (int k = 0; k < n; k++) {
            for (int i = 0; i < points * points; i++) {
                r[i] += z[k * points + i / points] * z[k * points + i % points] / n;
            }
        }
        return r;
    }

    @Test
    void given_the_reference_sample_then_both_intensities_are_the_published_estimators() {
        double[] z = centred(flat(DATA.get("data")), POINTS);
        assertEquals(DATA.get("intensity_identity").asDouble(), Shrinkage.intensity(z, POINTS), 1e-12);
        assertEquals(DATA.get("intensity_on_correlation").asDouble(), Shrinkage.intensity(Shrinkage.standardized(z, POINTS), POINTS), 1e-12);
    }

    @Test
    void given_the_reference_sample_when_shrunk_then_the_correlation_is_that_of_the_file() {
        double[] z = centred(flat(DATA.get("data")), POINTS);
        double[] s = moments(z, POINTS);
        double[] errors = new double[POINTS];
        for (int i = 0; i < POINTS; i++) {
            errors[i] = Math.sqrt(s[i * POINTS + i]);
        }
        Regularized shrunk = new CovarianceRule.Shrunk().regularize(Correlation.of(s, errors, z));
        assertEquals(DATA.get("intensity_on_correlation").asDouble(), shrunk.shrinkage(), 1e-12);
        assertArrayEquals(flat(DATA.get("correlation_shrunk")), shrunk.toArray(), 1e-12);
    }

    /** The fourth powers in closed form against the double sum of the paper. */
    @ParameterizedTest
    @ValueSource(ints = {2, 5, 20, 200})
    void given_any_sample_then_the_intensity_is_that_of_the_double_sum(int n) {
        int p = 5;
        double[] z = centred(new Random(n).doubles((long) n * p).toArray(), p);
        double[] r = moments(z, p);
        double m = 0;
        for (int i = 0; i < p; i++) {
            m += r[i * p + i] / p;
        }
        double d2 = 0;
        double b2 = 0;
        for (int i = 0; i < p * p; i++) {
            double off = r[i] - (i / p == i % p ? m : 0);
            d2 += off * off;
            for (int k = 0; k < n; k++) {
                double d = z[k * p + i / p] * z[k * p + i % p] - r[i];
                b2 += d * d / n / n;
            }
        }
        double lambda = Shrinkage.intensity(z, p);
        assertEquals(Math.min(1, b2 / d2), lambda, 1e-12);
        assertTrue(lambda >= 0 && lambda <= 1);
    }

    @Test
    void given_more_and_more_blocks_of_correlated_data_then_the_intensity_falls_like_one_over_their_number() {
        double[] zero = new double[5];
        double[] one = {1, 1, 1, 1, 1};
        double[] lambda = new double[2];
        for (int j = 0; j < 2; j++) {
            int n = j == 0 ? 500 : 50_000;
            double[] x = new double[n * 5];
            double[][] rows = GaussianBlocks.draw(n, zero, one, 0.7, new Random(3));
            for (int k = 0; k < n; k++) {
                System.arraycopy(rows[k], 0, x, k * 5, 5);
            }
            lambda[j] = Shrinkage.intensity(Shrinkage.standardized(centred(x, 5), 5), 5);
        }
        // b2 falls like 1/n at fixed d2; the ratio of 100 is known to about 1/sqrt(500) on either side.
        assertEquals(100, lambda[0] / lambda[1], 25);
    }

    @Test
    void given_one_point_then_there_is_nothing_to_shrink() {
        assertEquals(0, Shrinkage.intensity(new double[] {1, -1, 1, -1}, 1));
    }
}
