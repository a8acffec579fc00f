package tracewright.results;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import com.networknt.schema.Error;
import com.networknt.schema.Schema;
import com.networknt.schema.SchemaRegistry;
import com.networknt.schema.SpecificationVersion;
import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.InputStream;
import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;
import tools.jackson.databind.JsonNode;
import tools.jackson.databind.json.JsonMapper;
import tools.jackson.databind.node.ArrayNode;
import tools.jackson.databind.node.ObjectNode;
import tracewright.fitters.sampled.SampledNumber;

@DisplayNameGeneration(ReplaceUnderscores.class)
class ResultsJsonTest {

    private static final JsonMapper MAPPER = new JsonMapper();

    @Test
    void given_small_results_when_written_then_the_members_are_those_of_the_contract_in_its_order() throws IOException {
        JsonNode root = tree(SmallResults.complete());
        // design of the output folder, "results.json is stable", with the members added since at the end or beside their kin
        assertEquals(List.of("schema", "generated_by", "study", "ensembles", "quantities", "budgets", "warnings"), names(root));
        assertEquals(List.of("id", "ensemble", "hadron", "quantity", "flavor", "flow_time", "value", "error", "unit", "scheme", "scale_gev", "method",
            "route", "fits", "variance_by_group", "autocorrelation"), names(root.at("/quantities/0")));
        assertEquals(List.of("hadron", "ensemble", "decomposition", "scheme", "scale_gev", "unit", "terms", "total", "total_error", "mass",
            "mass_error", "closure", "correlation"), names(root.at("/budgets/0")));
        assertEquals("tracewright-results/1", root.get("schema").stringValue());
    }

    @Test
    void given_a_number_of_three_causes_when_written_then_its_variances_sum_to_the_square_of_its_error() throws IOException {
        JsonNode q = tree(SmallResults.complete()).at("/quantities/1");
        double sum = 0;
        for (String key : names(q.get("variance_by_group"))) {
            sum += q.at("/variance_by_group/" + key).doubleValue();
        }
        double error = q.get("error").doubleValue();
        // three terms and one root, each rounded once: a few units in the last place of 14.6
        assertEquals(error * error, sum, 8 * Math.ulp(14.6));
        // By hand: no product of neighbours, so rho1 = 1/5 and the part of the blocks is 1.6 (1 + 2/5) = 2.24; 9 and 4 stay.
        assertEquals(15.24, sum, 1e-13);
    }

    @Test
    void given_a_number_of_three_causes_when_written_then_the_largest_share_comes_first() throws IOException {
        JsonNode q = tree(SmallResults.complete()).at("/quantities/1");
        // variances by hand in SmallResults.anomaly: 9, 4 and 1.6
        assertEquals(List.of("input:spacing_a09", "choice:window", "a09"), names(q.get("variance_by_group")));
    }

    @Test
    void given_a_budget_when_written_then_closure_and_significance_are_those_of_mass_minus_total() throws IOException {
        JsonNode b = tree(SmallResults.complete()).at("/budgets/0");
        assertEquals(870, b.get("total").doubleValue());
        assertEquals(900, b.get("mass").doubleValue());
        assertEquals(30, b.at("/closure/value").doubleValue());
        double error = b.at("/closure/error").doubleValue();
        assertEquals(30 / error, b.at("/closure/sigma").doubleValue(), Math.ulp(30 / error));
        assertEquals(0.9, b.at("/terms/0/fraction").doubleValue(), Math.ulp(0.9));
    }

    @Test
    void given_a_budget_when_written_then_the_correlation_of_its_terms_is_that_of_their_samples() throws IOException {
        JsonNode c = tree(SmallResults.complete()).at("/budgets/0/correlation");
        assertEquals("[\"anomaly\",\"sigma.light\",\"closure\"]", c.get("ids").toString());
        // By hand: cov(anomaly, light) = 4/5 (1 * 0 + (-1) * 1) = -0.8, both widened by 7/5; variances 15.24 and 1.6 * 7/5.
        assertEquals(-0.8 * 1.4 / Math.sqrt(15.24 * 1.6 * 1.4), c.at("/matrix/0/1").doubleValue(), 1e-15);
        for (int i = 0; i < 3; i++) {
            assertEquals(1, c.at("/matrix/" + i + "/" + i).doubleValue());
            for (int j = 0; j < 3; j++) {
                assertEquals(c.at("/matrix/" + i + "/" + j).doubleValue(), c.at("/matrix/" + j + "/" + i).doubleValue());
            }
        }
    }

