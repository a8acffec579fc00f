package tracewright.analysis;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.concurrent.Callable;
import java.util.function.Consumer;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.readers.EnsembleSource;
import tracewright.results.Results;
import tracewright.study.Study;

/** The stages in their order; reads like the outline of the paper that the numbers are for. */
public final class Analysis {

    private Analysis() {
    }

    /**
     * Runs a study on ensembles that can be read.
     *
     * @param sources one for each ensemble of the study, in its order
     * @param threads number of threads; the outcome does not depend on it
     * @param log     receives a line about each step, possibly from several threads
     * @throws tracewright.study.InputException if data are bad or missing, or no fit succeeds for a number that the budget needs
     */
    public static Results run(Study study, List<EnsembleSource> sources, int threads, Consumer<String> log) {
        try (Workers workers = new Workers(threads)) {
            List<PreparedEnsemble> ensembles = prepare(study, sources, workers, log);
            List<HadronElements> hadrons = extract(study, ensembles, workers, log);
            log.accept("renormalising and adding up");
            List<HadronBudget> budgets = budgets(study, ensembles, hadrons);
            List<PhysicalBudget> physical = physical(study, ensembles, hadrons, budgets);
            return Publication.of(study, ensembles, hadrons, budgets, physical);
        }
    }

    private static List<PreparedEnsemble> prepare(Study study, List<EnsembleSource> sources, Workers workers, Consumer<String> log) {
        List<Callable<PreparedEnsemble>> units = new ArrayList<>();
        for (int i = 0; i < sources.size(); i++) {
            Study.Ensemble settings = study.ensembles().get(i);
            EnsembleSource source = sources.get(i);
            units.add(() -> {
                log.accept("reading " + settings.name());
                PreparedEnsemble prepared = EnsembleStage.prepare(study, settings, source);
                log.accept(settings.name() + ": " + prepared.selection().count() + " of " + prepared.selection().onDisk().size()
                    + " configurations in " + prepared.correlators().group().labels().size() + " blocks");
                return prepared;
            });
        }
        return workers.all(units);
    }

    private static List<HadronElements> extract(Study study, List<PreparedEnsemble> ensembles, Workers workers, Consumer<String> log) {
        List<HadronStage> stages = ensembles.stream().map(e -> new HadronStage(study, e)).toList();
        List<Callable<HadronStage.Outcome>> units = new ArrayList<>();
        stages.forEach(s -> units.addAll(s.units()));
        log.accept("fitting: " + units.size() + " energies and matrix elements");
        List<HadronStage.Outcome> outcomes = workers.all(units);
        List<HadronElements> hadrons = new ArrayList<>();
        int at = 0;
        for (HadronStage stage : stages) {
            int count = stage.units().size();
            hadrons.addAll(stage.gather(outcomes.subList(at, at + count)));
            at += count;
        }
        return hadrons;
    }

    private static List<HadronBudget> budgets(Study study, List<PreparedEnsemble> ensembles, List<HadronElements> hadrons) {
        List<HadronBudget> budgets = new ArrayList<>();
        for (PreparedEnsemble ensemble : ensembles) {
            hadrons.stream().filter(h -> h.ensemble().equals(ensemble.name()) && h.elements().isPresent())
                .forEach(h -> budgets.add(HadronBudget.of(study, ensemble, h)));
        }
        return budgets;
    }

    private static List<PhysicalBudget> physical(Study study, List<PreparedEnsemble> ensembles, List<HadronElements> hadrons, List<HadronBudget> budgets) {
        if (study.extrapolation().isEmpty()) {
            return List.of();
        }
        Study.Extrapolation settings = study.extrapolation().get();
        Map<String, SampledNumber> pionMasses = new LinkedHashMap<>();
        for (PreparedEnsemble ensemble : ensembles) {
            hadrons.stream().filter(h -> h.ensemble().equals(ensemble.name()) && h.hadron().equals(settings.pion())).findFirst()
                .ifPresent(h -> pionMasses.put(ensemble.name(), h.energy().number().times(ensemble.mevPerUnit())));
        }
        return study.hadrons().entrySet().stream().filter(e -> e.getValue().budget()).map(Map.Entry::getKey).map(hadron ->
            PhysicalBudget.of(study, settings, hadron, ensembles, pionMasses, budgets.stream().filter(b -> b.hadron().equals(hadron)).toList())).toList();
    }
}
