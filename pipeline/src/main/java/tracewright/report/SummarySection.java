package tracewright.report;

import java.util.LinkedHashSet;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.results.Figure;
import tracewright.results.Results;

/** The answer first: budgets in a sentence, in a picture and in a table. */
final class SummarySection implements HtmlReport.Section {

    private static final int WARNINGS_SHOWN = 3;

    private final Results results;
    private final Html html;
    private final Gallery gallery;

    SummarySection(Results results, Html html, Gallery gallery) {
        this.results = results;
        this.html = html;
        this.gallery = gallery;
    }

    @Override
    public String title() {
        return "Summary";
    }

    @Override
    public void write() {
        sentences();
        warnings();
        List<Figure> pictures = BudgetPictures.of(results);
        if (!pictures.isEmpty()) {
            gallery.show(pictures);
        }
        tables();
        howToRead();
    }

    /** One sentence for each budget at the physical point, or for all if there is none. */
    private void sentences() {
        List<Results.Budget> physical = results.budgets().stream().filter(b -> b.ensemble().equals(Words.PHYSICAL)).toList();
        List<Results.Budget> told = physical.isEmpty() ? results.budgets() : physical;
        if (told.isEmpty()) {
            html.leaf("p", "The study asked for no budget; its numbers are listed by ensemble below.");
            return;
        }
        html.open("ul", "class", "answer");
        told.forEach(this::sentence);
        html.close("ul");
    }

    private void sentence(Results.Budget b) {
        Closure closure = Closure.of(b);
        html.open("li").leaf("strong", Phrase.capital(b.hadron()) + ", " + Words.ensemble(b.ensemble()) + ". ");
        html.text(Words.decomposition(b) + ": " + String.join(", ", b.terms().stream().map(SummarySection::inWords).toList())
            + "; together " + Published.paper(b.total()) + " of " + Published.paper(b.mass()) + "\u202fMeV. The sum " + closure.verdict());
        if (!closure.isByDefinition()) {
            html.text(": mass minus sum is " + Published.paper(b.closure()) + "\u202fMeV, " + closure.shownSigmas());
        }
        dominant(b).ifPresent(s -> html.text(". Its error comes mostly from " + Words.cause(s.cause()) + " (" + Numbers.percent(s.share())
            + " of the variance)"));
        html.text(".").close("li");
    }

    private static String inWords(Results.Term t) {
        return Words.term(t.id()) + " " + Numbers.percent(t.fraction().central(), Published.error(t.fraction()));
    }

    /** What dominates the error of the sum; of the mass where the sum is the mass by definition and has no error. */
    private static Optional<Published.Share> dominant(Results.Budget b) {
        SampledNumber total = b.total();
        return Published.dominant(total).or(() -> Published.dominant(b.mass()));
    }

    private void warnings() {
        List<String> warnings = results.warnings();
        if (warnings.isEmpty()) {
            html.leaf("p", "The run gave no warning.", "class", "calm");
            return;
        }
        html.open("aside", "class", "warn", "aria-label", "Warnings");
        html.leaf("p", "The run gave " + Phrase.count(warnings.size(), "warning") + (warnings.size() > WARNINGS_SHOWN ? ", of which the first:" : ":"));
        html.open("ul");
        warnings.stream().limit(WARNINGS_SHOWN).forEach(w -> html.leaf("li", w));
        html.close("ul").close("aside");
    }

    private void tables() {
        Set<String> kinds = new LinkedHashSet<>();
        results.budgets().forEach(b -> kinds.add(Words.decomposition(b)));
        if (kinds.isEmpty()) {
            return;
        }
        html.leaf("h3", "Budgets");
        html.leaf("p", "Contributions in MeV, below each its fraction of the hadron's mass. Sum: all contributions together. Mass: the measured mass. "
            + "Closure: mass minus sum, correlations included, below it its significance, that is its size over its error, by which the column sorts. "
            + "Largest cause: what contributes most to the variance of the sum. Numbers in brackets are one standard error of the last digits, "
            + "statistics, inputs and choices together.", "class", "key");
        for (String kind : kinds) {
            table(kind, results.budgets().stream().filter(b -> Words.decomposition(b).equals(kind)).toList());
        }
    }

    private void table(String caption, List<Results.Budget> budgets) {
        Set<String> terms = new LinkedHashSet<>();
        budgets.forEach(b -> b.terms().forEach(t -> terms.add(t.id())));
        Columns columns = Columns.words("Ensemble", "Hadron");
        terms.forEach(t -> columns.andNumbers(Phrase.capital(Words.term(t))));
        Table table = Table.open(html, caption + ", in MeV", columns.andNumbers("Sum", "Mass", "Closure").andWords("Largest cause"));
        budgets.forEach(b -> row(table, b, terms));
        table.close();
    }

    private static void row(Table table, Results.Budget b, Set<String> terms) {
        if (b.ensemble().equals(Words.PHYSICAL)) {
            table.mainRow(Words.ensemble(b.ensemble()));
        } else {
            table.row(b.ensemble());
        }
        table.text(b.hadron());
        for (String id : terms) {
            Optional<Results.Term> term = b.terms().stream().filter(t -> t.id().equals(id)).findFirst();
            term.ifPresentOrElse(t -> table.withFraction(t.value(), t.fraction()), table::none);
        }
        Closure closure = Closure.of(b);
        table.number(b.total()).number(b.mass());
        table.withNote(Published.paper(b.closure()), closure.shownSigmas(), closure.isByDefinition() ? Double.NaN : Math.abs(closure.sigmas()));
        table.text(dominant(b).map(s -> Words.cause(s.cause()) + ", " + Numbers.percent(s.share())).orElse(Numbers.NONE));
    }

    private void howToRead() {
        html.open("details").leaf("summary", "How to read the figures");
        html.leaf("p", "Filled markers are points that entered a fit, open ones did not. Bars and bands are one standard error. Arrowheads at the edge of "
            + "a frame stand for points beyond it: the frame follows what was fitted, so that noisy points do not squash it. Series with the same "
            + "abscissa are drawn side by side. Pointing at a marker shows its value. Every figure is also a file of its own beside this report, "
            + "with its numbers as a table, under the name that ends its caption.");
        html.close("details");
    }
}
