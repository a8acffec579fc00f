package tracewright.extraction;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import java.util.TreeSet;
import java.util.function.IntFunction;
import java.util.stream.Collectors;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.api.Test;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.study.InputException;
import tracewright.study.Observable;
import tracewright.study.Span;
import tracewright.study.Study;
import tracewright.study.Study.ElementFits.Method;

@DisplayNameGeneration(ReplaceUnderscores.class)
class ElementScanTest {

    private static final double NOISE = 1e-8;
    private static final TwoStateToy ONE_STATE = new TwoStateToy(0);
    private static final TwoStateToy TWO_STATES = new TwoStateToy(0.6);
    private static final Study.CovarianceChoice FULL = Study.CovarianceChoice.FULL;

    private static ElementScan scan(TwoStateToy toy, int configurations, double noise, Integer... separations) {
        return scan(toy, configurations, noise, List.of(TwoStateToy::insertion), separations);
    }

    private static ElementScan scan(TwoStateToy toy, int configurations, double noise, List<IntFunction<Observable>> family, Integer... separations) {
        Set<Integer> all = new TreeSet<>(List.of(separations));
        return new ElementScan("toy.nucleon.scalar", "nucleon", family, all, toy.correlators(configurations, noise, all));
    }

    private static Extracted plateau(ElementScan scan, Span first, Span margin) {
        Study.PlateauFits fits = new Study.PlateauFits(new Span(0, 24), first, margin, FULL);
        return only(scan, new Study.ElementFits(Method.PLATEAU, Optional.of(fits), Optional.empty(), Optional.empty()));
    }

    private static Extracted summation(ElementScan scan, Span allowed, Span first, int margin) {
        Study.SummationFits fits = new Study.SummationFits(allowed, first, margin, FULL);
        return only(scan, new Study.ElementFits(Method.SUMMATION, Optional.empty(), Optional.of(fits), Optional.empty()));
    }

    private static Extracted twoState(ElementScan scan, Span first, Span margin, Span twoPointFirst, int twoPointLast, boolean excited) {
        Study.TwoStateFits fits = new Study.TwoStateFits(new Span(0, 24), first, margin, twoPointFirst, twoPointLast, excited, FULL);
        return only(scan, new Study.ElementFits(Method.TWO_STATE, Optional.empty(), Optional.empty(), Optional.of(fits)));
    }

    private static Extracted only(ElementScan scan, Study.ElementFits settings) {
        Map<Method, List<Extracted>> results = scan.run(settings).results();
        assertEquals(Set.of(settings.publish()), results.keySet());
        assertEquals(1, results.get(settings.publish()).size());
        return results.get(settings.publish()).get(0);
    }

    private static Set<String> labels(Extracted e) {
        return e.fits().stream().map(FitSummary::label).collect(Collectors.toSet());
    }

    /** Noise is a millionth or less of the element; five errors leave no room for a systematic shift. */
    private static void assertElement(Extracted e) {
        assertTrue(e.number().error() > 1e-11 && e.number().error() < 1e-5, e.number().toString());
        assertEquals(TwoStateToy.G00, e.number().central(), 5 * e.number().error());
    }

    /** Ratio of the two-state truth at t = 10, tau = 4: 2.675800988217359, computed with mpmath; the noise of 1e-9 per point allows ten of it. */
    @Tag("reference")
    @Test
    void given_the_two_state_truth_then_the_ratio_is_the_worked_value() {
        assertEquals(2.675800988217359, scan(TWO_STATES, 10, 1e-9, 10).ratio(0, 10).central(4), 1e-8);
        assertEquals(11, scan(TWO_STATES, 10, 1e-9, 10).ratio(0, 10).length());
    }

    /** Sum over tau = 1 .. t - 1 at t = 10 and 12: 23.399897152512835 and 29.37710385777357, computed with mpmath. */
    @Tag("reference")
    @Test
    void given_the_two_state_truth_then_the_summed_ratio_and_its_slope_are_the_worked_values() {
        ElementScan scan = scan(TWO_STATES, 10, 1e-9, 10, 12, 14);
        double[] summed = scan.summedRatio(0, new Span(10, 12), 1).centralRow();
        assertEquals(List.of(10, 12), scan.separationsWithin(new Span(10, 12), 1));
        assertEquals(23.399897152512835, summed[0], 1e-7);
        assertEquals(29.37710385777357, summed[1], 1e-7);
        assertEquals(2.988603352630366, (summed[1] - summed[0]) / 2, 1e-7);
    }

    @Tag("exact")
    @Test
    void given_one_state_then_plateau_and_summation_find_the_element() {
        ElementScan scan = scan(ONE_STATE, 60, NOISE, 6, 8, 10, 12);
        assertElement(plateau(scan, new Span(8, 10), new Span(2, 3)));
        assertElement(summation(scan, new Span(6, 12), new Span(6, 8), 1));
    }

    /** The sum over one more slice on either side moves the intercept alone. */
    @Tag("law")
    @Test
    void given_another_margin_then_the_slope_of_the_summed_ratio_stays() {
        ElementScan scan = scan(ONE_STATE, 60, NOISE, 6, 8, 10, 12);
        for (int margin : new int[] {0, 1, 3}) {
            assertElement(summation(scan, new Span(6, 12), new Span(6, 6), margin));
        }
    }

    @Tag("exact")
    @Test
    void given_two_states_then_the_joint_fit_finds_the_element_where_a_plateau_does_not() {
        ElementScan scan = scan(TWO_STATES, 100, NOISE, 6, 8, 10, 12);
        Extracted joint = twoState(scan, new Span(6, 6), new Span(1, 2), new Span(2, 3), 14, true);
        assertElement(joint);
        assertEquals(List.of(), joint.failures());
        // R(12, 6) = 2.81 at best
        Extracted flat = plateau(scan, new Span(12, 12), new Span(5, 5));
        assertTrue(flat.number().central() < 2.85 && flat.heaviest().pValue() < 1e-6, flat.toString());
    }

