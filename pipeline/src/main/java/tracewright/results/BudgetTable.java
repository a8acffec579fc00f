package tracewright.results;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.HashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.stream.Collectors;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.study.PaperNumber;

/** The budgets of a run as a table for the terminal, MeV; one row per ensemble and hadron, the physical point last. */
public final class BudgetTable {

    /** Where there is nothing to say. */
    private static final String NONE = "-";

    private BudgetTable() {
    }

    /** Tables of all decompositions in the order of their first budgets, with an empty line between them. */
    public static String text(Results results) {
        return results.budgets().stream().map(Results.Budget::decomposition).distinct().map(d -> text(results, d)).collect(Collectors.joining("\n"));
    }

    /**
     * Table of one decomposition, lines end with {@code \n}; empty text if there is none. Columns are the terms of all its budgets, with
     * {@code -} where a budget lacks one; {@code sigma} is the closure in its own standard errors, with its sign.
     */
    public static String text(Results results, String decomposition) {
        List<Results.Budget> budgets = results.budgets().stream().filter(b -> b.decomposition().equals(decomposition))
            .sorted(Comparator.comparing(b -> b.ensemble().equals("physical"))).toList();
        if (budgets.isEmpty()) {
            return "";
        }
        List<String> terms = budgets.stream().flatMap(b -> b.terms().stream()).map(Results.Term::id).distinct().toList();
        List<String> header = new ArrayList<>(List.of("ensemble", "hadron"));
        header.addAll(terms);
        header.addAll(List.of("sum", "mass", "mass - sum", "sigma", "largest cause of the sum's error"));
        List<List<String>> rows = new ArrayList<>(List.of(header));
        budgets.forEach(b -> rows.add(row(b, terms)));
        return "budget '" + decomposition + "' in MeV" + schemes(budgets) + "\n" + aligned(rows);
    }

    private static List<String> row(Results.Budget b, List<String> terms) {
        Map<String, String> values = new HashMap<>();
        b.terms().forEach(t -> values.put(t.id(), paper(t.value())));
        List<String> row = new ArrayList<>(List.of(b.ensemble(), b.hadron()));
        terms.forEach(id -> row.add(values.getOrDefault(id, NONE)));
        row.addAll(List.of(paper(b.total()), paper(b.mass()), paper(b.closure()), significance(b.closure()), largestCause(b.total())));
        return row;
    }

    /** Scheme and scale of the budgets, each pair once; nothing where there is none. */
    private static String schemes(List<Results.Budget> budgets) {
        return budgets.stream().filter(b -> b.scheme().isPresent())
            .map(b -> ", " + b.scheme().get() + b.scaleGev().map(mu -> " at " + Program.digits(mu, "scale of a budget") + " GeV").orElse(""))
            .distinct().collect(Collectors.joining());
    }

    private static String significance(SampledNumber closure) {
        return Published.significance(closure).map(s -> String.format(Locale.ROOT, "%+.1f", Math.copySign(s, closure.central()))).orElse(NONE);
    }

    private static String largestCause(SampledNumber total) {
        return Published.largestCause(total).map(c -> String.format(Locale.ROOT, "%s %.0f %%", c.key(), 100 * c.share())).orElse(NONE);
    }

    private static String paper(SampledNumber x) {
        return PaperNumber.format(x.central(), Published.error(x));
    }

    private static String aligned(List<List<String>> rows) {
        int columns = rows.get(0).size();
        int[] width = new int[columns];
        rows.forEach(r -> {
            for (int i = 0; i < columns; i++) {
                width[i] = Math.max(width[i], r.get(i).length());
            }
        });
        StringBuilder text = new StringBuilder();
        for (List<String> r : rows) {
            StringBuilder line = new StringBuilder();
            for (int i = 0; i < columns; i++) {
                String pad = " ".repeat(width[i] - r.get(i).length());
                boolean left = i < 2 || i == columns - 1;
                line.append(i == 0 ? "" : "  ").append(left ? r.get(i) + pad : pad + r.get(i));
            }
            text.append(line.toString().stripTrailing()).append('\n');
        }
        return text.toString();
    }
}
