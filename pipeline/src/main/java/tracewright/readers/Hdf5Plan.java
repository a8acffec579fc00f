package tracewright.readers;

import java.util.List;
import java.util.Optional;
import tracewright.study.Layout;
import tracewright.study.Layout.Axis;

/**
 * How one dataset of one opened file is read: made before any of its numbers, and only if its shape fits the layout.
 *
 * @param axis   number of the configuration axis, -1 if there is none
 * @param steps  distances inside one configuration's record
 * @param length numbers in one configuration's record
 */
record Hdf5Plan(Layout.Dataset dataset, StoredArray array, int axis, Conversion.Steps steps, int length, SourceList sources, Conversion conversion) {

    /** Numbers of one configuration at most: 256 MB. */
    private static final long RECORD_LIMIT = 1L << 25;

    static Hdf5Plan of(Layout layout, Layout.Dataset dataset, int configurations, Hdf5File file) {
        String name = path(dataset);
        List<Axis> axes = dataset.stored().axes().orElseThrow();
        StoredArray array = file.array(name, dataset.stored().complex().orElseThrow());
        SourceList sources = Datasets.sources(dataset).map(s -> SourceList.of(s, configurations, layout.timeExtent(), file)).orElseGet(SourceList::none);
        Conversion conversion = Conversion.of(layout, dataset);
        check(axes, configurations, sources, conversion, layout).check(array.dims(), file.where(name));
        checkAbsent(axes, configurations, sources, file.where(name));
        int axis = axes.indexOf(Axis.CONFIGURATION);
        long length = array.recordLength(axis);
        if (length > RECORD_LIMIT) {
            throw new Unreadable("one configuration holds " + length + " numbers, more than " + RECORD_LIMIT, file.where(name), "correct axes in the layout");
        }
        return new Hdf5Plan(dataset, array, axis, steps(axes, array.dims()), (int) length, sources, conversion);
    }

    static String path(Layout.Dataset dataset) {
        return dataset.stored().dataset().orElseThrow();
    }

    private static AxisCheck check(List<Axis> axes, int configurations, SourceList sources, Conversion conversion, Layout layout) {
        String time = conversion.stored() == layout.timeExtent() ? "time_extent" : "separation + 1";
        return new AxisCheck(axes)
            .expect(Axis.CONFIGURATION, configurations, "configuration labels")
            .expect(Axis.SOURCE, sources.count(), "source times")
            .expect(Axis.TIME, conversion.stored(), time);
    }

    private static void checkAbsent(List<Axis> axes, int configurations, SourceList sources, String where) {
        if (configurations > 1 && !axes.contains(Axis.CONFIGURATION)) {
            throw new Unreadable(configurations + " configuration labels, but the dataset has no configuration axis", where,
                "add configuration to axes, or take the labels from elsewhere");
        }
        if (sources.count() > 1 && !axes.contains(Axis.SOURCE)) {
            throw new Unreadable(sources.count() + " source times, but the dataset has no source axis", where, "add source to axes, or correct the source times");
        }
    }

    private static Conversion.Steps steps(List<Axis> axes, long[] dims) {
        int[] step = new int[Axis.values().length];
        int hits = 1;
        int product = 1;
        for (int k = dims.length - 1; k >= 0; k--) {
            Axis axis = axes.get(k);
            if (axis != Axis.CONFIGURATION) {
                step[axis.ordinal()] = product;
                product = (int) Math.min(product * dims[k], Integer.MAX_VALUE);
            }
            hits = axis == Axis.HIT ? (int) dims[k] : hits;
        }
        return new Conversion.Steps(step[Axis.SOURCE.ordinal()], step[Axis.HIT.ordinal()], step[Axis.TIME.ordinal()], hits);
    }

    /** Where and how, for people. */
    String inWords() {
        List<Axis> axes = dataset.stored().axes().orElseThrow();
        Optional<String> sourceWords = dataset.observable().hasSources() ? Optional.of("; source times " + sources) : Optional.empty();
        return "dataset " + path(dataset) + ", (" + AxisCheck.text(axes) + ") = " + Shapes.text(array.dims()) + " of " + array.inWords()
            + (steps.hits() > 1 ? ", averaged over " + steps.hits() + " hits" : "") + sourceWords.orElse("");
    }
}
