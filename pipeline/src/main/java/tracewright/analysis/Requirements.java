package tracewright.analysis;

import java.util.ArrayList;
import java.util.List;
import java.util.SortedSet;
import java.util.TreeMap;
import java.util.LinkedHashMap;
import java.util.LinkedHashSet;
import java.util.Map;
import java.util.Set;
import java.util.TreeSet;
import java.util.stream.Stream;
import tracewright.correlators.CorrelatorPlan;
import tracewright.readers.EnsembleSource;
import tracewright.study.Flavor;
import tracewright.study.InputException;
import tracewright.study.Observable;
import tracewright.study.Problem;
import tracewright.study.Span;
import tracewright.study.Study;

/** What a study needs of one ensemble's data; everything that is absent is reported at once. */
final class Requirements {

    private final Study study;
    private final Study.Ensemble settings;
    private final EnsembleSource source;
    private final List<Problem> problems = new ArrayList<>();      // of the data
    private final List<Problem> unfit = new ArrayList<>();         // of the study, whose times exceed the lattice

    private Requirements(Study study, Study.Ensemble settings, EnsembleSource source) {
        this.study = study;
        this.settings = settings;
        this.source = source;
    }

    /**
     * @throws InputException with cause DATA if an observable is absent, with cause USAGE if a time does not fit the lattice
     */
    static CorrelatorPlan plan(Study study, Study.Ensemble settings, EnsembleSource source) {
        return new Requirements(study, settings, source).plan();
    }

    private CorrelatorPlan plan() {
        List<String> budgetHadrons = study.hadrons().entrySet().stream().filter(e -> e.getValue().budget()).map(Map.Entry::getKey).toList();
        Set<String> mesons = new LinkedHashSet<>();
        study.hadrons().forEach((name, h) -> {
            present(new Observable.TwoPoint(name), "hadron " + name);
            timesFit(name, h);
            if (h.kind() == Study.Hadron.Kind.MESON) {
                mesons.add(name);
            }
        });
        Map<String, Map<Observable, SortedSet<Integer>>> products = new TreeMap<>();
        List<Observable.Connected> connected = new ArrayList<>();
        for (String hadron : budgetHadrons) {
            connected.addAll(connected(hadron));
            products.put(hadron, products());
        }
        if (!unfit.isEmpty()) {
            unfit.addAll(problems);
            throw new InputException(InputException.Cause.USAGE, unfit);
        }
        if (!problems.isEmpty()) {
            throw new InputException(InputException.Cause.DATA, problems);
        }
        return new CorrelatorPlan(List.copyOf(study.hadrons().keySet()), mesons, connected, products);
    }

    private List<Observable.Connected> connected(String hadron) {
        List<Observable.Connected> found = source.observables().stream().filter(Observable.Connected.class::isInstance).map(Observable.Connected.class::cast)
            .filter(c -> c.hadron().equals(hadron) && settings.quarkMassLattice().containsKey(c.flavor())).toList();
        if (settings.quarkMassLattice().containsKey(Flavor.LIGHT) && found.stream().noneMatch(c -> c.flavor() == Flavor.LIGHT)) {
            absent("connected light insertion of " + hadron);
        }
        return found;
    }

    private Map<Observable, SortedSet<Integer>> products() {
        Map<Observable, SortedSet<Integer>> byOperator = new LinkedHashMap<>();
        for (Flavor flavor : flavors(settings)) {
            Observable loop = new Observable.Loop(flavor);
            present(loop, "the " + flavor.word() + " sigma term");
            byOperator.put(loop, separations(study.matrixElements().disconnected(), "disconnected"));
        }
        List<Observable> densities = source.observables().stream().filter(Observable.ActionDensity.class::isInstance).toList();
        if (densities.isEmpty()) {
            absent("action density at any flow time");
        }
        densities.forEach(d -> byOperator.put(d, separations(study.matrixElements().gluon(), "gluon")));
        return byOperator;
    }

    private SortedSet<Integer> separations(Study.ElementFits fits, String key) {
        TreeSet<Integer> all = new TreeSet<>();
        Stream.of(fits.plateau().map(Study.PlateauFits::separations), fits.summation().map(Study.SummationFits::separations),
            fits.twoState().map(Study.TwoStateFits::separations)).flatMap(java.util.Optional::stream).flatMapToInt(Span::stream).forEach(all::add);
        if (!all.isEmpty() && all.last() > source.timeExtent() / 2) {
            unfit.add(new Problem("separations up to " + all.last() + " do not fit a lattice of " + source.timeExtent() + " time slices",
                "matrix_elements." + key + ", ensemble " + settings.name(), "stay at or below " + source.timeExtent() / 2));
        }
        return all;
    }

    private void timesFit(String hadron, Study.Hadron h) {
        if (h.last() > source.timeExtent() / 2) {
            unfit.add(new Problem("the energy fit of " + hadron + " ends at t = " + h.last() + ", beyond the middle of the "
                + source.timeExtent() + " time slices", "hadrons." + hadron + ".last, ensemble " + settings.name(),
                "set last to " + source.timeExtent() / 2 + " or less"));
        }
    }

    private void present(Observable observable, String forWhat) {
        if (!source.observables().contains(observable)) {
            absent(observable.id() + ", needed for " + forWhat);
        }
    }

    private void absent(String what) {
        problems.add(new Problem("ensemble " + settings.name() + " has no " + what, "layout " + settings.layout(),
            "describe the dataset in the layout, or drop what needs it from the study"));
    }

    /** Flavours with a quark mass, in the order of the enum. */
    static List<Flavor> flavors(Study.Ensemble settings) {
        return Stream.of(Flavor.values()).filter(settings.quarkMassLattice()::containsKey).toList();
    }
}
