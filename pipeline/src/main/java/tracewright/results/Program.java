package tracewright.results;

import java.util.Optional;
import tools.jackson.core.io.NumberOutput;

/** Name and version of this program as they stand in files, and its spelling of a number. */
final class Program {

    static final String NAME = "tracewright";

    private Program() {
    }

    /** Version from the jar's manifest; {@code development} when started from class files. */
    static String version() {
        return Optional.ofNullable(Program.class.getPackage().getImplementationVersion()).orElse("development");
    }

    /** The shortest decimal text that reads back to the same double, with '.' in every locale, the same on every Java version. */
    static String digits(double value, String what) {
        return NumberOutput.toString(finite(value, what), true);
    }

    /** @throws IllegalArgumentException naming {@code what} if the value is NaN or infinite */
    static double finite(double value, String what) {
        if (!Double.isFinite(value)) {
            throw new IllegalArgumentException(what + " is " + value + "; results hold finite numbers only");
        }
        return value;
    }
}
