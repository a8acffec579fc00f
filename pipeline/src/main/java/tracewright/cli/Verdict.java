package tracewright.cli;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import tracewright.results.Results;
import tracewright.study.Problem;
import tracewright.study.Study;

/** Whether results meet what the study requires of them. */
record Verdict(List<Problem> problems) {

    static Verdict of(Study study, Results results) {
        List<Problem> problems = new ArrayList<>();
        study.require().ifPresent(require -> {
            require.closureSigma().ifPresent(limit -> results.budgets().forEach(b -> closure(b, limit, problems)));
            require.pValue().ifPresent(limit -> results.quantities().stream().filter(q -> q.method().isEmpty() && !q.fits().isEmpty())
                .forEach(q -> pValue(q, limit, problems)));
        });
        return new Verdict(problems);
    }

    private static void closure(Results.Budget b, double limit, List<Problem> problems) {
        double sigma = Math.abs(b.closure().central()) / b.closure().publishedError();
        if (sigma > limit) {
            problems.add(new Problem(String.format(Locale.ROOT, "the budget '%s' does not close: %.1f standard errors, at most %s are allowed",
                b.decomposition(), sigma, limit), b.ensemble() + "." + b.hadron() + "; require.closure_sigma",
                "look at excited states and at what dominates the error in the report; the results are written"));
        }
    }

    private static void pValue(Results.Quantity q, double limit, List<Problem> problems) {
        Results.Fit heaviest = q.fits().get(0);
        if (heaviest.pValue() < limit) {
            problems.add(new Problem(String.format(Locale.ROOT, "the fit with the largest weight has p = %.2g, at least %s is asked for", heaviest.pValue(),
                limit), q.id() + ", " + heaviest.label() + "; require.p_value", "look at the fit's window in the report; the results are written"));
        }
    }
}
