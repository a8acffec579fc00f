package tracewright.report;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Random;
import java.util.stream.IntStream;
import tracewright.fitters.sampled.BlockLabel;
import tracewright.fitters.sampled.SampleGroup;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.results.Figure;
import tracewright.results.Results;

/**
 * Results of a study that never was: three ensembles, a nucleon, a Lambda and a pion, about forty figures. All numbers are invented
 * from a fixed seed; they have the size of real ones so that the layout meets what it will meet in use.
 */
final class ExampleResults {

    private static final int BLOCKS = 40;
    private static final List<String> HADRONS = List.of("nucleon", "lambda");
    private static final List<String> TERMS = List.of("anomaly", "sigma.light", "sigma.strange", "sigma.charm");

    /** One invented ensemble; masses in MeV. */
    private record Ensemble(String name, int space, int time, double spacing, double pion, int onDisk, SampleGroup gauge) {
    }

    private final Random random = new Random(20260101);
    private final List<Ensemble> ensembles = List.of(
        ensemble("amber-32", 32, 64, 0.1163, 344, 1240), ensemble("birch-48", 48, 96, 0.0862, 289, 905), ensemble("cedar-64", 64, 128, 0.0643, 212, 610));
    private final List<Figure> figures = new ArrayList<>();
    private final List<Results.Quantity> quantities = new ArrayList<>();
    private final List<Results.Budget> budgets = new ArrayList<>();

    private ExampleResults() {
    }

    static Results results() {
        return new ExampleResults().build();
    }

    private Results build() {
        ensembles.forEach(this::measure);
        HADRONS.forEach(this::extrapolate);
        Map<String, String> choices = new LinkedHashMap<>();
        choices.put("covariance of plateau fits", "full");
        choices.put("covariance of two-state fits", "shrunk towards its diagonal, intensity from the data");
        choices.put("windows", "averaged over all with at least 4 points, information criterion");
        choices.put("excited-state levels", "left free; non-interacting nucleon-pion levels by prior as an alternative");
        choices.put("truncation of beta and gamma_m", "five loops; difference to four loops as a choice");
        return new Results(new Results.StudySummary("Baryon budgets at three spacings", 20260101, "delete-a-block jackknife", choices),
            ensembles.stream().map(this::summary).toList(), quantities, budgets, figures, warnings());
    }

    private static List<String> warnings() {
        return List.of("cedar-64: the autocorrelation of the action density at flow time 2.4 is not settled: the chain holds 11 times tau, 50 are asked for",
            "birch-48, lambda, strange: the plateau and the two-state fit differ by 2.3 standard errors",
            "cedar-64: stream b, configuration 1184 left out: dataset <loops/strange> & its copy hold a value that is not finite",
            "extrapolation: three ensembles determine three parameters of form 2; its chi-squared says nothing");
    }

    private Ensemble ensemble(String name, int space, int time, double spacing, double pion, int onDisk) {
        List<BlockLabel> labels = IntStream.range(0, BLOCKS).mapToObj(k -> new BlockLabel(k < BLOCKS / 2 ? "a" : "b", k)).toList();
        int[] sizes = new int[BLOCKS];
        java.util.Arrays.fill(sizes, 20);
        return new Ensemble(name, space, time, spacing, pion, onDisk, SampleGroup.jackknife(name, labels, sizes));
    }

    private Results.EnsembleSummary summary(Ensemble e) {
        Map<String, Integer> removed = new LinkedHashMap<>();
        removed.put("thermalisation", 80);
        removed.put("stride 2", e.name.startsWith("c") ? 0 : 30);
        removed.put("missing loops", 6);
        removed.put("outliers of the two-point function", 2);
        int kept = e.onDisk - removed.values().stream().mapToInt(Integer::intValue).sum();
        Map<String, Integer> streams = new LinkedHashMap<>();
        streams.put("a", kept / 2);
        streams.put("b", kept - kept / 2);
        return new Results.EnsembleSummary(e.name, e.time, e.space, spacing(e), e.onDisk, kept, streams, removed, 24, BLOCKS, 40,
            "chosen: the smallest length for which no published number's variance grows by more than 5 % when it is doubled",
            List.of(new Results.Autocorrelation("plaquette", 3.1, 0.4, ""), new Results.Autocorrelation("nucleon two-point function, t = 10", 1.2, 0.2, ""),
                new Results.Autocorrelation("action density, flow time 2.4", 21.7, 6.3, e.name.startsWith("c") ? "chain too short: 11 tau, 50 asked for" : "")),
            List.of("/two_point/nucleon: two-point function, summed over space, source at t = 0 after shift, antiperiodic in time",
                "/loops/strange: Tr D^-1 per time slice, 64 hits averaged, volume sum, sign without the fermion loop's minus",
                "/gluon/E: action density per time slice at 12 flow times, with g^2, volume average"));
    }

