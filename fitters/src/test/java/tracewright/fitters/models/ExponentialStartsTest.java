package tracewright.fitters.models;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Random;
import java.util.stream.IntStream;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import tools.jackson.databind.JsonNode;
import tracewright.fitters.ReferenceData;
import tracewright.fitters.leastsquares.FitModel;
import tracewright.fitters.leastsquares.Minima;

@DisplayNameGeneration(ReplaceUnderscores.class)
class ExponentialStartsTest {

    /**
     * Exact sums, rounded to double, see the {@code source} of {@code exponentials.json}; tolerances are looser with each
     * state because rounding of the data moves the energies ever more.
     */
    @ParameterizedTest(name = "{0} states, periodic: {1}")
    @CsvSource({"1,false,1e-9", "2,false,1e-9", "3,false,1e-6", "4,false,1e-3", "1,true,1e-9", "2,true,1e-9", "3,true,1e-6", "4,true,1e-3"})
    void given_exact_sums_when_fitted_without_a_hint_then_the_energies_come_back(int states, boolean periodic, double tolerance) {
        JsonNode c = ReferenceData.read("exponentials").get("cases").get(states - 1);
        double[] y = ReferenceData.doubles(c.get(periodic ? "periodic_T48" : "values"));
        int[] times = periodic ? IntStream.rangeClosed(0, 24).toArray() : ReferenceData.ints(c.get("times"));
        FitModel model = periodic ? new PeriodicExponentials(times, 48, states) : new Exponentials(times, states);
        double[] errors = Arrays.stream(y).map(v -> 1e-3 * v).toArray();
        double[] p = Minima.lowest(model, y, errors).parameters();
        for (int n = 0; n < states; n++) {
            assertEquals(c.get("energies").get(n).asDouble(), Spectrum.energy(p, n), tolerance, "energy " + n);
        }
    }

    /** The pencil alone, exact data: energies good to the cut at 1e-12 of the largest singular value. */
    @ParameterizedTest(name = "periodic: {0}")
    @CsvSource({"false", "true"})
    void given_exact_sums_of_two_states_when_the_pencil_is_solved_then_its_roots_are_the_energies(boolean periodic) {
        JsonNode c = ReferenceData.read("exponentials").get("cases").get(1);
        double[] y = ReferenceData.doubles(c.get(periodic ? "periodic_T48" : "values"));
        int[] times = periodic ? IntStream.rangeClosed(0, 24).toArray() : ReferenceData.ints(c.get("times"));
        double[] roots = MatrixPencil.energies(new SpectralSum(times, periodic ? 48 : SpectralSum.OPEN, 2), 0.45, y, new double[y.length]);
        assertEquals(2, roots.length);
        assertEquals(0.45, roots[0], 1e-7);
        assertEquals(0.8, roots[1], 1e-7);
    }

    /**
     * 250 noisy correlators of two states: the lowest minimum from the model's own starts against the lowest of 25 random starts.
     * At least 99 in 100 must be as low to 1e-6; all 250 were.
     */
    @Test
    void given_noisy_correlators_when_fitted_from_the_own_starts_then_hardly_any_random_start_finds_a_lower_minimum() {
        Random random = new Random(20260511);
        int sets = 250;
        int global = 0;
        int[] times = IntStream.rangeClosed(1, 20).toArray();
        Exponentials model = new Exponentials(times, 2);
        for (int set = 0; set < sets; set++) {
            double[] truth = {0.25 + 0.4 * random.nextDouble(), StrictMath.log(0.2 + 0.5 * random.nextDouble()), 1, 0.2 + random.nextDouble()};
            double[] y = model.values(truth);
            double[] errors = new double[y.length];
            for (int i = 0; i < y.length; i++) {
                errors[i] = 2e-3 * y[i] * StrictMath.exp(0.12 * times[i]);
                y[i] += errors[i] * random.nextGaussian();
            }
            double own = Minima.lowest(model, y, errors).chiSquared();
            double other = Minima.lowest(model, y, errors, randomStarts(random)).chiSquared();
            global += own <= other + 1e-6 ? 1 : 0;
        }
        assertTrue(global >= 0.99 * sets, global + " of " + sets);
    }

    private static List<double[]> randomStarts(Random random) {
        List<double[]> starts = new ArrayList<>();
        for (int n = 0; n < 25; n++) {
            starts.add(new double[] {0.1 + 0.7 * random.nextDouble(), StrictMath.log(0.05) + StrictMath.log(40) * random.nextDouble(),
                2 * random.nextDouble(), 3 * random.nextDouble() - 0.5});
        }
        return starts;
    }

    /**
     * cosh(m (t - T/2)) bends the logarithm of neighbouring times: between 22 and 24 it is ln cosh 0.16 / 2 = 0.0064. Every second
     * time, so that no recursion can find the mass instead.
     */
    @Test
    void given_one_periodic_state_at_every_second_time_when_asked_for_starts_then_the_first_has_its_mass() {
        PeriodicExponentials model = new PeriodicExponentials(new int[] {18, 20, 22, 24}, 48, 1);
        double[] y = model.values(new double[] {0.08, 2});
        double[] errors = Arrays.stream(y).map(v -> 1e-3 * v).toArray();
        assertEquals(0.08, model.starts(y, errors).get(0)[0], 1e-9);
    }
}
