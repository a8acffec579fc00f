package tracewright.study;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static tracewright.study.Texts.assertSays;

import java.nio.file.Path;
import java.util.List;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;

@DisplayNameGeneration(ReplaceUnderscores.class)
@Tag("message")
class LayoutFileTest {

    private static final String SMALL = Texts.resource("small-layout.yaml");

    @TempDir
    Path folder;

    private Layout read(String text) {
        return LayoutFile.read(Texts.written(folder, "layout.yaml", text));
    }

    @ParameterizedTest
    @ValueSource(strings = {"alder", "birch", "cedar"})
    void given_a_shipped_layout_when_read_then_it_holds_sixteen_datasets_of_48_slices(String name) {
        Layout layout = LayoutFile.read(Path.of("..", "configs", "layouts", name + ".yaml"));
        // By hand: 3 two-point, 2 hadrons x 4 separations connected, 2 loops, 3 flow times.
        assertEquals(3 + 2 * 4 + 2 + 3, layout.datasets().size());
        assertEquals(48, layout.timeExtent());
    }

    @Test
    void given_a_small_layout_when_read_then_its_observables_are_known() {
        assertEquals(List.of("nucleon.two-point", "nucleon.connected.light.t6", "loop.strange", "action-density.flow1.0"),
            read(SMALL).datasets().stream().map(d -> d.observable().id()).toList());
    }

    @ParameterizedTest
    @CsvSource(delimiter = '|', value = {
        "kind: loop | kind: lop | 'lop' is no kind | did you mean 'loop'?",
        "format: hdf5 | format: hdf | 'hdf' is no format | did you mean 'hdf5'?",
        "boundary: antiperiodic # two | boundary: open | 'open' is not a value of boundary | valid: periodic, antiperiodic",
        "time_extent: 16 | time_extent: long | 'long' is not a whole number | mend",
        "spatial_extent: 8 | spatial_extent: 1 | a lattice of 1 sites in each spatial direction | give the lattice's extent",
        "flow_time: 1.0 | flow_time: 0.0 | flow time 0.0 is not positive | give t/a^2 > 0",
        "separation: 6 | separation: 16 | separation 16 does not fit 16 time slices | give 1 to 15",
        "counts: u+d | counts: one-flavor # lone | must be the sum u+d | counts: u+d",
        "counts: one-flavor | counts: u+d # two | a strange loop counts one flavour | write counts: one-flavor",
        "{files: main, dataset: /c2, | {files: mian, dataset: /c2, | there is no family of files 'mian' | did you mean 'main'?",
        "{files: main, dataset: /c2, | {files: main, | an HDF5 array needs dataset, axes and complex | add the ones",
        "axes: [configuration, source, time], complex: trailing | axes: [configuration, time], complex: trailing | nucleon.two-point needs a source axis | mend the axes",
        "axes: [configuration, time] | axes: [source, configuration, time] | has no source axis | mend the axes",
        "axes: [configuration, time] | axes: [time] | there must be a configuration axis | path template",
        "axes: [configuration, time] | axes: [configuration] | loop.strange needs a time axis | add time",
        "axes: [configuration, time] | axes: [configuration, time, time] | an axis stands twice | once",
        "about: invented | abuot: invented | unknown key 'abuot' | did you mean 'about'?",
        "schema: tracewright-layout/1 | schema: tracewright-study/1 | this program reads tracewright-layout/1 | write schema: tracewright-layout/1",
        "value: e1 | dataset: e1 | a CSV table needs the name of its value column | add value: column",
    })
    void given_one_damaged_value_when_read_then_one_problem_names_it_and_its_line(String old, String by, String what, String remedy) {
        String text = Texts.replaced(SMALL, old, by);
        List<Problem> problems = Texts.problems(() -> read(text));
        assertSays(problems, what, "layout.yaml line " + Texts.lineOf(text, by), remedy);
        assertEquals(1, problems.size(), problems::toString);
    }

    @ParameterizedTest
    @CsvSource({"'stream: s, ', stream", "'trajectory: n, ', trajectory"})
    void given_a_table_without_a_label_when_read_then_its_column_is_asked_for(String column, String word) {
        String text = Texts.replaced(SMALL, column, "");
        assertSays(Texts.problems(() -> read(text)), "the table has no column for " + word + ", which action-density.flow1.0 needs",
            "line " + Texts.lineOf(text, "columns:"), "add " + word);
    }

    @Test
    void given_labels_in_the_path_of_a_table_when_read_then_no_columns_are_asked_for() {
        String text = Texts.replaced(Texts.replaced(SMALL, "stream: s, trajectory: n, ", ""), "path: slices.csv", "path: \"{stream}/{trajectory}.csv\"");
        assertEquals(4, read(text).datasets().size());
    }

    @Test
    void given_the_same_dataset_twice_when_read_then_the_second_line_is_named() {
        String text = SMALL + "  - kind: action-density # again\n    flow_time: 1.0\n    stored: {files: slices, value: e2}\n    convention: E\n    volume: sum\n";
        assertSays(Texts.problems(() -> read(text)), "two datasets hold action-density.flow1.0", "line " + Texts.lineOf(text, "# again"), "remove one");
    }

    @Test
    void given_meanings_left_out_when_read_then_each_is_asked_for_since_none_has_a_default() {
        String text = Texts.replaced(Texts.replaced(SMALL, "    convention: trace-inverse\n", ""), "    boundary_sign: included # two\n", "");
        List<Problem> problems = Texts.problems(() -> read(text));
        assertSays(problems, "the key 'convention' is missing", "line " + Texts.lineOf(text, "kind: loop"), "trace-inverse");
        assertSays(problems, "the key 'boundary_sign' is missing", "line " + Texts.lineOf(text, "kind: two-point"), "boundary's sign");
        assertEquals(2, problems.size(), problems::toString);
    }
}
