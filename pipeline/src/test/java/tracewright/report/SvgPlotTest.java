package tracewright.report;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.w3c.dom.Document;
import org.w3c.dom.Element;
import tracewright.results.Figure;

@DisplayNameGeneration(ReplaceUnderscores.class)
class SvgPlotTest {

    private static final Figure.Axis X = new Figure.Axis("t/a", false);
    private static final Figure.Axis Y = new Figure.Axis("a m_{eff}", false);

    private static Figure figure(Figure.Layer... layers) {
        return new Figure("some-plot", "ens", "effective-mass", "Mass of <h> & \"co\"", "Caption with a^{2}.", X, Y, List.of(layers));
    }

    private static Figure.Points plateau(Figure.Point... more) {
        List<Figure.Point> points = new ArrayList<>();
        for (int t = 1; t <= 9; t++) {
            points.add(new Figure.Point(t, t % 2 == 0 ? 0.49 : 0.51, 0.01, true));
        }
        points.addAll(List.of(more));
        return new Figure.Points("points", points);
    }

    private static List<Element> titled(Document svg) {
        return Xml.all(svg, "title").stream().filter(t -> t.getParentNode().getNodeName().equals("g")).toList();
    }

    /** Marker shapes: closed outlines inside a point's group. */
    private static List<String> markers(Document svg) {
        return Xml.all(svg, "path").stream().filter(p -> p.getParentNode().getFirstChild().getNodeName().equals("title"))
            .map(p -> p.getAttribute("d")).filter(d -> d.matches("(?i).*z")).toList();
    }

    @Test
    void given_every_figure_of_the_example_when_drawn_alone_then_it_is_well_formed_and_carries_all_it_needs() {
        for (Figure f : ExampleResults.results().figures()) {
            Element root = Xml.parse(SvgPlot.standalone(f)).getDocumentElement();
            assertEquals("http://www.w3.org/2000/svg", root.getAttribute("xmlns"));
            assertTrue(root.getAttribute("width").endsWith("mm") && root.getAttribute("height").endsWith("mm"));
            assertEquals("img", root.getAttribute("role"));
            assertTrue(root.getAttribute("aria-label").contains(Markup.parse(f.caption()).plain()));
            assertFalse(SvgPlot.standalone(f).contains("class="), "colours of a file must not depend on a page");
        }
    }

    @Test
    void given_a_figure_when_drawn_for_the_page_then_colours_come_from_classes_alone() {
        String svg = SvgPlot.inPage(ExampleResults.results().figures().get(2), "p");
        assertFalse(Pattern.compile("\"#[0-9a-f]{6}\"").matcher(svg).find(), svg);
        assertTrue(svg.contains("class=\"s1\"") && svg.contains("class=\"ink\"") && svg.contains("class=\"faint\""), svg);
        assertFalse(svg.contains("xmlns"));
    }

    @Test
    void given_special_characters_in_every_text_when_drawn_then_they_come_back_from_the_parser() {
        String odd = "<script>alert(1)</script> & \"q\" 'a'";
        Figure f = new Figure("odd", "s", "t", odd, odd, new Figure.Axis(odd, false), new Figure.Axis(odd, false),
            List.of(new Figure.Points(odd, List.of(new Figure.Point(1, 1, 1, true))), new Figure.Line(odd, List.of(new Figure.LinePoint(0, 1)), true)));
        Document svg = Xml.parse(SvgPlot.standalone(f));
        assertEquals(0, Xml.all(svg, "script").size());
        assertEquals(odd + ": " + odd, svg.getDocumentElement().getAttribute("aria-label"));
        assertEquals(3, Xml.all(svg, "text").stream().filter(t -> t.getTextContent().equals(odd)).count());   // two axes, one legend entry of two layers
    }

    @Test
    void given_any_figure_when_drawn_then_coordinates_have_at_most_two_decimals_and_no_word() {
        for (Figure f : ExampleResults.results().figures()) {
            String svg = SvgPlot.standalone(f);
            Matcher d = Pattern.compile(" (?:d|x|y|width|height|dy)=\"([^\"]*)\"").matcher(svg);
            while (d.find()) {
                assertFalse(Pattern.compile("\\.\\d{3}|NaN|Infinity|[0-9]e[-0-9]").matcher(d.group(1)).find(), d.group());
            }
        }
    }

