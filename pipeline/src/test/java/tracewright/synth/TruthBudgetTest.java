package tracewright.synth;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import java.util.Map;
import java.util.function.ToDoubleFunction;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;

@DisplayNameGeneration(ReplaceUnderscores.class)
class TruthBudgetTest {

    private static final Truth TRUTH = InventedTheory.truth();
    private static final TruthBudget OAK = TruthBudget.of(TRUTH.theory(), TRUTH.ensemble("oak"), "nucleon");
    /** A handful of roundings of numbers of order one. */
    private static final double ROUNDING = 2e-15;

    @Test
    void given_the_invented_nucleon_when_its_budget_is_made_then_each_term_is_the_one_computed_by_hand() {
        // a^2 = 0.113^2 = 0.012769, Mpi^2 = 0.09.
        assertEquals(0.89 + 0.171 + 0.0191535, OAK.massGev(), ROUNDING);
        assertEquals(0.171 + 0.0114921, OAK.sigmaLightGev(), ROUNDING);
        assertEquals(0.043 + 0.0045 - 0.0038307, OAK.sigmaStrangeGev(), ROUNDING);
        assertEquals(1.0801535 - 0.1824921 - 0.0436693, OAK.anomalyGev(), ROUNDING);
        assertEquals(0.8539921 - 0.28 * 0.2261614, OAK.gluonGev(), ROUNDING);
        assertEquals(0, OAK.closureGev());
    }

    @Test
    void given_lattice_units_when_the_terms_are_put_together_again_then_they_sum_to_the_mass() {
        TruthBudget.Lattice lattice = OAK.lattice(TRUTH.theory());
        double light = lattice.lightQuarkMass() * (lattice.lightConnected() + lattice.lightDisconnected());
        double strange = lattice.strangeQuarkMass() * lattice.strange();
        double gluon = -2 * (11 - 2) / (16 * Math.PI * Math.PI) * lattice.density();     // -2 b0 E with three flavours
        assertTrue(lattice.density() < 0, "the action density is depleted inside a hadron");
        assertEquals(lattice.mass(), gluon + (1 + 0.28) * (light + strange), ROUNDING);
    }

    @Test
    void given_a_flow_slope_when_the_flowed_elements_are_extrapolated_to_zero_then_the_unflowed_one_comes_out() {
        TruthBudget.Lattice lattice = OAK.lattice(TRUTH.theory());
        double straight = 2 * lattice.flowedDensity().get(1.0) - lattice.flowedDensity().get(2.0);
        assertEquals(lattice.density(), straight, 10 * ROUNDING);                        // numbers of order four
        assertEquals(lattice.density() * (1 - 0.04 * 3), lattice.flowedDensity().get(3.0), 10 * ROUNDING);
    }

    @Test
    void given_no_spacing_when_the_pion_mass_is_varied_then_sigma_light_obeys_feynman_hellmann() {
        double h = 1e-3;
        double up = physical(0.135 + h).massGev();
        double down = physical(0.135 - h).massGev();
        // Mpi^2 is proportional to m, so m dM/dm = (Mpi/2) dM/dMpi; the central difference of a parabola is exact.
        assertEquals(physical(0.135).sigmaLightGev(), 0.135 / 2 * (up - down) / (2 * h), 1e-13);    // rounding eps/h
    }

    @ParameterizedTest
    @ValueSource(strings = {"mass", "sigma.light", "sigma.strange", "anomaly", "gluon"})
    void given_three_ensembles_when_extrapolated_in_a2_and_mpi2_then_the_physical_value_is_exact(String term) {
        ToDoubleFunction<TruthBudget> value = switch (term) {
            case "mass" -> TruthBudget::massGev;
            case "sigma.light" -> TruthBudget::sigmaLightGev;
            case "sigma.strange" -> TruthBudget::sigmaStrangeGev;
            case "anomaly" -> TruthBudget::anomalyGev;
            default -> TruthBudget::gluonGev;
        };
        double coarse = value.applyAsDouble(at(0.113, 0.30));
        double light = value.applyAsDouble(at(0.113, 0.22));
        double fine = value.applyAsDouble(at(0.086, 0.30));
        double perMpi2 = (coarse - light) / (0.09 - 0.0484);
        double perFm2 = (coarse - fine) / (0.012769 - 0.007396);
        double physical = coarse - perFm2 * 0.012769 + perMpi2 * (0.135 * 0.135 - 0.09);
        // Differences of eps are amplified by 0.0128/0.0054 and 0.072/0.042.
        assertEquals(value.applyAsDouble(TruthBudget.physical(TRUTH.theory(), "nucleon")), physical, 10 * ROUNDING);
    }

    @Test
    void given_a_closure_defect_when_the_budget_is_made_then_mass_minus_terms_is_that_defect() {
        Truth.Baryon n = InventedTheory.nucleon();
        Truth.Baryon open = new Truth.Baryon(n.mass(), n.sigmaLightPerFm2(), n.sigmaStrange(), 0.05, n.connectedFraction(), n.amplitude(), n.excited(),
            n.connected(), n.loops(), n.gluon());
        TruthBudget budget = TruthBudget.physical(TRUTH.theory().withBaryons(Map.of("nucleon", open)), "nucleon");
        assertEquals(0.05, budget.massGev() - budget.anomalyGev() - budget.sigmaLightGev() - budget.sigmaStrangeGev(), ROUNDING);
    }

    @Test
    void given_a_truth_when_all_budgets_are_asked_for_then_ensembles_come_first_and_the_physical_point_last() {
        List<String> where = TruthBudget.all(TRUTH).stream().map(b -> b.ensemble() + "." + b.hadron()).toList();
        assertEquals(List.of("oak.nucleon", "physical.nucleon"), where);
    }

    private static TruthBudget at(double spacingFm, double pionGev) {
        Truth.Ensemble e = InventedTheory.ensemble();
        return TruthBudget.of(TRUTH.theory(), new Truth.Ensemble("other", e.layout(), e.width(), spacingFm, pionGev, e.timeExtent(), e.spatialExtent(),
            e.streams(), e.tauInt(), e.sources(), e.connectedSources(), e.separations()), "nucleon");
    }

    private static TruthBudget physical(double pionGev) {
        Truth.Theory t = TRUTH.theory();
        return TruthBudget.physical(new Truth.Theory(t.flavors(), t.gammaM(), pionGev, t.condensateGev(), t.strangeMassGev(), t.flowSlope(), t.pion(),
            t.baryons(), t.operators(), t.noise()), "nucleon");
    }
}
