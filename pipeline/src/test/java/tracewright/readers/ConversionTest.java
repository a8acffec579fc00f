package tracewright.readers;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;
import tracewright.study.Flavor;
import tracewright.study.Layout;
import tracewright.study.Layout.Boundary;
import tracewright.study.Layout.BoundarySign;
import tracewright.study.Layout.Counts;
import tracewright.study.Layout.DensityConvention;
import tracewright.study.Layout.LoopConvention;
import tracewright.study.Layout.TimeOrigin;
import tracewright.study.Layout.Volume;

/** Exact, by hand: physics conventions on T = 4 slices of 3^3 sites. Powers of two and small whole numbers, so no rounding. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class ConversionTest {

    private static final int T = 4;
    private static final double SITES = 27;

    private static Layout layout(Layout.Dataset d) {
        return new Layout("tracewright-layout/1", "", T, 3, java.util.Map.of(), List.of(d));
    }

    private static double[] convert(Layout.Dataset d, double[] in, int... t0) {
        Conversion c = Conversion.of(layout(d), d);
        double[] out = new double[t0.length * c.kept()];
        c.apply(in, 0, new Conversion.Steps(c.stored(), c.stored(), 1, 1), t0, out);
        return out;
    }

    private static Layout.Dataset twoPoint(TimeOrigin time, Boundary boundary, BoundarySign sign) {
        return new Layout.Dataset.TwoPoint("proton", Toy.cst("x"), Toy.LIST, time, boundary, sign);
    }

    private static Layout.Dataset connected(TimeOrigin time, Boundary boundary, BoundarySign sign) {
        return new Layout.Dataset.Connected("proton", Flavor.LIGHT, Counts.UP_PLUS_DOWN, 2, Toy.cst("x"), Toy.LIST, time, boundary, sign);
    }

    @Test
    void given_absolute_time_and_an_included_sign_when_converted_then_slices_move_to_the_source_and_wrapped_ones_change_sign() {
        // source at 3: t = 0 is slice 3; t = 1, 2, 3 are slices 0, 1, 2 beyond the boundary
        assertArrayEquals(new double[] {8, -1, -2, -4},
            convert(twoPoint(TimeOrigin.ABSOLUTE, Boundary.ANTIPERIODIC, BoundarySign.INCLUDED), new double[] {1, 2, 4, 8}, 3));
    }

    @Test
    void given_time_relative_to_the_source_and_an_included_sign_when_converted_then_the_sign_still_goes_where_t0_plus_t_reaches_T() {
        // sources at 0 and 2: of the second, t = 2 and 3 are slices 4 and 5 >= T
        assertArrayEquals(new double[] {1, 2, 4, 8, 1, 2, -4, -8},
            convert(twoPoint(TimeOrigin.SOURCE, Boundary.ANTIPERIODIC, BoundarySign.INCLUDED), new double[] {1, 2, 4, 8, 1, 2, 4, 8}, 0, 2));
    }

    @ParameterizedTest
    @CsvSource({"ANTIPERIODIC, REMOVED", "PERIODIC, INCLUDED", "PERIODIC, REMOVED"})
    void given_a_removed_sign_or_periodic_time_when_converted_then_no_sign_changes(Boundary boundary, BoundarySign sign) {
        assertArrayEquals(new double[] {4, 8, 1, 2}, convert(twoPoint(TimeOrigin.ABSOLUTE, boundary, sign), new double[] {1, 2, 4, 8}, 2));
        assertArrayEquals(new double[] {4, 8, 1}, convert(connected(TimeOrigin.ABSOLUTE, boundary, sign), new double[] {1, 2, 4, 8}, 2));
    }

    @Test
    void given_a_connected_insertion_when_the_sink_is_beyond_the_boundary_then_all_insertions_change_sign_and_else_none() {
        // separation 2: sinks of t0 = 1 and 2 are slices 3 and 4; only the second reaches T = 4
        double[] in = {1, 2, 4, 8, 1, 2, 4, 8};
        assertArrayEquals(new double[] {2, 4, 8, -4, -8, -1}, convert(connected(TimeOrigin.ABSOLUTE, Boundary.ANTIPERIODIC, BoundarySign.INCLUDED), in, 1, 2));
        assertArrayEquals(new double[] {1, 2, 4, -8, -16, -32},
            convert(connected(TimeOrigin.SOURCE, Boundary.ANTIPERIODIC, BoundarySign.INCLUDED), new double[] {1, 2, 4, 8, 16, 32}, 1, 2));
    }

    @ParameterizedTest
    @CsvSource({
        "LIGHT, ONE_FLAVOR, TRACE_INVERSE, SUM, -2", "LIGHT, UP_PLUS_DOWN, TRACE_INVERSE, SUM, -1", "LIGHT, ONE_FLAVOR, OPERATOR, SUM, 2",
        "STRANGE, ONE_FLAVOR, TRACE_INVERSE, SUM, -1", "STRANGE, ONE_FLAVOR, OPERATOR, AVERAGE, 27", "LIGHT, ONE_FLAVOR, TRACE_INVERSE, AVERAGE, -54"})
    void given_a_loop_when_converted_then_it_is_minus_the_trace_summed_over_space_and_over_u_and_d(
        Flavor flavor, Counts counts, LoopConvention convention, Volume volume, double factor) {
        Layout.Dataset loop = new Layout.Dataset.Loop(flavor, counts, Toy.cst("x"), convention, volume);
        assertArrayEquals(new double[] {factor, 2 * factor, 4 * factor, 8 * factor}, convert(loop, new double[] {1, 2, 4, 8}, 0));
    }

    @ParameterizedTest
    @CsvSource({"E, 1", "G2, 4", "T2E, 0.25"})
    void given_one_density_in_three_normalisations_when_converted_then_it_is_the_same_E(DensityConvention convention, double stored) {
        // flow time 1/2: E = 1 is G^2 = 4 and t^2 E = 1/4
        Layout.Dataset sum = new Layout.Dataset.ActionDensity(0.5, Toy.cst("x"), convention, Volume.SUM);
        Layout.Dataset average = new Layout.Dataset.ActionDensity(0.5, Toy.cst("x"), convention, Volume.AVERAGE);
        double[] in = {stored, 2 * stored, 4 * stored, 8 * stored};
        assertArrayEquals(new double[] {1, 2, 4, 8}, convert(sum, in, 0));
        assertArrayEquals(new double[] {SITES, 2 * SITES, 4 * SITES, 8 * SITES}, convert(average, in, 0));
    }

    @Test
    void given_hits_on_the_slowest_axis_when_converted_then_they_are_averaged() {
        Layout.Dataset loop = new Layout.Dataset.Loop(Flavor.STRANGE, Counts.ONE_FLAVOR, Toy.cst("x"), LoopConvention.OPERATOR, Volume.SUM);
        Conversion c = Conversion.of(layout(loop), loop);
        double[] out = new double[T];
        // [time][hit]: neighbours in time are two apart
        c.apply(new double[] {1, 3, 10, 30, 100, 300, 0, 2}, 0, new Conversion.Steps(0, 1, 2, 2), new int[] {0}, out);
        assertArrayEquals(new double[] {2, 20, 200, 1}, out);
    }

    @ParameterizedTest
    @ValueSource(doubles = {Double.NaN, Double.POSITIVE_INFINITY, Double.NEGATIVE_INFINITY})
    void given_one_bad_value_anywhere_when_checked_then_it_is_seen(double bad) {
        Layout.Dataset d = twoPoint(TimeOrigin.ABSOLUTE, Boundary.ANTIPERIODIC, BoundarySign.INCLUDED);
        Conversion c = Conversion.of(layout(d), d);
        int[] t0 = {0, 1, 3};
        double[] out = new double[t0.length * T];
        for (int k = 0; k < out.length; k++) {
            double[] values = new double[out.length];
            java.util.Arrays.fill(values, Double.MAX_VALUE);
            assertTrue(c.apply(values, 0, new Conversion.Steps(T, T, 1, 1), t0, out));
            values[k] = bad;
            assertFalse(c.apply(values, 0, new Conversion.Steps(T, T, 1, 1), t0, out));
        }
    }

    @Test
    void given_a_slice_of_the_result_when_asked_then_the_slice_of_the_file_is_named() {
        assertEquals(1, Conversion.of(layout(Toy.proton(Toy.cst("x"), Toy.LIST)), Toy.proton(Toy.cst("x"), Toy.LIST)).storedSlice(3, 2));
    }
}