    @Test
    void given_values_that_are_not_finite_when_drawn_then_they_are_left_out() {
        Figure f = figure(plateau(new Figure.Point(3, Double.NaN, 1, true), new Figure.Point(4, 0.5, Double.NaN, true)),
            new Figure.Band("b", List.of(new Figure.BandPoint(1, Double.NaN, 0.5, 0.6), new Figure.BandPoint(2, 0.4, 0.5, 0.6))),
            new Figure.Line("l", List.of(new Figure.LinePoint(Double.POSITIVE_INFINITY, 1)), false));
        String svg = SvgPlot.standalone(f);
        assertEquals(9, titled(Xml.parse(svg)).size());
        assertFalse(svg.contains("NaN") || svg.contains("Infinity"), svg);
    }

    @Test
    void given_points_beyond_the_frame_when_drawn_then_each_has_an_arrowhead_at_the_edge_it_left_by() {
        Document svg = Xml.parse(SvgPlot.standalone(figure(plateau(new Figure.Point(10, 40, 0.01, false), new Figure.Point(11, -40, 0.01, false)))));
        List<String> markers = markers(svg);
        Pattern arrow = Pattern.compile("M([-\\d.]+) ([-\\d.]+)L[-\\d.]+ ([-\\d.]+)L[-\\d.]+ [-\\d.]+Z");
        List<Double> directions = markers.stream().map(arrow::matcher).filter(Matcher::matches)
            .map(m -> Math.signum(Double.parseDouble(m.group(3)) - Double.parseDouble(m.group(2)))).toList();
        assertEquals(List.of(1.0, -1.0), directions);   // on paper y runs down: the foot of an upward arrow lies at larger y
        assertEquals(11, markers.size());
    }

    @Test
    void given_filled_and_open_points_when_drawn_then_only_fitted_ones_are_filled() {
        Document svg = Xml.parse(SvgPlot.standalone(figure(plateau(new Figure.Point(10, 0.5, 0.01, false)))));
        List<String> fills = Xml.all(svg, "path").stream().filter(p -> p.getParentNode().getFirstChild().getNodeName().equals("title"))
            .filter(p -> p.getAttribute("d").endsWith("z")).map(p -> p.getAttribute("fill")).toList();
        assertEquals(9, fills.stream().filter("currentColor"::equals).count());
        assertEquals(1, fills.stream().filter("#ffffff"::equals).count());
    }

    @Test
    void given_a_point_when_pointed_at_then_its_value_error_and_part_in_fits_are_told() {
        Document svg = Xml.parse(SvgPlot.standalone(figure(new Figure.Points("", List.of(new Figure.Point(5, 0.8269, 0.0123, true))))));
        assertEquals("t/a = 5: " + Numbers.paper(0.8269, 0.0123) + ", in a fit", titled(svg).get(0).getTextContent());
    }

    @Test
    void given_two_series_with_equal_abscissas_when_drawn_then_their_markers_do_not_lie_on_each_other() {
        Document svg = Xml.parse(SvgPlot.standalone(figure(plateau(), plateau())));
        List<String> starts = Xml.all(svg, "path").stream().map(p -> p.getAttribute("d")).filter(d -> d.contains("a2.3") || d.contains("h4.1"))
            .map(d -> d.substring(0, d.indexOf(' '))).toList();
        assertEquals(starts.size(), starts.stream().distinct().count(), starts.toString());
    }

    @Test
    void given_any_legend_when_drawn_then_it_stands_below_the_axis_labels_and_inside_the_drawing() {
        Figure f = figure(plateau(), new Figure.Band("a band", List.of(new Figure.BandPoint(1, 0.4, 0.5, 0.6))), new Figure.Line("a line", List.of(new Figure.LinePoint(1, 0.5)), true));
        Document svg = Xml.parse(SvgPlot.standalone(f));
        double axis = yOf(svg, "t/a");
        double height = Double.parseDouble(svg.getDocumentElement().getAttribute("viewBox").split(" ")[3]);
        for (String entry : List.of("points", "a band", "a line")) {
            assertTrue(yOf(svg, entry) > axis && yOf(svg, entry) < height, entry);
        }
    }

