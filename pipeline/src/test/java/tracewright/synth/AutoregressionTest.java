package tracewright.synth;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;

import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;

/** Expected values: identities of the AR(1) process evaluated with mpmath to 40 digits, independently of this code. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class AutoregressionTest {

    @ParameterizedTest
    @CsvSource({"0.5, 0.0", "2, 0.6", "5, 0.8181818181818182"})
    void given_an_autocorrelation_time_when_rho_is_asked_for_then_it_is_the_reference_value(double tauInt, double rho) {
        Autoregression series = Autoregression.withTauInt(tauInt);
        assertEquals(rho, series.rho(), 2e-16);              // one rounded quotient
        assertEquals(tauInt, series.tauInt(), 1e-14);        // 1 - rho of 0.18 amplifies that rounding tenfold
    }

    @Test
    void given_tau_int_5_when_two_series_are_multiplied_then_their_product_has_2_525() {
        assertEquals(2.525, Autoregression.withTauInt(5).tauIntOfProduct(), 2.525e-13);
    }

    @Test
    void given_1000_members_with_tau_int_5_when_the_mean_varies_then_variance_and_bias_factor_are_the_reference_values() {
        double v = Autoregression.withTauInt(5).varianceOfMean(1000);
        assertEquals(0.0099505, v, 0.0099505e-12);
        assertEquals(0.9900495, 1 - v, 1e-12);
    }

    @ParameterizedTest
    @ValueSource(ints = {1, 2, 7, 300})
    void given_n_members_when_the_mean_varies_then_sum_and_closed_form_agree(int n) {
        double rho = 0.6;
        double power = 1;
        for (int k = 0; k < n; k++) {
            power *= rho;
        }
        // (1/n) [(1 + rho)/(1 - rho) - 2 rho (1 - rho^n)/(n (1 - rho)^2)], the geometric sums done by hand
        double closed = ((1 + rho) / (1 - rho) - 2 * rho * (1 - power) / (n * (1 - rho) * (1 - rho))) / n;
        assertEquals(closed, Autoregression.withTauInt(2).varianceOfMean(n), 1e-14);      // closed form cancels to 1/n at n = 1: 30 eps
    }

    @Test
    void given_a_gap_of_three_steps_when_the_correlation_over_it_is_asked_for_then_it_is_rho_cubed() {
        assertEquals(0.216, new Autoregression(0.6).over(3), 1e-16);
        assertEquals(1, new Autoregression(0.6).over(0));
    }

    @Test
    void given_rho_of_one_when_made_then_it_is_refused() {
        IllegalArgumentException refusal = assertThrows(IllegalArgumentException.class, () -> new Autoregression(1));
        assertEquals("rho is 1.0; need 0 <= correlation < 1", refusal.getMessage());
    }
}
