package tracewright.study;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;
import static tracewright.study.Texts.assertSays;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

@DisplayNameGeneration(ReplaceUnderscores.class)
@Tag("message")
class StudyFileTest {

    private static final String SMALL = Texts.resource("small.yaml");

    @TempDir
    Path folder;

    private Path file(String text) {
        return Texts.written(folder, "study.yaml", text);
    }

    private Study read(String text, Map<String, String> overrides) {
        return StudyFile.read(file(text), overrides);
    }

    private List<Problem> problems(String text) {
        return Texts.problems(() -> StudyFile.read(file(text)));
    }

    private List<Problem> overridden(String key, String value) {
        return Texts.problems(() -> read(SMALL, Map.of(key, value)));
    }

    /** Damages one place of the small study and asserts exactly one problem, on the line of {@code at}. */
    private void assertDamage(String old, String by, String at, String what, String remedy) {
        String text = Texts.replaced(SMALL, old, by);
        List<Problem> problems = problems(text);
        assertSays(problems, what, "study.yaml line " + Texts.lineOf(text, at), remedy);
        assertEquals(1, problems.size(), () -> "one mistake, one problem, but " + problems);
    }

    @Test
    void given_the_shipped_sample_when_read_then_its_three_ensembles_are_there() {
        Study study = StudyFile.read(Path.of("..", "configs", "sample.yaml"));
        assertEquals(List.of("alder", "birch", "cedar"), study.ensembles().stream().map(Study.Ensemble::name).toList());
    }

    @Test
    void given_a_small_study_when_read_then_values_references_paths_and_defaults_are_right() {
        Study study = read(SMALL, Map.of());
        Study.Ensemble ash = study.ensembles().get(0);
        assertEquals(new InputRef("coarse", new UncertainValue(0.12, 0.0008)), ash.spacingFm());
        assertEquals(new InputRef("elm.spacing_fm", new UncertainValue(0.08, 0.0006)), study.ensembles().get(1).spacingFm());
        assertEquals(folder.toAbsolutePath().resolve("data/ash"), ash.data());
        assertEquals(20, ash.cuts().thermalization());
        assertEquals(1, ash.cuts().stride());
        assertEquals(new Study.BlockChoice(Optional.empty()), ash.cuts().block());
        assertEquals(new Span(9, 11), study.hadrons().get("pion").fits().get(0).first());
        assertEquals(Study.CovarianceChoice.FULL, study.hadrons().get("pion").covariance());
        assertEquals(Optional.empty(), study.require());
    }

    @Test
    void given_a_misspelt_key_when_read_then_its_line_and_nearest_neighbour_are_named() {
        assertDamage("  scale_gev: 2.0\n", "  scale_gev: 2.0\n  flavours: 3\n", "flavours", "unknown key 'flavours'", "did you mean 'flavors'?");
    }

    @Test
    void given_an_unknown_key_beside_a_selector_when_read_then_the_selector_counts_as_valid() {
        assertDamage("{method: jackknife}", "{method: jackknife, draws: 5}", "draws", "unknown key 'draws'", "valid: method");
    }

