package tracewright.report;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;

@DisplayNameGeneration(ReplaceUnderscores.class)
class HtmlTest {

    @Test
    void given_the_five_special_characters_when_written_then_text_and_attributes_are_escaped() {
        assertEquals("<i t=\"&amp;&lt;&gt;&quot;&#39;\">&amp;&lt;&gt;&quot;&#39;</i>", new Html().leaf("i", "&<>\"'", "t", "&<>\"'").toString());
    }

    @Test
    void given_characters_that_no_document_may_hold_when_written_then_each_is_replaced() {
        // XML 1.0 production [2]: U+0000 to U+001F except tab, line feed and return are excluded, as are lone surrogates and U+FFFE.
        assertEquals("a\ufffdb\ufffdc\ufffd\td", new Html().text("a\u0000b\ud800c\ufffe\td").toString());
    }

    @Test
    void given_a_character_outside_the_basic_plane_when_written_then_it_survives() {
        assertEquals("\ud835\udc40", new Html().text("\ud835\udc40").toString());
    }

    @Test
    void given_elements_closed_in_the_wrong_order_when_written_then_the_open_ones_are_named() {
        Html html = new Html().open("table").open("tr");
        String message = assertThrows(IllegalStateException.class, () -> html.close("table")).getMessage();
        assertTrue(message.contains("<table>") && message.contains("[tr, table]"), message);
    }

    @Test
    void given_an_element_left_open_when_finished_then_it_is_named() {
        String message = assertThrows(IllegalStateException.class, () -> new Html().open("section").toString()).getMessage();
        assertTrue(message.contains("section"), message);
    }
}
