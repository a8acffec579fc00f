package tracewright.report;

import java.util.ArrayDeque;
import java.util.Deque;

/**
 * Writes HTML and SVG with every tag closed, so that the text is well-formed XML as well. Values enter through
 * {@link #text} and attributes, which escape; {@link #raw} is for markup that this package made itself.
 */
final class Html {

    private final StringBuilder out = new StringBuilder();
    private final Deque<String> open = new ArrayDeque<>();

    /** Opens an element; attributes come in pairs of name and value. */
    Html open(String tag, String... attributes) {
        start(tag, attributes);
        out.append('>');
        open.push(tag);
        return this;
    }

    /** Closes the innermost open element, which must be {@code tag}. */
    Html close(String tag) {
        if (!tag.equals(open.peek())) {
            throw new IllegalStateException("cannot close <" + tag + ">: the open elements are " + open);
        }
        open.pop();
        out.append("</").append(tag).append('>');
        if (!INLINE.contains(" " + tag + " ")) {
            out.append('\n');
        }
        return this;
    }

    private static final String INLINE = " b i em span a sub sup tspan title button td th abbr strong small code ";

    /** An element without content. */
    Html empty(String tag, String... attributes) {
        start(tag, attributes);
        out.append("/>");
        return this;
    }

    /** An element that holds only text. */
    Html leaf(String tag, String text, String... attributes) {
        return open(tag, attributes).text(text).close(tag);
    }

    Html text(String text) {
        escape(text);
        return this;
    }

    /** Markup made by this package; never a value of the study. */
    Html raw(String markup) {
        out.append(markup);
        return this;
    }

    private void start(String tag, String... attributes) {
        if (attributes.length % 2 != 0) {
            throw new IllegalArgumentException("attributes of <" + tag + "> come in pairs of name and value; got " + attributes.length + " strings");
        }
        out.append('<').append(tag);
        for (int i = 0; i < attributes.length; i += 2) {
            out.append(' ').append(attributes[i]).append("=\"");
            escape(attributes[i + 1]);
            out.append('"');
        }
    }

    private void escape(String text) {
        text.codePoints().forEach(c -> {
            switch (c) {
                case '&' -> out.append("&amp;");
                case '<' -> out.append("&lt;");
                case '>' -> out.append("&gt;");
                case '"' -> out.append("&quot;");
                case '\'' -> out.append("&#39;");
                default -> out.appendCodePoint(allowed(c) ? c : REPLACEMENT);
            }
        });
    }

    private static final int REPLACEMENT = 0xFFFD;

    /** Characters that XML 1.0 allows in a document, production [2] Char. */
    private static boolean allowed(int c) {
        return c == '\t' || c == '\n' || c == '\r' || c >= 0x20 && c < 0xD800 || c >= 0xE000 && c <= REPLACEMENT || c >= 0x10000;
    }

    /** The finished text; every element must be closed. */
    @Override
    public String toString() {
        if (!open.isEmpty()) {
            throw new IllegalStateException("elements left open: " + open);
        }
        return out.toString();
    }
}
