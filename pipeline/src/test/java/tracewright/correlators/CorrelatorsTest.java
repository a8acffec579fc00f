package tracewright.correlators;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.nio.file.Path;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import java.util.SortedSet;
import java.util.SplittableRandom;
import java.util.TreeSet;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.api.Test;
import tracewright.cuts.Selection;
import tracewright.fitters.resampling.Resampling;
import tracewright.fitters.sampled.SampledVector;
import tracewright.study.Flavor;
import tracewright.study.InputRef;
import tracewright.study.Observable;
import tracewright.study.Study;
import tracewright.study.UncertainValue;

/** Two sources at t0 = 7 and t0 = 0 on eight time slices: the first one's insertions wrap around the lattice. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class CorrelatorsTest {

    private static final int EXTENT = 8;
    private static final int ALL = Integer.MAX_VALUE;
    private static final int[] SOURCES = {7, 0};
    private static final Observable NUCLEON = new Observable.TwoPoint("nucleon");
    private static final Observable DENSITY = new Observable.ActionDensity(1);
    private static final Observable.Connected CONNECTED = new Observable.Connected("nucleon", Flavor.LIGHT, 2);

    /** Numbers below 64 with a few binary places: sums and halves are exact, quotients by block counts round once or twice. */
    private static final double ROUNDING = 4 * 0x1p-47;

    private static CorrelatorPlan plan(List<Observable.Connected> connected, SortedSet<Integer> separations) {
        return new CorrelatorPlan(List.of("nucleon"), Set.of(), connected, Map.of("nucleon", Map.of(DENSITY, separations)));
    }

    private static CorrelatorPlan products(Integer... separations) {
        return plan(List.of(), new TreeSet<>(List.of(separations)));
    }

    private static Selection selection(HandMade source, CorrelatorPlan plan, List<Study.Exclusion> exclude) {
        Study.Cuts cuts = new Study.Cuts(0, List.of(), exclude, 1, Optional.empty(), Optional.empty(), Study.Cuts.Missing.ERROR,
            new Study.BlockChoice(Optional.of(1)));
        return Selection.of(source, plan.observables(), new Study.Ensemble("toy", Path.of("layout"), Path.of("data"),
            new InputRef("spacing", new UncertainValue(0.1, 0)), Map.of(), List.of(), cuts));
    }

    private static Reduction reduction(HandMade source, CorrelatorPlan plan, int sources) {
        return Reduction.read(source, selection(source, plan, List.of()), plan, sources);
    }

    /** Jackknife with blocks of one trajectory. */
    private static Correlators correlators(HandMade source, CorrelatorPlan plan, int sources) {
        return Correlators.of(reduction(source, plan, sources), plan,
            Resampling.jackknife("toy", selection(source, plan, List.of()).blocks(1)));
    }

    /** C2(2) = 2 and 4 on the first configuration, 10 and 0 on the second; all other times hold 1. */
    private static HandMade twoConfigurations() {
        return new HandMade(EXTENT)
            .with(NUCLEON, 1, SOURCES, 1, 1, 2, 1, 1, 1, 1, 1, 1, 1, 4, 1, 1, 1, 1, 1)
            .with(NUCLEON, 2, SOURCES, 1, 1, 10, 1, 1, 1, 1, 1, 1, 1, 0, 1, 1, 1, 1, 1)
            .with(DENSITY, 1, 1, 2, 3, 4, 5, 6, 7, 8)
            .with(DENSITY, 2, 0, 4, 0, 0, 0, 0, 0, 0);
    }

    @Tag("exact")
    @Test
    void given_two_configurations_by_hand_when_reduced_then_products_wrap_around_and_sources_are_averaged() {
        Reduction reduction = reduction(twoConfigurations(), products(2), ALL);
        Columns columns = reduction.columns();
        int product = columns.offset(Columns.product("nucleon", DENSITY, 2));
        int slice = columns.offset(Columns.slice("nucleon", DENSITY));
        // First: (2 X(7) + 4 X(0))/2 = 10, (2 X(0) + 4 X(1))/2 = 5, (2 X(1) + 4 X(2))/2 = 8; second: (10 X(7), X(0), X(1))/2 = 0, 0, 20
        assertArrayEquals(new double[] {10, 5, 8}, row(reduction, 0, product, 3));
        assertArrayEquals(new double[] {0, 0, 20}, row(reduction, 1, product, 3));
        // First: (X(7) + X(0))/2 = 4.5, (X(0) + X(1))/2 = 1.5, (X(1) + X(2))/2 = 2.5; second: 0, 2, 2
        assertArrayEquals(new double[] {4.5, 1.5, 2.5}, row(reduction, 0, slice, 3));
        assertArrayEquals(new double[] {0, 2, 2}, row(reduction, 1, slice, 3));
        assertArrayEquals(new double[] {3, 5}, reduction.twoPointSeries("nucleon", 2));
        // (4.5 + 1.5 + 2.5)/3 and (0 + 2 + 2)/3
        assertArrayEquals(new double[] {8.5 / 3, 4.0 / 3}, reduction.sliceSeries("nucleon", DENSITY, 3), ROUNDING);
        assertEquals(2, reduction.sourcesUsed());
    }

    private static double[] row(Reduction reduction, int configuration, int from, int length) {
        double[] row = new double[length];
        System.arraycopy(reduction.values(), configuration * reduction.columns().size() + from, row, 0, length);
        return row;
    }

    @Tag("exact")
    @Test
    void given_two_configurations_by_hand_then_the_vacuum_is_subtracted_the_bias_removed_and_tau_averaged_with_its_mirror() {
        SampledVector c3 = correlators(twoConfigurations(), products(2), ALL).threePoint("nucleon", DENSITY, 2);
        // <C2 X> - <C2><X> = 5 - 4 * 2.25, 2.5 - 4 * 1.75, 14 - 4 * 2.25 = -4, -4.5, 5; the bias is -1/N of the covariance (N - 1 in its
        // denominator) of the source averages (3, 5) with (4.5, 0), (1.5, 2), (2.5, 2): plus -4.5/2, 0.5/2, -0.5/2 gives -6.25, -4.25, 4.75;
        // the first and the last are averaged
        assertArrayEquals(new double[] {-0.75, -4.25, -0.75}, c3.centralRow(), ROUNDING);
        // Samples: without one configuration the other is left and its "covariance" of averages vanishes: C2 X - C2 X of one configuration,
        // 0 - 5 (0, 2, 2) + (0, 0, 20) = 0, -10, 10 and (10, 5, 8) - 3 (4.5, 1.5, 2.5) = -3.5, 0.5, 0.5; all shifted by the same correction
        assertArrayEquals(new double[] {5 - 1.25, -10 + 0.25, 5 - 1.25}, c3.sampleRow(0), ROUNDING);
        assertArrayEquals(new double[] {-1.5 - 1.25, 0.5 + 0.25, -1.5 - 1.25}, c3.sampleRow(1), ROUNDING);
    }

    @Tag("exact")
    @Test
    void given_a_cut_to_one_source_then_the_first_by_source_time_is_used_whatever_its_place_on_disk() {
        Reduction reduction = reduction(twoConfigurations(), products(2), 1);
        assertEquals(1, reduction.sourcesUsed());
        // The source at t0 = 0 is the second on disk
        assertArrayEquals(new double[] {4, 0}, reduction.twoPointSeries("nucleon", 2));
        assertArrayEquals(new double[] {4, 8, 12}, row(reduction, 0, reduction.columns().offset(Columns.product("nucleon", DENSITY, 2)), 3));
    }

    @Tag("exact")
    @Test
    void given_a_connected_insertion_then_it_is_averaged_over_sources_and_with_its_mirror() {
        HandMade source = twoConfigurations().with(CONNECTED, 1, SOURCES, 1, 2, 3, 3, 4, 9).with(CONNECTED, 2, SOURCES, 4, 1, 2, 0, 1, 0);
        CorrelatorPlan plan = plan(List.of(CONNECTED), new TreeSet<>());
        // Source averages (2, 3, 6) and (2, 1, 1); mean (2, 2, 3.5); tau with 2 - tau
        assertArrayEquals(new double[] {2.75, 2, 2.75}, correlators(source, plan, ALL).threePoint("nucleon", CONNECTED, 2).centralRow(), ROUNDING);
    }

    @Tag("exact")
    @Test
    void given_a_meson_and_a_baryon_then_only_the_meson_is_folded() {
        Observable pion = new Observable.TwoPoint("pion");
        int[] one = {0};
        HandMade source = new HandMade(EXTENT);
        for (long trajectory = 1; trajectory <= 2; trajectory++) {
            source.with(pion, trajectory, one, 16, 8, 4, 2, 1, 3, 6, 10).with(NUCLEON, trajectory, one, 16, 8, 4, 2, 1, 3, 6, 10);
        }
        CorrelatorPlan plan = new CorrelatorPlan(List.of("pion", "nucleon"), Set.of("pion"), List.of(), Map.of());
        Correlators correlators = correlators(source, plan, ALL);
        assertEquals(5, correlators.twoPointLength());
        // (8 + 10)/2, (4 + 6)/2, (2 + 3)/2; t = 0 and the middle have no partner
        assertArrayEquals(new double[] {16, 9, 5, 2.5, 1}, correlators.twoPoint("pion").centralRow(), ROUNDING);
        assertArrayEquals(new double[] {16, 8, 4, 2, 1}, correlators.twoPoint("nucleon").centralRow(), ROUNDING);
    }

    @Tag("exact")
    @Test
    void given_an_excluded_configuration_then_its_numbers_are_never_looked_at() {
        double[] poison = new double[2 * EXTENT];
        java.util.Arrays.fill(poison, Double.NaN);
        HandMade source = twoConfigurations().with(NUCLEON, 3, SOURCES, poison).with(DENSITY, 3, java.util.Arrays.copyOf(poison, EXTENT));
        CorrelatorPlan plan = products(2);
        Selection selection = selection(source, plan, List.of(new Study.Exclusion("a", 3, 3)));
        Correlators correlators = Correlators.of(Reduction.read(source, selection, plan, ALL), plan, Resampling.jackknife("toy", selection.blocks(1)));
        assertArrayEquals(new double[] {-0.75, -4.25, -0.75}, correlators.threePoint("nucleon", DENSITY, 2).centralRow(), ROUNDING);
    }

    @Tag("exact")
    @Test
    void given_points_side_by_side_then_they_are_those_of_the_single_correlators() {
        Correlators correlators = correlators(twoConfigurations(), products(2, 3), ALL);
        SampledVector joint = correlators.joint("nucleon", new int[] {3, 2}, List.of(DENSITY, DENSITY), new int[] {2, 3}, new int[] {1, 0});
        assertArrayEquals(new double[] {correlators.twoPoint("nucleon").central(3), correlators.twoPoint("nucleon").central(2),
            correlators.threePoint("nucleon", DENSITY, 2).central(1), correlators.threePoint("nucleon", DENSITY, 3).central(0)}, joint.centralRow());
    }

    /** Six configurations of two sources: two-point functions about 10, densities about {@code vacuum}, both times a power of two. */
    private static HandMade drawn(double twoPointScale, double densityScale, double vacuum, boolean backwards) {
        HandMade source = new HandMade(EXTENT);
        for (int i = 0; i < 6; i++) {
            long trajectory = backwards ? 6 - i : i + 1;
            SplittableRandom random = new SplittableRandom(1000 + trajectory);
            source.with(NUCLEON, trajectory, SOURCES, random.doubles(2 * EXTENT).map(x -> twoPointScale * (10 + x)).toArray());
            source.with(DENSITY, trajectory, random.doubles(EXTENT).map(x -> densityScale * (vacuum + x)).toArray());
        }
        return source;
    }

    private static SampledVector drawnThreePoint(double twoPointScale, double densityScale, double vacuum) {
        return correlators(drawn(twoPointScale, densityScale, vacuum, false), products(3), ALL).threePoint("nucleon", DENSITY, 3);
    }

    private static void assertRows(SampledVector expected, double factor, SampledVector actual, double tolerance) {
        assertArrayEquals(expected.map(expected.length(), (in, out) -> scale(in, factor, out)).centralRow(), actual.centralRow(), tolerance);
        for (int k = 0; k < expected.sampleCount(); k++) {
            double[] scaled = new double[expected.length()];
            scale(expected.sampleRow(k), factor, scaled);
            assertArrayEquals(scaled, actual.sampleRow(k), tolerance);
        }
    }

    private static void scale(double[] in, double factor, double[] out) {
        for (int i = 0; i < out.length; i++) {
            out[i] = factor * in[i];
        }
    }

    /** A constant 1000 in the density meets C2 of about 10 in two terms of 1e4 that cancel: some tens of roundings of 1e4. */
    @Tag("law")
    @Test
    void given_a_constant_added_to_the_density_then_nothing_changes_beyond_rounding() {
        assertRows(drawnThreePoint(1, 1, 0), 1, drawnThreePoint(1, 1, 1000), 50 * 0x1p-52 * 1e4);
    }

    @Tag("law")
    @Test
    void given_two_point_function_and_density_scaled_by_powers_of_two_then_the_three_point_function_scales_exactly() {
        assertRows(drawnThreePoint(1, 1, 1), 32, drawnThreePoint(4, 8, 1), 0);
    }

    @Tag("law")
    @Test
    void given_configurations_in_another_order_on_disk_then_not_a_bit_changes() {
        assertRows(drawnThreePoint(1, 1, 1), 1, correlators(drawn(1, 1, 1, true), products(3), ALL).threePoint("nucleon", DENSITY, 3), 0);
    }

    @Tag("law")
    @Test
    void given_tau_and_its_mirror_then_both_hold_the_same_number() {
        SampledVector c3 = drawnThreePoint(1, 1, 1);
        assertEquals(c3.central(0), c3.central(3));
        assertEquals(c3.central(1), c3.central(2));
        assertTrue(c3.central(0) != c3.central(1));
    }

    /**
     * With one source and independent configurations the corrected difference is the covariance with N - 1 in its denominator,
     * written here from its definition with deviations: an independent route, good to some tens of roundings of C2 X = 1e2.
     */
    @Tag("law")
    @Test
    void given_blocks_of_one_configuration_then_the_corrected_difference_is_the_unbiased_covariance() {
        int t = 3;
        HandMade source = drawn(1, 1, 1, false);
        CorrelatorPlan plan = products(t);
        SampledVector c3 = correlators(source, plan, 1).threePoint("nucleon", DENSITY, t);
        double[][] x = new double[t + 1][6];
        double[] c2 = new double[6];
        source.read(o -> true, c -> true, (observable, c, times, values) -> {
            int i = (int) c.trajectory() - 1;
            if (observable.hasSources()) {
                c2[i] = values[EXTENT + t];       // the source at t0 = 0 is the second on disk
            } else {
                for (int tau = 0; tau <= t; tau++) {
                    x[tau][i] = values[tau];
                }
            }
        });
        for (int tau = 0; tau <= t; tau++) {
            assertEquals(0.5 * (covariance(c2, x[tau]) + covariance(c2, x[t - tau])), c3.central(tau), 50 * 0x1p-52 * 1e2);
        }
    }

    private static double covariance(double[] a, double[] b) {
        double meanA = 0;
        double meanB = 0;
        for (int i = 0; i < a.length; i++) {
            meanA += a[i] / a.length;
            meanB += b[i] / b.length;
        }
        double sum = 0;
        for (int i = 0; i < a.length; i++) {
            sum += (a[i] - meanA) * (b[i] - meanB);
        }
        return sum / (a.length - 1);
    }

    /** The bootstrap takes the same correction, from delete-one-block means: same centre, other samples. */
    @Tag("law")
    @Test
    void given_bootstrap_in_place_of_jackknife_then_the_central_row_is_the_same() {
        HandMade source = drawn(1, 1, 1, false);
        CorrelatorPlan plan = products(3);
        Selection selection = selection(source, plan, List.of());
        SampledVector bootstrap = Correlators.of(reduction(source, plan, ALL), plan, Resampling.bootstrap("toy", selection.blocks(1), 5, 20))
            .threePoint("nucleon", DENSITY, 3);
        assertEquals(20, bootstrap.sampleCount());
        assertArrayEquals(drawnThreePoint(1, 1, 1).centralRow(), bootstrap.centralRow(), 50 * 0x1p-52 * 1e2);
    }

    @Tag("message")
    @Test
    void given_a_separation_that_was_not_planned_then_the_message_names_it() {
        Correlators correlators = correlators(twoConfigurations(), products(2), ALL);
        IllegalArgumentException e = assertThrows(IllegalArgumentException.class, () -> correlators.threePoint("nucleon", DENSITY, 3));
        assertTrue(e.getMessage().contains("separation=3") && e.getMessage().contains("was not planned"), e.getMessage());
    }

    @Tag("message")
    @Test
    void given_a_product_with_a_correlator_then_the_plan_refuses_it() {
        IllegalArgumentException e = assertThrows(IllegalArgumentException.class, () -> new CorrelatorPlan(List.of("nucleon"), Set.of(), List.of(),
            Map.of("nucleon", Map.of(CONNECTED, new TreeSet<>(Set.of(2))))));
        assertTrue(e.getMessage().contains("nucleon.connected.light.t2 is no loop or density"), e.getMessage());
    }
}
