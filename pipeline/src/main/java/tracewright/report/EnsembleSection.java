package tracewright.report;

import java.util.List;
import java.util.Map;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.results.Figure;
import tracewright.results.Results;

/** All about one ensemble: what was read and cut, how it was blocked, its figures, numbers and fits. */
final class EnsembleSection implements HtmlReport.Section {

    private final Results results;
    private final Results.EnsembleSummary ensemble;
    private final Html html;
    private final Gallery gallery;
    private final FitTables fits;

    EnsembleSection(Results results, Results.EnsembleSummary ensemble, Html html, Gallery gallery, FitTables fits) {
        this.results = results;
        this.ensemble = ensemble;
        this.html = html;
        this.gallery = gallery;
        this.fits = fits;
    }

    @Override
    public String title() {
        return "Ensemble " + ensemble.name();
    }

    @Override
    public void write() {
        html.leaf("h3", "Data");
        facts();
        html.open("div", "class", "pair");
        cuts();
        streams();
        html.close("div");
        autocorrelation();
        datasets();
        figures();
        List<Results.Quantity> quantities = results.quantities().stream().filter(q -> q.ensemble().equals(ensemble.name())).toList();
        if (!quantities.isEmpty()) {
            html.leaf("h3", "Numbers");
            QuantityTable.write(html, quantities, "Numbers of " + ensemble.name() + ", methods side by side");
            fits.write(quantities);
        }
    }

    private void facts() {
        SampledNumber box = ensemble.spacingFm().times(ensemble.spatialExtent());
        html.open("dl", "class", "facts");
        fact("Lattice", ensemble.spatialExtent() + "\u00b3\u202f\u00d7\u202f" + ensemble.timeExtent());
        fact("Spacing", Published.paper(ensemble.spacingFm()) + "\u202ffm");
        fact("Box", Published.paper(box) + "\u202ffm");
        fact("Configurations", ensemble.configurations() + " kept of " + ensemble.configurationsOnDisk());
        fact("Sources", ensemble.sourcesPerConfiguration() + " per configuration");
        fact("Blocks", ensemble.blocks() + " of " + ensemble.blockLength() + (ensemble.blockLength() == 1 ? " trajectory" : " trajectories"));
        html.close("dl");
        html.open("p").leaf("strong", "Why this block length: ").text(ensemble.blockReason()).close("p");
    }

    private void fact(String name, String value) {
        html.open("div").leaf("dt", name).leaf("dd", value).close("div");
    }

    private void cuts() {
        Table table = Table.open(html, "Configurations removed by each cut, in the order of application", Columns.words("Cut").andNumbers("Removed", "Left"));
        int left = ensemble.configurationsOnDisk();
        table.row("on disk").none().count(left);
        for (Map.Entry<String, Integer> cut : ensemble.removed().entrySet()) {
            left -= cut.getValue();
            table.row(cut.getKey()).count(cut.getValue()).count(left);
        }
        table.close();
        if (left != ensemble.configurations()) {
            html.leaf("p", "These counts leave " + left + " configurations, but " + ensemble.configurations() + " were used.", "class", "warn");
        }
    }

    private void streams() {
        Table table = Table.open(html, "Configurations kept, by stream", Columns.words("Stream").andNumbers("Kept"));
        ensemble.streams().forEach((stream, kept) -> table.row(stream).count(kept));
        table.close();
    }

    private void autocorrelation() {
        if (ensemble.autocorrelation().isEmpty()) {
            return;
        }
        html.leaf("h3", "Autocorrelation");
        html.leaf("p", "\u03c4: integrated autocorrelation time in trajectories, one half for independent ones. Block: block length over 2\u03c4, which should "
            + "be well above one. Verdict: whether the chain was long enough to measure \u03c4.", "class", "key");
        Table table = Table.open(html, "Integrated autocorrelation times",
            Columns.words("Observable").andNumbers("\u03c4 [trajectories]", "Block / 2\u03c4").andWords("Verdict"));
        for (Results.Autocorrelation a : ensemble.autocorrelation()) {
            double ratio = ensemble.blockLength() / (2 * a.time());
            table.row(a.observable()).number(a.time(), a.error()).number(Numbers.fixed(ratio, 1), ratio).text(verdict(a, ratio));
        }
        table.close();
    }

    private static String verdict(Results.Autocorrelation a, double blockOverTwoTau) {
        String chain = a.verdict().isEmpty() ? "long enough" : a.verdict();
        return blockOverTwoTau < 1 ? chain + "; blocks shorter than 2\u03c4, so neighbours are correlated" : chain;
    }

    private void datasets() {
        if (ensemble.datasets().isEmpty()) {
            return;
        }
        html.open("details").leaf("summary", "How the " + Phrase.count(ensemble.datasets().size(), "dataset") + " of this ensemble were read");
        html.open("ul");
        ensemble.datasets().forEach(d -> html.leaf("li", d));
        html.close("ul").close("details");
    }

    private void figures() {
        List<Figure> shownAbove = BudgetPictures.of(results);
        gallery.byTopic(results.figures().stream().filter(f -> f.section().equals(ensemble.name()) && !shownAbove.contains(f)).toList());
    }
}
