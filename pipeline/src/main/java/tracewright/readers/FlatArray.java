package tracewright.readers;

import java.nio.ByteBuffer;
import java.util.BitSet;

/** Contiguous or compact dataset: one run of bytes, row-major. */
final class FlatArray implements StoredArray {

    /** Elements of one slab: about a megabyte, so that it stays in the cache between reading and converting. */
    private static final int SLAB = 1 << 17;
    /** Bytes taken from the file at once. */
    private static final int PIECE = 1 << 20;

    private final long[] dims;
    private final NumberForm form;
    private final Hdf5Bytes bytes;
    private final long start;

    /** @param start position of the first element in {@code bytes} */
    FlatArray(long[] dims, NumberForm form, Hdf5Bytes bytes, long start) {
        this.dims = dims.clone();
        this.form = form;
        this.bytes = bytes;
        this.start = start;
    }

    @Override
    public long[] dims() {
        return dims.clone();
    }

    @Override
    public String inWords() {
        return form.inWords() + ", contiguous";
    }

    @Override
    public int slab(int axis) {
        return (int) Math.max(1, SLAB / Math.max(1, recordLength(axis)));
    }

    @Override
    public BitSet read(int axis, int first, int count, double[] out) {
        if (axis < 0) {
            run(0, Math.toIntExact(recordLength(-1)), out, 0);
            return new BitSet();
        }
        int outer = product(0, axis);
        int inner = product(axis + 1, dims.length);
        int length = outer * inner;
        for (int o = 0; o < outer; o++) {
            long from = (o * dims[axis] + first) * inner;
            if (outer == 1) {
                run(from, count * inner, out, 0);
            } else if (inner == 1) {
                column(from, count, out, o, length);
            } else {
                for (int c = 0; c < count; c++) {
                    run(from + (long) c * inner, inner, out, c * length + o * inner);
                }
            }
        }
        return new BitSet();
    }

    private void run(long element, int count, double[] out, int outFrom) {
        int most = Math.max(1, PIECE / form.stride());
        for (int done = 0; done < count; done += most) {
            int n = Math.min(most, count - done);
            form.decode(piece(element + done, n), 0, n, out, outFrom + done, 1);
        }
    }

    private void column(long element, int count, double[] out, int outFrom, int outStep) {
        form.decode(piece(element, count), 0, count, out, outFrom, outStep);
    }

    private ByteBuffer piece(long element, int count) {
        return bytes.at(start + element * form.stride(), count * form.stride());
    }

    private int product(int from, int to) {
        long product = 1;
        for (int k = from; k < to; k++) {
            product *= dims[k];
        }
        return Math.toIntExact(product);
    }
}
