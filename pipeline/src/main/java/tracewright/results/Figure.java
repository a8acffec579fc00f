package tracewright.results;

import java.util.List;

/**
 * A plot as data: what is drawn, not how. The report draws it and writes the same numbers beside it.
 *
 * @param id      file name without ending: lower-case words joined by hyphens, unique in the run
 * @param section heading under which the report shows it: an ensemble's name, or {@code physical}
 * @param topic   {@code effective-mass}, {@code ratio}, {@code summed-ratio}, {@code flow-time}, {@code extrapolation}, {@code budget} ...
 * @param caption sentence for people, also the alternative text
 */
public record Figure(String id, String section, String topic, String title, String caption, Axis x, Axis y, List<Layer> layers) {

    /** Label with unit; {@code zero} asks for zero to be inside the range. */
    public record Axis(String label, boolean zero) {
    }

    /** One drawn thing with its legend entry (empty: none). */
    public sealed interface Layer {

        String legend();
    }

    /** Points with symmetric errors; {@code filled} tells points that entered a fit from those that did not. */
    public record Points(String legend, List<Point> points) implements Layer {
        public Points {
            points = List.copyOf(points);
        }
    }

    public record Point(double x, double y, double error, double xError, boolean filled) {
        public Point(double x, double y, double error, boolean filled) {
            this(x, y, error, 0, filled);
        }
    }

    /** One-sigma band along x. */
    public record Band(String legend, List<BandPoint> points) implements Layer {
        public Band {
            points = List.copyOf(points);
        }
    }

    public record BandPoint(double x, double low, double mid, double high) {
    }

    /** Line through points, no error. */
    public record Line(String legend, List<LinePoint> points, boolean dashed) implements Layer {
        public Line {
            points = List.copyOf(points);
        }
    }

    public record LinePoint(double x, double y) {
    }

    /** Labelled horizontal bars with errors, for budgets: one row per term, fractions of the mass. */
    public record Bars(String legend, List<Bar> bars) implements Layer {
        public Bars {
            bars = List.copyOf(bars);
        }
    }

    public record Bar(String label, double value, double error) {
    }
}