    private static SampledNumber spacing(Ensemble e) {
        return SampledNumber.input("spacing of " + e.name, e.spacing, 0.004 * e.spacing);
    }

    private SampledNumber gauge(Ensemble e, double value, double error) {
        double[] samples = new double[BLOCKS];
        for (int k = 0; k < BLOCKS; k++) {
            samples[k] = value + error / Math.sqrt(BLOCKS - 1) * random.nextGaussian();
        }
        return SampledNumber.of(value, e.gauge, samples);
    }

    /** A number in MeV: gauge noise, the spacing's error, and the spread over windows. */
    private SampledNumber dimensionful(Ensemble e, double value, double error, String choice) {
        SampledNumber x = gauge(e, value, error).times(spacing(e)).times(1 / e.spacing);
        double shift = 0.5 * error;
        return x.withGroup(SampleGroup.choice(choice, new double[] {0.5, 0.5}), new double[] {value + shift, value - shift});
    }

    private void measure(Ensemble e) {
        double scale = e.name.startsWith("c") ? 1.4 : 1;
        effectiveMass(e, "pion", e.pion * e.spacing / 197.327, 0.0006 * scale);
        for (String hadron : HADRONS) {
            double mass = (hadron.equals("nucleon") ? 938 : 1116) + 0.45 * (e.pion - 135);
            effectiveMass(e, hadron, mass * e.spacing / 197.327, 0.0025 * scale);
            double light = (hadron.equals("nucleon") ? 44 : 31) * e.pion * e.pion / (135.0 * 135.0) * 0.55;
            double strange = hadron.equals("nucleon") ? 46 : 148;
            budget(e.name, hadron, List.of(dimensionful(e, mass - light - strange - 71, 31 * scale, e.name + ".anomaly window"),
                dimensionful(e, light, 6 * scale, e.name + ".sigma window"), dimensionful(e, strange, 9 * scale, e.name + ".sigma window strange"),
                dimensionful(e, 71, 19 * scale, e.name + ".sigma window charm")), dimensionful(e, mass, 5 * scale, e.name + "." + hadron + " window"));
            for (String flavor : List.of("light", "strange")) {
                double element = flavor.equals("light") ? 6.2 : 0.52;
                ratio(e, hadron, flavor, element, 0.05 * element * scale);
                methods(e, hadron, flavor, element, 0.05 * element * scale);
            }
            summed(e, hadron, 6.2, 0.22 * scale);
            flow(e, hadron, mass * 0.83, 31 * scale);
        }
    }

    private void effectiveMass(Ensemble e, String hadron, double mass, double error) {
        List<Figure.Point> points = new ArrayList<>();
        for (int t = 1; t < 26; t++) {
            double noise = error * StrictMath.exp(hadron.equals("pion") ? 0.01 * t : 0.17 * (t - 6));
            double excited = 0.55 * mass * StrictMath.exp(-0.42 * t);
            points.add(new Figure.Point(t, mass + excited + noise * random.nextGaussian(), noise, t >= 9 && t <= 17));
        }
        List<Figure.BandPoint> band = List.of(new Figure.BandPoint(9, mass - error, mass, mass + error), new Figure.BandPoint(17, mass - error, mass, mass + error));
        figures.add(new Figure(e.name + "-" + hadron + "-effective-mass", e.name, "effective-mass", "Effective mass of the " + hadron,
            "Source average of 24 sources, folded; fit over t = 9..17.", new Figure.Axis("t/a", false), new Figure.Axis("a m_{eff}(t)", false),
            List.of(new Figure.Points("a m_{eff}", points), new Figure.Band("two exponentials, a E_{0} = " + Numbers.paper(mass, error), band))));
    }

