package tracewright.study;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import com.networknt.schema.Error;
import com.networknt.schema.SchemaRegistry;
import com.networknt.schema.SpecificationVersion;
import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;
import org.snakeyaml.engine.v2.api.Load;
import org.snakeyaml.engine.v2.api.LoadSettings;
import tools.jackson.databind.JsonNode;
import tools.jackson.databind.json.JsonMapper;

/** The schemas against json-schema-validator 3.0.9, on files converted from YAML to JSON trees. */
@DisplayNameGeneration(ReplaceUnderscores.class)
@Tag("law")
class StudySchemaTest {

    private static final String STUDY = Texts.resource("small.yaml");
    private static final String LAYOUT = Texts.resource("small-layout.yaml");

    private static List<Error> errors(String schema, String yaml) {
        Object tree = new Load(LoadSettings.builder().build()).loadFromString(yaml);
        JsonNode json = JsonMapper.builder().build().valueToTree(tree);
        return SchemaRegistry.withDefaultDialect(SpecificationVersion.DRAFT_2020_12).getSchema(schema).validate(json);
    }

    private static String config(String name) throws IOException {
        return Files.readString(Path.of("..", "configs").resolve(name), StandardCharsets.UTF_8);
    }

    @Test
    void given_the_shipped_sample_and_the_small_study_when_validated_then_they_pass() throws IOException {
        assertEquals(List.of(), errors(StudySchema.study(), config("sample.yaml")));
        assertEquals(List.of(), errors(StudySchema.study(), STUDY));
    }

    @ParameterizedTest
    @ValueSource(strings = {"alder", "birch", "cedar"})
    void given_a_shipped_layout_when_validated_then_it_passes(String name) throws IOException {
        assertEquals(List.of(), errors(StudySchema.layout(), config("layouts/" + name + ".yaml")));
    }

    @ParameterizedTest
    @CsvSource(delimiter = '|', value = {
        "seed: 7 | seed: soon",
        "seed: 7 | sed: 7",
        "kind: meson | kind: messon",
        "method: jackknife | method: jacknife",
        "{method: jackknife} | {method: jackknife, draws: 5}",
        "    data: data/ash | ",
        "coarse: 0.1200(8) | coarse: 0.1200(8",
        "gamma_m: gamma-m | gamma_m: Gamma M",
        "first: 9..11 | first: 9-11",
        "window: 1.0..3.0 | window: 1.0",
        "{light: 0.011} | {lihgt: 0.011}",
        "terms: [a2] | terms: a2",
        "cuts: {} | cuts: {exclude: [120]}",
        "cuts: {} | cuts: {block: often}",
        "schema: tracewright-study/1 | schema: tracewright-layout/1",
    })
    void given_a_damaged_study_when_validated_then_it_fails_as_it_does_when_read(String old, String by) {
        assertFalse(errors(StudySchema.study(), Texts.replaced(STUDY, old, by == null ? "" : by)).isEmpty());
    }

    @ParameterizedTest
    @CsvSource(delimiter = '|', value = {
        "cuts: {} | cuts: {block: 40, exclude: [\"a:120\", \"a:140..160\"], ranges: [100..400], missing: drop, sources: 2}",
        "coarse: 0.1200(8) | coarse: 1.2e-1(1)",
        "coarse: 0.1200(8) | coarse: 0.12",
        "first: 9..11 | first: 9",
        "{method: jackknife} | {method: bootstrap, draws: 200}",
        "{route: flow, window: 1.0..3.0} | {route: given-factor, factor: -0.5(1), flow_time: 2}",
    })
    void given_another_way_to_write_it_when_validated_then_it_passes(String old, String by) {
        assertEquals(List.of(), errors(StudySchema.study(), Texts.replaced(STUDY, old, by)));
    }

    @ParameterizedTest
    @CsvSource(delimiter = '|', value = {
        "kind: loop | kind: lop",
        "format: csv | format: hdf5",
        "    volume: sum | ",
        "complex: trailing | complex: pairs",
        "time_extent: 16 | time_extent: 16.5",
        "counts: u+d | counts: both",
        "columns: {stream: s | columns: {streem: s",
    })
    void given_a_damaged_layout_when_validated_then_it_fails(String old, String by) {
        assertEquals(List.of(), errors(StudySchema.layout(), LAYOUT));
        assertFalse(errors(StudySchema.layout(), Texts.replaced(LAYOUT, old, by == null ? "" : by)).isEmpty());
    }

    @Test
    void given_the_schemas_when_looked_at_then_keys_are_described_and_defaults_given() {
        JsonNode study = JsonMapper.builder().build().readTree(StudySchema.study());
        assertEquals("https://json-schema.org/draft/2020-12/schema", study.get("$schema").asString());
        JsonNode cuts = study.get("properties").get("ensembles").get("items").get("properties").get("cuts").get("properties");
        assertEquals(1, cuts.get("stride").get("default").asInt());
        assertEquals("error", cuts.get("missing").get("default").asString());
        assertTrue(cuts.get("stride").get("description").asString().contains("multiple of this"));
    }

    @Test
    void given_the_schemas_when_made_twice_then_their_bytes_are_the_same() {
        assertEquals(StudySchema.study(), StudySchema.study());
        assertEquals(StudySchema.layout(), StudySchema.layout());
    }
}
