package tracewright.study;

import static java.util.Objects.requireNonNull;

/**
 * One thing that is wrong with what the user gave, in three parts: what (found and expected), where (file, line, dataset,
 * configuration), and one thing the reader can do about it.
 */
public record Problem(String what, String where, String remedy) {

    public Problem {
        requireNonNull(what, "what");
        requireNonNull(where, "where");
        requireNonNull(remedy, "remedy");
    }

    /** Three lines as they stand on the terminal, without a final line break. */
    public String text() {
        return what + "\n  where: " + where + "\n  do:    " + remedy;
    }
}