    private void ratio(Ensemble e, String hadron, String flavor, double element, double error) {
        List<Figure.Layer> layers = new ArrayList<>();
        for (int sep : new int[] {8, 10, 12, 14}) {
            List<Figure.Point> points = new ArrayList<>();
            double noise = 0.35 * error * StrictMath.exp(0.28 * (sep - 10));
            for (int tau = 1; tau < sep; tau++) {
                double y = element * (1 - 0.5 * StrictMath.exp(-0.4 * tau) - 0.5 * StrictMath.exp(-0.4 * (sep - tau)));
                points.add(new Figure.Point(tau - 0.5 * sep, y + noise * random.nextGaussian(), noise, tau >= 3 && tau <= sep - 3 && sep >= 10));
            }
            layers.add(new Figure.Points("t_{sep}/a = " + sep, points));
        }
        layers.add(new Figure.Band("ground state", List.of(new Figure.BandPoint(-6.5, element - error, element, element + error),
            new Figure.BandPoint(6.5, element - error, element, element + error))));
        figures.add(new Figure(e.name + "-" + hadron + "-ratio-" + flavor, e.name, "ratio", "Scalar ratio, " + hadron + ", " + flavor,
            "Three-point over two-point function, vacuum-subtracted; two-state fit to separations 10 to 14.",
            new Figure.Axis("(\u03c4 \u2212 t_{sep}/2)/a", false), new Figure.Axis("R(t_{sep}, \u03c4)", false), layers));
    }

    private void summed(Ensemble e, String hadron, double slope, double error) {
        List<Figure.Point> points = new ArrayList<>();
        for (int sep = 6; sep <= 16; sep += 2) {
            double noise = error * StrictMath.exp(0.25 * (sep - 8));
            points.add(new Figure.Point(sep, -9 + slope * sep + noise * random.nextGaussian(), noise, sep >= 8));
        }
        List<Figure.BandPoint> band = new ArrayList<>();
        for (int sep = 8; sep <= 16; sep += 2) {
            band.add(new Figure.BandPoint(sep, -9 + slope * sep - 0.3 * error * sep, -9 + slope * sep, -9 + slope * sep + 0.3 * error * sep));
        }
        figures.add(new Figure(e.name + "-" + hadron + "-summed", e.name, "summed-ratio", "Summed ratio, " + hadron + ", light",
            "Slope of a straight line over t_{sep}/a = 8..16.", new Figure.Axis("t_{sep}/a", false), new Figure.Axis("S(t_{sep})", false),
            List.of(new Figure.Points("summed ratio", points), new Figure.Band("straight line", band))));
    }

    private void flow(Ensemble e, String hadron, double value, double error) {
        List<Figure.Layer> layers = new ArrayList<>();
        for (int method = 0; method < 2; method++) {
            List<Figure.Point> points = new ArrayList<>();
            for (int i = 1; i <= 10; i++) {
                double t = 2.5e-5 * i * i;
                double noise = error * (0.5 + 3.0 / (i * i));
                points.add(new Figure.Point(t, value * (1 + 30 * t + (method == 1 ? 0.02 : 0)) + noise * random.nextGaussian(), noise, i >= 4 && i <= 9));
            }
            layers.add(new Figure.Points(method == 0 ? "plateau" : "summation", points));
        }
        layers.add(new Figure.Band("linear in t", List.of(new Figure.BandPoint(0, value - error, value, value + error),
            new Figure.BandPoint(2.5e-3, value * 1.075 - error, value * 1.075, value * 1.075 + error))));
        layers.add(new Figure.Line("mass minus sigma terms", List.of(new Figure.LinePoint(0, value * 0.99), new Figure.LinePoint(2.5e-3, value * 0.99)), true));
        figures.add(new Figure(e.name + "-" + hadron + "-flow", e.name, "flow-time", "Anomaly of the " + hadron + " against flow time",
            "Matched with coefficients to three loops; extrapolated linearly.", new Figure.Axis("t [fm^{2}]", true), new Figure.Axis("anomaly [MeV]", false), layers));
    }

    private void methods(Ensemble e, String hadron, String flavor, double value, double error) {
        String[] methods = {"", "plateau", "summation", "two-state"};
        for (int m = 0; m < methods.length; m++) {
            SampledNumber x = gauge(e, value * (1 + 0.01 * m), error * (1 + 0.2 * m));
            if (m == 0) {
                x = x.withGroup(SampleGroup.choice(e.name + "." + hadron + "." + flavor + " window", new double[] {0.6, 0.4}), new double[] {value * 1.02, value * 0.97})
                    .withGroup(SampleGroup.fitNoise(e.name + "." + hadron + "." + flavor, 1), new double[] {x.central() + 0.3 * error});
            }
            Optional<String> method = methods[m].isEmpty() ? Optional.empty() : Optional.of(methods[m]);
            quantities.add(new Results.Quantity(e.name + "." + hadron + ".scalar." + flavor + (m == 0 ? "" : "." + methods[m]), e.name, hadron, "scalar matrix element",
                Optional.of(flavor), Optional.empty(), x, "lattice", Optional.empty(), Optional.empty(), Optional.of("invariant"), method, fits(m, value, error)));
        }
    }