    @ParameterizedTest
    @CsvSource(delimiter = '|', value = {
        "kind: meson | kind: messon | 'messon' is not a value of kind | did you mean 'meson'?",
        "method: jackknife | method: jacknife | 'jacknife' is no method | did you mean 'jackknife'?",
        "terms: [a2] | terms: [a3] | 'a3' is not a value of | did you mean 'a2'?",
        "{light: 0.011} | {light: 0.011, stranje: 0.05} | 'stranje' is not a value of quark_mass_lattice | did you mean 'strange'?",
        "last: 18 | last: soon | last: 'soon' is not a whole number | mend",
        "seed: 7 | seed: 7.5 | seed: '7.5' is not a whole number | mend",
        "last: 18 | last: 3000000000 | last: '3000000000' is not a whole number up to 2147483647 | mend",
        "budget: true | budget: yes | budget: 'yes' is not true or false | mend",
        "scale_gev: 2.0 | scale_gev: two | scale_gev: 'two' is not a number | mend",
        "terms: [a2] | terms: a2 | 'terms' must be a list | write [ ... ]",
        "kind: meson | kind: [meson] | 'kind' must be a single value | write kind: value",
        "resampling: {method: jackknife} | resampling: jackknife | 'resampling' must be a mapping with the key 'method' | write {method",
        "cuts: {} | cuts: none | 'cuts' must be a mapping | thermalization",
        "window: 1.0..3.0 | window: 3.0..1.0 | flow window 3.0..1.0 is empty | mend",
        "first: 9..11 | first: 11..9 | range 11..9 holds nothing | mend",
        "first: 9..11 | first: 9-11 | '9-11' is not a range like 3..7 | mend",
        "coarse: 0.1200(8) | coarse: 0.1200(8 | '0.1200(8' is not a number with error like 0.0904(21) | mend",
        "gamma_m: gamma-m | gamma_m: gama-m | 'gama-m' is neither a number with error like 0.0904(21) nor one of the inputs | did you mean 'gamma-m'?",
        "name: ash | name: physical | 'physical' is the reserved name | choose another name",
        "name: ash | name: Ash | the name 'Ash' is not made of lower-case letters | rename it",
        "publish: plateau | publish: two-state | the method 'two-state' is to be published but not configured | add two_state: {...}",
        "terms: [a2] | terms: [a2, mpi2] | a constant and 2 terms cannot be determined by 2 ensembles | drop a term or add an ensemble",
        "terms: [a2] | terms: [a2, a2] | a term stands twice | remove one",
        "pion: pion | pion: pionn | there is no hadron 'pionn' | did you mean 'pion'?",
        "pion: pion | pion: nucleon | the hadron 'nucleon' is no meson | pseudoscalar",
        "seed: 7 | seed: | 'seed' has no value | write one after the colon",
        "seed: 7 | seed: !mine 7 | the tag !mine is not supported | remove it",
        "seed: 7 | seed: !!java.lang.Long 7 | java.lang.Long is not supported | remove it",
        "cuts: {} | cuts: !mine {} | the tag !mine is not supported | remove it",
        "cuts: {} | cuts: {<<: {stride: 2}} | merge keys (<<) are not supported | write the keys out",
        "cuts: {} | cuts: {stride: 0} | stride 0 keeps nothing | take 1 or more",
        "data: data/ash | data: \"data\\0ash\" | data: 'data?ash' is not a path | mend",
        "schema: tracewright-study/1 | schema: tracewright-study/9 | this program reads tracewright-study/1 | write schema: tracewright-study/1",
        "seed: 7 | seed: 1e99999999999 | seed: '1e99999999999' is not a whole number | mend",
        "pion_mass_mev: 135.0 | pion_mass_mev: 1e99999999999 | neither a number with error | coarse, gamma-m",
    })
    void given_one_damaged_value_when_read_then_one_problem_names_it_and_its_line(String old, String by, String what, String remedy) {
        assertDamage(old, by, by, what, remedy);
    }

    @Test
    void given_a_missing_key_when_read_then_it_is_named_with_its_meaning_and_the_line_of_its_mapping() {
        assertDamage("    data: data/ash\n", "", "name: ash", "the key 'data' is missing in 'ensembles.ash'", "folder from which");
    }

    @Test
    void given_a_missing_selector_when_read_then_its_place_and_words_are_named() {
        assertDamage("sigma: {route: invariant}", "sigma: {}", "sigma: {}", "the key 'route' is missing in 'renormalization.sigma'", "invariant");
    }

    @Test
    void given_a_duplicate_key_when_read_then_both_lines_are_named() {
        assertDamage("seed: 7\n", "seed: 7\nseed: 8\n", "seed: 8", "key 'seed' stands twice; first at " + folder.resolve("study.yaml") + " line 4", "remove one");
    }

    @Test
    void given_two_ensembles_of_one_name_when_read_then_the_second_line_is_named() {
        assertDamage("- name: elm", "- name: ash", "- name: ash\n    layout: layouts/elm", "two ensembles are called 'ash'", "rename one");
    }

    @Test
    void given_an_anchor_that_contains_itself_when_read_then_it_is_refused() {
        assertDamage("cuts: {}", "cuts: &a {stride: *a}", "&a", "an anchor contains itself", "write the value out");
    }

    @Test
    void given_5000_nested_brackets_when_read_then_the_depth_is_named() {
        List<Problem> problems = problems(Texts.replaced(SMALL, "seed: 7", "seed: " + "[".repeat(5000) + "]".repeat(5000)));
        assertSays(problems, "nested", "", "40 levels");
    }

    @Test
    void given_fifty_nested_brackets_when_read_then_the_line_is_named() {
        assertDamage("seed: 7", "seed: " + "[".repeat(50) + "]".repeat(50), "seed", "nested more than 40 levels", "flatten");
    }

    @Test
    void given_an_empty_file_when_read_then_a_first_line_is_proposed() {
        assertSays(problems(""), "empty", "study.yaml", "begin with 'schema: tracewright-study/1'");
        assertSays(problems("# nothing\n"), "empty", "study.yaml", "begin with 'schema: tracewright-study/1'");
    }

    @Test
    void given_a_file_that_is_a_list_when_read_then_keys_are_asked_for() {
        assertSays(problems("- a\n- b\n"), "holds no mapping", "study.yaml", "begin with 'schema:");
    }

    @Test
    void given_a_tab_as_indentation_when_read_then_the_line_and_spaces_are_named() {
        assertDamage("      thermalization: 20", "\tthermalization: 20", "\tthermalization", "not valid YAML", "spaces");
    }

    @Test
    void given_no_file_when_read_then_that_is_said() {
        assertSays(Texts.problems(() -> StudyFile.read(folder.resolve("none.yaml"))), "there is no such file", "none.yaml", "check the path");
    }

