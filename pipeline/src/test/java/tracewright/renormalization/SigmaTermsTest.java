package tracewright.renormalization;

import static org.junit.jupiter.api.Assertions.assertEquals;

import java.util.Optional;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.api.Test;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.study.Study;

@DisplayNameGeneration(ReplaceUnderscores.class)
class SigmaTermsTest {

    private static Renormalized invariant(SampledNumber mass, SampledNumber element, SampledNumber mevPerUnit) {
        return SigmaTerms.of(new Study.SigmaRoute.Invariant(), mass, element, mevPerUnit);
    }

    @Tag("exact")
    @Test
    void given_mass_element_and_spacing_then_the_sigma_term_is_their_product_with_the_errors_of_all_three() {
        Renormalized sigma = invariant(SampledNumber.input("mass", 0.002, 0.0002), SampledNumber.input("element", 10, 0.5),
            SampledNumber.input("mev", 2000, 40));
        // By hand: 0.002 * 10 * 2000 = 40 MeV; relative errors 10 %, 5 %, 2 %; the product is linear in each, so 0x1p-45 is rounding of 40^2
        assertEquals(40, sigma.value().central(), 0x1p-46);
        assertEquals(4 * 4, sigma.value().varianceByGroup().get("input:mass"), 0x1p-43);
        assertEquals(2 * 2, sigma.value().varianceByGroup().get("input:element"), 0x1p-43);
        assertEquals(0.8 * 0.8, sigma.value().varianceByGroup().get("input:mev"), 0x1p-43);
    }

    @Tag("exact")
    @Test
    void given_the_invariant_route_then_the_number_belongs_to_no_scheme() {
        Renormalized sigma = invariant(SampledNumber.exact(0.002), SampledNumber.exact(10), SampledNumber.exact(2000));
        assertEquals("invariant", sigma.route());
        assertEquals(Optional.empty(), sigma.scheme());
        assertEquals(Optional.empty(), sigma.scaleGev());
    }

    /**
     * The light element is &lt;ubar u + dbar d&gt; and the mass the average of up and down: with equal masses this is twice the term
     * of one flavour, never the same.
     */
    @Tag("law")
    @Test
    void given_two_equal_flavors_then_the_light_term_is_the_sum_of_both() {
        SampledNumber mass = SampledNumber.exact(0.002);
        SampledNumber up = SampledNumber.input("up", 6, 0.1);
        SampledNumber down = SampledNumber.input("down", 4, 0.1);
        SampledNumber mev = SampledNumber.exact(2000);
        double light = invariant(mass, up.plus(down), mev).value().central();
        assertEquals(invariant(mass, up, mev).value().central() + invariant(mass, down, mev).value().central(), light, 0x1p-46);
    }
}
