package tracewright.study;

import java.util.stream.IntStream;

/** Closed range of whole numbers, both ends included; written {@code 3..7}, or {@code 5} for a single one. */
public record Span(int first, int last) {

    public Span {
        if (first < 0 || last < first) {
            throw new IllegalArgumentException("range " + first + ".." + last + " holds nothing; need 0 <= first <= last");
        }
    }

    public boolean contains(int i) {
        return first <= i && i <= last;
    }

    public int size() {
        return last - first + 1;
    }

    public IntStream stream() {
        return IntStream.rangeClosed(first, last);
    }

    @Override
    public String toString() {
        return first == last ? Integer.toString(first) : first + ".." + last;
    }
}