    @Test
    void given_five_blocks_whose_neighbours_do_not_correlate_when_written_then_the_verdict_is_long_with_the_bias_correction() throws IOException {
        JsonNode n = tree(SmallResults.complete()).at("/quantities/1/autocorrelation/0");
        // By hand: no product of neighbours, rho1 = 0 + 1/5, below 1/sqrt(5); factor 1 + 2/5.
        assertEquals("{\"ensemble\":\"a09\",\"verdict\":\"long\",\"rho1\":0.2,\"factor\":1.4,\"blocks\":5}", n.toString());
    }

    @ParameterizedTest
    @ValueSource(doubles = {0.1, 2e23, 1.0 / 3, 4.9e-324, -938.272_088_16, 1.797_693_134_862_315_7e308})
    void given_any_double_when_written_then_it_reads_back_to_the_same_bits(double value) throws IOException {
        Results r = SmallResults.of(List.of(SmallResults.quantity("a09.x", SampledNumber.exact(value))), List.of());
        assertEquals(value, tree(r).at("/quantities/0/value").doubleValue());
    }

    @Test
    void given_2e23_when_written_then_the_text_is_the_shortest_on_every_java_version() throws IOException {
        // Double.toString of Java 17 writes 1.9999999999999998E23.
        Results r = SmallResults.of(List.of(SmallResults.quantity("a09.x", SampledNumber.exact(2e23))), List.of());
        assertTrue(text(r).contains("\"value\": 2.0E23") || text(r).contains("\"value\" : 2.0E23"), text(r));
    }

    @Test
    void given_the_same_results_when_written_twice_and_under_another_locale_then_the_bytes_are_the_same() throws IOException {
        byte[] first = bytes(SmallResults.complete());
        Locale before = Locale.getDefault();
        try {
            Locale.setDefault(Locale.forLanguageTag("ar-EG"));
            assertArrayEquals(first, bytes(SmallResults.complete()));
        } finally {
            Locale.setDefault(before);
        }
        assertFalse(new String(first, StandardCharsets.UTF_8).contains("\r"), "line ends are those of one system only");
    }

    @ParameterizedTest
    @ValueSource(doubles = {Double.NaN, Double.POSITIVE_INFINITY, Double.NEGATIVE_INFINITY})
    void given_a_number_that_is_not_finite_when_written_then_its_id_is_named_and_nothing_is_written(double value) {
        Results r = SmallResults.of(List.of(SmallResults.quantity("a09.nucleon.bad", SampledNumber.exact(value))), List.of());
        ByteArrayOutputStream out = new ByteArrayOutputStream();
        String message = assertThrows(IllegalArgumentException.class, () -> ResultsJson.write(r, out)).getMessage();
        assertEquals("a09.nucleon.bad: value is " + value + "; results hold finite numbers only", message);
        assertEquals(0, out.size());
    }

    @Test
    void given_a_term_whose_sample_is_nan_when_written_then_budget_and_term_are_named() {
        SampledNumber bad = SmallResults.jackknifed(60, 0, 0, Double.NaN, 0, -1);
        Results.Budget b = SmallResults.budget();
        Results.Budget broken = new Results.Budget(b.hadron(), b.ensemble(), b.decomposition(), b.scheme(), b.scaleGev(),
            List.of(SmallResults.term("sigma.light", bad)), b.total(), b.mass(), b.closure());
        Results r = SmallResults.of(List.of(), List.of(broken));
        String message = assertThrows(IllegalArgumentException.class, () -> bytes(r)).getMessage();
        assertTrue(message.contains("a09.nucleon.trace.sigma.light: error is NaN"), message);
    }

    @Test
    void given_two_quantities_of_one_id_when_written_then_the_id_is_named() {
        Results.Quantity q = SmallResults.quantity("a09.nucleon.twice", SmallResults.light());
        Results r = SmallResults.of(List.of(q, q), List.of());
        assertTrue(assertThrows(IllegalArgumentException.class, () -> bytes(r)).getMessage().contains("a09.nucleon.twice"));
    }

    @Test
    void given_small_results_when_checked_against_the_schema_then_nothing_is_wrong() throws IOException {
        assertEquals(List.of(), problems(tree(SmallResults.complete())));
    }

    @Test
    void given_results_without_anything_when_checked_against_the_schema_then_nothing_is_wrong() throws IOException {
        Results r = new Results(new Results.StudySummary("empty", 0, "jackknife", Map.of()), List.of(), List.of(), List.of(), List.of(), List.of());
        assertEquals(List.of(), problems(tree(r)));
    }

