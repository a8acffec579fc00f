package tracewright.readers;

import java.io.IOException;
import java.io.InputStream;
import java.io.UncheckedIOException;
import java.nio.file.Files;
import java.nio.file.NoSuchFileException;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.HashMap;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.function.Predicate;
import java.util.zip.GZIPInputStream;
import tracewright.study.ConfigurationId;
import tracewright.study.Layout;
import tracewright.study.Layout.Column;
import tracewright.study.Problem;

/** One pass over one table for all its datasets: rows are sorted into grids, and a grid is emptied when its configuration ends. */
final class CsvPass {

    /** With the default of 512 bytes inflation takes half as long again. */
    private static final int GZIP_BUFFER = 1 << 16;

    private final Ensemble ensemble;
    private final Layout.Files.Csv declared;
    private final PathTemplate.Match match;
    private final List<Layout.Dataset> datasets;
    private final boolean quotes;
    private final String where;

    private final Complaints complaints = new Complaints();
    private final Map<ConfigurationId, Long> lines = new LinkedHashMap<>();
    private final Map<Layout.Dataset, List<ConfigurationId>> found = new HashMap<>();
    private final Buffers buffers = new Buffers();
    private List<CsvGrid> grids = List.of();
    private int streamColumn;
    private int trajectoryColumn;
    private String streamText;
    private String trajectoryText;
    private ConfigurationId present;

    CsvPass(Ensemble ensemble, Layout.Files.Csv declared, PathTemplate.Match match, List<Layout.Dataset> datasets, boolean quotes) {
        this.ensemble = ensemble;
        this.declared = declared;
        this.match = match;
        this.datasets = datasets;
        this.quotes = quotes;
        this.where = Where.file(ensemble.name(), match.file());
        datasets.forEach(d -> found.put(d, new ArrayList<>()));
    }

    /** Problems of single rows and configurations. */
    List<Problem> complaints() {
        return complaints.list();
    }

    /** Line on which each configuration begins, in the order of the file. */
    Map<ConfigurationId, Long> lines() {
        return lines;
    }

    /** Configurations of each dataset, in the order of the file. */
    Map<Layout.Dataset, List<ConfigurationId>> found() {
        return found;
    }

    /** @param delivery where records go; null: only labels are looked at */
    CsvPass run(Predicate<ConfigurationId> chosen, Delivery delivery) {
        try (CsvRows rows = open()) {
            begin(rows);
            boolean wanted = false;
            while (rows.next()) {
                if (rows.fields() != rows.header().size()) {
                    complaints.add("row has " + rows.fields() + " fields, the header line has " + rows.header().size(), Where.line(where, rows.line()),
                        "complete the row; if it is the last one, the file was cut short: copy it again");
                } else {
                    wanted = change(rows, delivery) ? chosen.test(present) : wanted;
                    if (wanted) {
                        sort(rows, delivery != null);
                    }
                }
            }
            end(delivery);
            return this;
        } catch (NoSuchFileException e) {
            throw new Unreadable("missing file", where, "put the file there, or correct the path in the layout");
        } catch (IOException | UncheckedIOException | IllegalStateException e) {
            Throwable cause = e.getCause() == null ? e : e.getCause();
            throw new Unreadable(new Problem("broken file: " + cause.getMessage(), where, "copy it again or write it again"), e);
        }
    }

    private CsvRows open() throws IOException {
        Path file = match.file();
        InputStream raw = Files.newInputStream(file);
        try {
            InputStream in = file.toString().endsWith(".gz") ? new GZIPInputStream(raw, GZIP_BUFFER) : raw;
            return quotes ? new CsvQuoted(in) : new CsvScan(in);
        } catch (IOException | RuntimeException e) {
            raw.close();
            throw e;
        }
    }

    private void begin(CsvRows rows) {
        CsvColumns columns = new CsvColumns(rows.header(), declared, where);
        streamColumn = columns.of(Column.STREAM);
        trajectoryColumn = columns.of(Column.TRAJECTORY);
        grids = datasets.stream().map(d -> new CsvGrid(ensemble.layout(), d, columns, where, complaints)).toList();
    }

    /** Looks at the row's configuration; true if it is another one than before. */
    private boolean change(CsvRows rows, Delivery delivery) {
        String stream = streamColumn < 0 ? match.labels().get("stream") : rows.text(streamColumn);
        String trajectory = trajectoryColumn < 0 ? match.labels().get("trajectory") : rows.text(trajectoryColumn);
        if (stream.equals(streamText) && trajectory.equals(trajectoryText)) {
            return false;
        }
        end(delivery);
        streamText = stream;
        trajectoryText = trajectory;
        present = new ConfigurationId(stream, Labels.trajectory(trajectory, Where.line(where, rows.line())));
        Long before = lines.putIfAbsent(present, rows.line());
        if (before != null) {
            complaints.add("rows of configuration " + present + " do not stand together: they begin again here, after line " + before,
                Where.line(where, rows.line()), "sort the table by stream and trajectory; if the rows are repeated, take one copy away");
        }
        return true;
    }

    private void sort(CsvRows rows, boolean numbers) {
        for (CsvGrid grid : grids) {
            if (grid.takes(rows)) {
                grid.add(rows, numbers);
            }
        }
    }

    private void end(Delivery delivery) {
        if (present == null) {
            return;
        }
        for (CsvGrid grid : grids) {
            if (grid.finish(present, delivery, buffers)) {
                found.get(grid.dataset()).add(present);
            }
        }
    }
}
