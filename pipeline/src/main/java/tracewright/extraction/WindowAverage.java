package tracewright.extraction;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import tracewright.fitters.averaging.ModelAverage;
import tracewright.fitters.leastsquares.FitOutcome;
import tracewright.study.InputException;
import tracewright.study.Problem;

/**
 * Average over fit windows and models, for one number or for several numbers that are fitted in the same windows (a density
 * at several flow times): those share one set of weights and one choice group, so that their differences stay precise.
 * The criterion of a window is Q - 2 E[Q], averaged over the numbers; see {@link ModelAverage}.
 */
final class WindowAverage {

    /** One window or model, with the outcome for each number. */
    record Window(String label, List<FitOutcome> outcomes, String parameter) {
    }

    private WindowAverage() {
    }

    /**
     * One result for each number.
     *
     * @param name    name of the choice and fit groups, {@code <ensemble>.<hadron>.<quantity>}
     * @param windows at least one
     * @throws InputException with cause REQUIREMENT if no window has a successful fit for every number
     */
    static List<Extracted> of(String name, List<Window> windows) {
        List<String> failures = new ArrayList<>();
        List<Window> good = new ArrayList<>();
        for (Window w : windows) {
            List<FitOutcome.Failed> failed = w.outcomes().stream().filter(FitOutcome.Failed.class::isInstance).map(FitOutcome.Failed.class::cast).toList();
            if (failed.isEmpty()) {
                good.add(w);
            } else {
                failures.add(w.label() + ": " + failed.get(0).reason());
            }
        }
        if (good.isEmpty()) {
            throw noFit(name, windows);
        }
        double[] criteria = good.stream().mapToDouble(WindowAverage::criterion).toArray();
        List<Extracted> results = new ArrayList<>();
        for (int i = 0; i < good.get(0).outcomes().size(); i++) {
            results.add(average(name, good, criteria, i, failures));
        }
        return results;
    }

    private static double criterion(Window w) {
        return w.outcomes().stream().map(FitOutcome.Converged.class::cast)
            .mapToDouble(c -> ModelAverage.criterion(c.chiSquared(), c.expectedChiSquared())).average().orElseThrow();
    }

    private static Extracted average(String name, List<Window> windows, double[] criteria, int which, List<String> failures) {
        List<ModelAverage.Candidate> candidates = new ArrayList<>();
        for (int i = 0; i < windows.size(); i++) {
            FitOutcome.Converged c = outcome(windows.get(i), which);
            int parameter = c.parameterNames().indexOf(windows.get(i).parameter());
            candidates.add(new ModelAverage.Candidate(windows.get(i).label(), c.parameters().number(parameter), criteria[i], c.noiseFactor()));
        }
        ModelAverage average = ModelAverage.of(name, candidates);
        List<FitSummary> fits = new ArrayList<>();
        for (int i = 0; i < windows.size(); i++) {
            FitOutcome.Converged c = outcome(windows.get(i), which);
            ModelAverage.Candidate one = candidates.get(i);
            fits.add(new FitSummary(one.label(), c.chiSquared(), c.expectedChiSquared(), c.degreesOfFreedom(), c.pValue(), average.weight(i),
                c.noiseFactor(), one.value().central(), one.value().error() * Math.sqrt(c.noiseFactor())));
        }
        fits.sort(Comparator.comparingDouble((FitSummary f) -> -f.weight()));
        return new Extracted(average.value(), fits, failures);
    }

    private static FitOutcome.Converged outcome(Window w, int which) {
        return (FitOutcome.Converged) w.outcomes().get(which);
    }

    private static InputException noFit(String name, List<Window> windows) {
        List<Problem> problems = new ArrayList<>();
        for (Window w : windows) {
            w.outcomes().stream().filter(FitOutcome.Failed.class::isInstance).map(FitOutcome.Failed.class::cast).findFirst()
                .ifPresent(f -> problems.add(new Problem("no fit: " + f.reason(), name + ", " + w.label(), f.advice())));
        }
        if (problems.isEmpty()) {
            problems.add(new Problem("no fit window holds enough points", name, "widen the scan or give more separations"));
        }
        return new InputException(InputException.Cause.REQUIREMENT, problems);
    }
}
