package tracewright.readers;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.HashMap;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.stream.IntStream;
import tracewright.study.ConfigurationId;
import tracewright.study.Layout;
import tracewright.study.Layout.Column;

/**
 * Collects the rows of one dataset and one configuration after the other. Every combination of source, hit and time has to occur
 * exactly once; the line of each is kept until the configuration ends, so that a message can name it.
 */
final class CsvGrid {

    private static final int[] ORIGIN = {0};

    private final Layout.Dataset dataset;
    private final Conversion conversion;
    private final String place;
    private final int value;
    private final int time;
    private final int source;
    private final int hit;
    private final int[] filterColumns;
    private final String[] filterTexts;
    private final Complaints complaints;

    private final List<Integer> sources = new ArrayList<>();
    private final int[] sourceIndex;
    private final Map<String, Integer> hits = new LinkedHashMap<>();
    private final Map<Long, Integer> slots = new HashMap<>();
    private double[] values = {};
    private long[] lines = {};
    private int lastSource = -1;
    private String lastHit = "";
    private int lastSlot;
    private boolean spoiled;

    CsvGrid(Layout layout, Layout.Dataset dataset, CsvColumns columns, String file, Complaints complaints) {
        this.dataset = dataset;
        this.conversion = Conversion.of(layout, dataset);
        this.place = file + ", column " + dataset.stored().value().orElseThrow();
        this.value = columns.named(dataset.stored().value().orElseThrow());
        this.time = columns.of(Column.TIME);
        this.source = dataset.observable().hasSources() ? columns.of(Column.SOURCE_TIME) : CsvColumns.ABSENT;
        this.hit = columns.of(Column.HIT);
        List<String> names = dataset.stored().where().keySet().stream().sorted().toList();
        this.filterColumns = names.stream().mapToInt(columns::named).toArray();
        this.filterTexts = names.stream().map(n -> dataset.stored().where().get(n)).toArray(String[]::new);
        this.complaints = complaints;
        this.sourceIndex = new int[layout.timeExtent()];
        Arrays.fill(sourceIndex, -1);
    }

    Layout.Dataset dataset() {
        return dataset;
    }

    boolean takes(CsvRows row) {
        for (int k = 0; k < filterColumns.length; k++) {
            if (!row.text(filterColumns[k]).equals(filterTexts[k])) {
                return false;
            }
        }
        return true;
    }

    /** @param numbers whether the value is read too, or only the labels */
    void add(CsvRows row, boolean numbers) {
        try {
            int t = slice(row, time, conversion.stored(), "time");
            int t0 = source < 0 ? 0 : slice(row, source, sourceIndex.length, "source time");
            int at = slot(sourceOf(t0), hit < 0 ? "" : row.text(hit)) * conversion.stored() + t;
            if (lines[at] != 0) {
                throw bad("doubled row: the same labels stand in line " + lines[at] + " (" + labels(t0, t, row) + ")", row,
                    "keep one of the two rows, or name the column that tells them apart (hit, or where)");
            }
            lines[at] = row.line();
            values[at] = numbers ? number(row) : 0;
        } catch (Unreadable e) {
            spoiled = true;
            complaints.add(e.problem());
        }
    }

    private int slice(CsvRows row, int column, int length, String word) {
        try {
            int t = row.whole(column);
            if (t >= 0 && t < length) {
                return t;
            }
        } catch (NumberFormatException e) {
            throw bad(word + " '" + row.text(column) + "' is no whole number", row, "correct the row, or the column's name in the layout");
        }
        throw bad(word + " " + row.text(column) + " is not inside 0.." + (length - 1), row,
            "correct the row, or time_extent or the origin of the time axis in the layout");
    }

    private double number(CsvRows row) {
        try {
            return row.number(value);
        } catch (NumberFormatException e) {
            throw bad("bad number '" + row.text(value) + "'", row, "write numbers like -1.25e-7");
        }
    }

    private Unreadable bad(String what, CsvRows row, String remedy) {
        return new Unreadable(what, Where.line(place, row.line()), remedy);
    }

    private String labels(int t0, int t, CsvRows row) {
        return (source < 0 ? "" : "source time " + t0 + ", ") + (hit < 0 ? "" : "hit " + row.text(hit) + ", ") + "time " + t;
    }

    private int sourceOf(int t0) {
        if (sourceIndex[t0] < 0) {
            sourceIndex[t0] = sources.size();
            sources.add(t0);
        }
        return sourceIndex[t0];
    }

