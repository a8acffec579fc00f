package tracewright.report;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.math.BigDecimal;
import java.math.MathContext;
import java.util.List;
import java.util.Random;
import java.util.Set;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;

@DisplayNameGeneration(ReplaceUnderscores.class)
class TicksTest {

    private static List<String> labels(double low, double high) {
        return Ticks.between(low, high).list().stream().map(Ticks.Tick::label).toList();
    }

    @Test
    void given_ranges_of_everyday_size_when_ticked_then_labels_are_those_one_would_write_by_hand() {
        assertEquals(List.of("0", "5", "10", "15", "20", "25"), labels(-0.5, 26));
        assertEquals(List.of("0.55", "0.60", "0.65", "0.70"), labels(0.512, 0.704));
        assertEquals(List.of("\u22126", "\u22124", "\u22122", "0", "2", "4", "6"), labels(-7, 7));
        assertEquals(List.of("800", "900", "1000", "1100"), labels(750, 1120));
    }

    @Test
    void given_very_small_values_when_ticked_then_a_power_of_ten_is_taken_out() {
        Ticks ticks = Ticks.between(0, 2.6e-5);
        assertEquals(-5, ticks.power());
        assertEquals(List.of("0.0", "0.5", "1.0", "1.5", "2.0", "2.5"), ticks.list().stream().map(Ticks.Tick::label).toList());
        assertEquals(1.5e-5, ticks.list().get(3).value());   // exact: both are the double nearest to the decimal
    }

    @Test
    void given_any_range_when_ticked_then_there_are_two_to_seven_inside_it_one_two_or_five_apart() {
        Random random = new Random(7);
        for (int i = 0; i < 3000; i++) {
            double low = 200 * (random.nextDouble() - 0.5) * StrictMath.exp(20 * (random.nextDouble() - 0.5));
            double high = low + (Math.abs(low) * 1e-4 + 1e-9) * StrictMath.exp(14 * random.nextDouble());
            Ticks ticks = Ticks.between(low, high);
            int n = ticks.list().size();
            // The next finer step gave eight ticks or more, so the range is at least 7 / 2.5 = 2.8 of these steps long and holds two.
            assertTrue(n >= 2 && n <= 7, n + " ticks on " + low + ".." + high);
            ticks.list().forEach(t -> assertTrue(t.value() >= low && t.value() <= high, t + " outside " + low + ".." + high));
            assertTrue(Set.of("1", "2", "5").contains(step(ticks)), "step " + step(ticks) + " on " + low + ".." + high);
        }
    }

    /** Leading digit of the difference of two labels, from their decimal text. */
    private static String step(Ticks ticks) {
        BigDecimal difference = number(ticks, 1).subtract(number(ticks, 0));
        return difference.round(new MathContext(1)).unscaledValue().toString().replaceAll("0+$", "");
    }

    private static BigDecimal number(Ticks ticks, int i) {
        return new BigDecimal(ticks.list().get(i).label().replace('\u2212', '-'));
    }

    @Test
    void given_labels_too_wide_for_the_axis_when_ticked_across_then_fewer_are_set() {
        int wide = Ticks.across(1000.0021, 1000.0089, 400).list().size();
        int narrow = Ticks.across(1000.0021, 1000.0089, 150).list().size();
        assertEquals(6, wide);   // 1000.003, 1000.004 .. 1000.008: six multiples of 0.001, and steps of 0.0005 would be thirteen
        assertTrue(narrow < wide, narrow + " against " + wide);
    }

    @Test
    void given_an_empty_range_when_ticked_then_the_message_names_it() {
        String message = assertThrows(IllegalArgumentException.class, () -> Ticks.between(2, 2)).getMessage();
        assertTrue(message.contains("from 2.0 to 2.0"), message);
    }
}
