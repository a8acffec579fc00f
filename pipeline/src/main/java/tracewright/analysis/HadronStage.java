package tracewright.analysis;

import java.util.EnumMap;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import java.util.TreeSet;
import java.util.concurrent.Callable;
import java.util.function.IntFunction;
import java.util.stream.IntStream;
import tracewright.extraction.ElementScan;
import tracewright.extraction.EnergyFits;
import tracewright.extraction.Extracted;
import tracewright.study.Flavor;
import tracewright.study.Observable;
import tracewright.study.Study;

/** Energies and bare matrix elements of all hadrons of one ensemble, as independent units of work. */
final class HadronStage {

    private final Study study;
    private final PreparedEnsemble ensemble;

    HadronStage(Study study, PreparedEnsemble ensemble) {
        this.study = study;
        this.ensemble = ensemble;
    }

    /** One unit: a hadron's energy, or one operator of it. */
    sealed interface Outcome {

        String hadron();

        record Energy(String hadron, Extracted energy) implements Outcome {
        }

        record Connected(String hadron, Flavor flavor, HadronElements.Scanned scanned) implements Outcome {
        }

        record Disconnected(String hadron, Flavor flavor, HadronElements.Scanned scanned) implements Outcome {
        }

        record Gluon(String hadron, HadronElements.Scanned scanned) implements Outcome {
        }
    }

    /** Units in a fixed order. */
    List<Callable<Outcome>> units() {
        List<Callable<Outcome>> units = new java.util.ArrayList<>();
        study.hadrons().forEach((hadron, settings) -> {
            units.add(() -> new Outcome.Energy(hadron,
                EnergyFits.of(ensemble.name(), hadron, settings, ensemble.reduction().timeExtent(), ensemble.correlators())));
            if (settings.budget()) {
                for (Flavor flavor : ensemble.flavors()) {
                    Set<Integer> separations = ensemble.connectedSeparations(hadron, flavor);
                    if (!separations.isEmpty()) {
                        units.add(() -> new Outcome.Connected(hadron, flavor, connected(hadron, flavor, separations)));
                    }
                    units.add(() -> new Outcome.Disconnected(hadron, flavor, disconnected(hadron, flavor)));
                }
                units.add(() -> new Outcome.Gluon(hadron, gluon(hadron)));
            }
        });
        return units;
    }

    /** Outcomes of {@link #units} put together by hadron, in the order of the study. */
    List<HadronElements> gather(List<Outcome> outcomes) {
        Map<String, Extracted> energies = new LinkedHashMap<>();
        Map<String, HadronElements.Elements> elements = new LinkedHashMap<>();
        for (Outcome outcome : outcomes) {
            String h = outcome.hadron();
            if (outcome instanceof Outcome.Energy e) {
                energies.put(h, e.energy());
            } else if (outcome instanceof Outcome.Connected c) {
                of(elements, h).connected().put(c.flavor(), c.scanned());
            } else if (outcome instanceof Outcome.Disconnected d) {
                of(elements, h).disconnected().put(d.flavor(), d.scanned());
            } else if (outcome instanceof Outcome.Gluon g) {
                HadronElements.Elements so = of(elements, h);
                elements.put(h, new HadronElements.Elements(so.connected(), so.disconnected(), g.scanned()));
            }
        }
        return energies.entrySet().stream()
            .map(e -> new HadronElements(ensemble.name(), e.getKey(), e.getValue(), Optional.ofNullable(elements.get(e.getKey())))).toList();
    }

    private static HadronElements.Elements of(Map<String, HadronElements.Elements> elements, String hadron) {
        return elements.computeIfAbsent(hadron, h -> new HadronElements.Elements(new EnumMap<>(Flavor.class), new EnumMap<>(Flavor.class), null));
    }

    private HadronElements.Scanned connected(String hadron, Flavor flavor, Set<Integer> separations) {
        return scan(hadron, "scalar-connected." + flavor.word(), List.of(t -> new Observable.Connected(hadron, flavor, t)), separations,
            study.matrixElements().connected());
    }

    private HadronElements.Scanned disconnected(String hadron, Flavor flavor) {
        Observable loop = new Observable.Loop(flavor);
        return scan(hadron, "scalar-disconnected." + flavor.word(), List.of(t -> loop), products(hadron, loop), study.matrixElements().disconnected());
    }

    private HadronElements.Scanned gluon(String hadron) {
        List<Observable> densities = ensemble.flowTimes().stream().map(t -> (Observable) new Observable.ActionDensity(t)).toList();
        List<IntFunction<Observable>> family = densities.stream().map(d -> (IntFunction<Observable>) t -> d).toList();
        return scan(hadron, "action-density", family, products(hadron, densities.get(0)), study.matrixElements().gluon());
    }

    private Set<Integer> products(String hadron, Observable operator) {
        return new TreeSet<>(ensemble.correlators().plan().products().get(hadron).get(operator));
    }

    private HadronElements.Scanned scan(String hadron, String quantity, List<IntFunction<Observable>> family, Set<Integer> separations,
            Study.ElementFits settings) {
        String name = ensemble.name() + "." + hadron + "." + quantity;
        ElementScan scan = new ElementScan(name, hadron, family, separations, ensemble.correlators());
        ElementScan.Scan done = scan.run(settings);
        return new HadronElements.Scanned(name, scan, settings.publish(), done.results(), done.failed());
    }

    /** Members of a gluon family, by index of the flow time. */
    static IntStream members(PreparedEnsemble ensemble) {
        return IntStream.range(0, ensemble.flowTimes().size());
    }
}
