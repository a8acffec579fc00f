package tracewright.correlators;

import java.util.HashMap;
import java.util.Map;
import tracewright.study.Observable;

/** Places of correlators in a flat row of numbers: each entry of the map is a run of consecutive columns. */
final class Columns {

    /** What a run of columns holds; {@code operator} and {@code separation} where they apply (0 otherwise). */
    record Entry(Kind kind, String hadron, Observable operator, int separation) {
    }

    enum Kind {
        /** C2(t), t = 0 .. length - 1. */
        TWO_POINT,
        /** Connected C3(separation, tau), tau = 0 .. separation. */
        CONNECTED,
        /** C2(separation) X(t0 + tau), or its vacuum-subtracted form, tau = 0 .. separation. */
        PRODUCT,
        /** X(t0 + tau) averaged over the sources of a hadron, tau = 0 .. largest separation. */
        SLICE
    }

    private final Map<Entry, Integer> offsets = new HashMap<>();
    private int size;

    void add(Entry entry, int length) {
        if (offsets.putIfAbsent(entry, size) == null) {
            size += length;
        }
    }

    int offset(Entry entry) {
        Integer at = offsets.get(entry);
        if (at == null) {
            throw new IllegalArgumentException(entry + " was not planned");
        }
        return at;
    }

    boolean has(Entry entry) {
        return offsets.containsKey(entry);
    }

    int size() {
        return size;
    }

    static Entry twoPoint(String hadron) {
        return new Entry(Kind.TWO_POINT, hadron, new Observable.TwoPoint(hadron), 0);
    }

    static Entry connected(Observable.Connected c) {
        return new Entry(Kind.CONNECTED, c.hadron(), c, c.separation());
    }

    static Entry product(String hadron, Observable operator, int separation) {
        return new Entry(Kind.PRODUCT, hadron, operator, separation);
    }

    static Entry slice(String hadron, Observable operator) {
        return new Entry(Kind.SLICE, hadron, operator, 0);
    }
}
