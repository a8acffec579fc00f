package tracewright.study;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

@DisplayNameGeneration(ReplaceUnderscores.class)
@Tag("exact")
class PaperNumberTest {

    // By hand: the error is rounded to two digits, the value to the error's last digit.
    @ParameterizedTest
    @CsvSource({
        "0.0904, 0.0021, 0.0904(21)",
        "938.4, 41.2, 938(41)",
        "938.44, 4.1, 938.4(4.1)",
        "1.2, 3.4, 1.2(3.4)",
        "-0.8271, 0.0123, -0.827(12)",
        "-0.0004, 0.1, 0.00(10)",
        "0.5, 0.0996, 0.50(10)",
        "1.25, 0.996, 1.2(1.0)",
        "12.25, 9.96, 12(10)",
        "938.4, 99.6, 938(100)",
        "45.25, 0.5, 45.25(50)",
        "0, 0.25, 0.00(25)",
        "12345, 123, 12345(120)",
        "1.5e9, 2.3e7, 1.500(23)e9",
        "-1.5e-9, 2.3e-11, -1.500(23)e-9",
        "0, 2.3e-11, 0.0(2.3)e-11",
        "1e-20, 2.3e8, 0.0(2.3)e8",
        "1.5, 2.3e-8, 1.500000000(23)",
        "123.4, 1e-8, 123.400000000(10)",
        "1e-300, 2e-302, 1.000(20)e-300",
        "1e300, 2e298, 1.000(20)e300",
        "0.25, 0, 0.25",
        "-938, 0, -938",
        "0, 0, 0",
        "1e300, 0, 1e300",
        "-2.5e-9, 0, -2.5e-9",
        "NaN, 1, not a number",
        "1, Infinity, not a number",
    })
    void given_a_value_and_an_error_when_written_then_it_reads_as_in_a_paper(double value, double error, String expected) {
        assertEquals(expected, PaperNumber.format(value, error));
    }

    @Test
    void given_any_magnitudes_when_written_and_read_back_then_value_and_error_agree_within_their_rounding() {
        for (int v = -12; v <= 12; v++) {
            for (int e = -12; e <= 12; e++) {
                double value = -3.7182818 * Double.parseDouble("1e" + v);
                double error = 1.618034 * Double.parseDouble("1e" + e);
                UncertainValue back = Scalars.uncertain(PaperNumber.format(value, error));
                // Two digits of 1.6...: at most 0.05/1.6 off; the value at most half of the error's last digit, plus a double's rounding.
                assertTrue(Math.abs(back.error() - error) <= 0.05 * error / 1.6, value + " " + error + " -> " + back);
                assertTrue(Math.abs(back.value() - value) <= 0.05 * error / 1.6 + 0x1p-51 * Math.abs(value), value + " " + error + " -> " + back);
            }
        }
    }
}
