package tracewright.synth;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;

import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.function.Executable;
import tracewright.study.Study;

@DisplayNameGeneration(ReplaceUnderscores.class)
class TruthTest {

    private static void assertRefused(String message, Executable made) {
        assertEquals(message, assertThrows(IllegalArgumentException.class, made).getMessage());
    }

    @Test
    void given_a_stream_with_a_gap_when_its_trajectories_are_listed_then_those_of_the_gap_are_missing() {
        Truth.Stream stream = new Truth.Stream("a", 4, 24, 4, Optional.of(new Study.TrajectoryRange(9, 16)));
        assertEquals(List.of(4L, 8L, 20L, 24L), stream.trajectories());
    }

    @Test
    void given_moving_sources_when_their_times_are_asked_for_then_they_wrap_around_the_lattice() {
        assertArrayEquals(new int[] {15, 5, 11}, new Truth.Sources(3, 3, 6, 4).times(3, 16));     // 3 + 12, + 6, + 12, mod 16
    }

    @Test
    void given_another_format_when_made_then_both_formats_are_named() {
        Truth t = InventedTheory.truth();
        assertRefused("schema is 'x'; this program reads tracewright-truth/1", () -> new Truth("x", "", "", 1, t.theory(), t.ensembles()));
    }

    @Test
    void given_streams_and_sources_that_cannot_be_when_made_then_the_numbers_are_named() {
        assertRefused("stream a runs from 1 to 6 in steps of 2; need 0 <= first <= last, a whole number of steps apart",
            () -> new Truth.Stream("a", 1, 6, 2, Optional.empty()));
        assertRefused("the gap of stream a leaves nothing of it", () -> new Truth.Stream("a", 4, 6, 2, Optional.of(new Study.TrajectoryRange(0, 9))));
        assertRefused("5 sources with a spacing of 4 share times on 16 slices",
            () -> InventedTheory.ensemble().withSources(new Truth.Sources(5, 0, 4, 0)));
        assertRefused("separation 16 outside 0..15", () -> InventedTheory.ensemble().withSeparations(List.of(16)));
    }

    @Test
    void given_a_baryon_called_like_the_pion_when_made_then_it_is_refused() {
        assertRefused("the pion and a baryon are both called pion",
            () -> InventedTheory.theory().withBaryons(Map.of("pion", InventedTheory.nucleon())));
    }

    @Test
    void given_an_unknown_ensemble_when_asked_for_then_the_known_ones_are_named() {
        assertRefused("the truth has no ensemble 'elm'; it has oak", () -> InventedTheory.truth().ensemble("elm"));
    }
}
