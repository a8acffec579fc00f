package tracewright.report;

import java.util.List;
import tracewright.results.Figure;
import tracewright.results.Results;

/** The physical point, and how the ensembles lead to it. */
final class ExtrapolationSection implements HtmlReport.Section {

    private final Results results;
    private final Html html;
    private final Gallery gallery;
    private final FitTables fits;

    ExtrapolationSection(Results results, Html html, Gallery gallery, FitTables fits) {
        this.results = results;
        this.html = html;
        this.gallery = gallery;
        this.fits = fits;
    }

    @Override
    public String title() {
        return "Extrapolation";
    }

    @Override
    public boolean present() {
        return !figures().isEmpty() || !quantities().isEmpty();
    }

    @Override
    public void write() {
        gallery.byTopic(figures());
        List<Results.Quantity> quantities = quantities();
        if (!quantities.isEmpty()) {
            html.leaf("h3", "Numbers at the physical point");
            QuantityTable.write(html, quantities, "Numbers in the continuum, in infinite volume and at physical quark masses");
            fits.write(quantities);
        }
    }

    private List<Results.Quantity> quantities() {
        return results.quantities().stream().filter(q -> isElsewhere(q.ensemble())).toList();
    }

    private List<Figure> figures() {
        List<Figure> above = BudgetPictures.of(results);
        return results.figures().stream().filter(f -> isElsewhere(f.section()) && !above.contains(f)).toList();
    }

    /** Everything that belongs to no ensemble of the list is shown here, so that nothing is lost. */
    private boolean isElsewhere(String section) {
        return results.ensembles().stream().noneMatch(e -> e.name().equals(section));
    }
}
