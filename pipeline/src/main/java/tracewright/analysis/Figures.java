package tracewright.analysis;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.stream.IntStream;
import tracewright.budget.Decomposition;
import tracewright.extraction.ElementScan;
import tracewright.extraction.Extracted;
import tracewright.extrapolation.PhysicalPoint;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.fitters.sampled.SampledVector;
import tracewright.renormalization.GluonPart;
import tracewright.results.Figure;
import tracewright.study.Flavor;
import tracewright.study.Span;
import tracewright.study.Study;

/** The plots of a run, as data. */
final class Figures {

    private static final int CURVE_POINTS = 41;

    private final Study study;
    private final List<PreparedEnsemble> ensembles;
    private final List<HadronElements> hadrons;
    private final List<HadronBudget> budgets;
    private final List<PhysicalBudget> physical;

    Figures(Study study, List<PreparedEnsemble> ensembles, List<HadronElements> hadrons, List<HadronBudget> budgets, List<PhysicalBudget> physical) {
        this.study = study;
        this.ensembles = ensembles;
        this.hadrons = hadrons;
        this.budgets = budgets;
        this.physical = physical;
    }

    List<Figure> all() {
        List<Figure> figures = new ArrayList<>();
        for (PreparedEnsemble ensemble : ensembles) {
            for (HadronElements h : hadrons.stream().filter(x -> x.ensemble().equals(ensemble.name())).toList()) {
                figures.add(effectiveMass(ensemble, h));
                h.elements().ifPresent(e -> elements(ensemble, h, e, figures));
            }
            for (HadronBudget b : budgets.stream().filter(x -> x.ensemble().equals(ensemble.name())).toList()) {
                flowTime(b).ifPresent(figures::add);
                figures.add(budgetBars(b.ensemble(), b.hadron(), b.decompositions().get(0)));
            }
        }
        for (PhysicalBudget b : physical) {
            b.fits().forEach((quantity, fit) -> fit.terms().forEach(term -> figures.add(extrapolation(b.hadron(), quantity, fit, term))));
            figures.add(budgetBars("physical", b.hadron(), b.decompositions().get(0)));
        }
        return figures;
    }

    /** Effective mass ln C(t)/C(t+1), for mesons the solution of the ratio of two cosh, with the band of the fitted energy. */
    private Figure effectiveMass(PreparedEnsemble ensemble, HadronElements h) {
        Study.Hadron settings = study.hadrons().get(h.hadron());
        SampledVector c2 = ensemble.correlators().twoPoint(h.hadron());
        SampledVector mass = settings.kind() == Study.Hadron.Kind.MESON ? EffectiveMass.periodic(c2) : EffectiveMass.open(c2);
        double[] errors = mass.errors();
        List<Figure.Point> points = new ArrayList<>();
        for (int t = 0; t < mass.length(); t++) {
            if (Double.isFinite(mass.central(t)) && Double.isFinite(errors[t]) && errors[t] < 0.3 * mass.central(t)) {
                points.add(new Figure.Point(t + 0.5, mass.central(t), errors[t], settings.firstSlice() <= t && t < settings.last()));
            }
        }
        SampledNumber energy = h.energy().number();
        String window = h.energy().heaviest().label();
        return new Figure(id(h.name(), "effective-mass"), ensemble.name(), "effective-mass", "Effective mass of the " + h.hadron(),
            "Effective mass of the " + h.hadron() + " on " + ensemble.name() + " against time, with the ground-state energy averaged over windows (heaviest: "
                + window + "); filled points lie in a fit window.",
            new Figure.Axis("t/a", false), new Figure.Axis("a m_{eff}(t)", false),
            List.of(band("ground state", energy, settings.firstSlice(), settings.last()), new Figure.Points("a m_{eff}", points)));
    }

    private void elements(PreparedEnsemble ensemble, HadronElements h, HadronElements.Elements e, List<Figure> figures) {
        e.connected().forEach((flavor, s) -> ratioAndSum(ensemble, h, s, 0, study.matrixElements().connected(),
            "connected " + flavor.word() + " scalar", "scalar-connected-" + flavor.word(), figures));
        e.disconnected().forEach((flavor, s) -> ratioAndSum(ensemble, h, s, 0, study.matrixElements().disconnected(),
            "disconnected " + flavor.word() + " scalar", "scalar-disconnected-" + flavor.word(), figures));
        int middle = ensemble.flowTimes().size() / 2;
        ratioAndSum(ensemble, h, e.gluon(), middle, study.matrixElements().gluon(),
            "action density at flow time " + ensemble.flowTimes().get(middle) + " a^{2}", "action-density", figures);
    }

