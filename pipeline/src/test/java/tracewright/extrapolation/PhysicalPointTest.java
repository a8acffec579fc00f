package tracewright.extrapolation;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.ArrayList;
import java.util.List;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.api.Test;
import tracewright.extrapolation.PhysicalPoint.Entry;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.study.InputException;
import tracewright.study.Study.Extrapolation.Term;

@DisplayNameGeneration(ReplaceUnderscores.class)
class PhysicalPointTest {

    private static final List<Term> BOTH = List.of(Term.SPACING_SQUARED, Term.PION_MASS_SQUARED);
    private static final SampledNumber PHYSICAL = SampledNumber.exact(135);
    private static final double[][] ABSCISSAS = {{0.12, 300}, {0.12, 140}, {0.09, 310}, {0.06, 310}, {0.06, 135}};

    /** O = constant + 500 a^2 + 2000 (Mpi^2 - 0.135^2), in fm and GeV, with an error of its own of 1 MeV. */
    private static List<Entry> onThePlane(double constant, double perSpacing, double perPion) {
        List<Entry> entries = new ArrayList<>();
        for (int i = 0; i < ABSCISSAS.length; i++) {
            double a = ABSCISSAS[i][0];
            double pion = ABSCISSAS[i][1] * 1e-3;
            double value = constant + perSpacing * a * a + perPion * (pion * pion - 0.135 * 0.135);
            entries.add(entry(i, SampledNumber.input("value_" + i, value, 1)));
        }
        return entries;
    }

    private static Entry entry(int i, SampledNumber value) {
        return new Entry("e" + i, SampledNumber.exact(ABSCISSAS[i][0]), SampledNumber.exact(ABSCISSAS[i][1]), value);
    }

    private static PhysicalPoint fit(List<Entry> entries, List<Term> terms) {
        return PhysicalPoint.of("physical.nucleon.mass", entries, terms, PHYSICAL);
    }

    /** Abscissas of order 1e-2 make the coefficients a hundred times less certain than the data's rounding of 1e3. */
    @Tag("exact")
    @Test
    void given_data_on_the_plane_then_value_and_coefficients_come_back() {
        PhysicalPoint point = fit(onThePlane(940, 500, 2000), BOTH);
        assertEquals(940, point.value().central(), 1e-10);
        assertEquals(500, point.coefficients().get(0).central(), 1e-8);
        assertEquals(2000, point.coefficients().get(1).central(), 1e-8);
        assertEquals(2, point.degreesOfFreedom());
        assertEquals(0, point.chiSquared(), 1e-18);
    }

    @Tag("exact")
    @Test
    void given_the_terms_in_the_other_order_then_the_coefficients_follow() {
        PhysicalPoint point = fit(onThePlane(940, 500, 2000), List.of(Term.PION_MASS_SQUARED, Term.SPACING_SQUARED));
        assertEquals(2000, point.coefficients().get(0).central(), 1e-8);
        assertEquals(500, point.coefficients().get(1).central(), 1e-8);
    }

    @Tag("exact")
    @Test
    void given_a_quantity_that_depends_on_nothing_then_the_coefficients_vanish() {
        PhysicalPoint point = fit(onThePlane(45, 0, 0), BOTH);
        assertEquals(45, point.value().central(), 1e-11);
        assertEquals(0, point.coefficients().get(0).central(), 1e-9);
        assertEquals(0, point.coefficients().get(1).central(), 1e-9);
    }

    @Tag("exact")
    @Test
    void given_no_term_and_equal_errors_then_the_value_is_the_mean_with_its_error() {
        List<Entry> entries = List.of(entry(0, SampledNumber.input("x", 1, 2)), entry(1, SampledNumber.input("y", 3, 2)));
        PhysicalPoint point = fit(entries, List.of());
        // Mean 2, error 2/sqrt(2); chi-squared 2 (1/2)^2
        assertEquals(2, point.value().central(), 1e-14);
        assertEquals(Math.sqrt(2), point.value().error(), 1e-14);
        assertEquals(0.5, point.chiSquared(), 1e-14);
        assertEquals(1, point.degreesOfFreedom());
    }

    @Tag("exact")
    @Test
    void given_as_many_ensembles_as_coefficients_then_the_solution_is_exact() {
        PhysicalPoint point = fit(onThePlane(940, 500, 2000).subList(1, 4), BOTH);
        assertEquals(940, point.value().central(), 1e-9);
        assertEquals(0, point.degreesOfFreedom());
        assertEquals(1, point.pValue());
    }

