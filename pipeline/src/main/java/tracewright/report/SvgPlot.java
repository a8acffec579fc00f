package tracewright.report;

import static java.util.Objects.requireNonNull;

import tracewright.results.Figure;

/**
 * Draws a {@link Figure} as SVG text, the width of one column of a two-column paper: one drawing unit is one point, labels are
 * eight points high. Text is never measured, so the same figure gives the same bytes on any machine.
 *
 * <p>Labels may hold {@code _{lowered}} and {@code ^{raised}} pieces. Points that have the same abscissa in several series are
 * drawn side by side. What is not finite is left out.
 */
public final class SvgPlot {

    /** Width of the drawing; 255 points are 90 mm. */
    static final double WIDTH = 255;

    static final double FONT = 8;

    private SvgPlot() {
    }

    /** A file of its own: XML with name space, size in millimetres and colours written out. */
    public static String standalone(Figure figure) {
        return "<?xml version=\"1.0\" encoding=\"UTF-8\"?>\n" + draw(figure, Paint.STANDALONE, requireNonNull(figure, "figure").id());
    }

    /**
     * For a page that brings the classes {@code s1 .. s6}, {@code ink}, {@code faint} and {@code paper}.
     *
     * @param uniqueId prefix of the ids inside, to be used once per page
     */
    static String inPage(Figure figure, String uniqueId) {
        return draw(figure, Paint.PAGE, uniqueId);
    }

    private static String draw(Figure figure, Paint paint, String id) {
        boolean bars = figure.layers().stream().anyMatch(Figure.Bars.class::isInstance);
        Html body = new Html();
        double height = bars ? new BarPlot(figure, paint, body).draw() : new CurvePlot(figure, paint, body, id + "-clip").draw();
        return wrapped(figure, paint, height, body.toString());
    }

    private static String wrapped(Figure figure, Paint paint, double height, String body) {
        Html svg = new Html();
        String size = Numbers.coordinate(WIDTH) + " " + Numbers.coordinate(height);
        String label = alternativeText(figure);
        if (paint == Paint.PAGE) {
            svg.open("svg", "viewBox", "0 0 " + size, "role", "img", "aria-label", label, "class", "plot");
        } else {
            svg.open("svg", "xmlns", "http://www.w3.org/2000/svg", "viewBox", "0 0 " + size, "width", millimetres(WIDTH), "height", millimetres(height),
                "role", "img", "aria-label", label);
            svg.leaf("title", Markup.parse(figure.title()).plain());
            svg.empty("rect", "width", Numbers.coordinate(WIDTH), "height", Numbers.coordinate(height), "fill", "#ffffff");
        }
        svg.open("g", "font-family", "Helvetica, Arial, 'Liberation Sans', sans-serif", "font-size", Numbers.coordinate(FONT), "stroke-linejoin", "round");
        return svg.raw(body).close("g").close("svg").toString();
    }

    /** A point is 1/72 inch. */
    private static String millimetres(double points) {
        return Numbers.coordinate(points * 25.4 / 72) + "mm";
    }

    /** Title and caption as plain text. */
    static String alternativeText(Figure figure) {
        String title = Markup.parse(figure.title()).plain();
        String caption = Markup.parse(figure.caption()).plain();
        return caption.isBlank() ? title : title.isBlank() ? caption : title + ": " + caption;
    }
}
