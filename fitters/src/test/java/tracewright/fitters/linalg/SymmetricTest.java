package tracewright.fitters.linalg;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;

@DisplayNameGeneration(ReplaceUnderscores.class)
class SymmetricTest {

    @Test
    void given_a_matrix_by_hand_then_values_descend_and_vectors_belong_to_them() {
        Symmetric e = Symmetric.of(new double[] {2, 1, 1, 2}, 2);
        // By hand: 3 along (1, 1)/sqrt 2 and 1 along (1, -1)/sqrt 2.
        assertArrayEquals(new double[] {3, 1}, e.values(), 1e-15);
        assertEquals(e.vector(0, 0), e.vector(1, 0), 1e-15);
        assertEquals(e.vector(0, 1), -e.vector(1, 1), 1e-15);
        assertEquals(0.5, e.vector(0, 0) * e.vector(0, 0), 1e-15);
    }

    @Test
    void given_any_matrix_when_put_together_again_then_it_is_the_same_and_descends() {
        int n = 30;
        double[] a = CholeskyTest.positive(n, 3);
        Symmetric e = Symmetric.of(a, n);
        assertArrayEquals(a, e.withValues(e.values()), 1e-13 * n);   // n roundings of entries up to about n
        for (int k = 1; k < n; k++) {
            assertTrue(e.value(k) <= e.value(k - 1));
        }
    }

    @Test
    void given_one_wrong_half_then_the_symmetric_part_is_taken() {
        assertArrayEquals(new double[] {3, 1}, Symmetric.of(new double[] {2, 2, 0, 2}, 2).values(), 1e-15);
    }

    @Test
    void given_a_nan_then_the_entry_is_named() {
        String message = assertThrows(IllegalArgumentException.class, () -> Symmetric.of(new double[] {1, 0, Double.NaN, 1}, 2)).getMessage();
        assertTrue(message.contains("entry 1, 0") && message.contains("NaN"), message);
    }
}
