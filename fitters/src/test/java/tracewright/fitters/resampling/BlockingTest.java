package tracewright.fitters.resampling;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Arrays;
import java.util.Collections;
import java.util.List;
import java.util.stream.LongStream;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import tracewright.fitters.sampled.BlockLabel;

/** Grid, joins and cuts; every answer counted by hand. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class BlockingTest {

    private static long[] range(long first, long last, long step) {
        return LongStream.iterate(first, t -> t <= last, t -> t + step).toArray();
    }

    private static long[] both(long[] a, long[] b) {
        return LongStream.concat(LongStream.of(a), LongStream.of(b)).toArray();
    }

    private static Blocking uncut(long[] t, int length) {
        boolean[] kept = new boolean[t.length];
        Arrays.fill(kept, true);
        return cut(t, kept, length);
    }

    private static Blocking cut(long[] t, boolean[] kept, int length) {
        return Blocking.anchored(Collections.nCopies(t.length, "s"), t, kept, length);
    }

    private static void assertBlocks(Blocking b, long[] indices, int... sizes) {
        assertArrayEquals(indices, b.labels().stream().mapToLong(BlockLabel::index).toArray());
        assertArrayEquals(sizes, b.sizes());
        assertEquals(Arrays.stream(sizes).sum(), b.configurations());
    }

    @Test
    void given_a_stream_that_starts_off_the_grid_when_blocked_then_boundaries_are_multiples_of_the_length() {
        // 5..9 is half a block: it stays. 10..19, 20..29 full, 30..36 more than half.
        assertBlocks(uncut(range(5, 36, 1), 10), new long[] {0, 1, 2, 3}, 5, 10, 10, 7);
    }

    @Test
    void given_light_pieces_at_both_ends_when_blocked_then_they_join_their_neighbours() {
        assertBlocks(uncut(range(7, 33, 1), 10), new long[] {1, 2}, 13, 14);   // 7..9 with 10..19, 30..33 with 20..29
    }

    @Test
    void given_a_gap_inside_a_block_when_blocked_then_the_block_is_only_lighter() {
        assertBlocks(uncut(both(range(0, 13, 1), range(17, 29, 1)), 10), new long[] {0, 1, 2}, 10, 7, 10);
    }

    @Test
    void given_a_long_gap_when_blocked_then_empty_cells_have_no_block_and_light_pieces_beside_it_join_away_from_it() {
        // 20..22 joins 10..19; 47..49 joins 50..59; cell 3 is empty.
        assertBlocks(uncut(both(range(0, 22, 1), range(47, 69, 1)), 10), new long[] {0, 1, 5, 6}, 10, 13, 13, 10);
    }

    @Test
    void given_light_pieces_on_both_sides_of_a_gap_when_blocked_then_none_joins_across_it() {
        // 20..22 | gap | 38, 39 in adjacent cells 2 and 3: each to the side where its nearest configuration is.
        assertBlocks(uncut(both(range(0, 22, 1), range(38, 59, 1)), 10), new long[] {0, 1, 4, 5}, 10, 13, 12, 10);
    }

    @Test
    void given_a_light_piece_between_empty_cells_when_blocked_then_it_stays_alone() {
        assertBlocks(uncut(both(both(range(0, 19, 1), range(33, 35, 1)), range(50, 69, 1)), 10), new long[] {0, 1, 3, 5, 6}, 10, 10, 3, 10, 10);
    }

    @Test
    void given_a_stream_shorter_than_a_block_when_blocked_then_it_is_one_block() {
        assertBlocks(uncut(range(8, 13, 1), 10), new long[] {1}, 6);
        assertBlocks(uncut(range(3, 3, 1), 10), new long[] {0}, 1);
    }

    @Test
    void given_spaced_configurations_when_blocked_then_light_is_judged_by_the_usual_spacing() {
        // Every fourth trajectory, blocks of 20: five each. 4, 8, 12, 16 are four of five; 80, 84 two of five, joined.
        assertBlocks(uncut(range(4, 84, 4), 20), new long[] {0, 1, 2, 3}, 4, 5, 5, 7);
    }

    @Test
    void given_blocks_shorter_than_the_spacing_when_blocked_then_each_configuration_is_a_block() {
        assertBlocks(uncut(range(0, 30, 10), 3), new long[] {0, 3, 6, 10}, 1, 1, 1, 1);
    }

    @Test
    void given_negative_trajectories_when_blocked_then_the_grid_is_still_anchored_at_zero() {
        assertBlocks(uncut(range(-18, 9, 1), 10), new long[] {-2, -1, 0}, 8, 10, 10);
    }

    @Test
    void given_cuts_when_blocked_then_boundaries_and_joins_are_those_of_what_is_on_disk() {
        long[] t = range(7, 63, 1);
        Blocking whole = uncut(t, 10);
        assertBlocks(whole, new long[] {1, 2, 3, 4, 5}, 13, 10, 10, 10, 14);
        boolean[] kept = new boolean[t.length];
        for (int i = 0; i < t.length; i++) {
            kept[i] = t[i] >= 28 && (t[i] < 40 || t[i] > 49) && t[i] % 2 == 0;
        }
        // 28; 30..38; none of 40..49; 50..62: one configuration is left of block 2 and it joins nobody.
        Blocking cut = cut(t, kept, 10);
        assertBlocks(cut, new long[] {2, 3, 5}, 1, 5, 7);
        for (int i = 0; i < t.length; i++) {
            assertEquals(kept[i], cut.blockOf(i) >= 0);
            if (kept[i]) {
                assertEquals(whole.labels().get(whole.blockOf(i)), cut.labels().get(cut.blockOf(i)));
            }
        }
    }

    @Test
    void given_two_streams_mixed_on_disk_when_blocked_then_no_block_spans_both_and_labels_are_in_monte_carlo_order() {
        List<String> streams = List.of("b", "a", "b", "a", "b", "a", "a");
        long[] t = {11, 0, 10, 11, 12, 10, 1};
        boolean[] kept = {true, true, true, true, true, true, true};
        Blocking b = Blocking.anchored(streams, t, kept, 2);
        assertEquals(List.of(new BlockLabel("a", 0), new BlockLabel("a", 5), new BlockLabel("b", 5), new BlockLabel("b", 6)), b.labels());
        int[] blockOf = new int[7];
        Arrays.setAll(blockOf, b::blockOf);
        assertArrayEquals(new int[] {2, 0, 2, 1, 3, 1, 0}, blockOf);
        assertEquals(2, b.size(2));
        assertEquals(2, b.length());
    }

    @Test
    void given_a_trajectory_twice_or_no_length_when_blocked_then_the_message_says_so() {
        String twice = assertThrows(IllegalArgumentException.class, () -> uncut(new long[] {4, 5, 5}, 2)).getMessage();
        assertTrue(twice.contains("trajectory 5 of stream s"), twice);
        String length = assertThrows(IllegalArgumentException.class, () -> uncut(new long[] {4, 5}, 0)).getMessage();
        assertTrue(length.contains("length of one or more"), length);
    }
}
