package tracewright.analysis;

import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import tracewright.correlators.CorrelatorPlan;
import tracewright.correlators.Correlators;
import tracewright.correlators.Reduction;
import tracewright.cuts.BlockLengthDecision;
import tracewright.cuts.Selection;
import tracewright.fitters.resampling.Blocking;
import tracewright.fitters.resampling.Resampling;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.readers.EnsembleSource;
import tracewright.study.InputRef;
import tracewright.study.Observable;
import tracewright.study.Study;
import tracewright.study.Units;

/** Reads, cuts, blocks and averages one ensemble. */
final class EnsembleStage {

    private EnsembleStage() {
    }

    static PreparedEnsemble prepare(Study study, Study.Ensemble settings, EnsembleSource source) {
        CorrelatorPlan plan = Requirements.plan(study, settings, source);
        Selection selection = Selection.of(source, plan.observables(), settings);
        Reduction reduction = Reduction.read(source, selection, plan, settings.cuts().sources().orElse(Integer.MAX_VALUE));
        BlockLengthDecision length = BlockLengthDecision.of(settings.name(), selection, series(study, plan, reduction), settings.cuts().block());
        Blocking blocking = selection.blocks(length.length());
        Correlators correlators = Correlators.of(reduction, plan, resampling(study, settings.name(), blocking));
        SampledNumber spacing = constant(settings.spacingFm());
        List<Double> flowTimes = source.observables().stream().filter(Observable.ActionDensity.class::isInstance)
            .map(o -> ((Observable.ActionDensity) o).flowTime()).sorted().toList();
        return new PreparedEnsemble(settings, source, selection, length, reduction, correlators, Requirements.flavors(settings), flowTimes, spacing,
            SampledNumber.evaluate(v -> Units.HBARC_MEV_FM / v[0], spacing));
    }

    static SampledNumber constant(InputRef ref) {
        return SampledNumber.input(ref.name(), ref.value().value(), ref.value().error());
    }

    private static Resampling resampling(Study study, String ensemble, Blocking blocking) {
        return study.resampling() instanceof Study.Resampling.Bootstrap b
            ? Resampling.bootstrap(ensemble, blocking, study.seed(), b.draws()) : Resampling.jackknife(ensemble, blocking);
    }

    /**
     * Series whose integrated autocorrelation times decide the block length: each two-point function in the middle of its
     * fit range, and the average over slices of each loop and density.
     */
    private static Map<String, double[]> series(Study study, CorrelatorPlan plan, Reduction reduction) {
        Map<String, double[]> series = new LinkedHashMap<>();
        study.hadrons().forEach((name, h) -> {
            int t = (h.firstSlice() + h.last()) / 2;
            series.put(name + " two-point, t = " + t, reduction.twoPointSeries(name, t));
        });
        plan.products().entrySet().stream().findFirst().ifPresent(e -> e.getValue().forEach((operator, separations) -> {
            if (!separations.isEmpty()) {
                series.put(operator.id(), reduction.sliceSeries(e.getKey(), operator, separations.last() + 1));
            }
        }));
        return series;
    }
}
