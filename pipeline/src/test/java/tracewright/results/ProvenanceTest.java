package tracewright.results;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.Instant;
import java.util.List;
import java.util.Map;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import tools.jackson.databind.JsonNode;
import tools.jackson.databind.json.JsonMapper;

@DisplayNameGeneration(ReplaceUnderscores.class)
class ProvenanceTest {

    private static final Instant START = Instant.parse("2026-01-02T03:04:05Z");

    @TempDir
    Path temporary;

    @Test
    void given_a_file_of_three_letters_when_described_then_its_digest_is_the_published_one() throws IOException {
        Path file = Files.writeString(temporary.resolve("abc"), "abc");
        // NIST FIPS 180-4 example: SHA-256 of "abc".
        assertEquals(new Provenance.InputFile("data/abc", 3, "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad"),
            Provenance.InputFile.of("data/abc", file));
    }

    @Test
    void given_a_run_when_written_then_times_overrides_cuts_study_and_sorted_inputs_are_there() throws IOException {
        String digest = "0".repeat(64);
        Provenance p = new Provenance("name: \"small\"\n", List.of("seed=8", "a=b"),
            List.of(new Provenance.InputFile("z", 1, digest), new Provenance.InputFile("a", 2, digest)),
            Provenance.cutsOf(SmallResults.complete()), START, START.plusSeconds(60));
        ByteArrayOutputStream out = new ByteArrayOutputStream();
        p.write(out);
        JsonNode root = new JsonMapper().readTree(out.toByteArray());
        assertEquals("tracewright-provenance/1", root.get("schema").stringValue());
        assertEquals("2026-01-02T03:04:05Z", root.get("start").stringValue());
        assertEquals("2026-01-02T03:05:05Z", root.get("end").stringValue());
        assertEquals("[\"seed=8\",\"a=b\"]", root.get("overrides").toString());
        assertEquals("{\"a09\":{\"thermalization\":3,\"exclude\":1}}", root.get("cuts").toString());
        assertEquals("name: \"small\"\n", root.get("study").stringValue());
        assertEquals("a", root.at("/inputs/0/path").stringValue());
        assertEquals(2, root.at("/inputs/0/bytes").intValue());
        assertTrue(root.at("/generated_by/java").stringValue().contains(Runtime.version().toString()));
    }

    @Test
    void given_an_end_before_the_start_or_a_broken_digest_when_made_then_it_is_refused() {
        assertThrows(IllegalArgumentException.class, () -> new Provenance("", List.of(), List.of(), Map.of(), START, START.minusNanos(1)));
        assertThrows(IllegalArgumentException.class, () -> new Provenance.InputFile("a", 1, "ABC"));
    }
}
