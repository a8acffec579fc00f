package tracewright.renormalization;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import java.util.Optional;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.api.Test;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.renormalization.GluonPart.FlowedElement;
import tracewright.study.InputException;
import tracewright.study.InputRef;
import tracewright.study.Study;
import tracewright.study.UncertainValue;

@DisplayNameGeneration(ReplaceUnderscores.class)
class GluonPartTest {

    private static final double EIGHT_PI_SQUARED = 8 * Math.PI * Math.PI;

    /** 2000 MeV, without error, so that errors below are those of the elements. */
    private static final SampledNumber MEV_PER_UNIT = SampledNumber.exact(2000);

    /** Elements on the line -4 - 0.5 t, with independent errors of 0.1. */
    private static final List<FlowedElement> ON_A_LINE = List.of(element(1, -4.5), element(2, -5), element(3, -5.5), element(6, 100));

    private static FlowedElement element(double flowTime, double value) {
        return new FlowedElement(flowTime, SampledNumber.input("noise_" + flowTime, value, 0.1));
    }

    private static Study.Renormalization settings(int flavors, Study.GluonRoute route) {
        return new Study.Renormalization(flavors, "MSbar", 2, given("gamma_m", 0.28, 0), new Study.SigmaRoute.Invariant(), route);
    }

    private static InputRef given(String name, double value, double error) {
        return new InputRef(name, new UncertainValue(value, error));
    }

    private static Study.GluonRoute.Flow flow(double first, double last) {
        return new Study.GluonRoute.Flow(new Study.FlowWindow(first, last), Optional.empty());
    }

    private static Study.GluonRoute.Flow truncated(double alphaS, double error) {
        return new Study.GluonRoute.Flow(new Study.FlowWindow(1, 3), Optional.of(given("alpha_s", alphaS, error)));
    }

    /** The fit solves three by two equations of order one: some tens of roundings of 1e3. */
    private static double rounding(double value) {
        return 100 * 0x1p-52 * Math.abs(value);
    }

    @Tag("exact")
    @Test
    void given_elements_on_a_line_when_the_flow_time_goes_to_zero_then_value_and_slope_are_those_of_the_line() {
        GluonPart gluon = GluonPart.of(settings(3, flow(1, 3)), ON_A_LINE, MEV_PER_UNIT, "a.nucleon");
        // By hand: -9/(8 pi^2) (-4 - 0.5 t) 2000 MeV; the element at t = 6 is outside the window
        assertEquals(9 * 4 * 2000 / EIGHT_PI_SQUARED, gluon.part().value().central(), rounding(1000));
        GluonPart.FlowLimit limit = gluon.extrapolation().orElseThrow();
        assertEquals(9 * 0.5 * 2000 / EIGHT_PI_SQUARED, limit.slope().central(), rounding(1000));
        assertEquals(List.of(1.0, 2.0, 3.0), limit.points().stream().map(FlowedElement::flowTime).toList());
        assertEquals(9 * 5 * 2000 / EIGHT_PI_SQUARED, limit.points().get(1).element().central(), rounding(1000));
        assertEquals(1, limit.degreesOfFreedom());
        assertEquals(0, limit.chiSquared(), 1e-18);
    }

    @Tag("exact")
    @Test
    void given_independent_equal_errors_when_the_flow_time_goes_to_zero_then_the_error_is_that_of_a_straight_line() {
        GluonPart gluon = GluonPart.of(settings(3, flow(1, 3)), ON_A_LINE, MEV_PER_UNIT, "a.nucleon");
        // By hand, unit errors at t = 1, 2, 3: var(intercept) = 1/3 + mean^2/sum (t - mean)^2 = 1/3 + 4/2 = 7/3, var(slope) = 1/2
        double unit = 0.1 * 9 * 2000 / EIGHT_PI_SQUARED;
        assertEquals(unit * Math.sqrt(7.0 / 3), gluon.part().value().error(), rounding(1000));
        assertEquals(unit * Math.sqrt(0.5), gluon.extrapolation().orElseThrow().slope().error(), rounding(1000));
    }

    /** Depletion of the action density inside a hadron (element below zero) makes the gluon part of the mass positive. */
    @Tag("law")
    @Test
    void given_an_action_density_depleted_in_the_hadron_then_its_part_of_the_mass_is_positive() {
        assertTrue(GluonPart.of(settings(3, flow(1, 3)), ON_A_LINE, MEV_PER_UNIT, "a.nucleon").part().value().central() > 0);
    }

    @Tag("law")
    @Test
    void given_four_flavors_in_place_of_three_then_the_part_scales_with_b0() {
        double three = GluonPart.of(settings(3, flow(1, 3)), ON_A_LINE, MEV_PER_UNIT, "a.nucleon").part().value().central();
        double four = GluonPart.of(settings(4, flow(1, 3)), ON_A_LINE, MEV_PER_UNIT, "a.nucleon").part().value().central();
        assertEquals(25.0 / 27, four / three, rounding(1));
    }

