package tracewright.readers;

import io.jhdf.api.dataset.ChunkedDataset;
import io.jhdf.exceptions.HdfException;
import java.nio.ByteBuffer;
import java.util.Arrays;
import java.util.BitSet;

/**
 * Chunked dataset, each chunk decoded once per slab. A chunk that was never written is reported, never taken for zeros. Chunks
 * are decoded one after the other on the calling thread.
 */
final class ChunkedArray implements StoredArray {

    /** Elements of one slab at most, unless a single record is longer: 32 MB. */
    private static final long SLAB = 1 << 22;
    /** Reads after which mappings that nobody uses are given back, for files too long for one mapping: below the kernel's usual 65,530. */
    private static final int READS_PER_COLLECTION = 20_000;

    private final ChunkedDataset dataset;
    private final NumberForm form;
    private final boolean mapsEachChunk;
    private final int rankOnDisk;
    private final long[] dims;
    private final int[] chunk;
    private final NumberForm inChunk;
    private int reads;

    /**
     * @param dims          lengths without the complex axis
     * @param mapsEachChunk whether each chunk makes its own mapping of the file
     */
    ChunkedArray(ChunkedDataset dataset, long[] dims, NumberForm form, boolean mapsEachChunk) {
        this.dataset = dataset;
        this.form = form;
        this.mapsEachChunk = mapsEachChunk;
        this.dims = dims.clone();
        int[] onDisk = dataset.getChunkDimensions();
        this.rankOnDisk = onDisk.length;
        this.chunk = Arrays.copyOf(onDisk, dims.length);
        this.inChunk = rankOnDisk == dims.length ? form : withComplexAxis(form, onDisk[rankOnDisk - 1]);
    }

    /** The stride in {@code form} counts a pair; a chunk may cut the pair and hold one half of it. */
    private static NumberForm withComplexAxis(NumberForm form, int along) {
        return new NumberForm(form.kind(), form.order(), form.stride() / 2 * along, form.offset(), form.inWords());
    }

    @Override
    public long[] dims() {
        return dims.clone();
    }

    @Override
    public String inWords() {
        return form.inWords() + ", chunks of " + Shapes.text(chunk);
    }

    @Override
    public int slab(int axis) {
        if (axis < 0) {
            return 1;
        }
        long fits = Math.max(1, SLAB / Math.max(1, recordLength(axis)));
        return (int) (fits >= chunk[axis] ? fits / chunk[axis] * chunk[axis] : fits);
    }

    @Override
    public BitSet read(int axis, int first, int count, double[] out) {
        long[] low = new long[dims.length];
        long[] high = dims.clone();
        if (axis >= 0) {
            low[axis] = first;
            high[axis] = first + count;
        }
        int[] steps = outSteps(axis);
        BitSet missing = new BitSet();
        long[] corner = new long[dims.length];
        for (int k = 0; k < corner.length; k++) {
            corner[k] = low[k] / chunk[k] * chunk[k];
        }
        do {
            one(corner, low, high, steps, axis, missing, out);
        } while (advance(corner, low, high));
        return missing;
    }

    /** Next chunk of the grid, last axis fastest; false after the last. */
    private boolean advance(long[] corner, long[] low, long[] high) {
        for (int k = corner.length - 1; k >= 0; k--) {
            corner[k] += chunk[k];
            if (corner[k] < high[k]) {
                return true;
            }
            corner[k] = low[k] / chunk[k] * chunk[k];
        }
        return false;
    }

    private void one(long[] corner, long[] low, long[] high, int[] steps, int axis, BitSet missing, double[] out) {
        int rank = corner.length;
        int[] from = new int[rank];
        int[] to = new int[rank];
        for (int k = 0; k < rank; k++) {
            from[k] = (int) (Math.max(low[k], corner[k]) - corner[k]);
            to[k] = (int) (Math.min(high[k], corner[k] + chunk[k]) - corner[k]);
        }
        byte[] bytes = decoded(corner);
        if (bytes == null) {
            int shift = axis < 0 ? 0 : (int) (corner[axis] - low[axis]);
            missing.set(axis < 0 ? 0 : from[axis] + shift, axis < 0 ? 1 : to[axis] + shift);
            return;
        }
        scatter(ByteBuffer.wrap(bytes), corner, low, from, to, steps, out);
    }

    /** Bytes of a chunk, full size also at the edge; null if it was never written. */
    private byte[] decoded(long[] corner) {
        int[] at = new int[rankOnDisk];
        for (int k = 0; k < corner.length; k++) {
            at[k] = Math.toIntExact(corner[k]);
        }
        if (mapsEachChunk && ++reads % READS_PER_COLLECTION == 0) {
            System.gc();
        }
        try {
            return dataset.getDecompressedChunk(at);
        } catch (HdfException e) {
            if (e.getMessage() != null && e.getMessage().startsWith("No chunk with offset")) {
                return null;
            }
            throw e;
        }
    }

    private void scatter(ByteBuffer bytes, long[] corner, long[] low, int[] from, int[] to, int[] steps, double[] out) {
        int last = from.length - 1;
        int[] at = from.clone();
        do {
            int source = 0;
            int target = 0;
            for (int k = 0; k <= last; k++) {
                source = source * chunk[k] + at[k];
                target += (int) (corner[k] + at[k] - low[k]) * steps[k];
            }
            inChunk.decode(bytes, source * inChunk.stride(), to[last] - from[last], out, target, steps[last]);
        } while (nextRow(at, from, to));
    }

    private static boolean nextRow(int[] at, int[] from, int[] to) {
        for (int k = at.length - 2; k >= 0; k--) {
            if (++at[k] < to[k]) {
                return true;
            }
            at[k] = from[k];
        }
        return false;
    }

    /** Distances in the slab [count][other axes] between neighbours along each stored axis. */
    private int[] outSteps(int axis) {
        int[] steps = new int[dims.length];
        long step = 1;
        for (int k = dims.length - 1; k >= 0; k--) {
            if (k != axis) {
                steps[k] = Math.toIntExact(step);
                step *= dims[k];
            }
        }
        if (axis >= 0) {
            steps[axis] = Math.toIntExact(step);
        }
        return steps;
    }
}
