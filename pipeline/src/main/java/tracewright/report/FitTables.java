package tracewright.report;

import java.util.Comparator;
import java.util.List;
import tracewright.results.Results;

/** Every fit behind the numbers of a section, folded until asked for. */
final class FitTables {

    /** Rows per number; scans of windows may have thousands, of which the tail weighs nothing. */
    private static final int MOST_ROWS = 60;

    private final Html html;

    FitTables(Html html) {
        this.html = html;
    }

    void write(List<Results.Quantity> quantities) {
        long fits = quantities.stream().mapToLong(q -> q.fits().size()).sum();
        if (fits == 0) {
            return;
        }
        html.open("details").leaf("summary", "All fits (" + fits + ")");
        html.leaf("p", "\u03c7\u00b2: weighted sum of squared residuals. E[\u03c7\u00b2]: its expected value, equal to the degrees of freedom (dof) when the "
            + "weight is the inverse covariance. p: probability of a \u03c7\u00b2 at least as large if the model is right. Weight: share of the fit in the average. F: factor on the "
            + "variance for the noise of the estimated covariance.", "class", "key");
        Table table = Table.open(html, "Fits, heaviest first within each number",
            Columns.words("Number", "Window and model").andNumbers("\u03c7\u00b2", "E[\u03c7\u00b2]", "dof", "p", "Weight", "F", "Value").andWords("Unit"));
        quantities.forEach(q -> rows(table, q));
        table.close();
        quantities.stream().filter(q -> q.fits().size() > MOST_ROWS).forEach(this::more);
        html.close("details");
    }

    private static List<Results.Fit> byWeight(Results.Quantity q) {
        return q.fits().stream().sorted(Comparator.comparingDouble(Results.Fit::weight).reversed()).toList();
    }

    private static void rows(Table table, Results.Quantity q) {
        byWeight(q).stream().limit(MOST_ROWS).forEach(f -> table.row(q.id()).text(f.label())
            .number(Numbers.fixed(f.chiSquared(), 1), f.chiSquared()).number(Numbers.fixed(f.expected(), 1), f.expected()).count(f.degreesOfFreedom())
            .number(Numbers.fixed(f.pValue(), 3), f.pValue()).number(Numbers.fixed(f.weight(), 3), f.weight())
            .number(Numbers.fixed(f.noiseFactor(), 3), f.noiseFactor()).number(f.value(), f.error()).text(q.unit()));
    }

    private void more(Results.Quantity q) {
        int hidden = q.fits().size() - MOST_ROWS;
        double largest = byWeight(q).get(MOST_ROWS).weight();
        html.leaf("p", q.id() + ": " + Phrase.count(hidden, "more fit") + ", none of weight above " + Numbers.plain(largest) + ", in results.json.");
    }
}
