package tracewright.correlators;

/** Loops over sources; arrays are flat, the caller has checked shapes. */
final class ReductionKernels {

    private ReductionKernels() {
    }

    /**
     * row[offset + j] = mean over sources of values[s][j].
     *
     * @param values  [sources][length], read
     * @param row     overwritten from offset to offset + length
     */
    static void sourceAverage(double[] values, int sources, int length, double[] row, int offset) {
        for (int j = 0; j < length; j++) {
            row[offset + j] = 0;
        }
        for (int s = 0; s < sources; s++) {
            int at = s * length;
            for (int j = 0; j < length; j++) {
                row[offset + j] += values[at + j];
            }
        }
        double scale = 1.0 / sources;
        for (int j = 0; j < length; j++) {
            row[offset + j] *= scale;
        }
    }

    /**
     * row[offset + tau] = mean over sources of weight[s] * slices[times[s] + tau], tau = 0 .. last.
     *
     * @param slices [2 T], the time series of a loop or density written twice, so that t0 + tau needs no modulus; read
     * @param weight [sources], C2(separation) of each source; read
     */
    static void product(double[] slices, int[] times, double[] weight, int sources, int last, double[] row, int offset) {
        for (int tau = 0; tau <= last; tau++) {
            row[offset + tau] = 0;
        }
        for (int s = 0; s < sources; s++) {
            int t0 = times[s];
            double w = weight[s];
            for (int tau = 0; tau <= last; tau++) {
                row[offset + tau] += w * slices[t0 + tau];
            }
        }
        double scale = 1.0 / sources;
        for (int tau = 0; tau <= last; tau++) {
            row[offset + tau] *= scale;
        }
    }
}
