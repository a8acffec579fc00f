package tracewright.analysis;

import java.util.List;
import java.util.Set;
import tracewright.correlators.Correlators;
import tracewright.correlators.Reduction;
import tracewright.cuts.BlockLengthDecision;
import tracewright.cuts.Selection;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.readers.EnsembleSource;
import tracewright.study.Flavor;
import tracewright.study.Observable;
import tracewright.study.Study;

/**
 * An ensemble after reading, cutting and averaging.
 *
 * @param flavors     flavours with a quark mass in the study, in the order of the enum
 * @param flowTimes   measured flow times, ascending, in units of a^2
 * @param spacingFm   lattice spacing a in fm
 * @param mevPerUnit  hbar c / a in MeV: turns lattice units of mass into MeV
 */
record PreparedEnsemble(
    Study.Ensemble settings,
    EnsembleSource source,
    Selection selection,
    BlockLengthDecision blocks,
    Reduction reduction,
    Correlators correlators,
    List<Flavor> flavors,
    List<Double> flowTimes,
    SampledNumber spacingFm,
    SampledNumber mevPerUnit) {

    String name() {
        return settings.name();
    }

    /** Separations at which a hadron's connected insertion of a flavour was measured. */
    Set<Integer> connectedSeparations(String hadron, Flavor flavor) {
        return source.observables().stream().filter(Observable.Connected.class::isInstance).map(Observable.Connected.class::cast)
            .filter(c -> c.hadron().equals(hadron) && c.flavor() == flavor).map(Observable.Connected::separation)
            .collect(java.util.stream.Collectors.toCollection(java.util.TreeSet::new));
    }
}
