package tracewright.readers;

import java.util.Arrays;
import tracewright.study.Layout;

/** Source times of one dataset in one HDF5 file: one list for all configurations or one for each. */
final class SourceList {

    private static final int[] ORIGIN = {0};
    private static final int SHOWN = 16;

    private final int[][] times;                                // [configuration][source], or [1][source]

    private SourceList(int[][] times) {
        this.times = times;
    }

    /** Loops and densities: one record, counted from the lattice's zero. */
    static SourceList none() {
        return new SourceList(new int[][] {ORIGIN});
    }

    static SourceList of(Layout.SourceTimes declared, int configurations, int timeExtent, Hdf5File file) {
        if (declared instanceof Layout.SourceTimes.Fixed fixed) {
            return new SourceList(new int[][] {fixed.times().stream().mapToInt(Integer::intValue).toArray()});
        }
        String dataset = ((Layout.SourceTimes.FromDataset) declared).dataset();
        Labels.Numbers read = Labels.numbers(file, dataset);
        long[] dims = read.dims();
        boolean each = dims.length == 2 && dims[0] == configurations;
        if (!each && dims.length > 1) {
            throw new Unreadable("dataset does not match its description: source times have shape " + Shapes.text(dims) + ", expected sources, or "
                + configurations + " configurations x sources", file.where(dataset), "correct the dataset of source times in the layout");
        }
        int sources = (int) (dims.length == 0 ? 1 : dims[dims.length - 1]);
        int[][] times = new int[each ? configurations : 1][sources];
        for (int k = 0; k < read.values().length; k++) {
            times[k / sources][k % sources] = time(read.values()[k], k, timeExtent, file.where(dataset));
        }
        return new SourceList(times);
    }

    private static int time(double value, int position, int timeExtent, String where) {
        if (value != Math.rint(value) || value < 0 || value >= timeExtent) {
            throw new Unreadable("source time " + value + " (entry " + position + ") is no time slice 0.." + (timeExtent - 1), where,
                "correct the dataset of source times, or time_extent in the layout");
        }
        return (int) value;
    }

    int count() {
        return times[0].length;
    }

    int[] of(int configuration) {
        return times[times.length == 1 ? 0 : configuration];
    }

    /** For people: the whole list if it is short, else its ends. */
    @Override
    public String toString() {
        int[] t = times[0];
        if (times.length > 1) {
            return count() + " of each configuration's own";
        }
        return t.length <= SHOWN ? Arrays.toString(t) : "[" + t[0] + ", " + t[1] + ", ..., " + t[t.length - 1] + "] (" + t.length + ")";
    }
}
