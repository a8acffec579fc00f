package tracewright.report;

import java.util.ArrayList;
import java.util.Collections;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.function.ToDoubleFunction;
import tracewright.results.Figure;

/** One figure of points, bands and lines in a frame with axes; the legend stands below. */
final class CurvePlot {

    private static final double TOP = 12;
    private static final double DATA_HEIGHT = 138;
    private static final double CAP = 1.7;
    private static final double LONE_BAND = 4;
    /** Distance of markers with a shared abscissa, and the widest that their row may become. */
    private static final double SIDE_STEP = 3.4;
    private static final double WIDEST_ROW = 9;

    private final Figure figure;
    private final Paint paint;
    private final Html svg;
    private final Pen pen;
    private final String clipId;
    private final Colouring colours;
    private final PlotFrame frame;
    private final Ticks xTicks;
    private final Ticks yTicks;
    private final Map<Double, Integer> seriesAt = new HashMap<>();
    private final Map<Double, Integer> drawnAt = new HashMap<>();

    CurvePlot(Figure figure, Paint paint, Html svg, String clipId) {
        this.figure = figure;
        this.paint = paint;
        this.svg = svg;
        this.pen = new Pen(svg);
        this.clipId = clipId;
        this.colours = Colouring.of(figure.layers());
        PlotRange x = PlotRange.sideways(figure.layers(), figure.x().zero());
        PlotRange y = PlotRange.upright(figure.layers(), figure.y().zero());
        this.yTicks = Ticks.between(y.low(), y.high());
        double left = 20 + yTicks.list().stream().mapToDouble(t -> Markup.parse(t.label()).width(SvgPlot.FONT)).max().orElse(0);
        this.xTicks = Ticks.across(x.low(), x.high(), SvgPlot.WIDTH - 6 - left);
        this.frame = new PlotFrame(left, TOP, SvgPlot.WIDTH - rightMargin(xTicks), TOP + DATA_HEIGHT, x, y);
    }

    /** Room for half of the last label, which may stand at the very end. */
    private static double rightMargin(Ticks ticks) {
        int last = ticks.list().size() - 1;
        return last < 0 ? 6 : Math.max(6, 0.5 * Markup.parse(ticks.list().get(last).label()).width(SvgPlot.FONT));
    }

    /** Writes the drawing; returns its height. */
    double draw() {
        countSharedAbscissas();
        ground();
        clip();
        layers(Figure.Band.class, this::band);
        layers(Figure.Line.class, this::line);
        svg.close("g");
        layers(Figure.Points.class, this::points);
        axes();
        return new Legend(figure.layers(), colours, paint, svg).draw(frame.bottom() + 30);
    }

    private interface LayerPainter<T> {
        void paint(T layer, String[] colour, int shape);
    }

    private <T extends Figure.Layer> void layers(Class<T> kind, LayerPainter<T> painter) {
        for (int i = 0; i < figure.layers().size(); i++) {
            if (kind.isInstance(figure.layers().get(i))) {
                String[] colour = colours.attributes(i, paint);
                svg.open("g", colour);
                painter.paint(kind.cast(figure.layers().get(i)), colour, colours.series(i));
                svg.close("g");
            }
        }
    }

    /** Guide lines at the ticks, faint and behind everything. */
    private void ground() {
        Pen.Path guides = new Pen.Path();
        yTicks.list().forEach(t -> guides.move(frame.left(), frame.py(t.value())).line(frame.right(), frame.py(t.value())));
        xTicks.list().forEach(t -> guides.move(frame.px(t.value()), frame.top()).line(frame.px(t.value()), frame.bottom()));
        svg.open("g", paint.faint());
        pen.stroke(guides, 0.4);
        svg.close("g");
    }

