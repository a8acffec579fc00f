package tracewright.fitters.resampling;

import java.util.ArrayList;
import java.util.List;
import java.util.TreeMap;

/**
 * Cells of one stream after light ones have joined a neighbour. A cell is light if it holds less than half of what a full one
 * would at the stream's most frequent spacing, which happens at an end of the stream or beside a gap. It joins the adjacent
 * cell whose nearest configuration is nearest to its own (the earlier one if both are equally near) and takes that cell's
 * index; with no adjacent cell it stays alone, as a block does not straddle an empty cell.
 */
final class GridCells {

    /** A run of joined cells {@code low..high}, named {@code index}, with configurations from..to of the sorted stream. */
    private record Cell(long low, long high, long index, int from, int to) {
        int count() {
            return to - from;
        }

        /** This and the cell after it, named as {@code name}. */
        Cell before(Cell next, long name) {
            return new Cell(low, next.high, name, from, next.to);
        }
    }

    private GridCells() {
    }

    /**
     * Index of the joined cell of every configuration.
     *
     * @param t trajectories of one stream, ascending; read
     */
    static long[] indices(long[] t, int length) {
        List<Cell> cells = cells(t, length);
        double half = 0.5 * length / usualSpacing(t);
        int at = 0;
        while (at < cells.size()) {
            int receiver = cells.get(at).count() < half ? receiver(cells, at, t) : -1;
            if (receiver < 0) {
                at++;
            } else {
                join(cells, at, receiver);
                at = Math.max(0, Math.min(at, receiver));
            }
        }
        long[] index = new long[t.length];
        for (Cell c : cells) {
            for (int i = c.from; i < c.to; i++) {
                index[i] = c.index;
            }
        }
        return index;
    }

    private static List<Cell> cells(long[] t, int length) {
        List<Cell> cells = new ArrayList<>();
        for (int from = 0, to; from < t.length; from = to) {
            long index = Math.floorDiv(t[from], length);
            to = from + 1;
            while (to < t.length && Math.floorDiv(t[to], length) == index) {
                to++;
            }
            cells.add(new Cell(index, index, index, from, to));
        }
        return cells;
    }

    /** Most frequent difference of neighbouring trajectories, the smaller one of equally frequent ones; 1 for a single one. */
    private static long usualSpacing(long[] t) {
        TreeMap<Long, Integer> counts = new TreeMap<>();
        for (int i = 1; i < t.length; i++) {
            counts.merge(t[i] - t[i - 1], 1, Integer::sum);
        }
        long usual = 1;
        int most = 0;
        for (var entry : counts.entrySet()) {
            if (entry.getValue() > most) {
                most = entry.getValue();
                usual = entry.getKey();
            }
        }
        return usual;
    }

    /** Position of the cell that takes in the one at {@code at}; -1 if no cell is adjacent to it. */
    private static int receiver(List<Cell> cells, int at, long[] t) {
        Cell c = cells.get(at);
        boolean before = at > 0 && cells.get(at - 1).high == c.low - 1;
        boolean after = at + 1 < cells.size() && cells.get(at + 1).low == c.high + 1;
        if (before && after) {
            return t[c.from] - t[c.from - 1] <= t[c.to] - t[c.to - 1] ? at - 1 : at + 1;
        }
        return before ? at - 1 : after ? at + 1 : -1;
    }

    private static void join(List<Cell> cells, int at, int receiver) {
        int first = Math.min(at, receiver);
        Cell joined = cells.get(first).before(cells.get(first + 1), cells.get(receiver).index);
        cells.set(first, joined);
        cells.remove(first + 1);
    }
}
