package tracewright.results;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertNull;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;
import static org.junit.jupiter.api.Assumptions.assumeTrue;

import io.jhdf.HdfFile;
import io.jhdf.api.Group;
import java.io.IOException;
import java.nio.ByteBuffer;
import java.nio.ByteOrder;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Map;
import java.util.concurrent.TimeUnit;
import java.util.logging.Level;
import java.util.logging.Logger;
import org.junit.jupiter.api.AfterAll;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import tracewright.fitters.sampled.BlockLabel;
import tracewright.fitters.sampled.SampleGroup;
import tracewright.fitters.sampled.SampledNumber;

@DisplayNameGeneration(ReplaceUnderscores.class)
class SamplesHdf5Test {

    private static final Logger LIBRARY = Logger.getLogger("io.jhdf");
    private static final Level LEVEL = LIBRARY.getLevel();

    @TempDir
    Path temporary;

    @BeforeAll
    static void quiet() {
        LIBRARY.setLevel(Level.SEVERE);
    }

    @AfterAll
    static void loud() {
        LIBRARY.setLevel(LEVEL);
    }

    @Test
    void given_small_results_when_read_back_then_ids_and_central_values_stand_in_order() throws IOException {
        try (HdfFile hdf = new HdfFile(write("s.h5", SmallResults.complete()))) {
            assertArrayEquals(new String[] {"a09.nucleon.sigma.light.plateau", "a09.nucleon.anomaly", "a09.spacing",
                "a09.nucleon.budget.trace.anomaly", "a09.nucleon.budget.trace.anomaly.fraction",
                "a09.nucleon.budget.trace.sigma.light", "a09.nucleon.budget.trace.sigma.light.fraction",
                "a09.nucleon.budget.trace.total", "a09.nucleon.budget.trace.mass", "a09.nucleon.budget.trace.closure"},
                (String[]) hdf.getDatasetByPath("/quantities/id").getData());
            double[] central = doubles(hdf, "/quantities/central");
            assertEquals(60, central[0]);
            assertEquals(0.0904, central[2]);
            assertEquals(30, central[9]);
        }
    }

    @Test
    void given_small_results_when_read_back_then_each_group_holds_the_samples_of_its_numbers_bit_for_bit() throws IOException {
        try (HdfFile hdf = new HdfFile(write("s.h5", SmallResults.complete()))) {
            assertEquals("a09", attribute(hdf, "/groups/0000", "key"));
            assertEquals("jackknife", attribute(hdf, "/groups/0000", "kind"));
            assertEquals("choice:window", attribute(hdf, "/groups/0001", "key"));
            assertEquals("input:spacing_a09", attribute(hdf, "/groups/0002", "key"));
            int[] members = (int[]) hdf.getDatasetByPath("/groups/0000/quantity").getData();
            assertArrayEquals(new int[] {0, 1, 3, 4, 5, 6, 7, 8, 9}, members);      // all but the spacing
            double[][] samples = (double[][]) hdf.getDatasetByPath("/groups/0000/samples").getData();
            assertArrayEquals(SmallResults.light().samples("a09"), samples[0]);
            assertArrayEquals(SmallResults.anomaly().samples("a09"), samples[1]);
            assertArrayEquals(new String[] {"r0", "r0", "r0", "r0", "r0"}, (String[]) hdf.getDatasetByPath("/groups/0000/block_stream").getData());
            assertArrayEquals(new long[] {0, 1, 2, 3, 4}, (long[]) hdf.getDatasetByPath("/groups/0000/block_index").getData());
            assertArrayEquals(new int[] {2, 2, 2, 2, 2}, (int[]) hdf.getDatasetByPath("/groups/0000/block_size").getData());
            assertNull(((Group) hdf.getByPath("/groups/0001")).getChild("centre"), "the centre of a choice is the central value");
        }
    }

    @Test
    void given_the_file_alone_when_variances_are_formed_by_its_documented_formula_then_they_are_those_of_the_numbers() throws IOException {
        try (HdfFile hdf = new HdfFile(write("s.h5", SmallResults.complete()))) {
            double[] central = doubles(hdf, "/quantities/central");
            double[] variance = new double[central.length];
            for (String g : List.of("0000", "0001", "0002")) {
                addVariance(hdf, "/groups/" + g, central, variance);
            }
            // By hand in SmallResults: 1.6 for the light term, 1.6 + 9 + 4 for the anomaly, 40 for the mass. Rounding only.
            assertEquals(1.6, variance[0], 1e-12);
            assertEquals(14.6, variance[1], 1e-12);
            assertEquals(40, variance[8], 1e-11);
        }
    }

