package tracewright.results;

import static java.util.Objects.requireNonNull;

import java.io.IOException;
import java.io.InputStream;
import java.io.OutputStream;
import java.nio.file.Files;
import java.nio.file.Path;
import java.security.MessageDigest;
import java.security.NoSuchAlgorithmException;
import java.time.Instant;
import java.util.ArrayList;
import java.util.Comparator;
import java.util.HexFormat;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;

/**
 * Where results came from, for {@code provenance.json}: enough to repeat the run and to see what changed. This is the one output
 * that holds times, so it differs from run to run; they are given by the caller.
 *
 * @param study     text of the study as it was used, with every default and override filled in
 * @param overrides {@code key=value} as given on the command line, in that order
 * @param inputs    every file that was read; written in the order of their paths
 * @param cuts      by ensemble: configurations removed by each cut, in the order of application
 */
public record Provenance(
    String study, List<String> overrides, List<InputFile> inputs, Map<String, Map<String, Integer>> cuts, Instant start, Instant end) {

    /** Name of the file's contract. */
    public static final String SCHEMA = "tracewright-provenance/1";

    public Provenance {
        requireNonNull(study, "study");
        overrides = List.copyOf(overrides);
        inputs = List.copyOf(inputs);
        requireNonNull(cuts, "cuts");
        if (end.isBefore(start)) {
            throw new IllegalArgumentException("the run ends at " + end + ", before its start at " + start);
        }
    }

    /**
     * One file that was read.
     *
     * @param path   as the study names it
     * @param bytes  size
     * @param sha256 digest of the content, 64 lower-case hexadecimal digits
     */
    public record InputFile(String path, long bytes, String sha256) {

        public InputFile {
            requireNonNull(path, "path");
            if (!sha256.matches("[0-9a-f]{64}") || bytes < 0) {
                throw new IllegalArgumentException(path + " has " + bytes + " bytes and digest '" + sha256 + "'; need a size and 64 hexadecimal digits");
            }
        }

        /** Reads the whole file once; the size is the number of bytes that entered the digest. */
        public static InputFile of(String path, Path file) throws IOException {
            MessageDigest digest = newDigest();
            byte[] buffer = new byte[1 << 16];
            long bytes = 0;
            try (InputStream in = Files.newInputStream(file)) {
                for (int n = in.read(buffer); n >= 0; n = in.read(buffer)) {
                    digest.update(buffer, 0, n);
                    bytes += n;
                }
            }
            return new InputFile(path, bytes, HexFormat.of().formatHex(digest.digest()));
        }

        private static MessageDigest newDigest() {
            try {
                return MessageDigest.getInstance("SHA-256");
            } catch (NoSuchAlgorithmException e) {
                throw new IllegalStateException("every Java platform has SHA-256", e);
            }
        }
    }

    /** Cuts of a run from its ensembles. */
    public static Map<String, Map<String, Integer>> cutsOf(Results results) {
        Map<String, Map<String, Integer>> cuts = new LinkedHashMap<>();
        results.ensembles().forEach(e -> cuts.put(e.name(), e.removed()));
        return cuts;
    }

    public void write(OutputStream out) throws IOException {
        JsonOut json = new JsonOut();
        json.object().text("schema", SCHEMA);
        json.object("generated_by").text("program", Program.NAME).text("version", Program.version());
        json.text("java", System.getProperty("java.vm.name") + " " + Runtime.version()).endObject();
        json.text("start", start.toString()).text("end", end.toString()).texts("overrides", overrides);
        json.object("cuts");
        cuts.forEach(json::wholeMap);
        json.endObject().array("inputs");
        List<InputFile> sorted = new ArrayList<>(inputs);
        sorted.sort(Comparator.comparing(InputFile::path));
        for (InputFile f : sorted) {
            json.object().text("path", f.path()).whole("bytes", f.bytes()).text("sha256", f.sha256()).endObject();
        }
        json.endArray().text("study", study).endObject();
        out.write(json.finish());
    }
}