    private List<Results.Fit> fits(int method, double value, double error) {
        List<Results.Fit> fits = new ArrayList<>();
        for (int i = 0; i < (method == 0 ? 0 : 4); i++) {
            int dof = 7 + 2 * i;
            double chi = dof * (0.8 + 0.4 * random.nextDouble());
            fits.add(new Results.Fit("margin " + (2 + i) + ", separations 10..14", chi, dof, dof, 0.2 + 0.6 * random.nextDouble(), 0.1 * (i + 1), 1.12,
                value * (1 + 0.02 * random.nextGaussian()), error));
        }
        return fits;
    }

    private void budget(String place, String hadron, List<SampledNumber> values, SampledNumber mass) {
        List<Results.Term> terms = new ArrayList<>();
        SampledNumber total = SampledNumber.exact(0);
        for (int i = 0; i < values.size(); i++) {
            terms.add(new Results.Term(TERMS.get(i), values.get(i), values.get(i).dividedBy(mass)));
            total = total.plus(values.get(i));
        }
        budgets.add(new Results.Budget(hadron, place, "trace", Optional.empty(), Optional.empty(), terms, total, mass, mass.minus(total)));
    }

    private void extrapolate(String hadron) {
        List<Results.Budget> measured = budgets.stream().filter(b -> b.hadron().equals(hadron)).toList();
        SampledNumber mass = combined(measured.stream().map(Results.Budget::mass).toList(), hadron.equals("nucleon") ? 941 : 1119, "mass form");
        List<SampledNumber> values = new ArrayList<>();
        double[] targets = hadron.equals("nucleon") ? new double[] {790, 43, 45, 70} : new double[] {862, 30, 146, 71};
        for (int i = 0; i < TERMS.size(); i++) {
            int term = i;
            values.add(combined(measured.stream().map(b -> b.terms().get(term).value()).toList(), targets[i], TERMS.get(i) + " form"));
            extrapolation(hadron, TERMS.get(i), measured.stream().map(b -> b.terms().get(term).value()).toList(), values.get(i));
            quantities.add(new Results.Quantity("physical." + hadron + "." + TERMS.get(i), "physical", hadron, TERMS.get(i), Optional.empty(), Optional.empty(), values.get(i),
                "MeV", Optional.empty(), Optional.empty(), Optional.of("invariant"), Optional.empty(), fits(1, targets[i], 9)));
        }
        budget("physical", hadron, values, mass);
    }

    private SampledNumber combined(List<SampledNumber> measured, double target, String choice) {
        SampledNumber mean = SampledNumber.evaluate(v -> 0.2 * v[0] + 0.3 * v[1] + 0.5 * v[2], measured.toArray(SampledNumber[]::new));
        SampledNumber moved = mean.plus(SampledNumber.exact(target - mean.central()));
        return moved.withGroup(SampleGroup.variation(choice), new double[] {target + 0.3 * mean.error()});
    }

    private void extrapolation(String hadron, String term, List<SampledNumber> measured, SampledNumber limit) {
        List<Figure.Point> points = new ArrayList<>();
        for (int i = 0; i < measured.size(); i++) {
            double a = ensembles.get(i).spacing;
            points.add(new Figure.Point(a * a, measured.get(i).central(), Published.error(measured.get(i)), 0.008 * a * a, true));
        }
        double error = Published.error(limit);
        double end = measured.get(0).central();
        List<Figure.BandPoint> band = List.of(new Figure.BandPoint(0, limit.central() - error, limit.central(), limit.central() + error),
            new Figure.BandPoint(0.0145, end - error, end, end + error));
        figures.add(new Figure("physical-" + hadron + "-" + term.replace('.', '-'), "physical", "extrapolation", "Continuum limit, " + hadron + ": " + Words.term(term),
            "Points shifted to the physical pion mass with the fitted slope.", new Figure.Axis("a^{2} [fm^{2}]", true), new Figure.Axis(Words.term(term) + " [MeV]", false),
            List.of(new Figure.Points("ensembles", points), new Figure.Points("continuum", List.of(new Figure.Point(0, limit.central(), error, false))),
                new Figure.Band("a^{2} + m_{\u03c0}^{2}", band))));
    }
}
