package tracewright.report;

import java.util.ArrayList;
import java.util.List;

/**
 * A label with raised and lowered pieces: {@code a^{2}} and {@code t_{sep}}. Nothing else is special, pieces do not nest, and
 * an underscore or caret without a brace, or a brace that is never closed, stands for itself.
 */
final class Markup {

    /** A piece of a label; level is 1 for raised, -1 for lowered, 0 on the line. */
    record Run(String text, int level) {
    }

    private final List<Run> runs;

    private Markup(List<Run> runs) {
        this.runs = runs;
    }

    static Markup parse(String label) {
        List<Run> runs = new ArrayList<>();
        int start = 0;
        for (int at = nextMark(label, 0); at >= 0; at = nextMark(label, start)) {
            int end = label.indexOf('}', at);
            add(runs, label.substring(start, at), 0);
            add(runs, label.substring(at + 2, end), label.charAt(at) == '^' ? 1 : -1);
            start = end + 1;
        }
        add(runs, label.substring(start), 0);
        return new Markup(List.copyOf(runs));
    }

    /** Place of the next complete {@code _{...}} or {@code ^{...}}, or -1. */
    private static int nextMark(String label, int from) {
        for (int i = from; i + 1 < label.length(); i++) {
            char c = label.charAt(i);
            if ((c == '_' || c == '^') && label.charAt(i + 1) == '{') {
                return label.indexOf('}', i) < 0 ? -1 : i;
            }
        }
        return -1;
    }

    private static void add(List<Run> runs, String text, int level) {
        if (!text.isEmpty()) {
            runs.add(new Run(text, level));
        }
    }

    List<Run> runs() {
        return runs;
    }

    /** For alternative texts and tables of plain text: {@code a^2}, {@code t_sep}. */
    String plain() {
        StringBuilder text = new StringBuilder();
        for (Run r : runs) {
            text.append(r.level == 0 ? "" : r.level > 0 ? "^" : "_").append(r.text);
        }
        return text.toString();
    }

    /** As HTML with {@code sub} and {@code sup}. */
    void writeHtml(Html html) {
        for (Run r : runs) {
            if (r.level == 0) {
                html.text(r.text);
            } else {
                html.leaf(r.level > 0 ? "sup" : "sub", r.text);
            }
        }
    }

    /** As the content of an SVG text element of the given font size; shifts are undone before the next piece. */
    void writeSvg(Html svg, double fontSize) {
        double before = 0;
        for (Run r : runs) {
            double shift = r.level == 0 ? 0 : r.level > 0 ? -0.38 * fontSize : 0.2 * fontSize;
            if (r.level == 0 && before == 0) {
                svg.text(r.text);
            } else if (r.level == 0) {
                svg.leaf("tspan", r.text, "dy", Numbers.coordinate(shift - before));
            } else {
                svg.leaf("tspan", r.text, "dy", Numbers.coordinate(shift - before), "font-size", Numbers.coordinate(0.72 * fontSize));
            }
            before = shift;
        }
    }

    /** A generous guess of the width, for the layout of legends: text is never measured, so that output does not depend on fonts. */
    double width(double fontSize) {
        double em = 0;
        for (Run r : runs) {
            em += r.text.codePointCount(0, r.text.length()) * (r.level == 0 ? 0.56 : 0.4);
        }
        return em * fontSize;
    }
}
