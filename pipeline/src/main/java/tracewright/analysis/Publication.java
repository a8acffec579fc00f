package tracewright.analysis;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import tracewright.budget.Decomposition;
import tracewright.extraction.Extracted;
import tracewright.extraction.FitSummary;
import tracewright.extrapolation.PhysicalPoint;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.renormalization.GluonPart;
import tracewright.renormalization.Renormalized;
import tracewright.results.Figure;
import tracewright.results.Results;
import tracewright.study.Flavor;
import tracewright.study.Study;
import tracewright.study.Study.ElementFits.Method;

/** Puts everything that the stages found into the one record that is written. */
final class Publication {

    private static final String PHYSICAL = "physical";

    private final Study study;
    private final List<PreparedEnsemble> ensembles;
    private final List<HadronElements> hadrons;
    private final List<HadronBudget> budgets;
    private final List<PhysicalBudget> physical;
    private final List<Results.Quantity> quantities = new ArrayList<>();
    private final List<String> warnings = new ArrayList<>();

    private Publication(Study study, List<PreparedEnsemble> ensembles, List<HadronElements> hadrons, List<HadronBudget> budgets, List<PhysicalBudget> physical) {
        this.study = study;
        this.ensembles = ensembles;
        this.hadrons = hadrons;
        this.budgets = budgets;
        this.physical = physical;
    }

    static Results of(Study study, List<PreparedEnsemble> ensembles, List<HadronElements> hadrons, List<HadronBudget> budgets, List<PhysicalBudget> physical) {
        return new Publication(study, ensembles, hadrons, budgets, physical).results();
    }

    private Results results() {
        List<Results.EnsembleSummary> summaries = ensembles.stream().map(EnsembleReport::of).toList();
        ensembles.forEach(e -> {
            warnings.addAll(e.selection().warnings());
            warnings.addAll(e.blocks().warnings());
        });
        if (study.renormalization().flavors() >= 3 && !study.ensembles().get(0).quarkMassLattice().containsKey(Flavor.STRANGE)) {
            warnings.add("renormalization: " + study.renormalization().flavors() + " flavours are active but no strange mass is given; the strange sigma term is"
                + " missing from every sum, and gamma_m times it from the anomaly");
        }
        hadrons.forEach(this::bare);
        budgets.forEach(this::contributions);
        physical.forEach(this::physicalQuantities);
        List<Results.Budget> tables = new ArrayList<>();
        budgets.forEach(b -> b.decompositions().forEach(d -> tables.add(table(b.ensemble(), b.hadron(), d))));
        physical.forEach(b -> b.decompositions().forEach(d -> tables.add(table(PHYSICAL, b.hadron(), d))));
        List<Figure> figures = new Figures(study, ensembles, hadrons, budgets, physical).all();
        return new Results(summary(), summaries, quantities, tables, figures, warnings);
    }

    private Results.StudySummary summary() {
        Map<String, String> choices = new LinkedHashMap<>();
        study.hadrons().forEach((name, h) -> choices.put("hadrons." + name, String.join("; ", h.fits().stream()
            .map(f -> f.states() + " state(s), first time slice " + f.first()).toList()) + "; last " + h.last() + ", covariance " + word(h.covariance())));
        choices.put("matrix_elements.connected", words(study.matrixElements().connected()));
        choices.put("matrix_elements.disconnected", words(study.matrixElements().disconnected()));
        choices.put("matrix_elements.gluon", words(study.matrixElements().gluon()));
        choices.put("renormalization", study.renormalization().flavors() + " flavours, " + study.renormalization().scheme() + " at "
            + study.renormalization().scaleGev() + " GeV");
        choices.put("vacuum", "subtracted inside every sample, averaged over the slices of the same sources; the jackknife's bias estimate is removed");
        choices.put("renormalization.gluon", gluonWords(study.renormalization().gluon()));
        choices.put("extrapolation", study.extrapolation().map(x -> "constant and " + x.terms().stream().map(Publication::termWord).toList()).orElse("none"));
        String resampling = study.resampling() instanceof Study.Resampling.Bootstrap b ? "bootstrap, " + b.draws() + " draws" : "jackknife";
        return new Results.StudySummary(study.name(), study.seed(), resampling, choices);
    }

