package tracewright.readers;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.IOException;
import java.io.OutputStream;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.function.UnaryOperator;
import java.util.zip.GZIPOutputStream;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;
import tracewright.study.ConfigurationId;
import tracewright.study.Flavor;
import tracewright.study.InputException.Cause;
import tracewright.study.Layout;
import tracewright.study.Layout.Axis;
import tracewright.study.Layout.Column;
import tracewright.study.Layout.ComplexForm;
import tracewright.study.Layout.Counts;
import tracewright.study.Layout.Label;
import tracewright.study.Layout.LoopConvention;
import tracewright.study.Layout.SourceTimes;
import tracewright.study.Layout.Volume;
import tracewright.study.Observable;

/** Tables: the same bits as from HDF5, and every complaint with its line. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class CsvTest {

    private static final String HEADER = "stream,trajectory,t0,t,re,im";
    private static final Map<Column, String> COLUMNS = Map.of(Column.STREAM, "stream", Column.TRAJECTORY, "trajectory", Column.SOURCE_TIME, "t0", Column.TIME, "t");

    @TempDir
    Path folder;

    /** One line for each number of {@link Toy}, after the header line; configuration c begins on line 2 + 24 c. */
    private static List<String> toyLines() {
        List<String> lines = new ArrayList<>(List.of(HEADER));
        for (int c = 0; c < Toy.CONFIGURATIONS; c++) {
            for (int s = 0; s < Toy.T0.length; s++) {
                for (int t = 0; t < Toy.T; t++) {
                    lines.add("a," + 10 * (c + 1) + "," + Toy.T0[s] + "," + t + "," + Toy.stored()[c][s][t] + ",1e6");
                }
            }
        }
        return lines;
    }

    private static Layout toy(String path) {
        return Toy.layout(new Layout.Files.Csv(path, COLUMNS), Toy.proton(Toy.column("re", Map.of()), new SourceTimes.FromColumn()));
    }

    private void write(String name, List<String> lines, String end) throws IOException {
        byte[] bytes = (String.join(end, lines) + end).getBytes(StandardCharsets.UTF_8);
        try (OutputStream out = name.endsWith(".gz") ? new GZIPOutputStream(Files.newOutputStream(folder.resolve(name))) : Files.newOutputStream(folder.resolve(name))) {
            out.write(bytes);
        }
    }

    private EnsembleFiles openToy(UnaryOperator<List<String>> change) throws IOException {
        write("toy.csv", change.apply(toyLines()), "\n");
        return Toy.open(toy("toy.csv"), folder);
    }

    private void refused(UnaryOperator<List<String>> change, String... words) {
        Toy.refused(Cause.DATA, () -> {
            try {
                openToy(change);
            } catch (IOException e) {
                throw new IllegalStateException(e);
            }
        }, words);
    }

    private static UnaryOperator<List<String>> line(int number, UnaryOperator<String> change) {
        return lines -> {
            lines.set(number - 1, change.apply(lines.get(number - 1)));
            return lines;
        };
    }

    @ParameterizedTest
    @CsvSource({"toy.csv, unix", "toy.csv.gz, unix", "toy.csv, windows", "toy.csv.gz, windows"})
    void given_the_same_numbers_as_text_when_read_then_the_bits_are_those_of_the_arrays(String name, String system) throws IOException {
        write(name, toyLines(), system.equals("unix") ? "\n" : "\r\n");
        Toy.assertToy(Toy.open(toy(name), folder), false);
    }

    /** Law: per-configuration HDF5 files, one HDF5 file with compound float64, and a table give the same bits. */
    @Test
    void given_three_layouts_of_one_ensemble_when_read_then_all_records_are_equal_to_the_bit() throws IOException {
        write("toy.csv", toyLines(), "\n");
        for (int c = 0; c < Toy.CONFIGURATIONS; c++) {
            DamageTest.write(folder.resolve("n" + 10 * (c + 1) + ".h5"), Map.of("c2", Toy.stored()[c]));
        }
        Layout each = Toy.layout(new Layout.Files.Hdf5("n{trajectory}.h5", new Label.FromPath("trajectory"), new Label.Constant("a")),
            Toy.proton(Toy.array("c2", ComplexForm.NONE, Axis.SOURCE, Axis.TIME), Toy.LIST));
        Layout one = Toy.layout(Toy.hdf5("forms.h5"),
            Toy.proton(Toy.array("compound_padded", ComplexForm.COMPOUND, Axis.CONFIGURATION, Axis.SOURCE, Axis.TIME), Toy.LIST));
        Map<ConfigurationId, double[]> table = Toy.readAll(Toy.open(toy("toy.csv"), folder), Toy.PROTON);
        Map<ConfigurationId, double[]> files = Toy.readAll(Toy.open(each, folder), Toy.PROTON);
        Map<ConfigurationId, double[]> array = Toy.readAll(Toy.open(one, Toy.fixtures()), Toy.PROTON);
        assertEquals(table.keySet(), files.keySet());
        assertEquals(table.keySet(), array.keySet());
        table.forEach((id, values) -> {
            assertArrayEquals(values, files.get(id), 0.0);
            assertArrayEquals(values, array.get(id), 0.0);
        });
    }

    @ParameterizedTest
    @ValueSource(ints = {1, 60})
    void given_quotes_in_the_first_or_a_later_line_when_read_then_the_bits_are_the_same(int line) throws IOException {
        EnsembleFiles files = openToy(line(line, l -> '"' + l.replace(",", "\",\"") + '"'));
        Toy.assertToy(files, false);
    }

    @Test
    void given_blank_lines_spaces_and_a_byte_order_mark_when_read_then_they_do_not_matter() throws IOException {
        Toy.assertToy(openToy(lines -> {
            lines.replaceAll(l -> l.replace(",", " ,\t"));
            lines.set(0, "\uFEFF" + lines.get(0));
            lines.add(50, "");
            lines.add("  ");
            return lines;
        }), false);
    }

    @Test
    void given_sources_in_a_list_when_read_then_their_order_is_that_of_the_list() throws IOException {
        write("toy.csv", toyLines(), "\n");
        Layout layout = Toy.layout(new Layout.Files.Csv("toy.csv", COLUMNS),
            Toy.proton(Toy.column("re", Map.of()), new SourceTimes.Fixed(List.of(6, 0, 3))));
        double[] first = new double[24];
        Toy.open(layout, folder).read(o -> true, id -> id.trajectory() == 10, (o, id, sources, values) -> {
            assertArrayEquals(new int[] {6, 0, 3}, sources);
            System.arraycopy(values, 0, first, 0, 24);
        });
        assertEquals(Toy.value(0, 2, 0), first[0]);
        assertEquals(Toy.value(0, 1, 7), first[23]);
    }

    @Test
    void given_two_observables_with_hits_in_one_table_when_read_then_rows_are_sorted_by_where_and_hits_averaged() throws IOException {
        List<String> lines = new ArrayList<>(List.of("what,traj,hit,t,x"));
        for (int traj : new int[] {4, 8}) {
            for (int hit = 0; hit < 2; hit++) {
                for (int t = 0; t < Toy.T; t++) {
                    lines.add("strange," + traj + "," + hit + "," + t + "," + (traj + t + 2 * hit));
                    lines.add("light," + traj + "," + hit + "," + t + "," + 10 * (traj + t + 2 * hit));
                }
            }
        }
        write("loops_b.csv", lines, "\n");
        Layout.Files files = new Layout.Files.Csv("loops_{stream}.csv", Map.of(Column.TRAJECTORY, "traj", Column.HIT, "hit", Column.TIME, "t"));
        Layout layout = Toy.layout(files,
            new Layout.Dataset.Loop(Flavor.STRANGE, Counts.ONE_FLAVOR, Toy.column("x", Map.of("what", "strange")), LoopConvention.TRACE_INVERSE, Volume.SUM),
            new Layout.Dataset.Loop(Flavor.LIGHT, Counts.UP_PLUS_DOWN, Toy.column("x", Map.of("what", "light")), LoopConvention.OPERATOR, Volume.AVERAGE));
        EnsembleFiles ensemble = Toy.open(layout, folder);
        List<String> seen = new ArrayList<>();
        ensemble.read(o -> true, id -> true, (o, id, sources, values) -> {
            seen.add(o.id() + " " + id);
            assertEquals(0, sources.length);
            for (int t = 0; t < Toy.T; t++) {
                // mean over hits 0 and 2 is traj + t + 1; the sign of Tr D^-1, or 10 x 4^3 sites
                double mean = id.trajectory() + t + 1;
                assertEquals(o.equals(new Observable.Loop(Flavor.STRANGE)) ? -mean : 640 * mean, values[t]);
            }
        });
        assertEquals(List.of("loop.strange b:4", "loop.light b:4", "loop.strange b:8", "loop.light b:8"), seen);
    }

    @Test
    void given_a_missing_row_when_opened_then_the_configuration_and_the_labels_are_named() {
        // line 2 + 24 + 8 + 3: second configuration, source at 3, slice 3
        refused(lines -> {
            lines.remove(2 + 24 + 8 + 3 - 1);
            return lines;
        }, "missing rows: 1 of 24", "source time 3, time 3", "stream a", "trajectory 20", "toy.csv");
    }

    @Test
    void given_a_doubled_row_when_opened_then_both_lines_are_named() {
        refused(lines -> {
            lines.add(10, lines.get(4));
            return lines;
        }, "doubled row", "line 5", "line 11", "source time 0, time 3");
    }

    @Test
    void given_a_bad_number_when_read_then_its_line_and_text_are_named_and_the_rest_is_read() throws IOException {
        EnsembleFiles files = openToy(line(30, l -> l.replaceAll("[^,]*,1e6$", "0.1.2,1e6")));
        List<Long> got = new ArrayList<>();
        Toy.refused(Cause.DATA, () -> files.read(o -> true, id -> true, (o, id, s, v) -> got.add(id.trajectory())), "bad number '0.1.2'", "line 30", "column re");
        assertEquals(List.of(10L, 30L, 40L, 50L, 60L), got);
    }

    @Test
    void given_a_nan_when_read_then_it_is_not_finite() throws IOException {
        EnsembleFiles files = openToy(line(30, l -> l.replaceAll("[^,]*,1e6$", "NaN,1e6")));
        Toy.refused(Cause.DATA, () -> files.read(o -> true, id -> true, (o, id, s, v) -> { }), "not finite (NaN)", "trajectory 20", "source 0 (t0 = 0), time 4");
    }

    @Test
    void given_an_unknown_column_when_opened_then_the_nearest_is_named() throws IOException {
        write("toy.csv", toyLines(), "\n");
        Layout value = Toy.layout(new Layout.Files.Csv("toy.csv", COLUMNS), Toy.proton(Toy.column("real", Map.of()), new SourceTimes.FromColumn()));
        Toy.refused(Cause.DATA, () -> Toy.open(value, folder), "unknown column 'real'", "nearest is 're'");
        Layout filter = Toy.layout(new Layout.Files.Csv("toy.csv", COLUMNS), Toy.proton(Toy.column("re", Map.of("straem", "a")), new SourceTimes.FromColumn()));
        Toy.refused(Cause.DATA, () -> Toy.open(filter, folder), "unknown column 'straem'", "nearest is 'stream'");
        Layout none = Toy.layout(new Layout.Files.Csv("toy.csv", COLUMNS), Toy.proton(Toy.column("re", Map.of("stream", "z")), new SourceTimes.FromColumn()));
        Toy.refused(Cause.DATA, () -> Toy.open(none, folder), "no row of proton.two-point", "{stream=z}");
    }

    @Test
    void given_rows_of_a_configuration_apart_when_opened_then_both_lines_are_named() {
        refused(lines -> {
            lines.add(lines.remove(1));
            return lines;
        }, "a:10 do not stand together", "after line 2", "line 145");
    }

    @Test
    void given_a_short_row_or_a_time_beyond_the_lattice_or_no_number_when_opened_then_the_line_is_named() {
        refused(line(145, l -> "a,60,6"), "row has 3 fields, the header line has 6", "line 145", "missing rows: 1 of 24");
        refused(line(9, l -> "a,10,0,8,1,1"), "time 8 is not inside 0..7", "line 9");
        refused(line(9, l -> "a,10,0,x,1,1"), "time 'x' is no whole number", "line 9");
        refused(line(9, l -> "a,ten,0,7,1,1"), "'ten' is no trajectory number", "line 9");
    }

    @Test
    void given_an_empty_or_cut_or_false_gzip_table_when_opened_then_it_is_broken() throws IOException {
        refused(lines -> new ArrayList<>(List.of("")), "broken file", "it is empty");
        write("toy.csv.gz", toyLines(), "\n");
        byte[] all = Files.readAllBytes(folder.resolve("toy.csv.gz"));
        Files.write(folder.resolve("toy.csv.gz"), java.util.Arrays.copyOf(all, all.length / 2));
        Toy.refused(Cause.DATA, () -> Toy.open(toy("toy.csv.gz"), folder), "broken file", "toy.csv.gz");
        Files.writeString(folder.resolve("toy.csv.gz"), HEADER);
        Toy.refused(Cause.DATA, () -> Toy.open(toy("toy.csv.gz"), folder), "broken file", "GZIP");
    }

    @Test
    void given_lines_around_the_size_of_the_read_block_when_scanned_then_no_byte_is_lost() throws IOException {
        List<String> lines = toyLines();
        lines.set(0, lines.get(0) + ",comment");
        for (int k = 1; k < lines.size(); k++) {
            lines.set(k, lines.get(k) + "," + "x".repeat(k == 40 ? 700_000 : 5_000 + k));
        }
        write("toy.csv", lines, "\n");
        Toy.assertToy(Toy.open(toy("toy.csv"), folder), false);
        assertTrue(Files.size(folder.resolve("toy.csv")) > 4 << 18);
    }
}
