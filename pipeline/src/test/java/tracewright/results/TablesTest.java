package tracewright.results;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.StringReader;
import java.nio.charset.StandardCharsets;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import org.apache.commons.csv.CSVFormat;
import org.apache.commons.csv.CSVRecord;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import tracewright.fitters.sampled.SampledNumber;

@DisplayNameGeneration(ReplaceUnderscores.class)
class TablesTest {

    @Test
    void given_a_budget_when_written_as_csv_then_terms_total_mass_and_closure_stand_in_order() throws IOException {
        List<CSVRecord> rows = csv(budgetCsv(SmallResults.complete()));
        assertEquals(List.of("anomaly", "sigma.light", "total", "mass", "closure"), rows.stream().map(r -> r.get("term")).toList());
        assertEquals(List.of("810.0", "60.0", "870.0", "900.0", "30.0"), rows.stream().map(r -> r.get("value_mev")).toList());
        CSVRecord mass = rows.get(3);
        assertEquals("1.0", mass.get("fraction"));
        assertEquals("0.0", mass.get("fraction_error"), "a mass divided by itself does not fluctuate");
        assertEquals("", mass.get("scheme"));
        assertEquals("", mass.get("scale_gev"));
    }

    @Test
    void given_a_term_of_three_causes_when_written_as_csv_then_the_largest_and_its_share_are_named() throws IOException {
        CSVRecord anomaly = csv(budgetCsv(SmallResults.complete())).get(0);
        assertEquals("input:spacing_a09", anomaly.get("largest_cause"));
        // 9 of 9 + 4 + 1.6; d = (1, 0, -1, 0, 0) has no product of neighbours, so rho1 = 1/5 and the last part is 1.6 (1 + 2/5) = 2.24
        assertEquals(9 / 15.24, Double.parseDouble(anomaly.get("largest_cause_share")), 1e-14);
        assertEquals(Math.sqrt(15.24), Double.parseDouble(anomaly.get("error_mev")), 1e-13);
    }

    @Test
    void given_an_exact_term_in_a_scheme_when_written_as_csv_then_its_cause_is_empty_and_its_scale_stands() throws IOException {
        SampledNumber one = SampledNumber.exact(1);
        CSVRecord row = csv(budgetCsv(SmallResults.of(List.of(), List.of(schemeBudget("gluon", one, "b12"))))).get(0);
        assertEquals("", row.get("largest_cause"));
        assertEquals("", row.get("largest_cause_share"));
        assertEquals("MSbar", row.get("scheme"));
        assertEquals("2.0", row.get("scale_gev"));
    }

    @Test
    void given_another_locale_when_written_as_csv_then_the_text_is_the_same_and_lines_end_with_a_line_feed() throws IOException {
        String text = budgetCsv(SmallResults.complete());
        Locale before = Locale.getDefault();
        try {
            Locale.setDefault(Locale.GERMANY);
            assertEquals(text, budgetCsv(SmallResults.complete()));
        } finally {
            Locale.setDefault(before);
        }
        assertFalse(text.contains("\r"));
        assertTrue(text.endsWith("\n"));
    }

    @Test
    void given_a_term_that_is_infinite_when_written_as_csv_then_it_is_named_and_nothing_is_written() {
        Results r = SmallResults.of(List.of(), List.of(schemeBudget("gluon", SampledNumber.exact(Double.POSITIVE_INFINITY), "b12")));
        ByteArrayOutputStream out = new ByteArrayOutputStream();
        String message = assertThrows(IllegalArgumentException.class, () -> BudgetCsv.write(r, out)).getMessage();
        assertTrue(message.startsWith("b12.nucleon.trace-scheme.gluon: value is Infinity"), message);
        assertEquals(0, out.size());
    }

    @Test
    void given_a_figure_of_all_layers_when_written_as_csv_then_each_number_stands_in_its_column() throws IOException {
        List<CSVRecord> rows = csv(figureCsv(figure(1)));
        assertEquals(List.of("points", "band", "line", "bars"), rows.stream().map(r -> r.get("kind")).toList());
        assertEquals(List.of("1", "2", "3", "4"), rows.stream().map(r -> r.get("layer")).toList());
        assertEquals("measured, \"raw\"", rows.get(0).get("legend"), "quotes and commas survive");
        assertEquals(List.of("1.0", "0.25", "2.0", "0.5", "", "", "no"), fields(rows.get(0)));
        assertEquals(List.of("3.0", "", "5.0", "", "4.0", "6.0", ""), fields(rows.get(1)));
        assertEquals(List.of("7.0", "", "8.0", "", "", "", ""), fields(rows.get(2)));
        assertEquals(List.of("0.9", "0.01", "", "", "", "", ""), fields(rows.get(3)));
        assertEquals("anomaly", rows.get(3).get("label"));
        assertEquals("t / a", rows.get(2).get("x_axis"));
    }

