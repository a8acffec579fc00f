package tracewright.fitters.linalg;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertInstanceOf;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Optional;
import java.util.Random;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;

@DisplayNameGeneration(ReplaceUnderscores.class)
class CholeskyTest {

    /** By hand: L = [[2, 0], [1, 3]]. */
    private static final double[] BY_HAND = {4, 2, 2, 10};

    /** X X^T + 1 with normal X: condition below about 1e3 n. */
    static double[] positive(int n, long seed) {
        Random random = new Random(seed);
        double[] x = random.doubles((long) n * n, -1, 1).toArray();
        double[] a = new double[n * n];
        for (int i = 0; i < n; i++) {
            for (int j = 0; j < n; j++) {
                a[i * n + j] = i == j ? 1 : 0;
                for (int k = 0; k < n; k++) {
                    a[i * n + j] += x[i * n + k] * x[j * n + k];
                }
            }
        }
        return a;
    }

    @Test
    void given_a_matrix_factored_by_hand_then_factor_inverse_and_solution_are_those_by_hand() {
        Cholesky c = Cholesky.of(BY_HAND, 2).orElseThrow();
        assertArrayEquals(new double[] {2, 0, 1, 3}, c.lower());
        // L^-1 = [[1/2, 0], [-1/6, 1/3]];  A^-1 = [[10, -2], [-2, 4]]/36;  A (1, 2)^T = (8, 22)^T.  All within two roundings.
        assertArrayEquals(new double[] {0.5, 0, -1.0 / 6, 1.0 / 3}, c.inverseLower(), 1e-15);
        assertArrayEquals(new double[] {10 / 36.0, -2 / 36.0, -2 / 36.0, 4 / 36.0}, c.inverse(), 1e-15);
        assertArrayEquals(new double[] {1, 2}, c.solve(new double[] {8, 22}), 1e-15);
    }

    @Test
    void given_a_matrix_by_hand_then_the_condition_number_is_the_product_of_the_column_norms() {
        // |A| = 12 (second column), |A^-1| = 12/36 (first column).
        assertEquals(4, Cholesky.of(BY_HAND, 2).orElseThrow().condition(), 1e-14);
    }

    @Test
    void given_two_nearly_equal_rows_then_the_condition_number_sees_it() {
        double r = 1 - 1e-8;
        // |A| = 1 + r, |A^-1| = (1 + r)/(1 - r^2) = 1/(1 - r): condition (1 + r)/(1 - r); 1 - r has 8 digits.
        assertEquals((1 + r) / 1e-8, Cholesky.of(new double[] {1, r, r, 1}, 2).orElseThrow().condition(), 1e-7 * 2e8);
    }

    @ParameterizedTest
    @ValueSource(ints = {1, 2, 3, 10, 60})
    void given_any_positive_matrix_then_factor_inverse_and_solution_fit_it(int n) {
        double[] a = positive(n, n);
        Cholesky c = Cholesky.of(a, n).orElseThrow();
        assertEquals(n, c.size());
        // Residuals are a few n roundings of the largest entry, which is below 2 n; the inverse is below one.
        assertArrayEquals(a, Triangular.timesTranspose(c.lower(), n), 1e-15 * n * n);
        double[] inverse = c.inverse();
        double[] unit = new double[n * n];
        double[] x = new double[n];
        double[] ax = new double[n];
        for (int i = 0; i < n; i++) {
            x[i] = i - 0.3;
        }
        for (int i = 0; i < n; i++) {
            for (int j = 0; j < n; j++) {
                ax[i] += a[i * n + j] * x[j];
                for (int k = 0; k < n; k++) {
                    unit[i * n + j] += a[i * n + k] * inverse[k * n + j];
                }
                unit[i * n + j] -= i == j ? 1 : 0;
            }
        }
        assertArrayEquals(new double[n * n], unit, 1e-14 * n);
        assertArrayEquals(x, c.solve(ax), 1e-14 * n * n);
    }

    @Test
    void given_a_third_row_that_is_the_sum_of_the_others_then_the_third_pivot_is_named() {
        double[] a = {1, 0, 1, 0, 1, 1, 1, 1, 2};
        Cholesky.Outcome.NotPositive stopped = assertInstanceOf(Cholesky.Outcome.NotPositive.class, Cholesky.factor(a, 3));
        assertEquals(2, stopped.pivot());
        assertEquals(0, stopped.fraction());
        assertTrue(Cholesky.of(a, 3).isEmpty());
    }

    @Test
    void given_matrices_of_one_rank_too_few_then_rounding_does_not_pass_for_a_pivot() {
        int n = 8;
        int found = 0;
        for (int seed = 0; seed < 200; seed++) {
            double[] x = new Random(seed).doubles((long) n * (n - 1), -1, 1).toArray();
            double[] a = new double[n * n];
            for (int i = 0; i < n * n; i++) {
                for (int k = 0; k < n - 1; k++) {
                    a[i] += x[i / n * (n - 1) + k] * x[i % n * (n - 1) + k];
                }
            }
            Optional<Cholesky> c = Cholesky.of(a, n);
            found += c.isEmpty() ? 1 : 0;
            // Where the minors amplify the rounding beyond n 2^-52, the condition number tells.
            assertTrue(c.isEmpty() || c.get().condition() > 1e12);
        }
        // The sign of the rounding alone would find half of them, 100 +- 7; measured 176.
        assertTrue(found > 150, found + " of 200 found by their pivot");
    }

    @Test
    void given_an_indefinite_matrix_or_a_nan_then_there_is_no_factor() {
        Cholesky.Outcome.NotPositive stopped = assertInstanceOf(Cholesky.Outcome.NotPositive.class, Cholesky.factor(new double[] {1, 2, 2, 1}, 2));
        assertEquals(1, stopped.pivot());
        assertEquals(-3, stopped.fraction());   // 1 - 2^2
        assertTrue(Cholesky.of(new double[] {1, Double.NaN, Double.NaN, 1}, 2).isEmpty());
        assertTrue(Cholesky.of(new double[] {0}, 1).isEmpty());
    }

    @Test
    void given_entries_of_very_different_size_then_only_their_correlation_decides() {
        double[] a = {1e-20, 0.5, 0.5, 1e20};
        assertTrue(Cholesky.of(a, 2).isPresent());
    }
}
