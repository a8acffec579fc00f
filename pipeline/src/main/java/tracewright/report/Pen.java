package tracewright.report;

/** Small strokes that all plots share. */
final class Pen {

    private final Html svg;

    Pen(Html svg) {
        this.svg = svg;
    }

    /** A path under construction, absolute coordinates. */
    static final class Path {
        private final StringBuilder d = new StringBuilder();

        Path move(double x, double y) {
            return to('M', x, y);
        }

        Path line(double x, double y) {
            return to('L', x, y);
        }

        /** A line to the point; for the first one, its start. */
        Path on(double x, double y) {
            return isEmpty() ? move(x, y) : line(x, y);
        }

        Path close() {
            d.append('Z');
            return this;
        }

        private Path to(char command, double x, double y) {
            d.append(command).append(Numbers.coordinate(x)).append(' ').append(Numbers.coordinate(y));
            return this;
        }

        boolean isEmpty() {
            return d.length() == 0;
        }

        @Override
        public String toString() {
            return d.toString();
        }
    }

    /** A line in the colour of the group; more attributes may follow. */
    void stroke(Path path, double width, String... more) {
        if (!path.isEmpty()) {
            svg.empty("path", join(more, "d", path.toString(), "fill", "none", "stroke", "currentColor", "stroke-width", Numbers.coordinate(width)));
        }
    }

    /** An area in the colour of the group, shining through. */
    void area(Path path, String opacity) {
        if (!path.isEmpty()) {
            svg.empty("path", "d", path.toString(), "fill", "currentColor", "fill-opacity", opacity);
        }
    }

    /** A marker, filled with the colour of the group or open. */
    void marker(String outline, boolean filled, Paint paint) {
        String[] shape = {"d", outline, "stroke", "currentColor", "stroke-width", "0.9"};
        svg.empty("path", filled ? join(shape, "fill", "currentColor") : join(shape, paint.paper()));
    }

    /** A triangle of height four that points up (direction 1) or down (-1), its tip at (x, y). */
    void arrowhead(double x, double y, int direction, boolean filled, Paint paint) {
        double foot = y + 4 * direction;
        marker(new Path().move(x, y).line(x + 2.4, foot).line(x - 2.4, foot).close().toString(), filled, paint);
    }

    void text(Markup label, double x, double y, String anchor, String... more) {
        text(SvgPlot.FONT, label, x, y, anchor, more);
    }

    /** A text that is set smaller where it might not fit into its room. */
    void textWithin(double room, Markup label, double x, double y, String anchor, String... more) {
        double width = label.width(SvgPlot.FONT);
        if (width <= room) {
            text(SvgPlot.FONT, label, x, y, anchor, more);
        } else {
            double size = SvgPlot.FONT * room / width;
            text(size, label, x, y, anchor, join(more, "font-size", Numbers.coordinate(size)));
        }
    }

    private void text(double size, Markup label, double x, double y, String anchor, String... more) {
        svg.open("text", join(more, "x", Numbers.coordinate(x), "y", Numbers.coordinate(y), "text-anchor", anchor, "fill", "currentColor"));
        label.writeSvg(svg, size);
        svg.close("text");
    }

    static String[] join(String[] more, String... first) {
        String[] all = new String[first.length + more.length];
        System.arraycopy(first, 0, all, 0, first.length);
        System.arraycopy(more, 0, all, first.length, more.length);
        return all;
    }
}
