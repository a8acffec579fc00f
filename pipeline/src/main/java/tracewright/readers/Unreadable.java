package tracewright.readers;

import tracewright.study.Problem;

/** Stops the reading of one file or dataset and carries the reason to the collector of problems; never leaves this package. */
final class Unreadable extends RuntimeException {

    private final transient Problem problem;

    Unreadable(String what, String where, String remedy) {
        this(new Problem(what, where, remedy), null);
    }

    Unreadable(Problem problem, Throwable cause) {
        super(problem.text(), cause);
        this.problem = problem;
    }

    Problem problem() {
        return problem;
    }
}