    /** Number of a row of time slices; rows mostly come in their order, so the last answer is kept. */
    private int slot(int sourceNumber, String hitName) {
        if (sourceNumber != lastSource || !hitName.equals(lastHit)) {
            lastSlot = newOrKnownSlot(sourceNumber, hitName);
            lastSource = sourceNumber;
            lastHit = hitName;
        }
        return lastSlot;
    }

    private int newOrKnownSlot(int sourceNumber, String hitName) {
        int hitNumber = hits.computeIfAbsent(hitName, h -> hits.size());
        return slots.computeIfAbsent((long) sourceNumber << 32 | hitNumber, k -> {
            int needed = (slots.size() + 1) * conversion.stored();
            if (values.length < needed) {
                values = Arrays.copyOf(values, 2 * needed);
                lines = Arrays.copyOf(lines, 2 * needed);
            }
            return slots.size();
        });
    }

    /** Ends a configuration: true if it had rows. Complete ones go to the delivery, if there is one, converted. */
    boolean finish(ConfigurationId id, Delivery delivery, Buffers buffers) {
        if (slots.isEmpty() && !spoiled) {
            return false;
        }
        int[] order = spoiled ? null : sourceOrder(id);
        if (order != null && complete(id) && delivery != null) {
            deliver(id, order, delivery, buffers);
        }
        clear();
        return true;
    }

    private void clear() {
        Arrays.fill(lines, 0, slots.size() * conversion.stored(), 0);
        Arrays.fill(sourceIndex, -1);
        sources.clear();
        hits.clear();
        slots.clear();
        lastSource = -1;
        spoiled = false;
    }

    /** Numbers of the sources in the order in which they are handed on; null if they are not those of the layout. */
    private int[] sourceOrder(ConfigurationId id) {
        if (source < 0 || !(Datasets.sources(dataset).orElseThrow() instanceof Layout.SourceTimes.Fixed fixed)) {
            return IntStream.range(0, sources.size()).toArray();
        }
        List<Integer> wanted = fixed.times();
        if (!wanted.stream().sorted().toList().equals(sources.stream().sorted().toList())) {
            complaints.add("source times " + sources.stream().sorted().toList() + " are not those of the layout, " + wanted, Where.configuration(place, id),
                "add the missing rows, correct the list, or set sources to column");
            return null;
        }
        return wanted.stream().mapToInt(t0 -> sourceIndex[t0]).toArray();
    }

    private boolean complete(ConfigurationId id) {
        int missing = 0;
        String first = "";
        for (int s = 0; s < sources.size(); s++) {
            for (Map.Entry<String, Integer> h : hits.entrySet()) {
                Integer slot = slots.get((long) s << 32 | h.getValue());
                for (int t = 0; t < conversion.stored(); t++) {
                    if (slot == null || lines[slot * conversion.stored() + t] == 0) {
                        first = missing++ == 0 ? label(s, h.getKey(), t) : first;
                    }
                }
            }
        }
        if (missing > 0) {
            int all = sources.size() * hits.size() * conversion.stored();
            complaints.add("missing rows: " + missing + " of " + all + ", the first is " + first, Where.configuration(place, id),
                "write a row for every combination of source, hit and time of this configuration, or take all its rows away");
        }
        return missing == 0;
    }

    private String label(int s, String hitName, int t) {
        return (source < 0 ? "" : "source time " + sources.get(s) + ", ") + (hit < 0 ? "" : "hit " + hitName + ", ") + "time " + t;
    }

    private void deliver(ConfigurationId id, int[] order, Delivery delivery, Buffers buffers) {
        int stored = conversion.stored();
        int perSource = hits.size() * stored;
        double[] in = buffers.in(order.length * perSource);
        for (int s = 0; s < order.length; s++) {
            for (int h = 0; h < hits.size(); h++) {
                int slot = slots.get((long) order[s] << 32 | h);
                System.arraycopy(values, slot * stored, in, s * perSource + h * stored, stored);
            }
        }
        int[] times = sourceTimes(order);
        double[] out = buffers.out(times.length * conversion.kept());
        boolean finite = conversion.apply(in, 0, new Conversion.Steps(perSource, stored, 1, hits.size()), times, out);
        delivery.hand(dataset, conversion, id, times, out, finite, place);
    }

    private int[] sourceTimes(int[] order) {
        if (source >= 0) {
            return Arrays.stream(order).map(sources::get).toArray();
        }
        return Datasets.sources(dataset).map(s -> new int[] {((Layout.SourceTimes.Fixed) s).times().get(0)}).orElse(ORIGIN);
    }
}
