package tracewright.fitters.leastsquares;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertInstanceOf;

import java.util.stream.IntStream;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.EnumSource;
import tools.jackson.databind.JsonNode;
import tracewright.fitters.GaussianBlocks;
import tracewright.fitters.ReferenceData;
import tracewright.fitters.covariance.CovarianceRule;
import tracewright.fitters.covariance.Weighting;
import tracewright.fitters.covariance.WeightingOutcome;
import tracewright.fitters.leastsquares.LevenbergMarquardt.Descent;
import tracewright.fitters.leastsquares.LevenbergMarquardt.Scaling;
import tracewright.fitters.models.TwoStateJoint;
import tracewright.fitters.sampled.SampledVector;

/**
 * Joint fit of 48 two- and three-point values out of 200 blocks, minima by Gauss-Newton in 40 digits, see the {@code source} of
 * {@code two_state.json}. Its parameters are E, D, a, b, m0, m1, m2 with C2 = a e^{-Et} + b e^{-(E+D)t}, so that here
 * delta = log D, A0 = a, r = b/a, g00 = m0, b01 = sqrt(r) m1, b11 = r m2.
 */
@DisplayNameGeneration(ReplaceUnderscores.class)
class TwoStateReferenceTest {

    private final JsonNode reference = ReferenceData.read("two_state");
    private double[][] blocks;
    private TwoStateJoint model;
    private SampledVector data;

    @BeforeEach
    void read() {
        int n = reference.get("blocks").size();
        blocks = new double[n][];
        for (int k = 0; k < n; k++) {
            JsonNode row = reference.get("blocks").get(k);
            blocks[k] = IntStream.range(0, row.size()).mapToDouble(i -> Double.parseDouble(row.get(i).asString())).toArray();
        }
        data = GaussianBlocks.jackknife(blocks);
        model = new TwoStateJoint(of("2pt", "t"), of("3pt", "t"), of("3pt", "tau"));
    }

    private int[] of(String kind, String entry) {
        JsonNode points = reference.get("points");
        return IntStream.range(0, points.size()).filter(i -> points.get(i).get("kind").asString().equals(kind))
            .map(i -> points.get(i).get(entry).asInt()).toArray();
    }

    @Test
    void given_200_blocks_when_fitted_without_a_hint_then_parameters_covariance_and_chi_squared_are_those_of_40_digits() {
        FitOutcome.Converged fit = assertInstanceOf(FitOutcome.Converged.class, SampledFit.fit("joint", data, model, new CovarianceRule.Full()));
        JsonNode expected = reference.get("fit");
        double[] p = fit.parameters().centralRow();
        requireParameters(ReferenceData.doubles(expected.get("values")), p);
        assertEquals(expected.get("chi2").asDouble(), fit.chiSquared(), 1e-11 * fit.chiSquared());
        assertEquals(expected.get("dof").asInt(), fit.degreesOfFreedom());
        requireCovariance(expected.get("covariance"), transported(p, fit.covariance()));
    }

    /** The weight of the blocks' own covariance, frozen; each draw descends from the central minimum. */
    @ParameterizedTest
    @EnumSource(Scaling.class)
    void given_listed_draws_when_fitted_with_the_frozen_weight_then_each_minimum_is_that_of_40_digits(Scaling scaling) {
        Weighting weighting = assertInstanceOf(WeightingOutcome.Usable.class, Weighting.of(data, new CovarianceRule.Full())).weighting();
        double[] centre = assertInstanceOf(FitOutcome.Converged.class, SampledFit.fit("joint", data, model, new CovarianceRule.Full()))
            .parameters().centralRow();
        WhitenedModel whitened = new WhitenedModel(model, weighting.linv());
        for (int b = 0; b < reference.get("bootstrap_draws").size(); b++) {
            whitened.data(mean(ReferenceData.ints(reference.get("bootstrap_draws").get(b))));
            Descent.Converged d = assertInstanceOf(Descent.Converged.class, whitened.machine().descend(centre, scaling, 200));
            requireParameters(ReferenceData.doubles(reference.get("bootstrap_values").get(b)), d.parameters());
        }
    }

    private double[] mean(int[] draw) {
        double[] mean = new double[blocks[0].length];
        for (int k : draw) {
            for (int i = 0; i < mean.length; i++) {
                mean[i] += blocks[k][i] / draw.length;
            }
        }
        return mean;
    }

    private static double[] converted(double[] p) {
        double[] g = TwoStateJoint.elements(p).orElseThrow();
        return new double[] {p[0], StrictMath.exp(p[1]), p[2], p[2] * p[3], g[0], g[1], g[2]};
    }

    private static void requireParameters(double[] expected, double[] p) {
        double[] found = converted(p);
        for (int j = 0; j < 7; j++) {
            assertEquals(expected[j], found[j], 1e-9 * Math.abs(expected[j]), "parameter " + j);
        }
    }

    /** T V T^T with T = d(E, D, a, b, m0, m1, m2)/d(parameters), written out. */
    private static double[] transported(double[] p, double[] v) {
        double[] t = new double[49];
        double root = Math.sqrt(p[3]);
        t[0] = 1;
        t[8] = StrictMath.exp(p[1]);
        t[16] = 1;
        t[23] = p[3];
        t[24] = p[2];
        t[32] = 1;
        t[38] = -0.5 * p[5] / (p[3] * root);
        t[40] = 1 / root;
        t[45] = -p[6] / (p[3] * p[3]);
        t[48] = 1 / p[3];
        double[] half = product(t, v);
        double[] transposed = new double[49];
        for (int i = 0; i < 49; i++) {
            transposed[i] = t[i % 7 * 7 + i / 7];
        }
        return product(half, transposed);
    }

    private static double[] product(double[] a, double[] b) {
        double[] c = new double[49];
        for (int i = 0; i < 49; i++) {
            for (int k = 0; k < 7; k++) {
                c[i] += a[i / 7 * 7 + k] * b[k * 7 + i % 7];
            }
        }
        return c;
    }

    private static void requireCovariance(JsonNode expected, double[] found) {
        for (int i = 0; i < 7; i++) {
            for (int j = 0; j < 7; j++) {
                double scale = Math.sqrt(expected.get(i).get(i).asDouble() * expected.get(j).get(j).asDouble());
                assertEquals(expected.get(i).get(j).asDouble(), found[i * 7 + j], 1e-8 * scale, "covariance " + i + ", " + j);
            }
        }
    }
}
