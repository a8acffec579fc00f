package tracewright.fitters.resampling;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertNotEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;
import static tracewright.fitters.ReferenceData.doubles;
import static tracewright.fitters.ReferenceData.ints;

import java.util.ArrayList;
import java.util.List;
import java.util.stream.IntStream;
import org.apache.commons.rng.UniformRandomProvider;
import org.apache.commons.rng.simple.RandomSource;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import tools.jackson.databind.JsonNode;
import tracewright.fitters.ReferenceData;
import tracewright.fitters.sampled.BlockLabel;
import tracewright.fitters.sampled.SampleGroup;

/** draws.json: known answers of the generator, key and counter, thresholds, multiplicities, samples and weight; compared bit by bit. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class DrawsTest {

    private static final JsonNode DATA = ReferenceData.read("draws");

    private static long hex(JsonNode word) {
        return Long.parseUnsignedLong(word.asString(), 16);
    }

    private static long[] hexes(JsonNode words) {
        return IntStream.range(0, words.size()).mapToLong(i -> hex(words.get(i))).toArray();
    }

    private static Draws draws() {
        return Draws.of(DATA.get("study_seed").asLong(), DATA.get("ensemble").asString());
    }

    private static List<BlockLabel> labels() {
        List<BlockLabel> labels = new ArrayList<>();
        for (JsonNode stream : DATA.get("streams")) {
            for (JsonNode block : stream.get("blocks")) {
                labels.add(new BlockLabel(stream.get("name").asString(), block.asLong()));
            }
        }
        return labels;
    }

    private static int[] sizes() {
        return IntStream.concat(IntStream.of(ints(DATA.get("streams").get(0).get("sizes"))), IntStream.of(ints(DATA.get("streams").get(1).get("sizes"))))
            .toArray();
    }

    @Test
    void given_known_counters_and_keys_when_run_then_the_words_are_the_published_ones() {
        for (JsonNode known : DATA.get("known_answers")) {
            long[] words = hexes(known.get("counter"));
            Philox.block(words, hex(known.get("key").get(0)), hex(known.get("key").get(1)));
            assertArrayEquals(hexes(known.get("output")), words);
        }
    }

    /** Commons RNG 1.7 holds the same generator, seed array k0 k1 c0 c1 c2 c3, and adds one to the counter before the first block. */
    @Test
    void given_a_hundred_counters_when_run_then_a_general_library_gives_the_same_words() {
        UniformRandomProvider other = RandomSource.PHILOX_4X64.create(new long[] {11, -12, 13, -14, 15, -16});
        for (int i = 1; i <= 100; i++) {
            long[] words = {13 + i, -14, 15, -16};
            Philox.block(words, 11, -12);
            for (long word : words) {
                assertEquals(other.nextLong(), word);
            }
        }
    }

    @Test
    void given_seed_ensemble_and_streams_when_hashed_then_key_and_counter_words_are_those_of_the_file() {
        assertArrayEquals(hexes(DATA.get("key")), draws().key());
        for (JsonNode stream : DATA.get("streams")) {
            assertEquals(hex(stream.get("first_word")), Draws.streamWord(stream.get("name").asString()));
        }
        long[] thresholds = hexes(DATA.get("poisson_thresholds"));
        for (int j = 0; j < thresholds.length; j++) {
            assertEquals(thresholds[j], Draws.threshold(j));
        }
    }

    @Test
    void given_twelve_draws_when_made_then_multiplicities_weight_samples_and_variance_are_those_of_the_file() {
        int[] c = draws().multiplicities(labels(), 12);
        for (int b = 0; b < 12; b++) {
            assertArrayEquals(ints(DATA.get("multiplicities").get(b)), java.util.Arrays.copyOfRange(c, 21 * b, 21 * b + 21));
        }
        SampleGroup group = SampleGroup.bootstrapOf("A1", labels(), sizes(), 10, c);
        double[] means = doubles(DATA.get("block_means"));
        double[] expected = doubles(DATA.get("samples"));
        double[] x = new double[12];
        for (int b = 0; b < 12; b++) {
            for (int k = 0; k < 21; k++) {
                x[b] += group.share(b, k) * means[k];
            }
            assertEquals(expected[b], x[b], 1e-12);
        }
        double w = DATA.get("calibrated_weight").asDouble();
        assertEquals(w, group.weight(0), 1e-12 * w);
        double mean = DATA.get("sample_mean").asDouble();
        assertEquals(mean, group.centre(2, x, 0, 1), 1e-12);
        double plain = java.util.Arrays.stream(x).map(v -> (v - mean) * (v - mean)).sum() / 11;
        assertEquals(DATA.get("plain_variance").asDouble(), plain, 1e-12);
        double variance = DATA.get("calibrated_variance").asDouble();
        assertEquals(variance, tracewright.fitters.sampled.SampledNumber.of(2, group, x).variance(), 1e-12 * variance);
    }

    @Test
    void given_draws_by_position_when_made_then_places_are_those_of_the_file() {
        JsonNode expected = DATA.get("by_position");
        for (int b = 0; b < 2; b++) {
            assertArrayEquals(ints(expected.get("indices").get(b)), draws().byPosition(b, expected.get("blocks").asInt()));
        }
    }

    @Test
    void given_a_subset_of_blocks_or_more_draws_when_made_then_all_other_multiplicities_are_unchanged() {
        int[] all = draws().multiplicities(labels(), 12);
        int[] streamB = draws().multiplicities(labels().subList(12, 21), 30);
        for (int b = 0; b < 12; b++) {
            for (int k = 0; k < 9; k++) {
                assertEquals(all[21 * b + 12 + k], streamB[9 * b + k]);
            }
        }
        assertNotEquals(java.util.Arrays.hashCode(all), java.util.Arrays.hashCode(Draws.of(1, "A1").multiplicities(labels(), 12)));
    }

    @Test
    void given_few_blocks_when_a_sample_comes_out_empty_then_it_is_drawn_again() {
        // Two blocks are both absent with probability e^-2 = 0.14: some of 200 samples are drawn anew, none stays empty.
        int[] c = draws().multiplicities(labels().subList(0, 2), 200);
        for (int b = 0; b < 200; b++) {
            assertTrue(c[2 * b] + c[2 * b + 1] > 0);
        }
    }

    @Test
    void given_a_hundred_thousand_labels_when_drawn_then_mean_variance_and_neighbours_are_those_of_independent_poisson_numbers() {
        List<BlockLabel> labels = IntStream.range(0, 100_000).mapToObj(i -> new BlockLabel("s", i)).toList();
        int[] c = draws().multiplicities(labels, 1);
        double mean = IntStream.of(c).average().orElseThrow();
        double variance = IntStream.of(c).mapToDouble(x -> (x - 1.0) * (x - 1.0)).average().orElseThrow();
        double neighbours = IntStream.range(1, c.length).mapToDouble(i -> (c[i] - 1.0) * (c[i - 1] - 1.0)).average().orElseThrow();
        // Standard errors: 0.0032, sqrt(3/1e5) = 0.0055 and 0.0032; fixed seed, three of each.
        assertEquals(1, mean, 0.0095);
        assertEquals(1, variance, 0.0164);
        assertEquals(0, neighbours, 0.0095);
        assertEquals(0, Draws.poisson(0));
        assertEquals(21, Draws.poisson(-1));
    }
}
