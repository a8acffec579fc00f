package tracewright.report;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import tracewright.results.Figure;

/** The legend of a plot, in one or two columns below everything else, so that it never covers data. Layers of one legend share an entry. */
final class Legend {

    private static final double ROW = 11;
    private static final double SWATCH = 16;

    private final List<Figure.Layer> layers;
    private final Colouring colours;
    private final Paint paint;
    private final Html svg;
    private final Pen pen;

    Legend(List<Figure.Layer> layers, Colouring colours, Paint paint, Html svg) {
        this.layers = layers;
        this.colours = colours;
        this.paint = paint;
        this.svg = svg;
        this.pen = new Pen(svg);
    }

    /** Draws below {@code top}; returns the height of the drawing. */
    double draw(double top) {
        Map<String, List<Integer>> entries = entries();
        double widest = entries.keySet().stream().mapToDouble(l -> Markup.parse(l).width(SvgPlot.FONT)).max().orElse(0);
        int columns = Math.max(1, Math.min(3, (int) ((SvgPlot.WIDTH - 10) / (widest + SWATCH + 12))));
        double width = (SvgPlot.WIDTH - 10) / columns;
        int at = 0;
        for (Map.Entry<String, List<Integer>> e : entries.entrySet()) {
            entry(e.getKey(), e.getValue(), 8 + width * (at % columns), top + ROW * (at / columns));
            at++;
        }
        int rows = (at + columns - 1) / columns;
        return top + ROW * rows - (rows == 0 ? 4 : 0);
    }

    private Map<String, List<Integer>> entries() {
        Map<String, List<Integer>> byLegend = new LinkedHashMap<>();
        for (int i = 0; i < layers.size(); i++) {
            if (!layers.get(i).legend().isEmpty()) {
                byLegend.computeIfAbsent(layers.get(i).legend(), k -> new ArrayList<>()).add(i);
            }
        }
        return byLegend;
    }

    private void entry(String legend, List<Integer> members, double x, double y) {
        members.stream().filter(i -> !(layers.get(i) instanceof Figure.Points)).forEach(i -> swatch(i, x, y));
        members.stream().filter(i -> layers.get(i) instanceof Figure.Points).forEach(i -> swatch(i, x, y));
        svg.open("g", paint.ink());
        pen.textWithin(SvgPlot.WIDTH - x - SWATCH - 6, Markup.parse(legend), x + SWATCH + 4, y, "start", "dy", ".35em");
        svg.close("g");
    }

    private void swatch(int i, double x, double y) {
        svg.open("g", colours.attributes(i, paint));
        Figure.Layer layer = layers.get(i);
        Pen.Path across = new Pen.Path().move(x, y).line(x + SWATCH, y);
        Pen.Path box = new Pen.Path().move(x, y - 3.5).line(x + SWATCH, y - 3.5).line(x + SWATCH, y + 3.5).line(x, y + 3.5).close();
        if (layer instanceof Figure.Band) {
            pen.area(box, "0.22");
            pen.stroke(across, 0.9);
        } else if (layer instanceof Figure.Line line) {
            pen.stroke(across, 0.9, "stroke-dasharray", line.dashed() ? "4 2.5" : "none");
        } else if (layer instanceof Figure.Bars) {
            pen.area(box, "0.75");
        } else {
            double middle = x + 0.5 * SWATCH;
            pen.stroke(new Pen.Path().move(middle, y - 4.8).line(middle, y + 4.8), 0.8);
            boolean filled = layer instanceof Figure.Points p && (p.points().isEmpty() || p.points().stream().anyMatch(Figure.Point::filled));
            pen.marker(Series.of(Math.max(colours.series(i), 0)).marker(middle, y), filled, paint);
        }
        svg.close("g");
    }
}
