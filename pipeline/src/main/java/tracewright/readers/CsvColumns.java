package tracewright.readers;

import java.util.List;
import java.util.Map;
import tracewright.study.Layout;
import tracewright.study.Layout.Column;
import tracewright.study.Nearest;

/** Column names of one table's header line, turned into numbers. */
final class CsvColumns {

    static final int ABSENT = -1;

    private final List<String> header;
    private final Map<Column, String> names;
    private final String where;

    CsvColumns(List<String> header, Layout.Files.Csv declared, String where) {
        this.header = header;
        this.names = declared.columns();
        this.where = where;
        if (header.isEmpty()) {
            throw new Unreadable("broken file: it is empty", where, "write it again, or take it out of the layout");
        }
    }

    /** Number of a column, {@link #ABSENT} if the layout names none. */
    int of(Column column) {
        String name = names.get(column);
        return name == null ? ABSENT : named(name);
    }

    int named(String name) {
        int at = header.indexOf(name);
        if (at < 0) {
            throw new Unreadable("unknown column '" + name + "': the header line has " + header, where,
                "correct the column's name in the layout; " + Nearest.hint(name, header));
        }
        if (header.lastIndexOf(name) != at) {
            throw new Unreadable("column '" + name + "' occurs twice in the header line", where, "rename one of the two");
        }
        return at;
    }

    int count() {
        return header.size();
    }
}
