package tracewright.study;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertNotEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.Map;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;

@DisplayNameGeneration(ReplaceUnderscores.class)
@Tag("law")
class ResolvedTextTest {

    private static final String SMALL = Texts.resource("small.yaml");

    @TempDir
    Path folder;

    private String resolved(String text, Map<String, String> overrides) {
        return ResolvedText.of(StudyFile.read(Texts.written(folder, "study.yaml", text), overrides));
    }

    private static String shuffledKeys() {
        return Texts.replaced(SMALL, "schema: tracewright-study/1\nname: small\nseed: 7\n", "seed: 7\nname: small\nschema: tracewright-study/1\n");
    }

    @Test
    void given_the_same_study_elsewhere_and_in_another_order_of_keys_when_written_out_then_the_text_is_the_same() throws IOException {
        Path elsewhere = Files.createDirectory(folder.resolve("elsewhere"));
        String other = ResolvedText.of(StudyFile.read(Texts.written(elsewhere, "other.yaml", shuffledKeys())));
        assertEquals(resolved(SMALL, Map.of()), other);
    }

    @ParameterizedTest
    @ValueSource(strings = {"      stride: 1\n", "      missing: error\n", "      block: auto\n", "    covariance: full\n", "    budget: false\n",
        "      thermalization: 0\n", "      exclude: []\n"})
    void given_keys_left_out_when_written_out_then_their_defaults_stand_there(String line) {
        String text = resolved(SMALL, Map.of());
        assertTrue(text.contains(line), () -> line + " is not in\n" + text);
    }

    @ParameterizedTest
    @ValueSource(strings = {"    window: 1.0..3.0\n", "    route: flow\n", "  method: jackknife\n", "    expect: [a:100..860 step 4]\n", "      exclude: [a:120, a:140..160]\n",
        "      ranges: [100..400]\n"})
    void given_special_notations_when_written_out_then_they_stand_as_in_a_file(String line) {
        String text = resolved(Texts.replaced(SMALL, "    cuts: {}", "    expect: [\"a:100..860 step 4\"]\n    cuts: {exclude: [\"a:120\", \"a:140..160\"], ranges: [100..400]}"), Map.of());
        assertTrue(text.contains(line), () -> line + " is not in\n" + text);
    }

    @Test
    void given_an_override_when_written_out_then_only_its_line_differs() {
        List<String> before = resolved(SMALL, Map.of()).lines().toList();
        List<String> after = resolved(SMALL, Map.of("hadrons.pion.last", "17")).lines().toList();
        assertNotEquals(before, after);
        assertEquals(before.size(), after.size());
        for (int i = 0; i < before.size(); i++) {
            assertEquals(before.get(i).replace("last: 18", "last: 17"), after.get(i));
        }
    }

    @Test
    void given_paths_when_written_out_then_no_folder_of_the_machine_is_in_the_text() {
        String text = resolved(Texts.replaced(SMALL, "data: data/elm", "data: /"), Map.of());
        assertTrue(text.contains("data: ash\n"));
        assertFalse(text.contains(folder.getFileName().toString()), text);
        assertFalse(text.contains("/ash"), text);
    }
}
