package tracewright.study;

import static java.util.Objects.requireNonNull;

/** One gauge configuration of an ensemble: its Markov stream and its trajectory number there. */
public record ConfigurationId(String stream, long trajectory) implements Comparable<ConfigurationId> {

    public ConfigurationId {
        requireNonNull(stream, "stream");
    }

    @Override
    public int compareTo(ConfigurationId other) {
        int byStream = stream.compareTo(other.stream);
        return byStream != 0 ? byStream : Long.compare(trajectory, other.trajectory);
    }

    /** {@code stream:trajectory}, the way studies and messages write a configuration. */
    @Override
    public String toString() {
        return stream + ":" + trajectory;
    }
}