    private static double yOf(Document svg, String text) {
        return Xml.all(svg, "text").stream().filter(t -> t.getTextContent().equals(text)).mapToDouble(t -> Double.parseDouble(t.getAttribute("y"))).max().orElseThrow();
    }

    @Test
    void given_a_dashed_and_a_solid_line_when_drawn_then_only_one_has_dashes() {
        List<Figure.LinePoint> ends = List.of(new Figure.LinePoint(0, 1), new Figure.LinePoint(1, 2));
        Document svg = Xml.parse(SvgPlot.standalone(figure(new Figure.Line("", ends, true), new Figure.Line("", ends, false))));
        assertEquals(1, Xml.attributes(svg, "stroke-dasharray").size());
    }

    @Test
    void given_bands_and_lines_when_drawn_then_the_frame_clips_them() {
        Document svg = Xml.parse(SvgPlot.standalone(ExampleResults.results().figures().get(0)));
        String id = Xml.all(svg, "clipPath").get(0).getAttribute("id");
        assertEquals(List.of("url(#" + id + ")"), Xml.attributes(svg, "clip-path"));
    }

    @Test
    void given_a_band_of_one_point_when_drawn_then_it_has_an_area() {
        Document svg = Xml.parse(SvgPlot.standalone(figure(new Figure.Band("", List.of(new Figure.BandPoint(1, 0.4, 0.5, 0.6))))));
        String area = Xml.all(svg, "path").stream().filter(p -> p.getAttribute("fill-opacity").equals("0.22")).map(p -> p.getAttribute("d")).findFirst().orElseThrow();
        String[] corner = area.split("[ML ]");
        assertTrue(Double.parseDouble(corner[3]) > Double.parseDouble(corner[1]) && Double.parseDouble(corner[6]) > Double.parseDouble(corner[2]), area);
    }

    @Test
    void given_bars_when_drawn_then_every_one_has_its_label_and_number_and_negative_ones_run_left_of_zero() {
        Figure f = new Figure("bars", "physical", "budget", "B", "", new Figure.Axis("fraction", true), new Figure.Axis("", false),
            List.of(new Figure.Bars("one", List.of(new Figure.Bar("anomaly", 0.9, 0.03), new Figure.Bar("q", -0.1, 0.02)))));
        Document svg = Xml.parse(SvgPlot.standalone(f));
        List<String> texts = Xml.all(svg, "text").stream().map(Element::getTextContent).toList();
        assertTrue(texts.containsAll(List.of("anomaly", "q", Numbers.paper(0.9, 0.03), Numbers.paper(-0.1, 0.02), "one", "fraction")), texts.toString());
        List<Double> runs = Xml.all(svg, "path").stream().filter(p -> p.getAttribute("fill-opacity").equals("0.75") && p.getParentNode().getFirstChild() != p)
            .map(p -> p.getAttribute("d").split("[ML ]")).map(d -> Double.parseDouble(d[3]) - Double.parseDouble(d[1])).toList();
        assertEquals(List.of(1.0, -1.0), runs.stream().map(Math::signum).toList());
        assertEquals(-9.0, runs.get(0) / runs.get(1), 0.02);   // lengths as 0.9 to -0.1; ends rounded to 0.01 of about 15 units
    }

    @Test
    void given_a_german_machine_when_drawn_then_not_a_byte_changes() {
        Figure f = ExampleResults.results().figures().get(1);
        String expected = SvgPlot.standalone(f);
        Locale before = Locale.getDefault();
        try {
            Locale.setDefault(Locale.forLanguageTag("ar-EG-u-nu-arab"));
            assertEquals(expected, SvgPlot.standalone(f));
            Locale.setDefault(Locale.GERMANY);
            assertEquals(expected, SvgPlot.standalone(f));
        } finally {
            Locale.setDefault(before);
        }
    }

    @Test
    void given_a_figure_without_layers_when_drawn_then_an_empty_frame_remains() {
        Document svg = Xml.parse(SvgPlot.standalone(figure()));
        assertTrue(Xml.all(svg, "text").size() >= 4);
    }
}