    private void ratioAndSum(PreparedEnsemble ensemble, HadronElements h, HadronElements.Scanned s, int member, Study.ElementFits settings, String what,
            String slug, List<Figure> figures) {
        ElementScan scan = s.scan();
        Extracted published = s.published(member);
        Span shown = settings.twoState().map(Study.TwoStateFits::separations).or(() -> settings.plateau().map(Study.PlateauFits::separations))
            .or(() -> settings.summation().map(Study.SummationFits::separations)).orElseThrow();
        List<Integer> separations = thinned(scan.separationsWithin(shown, 1));
        List<Figure.Layer> layers = new ArrayList<>();
        double half = separations.get(separations.size() - 1) / 2.0;
        layers.add(band("ground state (" + s.published().word() + ")", published.number(), -half, half));
        for (int t : separations) {
            SampledVector ratio = scan.ratio(member, t);
            double[] errors = ratio.errors();
            layers.add(new Figure.Points("t = " + t + " a", IntStream.range(1, t)
                .mapToObj(tau -> new Figure.Point(tau - t / 2.0, ratio.central(tau), errors[tau], true)).toList()));
        }
        figures.add(new Figure(id(h.name(), "ratio", slug), ensemble.name(), "ratio", "Ratio, " + what + ", " + h.hadron(),
            "Ratio of three- to two-point function for the " + what + " of the " + h.hadron() + " on " + ensemble.name()
                + " against insertion time, with the extracted ground-state element (" + s.published().word() + ").",
            new Figure.Axis("(\u03c4 - t/2)/a", false), new Figure.Axis("R(t, \u03c4)", false), layers));
        settings.summation().filter(sum -> s.results().containsKey(Study.ElementFits.Method.SUMMATION)).ifPresent(sum -> figures.add(summed(ensemble, h, s, member, sum, what, slug)));
    }

    private static List<Integer> thinned(List<Integer> separations) {
        int most = 5;
        if (separations.size() <= most) {
            return separations;
        }
        return IntStream.range(0, most).map(i -> separations.size() - 1 - i * (separations.size() - 1) / (most - 1)).sorted()
            .mapToObj(separations::get).distinct().toList();
    }

    private Figure summed(PreparedEnsemble ensemble, HadronElements h, HadronElements.Scanned s, int member, Study.SummationFits settings, String what, String slug) {
        SampledVector sums = s.scan().summedRatio(member, settings.separations(), settings.margin());
        List<Integer> separations = s.scan().separationsWithin(settings.separations(), settings.margin());
        double[] errors = sums.errors();
        List<Figure.Point> points = IntStream.range(0, separations.size())
            .mapToObj(i -> new Figure.Point(separations.get(i), sums.central(i), errors[i], separations.get(i) >= settings.first().first())).toList();
        SampledNumber slope = s.results().get(Study.ElementFits.Method.SUMMATION).get(member).number();
        return new Figure(id(h.name(), "summed", slug), ensemble.name(), "summed-ratio", "Summed ratio, " + what + ", " + h.hadron(),
            "Ratio summed over insertion times (margin " + settings.margin() + ") for the " + what + " of the " + h.hadron() + " on " + ensemble.name()
                + "; the line through the last point has the extracted slope.",
            new Figure.Axis("t/a", false), new Figure.Axis("S(t)", false),
            List.of(throughLast("slope", sums.number(separations.size() - 1), slope, separations), new Figure.Points("S(t)", points)));
    }

    /** Band of S(last) + slope (t - last), errors of both and their covariance. */
    private static Figure.Band throughLast(String legend, SampledNumber last, SampledNumber slope, List<Integer> separations) {
        int end = separations.get(separations.size() - 1);
        List<Figure.BandPoint> points = new ArrayList<>();
        for (int t : separations) {
            SampledNumber y = last.plus(slope.times((double) (t - end)));
            points.add(bandPoint(t, y));
        }
        return new Figure.Band(legend, points);
    }

