package tracewright.fitters.models;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Arrays;
import java.util.stream.IntStream;
import java.util.stream.Stream;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.MethodSource;
import tracewright.fitters.leastsquares.FitModel;
import tracewright.fitters.leastsquares.Minima;

/** What every model must keep: derivatives, purity, and its own way back to noiseless data. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class FitModelContractTest {

    private record Example(String name, FitModel model, double[] truth) {
        @Override
        public String toString() {
            return name;
        }
    }

    static Stream<Example> examples() {
        int[] times = IntStream.rangeClosed(1, 20).toArray();
        int[] early = IntStream.rangeClosed(0, 24).toArray();
        int[] sinks = {8, 8, 8, 10, 10, 10, 12, 12, 12, 12, 14, 14, 14, 14};
        int[] insertions = {2, 3, 4, 3, 4, 5, 3, 4, 5, 6, 4, 5, 6, 7};
        return Stream.of(
            new Example("plateau", new Plateau(7), new double[] {1.7}),
            new Example("summation", new Summation(new int[] {8, 10, 12, 14}), new double[] {-0.4, 1.3}),
            new Example("linear terms", LinearTerms.of(new double[][] {{1, 2, 4}, {1, 3, 9}, {1, 5, 25}, {1, 7, 49}}), new double[] {0.5, -1, 0.25}),
            new Example("one state", new Exponentials(times, 1), new double[] {0.45, 2e-6}),
            new Example("two states", new Exponentials(times, 2), new double[] {0.45, StrictMath.log(0.35), 1, 0.6}),
            new Example("two states, second amplitude negative", new Exponentials(times, 2), new double[] {0.45, StrictMath.log(0.35), 1, -0.6}),
            new Example("three states", new Exponentials(times, 3), new double[] {0.45, StrictMath.log(0.35), StrictMath.log(0.5), 1, 0.6, 0.5}),
            new Example("one periodic state", new PeriodicExponentials(early, 48, 1), new double[] {0.2, 3}),
            new Example("two periodic states", new PeriodicExponentials(early, 48, 2), new double[] {0.2, StrictMath.log(0.4), 3, 1.5}),
            new Example("joint two states", new TwoStateJoint(times, sinks, insertions), new double[] {0.5, StrictMath.log(0.35), 1e-5, 0.45, 2.03, -0.4, 0.5}),
            new Example("joint two states without b11", new TwoStateJoint(times, sinks, insertions, false),
                new double[] {0.5, StrictMath.log(0.35), 1, 0.45, 2.03, -0.4}));
    }

    /**
     * Central differences with step 6e-6, the cube root of rounding: the values' rounding over the step, 2e-11, and a sixth of the
     * step squared times the third derivative, 6e-12 and more for steep entries. The worst seen is 6e-10; a wrong factor is seen
     * 1e7 times over.
     */
    @ParameterizedTest
    @MethodSource("examples")
    void given_any_model_when_differenced_then_the_jacobian_agrees_to_1e_8(Example e) {
        FitModel m = e.model();
        int q = m.parameters();
        double[] jacobian = new double[m.points() * q];
        m.evaluate(e.truth(), new double[m.points()], jacobian);
        for (int j = 0; j < q; j++) {
            double h = 6e-6 * Math.abs(e.truth()[j]);
            double[] up = e.truth().clone();
            double[] down = e.truth().clone();
            up[j] += h;
            down[j] -= h;
            double[] above = m.values(up);
            double[] below = m.values(down);
            for (int i = 0; i < m.points(); i++) {
                double entry = jacobian[i * q + j];
                // The scale of an entry: the derivative itself, or what the values' rounding can resolve.
                double scale = Math.max(Math.abs(entry), Math.abs(m.values(e.truth())[i] / e.truth()[j]));
                assertEquals(entry, (above[i] - below[i]) / (up[j] - down[j]), 1e-8 * scale, e + ", point " + i + ", " + m.parameterNames().get(j));
            }
        }
    }

    /** Noiseless data, errors a thousandth of each value: parameters to 1e-7 relative, three states to 1e-6. */
    @ParameterizedTest
    @MethodSource("examples")
    void given_noiseless_data_when_fitted_from_its_own_starts_then_the_truth_comes_back(Example e) {
        double[] y = e.model().values(e.truth());
        double[] errors = Arrays.stream(y).map(v -> 1e-3 * Math.abs(v)).toArray();
        double[] found = Minima.lowest(e.model(), y, errors).parameters();
        for (int j = 0; j < found.length; j++) {
            double tolerance = e.name().equals("three states") ? 1e-6 : 1e-7;
            assertEquals(e.truth()[j], found[j], tolerance * Math.abs(e.truth()[j]), e.model().parameterNames().get(j));
        }
        assertTrue(e.model().undetermined(found).isEmpty());
    }

    @ParameterizedTest
    @MethodSource("examples")
    void given_dirty_arrays_when_evaluated_twice_then_every_entry_is_overwritten_with_the_same_bits(Example e) {
        FitModel m = e.model();
        double[] values = new double[m.points()];
        double[] jacobian = new double[m.points() * m.parameters()];
        m.evaluate(e.truth().clone(), values, jacobian);
        double[] dirtyValues = filled(values.length);
        double[] dirtyJacobian = filled(jacobian.length);
        double[] p = e.truth().clone();
        m.evaluate(p, dirtyValues, dirtyJacobian, filled(m.scratch()));
        assertArrayEquals(values, dirtyValues);
        assertArrayEquals(jacobian, dirtyJacobian);
        assertArrayEquals(e.truth(), p, "parameters are read only");
    }

    /** Data without any structure must still give a finite start, since a fit's outcome is the place to say no. */
    @ParameterizedTest
    @MethodSource("examples")
    void given_structureless_data_when_asked_for_starts_then_there_is_at_least_one_and_all_are_finite(Example e) {
        double[] y = new double[e.model().points()];
        double[] errors = new double[y.length];
        for (int i = 0; i < y.length; i++) {
            y[i] = i % 2 == 0 ? 0.3 : -0.2;
            errors[i] = 1;
        }
        assertFalse(e.model().starts(y, errors).isEmpty());
        for (double[] start : e.model().starts(y, errors)) {
            assertEquals(e.model().parameters(), start.length);
            assertTrue(Arrays.stream(start).allMatch(Double::isFinite), Arrays.toString(start));
        }
    }

    private static double[] filled(int n) {
        double[] x = new double[n];
        Arrays.fill(x, Double.NaN);
        return x;
    }
}
