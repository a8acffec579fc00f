package tracewright.readers;

/** Loops of {@link Conversion} on flat arrays. */
final class ConversionKernels {

    private ConversionKernels() {
    }

    /**
     * Scales a run of slices, averaged over hits in their order.
     *
     * @param in    slice t of hit h at {@code from + t steps.time() + h steps.hit()}; read
     * @param out   slice t at {@code outFrom + t}; overwritten
     * @param count slices
     */
    static void segment(double[] in, int from, Conversion.Steps steps, double factor, double[] out, int outFrom, int count) {
        int dt = steps.time();
        if (steps.hits() > 1) {
            hits(in, from, steps, factor, out, outFrom, count);
        } else if (dt == 1 && factor == 1) {                    // the common case, a sixth faster than multiplying
            System.arraycopy(in, from, out, outFrom, count);
        } else if (dt == 1) {
            for (int t = 0; t < count; t++) {
                out[outFrom + t] = factor * in[from + t];
            }
        } else {
            for (int t = 0; t < count; t++) {
                out[outFrom + t] = factor * in[from + t * dt];
            }
        }
    }

    private static void hits(double[] in, int from, Conversion.Steps steps, double factor, double[] out, int outFrom, int count) {
        for (int t = 0; t < count; t++) {
            out[outFrom + t] = 0;
        }
        for (int h = 0; h < steps.hits(); h++) {
            int base = from + h * steps.hit();
            for (int t = 0; t < count; t++) {
                out[outFrom + t] += in[base + t * steps.time()];
            }
        }
        for (int t = 0; t < count; t++) {
            out[outFrom + t] = out[outFrom + t] / steps.hits() * factor;
        }
    }

    /**
     * Sum of x - x over a row: zero if all are finite, else NaN, which survives every further sum. Four sums run side by side,
     * because one alone waits for each addition.
     *
     * @param values row at {@code from}, {@code count} long; read
     */
    static double residue(double[] values, int from, int count) {
        double a = 0;
        double b = 0;
        double c = 0;
        double d = 0;
        int k = from;
        int end = from + count;
        for (; k + 3 < end; k += 4) {
            a += values[k] - values[k];
            b += values[k + 1] - values[k + 1];
            c += values[k + 2] - values[k + 2];
            d += values[k + 3] - values[k + 3];
        }
        for (; k < end; k++) {
            a += values[k] - values[k];
        }
        return a + b + c + d;
    }
}
