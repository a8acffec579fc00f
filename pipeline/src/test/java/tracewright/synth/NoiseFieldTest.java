package tracewright.synth;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Map;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;

@DisplayNameGeneration(ReplaceUnderscores.class)
class NoiseFieldTest {

    /** Among a dozen standard normal pulls; seeds are fixed. */
    private static final double LARGEST_PULL = 4.0;

    @Test
    void given_noise_when_followed_over_many_configurations_then_every_correlation_is_the_one_asked_for() {
        Truth.Noise noise = new Truth.Noise(1, 1, 1, 0.7, 0.3, 0.5);
        Replicas replicas = new Replicas();
        for (int k = 0; k < 20_000; k++) {
            NoiseField field = new NoiseField(Gaussian.of(k, "test"), 2, 5, noise);
            field.advance(0);
            double before = field.at(1, 3);
            field.advance(0.6);
            double e = field.at(1, 3);
            replicas.add("one", e * e);
            replicas.add("next time", e * field.at(1, 4));
            replicas.add("third time", e * field.at(1, 0));
            replicas.add("other source", e * field.at(0, 3));
            replicas.add("other source, next time", e * field.at(0, 4));
            replicas.add("configuration before", e * before);
        }
        // k per step of time, c_s between sources, the product for both; 0.6 along the chain.
        Map<String, Double> pulls = replicas.pulls(Map.of("one", 1.0, "next time", 0.7, "third time", 0.343, "other source", 0.3,
            "other source, next time", 0.21, "configuration before", 0.6));
        assertTrue(pulls.values().stream().allMatch(p -> Math.abs(p) < LARGEST_PULL), pulls::toString);
    }

    @Test
    void given_normal_numbers_when_their_moments_are_taken_then_they_are_those_of_a_normal_distribution() {
        Gaussian gaussian = Gaussian.of(1, "moments");
        Replicas replicas = new Replicas();
        for (int k = 0; k < 200_000; k++) {
            double x = gaussian.next();
            replicas.add("first", x);
            replicas.add("second", x * x);
            replicas.add("third", x * x * x);
            replicas.add("fourth", x * x * x * x);
        }
        Map<String, Double> pulls = replicas.pulls(Map.of("first", 0.0, "second", 1.0, "third", 0.0, "fourth", 3.0));
        assertTrue(pulls.values().stream().allMatch(p -> Math.abs(p) < LARGEST_PULL), pulls::toString);
    }

    @Test
    void given_a_seed_and_a_purpose_when_numbers_are_drawn_then_they_never_change() {
        // Frozen: integers of the generator, square root and the portable logarithm give the same bits on every machine.
        Gaussian gaussian = Gaussian.of(20_260_101L, "oak/a/latent");
        assertEquals(-1.2862874743593544, gaussian.next());
        assertEquals(0.6674709222257019, gaussian.next());
    }
}
