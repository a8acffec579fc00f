package tracewright.study;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;

@DisplayNameGeneration(ReplaceUnderscores.class)
@Tag("exact")
class ScalarsTest {

    // By hand: digits in brackets count in units of the value's last digit; with a point of their own they are plain.
    // Decimal to double goes through exact decimals, so the expected literals are met to the last bit.
    @ParameterizedTest
    @CsvSource({
        "0.0904(21), 0.0904, 0.0021",
        "938(4), 938, 4",
        "1.25e-3(10), 1.25e-3, 1.0e-4",
        "1.25(10)e-3, 1.25e-3, 1.0e-4",
        "1.25E+3(10), 1250, 100",
        "45.3(2.1), 45.3, 2.1",
        "1.2(3.4)e-5, 1.2e-5, 3.4e-5",
        "-0.827(12), -0.827, 0.012",
        "+3(1), 3, 1",
        "0.00(10), 0, 0.10",
        "0.25, 0.25, 0",
        "0.25(0), 0.25, 0",
        "2e23, 2e23, 0",
        "1.000(20)e-300, 1e-300, 2e-302",
        "135., 135, 0",
    })
    void given_a_number_with_error_when_read_then_value_and_error_are_exact(String text, double value, double error) {
        assertEquals(new UncertainValue(value, error), Scalars.uncertain(text));
    }

    @ParameterizedTest
    @ValueSource(strings = {"", "(21)", "0.09(", "0.09()", "0.09(-2)", "0.09(2)(3)", "0.09 (2)", "0,09(2)", "NaN", "Infinity", "1e4000", "0.09+-0.01", "0x1F", "1_000"})
    void given_no_number_with_error_when_read_then_the_notation_is_shown(String text) {
        IllegalArgumentException e = assertThrows(IllegalArgumentException.class, () -> Scalars.uncertain(text));
        assertTrue(e.getMessage().contains("'" + text + "'") && e.getMessage().contains("0.0904(21)"), e.getMessage());
    }

    @ParameterizedTest
    @ValueSource(strings = {"1e400", "1(1)e400"})
    void given_a_number_beyond_the_doubles_when_read_then_it_is_refused(String text) {
        IllegalArgumentException e = assertThrows(IllegalArgumentException.class, () -> Scalars.uncertain(text));
        assertTrue(e.getMessage().contains("not a finite number"), e.getMessage());
    }

    private static Object read(Class<?> type, String text) {
        return Scalars.READERS.get(type).apply(text);
    }

    @ParameterizedTest
    @CsvSource({"3..7, 3, 7", "5, 5, 5", "0..0, 0, 0"})
    void given_a_range_when_read_then_both_ends_are_in_it(String text, int first, int last) {
        assertEquals(new Span(first, last), Scalars.span(text));
    }

    @ParameterizedTest
    @CsvSource({"a:120, a, 120, 120", "main:120..160, main, 120, 160"})
    void given_an_exclusion_when_read_then_stream_and_ends_are_known(String text, String stream, long first, long last) {
        assertEquals(new Study.Exclusion(stream, first, last), read(Study.Exclusion.class, text));
    }

    @ParameterizedTest
    @CsvSource({"a:100..860 step 4, 100, 860, 4", "a:0..3, 0, 3, 1"})
    void given_expected_configurations_when_read_then_the_step_is_one_unless_written(String text, long first, long last, long step) {
        assertEquals(new Study.Expected("a", first, last, step), read(Study.Expected.class, text));
    }

    @ParameterizedTest
    @ValueSource(strings = {"", "120", "a:", ":120", "a:160..120", "a:-3", "a:1..2..3"})
    void given_no_exclusion_when_read_then_it_is_refused_with_a_reason(String text) {
        IllegalArgumentException e = assertThrows(IllegalArgumentException.class, () -> read(Study.Exclusion.class, text));
        assertTrue(e.getMessage().contains("a:120") || e.getMessage().contains("holds nothing"), e.getMessage());
    }

    @ParameterizedTest
    @ValueSource(strings = {"0", "-3", "Auto", "1.5"})
    void given_no_block_length_when_read_then_auto_is_offered(String text) {
        IllegalArgumentException e = assertThrows(IllegalArgumentException.class, () -> read(Study.BlockChoice.class, text));
        assertTrue(e.getMessage().contains("or auto"), e.getMessage());
    }

    @ParameterizedTest
    @ValueSource(strings = {"NaN", "1d", "0x1p3", "1e400", "1.2.3", "."})
    void given_no_decimal_number_when_read_as_real_then_it_is_refused(String text) {
        IllegalArgumentException e = assertThrows(IllegalArgumentException.class, () -> read(double.class, text));
        assertTrue(e.getMessage().contains("number"), e.getMessage());
    }
}
