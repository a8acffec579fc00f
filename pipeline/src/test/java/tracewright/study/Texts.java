package tracewright.study;

import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.IOException;
import java.io.InputStream;
import java.io.UncheckedIOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import org.junit.jupiter.api.function.Executable;

/** Texts that are damaged on purpose, and what is said about them. */
final class Texts {

    private Texts() {
    }

    static String resource(String name) {
        try (InputStream in = Texts.class.getResourceAsStream(name)) {
            return new String(in.readAllBytes(), StandardCharsets.UTF_8);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    /** Replaces {@code old}, which has to be there, so that a test cannot damage nothing. */
    static String replaced(String text, String old, String by) {
        assertTrue(text.contains(old), "the text to damage holds '" + old + "'");
        return text.replace(old, by);
    }

    static Path written(Path folder, String name, String text) {
        try {
            return Files.writeString(folder.resolve(name), text);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    /** Line, from one, on which {@code part} first stands. */
    static int lineOf(String text, String part) {
        assertTrue(text.contains(part), "the text holds '" + part + "'");
        return 1 + (int) text.substring(0, text.indexOf(part)).chars().filter(c -> c == '\n').count();
    }

    static List<Problem> problems(Executable reading) {
        InputException e = assertThrows(InputException.class, reading);
        assertTrue(e.reason() == InputException.Cause.USAGE, "cause " + e.reason());
        return e.problems();
    }

    /** Some problem has all three words in its three parts; an empty word asks for nothing. */
    static void assertSays(List<Problem> problems, String what, String where, String remedy) {
        assertTrue(problems.stream().anyMatch(p -> p.what().contains(what) && p.where().endsWith(where) && p.remedy().contains(remedy)),
            () -> "wanted: " + what + " / " + where + " / " + remedy + "\nbut the problems are\n" + problems);
    }
}
