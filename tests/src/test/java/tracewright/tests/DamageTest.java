package tracewright.tests;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import io.jhdf.HdfFile;
import io.jhdf.api.Dataset;
import java.io.IOException;
import java.io.RandomAccessFile;
import java.nio.ByteBuffer;
import java.nio.ByteOrder;
import java.nio.charset.StandardCharsets;
import java.nio.file.FileVisitResult;
import java.nio.file.Files;
import java.nio.file.Path;
import java.nio.file.SimpleFileVisitor;
import java.nio.file.attribute.BasicFileAttributes;
import java.util.List;
import java.util.logging.Level;
import java.util.logging.Logger;
import java.util.stream.Stream;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;

/**
 * Damaged input, one kind per test: each leads to a message that says what, where and what to do, to the right exit status, and
 * to no output at all. Tag: message.
 */
@DisplayNameGeneration(ReplaceUnderscores.class)
class DamageTest {

    /** Held so that its level stays: the HDF5 library tells about every group it opens. */
    private static final Logger HDF5_LOG = Logger.getLogger("io.jhdf");

    static {
        HDF5_LOG.setLevel(Level.SEVERE);
    }

    @TempDir
    Path folder;

    private Path study;

    @BeforeEach
    void copy_of_the_sample() throws IOException {
        copy(Program.ROOT.resolve("configs"), folder.resolve("configs"));
        copy(Program.ROOT.resolve("sample-data"), folder.resolve("sample-data"));
        study = folder.resolve("configs/sample.yaml");
    }

    private static void copy(Path from, Path to) throws IOException {
        Files.walkFileTree(from, new SimpleFileVisitor<>() {
            @Override
            public FileVisitResult preVisitDirectory(Path dir, BasicFileAttributes a) throws IOException {
                Files.createDirectories(to.resolve(from.relativize(dir)));
                return FileVisitResult.CONTINUE;
            }

            @Override
            public FileVisitResult visitFile(Path file, BasicFileAttributes a) throws IOException {
                Files.copy(file, to.resolve(from.relativize(file)));
                return FileVisitResult.CONTINUE;
            }
        });
    }

    private void refused(int status, String... words) throws Exception {
        Path work = Files.createDirectory(folder.resolve("work"));
        Program.Ended ended = Program.run(work, "run", study.toString(), "--out", "out", "--threads", "2");
        assertEquals(status, ended.status(), ended.err());
        for (String word : words) {
            assertTrue(ended.err().contains(word), "'" + word + "' in\n" + ended.err());
        }
        assertTrue(ended.err().contains("  where: ") && ended.err().contains("  do:    "), ended.err());
        assertFalse(ended.err().contains("\tat "), "a stack trace is no message:\n" + ended.err());
        assertFalse(Files.exists(work.resolve("out")), "an output folder is left behind");
        try (Stream<Path> left = Files.list(work)) {
            List<String> visible = left.map(p -> p.getFileName().toString()).filter(n -> !n.equals(".out.lock")).toList();
            assertEquals(List.of(), visible);
        }
    }

    private void edit(String file, String from, String to) throws IOException {
        Path path = folder.resolve(file);
        String text = Files.readString(path, StandardCharsets.UTF_8);
        assertTrue(text.contains(from), from + " in " + file);
        Files.writeString(path, text.replaceFirst(java.util.regex.Pattern.quote(from), java.util.regex.Matcher.quoteReplacement(to)), StandardCharsets.UTF_8);
    }

    @Test
    void given_a_truncated_hdf5_file_when_run_then_it_is_called_broken_with_status_3() throws Exception {
        Path file = folder.resolve("sample-data/alder/alder.h5");
        try (RandomAccessFile f = new RandomAccessFile(file.toFile(), "rw")) {
            f.setLength(f.length() / 2);
        }
        refused(3, "alder.h5", "truncated");
    }

    @Test
    void given_a_missing_configuration_file_when_run_then_it_is_named_with_status_3() throws Exception {
        Files.delete(folder.resolve("sample-data/cedar/1400.h5"));
        refused(3, "configuration main:1400 of ensemble cedar is missing", "cuts.exclude");
    }

