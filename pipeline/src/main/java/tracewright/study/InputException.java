package tracewright.study;

import java.util.List;
import java.util.stream.Collectors;

/** The study, the layout or the data cannot be used; carries every problem found, not only the first. */
public final class InputException extends RuntimeException {

    private static final int SHOWN = 5;

    /** Which of the program's exit statuses the problems lead to. */
    public enum Cause {
        /** The study, a layout or the command line: exit status 2. */
        USAGE,
        /** The data on disk: exit status 3. */
        DATA,
        /** A fit or a check that the study declares required did not hold: exit status 4. */
        REQUIREMENT
    }

    private final Cause reason;
    private final List<Problem> problems;

    public InputException(Cause reason, List<Problem> problems) {
        super(summary(problems));
        this.reason = reason;
        this.problems = List.copyOf(problems);
    }

    public Cause reason() {
        return reason;
    }

    public List<Problem> problems() {
        return problems;
    }

    private static String summary(List<Problem> problems) {
        String shown = problems.stream().limit(SHOWN).map(Problem::text).collect(Collectors.joining("\n"));
        int more = problems.size() - SHOWN;
        return more > 0 ? shown + "\nand " + more + " more" : shown;
    }
}
