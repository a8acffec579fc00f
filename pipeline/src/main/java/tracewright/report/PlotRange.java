package tracewright.report;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.stream.DoubleStream;
import java.util.stream.Stream;
import tracewright.results.Figure;

/**
 * The piece of an axis that a plot shows, low below high.
 *
 * <p>Upright, the range belongs to what was fitted: filled points of ordinary error and bands, with their errors. Other
 * points and lines may widen it, up to {@link #GENEROSITY} times its width on either side; what lies beyond is drawn as an
 * arrowhead at the edge. So a correlator's noisy tail cannot squash its plateau.
 */
record PlotRange(double low, double high) {

    /** How far, in widths of the fitted region, other points may stretch the range on each side. */
    private static final double GENEROSITY = 1.5;

    /** A point whose error is larger than this many times the median counts as noise. */
    private static final double QUIET = 5;

    /** Free paper at both ends, as a part of the range. */
    private static final double MARGIN = 0.06;

    /** Narrowest range in units of the size of its ends; below it a constant would be drawn as its rounding errors. */
    private static final double NARROWEST = 1e-7;

    PlotRange {
        if (!(low < high)) {
            throw new IllegalArgumentException("a range from " + low + " to " + high + " is empty");
        }
    }

    boolean holds(double x) {
        return low <= x && x <= high;
    }

    double clamp(double x) {
        return Math.max(low, Math.min(high, x));
    }

    /** Upright range of points, bands and lines. */
    static PlotRange upright(List<Figure.Layer> layers, boolean zero) {
        List<Figure.Point> points = points(layers);
        double quietFilled = QUIET * medianError(points.stream().filter(Figure.Point::filled).toList());
        Extent core = new Extent();
        points.stream().filter(p -> p.filled() && p.error() <= quietFilled).forEach(p -> core.add(p.y(), p.error()));
        bands(layers).forEach(b -> core.add(b.low(), 0).add(b.high(), 0));
        if (core.isEmpty()) {
            double quiet = QUIET * medianError(points);
            points.stream().filter(p -> p.error() <= quiet).forEach(p -> core.add(p.y(), p.error()));
        }
        Extent whole = core.isEmpty() ? linesOnly(layers) : widened(core, points, layers);
        return whole.range(zero);
    }

    private static Extent linesOnly(List<Figure.Layer> layers) {
        Extent e = new Extent();
        lines(layers).forEach(l -> l.points().forEach(p -> e.add(p.y(), 0)));
        return e;
    }

    private static Extent widened(Extent core, List<Figure.Point> points, List<Figure.Layer> layers) {
        double reach = GENEROSITY * Math.max(core.high - core.low, NARROWEST * core.size());
        double lowest = core.low - reach;
        double highest = core.high + reach;
        Extent all = new Extent().add(core.low, 0).add(core.high, 0);
        for (Figure.Point p : points) {
            if (p.y() >= lowest && p.y() <= highest && p.error() <= highest - lowest) {
                all.add(Math.max(lowest, p.y() - p.error()), 0).add(Math.min(highest, p.y() + p.error()), 0);
            }
        }
        lines(layers).forEach(l -> addLine(all, l, lowest, highest));
        return all;
    }

    /** The visible part of a line; of one that would be out of sight altogether, its nearest point. */
    private static void addLine(Extent all, Figure.Line line, double lowest, double highest) {
        double[] y = line.points().stream().mapToDouble(Figure.LinePoint::y).filter(Double::isFinite).toArray();
        double[] inside = Arrays.stream(y).filter(v -> v >= lowest && v <= highest).toArray();
        if (inside.length > 0) {
            Arrays.stream(inside).forEach(v -> all.add(v, 0));
        } else {
            double middle = 0.5 * (lowest + highest);
            Arrays.stream(y).boxed().min((a, b) -> Double.compare(Math.abs(a - middle), Math.abs(b - middle))).ifPresent(v -> all.add(v, 0));
        }
    }