    private static String gluonWords(Study.GluonRoute route) {
        if (route instanceof Study.GluonRoute.Flow flow) {
            return "flow, t/a^2 = " + flow.window().first() + ".." + flow.window().last() + ", one-loop coefficient; truncation: "
                + flow.truncationAlphaS().map(a -> "size of the next order in the pure gauge theory at alpha_s = " + a.value().value()
                    + ", indicative with quarks").orElse("no error carried");
        }
        return route instanceof Study.GluonRoute.GivenFactor given ? "given factor at t/a^2 = " + given.flowTime() : route.toString();
    }

    static String termWord(Study.Extrapolation.Term term) {
        return switch (term) {
            case SPACING_SQUARED -> "a2";
            case PION_MASS_SQUARED -> "mpi2";
        };
    }

    private static String word(Enum<?> value) {
        return value.name().toLowerCase(java.util.Locale.ROOT).replace('_', '-');
    }

    private static String words(Study.ElementFits fits) {
        List<String> parts = new ArrayList<>();
        fits.plateau().ifPresent(p -> parts.add("plateau: separations " + p.separations() + ", first " + p.first() + ", margin " + p.margin() + ", covariance "
            + word(p.covariance())));
        fits.summation().ifPresent(s -> parts.add("summation: separations " + s.separations() + ", first " + s.first() + ", margin " + s.margin()
            + ", covariance " + word(s.covariance())));
        fits.twoState().ifPresent(t -> parts.add("two-state: separations " + t.separations() + ", first " + t.first() + ", margin " + t.margin()
            + ", two-point " + t.twoPointFirst() + " to " + t.twoPointLast() + (t.excitedElement() ? ", g11 fitted" : ", g11 = 0") + ", covariance " + word(t.covariance())));
        return "published " + fits.publish().word() + "; " + String.join("; ", parts);
    }

    /** Energies, masses and bare matrix elements. */
    private void bare(HadronElements h) {
        PreparedEnsemble ensemble = ensembles.stream().filter(e -> e.name().equals(h.ensemble())).findFirst().orElseThrow();
        add(h, "energy", Optional.empty(), Optional.empty(), h.energy(), Optional.empty());
        quantities.add(new Results.Quantity(h.name() + ".mass", h.ensemble(), h.hadron(), "mass", Optional.empty(), Optional.empty(),
            h.energy().number().times(ensemble.mevPerUnit()), "MeV", Optional.empty(), Optional.empty(), Optional.empty(), Optional.empty(), List.of()));
        h.elements().ifPresent(elements -> {
            elements.connected().forEach((flavor, s) -> scanned(h, "scalar-connected", Optional.of(flavor), s, List.of()));
            elements.disconnected().forEach((flavor, s) -> scanned(h, "scalar-disconnected", Optional.of(flavor), s, List.of()));
            scanned(h, "action-density", Optional.empty(), elements.gluon(), ensemble.flowTimes());
        });
    }

    private void scanned(HadronElements h, String quantity, Optional<Flavor> flavor, HadronElements.Scanned scanned, List<Double> flowTimes) {
        scanned.failed().forEach((method, reason) -> warnings.add(scanned.name() + "." + method.word() + ": no fit in any window (first: " + reason + ")"));
        int members = scanned.results().values().iterator().next().size();
        for (int i = 0; i < members; i++) {
            Optional<Double> flowTime = flowTimes.isEmpty() ? Optional.empty() : Optional.of(flowTimes.get(i));
            add(h, quantity, flavor, flowTime, scanned.published(i), Optional.empty());
            for (Map.Entry<Method, List<Extracted>> e : scanned.results().entrySet()) {
                add(h, quantity, flavor, flowTime, e.getValue().get(i), Optional.of(e.getKey()));
            }
        }
    }

    private void add(HadronElements h, String quantity, Optional<Flavor> flavor, Optional<Double> flowTime, Extracted x, Optional<Method> method) {
        String id = h.name() + "." + quantity + flowTime.map(t -> "-flow-" + Double.toString(t).replace('.', 'p')).orElse("")
            + flavor.map(f -> "." + f.word()).orElse("") + method.map(m -> "." + m.word()).orElse("");
        quantities.add(new Results.Quantity(id, h.ensemble(), h.hadron(), quantity, flavor.map(Flavor::word), flowTime, x.number(), "lattice",
            Optional.empty(), Optional.empty(), Optional.empty(), method.map(Method::word), x.fits().stream().map(Publication::fit).toList()));
        if (method.isEmpty()) {
            judge(id, x);
        }
    }

