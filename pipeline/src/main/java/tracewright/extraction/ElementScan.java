package tracewright.extraction;

import java.util.ArrayList;
import java.util.EnumMap;
import java.util.LinkedHashSet;
import java.util.List;
import java.util.Map;
import java.util.Set;
import java.util.TreeSet;
import java.util.function.IntFunction;
import java.util.stream.IntStream;
import tracewright.correlators.Correlators;
import tracewright.fitters.leastsquares.FitOutcome;
import tracewright.fitters.leastsquares.SampledFit;
import tracewright.fitters.models.Plateau;
import tracewright.fitters.models.Summation;
import tracewright.fitters.models.TwoStateJoint;
import tracewright.fitters.sampled.SampledVector;
import tracewright.study.InputException;
import tracewright.study.Observable;
import tracewright.study.Span;
import tracewright.study.Study;
import tracewright.study.Study.ElementFits.Method;

/**
 * Ground-state matrix elements of one hadron for one operator, or for a family of operators that are fitted in the same
 * windows (a density at several flow times). Element = limit of R(t, tau) = C3(t, tau)/C2(t), lattice units.
 */
public final class ElementScan {

    private final String name;
    private final String hadron;
    private final List<IntFunction<Observable>> family;   // each: the operator at a separation
    private final TreeSet<Integer> separations;
    private final Correlators correlators;

    /**
     * @param name        {@code <ensemble>.<hadron>.<quantity>}, for groups and messages
     * @param family      for each member, the observable that holds its three-point function at a separation
     * @param separations separations at which the three-point functions exist
     */
    public ElementScan(String name, String hadron, List<IntFunction<Observable>> family, Set<Integer> separations, Correlators correlators) {
        this.name = name;
        this.hadron = hadron;
        this.family = List.copyOf(family);
        this.separations = new TreeSet<>(separations);
        this.correlators = correlators;
    }

    /**
     * What came of every method that the study configures.
     *
     * @param results by method, one per member of the family
     * @param failed  methods that gave no number at all, with the first reason; never the published one
     */
    public record Scan(Map<Method, List<Extracted>> results, Map<Method, String> failed) {
    }

    /** @throws InputException with cause REQUIREMENT if the method to be published gives no number */
    public Scan run(Study.ElementFits settings) {
        Scan scan = new Scan(new EnumMap<>(Method.class), new EnumMap<>(Method.class));
        settings.plateau().ifPresent(s -> attempt(Method.PLATEAU, plateauWindows(s), settings.publish(), scan));
        settings.summation().ifPresent(s -> attempt(Method.SUMMATION, summationWindows(s), settings.publish(), scan));
        settings.twoState().ifPresent(s -> attempt(Method.TWO_STATE, twoStateWindows(s), settings.publish(), scan));
        return scan;
    }

    private void attempt(Method method, List<WindowAverage.Window> windows, Method published, Scan scan) {
        try {
            scan.results().put(method, WindowAverage.of(name + "." + method.word(), windows));
        } catch (InputException e) {
            if (method == published) {
                throw e;
            }
            scan.failed().put(method, e.problems().get(0).what());
        }
    }

    /** Points (t, tau) of a window, tau up to t/2 since tau and t - tau were averaged. */
    private record Points(List<Integer> separations, int margin) {

        int[] sinks() {
            return separations.stream().flatMapToInt(t -> insertions(t).map(tau -> t)).toArray();
        }

        int[] insertions() {
            return separations.stream().flatMapToInt(this::insertions).toArray();
        }

        private IntStream insertions(int t) {
            return IntStream.rangeClosed(margin, t / 2);
        }

        String words() {
            return "t = " + join(separations) + ", margin " + margin;
        }
    }

    private List<WindowAverage.Window> plateauWindows(Study.PlateauFits s) {
        List<WindowAverage.Window> windows = new ArrayList<>();
        for (Points points : windowsOf(s.separations(), s.first(), s.margin(), 1)) {
            int[] sinks = points.sinks();
            int[] insertions = points.insertions();
            if (sinks.length > 1) {
                windows.add(window(points.words(), member -> {
                    SampledVector ratio = ratios(member, sinks, insertions);
                    return SampledFit.fit(name + ".plateau " + points.words(), ratio, new Plateau(sinks.length), Rules.of(s.covariance()));
                }));
            }
        }
        return windows;
    }