    @Test
    void given_a_closure_without_error_when_checked_against_the_schema_then_its_significance_is_null() throws IOException {
        SampledNumber zero = SampledNumber.exact(0);
        SampledNumber one = SampledNumber.exact(1);
        Results.Budget b = new Results.Budget("nucleon", "physical", "trace-scheme", Optional.of("MSbar"), Optional.of(2.0),
            List.of(new Results.Term("gluon", zero, zero)), zero, one, one);
        JsonNode root = tree(SmallResults.of(List.of(), List.of(b)));
        assertEquals(List.of(), problems(root));
        assertTrue(root.at("/budgets/0/closure/sigma").isNull());
        assertEquals("[[1.0,0.0],[0.0,1.0]]", root.at("/budgets/0/correlation/matrix").toString());
    }

    @ParameterizedTest
    @CsvSource(delimiter = '|', value = {
        "/schema                                | \"tracewright-results/2\"",
        "/quantities/0/error                    | -1",
        "/quantities/0/value                    | \"NaN\"",
        "/quantities/0/unit                     | \"GeV\"",
        "/quantities/0/id                       | \"a09.Nucleon mass\"",
        "/quantities/0/fits/0/p_value           | 1.5",
        "/quantities/0/variance_by_group/a09    | -0.1",
        "/budgets/0/decomposition               | \"pie\"",
        "/budgets/0/closure/sigma               | -2",
        "/budgets/0/correlation/matrix/0/1      | 1.5",
        "/ensembles/0/configurations            | 2.5",
        "/budgets/0/unexpected                  | 0",
        "/quantities/0/unexpected               | 0",
        "/unexpected                            | 0"})
    void given_a_damaged_value_when_checked_against_the_schema_then_its_place_is_named(String pointer, String value) throws IOException {
        JsonNode root = tree(SmallResults.complete());
        int cut = pointer.lastIndexOf('/');
        JsonNode parent = root.at(pointer.substring(0, cut));
        JsonNode damage = MAPPER.readTree(value);
        if (parent instanceof ObjectNode object) {
            object.set(pointer.substring(cut + 1), damage);
        } else {
            ((ArrayNode) parent).set(Integer.parseInt(pointer.substring(cut + 1)), damage);
        }
        List<String> problems = problems(root);
        String place = pointer.endsWith("unexpected") ? pointer.substring(0, cut) : pointer;
        assertTrue(problems.stream().anyMatch(p -> p.startsWith(place + ":")), problems.toString());
    }

    @ParameterizedTest
    @ValueSource(strings = {"/generated_by", "/study", "/quantities/0/flavor", "/quantities/0/fits", "/quantities/0/variance_by_group",
        "/budgets/0/closure", "/budgets/0/mass", "/budgets/0/terms/0/fraction_error", "/ensembles/0/cuts"})
    void given_a_missing_member_when_checked_against_the_schema_then_it_is_named(String pointer) throws IOException {
        JsonNode root = tree(SmallResults.complete());
        int cut = pointer.lastIndexOf('/');
        String name = pointer.substring(cut + 1);
        ((ObjectNode) root.at(pointer.substring(0, cut))).remove(name);
        List<String> problems = problems(root);
        assertTrue(problems.stream().anyMatch(p -> p.contains("'" + name + "'")), problems.toString());
    }

    private static List<String> problems(JsonNode root) throws IOException {
        SchemaRegistry registry = SchemaRegistry.withDefaultDialect(SpecificationVersion.DRAFT_2020_12);
        try (InputStream in = ResultsJson.class.getResourceAsStream(ResultsJson.SCHEMA_RESOURCE)) {
            Schema schema = registry.getSchema(in);
            List<String> problems = new ArrayList<>();
            for (Error e : schema.validate(root)) {
                problems.add(e.getInstanceLocation() + ": " + e.getMessage());
            }
            return problems;
        }
    }

    private static List<String> names(JsonNode node) {
        return new ArrayList<>(node.propertyNames());
    }

    private static JsonNode tree(Results results) throws IOException {
        return MAPPER.readTree(bytes(results));
    }

    private static String text(Results results) throws IOException {
        return new String(bytes(results), StandardCharsets.UTF_8);
    }

    private static byte[] bytes(Results results) throws IOException {
        ByteArrayOutputStream out = new ByteArrayOutputStream();
        ResultsJson.write(results, out);
        return out.toByteArray();
    }
}
