package tracewright.synth;

import static org.junit.jupiter.api.Assertions.assertEquals;

import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;

/** Expected values: the formula of TwoStates evaluated with mpmath to 40 digits, independently of this code. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class TwoStatesTest {

    private static final TwoStates STATES = new TwoStates(1, 0.45, 0.3, 0.6);
    private static final TwoStates.Elements ELEMENTS = new TwoStates.Elements(3.0, -0.8, 1.5);
    /** About ten roundings of numbers of order one enter each value: 10 eps, and as much again. */
    private static final double ROUNDING = 5e-15;

    @Test
    void given_two_states_when_the_ratio_is_taken_at_t_10_tau_4_then_it_is_the_reference_value() {
        assertEquals(2.675800988217359, STATES.ratio(ELEMENTS, 10, 4), 2.7 * ROUNDING);
    }

    @Test
    void given_two_states_when_the_ratio_is_summed_between_source_and_sink_then_sums_and_slope_are_the_reference_values() {
        assertEquals(23.399897152512835, summed(10), 24 * ROUNDING);
        assertEquals(29.37710385777357, summed(12), 30 * ROUNDING);
        assertEquals(2.988603352630366, (summed(12) - summed(10)) / 2, 27 * ROUNDING);     // a difference keeps the sums' rounding
    }

    @Test
    void given_two_states_when_the_effective_mass_is_taken_at_t_5_then_it_is_the_reference_value() {
        assertEquals(0.4810798600951957, StrictMath.log(STATES.forward(5) / STATES.forward(6)), ROUNDING);
    }

    @Test
    void given_a_ratio_when_source_and_sink_are_exchanged_then_nothing_changes() {
        assertEquals(STATES.ratio(ELEMENTS, 9, 2), STATES.ratio(ELEMENTS, 9, 7), 3 * ROUNDING);
    }

    @Test
    void given_a_periodic_correlator_when_time_is_mirrored_then_nothing_changes() {
        // Both terms are the same two numbers added in the other order.
        assertEquals(STATES.periodic(3, 16), STATES.periodic(13, 16));
    }

    private static double summed(int t) {
        double sum = 0;
        for (int tau = 1; tau < t; tau++) {
            sum += STATES.ratio(ELEMENTS, t, tau);
        }
        return sum;
    }
}