    private List<WindowAverage.Window> summationWindows(Study.SummationFits s) {
        List<WindowAverage.Window> windows = new ArrayList<>();
        for (Points points : windowsOf(s.separations(), s.first(), new Span(s.margin(), s.margin()), 3)) {
            int[] sinks = points.separations().stream().mapToInt(Integer::intValue).toArray();
            windows.add(window(points.words(), member -> SampledFit.fit(name + ".summation " + points.words(),
                summed(member, points.separations(), s.margin()), new Summation(sinks), Rules.of(s.covariance()))));
        }
        return windows;
    }

    private List<WindowAverage.Window> twoStateWindows(Study.TwoStateFits s) {
        List<WindowAverage.Window> windows = new ArrayList<>();
        for (Points points : windowsOf(s.separations(), s.first(), s.margin(), 2)) {
            s.twoPointFirst().stream().forEach(first -> {
                int[] times = IntStream.rangeClosed(first, s.twoPointLast()).toArray();
                int[] sinks = points.sinks();
                int[] insertions = points.insertions();
                String label = points.words() + ", two-point t = " + new Span(first, s.twoPointLast());
                windows.add(window(label, member -> {
                    SampledVector data = correlators.joint(hadron, times, operators(member, sinks), sinks, insertions);
                    return SampledFit.fit(name + ".two-state " + label, data, new TwoStateJoint(times, sinks, insertions, s.excitedElement()), Rules.of(s.covariance()));
                }));
            });
        }
        return windows;
    }

    private WindowAverage.Window window(String label, IntFunction<FitOutcome> fit) {
        return new WindowAverage.Window(label, IntStream.range(0, family.size()).mapToObj(fit).toList(), "g00");
    }

    /** Distinct sets of points with at least {@code fewest} separations, largest set first. */
    private Set<Points> windowsOf(Span allowed, Span first, Span margin, int fewest) {
        Set<Points> distinct = new LinkedHashSet<>();
        first.stream().forEach(from -> margin.stream().forEach(m -> {
            List<Integer> ts = separations.stream().filter(t -> allowed.contains(t) && t >= from && t >= 2 * m).toList();
            if (ts.size() >= fewest) {
                distinct.add(new Points(ts, m));
            }
        }));
        return distinct;
    }

    private List<Observable> operators(int member, int[] sinks) {
        return IntStream.of(sinks).mapToObj(family.get(member)::apply).toList();
    }

    /** R(t, tau) = C3(t, tau)/C2(t) at a list of points. */
    private SampledVector ratios(int member, int[] sinks, int[] insertions) {
        SampledVector both = correlators.joint(hadron, sinks, operators(member, sinks), sinks, insertions);
        int n = sinks.length;
        return both.map(n, (in, out) -> {
            for (int i = 0; i < n; i++) {
                out[i] = in[n + i] / in[i];
            }
        });
    }

    /** S(t) = sum of R(t, tau) over margin &lt;= tau &lt;= t - margin. */
    private SampledVector summed(int member, List<Integer> ts, int margin) {
        int[] sinks = ts.stream().flatMapToInt(t -> IntStream.rangeClosed(margin, t - margin).map(tau -> t)).toArray();
        int[] insertions = ts.stream().flatMapToInt(t -> IntStream.rangeClosed(margin, t - margin)).toArray();
        return ratios(member, sinks, insertions).map(ts.size(), (in, out) -> {
            for (int i = 0, at = 0; i < out.length; i++) {
                out[i] = 0;
                for (int tau = margin; tau <= ts.get(i) - margin; tau++, at++) {
                    out[i] += in[at];
                }
            }
        });
    }

    /** Ratio at one separation, [tau] for tau = 0 .. separation, for plots. */
    public SampledVector ratio(int member, int separation) {
        int[] sinks = IntStream.rangeClosed(0, separation).map(tau -> separation).toArray();
        return ratios(member, sinks, IntStream.rangeClosed(0, separation).toArray());
    }

    /** Summed ratio at the existing separations within a span, for plots; {@link #separationsWithin} gives the abscissas. */
    public SampledVector summedRatio(int member, Span allowed, int margin) {
        return summed(member, separationsWithin(allowed, margin), margin);
    }

    /** Existing separations within a span that leave room for the margin. */
    public List<Integer> separationsWithin(Span allowed, int margin) {
        return separations.stream().filter(t -> allowed.contains(t) && t >= 2 * margin).toList();
    }

    private static String join(List<Integer> values) {
        return String.join(",", values.stream().map(String::valueOf).toList());
    }
}
