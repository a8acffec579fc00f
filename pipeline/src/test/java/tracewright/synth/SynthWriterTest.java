package tracewright.synth;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import io.jhdf.HdfFile;
import java.io.ByteArrayInputStream;
import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.TreeSet;
import java.util.stream.Stream;
import java.util.zip.GZIPInputStream;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import tools.jackson.databind.JsonNode;
import tools.jackson.databind.json.JsonMapper;
import tracewright.study.InputException;
import tracewright.study.Layout;

/** Reads the written files with a general-purpose library or by hand and undoes each convention in plain sight. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class SynthWriterTest {

    private static final Truth TRUTH = InventedTheory.truth();
    private static final SyntheticEnsemble OAK = SyntheticEnsemble.generate(TRUTH, "oak");
    /** Half a unit in the last place of a float32, twice because a factor is rounded too. */
    private static final double FLOAT32 = 0x1p-23;
    /** Half a unit in the eighth digit. */
    private static final double EIGHT_DIGITS = 5e-8;

    @TempDir
    private Path folder;

    private static double[] memory(String id, long trajectory) {
        double[][] found = new double[1][];
        OAK.read(o -> o.id().equals(id), c -> c.trajectory() == trajectory, (o, c, s, v) -> found[0] = v);
        return found[0];
    }

    private static Map<String, byte[]> files(Layout layout, Truth.Width width) {
        return SynthWriter.files(OAK, layout, width, TRUTH.seed());
    }

    private static void assertClose(double expected, double found, double relative) {
        assertEquals(expected, found, relative * Math.abs(expected));
    }

    @Test
    void given_one_file_for_all_when_written_then_labels_compounds_and_conventions_lead_back_to_the_numbers() {
        try (HdfFile file = HdfFile.fromBytes(files(ToyLayouts.oneFile(), Truth.Width.FLOAT32).get("all.h5"))) {
            long[] trajectories = (long[]) file.getDatasetByPath("/labels/trajectory").getData();
            assertEquals(12, trajectories[1]);
            assertArrayEquals(new int[] {4, 8, 12, 0}, ((int[][]) file.getDatasetByPath("/labels/source_time").getData())[1]);
            float[][][] nucleon = (float[][][]) ((Map<?, ?>) file.getDatasetByPath("/two_point/nucleon").getData()).get("r");
            float[][][] insertion = (float[][][]) ((Map<?, ?>) file.getDatasetByPath("/three_point/t5").getData()).get("r");
            float[][] light = (float[][]) file.getDatasetByPath("/light").getData();
            float[][] flowed = (float[][]) file.getDatasetByPath("/density3").getData();
            double[] two = memory("nucleon.two-point", 12);
            double[] three = memory("nucleon.connected.light.t5", 12);
            for (int t = 0; t < 16; t++) {
                // Third source at 12: slices 12 + t, beyond the boundary of 16 from t = 4 on.
                assertClose(two[2 * 16 + t], (t < 4 ? 1 : -1) * nucleon[1][2][(12 + t) % 16], FLOAT32);
                assertClose(memory("loop.light", 12)[t], -2 * 1728.0 * light[t][1], FLOAT32);           // -Tr D^-1, two flavours, 12^3 sites
                assertClose(memory("action-density.flow3.0", 12)[t], 1728.0 / 9 * flowed[t][1], FLOAT32);   // t^2 = 9
            }
            for (int tau = 0; tau <= 5; tau++) {
                assertClose(three[6 + tau], insertion[1][1][8 + tau], FLOAT32);     // second source at 8, sink at 13, inside
            }
            assertEquals(0, insertion[1][1][14]);
        }
    }

    @Test
    void given_one_file_for_each_configuration_when_written_then_names_pairs_and_signs_lead_back_to_the_numbers() {
        Map<String, byte[]> files = files(ToyLayouts.manyFiles(), Truth.Width.FLOAT64);
        assertEquals(80, files.size());
        try (HdfFile file = HdfFile.fromBytes(files.get("run_a/12.h5"))) {
            double[][][] nucleon = (double[][][]) file.getDatasetByPath("/nucleon").getData();
            double[][][] insertion = (double[][][]) file.getDatasetByPath("/three/5").getData();
            double[] density = (double[]) file.getDatasetByPath("/density2").getData();
            assertArrayEquals(new int[] {4, 8}, (int[]) file.getDatasetByPath("/connected_times").getData());
            for (int t = 0; t < 16; t++) {
                assertEquals(memory("nucleon.two-point", 12)[3 * 16 + t], nucleon[3][t][0]);      // sign removed, float64: the same bits
                assertEquals(4 * memory("action-density.flow2.0", 12)[t], density[t]);
            }
            assertEquals(memory("nucleon.connected.light.t5", 12)[6 + 2], insertion[1][2][0]);
            assertTrue(Math.abs(nucleon[0][3][1]) < 0.1 * Math.abs(nucleon[0][3][0]), "imaginary parts are small noise");
        }
    }

    @Test
    void given_a_sink_beyond_the_boundary_when_written_with_its_sign_then_all_insertions_are_negative() {
        // Trajectory 16, fourth configuration: sources at (1 + 9) and (5 + 9) mod 16 = 10, 14; from 14 the sink of separation 5 is at 19.
        try (HdfFile file = HdfFile.fromBytes(files(ToyLayouts.manyFiles(), Truth.Width.FLOAT64).get("run_a/16.h5"))) {
            double[][][] insertion = (double[][][]) file.getDatasetByPath("/three/5").getData();
            assertEquals(memory("nucleon.connected.light.t5", 16)[0], insertion[0][0][0]);
            assertEquals(-memory("nucleon.connected.light.t5", 16)[6], insertion[1][0][0]);
        }
    }

    @Test
    void given_tables_when_written_then_rows_lead_back_to_the_numbers() throws IOException {
        Map<String, byte[]> files = files(ToyLayouts.tables(), Truth.Width.FLOAT32);
        assertEquals(new TreeSet<>(List.of("two.csv.gz", "three.csv", "slices.csv.gz")), new TreeSet<>(files.keySet()));
        List<String> two = unzipped(files.get("two.csv.gz"));
        assertEquals("stream,config,t0,t,hadron,re", two.get(0));
        assertEquals(1 + 80 * 2 * 4 * 16, two.size());
        // Second configuration, nucleon after pion, third source at 12, t = 7: beyond the boundary.
        String[] row = two.get(1 + 2 * 64 + 64 + 2 * 16 + 7).split(",");
        assertArrayEquals(new String[] {"a", "12", "12", "7", "nucleon"}, Arrays.copyOf(row, 5));
        assertClose(-memory("nucleon.two-point", 12)[2 * 16 + 7], Double.parseDouble(row[5]), EIGHT_DIGITS);
        List<String> slices = unzipped(files.get("slices.csv.gz"));
        assertEquals("stream,config,t,light,strange,density1,density2,density3", slices.get(0));
        String[] slice = slices.get(1 + 16 + 3).split(",");
        assertEquals(memory("loop.strange", 12)[3], Double.parseDouble(slice[4]), 5e-5);      // hundreds in eight digits
        assertTrue(new String(files.get("three.csv"), StandardCharsets.UTF_8).startsWith("stream,config,t0,t,separation,re\na,10,1,0,3,"));
    }

    private static List<String> unzipped(byte[] bytes) throws IOException {
        try (GZIPInputStream in = new GZIPInputStream(new ByteArrayInputStream(bytes))) {
            return new String(in.readAllBytes(), StandardCharsets.UTF_8).lines().toList();
        }
    }

    private static String refusal(Layout layout) {
        InputException refusal = assertThrows(InputException.class, () -> files(layout, Truth.Width.FLOAT32));
        assertEquals(InputException.Cause.USAGE, refusal.reason());
        return refusal.problems().get(0).what();
    }

    @Test
    void given_a_layout_without_a_place_for_something_measured_when_written_then_it_is_named() {
        Layout full = ToyLayouts.tables();
        Layout poor = new Layout(full.schema(), full.about(), 16, 12, full.files(), full.datasets().subList(1, full.datasets().size()));
        String message = refusal(poor);
        assertEquals("the layout of oak has no place for pion.two-point", message);
    }

    @Test
    void given_fixed_source_times_that_differ_from_the_truths_when_written_then_both_are_named() {
        Layout full = ToyLayouts.manyFiles();
        Layout.Dataset.TwoPoint first = (Layout.Dataset.TwoPoint) full.datasets().get(0);
        List<Layout.Dataset> datasets = new ArrayList<>(full.datasets());
        datasets.set(0, new Layout.Dataset.TwoPoint(first.hadron(), first.stored(), new Layout.SourceTimes.Fixed(List.of(1, 5, 9, 13)), first.time(),
            first.boundary(), first.boundarySign()));
        Layout fixed = new Layout(full.schema(), full.about(), 16, 12, full.files(), datasets);
        String message = refusal(fixed);
        assertEquals("pion.two-point: the layout lists source times [1, 5, 9, 13], the truth has [4, 8, 12, 0] on a:12", message);
    }

    @Test
    void given_a_truth_when_everything_is_written_then_exact_values_stand_beside_the_data_and_a_second_run_changes_nothing() throws IOException {
        Synth.write(TRUTH, Map.of("oak", ToyLayouts.oneFile()), folder);
        JsonNode truth = new JsonMapper().readTree(Files.readString(folder.resolve("oak/truth.json"))).get("quantities");
        // 1000 (0.89 + 1.9 x 0.09 + 1.5 x 0.113^2), by hand.
        assertEquals(1080.1535, truth.get("oak.nucleon.mass").get("value").doubleValue(), 1e-9);
        assertEquals("MeV", truth.get("oak.nucleon.mass").get("unit").stringValue());
        assertEquals(300, truth.get("oak.pion.mass").get("value").doubleValue(), 1e-9);
        JsonNode all = new JsonMapper().readTree(Files.readString(folder.resolve("truth.json"))).get("quantities");
        assertEquals(34.6275, all.get("physical.nucleon.sigma.light").get("value").doubleValue(), 1e-9);     // 1900 x 0.135^2
        assertTrue(Files.readString(folder.resolve("README.md")).contains("| oak | nucleon | 1080.15 | 182.49 | 43.67 | 853.99 | 790.67 | 0.00 |"));
        String before = Files.readString(folder.resolve(OutputFolder.LIST));
        Synth.write(TRUTH, Map.of("oak", ToyLayouts.oneFile()), folder);
        assertEquals(before, Files.readString(folder.resolve(OutputFolder.LIST)));
        try (Stream<Path> present = Files.walk(folder)) {
            assertEquals(5, present.filter(Files::isRegularFile).count(), "all.h5, two truth.json, the page, the list");
        }
    }

    @Test
    void given_two_streams_when_written_into_one_table_then_each_row_says_its_stream() throws IOException {
        List<Truth.Stream> streams = List.of(new Truth.Stream("a", 1, 2, 1, Optional.empty()), new Truth.Stream("b", 1, 1, 1, Optional.empty()));
        Truth two = TRUTH.withEnsembles(List.of(InventedTheory.ensemble().withStreams(streams)));
        SyntheticEnsemble ensemble = SyntheticEnsemble.generate(two, "oak");
        List<String> rows = unzipped(SynthWriter.files(ensemble, ToyLayouts.tables(), Truth.Width.FLOAT32, 1).get("slices.csv.gz"));
        assertTrue(rows.get(1).startsWith("a,1,0,") && rows.get(17).startsWith("a,2,0,") && rows.get(33).startsWith("b,1,0,"), rows::toString);
    }
}
