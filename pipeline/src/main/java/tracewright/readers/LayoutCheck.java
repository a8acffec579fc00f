package tracewright.readers;

import java.util.HashSet;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Set;
import tracewright.study.Flavor;
import tracewright.study.Layout;
import tracewright.study.Layout.Axis;
import tracewright.study.Layout.Column;
import tracewright.study.Layout.Counts;
import tracewright.study.Nearest;
import tracewright.study.Observable;

/** What a layout must hold before any file is looked at: references, keys that its formats need, and meanings that can be. */
final class LayoutCheck {

    private final Ensemble ensemble;
    private final Layout layout;
    private final Complaints complaints;

    LayoutCheck(Ensemble ensemble, Complaints complaints) {
        this.ensemble = ensemble;
        this.layout = ensemble.layout();
        this.complaints = complaints;
    }

    void run() {
        if (layout.timeExtent() < 1 || layout.spatialExtent() < 1) {
            add("time_extent " + layout.timeExtent() + " and spatial_extent " + layout.spatialExtent() + " must be at least 1", "the lattice", "give its size");
        }
        layout.files().forEach(this::family);
        Set<Observable> seen = new HashSet<>();
        for (Layout.Dataset d : layout.datasets()) {
            if (!seen.add(d.observable())) {
                add("two datasets for the same observable", entry(d), "keep one of them");
            }
            place(d);
            meaning(d);
        }
    }

    private void family(String name, Layout.Files files) {
        List<String> placeholders = PathTemplate.placeholdersOf(files.path());
        if (files.path().contains("}{")) {
            add("two placeholders of the path template touch each other", "files '" + name + "'", "put a character between them that is in neither");
        }
        if (files instanceof Layout.Files.Hdf5 h) {
            label(name, h.trajectory(), placeholders);
            label(name, h.stream(), placeholders);
            return;
        }
        Map<Column, String> columns = ((Layout.Files.Csv) files).columns();
        needed(name, columns, Column.TIME, false);
        needed(name, columns, Column.TRAJECTORY, placeholders.contains("trajectory"));
        needed(name, columns, Column.STREAM, placeholders.contains("stream"));
    }

    private void needed(String name, Map<Column, String> columns, Column column, boolean inPath) {
        if (!columns.containsKey(column) && !inPath) {
            String word = column.name().toLowerCase(Locale.ROOT);
            add("no column for the " + word, "files '" + name + "'", "add " + word + " to columns" + (column == Column.TIME ? "" : ", or {" + word + "} to the path"));
        }
    }

    private void label(String name, Layout.Label label, List<String> placeholders) {
        if (label instanceof Layout.Label.FromPath p && !placeholders.contains(p.placeholder())) {
            add("the path template has no placeholder {" + p.placeholder() + "}", "files '" + name + "'", "correct the label; " + Nearest.hint(p.placeholder(), placeholders));
        }
    }

    private void place(Layout.Dataset d) {
        Layout.Files files = layout.files().get(d.stored().files());
        if (files == null) {
            add("files '" + d.stored().files() + "' are not defined", entry(d), "define them; " + Nearest.hint(d.stored().files(), layout.files().keySet()));
        } else if (files instanceof Layout.Files.Hdf5) {
            hdf5(d);
        } else {
            csv(d, (Layout.Files.Csv) files);
        }
    }

    private void hdf5(Layout.Dataset d) {
        Layout.Stored stored = d.stored();
        if (stored.dataset().isEmpty() || stored.axes().isEmpty() || stored.complex().isEmpty()) {
            add("dataset, axes and complex are needed for an HDF5 file", entry(d), "add the missing ones");
            return;
        }
        List<Axis> axes = stored.axes().get();
        if (new HashSet<>(axes).size() != axes.size() || !axes.contains(Axis.TIME)) {
            add("axes (" + AxisCheck.text(axes) + ") must hold time, and each axis once", entry(d), "correct axes");
        }
        if (axes.contains(Axis.SOURCE) && !d.observable().hasSources()) {
            add("a source axis makes no sense here", entry(d), "take source out of axes");
        }
        if (Datasets.sources(d).filter(Layout.SourceTimes.FromColumn.class::isInstance).isPresent()) {
            add("an HDF5 file has no column of source times", entry(d), "give a list of source times or a dataset");
        }
    }

    private void csv(Layout.Dataset d, Layout.Files.Csv files) {
        if (d.stored().value().isEmpty()) {
            add("value is needed for a CSV table", entry(d), "name the column that holds the numbers");
        }
        boolean column = files.columns().containsKey(Column.SOURCE_TIME);
        Datasets.sources(d).ifPresent(s -> {
            if (s instanceof Layout.SourceTimes.FromDataset) {
                add("a CSV table has no dataset of source times", entry(d), "set sources to column or to a list");
            } else if (!column && !(s instanceof Layout.SourceTimes.Fixed f && f.times().size() == 1)) {
                add("no column for the source time", entry(d), "add source-time to columns, or give a list of one source time");
            }
        });
    }

    private void meaning(Layout.Dataset d) {
        Datasets.sources(d).ifPresent(s -> {
            if (s instanceof Layout.SourceTimes.Fixed f) {
                fixed(d, f);
            }
        });
        if (d instanceof Layout.Dataset.Connected c) {
            counts(d, c.flavor(), c.counts());
            if (c.flavor() == Flavor.LIGHT && c.counts() == Counts.ONE_FLAVOR) {
                add("a light insertion must count u+d", entry(d), "store the sum over the two flavours: for one of them alone u and d differ");
            }
            if (c.separation() < 0 || c.separation() >= layout.timeExtent()) {
                add("separation " + c.separation() + " is not inside 0.." + (layout.timeExtent() - 1), entry(d), "correct separation or time_extent");
            }
        } else if (d instanceof Layout.Dataset.Loop l) {
            counts(d, l.flavor(), l.counts());
        } else if (d instanceof Layout.Dataset.ActionDensity a) {
            flow(a);
        }
    }

    private void fixed(Layout.Dataset d, Layout.SourceTimes.Fixed f) {
        if (f.times().isEmpty() || f.times().stream().anyMatch(t -> t < 0 || t >= layout.timeExtent())) {
            add("source times " + f.times() + " are not all inside 0.." + (layout.timeExtent() - 1), entry(d), "correct the list or time_extent");
        }
    }

    private void counts(Layout.Dataset d, Flavor flavor, Counts counts) {
        if (flavor != Flavor.LIGHT && counts == Counts.UP_PLUS_DOWN) {
            add("a " + flavor.word() + " number cannot count u+d", entry(d), "set counts = one-flavor, or correct the flavour");
        }
    }

    private void flow(Layout.Dataset.ActionDensity a) {
        boolean divides = a.convention() == Layout.DensityConvention.T2E;
        if (!(a.flowTime() >= 0) || Double.isInfinite(a.flowTime()) || (divides && a.flowTime() == 0)) {
            add("flow time " + a.flowTime() + " is not possible for this convention", entry(a), "give the flow time in units of a^2, above zero for t2E");
        }
    }

    private static String entry(Layout.Dataset d) {
        return "dataset of " + d.observable().id();
    }

    private void add(String what, String entry, String remedy) {
        complaints.add(what, Where.layout(ensemble.name(), ensemble.layoutFile(), entry), remedy);
    }
}
