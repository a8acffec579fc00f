package tracewright.readers;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import tracewright.study.ConfigurationId;
import tracewright.study.Layout;

/** Configuration labels of one HDF5 file, wherever they stand. */
final class Labels {

    /** Entries of a label dataset at most. */
    static final int LIMIT = 10_000_000;

    private Labels() {
    }

    /** Configurations of a file in the order of its configuration axis. */
    static List<ConfigurationId> read(Layout.Files.Hdf5 family, Map<String, String> fromPath, Hdf5File file, String where) {
        List<String> streams = texts(family.stream(), fromPath, file);
        List<String> trajectories = texts(family.trajectory(), fromPath, file);
        int count = Math.max(streams.size(), trajectories.size());
        checkLengths(streams.size(), trajectories.size(), where);
        List<ConfigurationId> ids = new ArrayList<>(count);
        for (int k = 0; k < count; k++) {
            String stream = streams.get(streams.size() == 1 ? 0 : k);
            String trajectory = trajectories.get(trajectories.size() == 1 ? 0 : k);
            ids.add(new ConfigurationId(stream, trajectory(trajectory, where + ", entry " + k)));
        }
        return List.copyOf(ids);
    }

    private static void checkLengths(int streams, int trajectories, String where) {
        if (trajectories == 1 || streams == 1 || streams == trajectories) {
            return;
        }
        throw new Unreadable("configuration labels disagree: " + streams + " streams and " + trajectories + " trajectories", where,
            "name label datasets with one entry per configuration");
    }

    /** A trajectory number as it is written; 18 digits at most, so that it always fits. */
    static long trajectory(String text, String where) {
        if (text.isEmpty() || text.length() > 18 || !text.chars().allMatch(c -> c >= '0' && c <= '9')) {
            throw new Unreadable("'" + text + "' is no trajectory number", where, "use whole numbers from 0 on, up to 18 digits, as trajectory labels");
        }
        return Long.parseLong(text);
    }

    private static List<String> texts(Layout.Label label, Map<String, String> fromPath, Hdf5File file) {
        if (label instanceof Layout.Label.Constant c) {
            return List.of(c.is());
        }
        if (label instanceof Layout.Label.FromPath p) {
            return List.of(fromPath.get(p.placeholder()));
        }
        String dataset = ((Layout.Label.FromDataset) label).dataset();
        Optional<List<String>> strings = file.strings(dataset);
        return strings.orElseGet(() -> wholeNumbers(file, dataset));
    }

    private static List<String> wholeNumbers(Hdf5File file, String dataset) {
        double[] numbers = numbers(file, dataset).values();
        List<String> texts = new ArrayList<>(numbers.length);
        for (double v : numbers) {
            texts.add(v == Math.rint(v) && Math.abs(v) < 0x1p53 ? Long.toString((long) v) : Double.toString(v));
        }
        return texts;
    }

    /** A small dataset read whole. */
    static Numbers numbers(Hdf5File file, String dataset) {
        StoredArray array = file.array(dataset, Layout.ComplexForm.NONE);
        long[] dims = array.dims();
        double length = 1;
        for (long n : dims) {
            length *= n;
        }
        if (length > LIMIT) {
            throw new Unreadable("dataset does not match its description: " + Shapes.text(dims) + " labels, more than " + LIMIT, file.where(dataset),
                "name the dataset that holds the labels");
        }
        double[] values = new double[(int) length];
        if (!file.read(array, dataset, -1, 0, 1, values).isEmpty()) {
            throw new Unreadable("dataset of labels was never written completely", file.where(dataset), "write the labels of all configurations");
        }
        return new Numbers(dims, values);
    }

    /** Shape and values of a dataset. */
    record Numbers(long[] dims, double[] values) {
    }
}
