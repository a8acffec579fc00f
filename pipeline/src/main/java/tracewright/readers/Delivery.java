package tracewright.readers;

import tracewright.study.ConfigurationId;
import tracewright.study.Layout;

/** Last step of reading: converted records that are sound go to the sink, the others become problems. */
final class Delivery {

    private static final int[] NO_SOURCES = {};

    private final EnsembleSource.Sink sink;
    private final Complaints complaints;

    Delivery(EnsembleSource.Sink sink, Complaints complaints) {
        this.sink = sink;
        this.complaints = complaints;
    }

    Complaints complaints() {
        return complaints;
    }

    /**
     * @param sourceTimes [source]; one zero for loops and densities
     * @param values      [source][kept], converted
     * @param finite      whether all of them are finite
     * @param place       file and dataset, for messages
     */
    void hand(Layout.Dataset dataset, Conversion conversion, ConfigurationId id, int[] sourceTimes, double[] values, boolean finite, String place) {
        boolean sources = dataset.observable().hasSources();
        if (!finite) {
            complaints.add(notFinite(conversion, sources ? sourceTimes : NO_SOURCES, values), Where.configuration(place, id),
                "measure this configuration again, or exclude it by the study's cuts");
            return;
        }
        int silent = dataset instanceof Layout.Dataset.TwoPoint ? allZero(values, conversion.kept()) : -1;
        if (silent >= 0) {
            complaints.add("impossible physics: every time slice of source " + silent + " (t0 = " + sourceTimes[silent] + ") is exactly zero",
                Where.configuration(place, id), "the record was probably never filled: measure it again, or exclude the configuration by the study's cuts");
            return;
        }
        sink.accept(dataset.observable(), id, sources ? sourceTimes : NO_SOURCES, values);
    }

    private static String notFinite(Conversion conversion, int[] sourceTimes, double[] values) {
        int count = 0;
        int first = -1;
        for (int k = 0; k < values.length; k++) {
            if (!Double.isFinite(values[k])) {
                first = first < 0 ? k : first;
                count++;
            }
        }
        int s = first / conversion.kept();
        int t = first % conversion.kept();
        String source = sourceTimes.length == 0 ? "" : "source " + s + " (t0 = " + sourceTimes[s] + "), ";
        int slice = conversion.storedSlice(sourceTimes.length == 0 ? 0 : sourceTimes[s], t);
        return "value is not finite (" + values[first] + "): " + source + "time " + slice + " of the file; " + count + " of " + values.length
            + " values of this configuration";
    }

    /** First source whose slices are all zero, or -1. */
    private static int allZero(double[] values, int kept) {
        for (int from = 0; from < values.length; from += kept) {
            int t = 0;
            while (t < kept && values[from + t] == 0) {
                t++;
            }
            if (t == kept) {
                return from / kept;
            }
        }
        return -1;
    }
}
