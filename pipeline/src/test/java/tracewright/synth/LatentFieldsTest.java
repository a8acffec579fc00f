package tracewright.synth;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;

import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;

@DisplayNameGeneration(ReplaceUnderscores.class)
class LatentFieldsTest {

    private static final LatentFields FIELDS = LatentFields.of(InventedTheory.operators(), 1000);

    @Test
    void given_fluctuations_and_correlations_when_factorised_then_the_factor_gives_the_covariance_back() {
        // Relative rounding of a few eps on entries up to 42^2.
        assertEquals(50.0 * 50, FIELDS.covariance(0, 0), 1e-11);
        assertEquals(0.6 * 50 * 12, FIELDS.covariance(0, 1), 1e-11);
        assertEquals(-0.3 * 12 * 40, FIELDS.covariance(1, 3), 1e-11);
        assertEquals(0.99 * 42 * 38, FIELDS.covariance(2, 4), 1e-11);
    }

    @Test
    void given_ratios_when_turned_into_weights_then_operators_and_weights_together_give_the_ratios_back() {
        double[] ratio = {3, 0.5, -4, -3.8, -3.6};
        double[] weights = new double[5];
        FIELDS.weights(ratio, weights, 0);
        // <C2 X_b> - <C2><X_b> = sum_a w_a Lambda_ba: an operator read off from phi = w, without its vacuum.
        for (int b = 0; b < 5; b++) {
            double[] out = new double[1];
            FIELDS.operator(b, weights, out, 0);
            assertEquals(ratio[b], out[0] - FIELDS.vacuum(b), 1e-11);        // vacuum of hundreds subtracted: 400 eps
        }
    }

    @Test
    void given_correlations_that_contradict_each_other_when_factorised_then_the_reader_is_told() {
        Truth.Operators o = InventedTheory.operators();
        Truth.Operators impossible = new Truth.Operators(o.light(), o.strange(), o.densities(), -0.9, 0.9, 0.99);
        IllegalArgumentException refusal = assertThrows(IllegalArgumentException.class, () -> LatentFields.of(impossible, 1000));
        assertEquals("the operators' correlations contradict each other: their matrix is not positive definite", refusal.getMessage());
    }
}