    private Optional<Figure> flowTime(HadronBudget b) {
        return b.gluon().extrapolation().map(limit -> {
            List<Figure.Point> points = limit.points().stream()
                .map(p -> new Figure.Point(p.flowTime(), p.element().central(), p.element().publishedError(), true)).toList();
            double last = limit.points().get(limit.points().size() - 1).flowTime();
            List<Figure.BandPoint> curve = new ArrayList<>();
            for (int i = 0; i < CURVE_POINTS; i++) {
                double t = last * i / (CURVE_POINTS - 1);
                curve.add(bandPoint(t, limit.atZero().plus(limit.slope().times(t))));
            }
            return new Figure(id(b.ensemble() + "." + b.hadron(), "flow-time"), b.ensemble(), "flow-time", "Gluon part against flow time, " + b.hadron(),
                "Gluon part of the trace of the " + b.hadron() + " on " + b.ensemble() + " (coefficient times flowed action density) and its linear limit at zero flow time.",
                new Figure.Axis("t/a^{2}", true), new Figure.Axis("(\u03b2/2g) F^{2} (MeV)", false),
                List.of(new Figure.Band("linear fit", curve), new Figure.Points("measured", points),
                    new Figure.Points("limit", List.of(new Figure.Point(0, limit.atZero().central(), limit.atZero().publishedError(), false)))));
        });
    }

    private Figure extrapolation(String hadron, String quantity, PhysicalPoint fit, Study.Extrapolation.Term term) {
        SampledNumber pion = EnsembleStage.constant(study.extrapolation().orElseThrow().pionMassMev());
        boolean spacing = term == Study.Extrapolation.Term.SPACING_SQUARED;
        double offset = spacing ? 0 : pion.central() * pion.central() * 1e-6;
        List<Figure.Point> points = new ArrayList<>();
        double largest = 0;
        for (PhysicalPoint.Entry e : fit.entries()) {
            SampledNumber x = PhysicalPoint.abscissa(term, e, pion);
            SampledNumber y = fit.alongLine(e, term, pion);
            points.add(new Figure.Point(x.central() + offset, y.central(), y.publishedError(), x.publishedError(), true));
            largest = Math.max(largest, x.central());
        }
        SampledNumber slope = fit.coefficients().get(fit.terms().indexOf(term));
        List<Figure.BandPoint> curve = new ArrayList<>();
        for (int i = 0; i < CURVE_POINTS; i++) {
            double x = 1.08 * largest * i / (CURVE_POINTS - 1);
            curve.add(bandPoint(x + offset, fit.value().plus(slope.times(x))));
        }
        String slug = spacing ? "spacing" : "pion-mass";
        return new Figure(id("physical." + hadron, quantity.replace('.', '-'), slug), "physical", "extrapolation",
            quantity + " of the " + hadron + (spacing ? " against a^{2}" : " against M_{\u03c0}^{2}"),
            "Extrapolation of " + quantity + " of the " + hadron + (spacing ? " in the lattice spacing squared" : " in the pion mass squared")
                + "; points are moved along the fit to the physical value of the other term.",
            new Figure.Axis(spacing ? "a^{2} (fm^{2})" : "M_{\u03c0}^{2} (GeV^{2})", spacing), new Figure.Axis(quantity + " (MeV)", false),
            List.of(new Figure.Band("fit", curve), new Figure.Points("ensembles", points),
                new Figure.Points("physical point", List.of(new Figure.Point(offset, fit.value().central(), fit.value().publishedError(), false)))));
    }

    private static Figure budgetBars(String ensemble, String hadron, Decomposition d) {
        List<Figure.Bar> bars = new ArrayList<>();
        for (Decomposition.Term term : d.terms()) {
            SampledNumber fraction = d.fraction(term);
            bars.add(new Figure.Bar(term.id(), fraction.central(), fraction.publishedError()));
        }
        SampledNumber closure = d.closure().dividedBy(d.mass());
        bars.add(new Figure.Bar("closure", closure.central(), closure.publishedError()));
        return new Figure(id(ensemble + "." + hadron, "budget"), ensemble, "budget", "Budget of the " + hadron + " mass, " + ensemble,
            "Fractions of the mass of the " + hadron + " (" + ensemble + ") by term of the trace; closure is what is left over.",
            new Figure.Axis("fraction of the mass", true), new Figure.Axis("", false), List.of(new Figure.Bars("", bars)));
    }

    private static Figure.Band band(String legend, SampledNumber y, double from, double to) {
        return new Figure.Band(legend, List.of(bandPoint(from, y), bandPoint(to, y)));
    }

    private static Figure.BandPoint bandPoint(double x, SampledNumber y) {
        double e = y.publishedError();
        return new Figure.BandPoint(x, y.central() - e, y.central(), y.central() + e);
    }

    private static String id(String name, String... parts) {
        return name.replace('.', '-') + "-" + String.join("-", parts);
    }
}
