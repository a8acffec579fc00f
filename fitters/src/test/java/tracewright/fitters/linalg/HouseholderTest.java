package tracewright.fitters.linalg;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;

@DisplayNameGeneration(ReplaceUnderscores.class)
class HouseholderTest {

    @Test
    void given_four_points_off_a_line_then_intercept_and_slope_are_those_by_hand() {
        double[] a = {1, 0, 1, 1, 1, 2, 1, 3};
        double[] x = new double[2];
        // y = 1, 2, 2, 4: means 1.5 and 2.25, sxy = 4.5, sxx = 5, slope 0.9, intercept 0.9.
        assertTrue(Householder.solve(a, new double[] {1, 2, 2, 4}, x, 4, 2));
        assertArrayEquals(new double[] {0.9, 0.9}, x, 1e-14);
    }

    @Test
    void given_columns_of_very_different_size_then_the_solution_keeps_its_digits() {
        double[] a = {1e-150, 0, 1e-150, 1e120, 1e-150, 2e120};
        double[] x = new double[2];
        assertTrue(Householder.solve(a, new double[] {3, 5, 7}, x, 3, 2));
        assertArrayEquals(new double[] {1, 1}, new double[] {x[0] / 3e150, x[1] / 2e-120}, 1e-14);
    }

    @Test
    void given_a_column_that_repeats_another_or_vanishes_then_there_is_no_solution() {
        assertFalse(Householder.solve(new double[] {1, 2, 2, 4, 3, 6}, new double[] {1, 2, 3}, new double[2], 3, 2));
        assertFalse(Householder.solve(new double[] {1, 0, 2, 0, 3, 0}, new double[] {1, 2, 3}, new double[2], 3, 2));
    }
}
