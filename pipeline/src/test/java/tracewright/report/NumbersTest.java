package tracewright.report;

import static org.junit.jupiter.api.Assertions.assertEquals;

import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;

@DisplayNameGeneration(ReplaceUnderscores.class)
class NumbersTest {

    @Test
    void given_values_with_errors_when_written_in_paper_style_then_the_error_has_two_digits() {
        assertEquals("0.827(12)", Numbers.paper(0.82689, 0.0123));
        assertEquals("\u22120.0310(50)", Numbers.paper(-0.031, 0.005));
    }

    @Test
    void given_no_error_when_written_in_paper_style_then_the_value_stands_alone() {
        assertEquals("938.27", Numbers.paper(938.272, 0));
        assertEquals("1.5e\u22129".replace('\u2212', '-'), Numbers.paper(1.5e-9, 0));
    }

    @Test
    void given_values_that_are_not_finite_when_written_then_a_dash_stands_for_them() {
        assertEquals(Numbers.NONE, Numbers.paper(Double.NaN, 1));
        assertEquals(Numbers.NONE, Numbers.fixed(Double.POSITIVE_INFINITY, 2));
        assertEquals(Numbers.NONE, Numbers.percent(Double.NaN));
        assertEquals("", Numbers.sortKey(Double.NaN));
    }

    @Test
    void given_coordinates_when_written_then_they_are_rounded_to_hundredths_without_idle_zeros() {
        assertEquals("12.35", Numbers.coordinate(12.3456));
        assertEquals("12.3", Numbers.coordinate(12.3));
        assertEquals("12.05", Numbers.coordinate(12.05));
        assertEquals("-0.5", Numbers.coordinate(-0.5));
        assertEquals("0", Numbers.coordinate(-0.001));
        assertEquals("7", Numbers.coordinate(6.9999));
    }

    @Test
    void given_shares_when_written_as_percentages_then_small_ones_keep_a_digit() {
        assertEquals("62\u202f%", Numbers.percent(0.6249));
        assertEquals("4.3\u202f%", Numbers.percent(0.0431));
        assertEquals("0.0", Numbers.fixed(-0.01, 1));
    }
}