    /** Two ensembles and a^2 alone, by hand: O_0 = (y1 x2 - y2 x1)/(x2 - x1) with x = 0.0144 and 0.0036, weights 4/3 and -1/3. */
    @Tag("exact")
    @Test
    void given_a_spacing_shared_by_all_then_its_error_enters_by_all_at_once() {
        SampledNumber scale = SampledNumber.input("scale", 1, 0.01);
        List<Entry> entries = List.of(
            new Entry("fine", scale.times(0.06), PHYSICAL, SampledNumber.input("fine", 910, 3)),
            new Entry("coarse", scale.times(0.12), PHYSICAL, SampledNumber.input("coarse", 940, 3)));
        PhysicalPoint point = fit(entries, List.of(Term.SPACING_SQUARED));
        assertEquals(900, point.value().central(), 1e-10);
        assertEquals(9 * (16.0 / 9 + 1.0 / 9), point.value().variance(), 1e-10);
        // A common factor on a^2 stretches the line and leaves the intercept: the slope of 30/0.0108 moves by 2 %
        assertEquals(0, point.value().varianceByGroup().getOrDefault("input:scale", 0.0), 1e-16);
        double slope = 30 / 0.0108;
        assertEquals(slope, point.coefficients().get(0).central(), 1e-9);
        assertEquals(0.02 * slope, Math.sqrt(point.coefficients().get(0).varianceByGroup().get("input:scale")), 1e-3 * 0.02 * slope);
    }

    @Tag("exact")
    @Test
    void given_an_error_of_the_physical_pion_mass_then_the_value_carries_it_by_the_slope() {
        PhysicalPoint point = PhysicalPoint.of("m", onThePlane(940, 500, 2000), BOTH, SampledNumber.input("pion", 135, 0.5));
        // dO/dMpi = 2000 * 2 * 0.135 per GeV: 540 * 0.0005 = 0.27 MeV, linear to 1e-2 or better (0.5/135)
        assertEquals(0.27, Math.sqrt(point.value().varianceByGroup().get("input:pion")), 0.27e-2);
    }

    @Tag("exact")
    @Test
    void given_data_on_the_plane_when_moved_along_the_other_term_then_they_lie_on_the_line_of_the_shown_one() {
        List<Entry> entries = onThePlane(940, 500, 2000);
        PhysicalPoint point = fit(entries, BOTH);
        for (Entry e : entries) {
            double a2 = PhysicalPoint.abscissa(Term.SPACING_SQUARED, e, PHYSICAL).central();
            double mpi2 = PhysicalPoint.abscissa(Term.PION_MASS_SQUARED, e, PHYSICAL).central();
            assertEquals(940 + 500 * a2, point.alongLine(e, Term.SPACING_SQUARED, PHYSICAL).central(), 1e-9);
            assertEquals(940 + 2000 * mpi2, point.alongLine(e, Term.PION_MASS_SQUARED, PHYSICAL).central(), 1e-9);
        }
    }

    @Tag("exact")
    @Test
    void given_an_ensemble_then_its_abscissas_are_in_fermi_and_giga_electron_volts_squared() {
        Entry e = entry(0, SampledNumber.exact(0));
        assertEquals(0.0144, PhysicalPoint.abscissa(Term.SPACING_SQUARED, e, PHYSICAL).central(), 1e-17);
        // 0.3^2 - 0.135^2
        assertEquals(0.071775, PhysicalPoint.abscissa(Term.PION_MASS_SQUARED, e, PHYSICAL).central(), 1e-16);
    }

    /** A slope of zero is a slope like any other, also where the abscissas have errors. */
    @Tag("exact")
    @Test
    void given_spacings_with_errors_and_a_quantity_that_depends_on_nothing_then_the_slope_vanishes() {
        List<Entry> entries = new ArrayList<>();
        for (int i = 0; i < ABSCISSAS.length; i++) {
            entries.add(new Entry("e" + i, SampledNumber.input("spacing_" + i, ABSCISSAS[i][0], 0.001), SampledNumber.exact(ABSCISSAS[i][1]),
                SampledNumber.input("value_" + i, 45, 1)));
        }
        PhysicalPoint point = fit(entries, BOTH);
        assertEquals(45, point.value().central(), 1e-11);
        assertEquals(0, point.coefficients().get(0).central(), 1e-9);
    }

    @Tag("message")
    @Test
    void given_fewer_ensembles_than_coefficients_then_the_message_counts_both() {
        InputException e = assertThrows(InputException.class, () -> fit(onThePlane(940, 500, 2000).subList(0, 2), BOTH));
        assertEquals(InputException.Cause.USAGE, e.reason());
        assertTrue(e.getMessage().contains("the fit of physical.nucleon.mass has 3 coefficients and only 2 ensembles"), e.getMessage());
    }

    @Tag("message")
    @Test
    void given_ensembles_of_one_spacing_and_a_term_in_the_spacing_then_it_is_a_problem_of_the_study() {
        List<Entry> all = onThePlane(940, 0, 2000);
        for (List<Entry> one : List.of(all.subList(0, 2), List.of(all.get(3), all.get(4), new Entry("e5", all.get(4).spacingFm(), SampledNumber.exact(200),
            SampledNumber.input("value_5", 950, 1))))) {
            InputException e = assertThrows(InputException.class, () -> fit(one, List.of(Term.SPACING_SQUARED)));
            assertEquals(InputException.Cause.USAGE, e.reason());
            assertTrue(e.getMessage().contains("physical.nucleon.mass") && e.getMessage().contains("extrapolation.terms"), e.getMessage());
        }
    }
}
