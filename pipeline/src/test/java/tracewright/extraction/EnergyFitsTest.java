package tracewright.extraction;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import java.util.Set;
import java.util.stream.Collectors;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.api.Test;
import tracewright.correlators.Correlators;
import tracewright.study.InputException;
import tracewright.study.Span;
import tracewright.study.Study;

@DisplayNameGeneration(ReplaceUnderscores.class)
class EnergyFitsTest {

    private static final double NOISE = 1e-8;
    private static final TwoStateToy TWO_STATES = new TwoStateToy(0.6);

    private static Study.Hadron hadron(Study.Hadron.Kind kind, int last, Study.EnergyScan... scans) {
        return new Study.Hadron(kind, List.of(scans), last, Study.CovarianceChoice.FULL, false);
    }

    private static Extracted nucleon(Correlators correlators, int last, Study.EnergyScan... scans) {
        return EnergyFits.of("toy", "nucleon", hadron(Study.Hadron.Kind.BARYON, last, scans), TwoStateToy.EXTENT, correlators);
    }

    private static Study.EnergyScan scan(int states, int first, int last) {
        return new Study.EnergyScan(states, new Span(first, last));
    }

    /** Noise of 1e-8/sqrt(100) on each time slice; the energy of two states is worse by the few hundred that the second costs at most. */
    private static void assertGroundState(Extracted energy) {
        assertTrue(energy.number().error() > 1e-11 && energy.number().error() < 1e-6, energy.number().toString());
        assertEquals(TwoStateToy.M, energy.number().central(), 5 * energy.number().error());
    }

    @Tag("exact")
    @Test
    void given_a_baryon_of_two_states_when_fitted_with_two_then_the_ground_state_is_found() {
        Extracted energy = nucleon(TWO_STATES.correlators(60, NOISE, Set.of()), 16, scan(2, 2, 4));
        assertGroundState(energy);
        assertEquals(List.of(), energy.failures());
    }

    @Tag("exact")
    @Test
    void given_a_periodic_meson_of_two_states_when_fitted_with_two_then_the_ground_state_is_found() {
        Extracted energy = EnergyFits.of("toy", "pion", hadron(Study.Hadron.Kind.MESON, 24, scan(2, 8, 9)), TwoStateToy.EXTENT,
            TWO_STATES.correlators(60, NOISE, Set.of()));
        assertGroundState(energy);
    }

    /** A periodic meson bends towards the middle: forward exponentials miss it by far more than the noise. */
    @Tag("law")
    @Test
    void given_a_periodic_meson_when_fitted_as_a_baryon_then_the_fit_is_rejected() {
        Extracted energy = EnergyFits.of("toy", "pion", hadron(Study.Hadron.Kind.BARYON, 24, scan(1, 14, 14)), TwoStateToy.EXTENT,
            new TwoStateToy(0).correlators(60, NOISE, Set.of()));
        assertTrue(energy.heaviest().pValue() < 1e-6, energy.heaviest().toString());
    }

    @Tag("exact")
    @Test
    void given_scans_of_one_and_two_states_then_every_window_enters_once_and_weights_sum_to_one() {
        Extracted energy = nucleon(new TwoStateToy(0).correlators(60, 1e-3, Set.of()), 12, scan(1, 3, 5));
        assertEquals(Set.of("1 state, t = 3..12", "1 state, t = 4..12", "1 state, t = 5..12"),
            energy.fits().stream().map(FitSummary::label).collect(Collectors.toSet()));
        assertEquals(3, energy.fits().size());
        assertEquals(1, energy.fits().stream().mapToDouble(FitSummary::weight).sum(), 1e-12);
        for (int i = 1; i < energy.fits().size(); i++) {
            assertTrue(energy.fits().get(i - 1).weight() >= energy.fits().get(i).weight());
        }
        // Points minus two parameters
        energy.fits().forEach(f -> assertEquals(f.label().contains("3..") ? 8 : f.label().contains("4..") ? 7 : 6, f.degreesOfFreedom(), f.label()));
    }

    /** One state alone cannot describe two at this precision: its windows get no weight beside those of two states. */
    @Tag("law")
    @Test
    void given_one_state_beside_two_on_data_of_two_then_two_states_take_all_weight() {
        Extracted energy = nucleon(TWO_STATES.correlators(60, NOISE, Set.of()), 16, scan(1, 4, 5), scan(2, 3, 4));
        assertEquals(1, energy.fits().stream().filter(f -> f.label().startsWith("2 states")).mapToDouble(FitSummary::weight).sum(), 1e-12);
        assertGroundState(energy);
    }

    @Tag("message")
    @Test
    void given_a_window_with_more_points_than_blocks_then_it_is_listed_with_its_reason_and_the_others_count() {
        Extracted energy = nucleon(new TwoStateToy(0).correlators(12, 1e-3, Set.of()), 16, scan(1, 3, 3), scan(1, 13, 13));
        assertEquals(List.of("1 state, t = 13..16"), energy.fits().stream().map(FitSummary::label).toList());
        assertEquals(1, energy.failures().size());
        assertTrue(energy.failures().get(0).startsWith("1 state, t = 3..16: "), energy.failures().get(0));
        assertTrue(energy.failures().get(0).contains("12"), energy.failures().get(0));
    }

    @Tag("message")
    @Test
    void given_windows_that_all_fail_then_a_requirement_is_not_met_and_every_reason_is_given() {
        Correlators few = new TwoStateToy(0).correlators(8, 1e-3, Set.of());
        InputException e = assertThrows(InputException.class, () -> nucleon(few, 16, scan(1, 3, 4)));
        assertEquals(InputException.Cause.REQUIREMENT, e.reason());
        assertEquals(List.of("toy.nucleon.energy, 1 state, t = 3..16", "toy.nucleon.energy, 1 state, t = 4..16"),
            e.problems().stream().map(p -> p.where()).toList());
        e.problems().forEach(p -> assertTrue(p.what().startsWith("no fit: ") && p.what().contains("8"), p.text()));
    }
}
