package tracewright.report;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.LinkedHashSet;
import java.util.List;
import java.util.Map;
import java.util.Set;
import tracewright.results.Results;

/** Published numbers, one row per quantity, one column per method. */
final class QuantityTable {

    /** What makes two numbers of different methods comparable. */
    private record Row(String hadron, String quantity, String detail, String unit, String route) {

        /** The row of a number that differs from another in its id alone. */
        Row told(String id) {
            return new Row(hadron, quantity, detail.isEmpty() ? id : detail + ", " + id, unit, route);
        }
    }

    private QuantityTable() {
    }

    static void write(Html html, List<Results.Quantity> quantities, String caption) {
        Set<String> methods = new LinkedHashSet<>();
        Map<Row, Map<String, Results.Quantity>> rows = new LinkedHashMap<>();
        for (Results.Quantity q : quantities) {
            String method = q.method().orElse(QUOTED);
            methods.add(method);
            Row row = row(q);
            boolean taken = rows.getOrDefault(row, Map.of()).containsKey(method);
            rows.computeIfAbsent(taken ? row.told(q.id()) : row, k -> new LinkedHashMap<>()).put(method, q);
        }
        List<String> columns = new ArrayList<>(methods);
        if (columns.remove(QUOTED)) {
            columns.add(0, QUOTED);
        }
        boolean details = rows.keySet().stream().anyMatch(r -> !r.detail.isEmpty());
        boolean routes = rows.keySet().stream().anyMatch(r -> !r.route.isEmpty());
        html.leaf("p", "Detail: flavour, flow time, scheme and scale where the number depends on them. Route: how it was renormalised. "
            + "\u201cQuoted\u201d is the number that goes on to the next stage; the other columns are the methods by which it was also obtained, each with its own error, correlated with "
            + "its neighbours.", "class", "key");
        Columns heads = Columns.words("Hadron", "Quantity").andWords(optional(details, "Detail")).andWords("Unit");
        columns.forEach(c -> heads.andNumbers(Phrase.capital(c)));
        Table table = Table.open(html, caption, heads.andWords(optional(routes, "Route")));
        rows.forEach((row, byMethod) -> write(table, row, byMethod, columns, details, routes));
        table.close();
    }

    private static String[] optional(boolean wanted, String head) {
        return wanted ? new String[] {head} : new String[0];
    }

    private static final String QUOTED = "quoted";

    private static Row row(Results.Quantity q) {
        List<String> detail = new ArrayList<>();
        q.flavor().ifPresent(detail::add);
        q.flowTime().ifPresent(t -> detail.add("flow time " + Numbers.plain(t)));
        String scheme = Words.scheme(q.scheme(), q.scaleGev());
        if (!scheme.isEmpty()) {
            detail.add(scheme);
        }
        return new Row(q.hadron(), q.quantity(), String.join(", ", detail), q.unit(), q.route().orElse(""));
    }

    private static void write(Table table, Row row, Map<String, Results.Quantity> byMethod, List<String> columns, boolean details, boolean routes) {
        table.row(row.hadron).text(row.quantity);
        if (details) {
            table.text(row.detail);
        }
        table.text(row.unit);
        for (String method : columns) {
            if (byMethod.containsKey(method)) {
                table.number(byMethod.get(method).number());
            } else {
                table.none();
            }
        }
        if (routes) {
            table.text(row.route);
        }
    }
}
