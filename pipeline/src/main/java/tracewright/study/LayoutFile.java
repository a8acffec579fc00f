package tracewright.study;

import java.nio.file.Path;
import java.util.ArrayList;
import java.util.HashSet;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;

/** Reads a layout: keys and types strictly, then what no single key can tell. */
public final class LayoutFile {

    static final String SCHEMA = "tracewright-layout/1";

    private final Layout layout;
    private final RecordBinder binder;
    private final List<Problem> problems = new ArrayList<>();

    private LayoutFile(Layout layout, RecordBinder binder) {
        this.layout = layout;
        this.binder = binder;
    }

    /** @throws InputException with cause USAGE and every problem of the file */
    public static Layout read(Path file) {
        RecordBinder binder = new RecordBinder(file, Map.of());
        Optional<Layout> layout = binder.bind(YamlTree.read(file), Layout.class);
        List<Problem> problems = new ArrayList<>(binder.problems());
        layout.ifPresent(l -> problems.addAll(new LayoutFile(l, binder).check()));
        if (!problems.isEmpty()) {
            throw new InputException(InputException.Cause.USAGE, problems);
        }
        return layout.orElseThrow();
    }

    private void problem(String path, String what, String remedy) {
        problems.add(new Problem(what, binder.where(path), remedy));
    }

    private List<Problem> check() {
        if (!layout.schema().equals(SCHEMA)) {
            problem("schema", "this program reads " + SCHEMA + ", the file says '" + layout.schema() + "'", "write schema: " + SCHEMA);
        }
        if (layout.timeExtent() < 4) {
            problem("time_extent", "a lattice of " + layout.timeExtent() + " time slices", "give the lattice's extent, 4 or more");
        }
        if (layout.spatialExtent() < 2) {
            problem("spatial_extent", "a lattice of " + layout.spatialExtent() + " sites in each spatial direction", "give the lattice's extent, 2 or more");
        }
        Set<Observable> seen = new HashSet<>();
        for (int i = 0; i < layout.datasets().size(); i++) {
            Layout.Dataset d = layout.datasets().get(i);
            String path = "datasets." + i;
            if (!seen.add(d.observable())) {
                problem(path, "two datasets hold " + d.observable().id(), "remove one");
            }
            stored(path + ".stored", d);
            meaning(path, d);
        }
        return problems;
    }

    private void meaning(String path, Layout.Dataset d) {
        if (d instanceof Layout.Dataset.Connected c) {
            if (c.flavor() == Flavor.LIGHT && c.counts() != Layout.Counts.UP_PLUS_DOWN) {
                problem(path + ".counts", "the connected light insertion of " + c.hadron() + " must be the sum u+d; the two differ, so one cannot stand for both",
                    "store the sum and write counts: u+d");
            }
            if (c.separation() < 1 || c.separation() >= layout.timeExtent()) {
                problem(path + ".separation", "separation " + c.separation() + " does not fit " + layout.timeExtent() + " time slices", "give 1 to "
                    + (layout.timeExtent() - 1));
            }
        } else if (d instanceof Layout.Dataset.Loop l && l.flavor() != Flavor.LIGHT && l.counts() != Layout.Counts.ONE_FLAVOR) {
            problem(path + ".counts", "a " + l.flavor().word() + " loop counts one flavour", "write counts: one-flavor");
        } else if (d instanceof Layout.Dataset.ActionDensity a && !(a.flowTime() > 0)) {
            problem(path + ".flow_time", "flow time " + a.flowTime() + " is not positive", "give t/a^2 > 0");
        }
    }

    private void stored(String path, Layout.Dataset d) {
        Layout.Stored s = d.stored();
        Layout.Files files = layout.files().get(s.files());
        if (files == null) {
            problem(path + ".files", "there is no family of files '" + s.files() + "'", Nearest.advice(s.files(), layout.files().keySet()));
        } else if (files instanceof Layout.Files.Hdf5 h) {
            hdf5(path, d, h);
        } else if (files instanceof Layout.Files.Csv c) {
            csv(path, d, c);
        }
    }

    private void hdf5(String path, Layout.Dataset d, Layout.Files.Hdf5 files) {
        Layout.Stored s = d.stored();
        if (s.dataset().isEmpty() || s.axes().isEmpty() || s.complex().isEmpty()) {
            problem(path, "an HDF5 array needs dataset, axes and complex", "add the ones that are missing");
            return;
        }
        List<Layout.Axis> axes = s.axes().get();
        if (new HashSet<>(axes).size() < axes.size()) {
            problem(path + ".axes", "an axis stands twice", "name each axis once");
        }
        if (!axes.contains(Layout.Axis.TIME)) {
            problem(path + ".axes", d.observable().id() + " needs a time axis", "add time");
        }
        if (d.observable().hasSources() != axes.contains(Layout.Axis.SOURCE)) {
            problem(path + ".axes", d.observable().id() + (d.observable().hasSources() ? " needs a source axis" : " has no source axis"), "mend the axes");
        }
        boolean perConfiguration = files.path().contains("{trajectory}");
        if (perConfiguration == axes.contains(Layout.Axis.CONFIGURATION)) {
            problem(path + ".axes", perConfiguration ? "each file holds one configuration, so there is no configuration axis"
                : "one file holds all configurations, so there must be a configuration axis", "mend the axes or the path template");
        }
    }

    /** Whether the layout itself says where the only source stands, so that no column has to. */
    private static boolean oneSource(Layout.Dataset d) {
        Layout.SourceTimes sources = null;
        if (d instanceof Layout.Dataset.TwoPoint p) {
            sources = p.sources();
        } else if (d instanceof Layout.Dataset.Connected c) {
            sources = c.sources();
        }
        return sources instanceof Layout.SourceTimes.Fixed f && f.times().size() == 1;
    }

    private void csv(String path, Layout.Dataset d, Layout.Files.Csv files) {
        if (d.stored().value().isEmpty()) {
            problem(path, "a CSV table needs the name of its value column", "add value: column");
        }
        List<Layout.Column> needed = new ArrayList<>(List.of(Layout.Column.STREAM, Layout.Column.TRAJECTORY, Layout.Column.TIME));
        needed.removeIf(c -> files.path().contains("{" + Words.of(c) + "}"));
        if (d.observable().hasSources() && !oneSource(d)) {
            needed.add(Layout.Column.SOURCE_TIME);
        }
        needed.stream().filter(c -> !files.columns().containsKey(c)).forEach(c ->
            problem("files." + d.stored().files() + ".columns", "the table has no column for " + Words.of(c) + ", which " + d.observable().id() + " needs",
                "add " + Words.of(c) + ": name of the column"));
    }
}
