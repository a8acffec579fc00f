package tracewright.fitters.resampling;

import static java.util.Objects.requireNonNull;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.Collections;
import java.util.Comparator;
import java.util.List;
import java.util.TreeMap;
import java.util.stream.IntStream;
import tracewright.fitters.sampled.BlockLabel;

/**
 * Which block each configuration of one ensemble belongs to, and in which order configurations are summed: by stream, then
 * trajectory, whatever their order on disk. Blocks are cells of a grid anchored at trajectory zero of each stream,
 * <pre>
 *   index = floor(trajectory / length)
 *
 *   trajectory   0        10        20        30        40        50
 *   on disk      |     :::|:::::::::|:::      |         |:::::::::|::
 *   cell              0        1         2    (empty)        4       5
 *   block             1        1         1                   4       4      light pieces at an end or a gap join the next cell
 * </pre>
 * The grid and its joins are those of everything on disk; a cut only makes blocks lighter or takes them away, so that two
 * cuts of one ensemble share their boundaries.
 */
public final class Blocking {

    private final int length;
    private final List<BlockLabel> labels;   // [block]
    private final int[] sizes;               // [block]
    private final int[] blockOf;             // [diskIndex], -1 when cut
    private final int[] order;               // disk indices of the survivors, by stream and trajectory

    private Blocking(int length, List<BlockLabel> labels, int[] sizes, int[] blockOf, int[] order) {
        this.length = length;
        this.labels = labels;
        this.sizes = sizes;
        this.blockOf = blockOf;
        this.order = order;
    }

    /**
     * Blocks of {@code length} trajectories.
     *
     * @param streams      [diskIndex], stream of every configuration on disk, any order
     * @param trajectories [diskIndex], its trajectory number, each once in a stream
     * @param kept         [diskIndex], whether it survived the cuts
     * @param length       trajectories per cell, one or more
     */
    public static Blocking anchored(List<String> streams, long[] trajectories, boolean[] kept, int length) {
        int n = trajectories.length;
        if (length < 1 || streams.size() != n || kept.length != n) {
            throw new IllegalArgumentException("blocks of " + length + " trajectories from " + streams.size() + " streams, " + n
                + " trajectories and " + kept.length + " marks; need a length of one or more and one of each per configuration");
        }
        int[] all = IntStream.range(0, n).boxed().sorted(Comparator.comparing((Integer i) -> requireNonNull(streams.get(i), "stream"))
            .thenComparingLong(i -> trajectories[i])).mapToInt(Integer::intValue).toArray();
        BlockLabel[] label = new BlockLabel[n];
        for (int first = 0, end; first < n; first = end) {
            end = first + 1;
            while (end < n && streams.get(all[end]).equals(streams.get(all[first]))) {
                end++;
            }
            labelStream(streams.get(all[first]), Arrays.copyOfRange(all, first, end), trajectories, length, label);
        }
        return of(length, label, IntStream.of(all).filter(i -> kept[i]).toArray());
    }

    private static void labelStream(String stream, int[] members, long[] trajectories, int length, BlockLabel[] label) {
        long[] t = IntStream.of(members).mapToLong(i -> trajectories[i]).toArray();
        for (int i = 1; i < t.length; i++) {
            if (t[i] == t[i - 1]) {
                throw new IllegalArgumentException("trajectory " + t[i] + " of stream " + stream + " is on disk twice");
            }
        }
        long[] index = GridCells.indices(t, length);
        for (int i = 0; i < t.length; i++) {
            label[members[i]] = new BlockLabel(stream, index[i]);
        }
    }

    private static Blocking of(int length, BlockLabel[] label, int[] order) {
        TreeMap<BlockLabel, Integer> sizes = new TreeMap<>();
        for (int i : order) {
            sizes.merge(label[i], 1, Integer::sum);
        }
        List<BlockLabel> labels = new ArrayList<>(sizes.keySet());
        int[] blockOf = new int[label.length];
        Arrays.fill(blockOf, -1);
        int block = -1;
        for (int i : order) {
            block += block < 0 || !labels.get(block).equals(label[i]) ? 1 : 0;
            blockOf[i] = block;
        }
        return new Blocking(length, Collections.unmodifiableList(labels), sizes.values().stream().mapToInt(Integer::intValue).toArray(), blockOf,
            order);
    }

    /** Number of blocks that hold a surviving configuration. */
    public int blocks() {
        return sizes.length;
    }

    /** Number of surviving configurations. */
    public int configurations() {
        return order.length;
    }

    /** Number of configurations on disk, survivors or not. */
    public int onDisk() {
        return blockOf.length;
    }

    /** Block of the configuration at {@code diskIndex}; -1 when it was cut. */
    public int blockOf(int diskIndex) {
        return blockOf[diskIndex];
    }

    /** Surviving configurations in a block. */
    public int size(int block) {
        return sizes[block];
    }

    /** Copy of the sizes [block]. */
    public int[] sizes() {
        return sizes.clone();
    }

    /** Labels [block] in Monte Carlo order. */
    public List<BlockLabel> labels() {
        return labels;
    }

    /** Trajectories per grid cell. */
    public int length() {
        return length;
    }

    /** Disk index of the {@code i}-th survivor in Monte Carlo order. */
    public int diskIndex(int i) {
        return order[i];
    }
}