    /** Sideways range: everything that has a place. */
    static PlotRange sideways(List<Figure.Layer> layers, boolean zero) {
        Extent e = new Extent();
        points(layers).forEach(p -> e.add(p.x(), p.xError()));
        bands(layers).forEach(b -> e.add(b.x(), 0));
        lines(layers).forEach(l -> l.points().forEach(p -> e.add(p.x(), 0)));
        return e.range(zero);
    }

    /** Range of horizontal bars; their foot, zero, is always inside. */
    static PlotRange ofBars(List<Figure.Bar> bars) {
        double quiet = QUIET * Math.max(medianOf(bars.stream().mapToDouble(Figure.Bar::error)), 0);
        double widest = bars.stream().mapToDouble(b -> Math.abs(b.value())).filter(Double::isFinite).max().orElse(1);
        Extent e = new Extent();
        bars.forEach(b -> e.add(b.value(), Math.min(b.error(), Math.max(quiet, widest))));
        return e.range(true);
    }

    private static double medianError(List<Figure.Point> points) {
        return medianOf(points.stream().mapToDouble(Figure.Point::error));
    }

    private static double medianOf(DoubleStream errors) {
        double[] e = errors.filter(Double::isFinite).sorted().toArray();
        return e.length == 0 ? 0 : e[e.length / 2];
    }

    /** Points that can be drawn: finite in place and error. */
    static boolean drawable(Figure.Point p) {
        return Double.isFinite(p.x()) && Double.isFinite(p.y()) && p.error() >= 0 && Double.isFinite(p.error())
            && p.xError() >= 0 && Double.isFinite(p.xError());
    }

    static boolean drawable(Figure.BandPoint p) {
        return Double.isFinite(p.x()) && Double.isFinite(p.low()) && Double.isFinite(p.mid()) && Double.isFinite(p.high());
    }

    static boolean drawable(Figure.LinePoint p) {
        return Double.isFinite(p.x()) && Double.isFinite(p.y());
    }

    static boolean drawable(Figure.Bar b) {
        return Double.isFinite(b.value()) && b.error() >= 0 && Double.isFinite(b.error());
    }

    private static List<Figure.Point> points(List<Figure.Layer> layers) {
        List<Figure.Point> all = new ArrayList<>();
        only(layers, Figure.Points.class).forEach(l -> l.points().stream().filter(PlotRange::drawable).forEach(all::add));
        return all;
    }

    private static Stream<Figure.BandPoint> bands(List<Figure.Layer> layers) {
        return only(layers, Figure.Band.class).flatMap(b -> b.points().stream()).filter(PlotRange::drawable);
    }

    private static Stream<Figure.Line> lines(List<Figure.Layer> layers) {
        return only(layers, Figure.Line.class);
    }

    private static <T> Stream<T> only(List<Figure.Layer> layers, Class<T> kind) {
        return layers.stream().filter(kind::isInstance).map(kind::cast);
    }

    /** Smallest and largest of what was added; values that are not finite are passed over. */
    private static final class Extent {
        private double low = Double.POSITIVE_INFINITY;
        private double high = Double.NEGATIVE_INFINITY;

        Extent add(double x, double error) {
            if (Double.isFinite(x) && Double.isFinite(error)) {
                low = Math.min(low, x - error);
                high = Math.max(high, x + error);
            }
            return this;
        }

        boolean isEmpty() {
            return low > high;
        }

        double size() {
            return Math.max(Math.abs(low), Math.abs(high));
        }

        PlotRange range(boolean zero) {
            if (isEmpty()) {
                return new PlotRange(0, 1);
            }
            if (zero) {
                add(0, 0);
            }
            double width = high - low;
            double least = size() > 0 ? NARROWEST * size() : 1;
            double margin = width > least ? MARGIN * width : 0.5 * Math.max(least, 0.1 * size());
            return new PlotRange(low - margin, high + margin);
        }
    }
}
