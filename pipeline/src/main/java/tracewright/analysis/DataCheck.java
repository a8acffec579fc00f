package tracewright.analysis;

import java.util.HashSet;
import java.util.Set;
import tracewright.correlators.CorrelatorPlan;
import tracewright.cuts.Selection;
import tracewright.readers.EnsembleSource;
import tracewright.study.ConfigurationId;
import tracewright.study.Observable;
import tracewright.study.Study;

/** Reads every number that a study needs of an ensemble and keeps none. */
public final class DataCheck {

    private DataCheck() {
    }

    /**
     * @return one line on what the cuts leave
     * @throws tracewright.study.InputException with everything that is absent, missing or not finite
     */
    public static String read(Study study, Study.Ensemble settings, EnsembleSource source) {
        CorrelatorPlan plan = Requirements.plan(study, settings, source);
        Selection selection = Selection.of(source, plan.observables(), settings);
        Set<Observable> needed = new HashSet<>(plan.observables());
        Set<ConfigurationId> kept = new HashSet<>();
        for (int i = 0; i < selection.onDisk().size(); i++) {
            if (selection.kept(i)) {
                kept.add(selection.onDisk().get(i));
            }
        }
        long[] values = {0};
        source.read(needed::contains, kept::contains, (observable, configuration, times, x) -> values[0] += x.length);
        return selection.count() + " of " + selection.onDisk().size() + " configurations kept " + selection.streams() + ", removed " + selection.removed()
            + "; " + values[0] + " finite numbers read";
    }
}
