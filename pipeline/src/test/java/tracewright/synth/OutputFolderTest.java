package tracewright.synth;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.Map;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import tracewright.study.InputException;

@DisplayNameGeneration(ReplaceUnderscores.class)
class OutputFolderTest {

    @TempDir
    private Path folder;

    private static byte[] bytes(String text) {
        return text.getBytes(StandardCharsets.UTF_8);
    }

    @Test
    void given_files_of_a_former_run_when_written_again_then_they_are_replaced_and_those_no_longer_made_are_gone() throws IOException {
        new OutputFolder(folder).write(Map.of("a/x", bytes("1"), "y", bytes("2")));
        new OutputFolder(folder).write(Map.of("a/x", bytes("3")));
        assertEquals("3", Files.readString(folder.resolve("a/x")));
        assertFalse(Files.exists(folder.resolve("y")));
        // SHA-256 of "3", by an independent tool.
        assertEquals("4e07408562bedb8b60ce05c1decfe3ad16b72230967de01f640b7e4729b49fce  a/x\n", Files.readString(folder.resolve(OutputFolder.LIST)));
    }

    @Test
    void given_a_foreign_file_when_written_then_nothing_is_touched_and_the_file_is_named() throws IOException {
        new OutputFolder(folder).write(Map.of("x", bytes("1")));
        Files.writeString(folder.resolve("notes.txt"), "mine");
        InputException refusal = assertThrows(InputException.class, () -> new OutputFolder(folder).write(Map.of("x", bytes("2"))));
        assertEquals(InputException.Cause.USAGE, refusal.reason());
        assertTrue(refusal.getMessage().contains("foreign file: notes.txt"), refusal.getMessage());
        assertEquals("1", Files.readString(folder.resolve("x")));
        assertEquals("mine", Files.readString(folder.resolve("notes.txt")));
    }

    @Test
    void given_a_generated_file_that_was_edited_when_written_then_it_is_kept_and_named() throws IOException {
        new OutputFolder(folder).write(Map.of("x", bytes("1")));
        Files.writeString(folder.resolve("x"), "edited");
        InputException refusal = assertThrows(InputException.class, () -> new OutputFolder(folder).write(Map.of("x", bytes("2"))));
        assertTrue(refusal.getMessage().contains("file has changed since it was generated: x"), refusal.getMessage());
        assertEquals("edited", Files.readString(folder.resolve("x")));
    }

    @Test
    void given_a_path_out_of_the_folder_when_written_then_it_is_refused() {
        assertThrows(InputException.class, () -> new OutputFolder(folder).write(Map.of("../x", bytes("1"))));
        assertFalse(Files.exists(folder.resolve("../x")));
    }

    @Test
    void given_a_list_that_names_a_file_out_of_the_folder_when_written_then_that_file_is_not_removed() throws IOException {
        Path inner = Files.createDirectories(folder.resolve("inner"));
        Files.writeString(folder.resolve("precious"), "kept");
        Files.writeString(inner.resolve(OutputFolder.LIST), "00  ../precious\n");
        assertThrows(InputException.class, () -> new OutputFolder(inner).write(Map.of("x", bytes("1"))));
        assertEquals("kept", Files.readString(folder.resolve("precious")));
    }
}
