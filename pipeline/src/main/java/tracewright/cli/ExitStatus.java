package tracewright.cli;

import tracewright.study.InputException;

/** Exit statuses of the program. */
final class ExitStatus {

    static final int DONE = 0;
    /** The program failed: a bug, or outputs that the system would not write. */
    static final int FAILED = 1;
    static final int USAGE = 2;
    static final int DATA = 3;
    static final int REQUIREMENT = 4;

    private ExitStatus() {
    }

    static int of(InputException.Cause cause) {
        return switch (cause) {
            case USAGE -> USAGE;
            case DATA -> DATA;
            case REQUIREMENT -> REQUIREMENT;
        };
    }
}
