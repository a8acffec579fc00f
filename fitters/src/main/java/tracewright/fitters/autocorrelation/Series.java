package tracewright.fitters.autocorrelation;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import java.util.Locale;
import java.util.stream.IntStream;

/** Fluctuations of a series about its common mean, stream after stream, each in the order of its trajectories. */
final class Series {

    private final int[] starts;          // [stream], start of its values; one more entry holds the total
    private final long[] trajectories;   // [i], ascending within a stream
    private final double[] fluctuations; // [i]
    private final double mean;
    private final long spacing;

    private Series(int[] starts, long[] trajectories, double[] values) {
        this.starts = starts;
        this.trajectories = trajectories;
        this.mean = mean(values);
        this.fluctuations = values;
        for (int i = 0; i < values.length; i++) {
            values[i] -= mean;
        }
        this.spacing = smallestSpacing();
    }

    static Series of(List<String> streams, long[] trajectories, double[] values) {
        int n = values.length;
        if (streams.size() != n || trajectories.length != n || n < 2) {
            throw new IllegalArgumentException("an autocorrelation needs two values or more, each with a stream and a trajectory; got "
                + streams.size() + " streams, " + trajectories.length + " trajectories, " + n + " values");
        }
        int[] order = IntStream.range(0, n).boxed().sorted(Comparator.comparing((Integer i) -> streams.get(i))
            .thenComparingLong(i -> trajectories[i])).mapToInt(Integer::intValue).toArray();
        List<Integer> starts = new ArrayList<>();
        long[] t = new long[n];
        double[] x = new double[n];
        for (int i = 0; i < n; i++) {
            int at = order[i];
            t[i] = trajectories[at];
            x[i] = finite(values[at], streams.get(at), t[i]);
            if (i == 0 || !streams.get(at).equals(streams.get(order[i - 1]))) {
                starts.add(i);
            } else if (t[i] == t[i - 1]) {
                throw new IllegalArgumentException("trajectory " + t[i] + " of stream " + streams.get(at) + " occurs twice");
            }
        }
        starts.add(n);
        return new Series(starts.stream().mapToInt(Integer::intValue).toArray(), t, x);
    }

    private static double finite(double value, String stream, long trajectory) {
        if (Double.isNaN(value) || Double.isInfinite(value)) {
            throw new IllegalArgumentException("value of stream " + stream + ", trajectory " + trajectory + " is " + value);
        }
        return value;
    }

    static Series ofChains(double[]... chains) {
        List<String> streams = new ArrayList<>();
        int n = IntStream.range(0, chains.length).map(r -> chains[r].length).sum();
        long[] trajectories = new long[n];
        double[] values = new double[n];
        int at = 0;
        for (int r = 0; r < chains.length; r++) {
            for (int i = 0; i < chains[r].length; i++, at++) {
                streams.add(String.format(Locale.ROOT, "%09d", r));
                trajectories[at] = i;
                values[at] = chains[r][i];
            }
        }
        return of(streams, trajectories, values);
    }

    /** Mean in two passes: the second takes off what rounding left in the first. */
    private static double mean(double[] values) {
        double sum = 0;
        for (double x : values) {
            sum += x;
        }
        double first = sum / values.length;
        double rest = 0;
        for (double x : values) {
            rest += x - first;
        }
        return first + rest / values.length;
    }

    /** Smallest difference of two trajectories of a stream; 1 if every stream has one value only. */
    private long smallestSpacing() {
        long smallest = Long.MAX_VALUE;
        for (int r = 0; r < streams(); r++) {
            for (int i = starts[r] + 1; i < starts[r + 1]; i++) {
                smallest = Math.min(smallest, trajectories[i] - trajectories[i - 1]);
            }
        }
        return smallest == Long.MAX_VALUE ? 1 : smallest;
    }

    int size() {
        return fluctuations.length;
    }

    int streams() {
        return starts.length - 1;
    }

    double mean() {
        return mean;
    }

    long spacing() {
        return spacing;
    }

    /** Configurations in stream r. */
    int sizeOf(int r) {
        return starts[r + 1] - starts[r];
    }

    /** Mean of stream r less the common mean. */
    double shiftOf(int r) {
        double sum = 0;
        for (int i = starts[r]; i < starts[r + 1]; i++) {
            sum += fluctuations[i];
        }
        return sum / sizeOf(r);
    }

    /** Steps from the first to the last configuration of the shortest stream, plus one: its length if nothing is missing. */
    long shortestExtent() {
        long shortest = Long.MAX_VALUE;
        for (int r = 0; r < streams(); r++) {
            shortest = Math.min(shortest, (trajectories[starts[r + 1] - 1] - trajectories[starts[r]]) / spacing + 1);
        }
        return shortest;
    }

    /**
     * Sum of d_i d_j over the pairs of one stream whose trajectories differ by {@code lag} steps, and their number.
     *
     * @param out {sum, number of pairs}; overwritten
     */
    void products(int lag, double[] out) {
        double sum = 0;
        int pairs = 0;
        long distance = lag * spacing;
        for (int r = 0; r < streams(); r++) {
            int j = starts[r];
            for (int i = starts[r]; i < starts[r + 1]; i++) {
                while (j < starts[r + 1] && trajectories[j] < trajectories[i] + distance) {
                    j++;
                }
                if (j < starts[r + 1] && trajectories[j] == trajectories[i] + distance) {
                    sum += fluctuations[i] * fluctuations[j];
                    pairs++;
                }
            }
        }
        out[0] = sum;
        out[1] = pairs;
    }
}
