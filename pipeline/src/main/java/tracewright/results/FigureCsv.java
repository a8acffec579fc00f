package tracewright.results;

import java.io.IOException;
import java.io.OutputStream;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;

/**
 * The numbers of a plot as a table, one row per point, layers one after the other from 1:
 * <pre>
 *  layer  kind     legend  label      x      x_error  y      y_error  y_low  y_high  filled    x_axis  y_axis
 *  1      points   ...                x      dx       y      dy                      yes|no    axis labels with units,
 *  2      band     ...                x               mid             low    high              the same in every row
 *  3      line     ...                x               y
 *  4      bars     ...     term name  value  error
 * </pre>
 * {@code filled} tells points that entered a fit. Fields that do not apply are empty; errors and bands are one standard error.
 */
public final class FigureCsv {

    private static final List<String> HEADER = List.of("layer", "kind", "legend", "label", "x", "x_error", "y", "y_error", "y_low", "y_high",
        "filled", "x_axis", "y_axis");

    private FigureCsv() {
    }

    /** @throws IllegalArgumentException naming the figure, if a number is NaN or infinite; nothing is written then */
    public static void write(Figure figure, OutputStream out) throws IOException {
        List<List<String>> rows = new ArrayList<>();
        for (int i = 0; i < figure.layers().size(); i++) {
            new Layers(figure, i + 1, rows).add(figure.layers().get(i));
        }
        CsvOut.write(HEADER, rows, out);
    }

    /** Rows of one layer. */
    private record Layers(Figure figure, int number, List<List<String>> rows) {

        void add(Figure.Layer layer) {
            if (layer instanceof Figure.Points points) {
                points.points().forEach(p -> row("points", layer, "", p.filled() ? "yes" : "no", p.x(), p.xError(), p.y(), p.error(), null, null));
            } else if (layer instanceof Figure.Band band) {
                band.points().forEach(p -> row("band", layer, "", "", p.x(), null, p.mid(), null, p.low(), p.high()));
            } else if (layer instanceof Figure.Line line) {
                line.points().forEach(p -> row("line", layer, "", "", p.x(), null, p.y(), null, null, null));
            } else if (layer instanceof Figure.Bars bars) {
                bars.bars().forEach(b -> row("bars", layer, b.label(), "", b.value(), b.error(), null, null, null, null));
            } else {
                throw new IllegalArgumentException("figure " + figure.id() + " has a layer that tables do not know: " + layer);
            }
        }

        /** Numbers x, x_error, y, y_error, y_low, y_high; null leaves the field empty. */
        private void row(String kind, Figure.Layer layer, String label, String filled, Double... numbers) {
            List<String> row = new ArrayList<>(List.of(Integer.toString(number), kind, layer.legend(), label));
            String what = "figure " + figure.id() + ", layer " + number + ": a number";
            Arrays.stream(numbers).map(v -> v == null ? "" : Program.digits(v, what)).forEach(row::add);
            row.addAll(List.of(filled, figure.x().label(), figure.y().label()));
            rows.add(row);
        }
    }
}
