package tracewright.budget;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.TreeMap;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.api.Test;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.study.Flavor;

@DisplayNameGeneration(ReplaceUnderscores.class)
class TraceBudgetTest {

    /** Sums of a few numbers below 1024: a handful of roundings of that. */
    private static final double ROUNDING = 8 * 0x1p-43;

    /** The same for variances below 1024^2. */
    private static final double ROUNDING_SQUARED = 64 * 0x1p-33;

    private static final SampledNumber MASS = SampledNumber.input("mass", 940, 4);
    private static final SampledNumber GLUON = SampledNumber.input("gluon", 820, 20);
    private static final SampledNumber GAMMA_M = SampledNumber.input("gamma_m", 0.25, 0.125);
    private static final Map<Flavor, SampledNumber> SIGMAS = sigmas(SampledNumber.input("light", 40, 2), SampledNumber.input("strange", 48, 8));

    private static Map<Flavor, SampledNumber> sigmas(SampledNumber light, SampledNumber strange) {
        return new TreeMap<>(Map.of(Flavor.LIGHT, light, Flavor.STRANGE, strange));
    }

    private static Decomposition invariant() {
        return TraceBudget.invariant(MASS, TraceBudget.anomaly(GLUON, SIGMAS, GAMMA_M), SIGMAS);
    }

    private static Decomposition schemeDependent() {
        return TraceBudget.schemeDependent(MASS, GLUON, SIGMAS, GAMMA_M, "MSbar", 2);
    }

    private static SampledNumber term(Decomposition d, String id) {
        return d.terms().stream().filter(t -> t.id().equals(id)).findFirst().orElseThrow().value();
    }

    @Tag("exact")
    @Test
    void given_gluon_part_sigmas_and_gamma_m_then_the_anomaly_is_their_combination_with_all_errors() {
        SampledNumber anomaly = TraceBudget.anomaly(GLUON, SIGMAS, GAMMA_M);
        // By hand: 820 + 0.25 (40 + 48) = 842; errors 20, 0.25 * 2, 0.25 * 8, 0.125 * 88
        assertEquals(842, anomaly.central(), ROUNDING);
        assertEquals(400, anomaly.varianceByGroup().get("input:gluon"), ROUNDING_SQUARED);
        assertEquals(0.25, anomaly.varianceByGroup().get("input:light"), ROUNDING_SQUARED);
        assertEquals(4, anomaly.varianceByGroup().get("input:strange"), ROUNDING_SQUARED);
        assertEquals(121, anomaly.varianceByGroup().get("input:gamma_m"), ROUNDING_SQUARED);
    }

    @Tag("exact")
    @Test
    void given_the_invariant_form_then_its_terms_are_the_anomaly_and_the_bare_sigma_terms() {
        Decomposition trace = invariant();
        assertEquals("trace", trace.name());
        assertEquals(Optional.empty(), trace.scheme());
        assertEquals(Optional.empty(), trace.scaleGev());
        assertEquals(List.of("anomaly", "sigma.light", "sigma.strange"), trace.terms().stream().map(Decomposition.Term::id).toList());
        assertEquals(40, term(trace, "sigma.light").central());
        assertEquals(48, term(trace, "sigma.strange").central());
        // By hand: 842 + 40 + 48 = 930, ten short of 940
        assertEquals(930, trace.total().central(), ROUNDING);
        assertEquals(10, trace.closure().central(), ROUNDING);
    }

    @Tag("exact")
    @Test
    void given_the_scheme_dependent_form_then_quark_terms_grow_by_one_plus_gamma_m() {
        Decomposition scheme = schemeDependent();
        assertEquals("trace-scheme", scheme.name());
        assertEquals(Optional.of("MSbar"), scheme.scheme());
        assertEquals(Optional.of(2.0), scheme.scaleGev());
        assertEquals(List.of("gluon", "quark.light", "quark.strange"), scheme.terms().stream().map(Decomposition.Term::id).toList());
        // By hand: 1.25 * 40 and 1.25 * 48
        assertEquals(50, term(scheme, "quark.light").central(), ROUNDING);
        assertEquals(60, term(scheme, "quark.strange").central(), ROUNDING);
        assertEquals(820, term(scheme, "gluon").central());
    }

