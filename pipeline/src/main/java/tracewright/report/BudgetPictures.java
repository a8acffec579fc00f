package tracewright.report;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import tracewright.results.Figure;
import tracewright.results.Results;

/**
 * The pictures at the head of the report: the study's own budget figures at the physical point (all budget figures if none is
 * there); without any, one picture per hadron and decomposition made from the budgets.
 */
final class BudgetPictures {

    private static final String TOPIC = "budget";

    private BudgetPictures() {
    }

    static List<Figure> of(Results results) {
        List<Figure> own = results.figures().stream().filter(f -> f.topic().equals(TOPIC)).toList();
        List<Figure> physical = own.stream().filter(f -> f.section().equals(Words.PHYSICAL)).toList();
        return own.isEmpty() ? fromBudgets(results) : physical.isEmpty() ? own : physical;
    }

    private static List<Figure> fromBudgets(Results results) {
        Map<String, List<Results.Budget>> groups = new LinkedHashMap<>();
        results.budgets().forEach(b -> groups.computeIfAbsent(b.hadron() + "-" + b.decomposition() + "-" + Words.scheme(b.scheme(), b.scaleGev()),
            k -> new ArrayList<>()).add(b));
        return groups.values().stream().map(BudgetPictures::picture).toList();
    }

    private static Figure picture(List<Results.Budget> budgets) {
        Results.Budget first = budgets.get(0);
        List<Figure.Layer> layers = new ArrayList<>();
        for (Results.Budget b : budgets) {
            layers.add(new Figure.Bars(Words.ensemble(b.ensemble()), b.terms().stream()
                .map(t -> new Figure.Bar(Words.term(t.id()), 100 * t.fraction().central(), 100 * Published.error(t.fraction()))).toList()));
        }
        return new Figure("", Words.PHYSICAL, TOPIC, "Budget of the " + first.hadron(), Words.decomposition(first) + ".",
            new Figure.Axis("fraction of the mass [%]", true), new Figure.Axis("", false), layers);
    }
}
