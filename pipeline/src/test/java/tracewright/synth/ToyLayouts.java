package tracewright.synth;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import tracewright.study.Flavor;
import tracewright.study.Layout;

/** Three layouts for the ensemble of {@link InventedTheory} that differ in whatever they can. */
final class ToyLayouts {

    private static final List<Integer> SEPARATIONS = List.of(3, 5);
    private static final List<Double> FLOW = List.of(1.0, 2.0, 3.0);

    private ToyLayouts() {
    }

    /** One HDF5 file; complex compounds; labels in datasets; absolute time, boundary sign included; Tr D^-1 of one flavour. */
    static Layout oneFile() {
        Layout.Files files = new Layout.Files.Hdf5("all.h5", new Layout.Label.FromDataset("/labels/trajectory"), new Layout.Label.FromDataset("/labels/stream"));
        List<Layout.Dataset> datasets = new ArrayList<>();
        for (String hadron : List.of("pion", "nucleon")) {
            boolean baryon = hadron.equals("nucleon");
            datasets.add(new Layout.Dataset.TwoPoint(hadron, array("/two_point/" + hadron, Layout.ComplexForm.COMPOUND, withSources()),
                new Layout.SourceTimes.FromDataset("/labels/source_time"), Layout.TimeOrigin.ABSOLUTE,
                baryon ? Layout.Boundary.ANTIPERIODIC : Layout.Boundary.PERIODIC, Layout.BoundarySign.INCLUDED));
        }
        for (int t : SEPARATIONS) {
            datasets.add(new Layout.Dataset.Connected("nucleon", Flavor.LIGHT, Layout.Counts.UP_PLUS_DOWN, t,
                array("/three_point/t" + t, Layout.ComplexForm.COMPOUND, withSources()), new Layout.SourceTimes.FromDataset("/labels/connected_time"),
                Layout.TimeOrigin.ABSOLUTE, Layout.Boundary.ANTIPERIODIC, Layout.BoundarySign.INCLUDED));
        }
        List<Layout.Axis> slices = List.of(Layout.Axis.TIME, Layout.Axis.CONFIGURATION);
        slices(datasets, path -> array("/" + path, Layout.ComplexForm.NONE, slices), Layout.Counts.ONE_FLAVOR,
            Layout.LoopConvention.TRACE_INVERSE, Layout.DensityConvention.T2E, Layout.Volume.AVERAGE);
        return layout(Map.of("main", files), datasets);
    }

    /** One HDF5 file for each configuration; trailing complex axis; labels in file names; time from the source. */
    static Layout manyFiles() {
        Layout.Files files = new Layout.Files.Hdf5("run_{stream}/{trajectory}.h5", new Layout.Label.FromPath("trajectory"), new Layout.Label.FromPath("stream"));
        List<Layout.Axis> axes = List.of(Layout.Axis.SOURCE, Layout.Axis.TIME);
        List<Layout.Dataset> datasets = new ArrayList<>();
        for (String hadron : List.of("pion", "nucleon")) {
            datasets.add(new Layout.Dataset.TwoPoint(hadron, array("/" + hadron, Layout.ComplexForm.TRAILING, axes),
                new Layout.SourceTimes.FromDataset("/times"), Layout.TimeOrigin.SOURCE, Layout.Boundary.ANTIPERIODIC, Layout.BoundarySign.REMOVED));
        }
        for (int t : SEPARATIONS) {
            datasets.add(new Layout.Dataset.Connected("nucleon", Flavor.LIGHT, Layout.Counts.UP_PLUS_DOWN, t,
                array("/three/" + t, Layout.ComplexForm.TRAILING, axes), new Layout.SourceTimes.FromDataset("/connected_times"),
                Layout.TimeOrigin.SOURCE, Layout.Boundary.ANTIPERIODIC, Layout.BoundarySign.INCLUDED));
        }
        slices(datasets, path -> array("/" + path, Layout.ComplexForm.NONE, List.of(Layout.Axis.TIME)), Layout.Counts.UP_PLUS_DOWN,
            Layout.LoopConvention.OPERATOR, Layout.DensityConvention.G2, Layout.Volume.SUM);
        return layout(Map.of("main", files), datasets);
    }

    /** Three tables; the slices share rows. */
    static Layout tables() {
        Map<Layout.Column, String> columns = Map.of(Layout.Column.STREAM, "stream", Layout.Column.TRAJECTORY, "config", Layout.Column.TIME, "t");
        Map<Layout.Column, String> correlator = new LinkedHashMap<>(columns);
        correlator.put(Layout.Column.SOURCE_TIME, "t0");
        Map<String, Layout.Files> files = Map.of("two", new Layout.Files.Csv("two.csv.gz", correlator), "three", new Layout.Files.Csv("three.csv", correlator),
            "slices", new Layout.Files.Csv("slices.csv.gz", columns));
        List<Layout.Dataset> datasets = new ArrayList<>();
        for (String hadron : List.of("pion", "nucleon")) {
            datasets.add(new Layout.Dataset.TwoPoint(hadron, column("two", "re", Map.of("hadron", hadron)), new Layout.SourceTimes.FromColumn(),
                Layout.TimeOrigin.SOURCE, Layout.Boundary.ANTIPERIODIC, Layout.BoundarySign.INCLUDED));
        }
        for (int t : SEPARATIONS) {
            datasets.add(new Layout.Dataset.Connected("nucleon", Flavor.LIGHT, Layout.Counts.UP_PLUS_DOWN, t,
                column("three", "re", Map.of("separation", Integer.toString(t))), new Layout.SourceTimes.FromColumn(),
                Layout.TimeOrigin.SOURCE, Layout.Boundary.PERIODIC, Layout.BoundarySign.INCLUDED));
        }
        slices(datasets, path -> column("slices", path, Map.of()), Layout.Counts.UP_PLUS_DOWN, Layout.LoopConvention.OPERATOR,
            Layout.DensityConvention.E, Layout.Volume.SUM);
        return layout(files, datasets);
    }

    private interface Place {
        Layout.Stored of(String name);
    }

    private static void slices(List<Layout.Dataset> to, Place place, Layout.Counts counts, Layout.LoopConvention sign, Layout.DensityConvention density,
                               Layout.Volume volume) {
        to.add(new Layout.Dataset.Loop(Flavor.LIGHT, counts, place.of("light"), sign, volume));
        to.add(new Layout.Dataset.Loop(Flavor.STRANGE, Layout.Counts.ONE_FLAVOR, place.of("strange"), sign, volume));
        FLOW.forEach(t -> to.add(new Layout.Dataset.ActionDensity(t, place.of("density" + t.intValue()), density, volume)));
    }

    private static List<Layout.Axis> withSources() {
        return List.of(Layout.Axis.CONFIGURATION, Layout.Axis.SOURCE, Layout.Axis.TIME);
    }

    private static Layout.Stored array(String dataset, Layout.ComplexForm complex, List<Layout.Axis> axes) {
        return new Layout.Stored("main", Optional.of(dataset), Optional.of(axes), Optional.of(complex), Optional.empty(), Map.of());
    }

    private static Layout.Stored column(String files, String value, Map<String, String> where) {
        return new Layout.Stored(files, Optional.empty(), Optional.empty(), Optional.empty(), Optional.of(value), where);
    }

    private static Layout layout(Map<String, Layout.Files> files, List<Layout.Dataset> datasets) {
        return new Layout("tracewright-layout/1", "", 16, 12, files, datasets);
    }
}
