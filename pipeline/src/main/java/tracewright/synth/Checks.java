package tracewright.synth;

import java.util.List;
import tracewright.study.InputException;
import tracewright.study.Problem;

/** Conditions that records of a truth must meet, and that a truth and its layouts must meet together. */
final class Checks {

    private Checks() {
    }

    static void that(boolean holds, String otherwise) {
        if (!holds) {
            throw new IllegalArgumentException(otherwise);
        }
    }

    static void positive(String what, double value) {
        that(value > 0 && !Double.isInfinite(value), what + " is " + value + "; need a positive number");
    }

    static void correlation(String what, double value) {
        that(value >= 0 && value < 1, what + " is " + value + "; need 0 <= correlation < 1");
    }

    /** A condition on the truth and a layout together: when it fails, the files are wrong, not the program. */
    static void layout(boolean holds, String otherwise) {
        if (!holds) {
            throw refusal(otherwise);
        }
    }

    static InputException refusal(String what) {
        return new InputException(InputException.Cause.USAGE, List.of(new Problem(what, "truth file and the layouts it names",
            "change the one or the other so that they agree")));
    }
}
