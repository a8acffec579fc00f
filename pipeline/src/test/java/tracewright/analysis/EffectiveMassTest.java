package tracewright.analysis;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import java.util.stream.IntStream;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import tracewright.fitters.sampled.BlockLabel;
import tracewright.fitters.sampled.SampleGroup;
import tracewright.fitters.sampled.SampledVector;

@DisplayNameGeneration(ReplaceUnderscores.class)
class EffectiveMassTest {

    private static final int HALF = 16;

    /** Two jackknife samples; the second is the first times {@code factor}. */
    private static SampledVector sampled(double[] central, double factor) {
        SampleGroup group = SampleGroup.jackknife("toy", List.of(new BlockLabel("a", 0), new BlockLabel("a", 1)), new int[] {1, 1});
        double[] samples = new double[2 * central.length];
        for (int i = 0; i < central.length; i++) {
            samples[i] = central[i];
            samples[central.length + i] = factor * central[i];
        }
        return SampledVector.copyOf(group, central, samples);
    }

    private static double[] periodic(double mass) {
        return IntStream.rangeClosed(0, HALF).mapToDouble(t -> StrictMath.exp(-mass * t) + StrictMath.exp(-mass * (2 * HALF - t))).toArray();
    }

    /** ln C(5)/C(6) of C = exp(-0.45 t) (1 + 0.6 exp(-0.3 t)): 0.4810798600951957, computed with mpmath. */
    @Tag("reference")
    @Test
    void given_two_states_then_the_open_effective_mass_is_the_worked_value() {
        double[] c2 = IntStream.rangeClosed(0, 8).mapToDouble(t -> StrictMath.exp(-0.45 * t) * (1 + 0.6 * StrictMath.exp(-0.3 * t))).toArray();
        SampledVector mass = EffectiveMass.open(sampled(c2, 2));
        assertEquals(8, mass.length());
        // A logarithm of order one of a quotient with a few roundings
        assertEquals(0.4810798600951957, mass.central(5), 8 * 0x1p-52);
        // A common factor drops out of every ratio
        assertEquals(mass.central(5), mass.sample(1, 5));
    }

    /**
     * One periodic state: the same mass at every t, up to the middle. A relative rounding of a few eps of the ratio costs
     * eps/(m^2 (d - 1/2)) at a distance d from the middle, where the ratio is 1 + m^2 (d - 1/2): the worst is d = 1 at m = 0.05.
     */
    @Tag("exact")
    @ParameterizedTest
    @ValueSource(doubles = {0.05, 0.15, 0.5, 1.2})
    void given_one_periodic_state_then_its_mass_comes_out_at_every_time(double mass) {
        SampledVector effective = EffectiveMass.periodic(sampled(periodic(mass), 3));
        assertEquals(HALF, effective.length());
        for (int t = 0; t < HALF; t++) {
            double tolerance = 8 * 0x1p-52 * (1 + 1 / (mass * Math.min(1, mass * (HALF - t))));
            assertEquals(mass, effective.central(t), tolerance, "t = " + t);
        }
    }

    /** Where forward exponentials bend down to zero the periodic solution must not: ln cosh(m)/1 at the middle is m^2/2, not m. */
    @Tag("law")
    @Test
    void given_one_periodic_state_then_the_open_effective_mass_falls_below_it_near_the_middle() {
        SampledVector open = EffectiveMass.open(sampled(periodic(0.15), 1));
        assertEquals(StrictMath.log(StrictMath.cosh(0.15)), open.central(HALF - 1), 1e-14);
    }

    @Tag("exact")
    @Test
    void given_a_correlator_that_rises_or_changes_sign_then_there_is_no_effective_mass() {
        double[] c2 = {1, 2, -1, -2};
        SampledVector open = EffectiveMass.open(sampled(c2, 1));
        assertEquals(StrictMath.log(0.5), open.central(0), 0);
        assertTrue(Double.isNaN(open.central(1)));
        SampledVector periodic = EffectiveMass.periodic(sampled(c2, 1));
        for (int t = 0; t < 3; t++) {
            assertTrue(Double.isNaN(periodic.central(t)), "t = " + t);
        }
    }
}
