package tracewright.fitters.leastsquares;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertInstanceOf;

import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.EnumSource;
import tools.jackson.databind.JsonNode;
import tracewright.fitters.ReferenceData;
import tracewright.fitters.leastsquares.VariableProjection.Jacobian;
import tracewright.fitters.models.Exponentials;

/** Two exponentials, computed with 40 digits, see the {@code source} of {@code variable_projection.json}. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class VariableProjectionTest {

    private final JsonNode reference = ReferenceData.read("variable_projection");
    private final int[] times = ReferenceData.ints(reference.get("times"));
    private final double[] y = ReferenceData.doubles(reference.get("y"));
    private final int n = times.length;

    @ParameterizedTest
    @EnumSource(Jacobian.class)
    void given_energies_when_projected_then_amplitudes_residual_and_jacobian_are_those_of_40_digits(Jacobian kind) {
        JsonNode at = reference.get("at");
        double[] theta = ReferenceData.doubles(at.get("nonlinear"));
        VariableProjection projection = projection(kind);
        double[] r = new double[n];
        double[] jacobian = new double[2 * n];
        projection.evaluate(theta, r, jacobian);
        requireClose(ReferenceData.doubles(at.get("amplitudes")), projection.amplitudes(theta).orElseThrow(), 1);
        requireClose(ReferenceData.doubles(at.get("whitened_residual")), r, 20);
        JsonNode expected = at.get(kind == Jacobian.FULL ? "jacobian_golub_pereyra" : "jacobian_kaufman");
        double[] gradient = new double[2];
        for (int i = 0; i < n; i++) {
            for (int k = 0; k < 2; k++) {
                // 1e-11 of the largest entry, some 500.
                assertEquals(expected.get(i).get(k).asDouble(), jacobian[2 * i + k], 5e-9, kind + " " + i + ", " + k);
                gradient[k] += jacobian[2 * i + k] * r[i];
            }
        }
        requireClose(ReferenceData.doubles(at.get("half_gradient")), gradient, 77486);
    }

    @ParameterizedTest
    @EnumSource(Jacobian.class)
    void given_rough_energies_when_fitted_then_the_minimum_is_that_of_40_digits(Jacobian kind) {
        JsonNode minimum = reference.get("minimum");
        VariableProjection projection = projection(kind);
        LevenbergMarquardt.Descent.Converged fit = assertInstanceOf(LevenbergMarquardt.Descent.Converged.class,
            projection.cold(ReferenceData.doubles(reference.get("at").get("nonlinear")), 200));
        double[] expected = ReferenceData.doubles(minimum.get("nonlinear"));
        assertEquals(expected[0], fit.parameters()[0], 1e-9);
        assertEquals(expected[1], fit.parameters()[1], 1e-9);
        double[] a = projection.amplitudes(fit.parameters()).orElseThrow();
        assertEquals(minimum.get("amplitudes").get(0).asDouble(), a[0], 1e-9);
        assertEquals(minimum.get("amplitudes").get(1).asDouble(), a[1], 1e-9);
        assertEquals(minimum.get("chi2").asDouble(), fit.chiSquared(), 1e-9);
    }

    /** (J^T W J)^-1 of energies and amplitudes together, from the model's own Jacobian at the minimum. */
    @Test
    void given_the_minimum_when_the_full_jacobian_is_inverted_then_the_covariance_is_that_of_40_digits() {
        JsonNode minimum = reference.get("minimum");
        double[] theta = ReferenceData.doubles(minimum.get("nonlinear"));
        double[] a = ReferenceData.doubles(minimum.get("amplitudes"));
        double[] jacobian = new double[4 * n];
        new Exponentials(times, 2).evaluate(new double[] {theta[0], theta[1], a[0], a[1]}, new double[n], jacobian);
        WhiteningKernels.matrix(linv(), jacobian, n, 4);
        double[] v = LinearFit.inverseNormal(jacobian, n, 4).orElseThrow();
        for (int i = 0; i < 4; i++) {
            for (int j = 0; j < 4; j++) {
                double scale = Math.sqrt(v[i * 4 + i] * v[j * 4 + j]);
                assertEquals(minimum.get("covariance").get(i).get(j).asDouble(), v[i * 4 + j], 1e-9 * scale);
            }
        }
    }

    private VariableProjection projection(Jacobian kind) {
        return new VariableProjection(new Exponentials(times, 2).separable(), y, linv(), kind);
    }

    private double[] linv() {
        double[] errors = ReferenceData.doubles(reference.get("error"));
        double[] linv = new double[n * n];
        for (int i = 0; i < n; i++) {
            linv[i * n + i] = 1 / errors[i];
        }
        return linv;
    }

    private static void requireClose(double[] expected, double[] found, double scale) {
        for (int i = 0; i < expected.length; i++) {
            assertEquals(expected[i], found[i], 1e-11 * scale, "entry " + i);
        }
    }
}
