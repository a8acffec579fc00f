package tracewright.cuts;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Set;
import java.util.stream.IntStream;
import java.util.stream.Stream;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.api.Test;
import tracewright.fitters.resampling.Blocking;
import tracewright.fitters.sampled.BlockLabel;
import tracewright.study.ConfigurationId;
import tracewright.study.InputException;
import tracewright.study.Observable;

/** Stream a holds trajectories 0, 2 .. 38, stream b 0, 2 .. 18: thirty configurations. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class SelectionTest {

    private static final Observable NUCLEON = new Observable.TwoPoint("nucleon");
    private static final Observable DENSITY = new Observable.ActionDensity(1);
    private static final List<ConfigurationId> THIRTY = Stream.concat(Labelled.run("a", 0, 2, 20).stream(), Labelled.run("b", 0, 2, 10).stream()).toList();

    private static Selection select(Settings settings) {
        return select(Labelled.of(NUCLEON, THIRTY), settings);
    }

    private static Selection select(Labelled source, Settings settings) {
        return Selection.of(source, source.observables(), settings.ensemble());
    }

    private static void assertRemoved(String cut, int count, Selection selection) {
        selection.removed().forEach((name, n) -> assertEquals(name.equals(cut) ? count : 0, n, name));
        assertEquals(30 - count, selection.count());
    }

    private static List<String> survivors(Selection s) {
        return IntStream.range(0, s.onDisk().size()).filter(s::kept).mapToObj(i -> s.onDisk().get(i).toString()).toList();
    }

    private static List<ConfigurationId> without(List<ConfigurationId> ids, String... labels) {
        List<ConfigurationId> left = new ArrayList<>(ids);
        left.removeIf(c -> Set.of(labels).contains(c.toString()));
        return left;
    }

    @Tag("exact")
    @Test
    void given_no_cut_then_every_configuration_is_kept_in_monte_carlo_order() {
        List<ConfigurationId> shuffled = new ArrayList<>(THIRTY);
        java.util.Collections.reverse(shuffled);
        Selection s = select(Labelled.of(NUCLEON, shuffled), Settings.none());
        assertRemoved("", 0, s);
        assertEquals(THIRTY, s.onDisk());
        assertEquals(Map.of("a", 20, "b", 10), s.streams());
        assertEquals(List.of(), s.warnings());
    }

    @Tag("exact")
    @Test
    void given_a_thermalization_of_ten_then_trajectory_ten_is_the_first_kept_in_every_stream() {
        Selection s = select(Settings.none().thermalization(10));
        assertRemoved("thermalization", 10, s);
        assertEquals(Map.of("a", 15, "b", 5), s.streams());
        assertTrue(survivors(s).contains("a:10"));
    }

    @Tag("exact")
    @Test
    void given_a_range_then_both_ends_are_kept() {
        Selection s = select(Settings.none().range(4, 8));
        assertRemoved("ranges", 24, s);
        assertEquals(List.of("a:4", "a:6", "a:8", "b:4", "b:6", "b:8"), survivors(s));
    }

    @Tag("exact")
    @Test
    void given_a_stride_then_multiples_of_it_are_kept() {
        // a: 0, 8, 16, 24, 32; b: 0, 8, 16
        assertRemoved("stride", 22, select(Settings.none().stride(8)));
    }

    @Tag("exact")
    @Test
    void given_streams_then_the_others_go() {
        assertRemoved("streams", 20, select(Settings.none().streams("b")));
    }

    @Tag("exact")
    @Test
    void given_an_exclusion_then_it_acts_on_its_stream_alone() {
        Selection s = select(Settings.none().exclude("a", 4, 8));
        assertRemoved("exclude", 3, s);
        assertTrue(survivors(s).contains("b:6"));
    }

    @Tag("exact")
    @Test
    void given_several_cuts_then_each_configuration_counts_for_the_first_that_removes_it() {
        Selection s = select(Settings.none().streams("a").range(0, 31).thermalization(8).stride(4).exclude("a", 16, 20));
        // b: 10; a beyond 31: 32, 34, 36, 38; below 8: 0, 2, 4, 6; left 8, 10 .. 30, of which 10, 14, 18, 22, 26, 30 are no multiples
        // of 4; then 16 and 20. Left: 8, 12, 24, 28
        assertEquals(Map.of("streams", 10, "ranges", 4, "thermalization", 4, "stride", 6, "exclude", 2, "missing", 0), s.removed());
        assertEquals(List.of("streams", "ranges", "thermalization", "stride", "exclude", "missing"), List.copyOf(s.removed().keySet()));
        assertEquals(List.of("a:8", "a:12", "a:24", "a:28"), survivors(s));
    }

    @Tag("message")
    @Test
    void given_a_configuration_that_one_observable_lacks_then_the_message_says_which_and_how_to_go_on() {
        Labelled source = Labelled.of(NUCLEON, THIRTY).and(DENSITY, without(THIRTY, "a:6", "b:2"));
        InputException e = assertThrows(InputException.class, () -> select(source, Settings.none()));
        assertEquals(InputException.Cause.DATA, e.reason());
        assertEquals(2, e.problems().size());
        assertTrue(e.getMessage().contains("configuration a:6 of ensemble toy is missing for action-density.flow1.0"), e.getMessage());
        assertTrue(e.getMessage().contains("cuts.exclude: [b:2]"), e.getMessage());
    }

    @Tag("exact")
    @Test
    void given_missing_drop_then_it_goes_from_all_observables_with_a_warning() {
        Labelled source = Labelled.of(NUCLEON, THIRTY).and(DENSITY, without(THIRTY, "a:6", "b:2"));
        Selection s = select(source, Settings.none().drop());
        assertRemoved("missing", 2, s);
        assertEquals(List.of("toy: 2 configurations dropped because an observable lacks them (first: a:6 lacks action-density.flow1.0)"), s.warnings());
    }

    @Tag("exact")
    @Test
    void given_a_missing_configuration_that_a_cut_removes_anyway_then_it_is_no_error() {
        Labelled source = Labelled.of(NUCLEON, THIRTY).and(DENSITY, without(THIRTY, "a:6"));
        assertRemoved("exclude", 1, select(source, Settings.none().exclude("a", 6, 6)));
    }

    @Tag("message")
    @Test
    void given_an_expected_configuration_that_is_nowhere_then_it_is_missing_for_every_observable() {
        InputException e = assertThrows(InputException.class, () -> select(Labelled.of(NUCLEON, without(THIRTY, "a:6")), Settings.none().expect("a", 0, 38, 2)));
        assertEquals(InputException.Cause.DATA, e.reason());
        assertEquals(1, e.problems().size());
        assertTrue(e.getMessage().contains("a:6") && e.getMessage().contains("nucleon.two-point"), e.getMessage());
    }

    @Tag("exact")
    @Test
    void given_expectations_that_are_met_then_nothing_is_missing() {
        assertRemoved("", 0, select(Settings.none().expect("a", 0, 38, 2)));
    }

    @Tag("message")
    @Test
    void given_a_cut_on_an_unknown_stream_then_the_message_lists_the_known_ones() {
        for (Settings s : List.of(Settings.none().streams("a", "c"), Settings.none().exclude("c", 0, 4))) {
            InputException e = assertThrows(InputException.class, () -> select(s));
            assertEquals(InputException.Cause.USAGE, e.reason());
            assertTrue(e.getMessage().contains("name the streams [c], which are not on disk; there are [a, b]"), e.getMessage());
        }
    }

    @Tag("message")
    @Test
    void given_cuts_that_leave_nothing_then_the_message_counts_by_cut() {
        InputException e = assertThrows(InputException.class, () -> select(Settings.none().thermalization(100)));
        assertEquals(InputException.Cause.USAGE, e.reason());
        assertTrue(e.getMessage().contains("leave none of its 30 configurations") && e.getMessage().contains("thermalization=30"), e.getMessage());
    }

    @Tag("message")
    @Test
    void given_an_exclusion_that_matches_nothing_then_it_is_a_warning() {
        assertEquals(List.of("toy: the exclusion a:101..103 matches no configuration on disk"), select(Settings.none().exclude("a", 101, 103)).warnings());
    }

    /** The grid stands at trajectory zero, not at the first survivor: a cut takes blocks away or makes them lighter and renames none. */
    @Tag("law")
    @Test
    void given_two_cuts_of_one_ensemble_then_their_blocks_share_labels_and_boundaries() {
        Selection all = select(Settings.none());
        Selection late = select(Settings.none().thermalization(14));
        Blocking wide = all.blocks(10);
        Blocking narrow = late.blocks(10);
        // a: cells 0..3 of five configurations, b: 0 and 1; from 14 on cell 1 holds 14, 16, 18
        assertEquals(List.of(label("a", 0), label("a", 1), label("a", 2), label("a", 3), label("b", 0), label("b", 1)), wide.labels());
        assertEquals(List.of(label("a", 1), label("a", 2), label("a", 3), label("b", 1)), narrow.labels());
        assertEquals(List.of(3, 5, 5, 3), IntStream.of(narrow.sizes()).boxed().toList());
        for (int i = 0; i < THIRTY.size(); i++) {
            if (late.kept(i)) {
                assertEquals(wide.labels().get(wide.blockOf(i)), narrow.labels().get(narrow.blockOf(i)));
            }
        }
    }

    private static BlockLabel label(String stream, long index) {
        return new BlockLabel(stream, index);
    }

    @Tag("exact")
    @Test
    void given_configurations_two_trajectories_apart_then_that_is_the_spacing() {
        assertEquals(2, select(Settings.none()).spacing());
    }

    /** Four trajectories apart after the cut, two on disk: the count of configurations kept goes with the distance kept. */
    @Tag("exact")
    @Test
    void given_a_stride_of_four_then_the_spacing_is_that_of_the_survivors() {
        assertEquals(4, select(Settings.none().stride(4)).spacing());
    }
}
