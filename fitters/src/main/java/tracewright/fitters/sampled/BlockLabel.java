package tracewright.fitters.sampled;

import static java.util.Objects.requireNonNull;

/**
 * Name of one block of configurations: its stream and its place on the grid of trajectory numbers anchored at zero.
 * The label, not the position in a list, identifies a block, so that two cuts of one ensemble align sample by sample.
 */
public record BlockLabel(String stream, long index) implements Comparable<BlockLabel> {

    public BlockLabel {
        requireNonNull(stream, "stream");
    }

    /** Monte Carlo order: by stream name, then by place in the stream. */
    @Override
    public int compareTo(BlockLabel other) {
        int byStream = stream.compareTo(other.stream);
        return byStream != 0 ? byStream : Long.compare(index, other.index);
    }
}