    private void clip() {
        svg.open("clipPath", "id", clipId);
        svg.empty("rect", "x", Numbers.coordinate(frame.left()), "y", Numbers.coordinate(frame.top()),
            "width", Numbers.coordinate(frame.right() - frame.left()), "height", Numbers.coordinate(frame.bottom() - frame.top()));
        svg.close("clipPath");
        svg.open("g", "clip-path", "url(#" + clipId + ")");
    }

    /** A place of a band on paper. */
    private record Slice(double x, double low, double mid, double high) {
    }

    private void band(Figure.Band band, String[] colour, int shape) {
        List<Slice> slices = slices(band.points().stream().filter(PlotRange::drawable).toList());
        List<Slice> backwards = new ArrayList<>(slices);
        Collections.reverse(backwards);
        Pen.Path area = new Pen.Path();
        slices.forEach(s -> area.on(s.x, s.high));
        backwards.forEach(s -> area.on(s.x, s.low));
        pen.area(area, "0.22");
        edge(slices, Slice::high, 0.4, "stroke-opacity", "0.6");
        edge(slices, Slice::low, 0.4, "stroke-opacity", "0.6");
        edge(slices, Slice::mid, 0.9);
    }

    /** A band of a single point gets a width of its own, or nobody would see it. */
    private List<Slice> slices(List<Figure.BandPoint> points) {
        List<Slice> slices = new ArrayList<>();
        for (double step : points.size() == 1 ? new double[] {-LONE_BAND, LONE_BAND} : new double[] {0}) {
            points.forEach(p -> slices.add(new Slice(frame.px(p.x()) + step, paperY(p.low()), paperY(p.mid()), paperY(p.high()))));
        }
        return slices;
    }

    private void edge(List<Slice> slices, ToDoubleFunction<Slice> height, double width, String... more) {
        Pen.Path path = new Pen.Path();
        slices.forEach(s -> path.on(s.x, height.applyAsDouble(s)));
        pen.stroke(path, width, more);
    }

    private void line(Figure.Line line, String[] colour, int shape) {
        Pen.Path path = new Pen.Path();
        line.points().stream().filter(PlotRange::drawable).forEach(p -> path.on(frame.px(p.x()), paperY(p.y())));
        if (line.dashed()) {
            pen.stroke(path, 0.9, "stroke-dasharray", "4 2.5");
        } else {
            pen.stroke(path, 0.9);
        }
    }

    /** Far outside the frame the place no longer matters; renderers choke on coordinates of many digits. */
    private double paperY(double y) {
        return Math.max(-5000, Math.min(5000, frame.py(y)));
    }

    private void countSharedAbscissas() {
        for (Figure.Layer layer : figure.layers()) {
            if (layer instanceof Figure.Points p) {
                p.points().stream().filter(PlotRange::drawable).map(Figure.Point::x).distinct().forEach(x -> seriesAt.merge(x, 1, Integer::sum));
            }
        }
    }

    private void points(Figure.Points layer, String[] colour, int shape) {
        List<Figure.Point> points = layer.points().stream().filter(PlotRange::drawable).toList();
        for (Figure.Point p : points) {
            point(p, Series.of(Math.max(shape, 0)), frame.px(p.x()) + sideStep(p.x()));
        }
        points.stream().map(Figure.Point::x).distinct().forEach(x -> drawnAt.merge(x, 1, Integer::sum));
    }

    private double sideStep(double x) {
        int gaps = seriesAt.get(x) - 1;
        double step = gaps == 0 ? 0 : Math.min(SIDE_STEP, WIDEST_ROW / gaps);
        return step * (drawnAt.getOrDefault(x, 0) - 0.5 * gaps);
    }

