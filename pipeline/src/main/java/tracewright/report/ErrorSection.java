package tracewright.report;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.LinkedHashSet;
import java.util.List;
import java.util.Set;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.results.Results;

/** For each number, which cause contributes which share of its variance. */
final class ErrorSection implements HtmlReport.Section {

    private static final double STRIP = 100;
    private static final double STRIP_HEIGHT = 9;

    /** Causes written out; smaller ones are added up as a rest. The strip and its alternative text hold all. */
    private static final int WRITTEN_OUT = 4;

    private final Results results;
    private final Html html;

    ErrorSection(Results results, Html html) {
        this.results = results;
        this.html = html;
    }

    @Override
    public String title() {
        return "Error by cause";
    }

    @Override
    public boolean present() {
        return !results.budgets().isEmpty() || !results.quantities().isEmpty();
    }

    @Override
    public void write() {
        html.leaf("p", "Every independent cause of uncertainty contributes to the variance (the error squared) on its own; shares add up to 100\u202f%. "
            + "Causes are the gauge noise of each ensemble, constants with errors from outside, choices of window, model or order, and the noise of estimated covariances. "
            + "Relative: the error over the value. The largest share stands first; each strip shows all of them. "
            + "Blocks: whether the ensemble's blocks were long enough for this very number, from the correlation of neighbouring blocks, whose factor "
            + "on the variance is part of the error; \u03c4 is the integrated time of the number's own series, in blocks, one half if they are independent.", "class", "key");
        colourKey();
        budgets();
        Set<String> places = new LinkedHashSet<>();
        results.quantities().forEach(q -> places.add(q.ensemble()));
        places.forEach(this::quantities);
    }

    private void colourKey() {
        html.open("p", "class", "key");
        for (int i = 0; i < Words.CAUSE_KINDS.size(); i++) {
            html.leaf("span", "\u25a0 ", "class", "s" + (i + 1), "aria-hidden", "true").text(Words.CAUSE_KINDS.get(i) + "  ");
        }
        html.close("p");
    }

    private void budgets() {
        if (results.budgets().isEmpty()) {
            return;
        }
        Table table = open("Budgets: causes of each contribution's error, in MeV", "Ensemble", "Hadron", "Term");
        physicalFirst().forEach(b -> budget(table, b));
        table.close();
    }

    private static void budget(Table table, Results.Budget b) {
        b.terms().forEach(t -> budgetRow(table, b, Words.term(t.id()), t.value()));
        budgetRow(table, b, "sum", b.total());
        budgetRow(table, b, "mass", b.mass());
        budgetRow(table, b, "closure", b.closure());
    }

    private static void budgetRow(Table table, Results.Budget b, String term, SampledNumber x) {
        table.row(Words.ensemble(b.ensemble())).text(b.hadron()).text(term);
        causes(table, x);
    }

    /** Budgets at the physical point, then those of the ensembles in their own order. */
    private List<Results.Budget> physicalFirst() {
        return results.budgets().stream().sorted(Comparator.comparing(b -> !b.ensemble().equals(Words.PHYSICAL))).toList();
    }

    private void quantities(String place) {
        html.open("details").leaf("summary", "Numbers: " + Words.ensemble(place));
        Table table = open("Causes of each number's error: " + Words.ensemble(place), "Number", "Unit");
        for (Results.Quantity q : results.quantities()) {
            if (q.ensemble().equals(place)) {
                table.row(q.id()).text(q.unit());
                causes(table, q.number());
            }
        }
        table.close();
        html.close("details");
    }

    private Table open(String caption, String... names) {
        return Table.open(html, caption, Columns.words(names).andNumbers("Value", "Relative").andWords("Shares", "Causes, largest first", "Blocks"));
    }

    private static void causes(Table table, SampledNumber x) {
        List<Published.Share> shares = Published.shares(x);
        double relative = Published.error(x) / Math.abs(x.central());
        table.number(x).number(relative > 1 ? "above 100\u202f%" : Numbers.percent(relative), relative);
        table.cell(html -> strip(html, shares)).sentence(shares.isEmpty() ? "exact" : inWords(shares, WRITTEN_OUT)).text(Published.blocks(x));
    }

    private static String inWords(List<Published.Share> shares, int most) {
        List<String> words = new ArrayList<>();
        shares.stream().limit(most).forEach(s -> words.add(Words.cause(s.cause()) + "\u00a0" + Numbers.percent(s.share())));
        List<Published.Share> rest = shares.subList(Math.min(most, shares.size()), shares.size());
        if (!rest.isEmpty()) {
            words.add(Phrase.count(rest.size(), "smaller cause") + "\u00a0" + Numbers.percent(rest.stream().mapToDouble(Published.Share::share).sum()));
        }
        return String.join(", ", words);
    }

    private static void strip(Html html, List<Published.Share> shares) {
        html.open("svg", "class", "strip", "viewBox", "0 0 " + Numbers.coordinate(STRIP) + " " + Numbers.coordinate(STRIP_HEIGHT), "role", "img",
            "aria-label", shares.isEmpty() ? "exact" : "Shares: " + inWords(shares, shares.size()));
        double x = 0;
        for (Published.Share s : shares) {
            html.open("g", "class", "s" + (Words.causeKind(s.cause()) + 1)).leaf("title", Words.cause(s.cause()) + " " + Numbers.percent(s.share()));
            html.empty("rect", "x", Numbers.coordinate(x), "y", "0", "width", Numbers.coordinate(Math.max(0, STRIP * s.share() - 0.6)),
                "height", Numbers.coordinate(STRIP_HEIGHT), "fill", "currentColor").close("g");
            x += STRIP * s.share();
        }
        html.close("svg");
    }
}
