package tracewright.readers;

import java.util.Arrays;
import java.util.stream.Collectors;

/** Array shapes as text. */
final class Shapes {

    private Shapes() {
    }

    static String text(long[] dims) {
        return dims.length == 0 ? "a single number" : Arrays.stream(dims).mapToObj(Long::toString).collect(Collectors.joining(" x "));
    }

    static String text(int[] dims) {
        return text(Arrays.stream(dims).asLongStream().toArray());
    }
}
