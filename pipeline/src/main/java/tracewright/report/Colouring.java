package tracewright.report;

import java.util.HashMap;
import java.util.List;
import java.util.Map;
import tracewright.results.Figure;

/**
 * Which layer of a figure has which colour. Point and bar series take the colours in order. A band or line has the colour of the points
 * of the same legend; where there are as many bands (lines) as point series, they belong together one by one; otherwise
 * the first one is drawn in ink and further ones take the next free colours.
 */
final class Colouring {

    private static final int INK = -1;

    private final int[] series;

    private Colouring(int[] series) {
        this.series = series;
    }

    static Colouring of(List<Figure.Layer> layers) {
        int[] series = new int[layers.size()];
        Map<String, Integer> byLegend = new HashMap<>();
        int points = 0;
        for (int i = 0; i < series.length; i++) {
            if (isSeries(layers.get(i))) {
                series[i] = points++;
                byLegend.putIfAbsent(layers.get(i).legend(), series[i]);
            }
        }
        int free = colour(layers, Figure.Band.class, series, byLegend, points, points);
        colour(layers, Figure.Line.class, series, byLegend, points, free);
        return new Colouring(series);
    }

    private static boolean isSeries(Figure.Layer layer) {
        return layer instanceof Figure.Points || layer instanceof Figure.Bars;
    }

    /** Colours one kind of layer; returns the next free colour. */
    private static int colour(List<Figure.Layer> layers, Class<?> kind, int[] series, Map<String, Integer> byLegend, int points, int firstFree) {
        boolean paired = layers.stream().filter(kind::isInstance).count() == points;
        int free = firstFree;
        int count = 0;
        boolean inkUsed = false;
        for (int i = 0; i < series.length; i++) {
            if (!kind.isInstance(layers.get(i))) {
                continue;
            }
            String legend = layers.get(i).legend();
            if (!legend.isEmpty() && byLegend.containsKey(legend)) {
                series[i] = byLegend.get(legend);
            } else if (paired) {
                series[i] = count;
            } else {
                series[i] = inkUsed ? free++ : INK;
                inkUsed = true;
            }
            count++;
        }
        return free;
    }

    /** Number of the colour and marker of layer i, or -1 for ink. */
    int series(int layer) {
        return series[layer];
    }

    String[] attributes(int layer, Paint paint) {
        return series[layer] == INK ? paint.ink() : paint.series(series[layer]);
    }
}