    @Test
    void given_a_missing_configuration_that_is_excluded_when_run_then_the_run_succeeds() throws Exception {
        Files.delete(folder.resolve("sample-data/cedar/1400.h5"));
        Program.Ended ended = Program.run(folder, "run", study.toString(), "--out", "out", "--quiet", "--set", "ensembles.cedar.cuts.exclude=[\"main:1400\"]");
        assertEquals(0, ended.status(), ended.err());
    }

    @Test
    void given_a_nan_in_a_density_when_run_then_dataset_and_configuration_are_named_with_status_3() throws Exception {
        Path file = folder.resolve("sample-data/cedar/1200.h5");
        String path = "/gluon/" + firstChild(file, "/gluon");
        overwriteFirstNumber(file, path, Double.NaN);
        refused(3, "1200", "cedar", "not finite");
    }

    @Test
    void given_an_unknown_key_when_run_then_line_and_nearest_key_are_named_with_status_2() throws Exception {
        edit("configs/sample.yaml", "      thermalization: 220", "      thermalisation: 220");
        refused(2, "unknown key 'thermalisation'", "sample.yaml line ", "did you mean 'thermalization'?");
    }

    @Test
    void given_a_wrong_axis_order_when_run_then_lengths_found_and_expected_are_named_with_status_3() throws Exception {
        edit("configs/layouts/alder.yaml", "axes: [configuration, source, time]", "axes: [configuration, time, source]");
        refused(3, "alder", "48", "12");
    }

    @Test
    void given_too_few_blocks_for_the_covariance_when_run_then_blocks_and_way_out_are_named_with_status_4() throws Exception {
        edit("configs/sample.yaml", "      block: auto             # from", "      block: 100              # from");
        refused(4, "blocks", "alder", "fewer points");
    }

    @Test
    void given_a_chain_too_short_for_any_block_length_when_run_then_the_rule_that_fails_is_named_with_status_2() throws Exception {
        edit("configs/sample.yaml", "thermalization: 220", "thermalization: 1000");
        refused(2, "no block length suits ensemble alder");
    }

    @Test
    void given_a_damaged_csv_table_when_run_then_the_line_is_named_with_status_3() throws Exception {
        Path file = folder.resolve("sample-data/birch/slices.csv.gz");
        byte[] text;
        try (var in = new java.util.zip.GZIPInputStream(Files.newInputStream(file))) {
            text = in.readAllBytes();
        }
        String[] lines = new String(text, StandardCharsets.UTF_8).split("\n");
        lines[10] = lines[10].substring(0, lines[10].lastIndexOf(',') + 1) + "broken";
        try (var out = new java.util.zip.GZIPOutputStream(Files.newOutputStream(file))) {
            out.write(String.join("\n", lines).getBytes(StandardCharsets.UTF_8));
        }
        refused(3, "slices.csv.gz", "11", "broken");
    }

    @Test
    void given_a_second_run_into_the_same_folder_when_the_first_holds_it_then_it_is_told_who_with_status_2() throws Exception {
        Path work = Files.createDirectory(folder.resolve("work"));
        try (tracewright.results.OutputFolder held = tracewright.results.OutputFolder.open(work.resolve("out"))) {
            Program.Ended second = Program.run(work, "run", study.toString(), "--out", "out");
            assertEquals(2, second.status(), second.err());
            assertTrue(second.err().contains(Long.toString(ProcessHandle.current().pid())), second.err());
        }
    }

    private static String firstChild(Path file, String group) {
        try (HdfFile h = new HdfFile(file)) {
            return ((io.jhdf.api.Group) h.getByPath(group)).getChildren().keySet().iterator().next();
        }
    }

    /** Overwrites the first number of a contiguous dataset in place. */
    private static void overwriteFirstNumber(Path file, String path, double value) throws IOException {
        long address;
        int size;
        try (HdfFile h = new HdfFile(file)) {
            Dataset d = h.getDatasetByPath(path);
            address = ((io.jhdf.api.dataset.ContiguousDataset) d).getDataAddress();
            size = d.getDataType().getSize();
        }
        ByteBuffer bytes = ByteBuffer.allocate(size).order(ByteOrder.LITTLE_ENDIAN);
        if (size == 4) {
            bytes.putFloat((float) value);
        } else {
            bytes.putDouble(value);
        }
        try (RandomAccessFile f = new RandomAccessFile(file.toFile(), "rw")) {
            f.seek(address);
            f.write(bytes.array());
        }
    }
}
