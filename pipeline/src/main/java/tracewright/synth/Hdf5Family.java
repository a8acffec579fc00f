package tracewright.synth;

import java.nio.ByteBuffer;
import java.nio.ByteOrder;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.LinkedHashMap;
import java.util.LinkedHashSet;
import java.util.List;
import java.util.Map;
import java.util.Set;
import tracewright.study.ConfigurationId;
import tracewright.study.Layout;

/** Writes the HDF5 files of one family of a layout: one file, or as many as the placeholders of its path tell apart. */
final class Hdf5Family {

    /** Bytes of a dataset from which on chunks are worth their index. */
    private static final int WORTH_CHUNKS = 1 << 14;
    /** Imaginary parts are noise of this size relative to the real part. */
    private static final double IMAGINARY = 0.01;
    /** Bits of an imaginary part's float32 that are kept: sign, exponent and six of the mantissa, because noise needs no more. */
    private static final int COARSE = 0xFFFE0000;

    private final Records records;
    private final Layout layout;
    private final String name;
    private final Layout.Files.Hdf5 family;
    private final boolean wide;
    private final Gaussian noise;

    Hdf5Family(Records records, Layout layout, String name, Truth.Width width, long seed) {
        this.records = records;
        this.layout = layout;
        this.name = name;
        this.family = (Layout.Files.Hdf5) layout.files().get(name);
        this.wide = width == Truth.Width.FLOAT64;
        this.noise = Gaussian.of(seed, "imaginary/" + family.path());
    }

    /** Files by path. */
    Map<String, byte[]> files() {
        Map<String, List<Integer>> members = new LinkedHashMap<>();
        for (int i = 0; i < records.configurations().size(); i++) {
            members.computeIfAbsent(path(records.configurations().get(i)), p -> new ArrayList<>()).add(i);
        }
        Map<String, byte[]> files = new LinkedHashMap<>();
        members.forEach((path, configurations) -> files.put(path, file(configurations)));
        return files;
    }

    private String path(ConfigurationId id) {
        String path = family.path();
        path = replace(path, family.stream(), id.stream());
        return replace(path, family.trajectory(), Long.toString(id.trajectory()));
    }

    private static String replace(String path, Layout.Label label, String text) {
        return label instanceof Layout.Label.FromPath p ? path.replace("{" + p.placeholder() + "}", text) : path;
    }

    private byte[] file(List<Integer> configurations) {
        Hdf5Writer writer = new Hdf5Writer();
        labels(writer, configurations);
        Set<String> written = new LinkedHashSet<>();
        for (Layout.Dataset dataset : layout.datasets()) {
            if (dataset.stored().files().equals(name)) {
                if (dataset.observable().hasSources()) {
                    sourceTimes(writer, dataset, configurations, written);
                }
                numbers(writer, dataset, configurations);
            }
        }
        return writer.bytes();
    }

    private void labels(Hdf5Writer writer, List<Integer> configurations) {
        if (family.trajectory() instanceof Layout.Label.FromDataset d) {
            ByteBuffer bytes = little(8 * configurations.size());
            configurations.forEach(i -> bytes.putLong(records.configurations().get(i).trajectory()));
            writer.contiguous(d.dataset(), Hdf5Writer.Type.INT64, new long[] {configurations.size()}, bytes.array());
        }
        if (family.stream() instanceof Layout.Label.FromDataset d) {
            writer.strings(d.dataset(), configurations.stream().map(i -> records.configurations().get(i).stream()).toList());
        }
    }

    private void sourceTimes(Hdf5Writer writer, Layout.Dataset dataset, List<Integer> configurations, Set<String> written) {
        Layout.SourceTimes where = Records.sources(dataset);
        if (where instanceof Layout.SourceTimes.Fixed fixed) {
            for (int i : configurations) {
                int[] times = records.sourceTimes(dataset, i);
                Checks.layout(Arrays.stream(times).boxed().toList().equals(fixed.times()), dataset.observable().id() + ": the layout lists source times "
                    + fixed.times() + ", the truth has " + Arrays.toString(times) + " on " + records.configurations().get(i));
            }
        } else if (where instanceof Layout.SourceTimes.FromDataset d) {
            if (written.add(d.dataset())) {
                writeTimes(writer, d.dataset(), dataset, configurations);
            }
        } else {
            throw Checks.refusal(dataset.observable().id() + ": an HDF5 file has no source-time column");
        }
    }

    private void writeTimes(Hdf5Writer writer, String path, Layout.Dataset dataset, List<Integer> configurations) {
        int count = records.sourceTimes(dataset, configurations.get(0)).length;
        ByteBuffer bytes = little(4 * count * configurations.size());
        for (int i : configurations) {
            for (int time : records.sourceTimes(dataset, i)) {
                bytes.putInt(time);
            }
        }
        boolean many = axes(dataset).contains(Layout.Axis.CONFIGURATION);
        writer.contiguous(path, Hdf5Writer.Type.INT32, many ? new long[] {configurations.size(), count} : new long[] {count}, bytes.array());
    }

