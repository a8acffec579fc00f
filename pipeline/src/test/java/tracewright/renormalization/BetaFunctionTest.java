package tracewright.renormalization;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;

@DisplayNameGeneration(ReplaceUnderscores.class)
class BetaFunctionTest {

    /** A handful of roundings on either side. */
    private static final double ROUNDING = 8 * 0x1p-52;

    /**
     * beta_0 and beta_1 of mu^2 da/dmu^2 = -sum beta_i a^(i+2), a = alpha_s/pi: van Ritbergen, Vermaseren, Larin,
     * Phys. Lett. B 400 (1997) 379, hep-ph/9701390, decimals from the exact fractions. With a = g^2/(4 pi^2) and
     * mu dg/dmu = (g/2) mu dln(a)/dmu = g dln(a)/dln(mu^2), b_i = 4^(i+1) beta_i/(4 pi)^(2i+2).
     */
    @Tag("reference")
    @ParameterizedTest
    @CsvSource({"3, 2.25, 4.0", "4, 2.0833333333333335, 3.2083333333333335", "5, 1.9166666666666667, 2.4166666666666665", "6, 1.75, 1.625"})
    void given_the_published_coefficients_in_alpha_over_pi_then_ours_in_the_coupling_agree(int flavors, double beta0, double beta1) {
        double fourPiSquared = 16 * Math.PI * Math.PI;
        BetaFunction beta = new BetaFunction(flavors);
        assertEquals(4 * beta0 / fourPiSquared, beta.b0(), ROUNDING * beta.b0());
        // 102 - 38 n/3 loses up to a factor 4 of its leading figure at six flavours
        assertEquals(16 * beta1 / (fourPiSquared * fourPiSquared), beta.b1(), 4 * ROUNDING * beta.b1());
    }

    @Tag("exact")
    @Test
    void given_three_flavors_then_the_coefficient_of_the_action_density_is_minus_nine_over_eight_pi_squared() {
        double coefficient = -2 * new BetaFunction(3).b0();
        // By hand: 2 (11 - 2)/(16 pi^2); Shifman, Vainshtein, Zakharov, Phys. Lett. B 78 (1978) 443: -(9 alpha_s/8 pi) F^2, E = pi alpha_s F^2
        assertEquals(-9 / (8 * Math.PI * Math.PI), coefficient, ROUNDING);
        assertEquals(-0.113986, coefficient, 5e-7);
    }

    /** Each flavour takes 2/3 of 1/(16 pi^2) from b0, which is 2/27 of the value at three flavours. */
    @Tag("law")
    @ParameterizedTest
    @ValueSource(ints = {1, 2, 3, 4, 5, 6})
    void given_one_flavor_more_then_b0_is_smaller_by_two_twenty_sevenths_of_its_value_at_three(int flavors) {
        double step = new BetaFunction(flavors - 1).b0() - new BetaFunction(flavors).b0();
        assertEquals(2.0 / 27, step / new BetaFunction(3).b0(), 4 * ROUNDING);
    }

    @Tag("message")
    @ParameterizedTest
    @ValueSource(ints = {-1, 7})
    void given_an_impossible_number_of_flavors_then_the_message_says_what_is_possible(int flavors) {
        IllegalArgumentException e = assertThrows(IllegalArgumentException.class, () -> new BetaFunction(flavors));
        assertTrue(e.getMessage().contains(flavors + " active flavours; need 0 to 6"), e.getMessage());
    }
}
