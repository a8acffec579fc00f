package tracewright.renormalization;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import tracewright.fitters.leastsquares.TermsFit;
import tracewright.fitters.sampled.SampleGroup;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.study.InputException;
import tracewright.study.Problem;
import tracewright.study.Study;

/**
 * The gluon part &lt;(beta/2g) F^2&gt; of the trace in MeV from flowed action densities.
 * <pre>
 *  (beta/2g) F^2 = (2 beta(g)/g^3) {G^2/4},   {G^2/4} = [1 + O(g^2)] E(t) + O(t)     (small flow time)
 *  one loop:  2 beta(g)/g^3 = -2 b0
 * </pre>
 * Small-flow-time expansion: H. Suzuki, PTEP 2013 083B03, arXiv:1304.0533; Makino, Suzuki, PTEP 2014 063B02,
 * arXiv:1403.4772. At this order the coefficient does not depend on the coupling; quark operators mix in at the next.
 *
 * @param part          the contribution with its route
 * @param extrapolation flow time to zero in MeV (absent where one flow time and a given factor were used)
 */
public record GluonPart(Renormalized part, Optional<FlowLimit> extrapolation) {

    /**
     * Relative size of the next order over the one-loop coefficient in the pure gauge theory, per g^2/(16 pi^2):
     * 2 b0 s2 g^2 with s2 = 27/484, b0 = 11/(16 pi^2); arXiv:1304.0533.
     */
    private static final double NEXT_ORDER_PURE_GAUGE = 27.0 / 22.0;

    /** a&lt;E&gt; of one hadron at one flow time, lattice units; flow time in units of a^2. */
    public record FlowedElement(double flowTime, SampledNumber element) {
    }

    /**
     * Linear fit in the flow time of coefficient times element.
     *
     * @param points coefficient times element in MeV at the flow times that entered
     * @param slope  in MeV per unit of t/a^2
     */
    public record FlowLimit(List<FlowedElement> points, SampledNumber atZero, SampledNumber slope, double chiSquared, int degreesOfFreedom, double pValue) {
    }

    /**
     * @param elements   every measured flow time
     * @param mevPerUnit hbar c / a in MeV
     * @param name       {@code <ensemble>.<hadron>}, for messages
     */
    public static GluonPart of(Study.Renormalization settings, List<FlowedElement> elements, SampledNumber mevPerUnit, String name) {
        if (settings.gluon() instanceof Study.GluonRoute.Flow flow) {
            return flow(settings, flow, elements, mevPerUnit, name);
        }
        if (settings.gluon() instanceof Study.GluonRoute.GivenFactor given) {
            return givenFactor(settings, given, elements, mevPerUnit, name);
        }
        throw new IllegalStateException("no gluon part by route " + settings.gluon());
    }

    private static GluonPart flow(Study.Renormalization settings, Study.GluonRoute.Flow flow, List<FlowedElement> elements, SampledNumber mevPerUnit, String name) {
        double coefficient = -2 * new BetaFunction(settings.flavors()).b0();
        List<FlowedElement> points = elements.stream()
            .filter(e -> flow.window().first() <= e.flowTime() && e.flowTime() <= flow.window().last())
            .map(e -> new FlowedElement(e.flowTime(), e.element().times(mevPerUnit).times(coefficient))).toList();
        if (points.size() < 2) {
            throw usage("the flow window " + flow.window().first() + ".." + flow.window().last() + " of " + name + " holds " + points.size()
                + " of the measured flow times " + elements.stream().map(FlowedElement::flowTime).toList() + "; a line needs two or more");
        }
        FlowLimit limit = limit(points, name);
        SampledNumber value = flow.truncationAlphaS().isPresent() ? withTruncation(limit.atZero(), flow.truncationAlphaS().get().value().value())
            : limit.atZero();
        Renormalized part = new Renormalized(value, "flow (one-loop small-flow-time coefficient)", Optional.of(settings.scheme()), Optional.of(settings.scaleGev()));
        return new GluonPart(part, Optional.of(limit));
    }

    private static FlowLimit limit(List<FlowedElement> points, String name) {
        List<SampledNumber> y = points.stream().map(FlowedElement::element).toList();
        List<List<SampledNumber>> design = new ArrayList<>();
        for (FlowedElement p : points) {
            design.add(List.of(SampledNumber.exact(1), SampledNumber.exact(p.flowTime())));
        }
        TermsFit fit = line(name + ".flow-limit", y, design);
        return new FlowLimit(points, fit.parameters().get(0), fit.parameters().get(1), fit.chiSquared(), fit.degreesOfFreedom(), fit.pValue());
    }

    private static TermsFit line(String name, List<SampledNumber> y, List<List<SampledNumber>> design) {
        try {
            return TermsFit.of(name, y, design);
        } catch (IllegalArgumentException e) {
            throw new InputException(InputException.Cause.REQUIREMENT, List.of(new Problem("no line in the flow time: " + e.getMessage(),
                "renormalization.gluon.window", "let fewer flow times enter, or give more configurations or shorter blocks")));
        }
    }

    /** Next order as one variation, x = alpha_s/(4 pi). */
    private static SampledNumber withTruncation(SampledNumber value, double alphaS) {
        double relative = NEXT_ORDER_PURE_GAUGE * alphaS / (4 * Math.PI);
        return value.withGroup(SampleGroup.variation("flow-truncation"), new double[] {value.central() * (1 - relative)});
    }

    private static GluonPart givenFactor(Study.Renormalization settings, Study.GluonRoute.GivenFactor given, List<FlowedElement> elements,
            SampledNumber mevPerUnit, String name) {
        FlowedElement at = elements.stream().filter(e -> e.flowTime() == given.flowTime()).findFirst().orElseThrow(() -> usage(String.format(Locale.ROOT,
            "the given factor of %s is for flow time %s, measured are %s", name, given.flowTime(), elements.stream().map(FlowedElement::flowTime).toList())));
        SampledNumber factor = SampledNumber.input(given.factor().name(), given.factor().value().value(), given.factor().value().error());
        SampledNumber value = SampledNumber.evaluate(v -> v[0] * v[1] * v[2], factor, at.element(), mevPerUnit);
        return new GluonPart(new Renormalized(value, "given factor at flow time " + given.flowTime(), Optional.of(settings.scheme()),
            Optional.of(settings.scaleGev())), Optional.empty());
    }

    private static InputException usage(String what) {
        return new InputException(InputException.Cause.USAGE, List.of(new Problem(what, "renormalization.gluon", "choose among the measured flow times")));
    }
}
