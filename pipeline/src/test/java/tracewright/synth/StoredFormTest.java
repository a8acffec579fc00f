package tracewright.synth;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;

import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import tracewright.study.Flavor;
import tracewright.study.InputException;
import tracewright.study.Layout;
import tracewright.study.Layout.Boundary;
import tracewright.study.Layout.BoundarySign;
import tracewright.study.Layout.TimeOrigin;

/** A lattice of 2^3 x 4 sites; every expected array is written out by hand. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class StoredFormTest {

    private static final Layout LAYOUT = new Layout("tracewright-layout/1", "", 4, 2, Map.of(), List.of());
    private static final Layout.Stored PLACE =
        new Layout.Stored("main", Optional.empty(), Optional.empty(), Optional.empty(), Optional.of("re"), Map.of());

    private static double[] twoPoint(TimeOrigin time, Boundary boundary, BoundarySign sign, int[] sources, double... values) {
        return StoredForm.of(LAYOUT, new Layout.Dataset.TwoPoint("n", PLACE, new Layout.SourceTimes.FromColumn(), time, boundary, sign))
            .encode(sources, values);
    }

    private static double[] connected(TimeOrigin time, int[] sources, double... values) {
        return StoredForm.of(LAYOUT, new Layout.Dataset.Connected("n", Flavor.LIGHT, Layout.Counts.UP_PLUS_DOWN, 2, PLACE,
            new Layout.SourceTimes.FromColumn(), time, Boundary.ANTIPERIODIC, BoundarySign.INCLUDED)).encode(sources, values);
    }

    @Test
    void given_absolute_time_and_an_included_sign_when_stored_then_slices_wrap_and_those_beyond_the_boundary_are_negative() {
        // Source at 3: t = 0 sits at 3; t = 1, 2, 3 at 0, 1, 2 beyond the boundary.
        assertArrayEquals(new double[] {-20, -30, -40, 10},
            twoPoint(TimeOrigin.ABSOLUTE, Boundary.ANTIPERIODIC, BoundarySign.INCLUDED, new int[] {3}, 10, 20, 30, 40));
    }

    @Test
    void given_relative_time_and_an_included_sign_when_stored_then_slices_stay_and_those_beyond_the_boundary_are_negative() {
        assertArrayEquals(new double[] {1, 2, 3, 4, 10, 20, -30, -40},
            twoPoint(TimeOrigin.SOURCE, Boundary.ANTIPERIODIC, BoundarySign.INCLUDED, new int[] {0, 2}, 1, 2, 3, 4, 10, 20, 30, 40));
    }

    @Test
    void given_a_removed_sign_or_periodic_boundaries_when_stored_then_nothing_is_negative() {
        assertArrayEquals(new double[] {20, 30, 40, 10},
            twoPoint(TimeOrigin.ABSOLUTE, Boundary.ANTIPERIODIC, BoundarySign.REMOVED, new int[] {3}, 10, 20, 30, 40));
        assertArrayEquals(new double[] {20, 30, 40, 10},
            twoPoint(TimeOrigin.ABSOLUTE, Boundary.PERIODIC, BoundarySign.INCLUDED, new int[] {3}, 10, 20, 30, 40));
    }

    @Test
    void given_a_connected_function_whose_sink_is_beyond_the_boundary_when_stored_then_all_its_insertions_are_negative() {
        // Separation 2: from source 1 the sink is at 3, inside; from source 2 at 4, beyond.
        assertArrayEquals(new double[] {1, 2, 3, -1, -2, -3}, connected(TimeOrigin.SOURCE, new int[] {1, 2}, 1, 2, 3, 1, 2, 3));
    }

    @Test
    void given_a_connected_function_on_an_absolute_axis_when_stored_then_unmeasured_slices_are_zero() {
        assertArrayEquals(new double[] {-2, -3, 0, -1}, connected(TimeOrigin.ABSOLUTE, new int[] {3}, 1, 2, 3));
    }

    @Test
    void given_a_loop_as_trace_of_one_flavor_averaged_over_sites_when_stored_then_it_is_minus_half_an_eighth() {
        Layout.Dataset loop = new Layout.Dataset.Loop(Flavor.LIGHT, Layout.Counts.ONE_FLAVOR, PLACE, Layout.LoopConvention.TRACE_INVERSE,
            Layout.Volume.AVERAGE);
        assertArrayEquals(new double[] {-1, -2, -3, -4}, StoredForm.of(LAYOUT, loop).encode(new int[0], new double[] {16, 32, 48, 64}));
    }

    @Test
    void given_a_strange_loop_when_stored_then_one_flavor_is_no_factor() {
        Layout.Dataset loop = new Layout.Dataset.Loop(Flavor.STRANGE, Layout.Counts.ONE_FLAVOR, PLACE, Layout.LoopConvention.OPERATOR,
            Layout.Volume.SUM);
        assertArrayEquals(new double[] {16, 32, 48, 64}, StoredForm.of(LAYOUT, loop).encode(new int[0], new double[] {16, 32, 48, 64}));
    }

    @Test
    void given_a_density_when_stored_as_g2_or_t2e_then_it_is_four_times_or_t2_times_e() {
        double[] e = {1, 2, 3, 4};
        Layout.Dataset g2 = new Layout.Dataset.ActionDensity(3, PLACE, Layout.DensityConvention.G2, Layout.Volume.SUM);
        Layout.Dataset t2e = new Layout.Dataset.ActionDensity(2, PLACE, Layout.DensityConvention.T2E, Layout.Volume.AVERAGE);
        assertArrayEquals(new double[] {4, 8, 12, 16}, StoredForm.of(LAYOUT, g2).encode(new int[0], e));
        assertArrayEquals(new double[] {0.5, 1, 1.5, 2}, StoredForm.of(LAYOUT, t2e).encode(new int[0], e));      // 4/8 per site
    }

    @Test
    void given_a_connected_strange_insertion_when_asked_for_then_it_is_refused() {
        Layout.Dataset strange = new Layout.Dataset.Connected("n", Flavor.STRANGE, Layout.Counts.ONE_FLAVOR, 2, PLACE,
            new Layout.SourceTimes.FromColumn(), TimeOrigin.SOURCE, Boundary.PERIODIC, BoundarySign.REMOVED);
        assertThrows(InputException.class, () -> StoredForm.of(LAYOUT, strange));
    }
}
