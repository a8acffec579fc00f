package tracewright.synth;

import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.UncheckedIOException;
import java.math.BigDecimal;
import java.math.MathContext;
import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.LinkedHashSet;
import java.util.List;
import java.util.Map;
import java.util.Set;
import java.util.TreeSet;
import java.util.zip.Deflater;
import java.util.zip.GZIPOutputStream;
import tracewright.study.ConfigurationId;
import tracewright.study.Layout;

/**
 * Writes the CSV table of one family of a layout: label columns, columns that rows are chosen by, value columns. Datasets that
 * choose the same rows share them; rows of one configuration stand together.
 */
final class CsvFamily {

    /** Digits that give a float32 or a float64 back exactly are 9 and 17; one less of the former is plenty for noise. */
    private static final MathContext NARROW = new MathContext(8);
    private static final MathContext WIDE = new MathContext(17);

    private final Records records;
    private final Layout.Files.Csv family;
    private final MathContext digits;
    private final Map<Map<String, String>, List<Layout.Dataset>> groups = new LinkedHashMap<>();
    private final Set<String> choosers = new TreeSet<>();
    private final Set<String> valueColumns = new LinkedHashSet<>();

    CsvFamily(Records records, Layout layout, String name, Truth.Width width) {
        this.records = records;
        this.family = (Layout.Files.Csv) layout.files().get(name);
        this.digits = width == Truth.Width.FLOAT64 ? WIDE : NARROW;
        for (Layout.Dataset dataset : layout.datasets()) {
            if (dataset.stored().files().equals(name)) {
                choosers.addAll(dataset.stored().where().keySet());
                valueColumns.add(value(dataset));
                groups.computeIfAbsent(dataset.stored().where(), w -> new ArrayList<>()).add(dataset);
            }
        }
        Checks.layout(!family.columns().containsKey(Layout.Column.HIT), family.path() + ": hits are averaged in synthetic ensembles, no hit column is written");
    }

    private static String value(Layout.Dataset dataset) {
        return dataset.stored().value()
            .orElseThrow(() -> Checks.refusal(dataset.observable().id() + ": a CSV dataset needs the column of its value"));
    }

    /** The table, compressed if its path ends in .gz. */
    byte[] bytes() {
        ByteArrayOutputStream out = new ByteArrayOutputStream();
        try {
            if (family.path().endsWith(".gz")) {
                try (Gzip zip = new Gzip(out)) {
                    zip.write(text().getBytes(StandardCharsets.UTF_8));
                }
            } else {
                out.writeBytes(text().getBytes(StandardCharsets.UTF_8));
            }
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
        return out.toByteArray();
    }

    private static final class Gzip extends GZIPOutputStream {
        Gzip(ByteArrayOutputStream out) throws IOException {
            super(out);
            def.setLevel(Deflater.BEST_COMPRESSION);
        }
    }

    private String text() {
        List<String> header = new ArrayList<>();
        for (Layout.Column column : Layout.Column.values()) {
            if (family.columns().containsKey(column)) {
                header.add(family.columns().get(column));
            }
        }
        header.addAll(choosers);
        header.addAll(valueColumns);
        StringBuilder text = new StringBuilder(String.join(",", header)).append('\n');
        for (int i = 0; i < records.configurations().size(); i++) {
            for (List<Layout.Dataset> group : groups.values()) {
                rows(text, group, i);
            }
        }
        return text.toString();
    }

    private void rows(StringBuilder text, List<Layout.Dataset> group, int configuration) {
        Layout.Dataset first = group.get(0);
        int[] sourceTimes = records.sourceTimes(first, configuration);
        Map<String, double[]> values = new LinkedHashMap<>();
        for (Layout.Dataset dataset : group) {
            Checks.layout(values.put(value(dataset), records.stored(dataset, configuration)) == null,
                family.path() + ": two datasets choose the same rows and the same value column " + value(dataset));
        }
        int length = values.get(value(first)).length;
        Checks.layout(values.values().stream().allMatch(v -> v.length == length), family.path() + ": datasets of one set of rows differ in shape");
        int times = length / Math.max(1, sourceTimes.length);
        for (int k = 0; k < length; k++) {
            labels(text, records.configurations().get(configuration), sourceTimes, k / times, k % times);
            choosers.forEach(column -> text.append(first.stored().where().getOrDefault(column, "")).append(','));
            for (String column : valueColumns) {
                text.append(values.containsKey(column) ? number(values.get(column)[k]) : "").append(',');
            }
            text.setCharAt(text.length() - 1, '\n');
        }
    }

    private void labels(StringBuilder text, ConfigurationId id, int[] sourceTimes, int source, int time) {
        for (Layout.Column column : Layout.Column.values()) {
            if (family.columns().containsKey(column)) {
                switch (column) {
                    case STREAM -> text.append(id.stream());
                    case TRAJECTORY -> text.append(id.trajectory());
                    case SOURCE_TIME -> text.append(sourceTimes.length == 0 ? "" : Integer.toString(sourceTimes[source]));
                    case TIME -> text.append(time);
                    case HIT -> throw new IllegalStateException("no hit column is written");
                }
                text.append(',');
            }
        }
    }

    private String number(double value) {
        return new BigDecimal(value).round(digits).stripTrailingZeros().toString();
    }
}
