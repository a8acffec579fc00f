package tracewright.tests;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import com.networknt.schema.Error;
import com.networknt.schema.InputFormat;
import com.networknt.schema.Schema;
import com.networknt.schema.SchemaRegistry;
import com.networknt.schema.SpecificationVersion;
import java.io.IOException;
import java.io.InputStream;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.TreeMap;
import java.util.Map;
import java.util.stream.Stream;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import tools.jackson.databind.JsonNode;
import tools.jackson.databind.ObjectMapper;
import tracewright.results.ResultsJson;

/** The main job on the shipped sample data, as a user runs it, against the truth that made the data. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class SampleStudyTest {

    private static final ObjectMapper JSON = new ObjectMapper();
    private static final Path STUDY = Program.ROOT.resolve("configs/sample.yaml");

    @TempDir
    static Path folder;

    private static Program.Ended ended;
    private static JsonNode results;
    private static JsonNode truth;

    @BeforeAll
    static void the_sample_study_runs_with_one_thread() throws Exception {
        ended = Program.run(folder, "run", STUDY.toString(), "--out", "one", "--threads", "1");
        assertEquals(0, ended.status(), ended.err());
        results = JSON.readTree(Files.readString(folder.resolve("one/results.json"), StandardCharsets.UTF_8));
        truth = JSON.readTree(Files.readString(Program.ROOT.resolve("sample-data/truth.json"), StandardCharsets.UTF_8)).get("quantities");
    }

    /**
     * Masses, sigma terms, gluon parts and anomalies of every hadron on every ensemble and at the physical point, 43 numbers,
     * against the truth file. For independent normal pulls the chance that the largest exceeds 3.6 is 43 x 3.2e-4 = 1.4 %
     * (correlated numbers make it less); the seed of the data is fixed, so the test cannot fail by chance once it has passed.
     */
    @Test
    void given_the_sample_when_analysed_then_every_contribution_agrees_with_the_truth_within_its_error() {
        Map<String, Double> pulls = new TreeMap<>();
        for (JsonNode q : results.get("quantities")) {
            String id = q.get("id").asString();
            if (truth.has(id) && q.get("unit").asString().equals("MeV")) {
                pulls.put(id, (q.get("value").asDouble() - truth.get(id).get("value").asDouble()) / q.get("error").asDouble());
            }
        }
        // 3 ensembles x (pion mass + 2 hadrons x (mass, light, strange, gluon, anomaly)) = 33, physical point 2 x 5 = 10.
        assertEquals(43, pulls.size(), pulls.keySet().toString());
        pulls.forEach((id, pull) -> assertTrue(Math.abs(pull) < 3.6, id + " lies " + pull + " errors from the truth"));
    }

    /** Six ensemble budgets: closure zero is exact in the theory; sum of squares over six, far below 22.5 = 99.9 % point for 6 (chi-squared table). */
    @Test
    void given_the_sample_when_analysed_then_the_budgets_close() {
        double sum = 0;
        int count = 0;
        for (JsonNode b : results.get("budgets")) {
            if (b.get("decomposition").asString().equals("trace") && !b.get("ensemble").asString().equals("physical")) {
                double sigma = b.get("closure").get("value").asDouble() / b.get("closure").get("error").asDouble();
                sum += sigma * sigma;
                count++;
            }
        }
        assertEquals(6, count);
        assertTrue(sum < 22.5, "sum of squared closures " + sum);
        assertTrue(sum > 0.38, "sum of squared closures " + sum + " is below the 0.1 % point: errors are too large");
    }

    @Test
    void given_every_quantity_when_its_variances_are_added_then_they_give_the_square_of_its_error() {
        for (JsonNode q : results.get("quantities")) {
            double sum = 0;
            for (JsonNode part : q.get("variance_by_group")) {
                sum += part.asDouble();
            }
            double error = q.get("error").asDouble();
            assertEquals(error * error, sum, 1e-12 * error * error, q.get("id").asString());
        }
    }

    @Test
    void given_the_sample_when_analysed_then_all_files_of_the_contract_are_there() throws IOException {
        for (String name : List.of("results.json", "budget.csv", "samples.h5", "report.html", "run.log", "provenance.json")) {
            assertTrue(Files.size(folder.resolve("one").resolve(name)) > 100, name);
        }
        try (Stream<Path> plots = Files.list(folder.resolve("one/plots"))) {
            List<String> names = plots.map(p -> p.getFileName().toString()).toList();
            long svg = names.stream().filter(n -> n.endsWith(".svg")).count();
            assertTrue(svg > 50, "only " + svg + " plots");
            assertEquals(2 * svg, names.size());
        }
        assertTrue(ended.out().contains("budget 'trace' in MeV") && ended.out().contains("sigma.strange"), ended.out());
    }

    @Test
    void given_results_json_when_validated_then_it_obeys_the_schema_that_ships() throws IOException {
        try (InputStream in = ResultsJson.class.getResourceAsStream("results.schema.json")) {
            Schema schema = SchemaRegistry.withDefaultDialect(SpecificationVersion.DRAFT_2020_12).getSchema(in, InputFormat.JSON);
            List<Error> errors = schema.validate(Files.readString(folder.resolve("one/results.json"), StandardCharsets.UTF_8), InputFormat.JSON);
            assertEquals(List.of(), errors);
        }
    }

    @Test
    void given_two_threads_or_a_second_run_when_compared_then_the_bytes_are_the_same() throws Exception {
        byte[] first = Files.readAllBytes(folder.resolve("one/results.json"));
        byte[] budget = Files.readAllBytes(folder.resolve("one/budget.csv"));
        byte[] report = Files.readAllBytes(folder.resolve("one/report.html"));
        assertEquals(0, Program.run(folder, "run", STUDY.toString(), "--out", "two", "--threads", "2", "--quiet").status());
        assertArrayEquals(first, Files.readAllBytes(folder.resolve("two/results.json")));
        assertArrayEquals(budget, Files.readAllBytes(folder.resolve("two/budget.csv")));
        assertArrayEquals(report, Files.readAllBytes(folder.resolve("two/report.html")));
        assertEquals(0, Program.run(folder, "run", STUDY.toString(), "--out", "two", "--threads", "2", "--quiet").status());
        assertArrayEquals(first, Files.readAllBytes(folder.resolve("two/results.json")));
    }

    /** Results are compared between people and machines: nothing in them may say where a checkout lies. */
    @Test
    void given_results_when_searched_then_no_path_of_the_machine_is_in_them() throws IOException {
        for (String name : List.of("results.json", "budget.csv", "report.html", "provenance.json")) {
            String text = Files.readString(folder.resolve("one").resolve(name), StandardCharsets.UTF_8);
            assertFalse(text.contains(Program.ROOT.toString()), name + " holds " + Program.ROOT);
            assertFalse(text.contains(folder.toString()), name + " holds " + folder);
        }
    }

    @Test
    void given_a_cut_on_the_command_line_when_run_then_results_count_what_it_removed() throws Exception {
        Program.Ended cut = Program.run(folder, "run", STUDY.toString(), "--out", "cut", "--json", "--set", "ensembles.alder.cuts.thermalization=260");
        assertEquals(0, cut.status(), cut.err());
        JsonNode alder = JSON.readTree(cut.out()).get("ensembles").get(0);
        // Trajectories 200, 204 ... 256 go: fifteen.
        assertEquals(15, alder.get("cuts").get("thermalization").asInt());
        assertEquals(225, alder.get("configurations").asInt());
    }

    @Test
    void given_bootstrap_instead_of_jackknife_when_run_then_numbers_move_by_less_than_a_third_of_their_errors() throws Exception {
        Program.Ended boot = Program.run(folder, "run", STUDY.toString(), "--out", "boot", "--json", "--set", "resampling={method: bootstrap, draws: 500}",
            "--set", "matrix_elements.connected.publish=summation");
        assertEquals(0, boot.status(), boot.err());
        Map<String, JsonNode> jackknife = new TreeMap<>();
        results.get("quantities").forEach(q -> jackknife.put(q.get("id").asString(), q));
        List<String> far = new ArrayList<>();
        int compared = 0;
        for (JsonNode q : JSON.readTree(boot.out()).get("quantities")) {
            String id = q.get("id").asString();
            if (id.endsWith(".energy") || id.endsWith(".summation")) {
                JsonNode other = jackknife.get(id);
                double shift = (q.get("value").asDouble() - other.get("value").asDouble()) / other.get("error").asDouble();
                double ratio = q.get("error").asDouble() / other.get("error").asDouble();
                compared++;
                // Same blocks, so central values differ only through the weights; the error of an error from 40 blocks is 11 %, of 500 draws 3 %.
                if (Math.abs(shift) > 1.0 / 3 || ratio < 0.6 || ratio > 1.6) {
                    far.add(String.format(Locale.ROOT, "%s shift %.2f ratio %.2f", id, shift, ratio));
                }
            }
        }
        assertTrue(compared > 30, "only " + compared + " numbers compared");
        assertEquals(List.of(), far);
    }

    @Test
    void given_validate_when_run_then_it_tells_the_reading_of_each_dataset_and_writes_nothing() throws Exception {
        Path empty = Files.createDirectory(folder.resolve("empty"));
        Program.Ended valid = Program.run(empty, "validate", STUDY.toString());
        assertEquals(0, valid.status(), valid.err());
        assertTrue(valid.out().contains("no problems") && valid.out().contains("nucleon"), valid.out());
        try (Stream<Path> files = Files.list(empty)) {
            assertFalse(files.findAny().isPresent());
        }
    }
}
