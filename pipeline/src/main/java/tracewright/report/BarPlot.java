package tracewright.report;

import java.util.List;
import java.util.Optional;
import tracewright.results.Figure;

/** Horizontal bars with errors, one row per label and within it one bar per series; names stand left, numbers right, the legend below. */
final class BarPlot {

    private static final double TOP = 8;
    private static final double THICKNESS = 9.5;
    private static final double GAP = 8;
    private static final double WIDEST_LABEL = 95;

    private final Figure figure;
    private final Paint paint;
    private final Html svg;
    private final Pen pen;
    private final Colouring colours;
    private final List<String> labels;
    private final int perRow;
    private final PlotFrame frame;
    private final Ticks ticks;

    BarPlot(Figure figure, Paint paint, Html svg) {
        this.figure = figure;
        this.paint = paint;
        this.svg = svg;
        this.pen = new Pen(svg);
        this.colours = Colouring.of(figure.layers());
        List<Figure.Bars> series = figure.layers().stream().filter(Figure.Bars.class::isInstance).map(Figure.Bars.class::cast).toList();
        this.labels = series.stream().flatMap(b -> b.bars().stream()).map(Figure.Bar::label).distinct().toList();
        this.perRow = series.size();
        this.frame = frame(series.stream().flatMap(b -> b.bars().stream()).filter(PlotRange::drawable).toList());
        this.ticks = Ticks.across(frame.x().low(), frame.x().high(), frame.right() - frame.left());
    }

    /** Names stand left of the frame, numbers right of it. */
    private PlotFrame frame(List<Figure.Bar> bars) {
        double left = Math.min(10 + widest(labels), WIDEST_LABEL);
        double right = SvgPlot.WIDTH - 12 - widest(bars.stream().map(BarPlot::number).toList());
        double bottom = TOP + labels.size() * (perRow * THICKNESS + GAP);
        return new PlotFrame(left, TOP, right, bottom, PlotRange.ofBars(bars), new PlotRange(0, 1));
    }

    private static double widest(List<String> texts) {
        return texts.stream().mapToDouble(t -> Markup.parse(t).width(SvgPlot.FONT)).max().orElse(0);
    }

    private static String number(Figure.Bar bar) {
        return Numbers.paper(bar.value(), bar.error());
    }

    /** Writes the drawing; returns its height. */
    double draw() {
        guides();
        int seriesNumber = 0;
        for (int i = 0; i < figure.layers().size(); i++) {
            if (figure.layers().get(i) instanceof Figure.Bars b) {
                series(b, i, seriesNumber++);
            }
        }
        axis();
        return new Legend(figure.layers(), colours, paint, svg).draw(frame.bottom() + 30);
    }

    private void guides() {
        Pen.Path lines = new Pen.Path();
        ticks.list().forEach(t -> lines.move(frame.px(t.value()), frame.top()).line(frame.px(t.value()), frame.bottom()));
        svg.open("g", paint.faint());
        pen.stroke(lines, 0.4);
        svg.close("g");
    }

    private void series(Figure.Bars layer, int index, int number) {
        svg.open("g", colours.attributes(index, paint));
        for (int row = 0; row < labels.size(); row++) {
            String label = labels.get(row);
            Optional<Figure.Bar> bar = layer.bars().stream().filter(b -> b.label().equals(label) && PlotRange.drawable(b)).findFirst();
            double y = rowTop(row) + number * THICKNESS;
            bar.ifPresent(b -> bar(b, y));
        }
        svg.close("g");
    }

    private double rowTop(int row) {
        return frame.top() + 0.5 * GAP + row * (perRow * THICKNESS + GAP);
    }

    private void bar(Figure.Bar b, double top) {
        double y = top + 0.5 * THICKNESS;
        double foot = frame.px(0);
        double end = frame.px(b.value());
        svg.open("g");
        svg.leaf("title", Markup.parse(b.label()).plain() + ": " + number(b));
        pen.area(new Pen.Path().move(foot, top + 0.8).line(end, top + 0.8).line(end, top + THICKNESS - 0.8).line(foot, top + THICKNESS - 0.8).close(), "0.75");
        if (b.error() > 0) {
            svg.open("g", paint.ink());
            pen.stroke(whisker(b, y), 0.8);
            svg.close("g");
        }
        svg.open("g", paint.ink());
        pen.text(Markup.parse(number(b)), SvgPlot.WIDTH - 6, y, "end", "dy", ".35em");
        svg.close("g");
        svg.close("g");
    }

    private Pen.Path whisker(Figure.Bar b, double y) {
        double low = frame.px(frame.x().clamp(b.value() - b.error()));
        double high = frame.px(frame.x().clamp(b.value() + b.error()));
        Pen.Path path = new Pen.Path().move(low, y).line(high, y);
        tip(path, low, y, frame.x().holds(b.value() - b.error()), 1);
        tip(path, high, y, frame.x().holds(b.value() + b.error()), -1);
        return path;
    }

    private static void tip(Pen.Path path, double x, double y, boolean whole, int inwards) {
        if (whole) {
            path.move(x, y - 2).line(x, y + 2);
        } else {
            path.move(x + 2.6 * inwards, y - 2).line(x, y).line(x + 2.6 * inwards, y + 2);
        }
    }

    private void axis() {
        svg.open("g", paint.ink());
        double foot = frame.px(0);
        Pen.Path lines = new Pen.Path().move(foot, frame.top()).line(foot, frame.bottom());
        lines.move(frame.left(), frame.bottom()).line(frame.right(), frame.bottom());
        ticks.list().forEach(t -> lines.move(frame.px(t.value()), frame.bottom()).line(frame.px(t.value()), frame.bottom() + 2.5));
        pen.stroke(lines, 0.7);
        ticks.list().forEach(t -> pen.text(Markup.parse(t.label()), frame.px(t.value()), frame.bottom() + 10.5, "middle"));
        for (int row = 0; row < labels.size(); row++) {
            pen.textWithin(frame.left() - 6, Markup.parse(labels.get(row)), frame.left() - 4, rowTop(row) + 0.5 * perRow * THICKNESS, "end", "dy", ".35em");
        }
        String power = ticks.power() == 0 ? "" : " [10^{" + Integer.toString(ticks.power()).replace('-', '\u2212') + "}]";
        double middle = 0.5 * (frame.left() + frame.right());
        pen.textWithin(frame.right() - frame.left() + 40, Markup.parse(figure.x().label() + power), middle, frame.bottom() + 21.5, "middle");
        svg.close("g");
    }
}