    @Test
    void given_a_figure_with_nan_when_written_as_csv_then_figure_and_layer_are_named() {
        String message = assertThrows(IllegalArgumentException.class, () -> figureCsv(figure(Double.NaN))).getMessage();
        assertTrue(message.contains("figure all-layers, layer 1"), message);
    }

    @Test
    void given_a_budget_when_printed_then_every_column_is_aligned_and_the_closure_has_its_sign() {
        // Errors by hand as above: each a09 part has rho1 = 1/5, or less where neighbours anticorrelate; paper style by PaperNumber.
        String[] lines = BudgetTable.text(SmallResults.complete(), "trace").split("\n");
        assertEquals("budget 'trace' in MeV", lines[0]);
        assertTrue(lines[1].startsWith("ensemble  hadron "), lines[1]);
        assertTrue(lines[2].startsWith("a09       nucleon  810.0(3.9)"), lines[2]);
        for (String column : List.of("anomaly", "sigma.light", "mass - sum", "sigma.light")) {
            int end = lines[1].indexOf(column) + column.length();
            assertTrue(lines[2].charAt(end - 1) == ')' && lines[2].charAt(end) == ' ', lines[1] + "\n" + lines[2]);
        }
        assertTrue(lines[2].matches(".* \\+\\d\\.\\d  input:spacing_a09 \\d+ %"), lines[2]);
    }

    @Test
    void given_budgets_with_different_terms_when_printed_then_all_have_columns_and_the_physical_point_is_last() {
        SampledNumber zero = SampledNumber.exact(0);
        Results r = SmallResults.of(List.of(),
            List.of(schemeBudget("gluon", SmallResults.mass(), "physical"), schemeBudget("quark.light", zero, "b12")));
        String[] lines = BudgetTable.text(r, "trace-scheme").split("\n");
        assertEquals("budget 'trace-scheme' in MeV, MSbar at 2.0 GeV", lines[0]);
        assertTrue(lines[1].contains("gluon") && lines[1].contains("quark.light"), lines[1]);
        assertTrue(lines[2].startsWith("b12 ") && lines[2].endsWith("-"), lines[2]);
        assertTrue(lines[3].startsWith("physical "), lines[3]);
        assertFalse(String.join("\n", lines).contains("NaN"));
    }

    @Test
    void given_two_decompositions_when_all_are_printed_then_an_empty_line_parts_them_and_without_budgets_nothing_is_printed() {
        Results r = SmallResults.of(List.of(), List.of(SmallResults.budget(), schemeBudget("gluon", SmallResults.mass(), "a09")));
        assertEquals(BudgetTable.text(r, "trace") + "\n" + BudgetTable.text(r, "trace-scheme"), BudgetTable.text(r));
        assertEquals("", BudgetTable.text(SmallResults.of(List.of(), List.of())));
    }

    private static Results.Budget schemeBudget(String term, SampledNumber value, String ensemble) {
        SampledNumber mass = SampledNumber.exact(900);
        return new Results.Budget("nucleon", ensemble, "trace-scheme", Optional.of("MSbar"), Optional.of(2.0),
            List.of(new Results.Term(term, value, value.dividedBy(mass))), value, mass, mass.minus(value));
    }

    private static Figure figure(double x) {
        return new Figure("all-layers", "a09", "ratio", "title", "caption", new Figure.Axis("t / a", false), new Figure.Axis("R", true), List.of(
            new Figure.Points("measured, \"raw\"", List.of(new Figure.Point(x, 2, 0.5, 0.25, false))),
            new Figure.Band("fit", List.of(new Figure.BandPoint(3, 4, 5, 6))),
            new Figure.Line("", List.of(new Figure.LinePoint(7, 8)), true),
            new Figure.Bars("", List.of(new Figure.Bar("anomaly", 0.9, 0.01)))));
    }

    private static List<String> fields(CSVRecord row) {
        return List.of(row.get("x"), row.get("x_error"), row.get("y"), row.get("y_error"), row.get("y_low"), row.get("y_high"), row.get("filled"));
    }

    private static String budgetCsv(Results results) throws IOException {
        ByteArrayOutputStream out = new ByteArrayOutputStream();
        BudgetCsv.write(results, out);
        return out.toString(StandardCharsets.UTF_8);
    }

    private static String figureCsv(Figure figure) throws IOException {
        ByteArrayOutputStream out = new ByteArrayOutputStream();
        FigureCsv.write(figure, out);
        return out.toString(StandardCharsets.UTF_8);
    }

    private static List<CSVRecord> csv(String text) throws IOException {
        return CSVFormat.RFC4180.builder().setHeader().setSkipHeaderRecord(true).get().parse(new StringReader(text)).getRecords();
    }
}