    /** Says so when windows failed or the heaviest fit is improbable. */
    private void judge(String id, Extracted x) {
        if (!x.failures().isEmpty()) {
            warnings.add(id + ": " + x.failures().size() + " of " + (x.failures().size() + x.fits().size()) + " windows gave no fit (first: "
                + x.failures().get(0) + ")");
        }
        if (x.heaviest().pValue() < 0.01) {
            warnings.add(String.format(java.util.Locale.ROOT, "%s: the fit with the largest weight (%s) has p = %.2g", id, x.heaviest().label(),
                x.heaviest().pValue()));
        }
    }

    private static Results.Fit fit(FitSummary f) {
        return new Results.Fit(f.label(), f.chiSquared(), f.expected(), f.degreesOfFreedom(), f.pValue(), f.weight(), f.noiseFactor(), f.value(), f.error());
    }

    private void contributions(HadronBudget b) {
        b.sigmas().forEach((flavor, sigma) -> mev(b.ensemble(), b.hadron(), "sigma", Optional.of(flavor), sigma, List.of()));
        mev(b.ensemble(), b.hadron(), "gluon", Optional.empty(), b.gluon().part(),
            b.gluon().extrapolation().map(x -> List.of(flowFit(x))).orElse(List.of()));
        mev(b.ensemble(), b.hadron(), "anomaly", Optional.empty(), new Renormalized(b.anomaly(), "gluon part and gamma_m times the sigma terms",
            Optional.empty(), Optional.empty()), List.of());
    }

    private static Results.Fit flowFit(GluonPart.FlowLimit x) {
        return new Results.Fit("linear in the flow time", x.chiSquared(), x.degreesOfFreedom(), x.degreesOfFreedom(), x.pValue(), 1, 1, x.atZero().central(),
            x.atZero().error());
    }

    private void mev(String ensemble, String hadron, String quantity, Optional<Flavor> flavor, Renormalized r, List<Results.Fit> fits) {
        String id = ensemble + "." + hadron + "." + quantity + flavor.map(f -> "." + f.word()).orElse("");
        quantities.add(new Results.Quantity(id, ensemble, hadron, quantity, flavor.map(Flavor::word), Optional.empty(), r.value(), "MeV", r.scheme(),
            r.scaleGev(), Optional.of(r.route()), Optional.empty(), fits));
    }

    private void physicalQuantities(PhysicalBudget b) {
        HadronBudget any = budgets.stream().filter(x -> x.hadron().equals(b.hadron())).findFirst().orElseThrow();
        b.fits().forEach((quantity, fit) -> {
            Optional<String> flavor = quantity.startsWith("sigma.") ? Optional.of(quantity.substring("sigma.".length())) : Optional.empty();
            boolean gluon = quantity.equals("gluon");
            quantities.add(new Results.Quantity(PHYSICAL + "." + b.hadron() + "." + quantity, PHYSICAL, b.hadron(), flavor.isPresent() ? "sigma" : quantity,
                flavor, Optional.empty(), fit.value(), "MeV", gluon ? any.gluon().part().scheme() : Optional.empty(),
                gluon ? any.gluon().part().scaleGev() : Optional.empty(), Optional.empty(), Optional.of("linear fit in " + terms(fit)), List.of(physicalFit(fit))));
        });
        quantities.add(new Results.Quantity(PHYSICAL + "." + b.hadron() + ".anomaly", PHYSICAL, b.hadron(), "anomaly", Optional.empty(), Optional.empty(),
            b.anomaly(), "MeV", Optional.empty(), Optional.empty(), Optional.of("gluon part and gamma_m times the sigma terms"), Optional.empty(), List.of()));
    }

    private static String terms(PhysicalPoint fit) {
        return String.join(", ", fit.terms().stream().map(Publication::termWord).toList());
    }

    private static Results.Fit physicalFit(PhysicalPoint fit) {
        return new Results.Fit("constant, " + terms(fit), fit.chiSquared(), fit.degreesOfFreedom(), fit.degreesOfFreedom(), fit.pValue(), 1, 1,
            fit.value().central(), fit.value().error());
    }

    private static Results.Budget table(String ensemble, String hadron, Decomposition d) {
        List<Results.Term> terms = d.terms().stream().map(t -> new Results.Term(t.id(), t.value(), d.fraction(t))).toList();
        SampledNumber total = d.total();
        return new Results.Budget(hadron, ensemble, d.name(), d.scheme(), d.scaleGev(), terms, total, d.mass(), d.closure());
    }
}
