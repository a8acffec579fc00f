package tracewright.report;

import java.util.ArrayList;
import java.util.List;

/** Heads of a table's columns in order; columns of numbers are set to the right. */
final class Columns {

    record Column(String head, boolean number) {
    }

    private final List<Column> columns = new ArrayList<>();

    static Columns words(String... heads) {
        return new Columns().andWords(heads);
    }

    Columns andWords(String... heads) {
        return add(false, heads);
    }

    Columns andNumbers(String... heads) {
        return add(true, heads);
    }

    private Columns add(boolean number, String... heads) {
        for (String head : heads) {
            columns.add(new Column(head, number));
        }
        return this;
    }

    List<Column> list() {
        return List.copyOf(columns);
    }
}