    /**
     * c2 of the pure gauge theory through next order at alpha_s = 0.3: 0.008452174542594539 = (11/8 - (27/16) g^2/(4 pi)^2)/(4 pi)^2,
     * H. Suzuki, PTEP 2013 083B03, arXiv:1304.0533, computed with mpmath. The pure gauge part of the mass is -16 c2 &lt;E&gt;.
     */
    @Tag("reference")
    @Test
    void given_the_coupling_in_the_pure_gauge_theory_then_the_truncation_sample_is_the_published_next_order() {
        GluonPart gluon = GluonPart.of(settings(0, truncated(0.3, 0)), ON_A_LINE, MEV_PER_UNIT, "a.glueball");
        SampledNumber value = gluon.part().value();
        assertEquals(22 * 4 * 2000 / (2 * EIGHT_PI_SQUARED), value.central(), rounding(1000));
        double[] alternative = value.samples("choice:flow-truncation");
        assertEquals(1, alternative.length);
        assertEquals(16 * 0.008452174542594539 * 4 * 2000, alternative[0], rounding(1000));
        // As an error: its distance from the one-loop value
        assertEquals(Math.abs(alternative[0] - value.central()), Math.sqrt(value.varianceByGroup().get("choice:flow-truncation")), rounding(1000));
    }

    @Tag("exact")
    @Test
    void given_no_coupling_then_there_is_no_truncation_group() {
        SampledNumber value = GluonPart.of(settings(3, flow(1, 3)), ON_A_LINE, MEV_PER_UNIT, "a.nucleon").part().value();
        assertTrue(value.groups().stream().noneMatch(g -> g.key().startsWith("choice:")), value.groups().toString());
    }

    @Tag("exact")
    @Test
    void given_a_factor_for_one_flow_time_then_the_part_is_the_product_and_carries_its_error() {
        Study.GluonRoute route = new Study.GluonRoute.GivenFactor(given("factor", -0.1, 0.01), 2);
        GluonPart gluon = GluonPart.of(settings(3, route), ON_A_LINE, MEV_PER_UNIT, "a.nucleon");
        // By hand: -0.1 (-5) 2000 = 1000 MeV; 10 % from the factor and 2 % from the element, first order
        assertEquals(1000, gluon.part().value().central(), rounding(1000));
        assertEquals(100 * 100, gluon.part().value().varianceByGroup().get("input:factor"), rounding(10_000));
        assertEquals(20 * 20, gluon.part().value().varianceByGroup().get("input:noise_2.0"), 10 * rounding(1000));
        assertEquals(Optional.empty(), gluon.extrapolation());
    }

    @Tag("exact")
    @Test
    void given_either_route_then_scheme_and_scale_travel_with_the_number() {
        for (Study.GluonRoute route : List.of(flow(1, 3), new Study.GluonRoute.GivenFactor(given("factor", -0.1, 0.01), 2))) {
            Renormalized part = GluonPart.of(settings(3, route), ON_A_LINE, MEV_PER_UNIT, "a.nucleon").part();
            assertEquals(Optional.of("MSbar"), part.scheme());
            assertEquals(Optional.of(2.0), part.scaleGev());
        }
    }

    @Tag("message")
    @Test
    void given_a_window_with_one_flow_time_then_the_message_lists_the_measured_ones() {
        InputException e = assertThrows(InputException.class, () -> GluonPart.of(settings(3, flow(2.5, 4)), ON_A_LINE, MEV_PER_UNIT, "a.nucleon"));
        assertEquals(InputException.Cause.USAGE, e.reason());
        assertTrue(e.getMessage().contains("the flow window 2.5..4.0 of a.nucleon holds 1 of the measured flow times [1.0, 2.0, 3.0, 6.0]"), e.getMessage());
    }

    @Tag("message")
    @Test
    void given_a_factor_for_a_flow_time_that_was_not_measured_then_the_message_says_both() {
        Study.GluonRoute route = new Study.GluonRoute.GivenFactor(given("factor", -0.1, 0.01), 2.5);
        InputException e = assertThrows(InputException.class, () -> GluonPart.of(settings(3, route), ON_A_LINE, MEV_PER_UNIT, "a.nucleon"));
        assertEquals(InputException.Cause.USAGE, e.reason());
        assertTrue(e.getMessage().contains("flow time 2.5, measured are [1.0, 2.0, 3.0, 6.0]"), e.getMessage());
    }

    /** Three elements that fluctuate as one leave a covariance of rank one: what a study with more flow times than blocks meets. */
    @Tag("message")
    @Test
    void given_flow_times_whose_covariance_has_no_inverse_then_the_message_tells_what_to_do() {
        SampledNumber noise = SampledNumber.input("noise", 0, 0.125);
        List<FlowedElement> together = List.of(new FlowedElement(1, noise.shifted(-4.5)), new FlowedElement(2, noise.shifted(-5)),
            new FlowedElement(3, noise.shifted(-5.25)));
        InputException e = assertThrows(InputException.class, () -> GluonPart.of(settings(3, flow(1, 3)), together, MEV_PER_UNIT, "a.nucleon"));
        assertEquals(InputException.Cause.REQUIREMENT, e.reason());
        assertTrue(e.getMessage().contains("a.nucleon.flow-limit: the covariance of the 3 residuals has no inverse"), e.getMessage());
        assertTrue(e.getMessage().contains("let fewer flow times enter"), e.getMessage());
    }
}