    private static List<Layout.Axis> axes(Layout.Dataset dataset) {
        return dataset.stored().axes().orElseThrow(() -> Checks.refusal(dataset.observable().id() + ": an HDF5 dataset needs axes"));
    }

    private void numbers(Hdf5Writer writer, Layout.Dataset dataset, List<Integer> configurations) {
        List<Layout.Axis> axes = axes(dataset);
        Checks.layout(!axes.contains(Layout.Axis.HIT), dataset.observable().id() + ": hits are averaged in synthetic ensembles, no hit axis is written");
        Checks.layout(axes.contains(Layout.Axis.CONFIGURATION) || configurations.size() == 1,
            dataset.observable().id() + ": several configurations in one file, but no configuration axis");
        double[] first = records.stored(dataset, configurations.get(0));
        int sources = Math.max(1, records.sourceTimes(dataset, configurations.get(0)).length);
        int times = first.length / sources;
        long[] dims = axes.stream().mapToLong(axis -> extent(axis, configurations.size(), sources, times)).toArray();
        double[] flat = new double[configurations.size() * first.length];
        long[] steps = steps(axes, dims);
        for (int c = 0; c < configurations.size(); c++) {
            double[] values = records.stored(dataset, configurations.get(c));
            for (int k = 0; k < values.length; k++) {
                flat[(int) (c * steps[0] + (k / times) * steps[1] + (k % times) * steps[2])] = values[k];
            }
        }
        put(writer, dataset, dims, flat);
    }

    private static long extent(Layout.Axis axis, int configurations, int sources, int times) {
        return switch (axis) {
            case CONFIGURATION -> configurations;
            case SOURCE -> sources;
            case TIME -> times;
            case HIT -> 1;
        };
    }

    /** Distances in the stored array between neighbouring configurations, sources and times. */
    private static long[] steps(List<Layout.Axis> axes, long[] dims) {
        long[] steps = new long[3];
        long step = 1;
        for (int k = axes.size() - 1; k >= 0; k--) {
            int which = switch (axes.get(k)) {
                case CONFIGURATION -> 0;
                case SOURCE -> 1;
                case TIME, HIT -> 2;
            };
            steps[which] = step;
            step *= dims[k];
        }
        return steps;
    }

    private void put(Hdf5Writer writer, Layout.Dataset dataset, long[] dims, double[] flat) {
        Layout.ComplexForm complex = dataset.stored().complex().orElse(Layout.ComplexForm.NONE);
        long[] shape = dims;
        if (complex == Layout.ComplexForm.TRAILING) {
            shape = Arrays.copyOf(dims, dims.length + 1);
            shape[dims.length] = 2;
        }
        byte[] bytes = bytes(flat, complex != Layout.ComplexForm.NONE);
        String path = dataset.stored().dataset()
            .orElseThrow(() -> Checks.refusal(dataset.observable().id() + ": an HDF5 dataset needs its path in the file"));
        if (bytes.length < WORTH_CHUNKS) {
            writer.contiguous(path, type(complex), shape, bytes);
        } else {
            int rows = (int) ((shape[0] + Hdf5Writer.MOST_CHUNKS / 4 - 1) / (Hdf5Writer.MOST_CHUNKS / 4));
            writer.chunked(path, type(complex), shape, rows, bytes);
        }
    }

    private Hdf5Writer.Type type(Layout.ComplexForm complex) {
        if (complex == Layout.ComplexForm.COMPOUND) {
            return wide ? Hdf5Writer.Type.COMPLEX_FLOAT64 : Hdf5Writer.Type.COMPLEX_FLOAT32;
        }
        return wide ? Hdf5Writer.Type.FLOAT64 : Hdf5Writer.Type.FLOAT32;
    }

    private byte[] bytes(double[] flat, boolean complex) {
        ByteBuffer bytes = little(flat.length * (wide ? 8 : 4) * (complex ? 2 : 1));
        for (double value : flat) {
            put(bytes, value);
            if (complex) {
                float rough = (float) (value * IMAGINARY * noise.next());
                put(bytes, Float.intBitsToFloat(Float.floatToRawIntBits(rough) & COARSE));
            }
        }
        return bytes.array();
    }

    private void put(ByteBuffer bytes, double value) {
        if (wide) {
            bytes.putDouble(value);
        } else {
            bytes.putFloat((float) value);
        }
    }

    private static ByteBuffer little(int size) {
        return ByteBuffer.allocate(size).order(ByteOrder.LITTLE_ENDIAN);
    }
}
