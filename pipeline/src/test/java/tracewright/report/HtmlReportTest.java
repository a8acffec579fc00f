package tracewright.report;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.IOException;
import java.io.InputStream;
import java.io.StringWriter;
import java.io.UncheckedIOException;
import java.nio.charset.StandardCharsets;
import java.util.HashSet;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import java.util.stream.IntStream;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.w3c.dom.Document;
import org.w3c.dom.Element;
import tracewright.fitters.sampled.BlockLabel;
import tracewright.fitters.sampled.SampleGroup;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.results.Figure;
import tracewright.results.Results;

@DisplayNameGeneration(ReplaceUnderscores.class)
class HtmlReportTest {

    private static final Results EXAMPLE = ExampleResults.results();

    private static String page(Results results) {
        try {
            StringWriter out = new StringWriter();
            HtmlReport.write(results, new Provenance("9.8.7", Map.of("study file", "digest 5f0c")), out);
            return out.toString();
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    /** The parser knows no entity beyond XML's own and rejects every unclosed tag; the HTML doctype names no file to fetch. */
    private static Document parsed(Results results) {
        return Xml.parse(page(results));
    }

    private static Results only(List<Results.Quantity> quantities, List<Results.Budget> budgets, List<String> warnings) {
        return new Results(new Results.StudySummary("s", 1, "jackknife", Map.of()), List.of(), quantities, budgets, List.of(), warnings);
    }

    private static Results.Quantity quantity(String method, SampledNumber number, List<Results.Fit> fits) {
        return new Results.Quantity("e.nucleon.mass" + (method.isEmpty() ? "" : "." + method), "e", "nucleon", "mass", Optional.empty(), Optional.empty(), number, "MeV",
            Optional.empty(), Optional.empty(), Optional.empty(), method.isEmpty() ? Optional.empty() : Optional.of(method), fits);
    }

    private static List<List<String>> rows(Document page, String captionPart) {
        Element table = Xml.all(page, "table").stream().filter(t -> t.getFirstChild().getTextContent().contains(captionPart)).findFirst().orElseThrow();
        return IntStream.range(0, table.getElementsByTagName("tr").getLength()).mapToObj(i -> table.getElementsByTagName("tr").item(i))
            .map(tr -> IntStream.range(0, tr.getChildNodes().getLength()).mapToObj(k -> tr.getChildNodes().item(k))
                .filter(Element.class::isInstance).map(c -> c.getTextContent()).toList()).toList();
    }

    @Test
    void given_the_example_when_written_twice_and_under_other_locales_then_the_bytes_are_equal() {
        String expected = page(EXAMPLE);
        Locale before = Locale.getDefault();
        try {
            Locale.setDefault(Locale.forLanguageTag("tr-TR"));
            assertEquals(expected, page(ExampleResults.results()));
            Locale.setDefault(Locale.forLanguageTag("ar-EG-u-nu-arab"));
            assertEquals(expected, page(EXAMPLE));
        } finally {
            Locale.setDefault(before);
        }
    }

    @Test
    void given_the_example_when_written_then_every_tag_is_closed_and_every_id_is_used_once() {
        List<String> ids = Xml.attributes(parsed(EXAMPLE), "id");
        Set<String> seen = new HashSet<>();
        ids.forEach(id -> assertTrue(seen.add(id), "twice: " + id));
        assertTrue(ids.size() > 80, "sections, figures and clip paths: " + ids.size());
    }

    @Test
    void given_the_example_when_written_then_every_reference_stays_inside_the_page() {
        Document page = parsed(EXAMPLE);
        Set<String> ids = Set.copyOf(Xml.attributes(page, "id"));
        Xml.attributes(page, "href").forEach(h -> assertTrue(h.startsWith("#") && ids.contains(h.substring(1)), h));
        Xml.attributes(page, "clip-path").forEach(c -> assertTrue(ids.contains(c.substring(5, c.length() - 1)), c));
        for (String loader : List.of("src", "srcset", "xlink:href", "data", "action")) {
            assertEquals(List.of(), Xml.attributes(page, loader));
        }
        assertEquals(0, Xml.all(page, "link").size());
        String text = page(EXAMPLE);
        assertFalse(text.contains("http") || text.contains("@import") || Pattern.compile("url\\((?!#)").matcher(text).find());
    }

    @Test
    void given_the_example_when_written_then_every_figure_stands_once_and_has_an_alternative_text() {
        Document page = parsed(EXAMPLE);
        List<Element> drawings = Xml.all(page, "svg");
        drawings.forEach(s -> assertTrue(s.getAttribute("role").equals("img") && s.getAttribute("aria-label").length() > 4, s.getAttribute("aria-label")));
        List<String> labels = drawings.stream().map(s -> s.getAttribute("aria-label")).toList();
        for (Figure f : EXAMPLE.figures()) {
            long expected = EXAMPLE.figures().stream().filter(g -> SvgPlot.alternativeText(g).equals(SvgPlot.alternativeText(f))).count();
            assertEquals(expected, labels.stream().filter(SvgPlot.alternativeText(f)::equals).count(), f.id());
        }
    }

    @Test
    void given_the_example_when_written_then_the_script_is_the_packaged_one_and_holds_no_value() throws IOException {
        List<Element> scripts = Xml.all(parsed(EXAMPLE), "script");
        assertEquals(1, scripts.size());
        try (InputStream in = HtmlReport.class.getResourceAsStream("report.js")) {
            assertEquals(new String(in.readAllBytes(), StandardCharsets.UTF_8), scripts.get(0).getTextContent());
        }
        assertTrue(Xml.all(parsed(EXAMPLE), "*").stream().noneMatch(e -> e.hasAttribute("onclick") || e.hasAttribute("onload")));
    }

    @Test
    void given_the_example_when_written_then_no_number_without_meaning_is_shown() {
        String text = Xml.all(parsed(EXAMPLE), "main").get(0).getTextContent();
        assertFalse(Pattern.compile("NaN|Infinity|\\bnull\\b|Optional[\\[.]").matcher(text).find());
        assertFalse(Pattern.compile("NaN|Infinity").matcher(page(EXAMPLE)).find());
    }

    @Test
    void given_the_example_when_written_then_headings_go_down_one_level_at_a_time() {
        int level = 0;
        Matcher m = Pattern.compile("<h([1-6])>").matcher(page(EXAMPLE));
        while (m.find()) {
            int next = Integer.parseInt(m.group(1));
            assertTrue(next <= level + 1, "h" + next + " after h" + level);
            level = next;
        }
        assertEquals(1, Xml.all(parsed(EXAMPLE), "h1").size());
    }

    @Test
    void given_the_example_when_written_then_every_table_row_has_a_cell_for_each_head() {
        for (Element table : Xml.all(parsed(EXAMPLE), "table")) {
            List<List<String>> rows = rows(table.getOwnerDocument(), table.getFirstChild().getTextContent());
            rows.forEach(r -> assertEquals(rows.get(0).size(), r.size(), table.getFirstChild().getTextContent() + ": " + r));
        }
    }

    @Test
    void given_the_example_when_written_then_name_version_warnings_choices_and_provenance_are_on_the_page() {
        String text = parsed(EXAMPLE).getDocumentElement().getTextContent();
        assertTrue(text.contains(EXAMPLE.study().name()) && text.contains("Tracewright 9.8.7") && text.contains("digest 5f0c"));
        EXAMPLE.warnings().forEach(w -> assertTrue(text.contains(w), w));
        EXAMPLE.study().choices().forEach((k, v) -> assertTrue(text.contains(k) && text.contains(v), k));
        EXAMPLE.ensembles().forEach(e -> assertTrue(text.contains("Ensemble " + e.name()) && text.contains(e.blockReason())));
        EXAMPLE.quantities().forEach(q -> assertTrue(text.contains(q.id()), q.id()));
    }

    @Test
    void given_hostile_names_when_written_then_they_are_text_and_nothing_else() {
        String evil = "</title></style><script>alert('x')</script>\" onload=\"y";
        Results r = new Results(new Results.StudySummary(evil, 1, evil, Map.of(evil, evil)), List.of(), List.of(quantity(evil, SampledNumber.exact(1), List.of())), List.of(),
            List.of(new Figure(evil, evil, evil, evil, evil, new Figure.Axis(evil, false), new Figure.Axis(evil, false), List.of())), List.of(evil));
        Document page = parsed(r);
        assertEquals(1, Xml.all(page, "script").size());
        assertEquals(List.of(), Xml.attributes(page, "onload"));
        assertEquals(evil, Xml.all(page, "h1").get(0).getTextContent());
    }

    @Test
    void given_a_budget_when_written_then_its_row_holds_terms_fractions_closure_and_the_largest_cause() {
        // By hand: sum 90 + 12 = 102, error sqrt(9 + 16) = 5; mass 100 exact; closure -2(5), 0.4 standard errors; 16/25 = 64 % from input b.
        SampledNumber a = SampledNumber.input("a", 90, 3);
        SampledNumber b = SampledNumber.input("b", 12, 4);
        SampledNumber mass = SampledNumber.exact(100);
        Results.Budget budget = new Results.Budget("nucleon", "physical", "trace", Optional.empty(), Optional.empty(),
            List.of(new Results.Term("anomaly", a, a.dividedBy(mass)), new Results.Term("sigma.light", b, b.dividedBy(mass))), a.plus(b), mass, mass.minus(a.plus(b)));
        List<String> row = rows(parsed(only(List.of(), List.of(budget), List.of())), "Trace sum rule").get(1);
        assertEquals(List.of("physical point", "nucleon", Numbers.paper(90, 3) + Numbers.percent(0.9, 0.03), Numbers.paper(12, 4) + Numbers.percent(0.12, 0.04),
            Numbers.paper(102, 5), "100", Numbers.paper(-2, 5) + "0.4\u202f\u03c3", "input b, 64\u202f%"), row);
    }

    @Test
    void given_a_term_taken_as_the_difference_when_written_then_the_page_says_that_nothing_is_tested() {
        SampledNumber mass = SampledNumber.input("mass", 939, 5);
        SampledNumber sigma = SampledNumber.input("sigma", 90, 7);
        SampledNumber anomaly = mass.minus(sigma);
        Results.Budget budget = new Results.Budget("nucleon", "physical", "trace", Optional.empty(), Optional.empty(),
            List.of(new Results.Term("anomaly", anomaly, anomaly.dividedBy(mass))), anomaly.plus(sigma), mass, mass.minus(anomaly.plus(sigma)));
        String text = parsed(only(List.of(), List.of(budget), List.of())).getDocumentElement().getTextContent();
        assertTrue(text.contains("by definition") && text.contains("nothing is tested"), text);
        assertFalse(text.contains("within its error"), text);
    }

    @Test
    void given_a_closure_of_four_standard_errors_when_written_then_the_page_says_it_does_not_close() {
        SampledNumber a = SampledNumber.input("a", 60, 10);
        SampledNumber mass = SampledNumber.exact(100);
        Results.Budget budget = new Results.Budget("nucleon", "e", "trace", Optional.empty(), Optional.empty(), List.of(new Results.Term("anomaly", a, a.times(0.01))), a, mass, mass.minus(a));
        String text = parsed(only(List.of(), List.of(budget), List.of())).getDocumentElement().getTextContent();
        assertTrue(text.contains("The sum does not close") && text.contains("4.0\u202f\u03c3"), text);
    }

    @Test
    void given_one_number_by_three_methods_when_written_then_they_share_a_row_with_the_quoted_one_first() {
        Results r = only(List.of(quantity("plateau", SampledNumber.input("p", 940, 12), List.of()), quantity("", SampledNumber.input("q", 938, 11), List.of()),
            quantity("two-state", SampledNumber.input("t", 936, 15), List.of())), List.of(), List.of());
        List<List<String>> rows = rows(parsed(r), "Numbers in the continuum");
        assertEquals(List.of("Hadron", "Quantity", "Unit", "Quoted", "Plateau", "Two-state"), rows.get(0));
        assertEquals(List.of("nucleon", "mass", "MeV", Numbers.paper(938, 11), Numbers.paper(940, 12), Numbers.paper(936, 15)), rows.get(1));
    }

    @Test
    void given_two_numbers_that_differ_in_their_id_alone_when_written_then_none_hides_the_other() {
        Results.Quantity one = quantity("", SampledNumber.exact(938), List.of());
        Results.Quantity other = new Results.Quantity("e.nucleon.mass.again", "e", "nucleon", "mass", Optional.empty(), Optional.empty(), SampledNumber.exact(947), "MeV",
            Optional.empty(), Optional.empty(), Optional.empty(), Optional.empty(), List.of());
        List<List<String>> rows = rows(parsed(only(List.of(one, other), List.of(), List.of())), "Numbers in the continuum");
        assertEquals(List.of(List.of("nucleon", "mass", "", "MeV", "938"), List.of("nucleon", "mass", "e.nucleon.mass.again", "MeV", "947")), rows.subList(1, 3));
    }

    @Test
    void given_a_scan_of_hundred_windows_when_written_then_the_heaviest_are_shown_and_the_rest_are_counted() {
        List<Results.Fit> fits = IntStream.range(0, 100).mapToObj(i -> new Results.Fit("window " + i, 5, 5, 5, 0.4, (i + 1) / 5050.0, 1.1, 938, 10)).toList();
        Document page = parsed(only(List.of(quantity("", SampledNumber.exact(938), fits)), List.of(), List.of()));
        List<List<String>> rows = rows(page, "Fits, heaviest first");
        assertEquals(61, rows.size());
        assertEquals("window 99", rows.get(1).get(1));
        String text = page.getDocumentElement().getTextContent();
        assertTrue(text.contains("All fits (100)") && text.contains("40 more fits, none of weight above 0.0079208"), text);   // 40/5050
    }

    @Test
    void given_a_number_with_three_causes_when_written_then_shares_are_sorted_and_add_up() {
        // Variances 1, 4, 4 * 5 = 20 by hand, of 25: 4 %, 16 %, 80 %.
        SampledNumber x = SampledNumber.input("one", 10, 1).withGroup(SampleGroup.variation("two"), new double[] {12})
            .withGroup(SampleGroup.fitNoise("three", 1), new double[] {10 + Math.sqrt(20)});
        List<String> row = rows(parsed(only(List.of(quantity("", x, List.of())), List.of(), List.of())), "Causes of each number").get(1);
        assertEquals("covariance noise of three\u00a080\u202f%, choice of two\u00a016\u202f%, input one\u00a04.0\u202f%", row.get(row.size() - 2));
    }

    @Test
    void given_blocks_that_follow_their_neighbours_when_written_then_the_published_error_is_shown_and_the_blocks_are_called_short() {
        int g = 12;
        List<BlockLabel> labels = IntStream.range(0, g).mapToObj(k -> new BlockLabel("a", k)).toList();
        int[] sizes = IntStream.generate(() -> 10).limit(g).toArray();
        double[] samples = IntStream.range(0, g).mapToDouble(k -> k % 6 < 3 ? 101 : 99).toArray();
        SampledNumber x = SampledNumber.of(100, SampleGroup.jackknife("e", labels, sizes), samples);
        // By hand: deviations in runs of three, so of 11 pairs of neighbours 8 agree and 3 do not: rho1 = (8 - 3)/11 + 1/12 = 0.5379, above 0.4;
        // factor 1 + 2 rho1 = 2.0758; jackknife variance 11/12 * 12 = 11; published error sqrt(11 * 2.0758) = 4.779 instead of 3.317.
        List<String> row = rows(parsed(only(List.of(quantity("", x, List.of())), List.of(), List.of())), "Causes of each number").get(1);
        assertEquals(Numbers.paper(100, 4.779), row.get(2));
        String blocks = row.get(row.size() - 1);
        assertTrue(blocks.startsWith("e: far too short, variance times 2.08; \u03c4 = "), blocks);
    }

    @Test
    void given_cuts_whose_counts_do_not_add_up_when_written_then_the_page_points_at_it() {
        Map<String, Integer> removed = new LinkedHashMap<>(Map.of("thermalisation", 10));
        Results.EnsembleSummary e = new Results.EnsembleSummary("e", 8, 4, SampledNumber.exact(0.1), 100, 85, Map.of("a", 85), removed, 1, 10, 8, "given", List.of(), List.of());
        Results r = new Results(new Results.StudySummary("s", 1, "jackknife", Map.of()), List.of(e), List.of(), List.of(), List.of(), List.of());
        String text = parsed(r).getDocumentElement().getTextContent();
        assertTrue(text.contains("These counts leave 90 configurations, but 85 were used."), text);
    }

    @Test
    void given_a_figure_with_points_that_are_not_finite_when_written_then_their_number_is_told() {
        Figure f = new Figure("f", "e", "ratio", "R", "", new Figure.Axis("x", false), new Figure.Axis("y", false),
            List.of(new Figure.Points("", List.of(new Figure.Point(1, Double.NaN, 1, true), new Figure.Point(2, 1, 1, true)))));
        Results r = new Results(new Results.StudySummary("s", 1, "jackknife", Map.of()), List.of(), List.of(), List.of(), List.of(f), List.of());
        assertTrue(parsed(r).getDocumentElement().getTextContent().contains("Not drawn, because not finite: 1 point."));
    }

    @Test
    void given_results_without_anything_when_written_then_the_page_still_says_so() {
        String text = parsed(only(List.of(), List.of(), List.of())).getDocumentElement().getTextContent();
        assertTrue(text.contains("asked for no budget") && text.contains("gave no warning"), text);
    }
}
