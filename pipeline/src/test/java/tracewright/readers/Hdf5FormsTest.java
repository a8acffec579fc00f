package tracewright.readers;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import tracewright.study.ConfigurationId;
import tracewright.study.Flavor;
import tracewright.study.InputException;
import tracewright.study.Layout;
import tracewright.study.Layout.Axis;
import tracewright.study.Layout.ComplexForm;
import tracewright.study.Layout.Label;
import tracewright.study.Layout.SourceTimes;

/** Exact: one array in every form that the C library writes (make_fixtures.py) comes out with the same bits. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class Hdf5FormsTest {

    private static final String CST = "CONFIGURATION SOURCE TIME";

    private static Layout layout(String file, String dataset, ComplexForm complex, String axes) {
        Axis[] order = List.of(axes.split(" ")).stream().map(Axis::valueOf).toArray(Axis[]::new);
        return Toy.layout(Toy.hdf5(file), Toy.proton(Toy.array(dataset, complex, order), Toy.LIST));
    }

    @ParameterizedTest
    @CsvSource({
        "float64, NONE, " + CST + ", false", "float64_big, NONE, " + CST + ", false", "float32, NONE, " + CST + ", true",
        "float32_big, NONE, " + CST + ", true", "compound_re_im, COMPOUND, " + CST + ", false", "compound_padded, COMPOUND, " + CST + ", false",
        "compound32, COMPOUND, " + CST + ", true", "trailing, TRAILING, " + CST + ", false", "trailing32_big, TRAILING, " + CST + ", true",
        "time_config_source, NONE, TIME CONFIGURATION SOURCE, false", "source_time_config, NONE, SOURCE TIME CONFIGURATION, false",
        "chunked, NONE, " + CST + ", false", "chunked_edges, NONE, " + CST + ", false", "chunked_big, NONE, " + CST + ", false",
        "chunked_checksum, NONE, " + CST + ", false",
        "chunked_raw, NONE, " + CST + ", false", "chunked_raw_shuffled, NONE, " + CST + ", false",
        "chunked_compound, COMPOUND, " + CST + ", false", "chunked_trailing, TRAILING, " + CST + ", false",
        "chunked_split_pairs, TRAILING, " + CST + ", false", "chunked_time_config_source, NONE, TIME CONFIGURATION SOURCE, false",
        "chunked_source_time_config, NONE, SOURCE TIME CONFIGURATION, false", "compact, NONE, " + CST + ", false",
        "soft, NONE, " + CST + ", false", "/inner/link, NONE, " + CST + ", false"})
    void given_any_form_of_array_when_read_then_the_bits_are_the_same_also_window_by_window(String dataset, ComplexForm complex, String axes, boolean single) {
        Layout layout = layout("forms.h5", dataset, complex, axes);
        Toy.assertToy(Toy.open(layout, Toy.fixtures()), single);
        // 0 bytes for one mapping: the path that files over 2 GB take
        Toy.assertToy(EnsembleFiles.open("E1", layout, Toy.LAYOUT_FILE, Toy.fixtures(), 0), single);
    }

    @ParameterizedTest
    @CsvSource({"float64, NONE", "chunked, NONE", "compound, COMPOUND"})
    void given_a_user_block_and_the_newest_file_format_when_read_then_the_bits_are_the_same(String dataset, ComplexForm complex) {
        Layout layout = layout("user_block.h5", dataset, complex, CST);
        Toy.assertToy(Toy.open(layout, Toy.fixtures()), false);
        Toy.assertToy(EnsembleFiles.open("E1", layout, Toy.LAYOUT_FILE, Toy.fixtures(), 0), false);
    }

    @Test
    void given_some_configurations_are_wanted_when_read_then_only_those_come() {
        for (String dataset : List.of("float64", "chunked_edges")) {
            EnsembleFiles files = Toy.open(layout("forms.h5", dataset, ComplexForm.NONE, CST), Toy.fixtures());
            List<Long> got = new ArrayList<>();
            files.read(o -> true, id -> id.trajectory() == 20 || id.trajectory() == 50, (o, id, sources, values) -> {
                got.add(id.trajectory());
                assertArrayEquals(Toy.T0, sources);
                assertArrayEquals(Toy.expected((int) id.trajectory() / 10 - 1), values, 0.0);
            });
            assertEquals(List.of(20L, 50L), got);
        }
    }

    @ParameterizedTest
    @CsvSource({"/labels/trajectory_big, /labels/stream, /labels/sources", "/labels/trajectory_chunked, /labels/stream, /labels/sources",
        "labels/trajectory_text, labels/stream_text, labels/sources", "/labels/trajectory, /labels/stream_text, /labels/sources_each"})
    void given_labels_and_source_times_in_datasets_when_read_then_they_are_those_of_the_file(String trajectory, String stream, String sources) {
        Layout.Files files = new Layout.Files.Hdf5("forms.h5", new Label.FromDataset(trajectory), new Label.FromDataset(stream));
        Layout layout = Toy.layout(files, Toy.proton(Toy.cst("float64"), new SourceTimes.FromDataset(sources)));
        Toy.assertToy(Toy.open(layout, Toy.fixtures()), false);
    }

    @Test
    void given_hits_on_the_last_axis_when_read_then_the_loop_is_their_mean_with_sign_and_volume() {
        Layout.Dataset loop = new Layout.Dataset.Loop(Flavor.CHARM, Layout.Counts.ONE_FLAVOR,
            Toy.array("hits", ComplexForm.NONE, Axis.CONFIGURATION, Axis.TIME, Axis.HIT), Layout.LoopConvention.TRACE_INVERSE, Layout.Volume.AVERAGE);
        EnsembleFiles files = Toy.open(Toy.layout(Toy.hdf5("forms.h5"), loop), Toy.fixtures());
        Toy.readAll(files, loop.observable()).forEach((id, values) -> {
            for (int t = 0; t < Toy.T; t++) {
                // hits c + 10 t + {0, 2, 4}: mean c + 10 t + 2; times -1 and 4^3 sites; whole numbers, no rounding
                assertEquals(-64.0 * (id.trajectory() / 10 - 1 + 10 * t + 2), values[t]);
            }
        });
        assertTrue(files.inWords().get(1).contains("averaged over 3 hits"), files.inWords().get(1));
    }

    /** Separation 3: sinks of the sources at 0, 3, 6 are slices 3, 6 and 9; only the last is beyond T = 8. */
    @Test
    void given_insertions_on_both_time_axes_when_read_then_they_agree_and_the_sign_of_the_sink_is_removed() {
        EnsembleFiles absolute = connected("float64", Layout.TimeOrigin.ABSOLUTE);
        EnsembleFiles relative = connected("connected", Layout.TimeOrigin.SOURCE);
        Map<ConfigurationId, double[]> all = Toy.readAll(relative, relative.observables().get(0));
        Toy.readAll(absolute, absolute.observables().get(0)).forEach((id, values) -> {
            assertArrayEquals(values, all.get(id), 0.0);
            int c = (int) id.trajectory() / 10 - 1;
            assertEquals(Toy.value(c, 1, 3), values[4 + 3]);
            assertEquals(-Toy.value(c, 2, 1), values[8 + 1]);
            // slice (6 + 2) mod 8 was stored with the sign of the two-point function: minus times minus
            assertEquals(Toy.value(c, 2, 2), values[8 + 2]);
        });
        assertEquals(Toy.CONFIGURATIONS, all.size());
    }

    @Test
    void given_a_long_list_of_sources_when_asked_in_words_then_only_its_ends_are_said() {
        List<Integer> times = java.util.Collections.nCopies(20, 5);
        SourceList list = SourceList.of(new SourceTimes.Fixed(times), 1, Toy.T, null);
        assertEquals("[5, 5, ..., 5] (20)", list.toString());
        assertEquals(20, list.count());
    }

    private static EnsembleFiles connected(String dataset, Layout.TimeOrigin time) {
        Layout.Dataset d = new Layout.Dataset.Connected("proton", Flavor.LIGHT, Layout.Counts.UP_PLUS_DOWN, 3, Toy.cst(dataset), Toy.LIST, time,
            Layout.Boundary.ANTIPERIODIC, Layout.BoundarySign.INCLUDED);
        return Toy.open(Toy.layout(Toy.hdf5("forms.h5"), d), Toy.fixtures());
    }

    @Test
    void given_a_relative_axis_of_T_slices_when_opened_then_the_length_separation_plus_1_is_asked_for() {
        Toy.refused(InputException.Cause.DATA, () -> connected("float64", Layout.TimeOrigin.SOURCE), "time axis has length 8, expected 4 (separation + 1)");
        Toy.refused(InputException.Cause.DATA, () -> connected("connected", Layout.TimeOrigin.ABSOLUTE), "time axis has length 4, expected 8 (time_extent)");
    }

    @Test
    void given_an_open_ensemble_when_asked_in_words_then_meaning_place_shape_and_conversion_are_said() {
        EnsembleFiles files = Toy.open(layout("forms.h5", "compound_padded", ComplexForm.COMPOUND, CST), Toy.fixtures());
        String words = String.join("\n", files.inWords());
        for (String word : List.of("proton", "antiperiodic", "sign still included", "compound_padded", "6 x 3 x 8", "float64 big-endian", "shifted to the source",
            "sign removed from slices with t0 + t >= 8", "6 configurations of stream a, trajectories 10 to 60", "forms.h5")) {
            assertTrue(words.contains(word), word + " missing in: " + words);
        }
        assertEquals(List.of(Path.of("forms.h5")), files.inputFiles().stream().map(Path::getFileName).toList());
    }
}
