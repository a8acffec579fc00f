package tracewright.readers;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import io.jhdf.HdfFile;
import io.jhdf.WritableHdfFile;
import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Map;
import java.util.Random;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import tracewright.study.InputException;
import tracewright.study.InputException.Cause;
import tracewright.study.Layout;
import tracewright.study.Layout.Axis;
import tracewright.study.Layout.ComplexForm;
import tracewright.study.Layout.Label;
import tracewright.study.Layout.SourceTimes;

/** Messages: each kind of damage is refused, and the text holds the words that a user needs to repair it. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class DamageTest {

    @TempDir
    Path folder;

    private static Layout layout(String file, Layout.Stored stored) {
        return Toy.layout(Toy.hdf5(file), Toy.proton(stored, Toy.LIST));
    }

    private static void refusedAtOpen(String file, String dataset, String... words) {
        Toy.refused(Cause.DATA, () -> Toy.open(layout(file, Toy.cst(dataset)), Toy.fixtures()), words);
    }

    /** Opens, reads and expects problems; returns the trajectories that were handed on all the same. */
    private static List<Long> refusedAtRead(Layout layout, Path folder, String... words) {
        EnsembleFiles files = Toy.open(layout, folder);
        List<Long> delivered = new ArrayList<>();
        Toy.refused(Cause.DATA, () -> files.read(o -> true, id -> true, (o, id, s, v) -> delivered.add(id.trajectory())), words);
        return delivered;
    }

    @ParameterizedTest
    @CsvSource(delimiter = '|', value = {
        "damaged.h5|never_written|never written", "damaged.h5|loop_a|links lead in a circle", "damaged.h5|outside|link into another file",
        "damaged.h5|not_finit|missing dataset not_finit;nearest is '/not_finite'", "damaged.h5|labels|labels is a group;nearest is '/labels",
        "damaged.h5|cycle/inner/self/inner/self/nothing|missing dataset", "forms.h5|text|StringData;write the dataset as float64", "forms.h5|compound32|complex = none;set complex = compound",
        "forms.h5|trailing|4 axes;set complex = trailing", "virtual.h5|float64|unsupported file", "left_open.h5|float64|left open by its writer"})
    void given_a_dataset_that_cannot_be_read_when_opened_then_the_reason_is_said(String file, String dataset, String words) {
        refusedAtOpen(file, dataset, words.split(";"));
    }

    @Test
    void given_a_filter_that_cannot_be_undone_when_opened_or_read_then_the_file_is_unsupported() {
        refusedAtRead(layout("unsupported.h5", Toy.cst("scaled")), Toy.fixtures(), "unsupported file", "scaleoffset", "dataset scaled");
        refusedAtRead(layout("unsupported.h5", Toy.cst("lzf_checksum")), Toy.fixtures(), "unsupported file", "dataset lzf_checksum");
    }

    @Test
    void given_chunks_never_written_with_fill_nan_when_read_then_they_are_missing_not_zero_and_the_rest_is_read() {
        List<Long> got = refusedAtRead(layout("damaged.h5", Toy.cst("half_written")), Toy.fixtures(), "never written", "half_written", "trajectory 50", "trajectory 60");
        assertEquals(List.of(10L, 20L, 30L, 40L), got);
    }

    @Test
    void given_one_source_never_written_in_a_compressed_array_when_read_then_those_configurations_are_missing() {
        List<Long> got = refusedAtRead(layout("damaged.h5", Toy.cst("part_written")), Toy.fixtures(), "never written", "trajectory 50", "trajectory 60");
        assertEquals(List.of(10L, 20L, 30L, 40L), got);
    }

    @Test
    void given_a_nan_when_read_then_ensemble_file_dataset_stream_trajectory_source_and_time_are_named() {
        // bad[2, 1, 5]: third configuration, source at 3, slice 5 of the file; slice 6 is infinite: two of 24 values
        List<Long> got = refusedAtRead(layout("damaged.h5", Toy.cst("not_finite")), Toy.fixtures(), "not finite (NaN)", "ensemble E1", "damaged.h5",
            "dataset not_finite", "stream a", "trajectory 30", "source 1 (t0 = 3)", "time 5 of the file", "2 of 24");
        assertEquals(List.of(10L, 20L, 40L, 50L, 60L), got);
    }

    @Test
    void given_a_configuration_with_a_nan_is_not_wanted_when_read_then_nothing_is_wrong() {
        List<Long> got = new ArrayList<>();
        Toy.open(layout("damaged.h5", Toy.cst("not_finite")), Toy.fixtures()).read(o -> true, id -> id.trajectory() != 30, (o, id, s, v) -> got.add(id.trajectory()));
        assertEquals(List.of(10L, 20L, 40L, 50L, 60L), got);
    }

    @Test
    void given_a_repeated_label_when_opened_then_both_positions_are_named() {
        Layout.Files files = new Layout.Files.Hdf5("damaged.h5", new Label.FromDataset("labels/doubled"), new Label.Constant("a"));
        Toy.refused(Cause.DATA, () -> Toy.open(Toy.layout(files, Toy.proton(Toy.cst("not_finite"), Toy.LIST)), Toy.fixtures()),
            "a:20 occurs twice", "entry 1", "entry 3");
    }

    @Test
    void given_a_label_that_is_no_whole_number_when_opened_then_it_is_named() {
        Layout.Files files = new Layout.Files.Hdf5("damaged.h5", new Label.FromDataset("labels/half"), new Label.Constant("a"));
        Toy.refused(Cause.DATA, () -> Toy.open(Toy.layout(files, Toy.proton(Toy.cst("not_finite"), Toy.LIST)), Toy.fixtures()), "'30.5'", "entry 2");
    }

    @Test
    void given_labels_that_were_never_written_when_opened_then_they_are_not_taken_for_numbers() {
        Layout.Files files = new Layout.Files.Hdf5("damaged.h5", new Label.FromDataset("labels/some"), new Label.Constant("a"));
        Toy.refused(Cause.DATA, () -> Toy.open(Toy.layout(files, Toy.proton(Toy.cst("not_finite"), Toy.LIST)), Toy.fixtures()),
            "labels was never written completely", "labels/some");
    }

    @Test
    void given_a_source_time_beyond_the_lattice_when_opened_then_value_and_entry_are_named() {
        Layout.Dataset proton = Toy.proton(Toy.cst("not_finite"), new SourceTimes.FromDataset("labels/doubled"));
        Toy.refused(Cause.DATA, () -> Toy.open(Toy.layout(Toy.hdf5("damaged.h5"), proton), Toy.fixtures()), "source time 10.0 (entry 0)", "0..7");
    }

    @Test
    void given_a_wrong_order_of_axes_when_opened_then_the_order_that_fits_is_said() {
        Layout.Stored wrong = Toy.array("time_config_source", ComplexForm.NONE, Axis.CONFIGURATION, Axis.SOURCE, Axis.TIME);
        Toy.refused(Cause.DATA, () -> Toy.open(layout("forms.h5", wrong), Toy.fixtures()), "8 x 6 x 3", "configuration axis has length 8, expected 6",
            "(time, configuration, source) would fit");
    }

    @Test
    void given_lengths_that_fit_in_no_order_when_opened_then_the_axis_and_both_lengths_are_said() {
        Layout layout = Toy.layout(Toy.hdf5("forms.h5"), Toy.proton(Toy.cst("float64"), new SourceTimes.Fixed(List.of(0, 4))));
        Toy.refused(Cause.DATA, () -> Toy.open(layout, Toy.fixtures()), "source axis has length 3, expected 2 (source times)", "no order of these axes fits");
    }

    @Test
    void given_many_problems_when_opened_then_one_exception_names_them_all() {
        Layout.Dataset pion = new Layout.Dataset.TwoPoint("pion", Toy.cst("nothing"), Toy.LIST, Layout.TimeOrigin.ABSOLUTE, Layout.Boundary.PERIODIC,
            Layout.BoundarySign.INCLUDED);
        Layout layout = Toy.layout(Toy.hdf5("damaged.h5"), Toy.proton(Toy.cst("outside"), Toy.LIST), pion);
        InputException e = Toy.refused(Cause.DATA, () -> Toy.open(layout, Toy.fixtures()), "link into another file", "missing dataset nothing");
        assertEquals(2, e.problems().size());
    }

    @ParameterizedTest
    @CsvSource({"0, it is empty", "4, no HDF5 signature", "600, truncated", "60000, truncated"})
    void given_a_file_cut_short_when_opened_then_it_is_broken(int length, String word) throws IOException {
        byte[] all = Files.readAllBytes(Toy.fixtures().resolve("forms.h5"));
        Files.write(folder.resolve("cut.h5"), Arrays.copyOf(all, length));
        Toy.refused(Cause.DATA, () -> Toy.open(layout("cut.h5", Toy.cst("float64")), folder), "broken file", word, "cut.h5");
    }

    @Test
    void given_garbage_when_opened_then_it_is_broken() throws IOException {
        byte[] garbage = new byte[5000];
        new Random(7).nextBytes(garbage);
        Files.write(folder.resolve("garbage.h5"), garbage);
        Toy.refused(Cause.DATA, () -> Toy.open(layout("garbage.h5", Toy.cst("float64")), folder), "broken file", "no HDF5 signature");
    }

    /** Law: whatever bytes are corrupt, the outcome is the reader's exception or numbers, never another exception. */
    @Test
    void given_corrupt_bytes_in_the_structure_when_opened_and_read_then_no_other_exception_escapes() throws IOException {
        byte[] good = Files.readAllBytes(Toy.fixtures().resolve("user_block.h5"));
        Random random = new Random(20260101);
        int refused = 0;
        for (int trial = 0; trial < 300; trial++) {
            byte[] bad = good.clone();
            for (int k = 0; k < 8; k++) {
                bad[1024 + random.nextInt(2000)] = (byte) random.nextInt(256);
            }
            Files.write(folder.resolve("corrupt.h5"), bad);
            try {
                Toy.open(layout("corrupt.h5", Toy.cst("chunked")), folder).read(o -> true, id -> true, (o, id, s, v) -> { });
            } catch (InputException e) {
                refused++;
            }
        }
        assertTrue(refused > 200, "only " + refused + " of 300 were refused");
    }

    @Test
    void given_files_of_single_configurations_when_one_is_missing_then_only_its_label_is() throws IOException {
        Layout layout = perConfiguration("c2");
        for (int c = 0; c < Toy.CONFIGURATIONS; c++) {
            if (c != 3) {
                write(folder.resolve("run_a_" + (10 * (c + 1)) + ".h5"), Map.of("c2", Toy.stored()[c]));
            }
        }
        Files.writeString(folder.resolve("run_a_x.h5"), "not a trajectory");
        EnsembleFiles files = Toy.open(layout, folder);
        assertEquals(List.of(10L, 20L, 30L, 50L, 60L), files.configurations(Toy.PROTON).stream().map(id -> id.trajectory()).toList());
        assertTrue(files.inWords().get(0).contains("1 other entries"), files.inWords().get(0));
        assertEquals(5, files.inputFiles().size());

        Files.delete(folder.resolve("run_a_20.h5"));
        Toy.refused(Cause.DATA, () -> files.read(o -> true, id -> true, (o, id, s, v) -> { }), "missing file", "run_a_20.h5");
    }

    @Test
    void given_one_file_lacks_a_dataset_when_opened_then_file_and_dataset_are_named() {
        write(folder.resolve("run_a_10.h5"), Map.of("c2", Toy.stored()[0]));
        write(folder.resolve("run_a_20.h5"), Map.of("c2_old", Toy.stored()[1]));
        Toy.refused(Cause.DATA, () -> Toy.open(perConfiguration("c2"), folder), "missing dataset c2", "run_a_20.h5", "nearest is '/c2_old'");
    }

    @Test
    void given_two_files_with_the_same_trajectory_when_opened_then_both_are_named() {
        write(folder.resolve("run_a_10.h5"), Map.of("c2", Toy.stored()[0]));
        write(folder.resolve("run_a_0010.h5"), Map.of("c2", Toy.stored()[0]));
        Toy.refused(Cause.DATA, () -> Toy.open(perConfiguration("c2"), folder), "a:10 occurs twice", "run_a_10.h5", "run_a_0010.h5");
    }

    @Test
    void given_a_record_of_zeros_when_read_then_it_was_never_filled() {
        double[][] zeros = Toy.stored()[0];
        Arrays.fill(zeros[1], 0);
        write(folder.resolve("run_a_10.h5"), Map.of("c2", zeros));
        refusedAtRead(perConfiguration("c2"), folder, "exactly zero", "source 1 (t0 = 3)", "trajectory 10");
    }

    @Test
    void given_no_file_or_no_folder_when_opened_then_the_template_and_the_nearest_name_are_said() throws IOException {
        Toy.refused(Cause.DATA, () -> Toy.open(perConfiguration("c2"), folder), "no file matches the path template", "run_{stream}_{trajectory}.h5");
        Files.writeString(folder.resolve("proton.h5"), "");
        Toy.refused(Cause.DATA, () -> Toy.open(layout("protn.h5", Toy.cst("c2")), folder), "missing file", "nearest is 'proton.h5'");
        Toy.refused(Cause.DATA, () -> Toy.open(layout("x.h5", Toy.cst("c2")), folder.resolve("nowhere")), "missing data folder", "nowhere");
    }

    @Test
    void given_a_layout_that_contradicts_itself_when_opened_then_it_is_a_usage_error_naming_the_layout() {
        Layout.Stored stray = new Layout.Stored("mian", Toy.cst("x").dataset(), Toy.cst("x").axes(), Toy.cst("x").complex(), java.util.Optional.empty(), Map.of());
        Layout.Dataset light = new Layout.Dataset.Connected("proton", tracewright.study.Flavor.LIGHT, Layout.Counts.ONE_FLAVOR, 9, Toy.cst("x"), Toy.LIST,
            Layout.TimeOrigin.SOURCE, Layout.Boundary.PERIODIC, Layout.BoundarySign.REMOVED);
        Layout layout = Toy.layout(Toy.hdf5("forms.h5"), Toy.proton(stray, new SourceTimes.Fixed(List.of(8))), light);
        Toy.refused(Cause.USAGE, () -> Toy.open(layout, Toy.fixtures()), "files 'mian' are not defined", "nearest is 'main'", "source times [8]", "must count u+d",
            "separation 9", Toy.LAYOUT_FILE.toString());
    }

    private static Layout perConfiguration(String dataset) {
        Layout.Files files = new Layout.Files.Hdf5("run_{stream}_{trajectory}.h5", new Label.FromPath("trajectory"), new Label.FromPath("stream"));
        return Toy.layout(files, Toy.proton(Toy.array(dataset, ComplexForm.NONE, Axis.SOURCE, Axis.TIME), Toy.LIST));
    }

    static void write(Path file, Map<String, Object> datasets) {
        try (WritableHdfFile h = HdfFile.write(file)) {
            datasets.forEach(h::putDataset);
        }
    }
}
