package tracewright.readers;

/** Work space that is used again for every slab and every record. */
final class Buffers {

    private double[] in = {};
    private double[] out = {};

    /** At least {@code length} numbers, content undefined. */
    double[] in(int length) {
        if (in.length < length) {
            in = new double[length];
        }
        return in;
    }

    /** Exactly {@code length} numbers, content undefined. */
    double[] out(int length) {
        if (out.length != length) {
            out = new double[length];
        }
        return out;
    }
}