    /** g11 of the truth is 1.5: a fit that leaves it out is rejected. */
    @Tag("law")
    @Test
    void given_an_element_between_excited_states_when_it_is_left_out_then_the_fit_is_rejected() {
        Extracted without = twoState(scan(TWO_STATES, 100, NOISE, 6, 8, 10, 12), new Span(6, 6), new Span(1, 1), new Span(2, 2), 14, false);
        assertTrue(without.heaviest().pValue() < 1e-6, without.heaviest().toString());
    }

    @Tag("exact")
    @Test
    void given_spans_of_first_separation_and_margin_then_each_distinct_set_of_points_enters_once() {
        ElementScan scan = scan(ONE_STATE, 60, 1e-3, 6, 8, 10);
        // First 7 and 8 select the same separations
        assertEquals(Set.of("t = 6,8,10, margin 2", "t = 6,8,10, margin 3", "t = 8,10, margin 2", "t = 8,10, margin 3"),
            labels(plateau(scan, new Span(6, 8), new Span(2, 3))));
    }

    @Tag("exact")
    @Test
    void given_tau_averaged_with_its_mirror_then_a_plateau_counts_each_pair_once() {
        // t = 6: tau = 2, 3; t = 8: 2, 3, 4; t = 10: 2, 3, 4, 5: nine points, one parameter
        FitSummary fit = plateau(scan(ONE_STATE, 60, 1e-3, 6, 8, 10), new Span(6, 6), new Span(2, 2)).heaviest();
        assertEquals(8, fit.degreesOfFreedom());
    }

    /** A margin of 3 takes the separation 4 out (2 * 3 > 4), and keeps 6 with the one point in its middle. */
    @Tag("exact")
    @Test
    void given_a_margin_beyond_half_a_separation_then_that_separation_does_not_enter() {
        assertEquals(Set.of("t = 6,8, margin 3"), labels(plateau(scan(ONE_STATE, 60, 1e-3, 4, 6, 8), new Span(4, 4), new Span(3, 3))));
    }

    /** A line through two points tests nothing: three separations are the fewest. */
    @Tag("exact")
    @Test
    void given_a_summation_then_windows_of_fewer_than_three_separations_do_not_enter() {
        assertEquals(Set.of("t = 6,8,10,12, margin 1", "t = 8,10,12, margin 1"),
            labels(summation(scan(ONE_STATE, 60, 1e-3, 6, 8, 10, 12), new Span(6, 12), new Span(6, 12), 1)));
    }

    @Tag("exact")
    @Test
    void given_a_family_then_its_members_share_weights_and_one_choice_group() {
        ElementScan scan = scan(ONE_STATE, 60, 1e-3, List.of(TwoStateToy::insertion, TwoStateToy::insertion), 6, 8, 10);
        Study.PlateauFits fits = new Study.PlateauFits(new Span(0, 24), new Span(6, 8), new Span(2, 2), FULL);
        List<Extracted> members = scan.run(new Study.ElementFits(Method.PLATEAU, Optional.of(fits), Optional.empty(), Optional.empty())).results().get(Method.PLATEAU);
        assertEquals(2, members.size());
        assertEquals(members.get(0).fits(), members.get(1).fits());
        SampledNumber difference = members.get(0).number().minus(members.get(1).number());
        assertEquals(0, difference.central());
        assertEquals(0, difference.error());
    }

    @Tag("message")
    @Test
    void given_few_blocks_then_large_windows_are_listed_with_their_reason_and_small_ones_count() {
        Extracted e = plateau(scan(ONE_STATE, 9, 1e-3, 6, 8, 10), new Span(6, 10), new Span(3, 3));
        // Nine blocks resolve 2 degrees of freedom; t = 6,8,10 has 1 + 2 + 3 points and t = 8,10 has 2 + 3, t = 10 has 3: 5, 4 and 2
        assertEquals(Set.of("t = 10, margin 3"), labels(e));
        assertEquals(2, e.failures().size());
        assertTrue(e.failures().get(0).startsWith("t = 6,8,10, margin 3: covariance 6x6 (full) from 9 blocks"), e.failures().get(0));
        assertTrue(e.failures().get(1).startsWith("t = 8,10, margin 3: covariance 5x5 (full) from 9 blocks"), e.failures().get(1));
    }

    @Tag("message")
    @Test
    void given_windows_that_all_fail_then_a_requirement_is_not_met() {
        ElementScan scan = scan(ONE_STATE, 4, 1e-3, 6, 8, 10);
        InputException e = assertThrows(InputException.class, () -> plateau(scan, new Span(6, 6), new Span(1, 1)));
        assertEquals(InputException.Cause.REQUIREMENT, e.reason());
        assertTrue(e.getMessage().contains("no fit: ") && e.getMessage().contains("toy.nucleon.scalar.plateau, t = 6,8,10, margin 1"), e.getMessage());
    }

    @Tag("message")
    @Test
    void given_spans_that_hold_no_window_then_the_message_asks_for_more_separations() {
        ElementScan scan = scan(ONE_STATE, 20, 1e-3, 6, 8);
        InputException e = assertThrows(InputException.class, () -> summation(scan, new Span(6, 8), new Span(6, 8), 1));
        assertEquals(InputException.Cause.REQUIREMENT, e.reason());
        assertTrue(e.getMessage().contains("no fit window holds enough points\n  where: toy.nucleon.scalar.summation"), e.getMessage());
    }
}