    /** (beta/2g) F^2 + sum (1 + gamma_m) sigma is one operator however it is cut: the same number in every sample. */
    @Tag("law")
    @Test
    void given_both_forms_then_total_and_closure_agree_in_every_sample() {
        SampledNumber difference = invariant().total().minus(schemeDependent().total());
        assertEquals(0, difference.central(), ROUNDING);
        difference.groups().forEach(g -> {
            for (double sample : difference.samples(g.key())) {
                assertEquals(0, sample, ROUNDING, g.key());
            }
        });
        assertEquals(invariant().closure().error(), schemeDependent().closure().error(), ROUNDING);
    }

    /** Moving the scale moves gamma_m sigma between the terms: what the gluon part loses the quark part gains, and the anomaly stays. */
    @Tag("law")
    @Test
    void given_another_scale_then_the_invariant_terms_stay_while_the_others_trade() {
        SampledNumber gammaLater = SampledNumber.exact(0.125);
        SampledNumber gluonLater = SampledNumber.exact(820 + 0.125 * 88);
        Decomposition later = TraceBudget.schemeDependent(MASS, gluonLater, SIGMAS, gammaLater, "MSbar", 4);
        assertEquals(842, TraceBudget.anomaly(gluonLater, SIGMAS, gammaLater).central(), ROUNDING);
        assertEquals(schemeDependent().total().central(), later.total().central(), ROUNDING);
        assertTrue(term(later, "quark.light").central() < term(schemeDependent(), "quark.light").central());
    }

    /**
     * Light 45 MeV, strange 45 MeV, nucleon of 938.918754 MeV: anomaly 848.918754 MeV, 0.9041450608835107 of the mass; the operator
     * identity, computed with mpmath.
     */
    @Tag("reference")
    @Test
    void given_a_budget_that_closes_then_the_anomaly_is_nine_tenths_of_the_nucleon() {
        SampledNumber mass = SampledNumber.exact(938.918754);
        SampledNumber gammaM = SampledNumber.exact(0.28);
        Map<Flavor, SampledNumber> sigmas = sigmas(SampledNumber.exact(45), SampledNumber.exact(45));
        SampledNumber gluon = SampledNumber.exact(938.918754 - 1.28 * 90);
        SampledNumber anomaly = TraceBudget.anomaly(gluon, sigmas, gammaM);
        Decomposition trace = TraceBudget.invariant(mass, anomaly, sigmas);
        assertEquals(848.918754, anomaly.central(), 848.918754e-12);
        assertEquals(0.9041450608835107, trace.fraction(trace.terms().get(0)).central(), 1e-12);
        assertEquals(0, trace.closure().central(), ROUNDING);
    }

    /**
     * Synthetic theory (spacing 0.09 fm, pion of 0.14 GeV, gamma_m = 0.28, beta/2g = -0.117), computed with mpmath: mass, sigma terms,
     * &lt;F^2&gt; and anomaly in MeV. A negative gamma_m, a halved beta/2g or one light flavour in place of two would miss by tens of MeV.
     */
    @Tag("reference")
    @Test
    void given_the_synthetic_theory_then_its_anomaly_and_closure_come_out() {
        SampledNumber gluon = SampledNumber.exact(-0.117 * -7100.58973812716);
        Map<Flavor, SampledNumber> sigmas = sigmas(SampledNumber.exact(56.23675005715959), SampledNumber.exact(44.06389494084908));
        SampledNumber anomaly = TraceBudget.anomaly(gluon, sigmas, SampledNumber.exact(0.28));
        assertEquals(858.8531799603201, anomaly.central(), 858.8531799603201e-12);
        assertEquals(0, TraceBudget.invariant(SampledNumber.exact(959.1538249583288), anomaly, sigmas).closure().central(), 959e-12);
    }

    @Tag("exact")
    @Test
    void given_shared_causes_then_fraction_and_closure_keep_their_correlations() {
        SampledNumber spacing = SampledNumber.input("spacing", 1, 0.125);
        Map<Flavor, SampledNumber> none = Map.of();
        Decomposition all = TraceBudget.invariant(spacing.times(940), TraceBudget.anomaly(spacing.times(940), none, GAMMA_M), none);
        // The spacing is common to mass and anomaly: it drops out of their ratio and their difference.
        assertEquals(1, all.fraction(all.terms().get(0)).central(), 0x1p-50);
        assertEquals(0, all.fraction(all.terms().get(0)).error(), 0x1p-50);
        assertEquals(0, all.closure().error(), ROUNDING);
    }
}
