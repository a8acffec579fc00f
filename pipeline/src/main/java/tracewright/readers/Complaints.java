package tracewright.readers;

import java.util.ArrayList;
import java.util.List;
import tracewright.study.InputException;
import tracewright.study.Problem;

/** Problems found so far; beyond a limit they are counted only, so that a wholly bad ensemble does not fill the memory. */
final class Complaints {

    /** Kept problems; a terminal shows five of them, the log all. */
    static final int LIMIT = 500;

    private final List<Problem> kept = new ArrayList<>();
    private long more;

    void add(Problem problem) {
        if (kept.size() < LIMIT) {
            kept.add(problem);
        } else {
            more++;
        }
    }

    void add(String what, String where, String remedy) {
        add(new Problem(what, where, remedy));
    }

    /** Runs one step; what it could not read becomes a problem here and the next step can go on. */
    boolean attempt(Runnable step) {
        try {
            step.run();
            return true;
        } catch (Unreadable e) {
            add(e.problem());
            return false;
        }
    }

    /** Those kept. */
    List<Problem> list() {
        return List.copyOf(kept);
    }

    void throwIfAny(InputException.Cause reason) {
        if (kept.isEmpty()) {
            return;
        }
        if (more > 0) {
            kept.add(new Problem(more + " further problems of the same reading were counted, not kept", "see the problems before",
                "repair those first, then read again"));
        }
        throw new InputException(reason, kept);
    }
}
