package tracewright.report;

import static org.junit.jupiter.api.Assertions.assertEquals;

import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;

@DisplayNameGeneration(ReplaceUnderscores.class)
class MarkupTest {

    private static String html(String label) {
        Html html = new Html();
        Markup.parse(label).writeHtml(html);
        return html.toString();
    }

    private static String svg(String label) {
        Html svg = new Html();
        Markup.parse(label).writeSvg(svg, 10);
        return svg.toString();
    }

    @Test
    void given_raised_and_lowered_pieces_when_written_as_html_then_they_are_sup_and_sub() {
        assertEquals("a<sup>2</sup> m<sub>\u03c0</sub>/2", html("a^{2} m_{\u03c0}/2"));
    }

    @Test
    void given_raised_and_lowered_pieces_when_written_as_svg_then_every_shift_is_undone() {
        // By hand at size 10: raised by 3.8, lowered by 2; going from raised to lowered is 3.8 + 2 down, back to the line 2 up.
        assertEquals("m<tspan dy=\"-3.8\" font-size=\"7.2\">3</tspan><tspan dy=\"5.8\" font-size=\"7.2\">q</tspan><tspan dy=\"-2\">!</tspan>", svg("m^{3}_{q}!"));
    }

    @Test
    void given_markup_in_a_label_when_written_plainly_then_braces_are_gone() {
        assertEquals("t_sep/a^2", Markup.parse("t_{sep}/a^{2}").plain());
    }

    @ParameterizedTest
    @ValueSource(strings = {"", "a_b", "x^2", "open _{brace", "}{", "tail^", "2pt_source"})
    void given_a_label_without_complete_markup_when_written_then_it_stands_as_it_is(String label) {
        assertEquals(label, html(label));
        assertEquals(label, svg(label));
        assertEquals(label, Markup.parse(label).plain());
    }

    @Test
    void given_tags_inside_markup_when_written_then_they_are_escaped() {
        assertEquals("<sub>&lt;b&gt;</sub>&amp;", html("_{<b>}&"));
    }
}