    @Test
    void given_small_results_when_read_back_then_the_covariance_is_symmetric_and_has_the_squared_errors_on_its_diagonal() throws IOException {
        try (HdfFile hdf = new HdfFile(write("s.h5", SmallResults.complete()))) {
            double[] error = doubles(hdf, "/quantities/error");
            double[][] c = (double[][]) hdf.getDatasetByPath("/covariance/covariance").getData();
            double[][] r = (double[][]) hdf.getDatasetByPath("/covariance/correlation").getData();
            for (int i = 0; i < c.length; i++) {
                assertEquals(error[i] * error[i], c[i][i], 1e-14 * c[i][i]);        // a root and two sums of three terms round
                assertEquals(1, r[i][i]);
                for (int j = 0; j < c.length; j++) {
                    assertEquals(c[i][j], c[j][i]);
                }
            }
            // The spacing of a09 is the input that the anomaly depends on: cov = 1/2 (3 * 0.0021 + 3 * 0.0021) = 0.0063.
            assertEquals(0.0063, c[1][2], 1e-13);
        }
    }

    @Test
    void given_numbers_that_kept_different_blocks_when_correlated_then_they_meet_label_by_label() {
        SampledNumber x = SmallResults.jackknifed(10, 1, -1, 2, 0, -2);
        SampleGroup fewer = SmallResults.blocks(0, 2, 3, 4);
        SampledNumber y = SampledNumber.of(10, fewer, new double[] {11, 12, 10, 7});
        double[] c = PublishedCovariance.matrix(List.of(x, y));
        // w = 4/5 and 3/4; common blocks 0, 2, 3, 4 with deviations (1, 2, 0, -2) and (1, 2, 0, -3); block 1 counts as zero in y.
        assertEquals(Math.sqrt(0.8 * 0.75) * (1 + 4 + 0 + 6), c[1] / widening(x) / widening(y), 1e-13);
    }

    @Test
    void given_any_two_numbers_when_correlated_then_the_matrix_holds_their_published_covariance() {
        List<SampledNumber> x = List.of(SmallResults.mass(), SmallResults.anomaly(), SmallResults.light(), SmallResults.ensemble().spacingFm());
        double[] c = PublishedCovariance.matrix(x);
        for (int i = 0; i < x.size(); i++) {
            for (int j = 0; j < x.size(); j++) {
                assertEquals(SampledNumber.publishedCovariance(x.get(i), x.get(j)), c[i * x.size() + j], 1e-14 * 56);    // rounding of the largest, 40 x 7/5
            }
        }
    }

    @Test
    void given_inputs_of_one_name_with_different_samples_when_correlated_then_it_is_refused() {
        SampledNumber x = SampledNumber.of(1, SampleGroup.input("z", 1), new double[] {2, 0});
        SampledNumber y = SampledNumber.of(1, SampleGroup.input("z", 2), new double[] {2, 0, 1, 1});
        String message = assertThrows(IllegalArgumentException.class, () -> PublishedCovariance.matrix(List.of(x, y))).getMessage();
        assertTrue(message.contains("input:z"), message);
    }

    @Test
    void given_a_bootstrap_when_read_back_then_its_shares_are_there() throws IOException {
        List<BlockLabel> labels = List.of(new BlockLabel("r0", 0), new BlockLabel("r0", 1));
        SampleGroup draws = SampleGroup.bootstrap("b12", labels, new int[] {1, 1}, 0.5, new double[] {1, 0, 0.5, 0.5, 0, 1});
        SampledNumber x = SampledNumber.of(5, draws, new double[] {4, 5, 6});
        Results r = SmallResults.of(List.of(SmallResults.quantity("b12.x", x)), List.of());
        try (HdfFile hdf = new HdfFile(write("b.h5", r))) {
            assertEquals("bootstrap", attribute(hdf, "/groups/0000", "kind"));
            assertArrayEquals(new double[][] {{1, 0}, {0.5, 0.5}, {0, 1}}, (double[][]) hdf.getDatasetByPath("/groups/0000/share").getData());
            double[] centre = doubles(hdf, "/groups/0000/centre");
            assertArrayEquals(new double[] {1.0 / 3, 1.0 / 3, 1.0 / 3}, centre);
        }
    }

    @Test
    void given_the_same_results_when_written_twice_then_the_bytes_are_equal_and_tell_nothing_of_the_machine() throws IOException {
        byte[] a = Files.readAllBytes(write("a.h5", SmallResults.complete()));
        byte[] b = Files.readAllBytes(write("b.h5", SmallResults.complete()));
        assertArrayEquals(a, b);
        String text = new String(a, StandardCharsets.ISO_8859_1);
        assertFalse(text.contains("jHDF") || text.contains(System.getProperty("os.arch")), "name of the library or of the machine");
        assertEquals(0, a.length - endAddress(a), "the superblock says where the file ends");
    }

    @Test
    void given_results_without_numbers_when_written_then_the_file_opens_and_has_empty_groups() throws IOException {
        Results r = new Results(new Results.StudySummary("empty", 0, "jackknife", Map.of()), List.of(), List.of(), List.of(), List.of(), List.of());
        try (HdfFile hdf = new HdfFile(write("e.h5", r))) {
            assertEquals(List.of("covariance", "groups", "quantities"), hdf.getChildren().keySet().stream().sorted().toList());
        }
    }