    private void point(Figure.Point p, Series series, double px) {
        svg.open("g");
        svg.leaf("title", Markup.parse(figure.x().label()).plain() + " = " + Numbers.paper(p.x(), p.xError()) + ": "
            + Numbers.paper(p.y(), p.error()) + (p.filled() ? ", in a fit" : ", in no fit"));
        errorBars(p, px);
        if (p.y() > frame.y().high()) {
            pen.arrowhead(px, frame.top() + 0.8, 1, p.filled(), paint);
        } else if (p.y() < frame.y().low()) {
            pen.arrowhead(px, frame.bottom() - 0.8, -1, p.filled(), paint);
        } else {
            pen.marker(series.marker(px, frame.py(p.y())), p.filled(), paint);
        }
        svg.close("g");
    }

    private void errorBars(Figure.Point p, double px) {
        double up = p.y() + p.error();
        double down = p.y() - p.error();
        Pen.Path bars = new Pen.Path();
        if (p.error() > 0 && up >= frame.y().low() && down <= frame.y().high()) {
            bars.move(px, frame.py(frame.y().clamp(down))).line(px, frame.py(frame.y().clamp(up)));
            if (p.y() <= frame.y().high()) {
                cap(bars, px, up, 1);
            }
            if (p.y() >= frame.y().low()) {
                cap(bars, px, down, -1);
            }
        }
        if (p.xError() > 0 && frame.y().holds(p.y())) {
            double y = frame.py(p.y());
            double left = frame.px(frame.x().clamp(p.x() - p.xError()));
            double right = frame.px(frame.x().clamp(p.x() + p.xError()));
            bars.move(left, y).line(right, y).move(left, y - CAP).line(left, y + CAP).move(right, y - CAP).line(right, y + CAP);
        }
        pen.stroke(bars, 0.8);
    }

    /** A cap at the end of an error bar, or a small tip where the frame cuts it off. */
    private void cap(Pen.Path bars, double px, double end, int direction) {
        double y = frame.py(frame.y().clamp(end));
        if (frame.y().holds(end)) {
            bars.move(px - CAP, y).line(px + CAP, y);
        } else {
            bars.move(px - CAP, y + 2.6 * direction).line(px, y + 0.4 * direction).line(px + CAP, y + 2.6 * direction);
        }
    }

    private void axes() {
        svg.open("g", paint.ink());
        Pen.Path box = new Pen.Path().move(frame.left(), frame.top()).line(frame.left(), frame.bottom()).line(frame.right(), frame.bottom());
        xTicks.list().forEach(t -> box.move(frame.px(t.value()), frame.bottom()).line(frame.px(t.value()), frame.bottom() + 2.5));
        yTicks.list().forEach(t -> box.move(frame.left(), frame.py(t.value())).line(frame.left() - 2.5, frame.py(t.value())));
        pen.stroke(box, 0.7);
        xTicks.list().forEach(t -> pen.text(Markup.parse(t.label()), frame.px(t.value()), frame.bottom() + 10.5, "middle"));
        yTicks.list().forEach(t -> pen.text(Markup.parse(t.label()), frame.left() - 4, frame.py(t.value()), "end", "dy", ".35em"));
        labels();
        svg.close("g");
    }

    private void labels() {
        double middle = 0.5 * (frame.left() + frame.right());
        double centre = 0.5 * (frame.top() + frame.bottom());
        double room = frame.right() - frame.left() - (xTicks.power() == 0 ? 0 : 60);
        pen.textWithin(room, Markup.parse(figure.x().label()), middle, frame.bottom() + 21.5, "middle");
        String upright = "rotate(-90 8.5 " + Numbers.coordinate(centre) + ")";
        pen.textWithin(DATA_HEIGHT + 20, Markup.parse(figure.y().label()), 8.5, centre, "middle", "transform", upright);
        power(xTicks, frame.right(), frame.bottom() + 21.5, "end");
        power(yTicks, frame.left(), frame.top() - 3.5, "middle");
    }

    private void power(Ticks ticks, double x, double y, String anchor) {
        if (ticks.power() != 0) {
            pen.text(Markup.parse("\u00d710^{" + Integer.toString(ticks.power()).replace('-', '\u2212') + "}"), x, y, anchor);
        }
    }
}
