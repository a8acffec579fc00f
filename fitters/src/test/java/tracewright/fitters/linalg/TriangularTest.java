package tracewright.fitters.linalg;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;

import java.util.Random;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;

@DisplayNameGeneration(ReplaceUnderscores.class)
class TriangularTest {

    private static final int N = 23;
    /** Lower triangle normal, upper triangle NaN: a product that reads it shows. */
    private static final double[] L = lower();

    private static double[] lower() {
        Random random = new Random(5);
        double[] l = new double[N * N];
        for (int i = 0; i < N; i++) {
            for (int j = 0; j < N; j++) {
                l[i * N + j] = j > i ? Double.NaN : random.nextGaussian() + (i == j ? 5 : 0);
            }
        }
        return l;
    }

    /** Plain sum over k from zero, the order of the fast loops, so that the bits must agree. */
    private static double product(double[] x, int i, int column, int columns) {
        double sum = 0;
        for (int k = 0; k <= i; k++) {
            sum += L[i * N + k] * x[k * columns + column];
        }
        return sum;
    }

    @ParameterizedTest
    @ValueSource(ints = {1, 2, 3, 4, 5, 6, 7, 8, 9, 12, 13, 16, 21})
    void given_any_number_of_columns_when_multiplied_in_place_then_each_entry_is_the_plain_sum(int columns) {
        double[] x = new Random(columns).doubles((long) N * columns, -1, 1).toArray();
        double[] y = x.clone();
        Triangular.multiply(L, N, y, columns);
        for (int i = 0; i < N; i++) {
            for (int c = 0; c < columns; c++) {
                assertEquals(product(x, i, c, columns), y[i * columns + c], "row " + i + " column " + c);
            }
        }
    }

    @Test
    void given_a_vector_when_multiplied_in_place_then_it_agrees_with_one_column() {
        double[] x = new Random(1).doubles(N, -1, 1).toArray();
        double[] y = x.clone();
        double[] z = x.clone();
        Triangular.multiply(L, N, y);
        Triangular.multiply(L, N, z, 1);
        assertArrayEquals(z, y);
        assertEquals(product(x, N - 1, 0, 1), y[N - 1]);
    }

    @Test
    void given_a_triangle_when_inverted_then_the_product_is_one() {
        double[] inverse = Triangular.inverse(L, N);
        double[] product = inverse.clone();
        Triangular.multiply(L, N, product, N);
        for (int i = 0; i < N; i++) {
            for (int j = 0; j < N; j++) {
                assertEquals(i == j ? 1 : 0, product[i * N + j], 1e-12);   // N roundings of entries that grow to about 1e2
            }
        }
    }

    @Test
    void given_a_triangle_by_hand_then_its_two_squares_are_those_by_hand() {
        double[] l = {2, Double.NaN, 1, 3};
        assertArrayEquals(new double[] {4, 2, 2, 10}, Triangular.timesTranspose(l, 2));
        assertArrayEquals(new double[] {5, 3, 3, 9}, Triangular.transposeTimesSelf(l, 2));
    }
}