    @Test
    void given_a_sample_that_is_nan_when_written_then_id_and_group_are_named_and_no_file_is_made() {
        Results r = SmallResults.of(List.of(SmallResults.quantity("a09.bad", SmallResults.jackknifed(1, 0, Double.NaN, 0, 0, 0))), List.of());
        Path file = temporary.resolve("n.h5");
        String message = assertThrows(IllegalArgumentException.class, () -> SamplesHdf5.write(r, file)).getMessage();
        assertEquals("a09.bad: a sample of a09 is NaN; results hold finite numbers only", message);
        assertFalse(Files.exists(file));
    }

    @Test
    void given_a_plain_reader_of_another_language_when_it_opens_the_file_then_it_finds_the_same_covariance() throws Exception {
        Path python = Path.of("/usr/bin/python3");
        assumeTrue(Files.isExecutable(python), "not run: no /usr/bin/python3");
        assumeTrue(python(python, "import h5py, numpy").isEmpty(), "not run: /usr/bin/python3 has no h5py");
        Path file = write("p.h5", SmallResults.complete());
        // The documented formula from the file alone; 1e-12 of the largest entry is rounding.
        String script = String.join("\n",
            "import h5py, numpy as np, sys",
            "f = h5py.File(sys.argv[1], 'r')",
            "x = f['quantities/central'][:]",
            "cov = np.zeros((len(x), len(x)))",
            "for g in f['groups'].values():",
            "    q, s, w = g['quantity'][:], g['samples'][:], g['weight'][:]",
            "    c = x[q] + (s - x[q][:, None]) @ g['centre'][:] if 'centre' in g else x[q]",
            "    d = s - c[:, None]",
            "    d *= np.sqrt(w) * np.sqrt(g['factor'][:])[:, None]",
            "    cov[np.ix_(q, q)] += d @ d.T",
            "published = f['covariance/covariance'][:]",
            "assert np.abs(cov - published).max() < 1e-12 * np.abs(cov).max(), cov - published",
            "assert np.allclose(np.sqrt(np.diag(cov)), f['quantities/error'][:], rtol=1e-12, atol=1e-12)",
            "assert f['groups/0000/factor'][:].max() > 1.1, 'the numbers of this test are widened'",
            "assert list(f['covariance/id'].asstr()[:]) == list(f['quantities/id'].asstr()[:])",
            "assert f.attrs['schema'] in (b'tracewright-samples/1', 'tracewright-samples/1')",
            "assert f['groups/0000'].attrs['key'] in (b'a09', 'a09')");
        assertEquals("", python(python, script, file.toString()));
    }

    /** Output of a script on standard output and error, and its exit status if that is not 0; empty if all is well. */
    private static String python(Path python, String script, String... arguments) throws IOException, InterruptedException {
        List<String> command = new ArrayList<>(List.of(python.toString(), "-c", script));
        command.addAll(Arrays.asList(arguments));
        Process process = new ProcessBuilder(command).redirectErrorStream(true).start();
        String text = new String(process.getInputStream().readAllBytes(), StandardCharsets.UTF_8);
        assertTrue(process.waitFor(30, TimeUnit.SECONDS));
        return process.exitValue() == 0 ? text : text + "exit status " + process.exitValue();
    }

    private static void addVariance(HdfFile hdf, String path, double[] central, double[] variance) {
        int[] members = (int[]) hdf.getDatasetByPath(path + "/quantity").getData();
        double[][] samples = (double[][]) hdf.getDatasetByPath(path + "/samples").getData();
        double[] weight = doubles(hdf, path + "/weight");
        boolean sampled = ((Group) hdf.getByPath(path)).getChildren().containsKey("centre");
        double[] a = sampled ? doubles(hdf, path + "/centre") : new double[weight.length];
        for (int r = 0; r < members.length; r++) {
            double c = central[members[r]];
            for (int k = 0; k < weight.length; k++) {
                c += a[k] * (samples[r][k] - central[members[r]]);
            }
            for (int k = 0; k < weight.length; k++) {
                variance[members[r]] += weight[k] * (samples[r][k] - c) * (samples[r][k] - c);
            }
        }
    }

    private static double widening(SampledNumber x) {
        return Math.sqrt(Published.varianceByGroup(x).get("a09") / x.varianceByGroup().get("a09"));
    }

    private static long endAddress(byte[] file) {
        return ByteBuffer.wrap(file).order(ByteOrder.LITTLE_ENDIAN).getLong(28);
    }

    private static String attribute(HdfFile hdf, String path, String name) {
        return (String) hdf.getByPath(path).getAttribute(name).getData();
    }

    private static double[] doubles(HdfFile hdf, String path) {
        return (double[]) hdf.getDatasetByPath(path).getData();
    }

    private Path write(String name, Results results) throws IOException {
        Path file = temporary.resolve(name);
        SamplesHdf5.write(results, file);
        return file;
    }
}
