package tracewright.analysis;

import java.util.List;
import tracewright.results.Results;

/** What was read of an ensemble and what the cuts left, as it is published. */
final class EnsembleReport {

    private EnsembleReport() {
    }

    static Results.EnsembleSummary of(PreparedEnsemble e) {
        List<Results.Autocorrelation> times = e.blocks().measured().stream()
            .map(m -> new Results.Autocorrelation(m.observable(), m.time(), m.error(), m.verdict())).toList();
        return new Results.EnsembleSummary(e.name(), e.source().timeExtent(), e.source().spatialExtent(), e.spacingFm(), e.selection().onDisk().size(),
            e.selection().count(), e.selection().streams(), e.selection().removed(), e.reduction().sourcesUsed(),
            e.correlators().group().labels().size(), e.blocks().length(), e.blocks().reason(), times, e.source().inWords());
    }
}