    @Test
    void given_a_folder_when_read_then_that_is_said() {
        List<Problem> problems = Texts.problems(() -> StudyFile.read(folder));
        assertSays(problems, "it is a folder", folder.toString(), "check the path");
    }

    @Test
    void given_text_in_latin_1_when_read_then_utf_8_is_asked_for() throws IOException {
        Path file = folder.resolve("latin.yaml");
        Files.write(file, "# Gr\u00fc\u00dfe\n".concat(SMALL).getBytes(StandardCharsets.ISO_8859_1));
        assertSays(Texts.problems(() -> StudyFile.read(file)), "not UTF-8", "latin.yaml", "save it as UTF-8");
    }

    @Test
    void given_a_byte_order_mark_when_read_then_it_is_skipped() {
        assertEquals("small", read("\ufeff" + SMALL, Map.of()).name());
    }

    @Test
    void given_an_unreadable_input_when_read_then_the_keys_that_name_it_are_not_blamed() {
        List<Problem> problems = problems(Texts.replaced(SMALL, "gamma-m: 0.280(6)", "gamma-m: 0.28O(6)"));
        assertEquals(1, problems.size(), problems::toString);
    }

    @Test
    void given_a_dropped_ensemble_named_twice_when_read_then_it_counts_once() {
        String text = Texts.replaced(SMALL, "terms: [a2]", "terms: []\n  drop: [ash, ash]");
        assertEquals(List.of("ash", "ash"), read(text, Map.of()).extrapolation().orElseThrow().drop());
    }

    @Test
    void given_several_mistakes_when_read_then_all_are_reported() {
        String text = Texts.replaced(Texts.replaced(Texts.replaced(SMALL, "seed: 7", "sed: 7"), "last: 18", "last: x"), "kind: baryon", "kind: barion");
        List<Problem> problems = problems(text);
        assertSays(problems, "unknown key 'sed'", "line 4", "'seed'");
        assertSays(problems, "the key 'seed' is missing", "", "seed");
        assertSays(problems, "last: 'x'", "line " + Texts.lineOf(text, "pion: {"), "");
        assertSays(problems, "'barion'", "line " + Texts.lineOf(text, "nucleon: {"), "'baryon'");
        assertEquals(4, problems.size(), problems::toString);
    }

    @Test
    void given_overrides_when_read_then_lists_are_reached_by_name_and_by_number_and_optional_keys_are_added() {
        Study study = read(SMALL, Map.of("ensembles.ash.cuts.thermalization", "40", "ensembles.1.cuts.stride", "2",
            "require.p_value", "0.05", "hadrons.pion.fits.0.first", "8..9", "inputs.coarse", "0.1300(9)"));
        assertEquals(40, study.ensembles().get(0).cuts().thermalization());
        assertEquals(2, study.ensembles().get(1).cuts().stride());
        assertEquals(Optional.of(0.05), study.require().orElseThrow().pValue());
        assertEquals(new Span(8, 9), study.hadrons().get("pion").fits().get(0).first());
        assertEquals(new UncertainValue(0.13, 0.0009), study.ensembles().get(0).spacingFm().value());
    }

    @Test
    void given_an_anchor_used_twice_when_one_use_is_overridden_then_the_other_stays() {
        String text = Texts.replaced(Texts.replaced(SMALL, "cuts:\n      thermalization: 20", "cuts: &c {thermalization: 20}"), "cuts: {}", "cuts: *c");
        Study study = read(text, Map.of("ensembles.ash.cuts.thermalization", "40"));
        assertEquals(40, study.ensembles().get(0).cuts().thermalization());
        assertEquals(20, study.ensembles().get(1).cuts().thermalization());
    }

    @ParameterizedTest
    @CsvSource(delimiter = '|', value = {
        "seed | soon | seed: 'soon' is not a whole number | mend",
        "ensembles.ash.cuts.stride | 0 | stride 0 keeps nothing | take 1",
        "ensembles.oak.cuts.stride | 2 | the list has no entry 'oak' | valid: ash, elm",
        "ensembles.ash.cuts.strid | 2 | unknown key 'strid' | did you mean 'stride'?",
        "seed.deep | 2 | 'deep' lies below a value that has no keys | shorten the key",
        "seed | [1 | not valid YAML | mend the syntax",
        "seed | '' | there is no value | write one after the =",
        ". | 2 | '.' is no key | names with dots between them",
        "ensembles..cuts | 2 | 'ensembles..cuts' is no key | names with dots between them",
        "seed | !mine 3 | the tag !mine is not supported | remove it",
    })
    void given_a_bad_override_when_read_then_the_place_is_the_option(String key, String value, String what, String remedy) {
        List<Problem> problems = overridden(key, value);
        assertSays(problems, what, "", remedy);
        assertTrue(problems.stream().allMatch(p -> p.where().startsWith("--set " + key + "=" + value)), problems::toString);
    }
}
