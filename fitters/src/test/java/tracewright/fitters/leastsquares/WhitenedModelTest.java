package tracewright.fitters.leastsquares;

import static org.junit.jupiter.api.Assertions.assertEquals;

import java.util.Random;
import java.util.stream.IntStream;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import tracewright.fitters.models.Exponentials;

@DisplayNameGeneration(ReplaceUnderscores.class)
class WhitenedModelTest {

    private static final int N = 12;
    private static final double[] P = {0.5, -0.9, 1.1, 0.7};

    /** Two routes to one number: the gradient through the transposed weight, and half the derivative of the sum of squares. */
    @Test
    void given_a_correlated_weight_when_the_gradient_is_taken_then_it_is_half_the_slope_of_the_sum_of_squares() {
        WhitenedModel whitened = whitened();
        double[] gradient = new double[4];
        whitened.gradient(P, gradient);
        double[] unused = new double[4];
        for (int j = 0; j < 4; j++) {
            double h = 6e-6 * Math.abs(P[j]);
            double[] up = P.clone();
            double[] down = P.clone();
            up[j] += h;
            down[j] -= h;
            double slope = (whitened.gradient(up, unused) - whitened.gradient(down, unused)) / (up[j] - down[j]);
            // Central differences: 1e-8 relative, as for the models.
            assertEquals(0.5 * slope, gradient[j], 1e-8 * Math.abs(gradient[j]), "parameter " + j);
        }
    }

    /** Linv J by the definition; 1 to 9 columns, so that both column loops are met, whose last digit may differ. */
    @ParameterizedTest
    @ValueSource(ints = {1, 3, 4, 5, 8, 9})
    void given_any_number_of_columns_when_whitened_then_the_product_is_that_of_the_definition(int q) {
        Random random = new Random(q);
        double[] linv = linv();
        double[] j = random.doubles((long) N * q).toArray();
        double[] found = j.clone();
        WhiteningKernels.matrix(linv, found, N, q);
        for (int i = 0; i < N; i++) {
            for (int c = 0; c < q; c++) {
                double sum = 0;
                for (int k = 0; k <= i; k++) {
                    sum += linv[i * N + k] * j[k * q + c];
                }
                assertEquals(sum, found[i * q + c], 1e-13);
            }
        }
    }

    private static WhitenedModel whitened() {
        Exponentials model = new Exponentials(IntStream.rangeClosed(1, N).toArray(), 2);
        WhitenedModel whitened = new WhitenedModel(model, linv());
        double[] y = model.values(new double[] {0.52, -0.8, 1, 0.8});
        whitened.data(y);
        return whitened;
    }

    private static double[] linv() {
        Random random = new Random(31);
        double[] linv = new double[N * N];
        for (int i = 0; i < N; i++) {
            for (int k = 0; k <= i; k++) {
                linv[i * N + k] = i == k ? 1 : random.nextDouble() - 0.5;
            }
        }
        return linv;
    }
}
