package tracewright.readers;

import java.util.BitSet;

/** Real parts of one HDF5 dataset, read slab by slab along one axis; the complex axis or member is hidden. */
interface StoredArray {

    /** Lengths of the axes, slowest first, without the complex one. */
    long[] dims();

    /** Number form and storage, for people: {@code float64, chunks of 10 x 48}. */
    String inWords();

    /** Elements along {@code axis} that are best read together; at least one. */
    int slab(int axis);

    /**
     * Reads elements first..first+count-1 of one axis, all of the others.
     *
     * @param axis  number of the axis, or -1 for the whole array (first = 0, count = 1)
     * @param out   [count][other axes in stored order], flat; overwritten
     * @return elements of the axis, counted from {@code first}, of which a part was never written; their numbers are undefined
     */
    BitSet read(int axis, int first, int count, double[] out);

    /** Product of the lengths of all axes but one; a product beyond {@code long}, as only corrupt files have, counts as the largest. */
    default long recordLength(int axis) {
        long product = 1;
        for (int k = 0; k < dims().length; k++) {
            long n = k == axis ? 1 : dims()[k];
            if (n > 0 && product > Long.MAX_VALUE / n) {
                return Long.MAX_VALUE;
            }
            product *= n;
        }
        return product;
    }
}
