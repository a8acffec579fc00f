package tracewright.readers;

import static org.junit.jupiter.api.Assertions.assertEquals;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.Map;
import java.util.Set;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;

/** Exact: which files of a folder a template takes, in which order, and what their names say. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class PathTemplateTest {

    @TempDir
    Path folder;

    private void touch(String... names) throws IOException {
        for (String name : names) {
            Path file = folder.resolve(name);
            Files.createDirectories(file.getParent());
            Files.writeString(file, "");
        }
    }

    private PathTemplate.Scan scan(String template) throws IOException {
        return PathTemplate.of(template, Set.of("trajectory")).scan(folder);
    }

    private List<String> names(String template) throws IOException {
        return scan(template).matches().stream().map(m -> folder.relativize(m.file()).toString()).toList();
    }

    @Test
    void given_numbers_of_different_length_when_scanned_then_files_come_by_value_and_others_are_counted() throws IOException {
        touch("c_9.h5", "c_10.h5", "c_0100.h5", "c_x.h5", "c_7.h5.part", "README");
        assertEquals(List.of("c_9.h5", "c_10.h5", "c_0100.h5"), names("c_{trajectory}.h5"));
        assertEquals(3, scan("c_{trajectory}.h5").ignored());
    }

    @Test
    void given_placeholders_in_folders_when_scanned_then_a_repeated_one_must_repeat() throws IOException {
        touch("a/run_a_5.h5", "a/run_b_6.h5", "b/run_b_4.h5", "b/deeper/run_b_1.h5");
        PathTemplate.Scan scan = scan("{stream}/run_{stream}_{trajectory}.h5");
        assertEquals(List.of(Map.of("stream", "a", "trajectory", "5"), Map.of("stream", "b", "trajectory", "4")),
            scan.matches().stream().map(PathTemplate.Match::labels).toList());
        assertEquals(2, scan.ignored());
    }

    @Test
    void given_characters_that_mean_something_in_patterns_when_scanned_then_they_stand_for_themselves() throws IOException {
        touch("x+(1).h5", "xx1.h5", "xx(1)zh5");
        assertEquals(List.of("x+(1).h5"), names("x+({trajectory}).h5"));
    }

    @Test
    void given_no_placeholder_when_scanned_then_the_one_file_is_taken_and_nothing_else_looked_at() throws IOException {
        touch("data/all.h5", "data/other.h5");
        assertEquals(List.of("data/all.h5"), names("data/all.h5"));
        assertEquals(0, scan("data/all.h5").ignored());
        assertEquals(List.of(), names("data/none.h5"));
    }
}
