package tracewright.report;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Arrays;
import java.util.List;
import java.util.Map;
import java.util.function.Function;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;

@DisplayNameGeneration(ReplaceUnderscores.class)
class SeriesTest {

    /** Linear RGB as seen at full severity: Machado, Oliveira, Fernandes, IEEE TVCG 15 (2009) 1291, doi:10.1109/TVCG.2009.113. */
    private static final Map<String, double[]> VISION = Map.of(
        "full", new double[] {1, 0, 0, 0, 1, 0, 0, 0, 1},
        "red-blind", new double[] {0.152286, 1.052583, -0.204868, 0.114503, 0.786281, 0.099216, -0.003882, -0.048116, 1.051998},
        "green-blind", new double[] {0.367322, 0.860646, -0.227968, 0.280085, 0.672501, 0.047413, -0.011820, 0.042940, 0.968881},
        "blue-blind", new double[] {1.255528, -0.076749, -0.178779, -0.078411, 0.930809, 0.147602, 0.004733, 0.691367, 0.303900});

    private static double[] linear(String colour) {
        double[] rgb = new double[3];
        for (int i = 0; i < 3; i++) {
            double c = Integer.parseInt(colour.substring(1 + 2 * i, 3 + 2 * i), 16) / 255.0;
            rgb[i] = c <= 0.04045 ? c / 12.92 : StrictMath.pow((c + 0.055) / 1.055, 2.4);
        }
        return rgb;
    }

    private static double luminance(double[] rgb) {
        return 0.2126 * rgb[0] + 0.7152 * rgb[1] + 0.0722 * rgb[2];
    }

    private static double[] seen(String colour, double[] vision) {
        double[] in = linear(colour);
        double[] out = new double[3];
        for (int i = 0; i < 3; i++) {
            out[i] = Math.max(0, Math.min(1, vision[3 * i] * in[0] + vision[3 * i + 1] * in[1] + vision[3 * i + 2] * in[2]));
        }
        return out;
    }

    /** CIELAB, white point D65. */
    private static double[] lab(double[] rgb) {
        double x = root((0.4124 * rgb[0] + 0.3576 * rgb[1] + 0.1805 * rgb[2]) / 0.95047);
        double y = root(luminance(rgb));
        double z = root((0.0193 * rgb[0] + 0.1192 * rgb[1] + 0.9505 * rgb[2]) / 1.08883);
        return new double[] {116 * y - 16, 500 * (x - y), 200 * (y - z)};
    }

    private static double root(double t) {
        return t > 0.008856 ? StrictMath.cbrt(t) : 7.787 * t + 16.0 / 116;
    }

    private static double distance(double[] a, double[] b) {
        return Math.sqrt((a[0] - b[0]) * (a[0] - b[0]) + (a[1] - b[1]) * (a[1] - b[1]) + (a[2] - b[2]) * (a[2] - b[2]));
    }

    /** About 2.3 is the smallest difference that an eye notices in areas side by side; thin lines far apart need ten times that. */
    private static final double TOLD_APART = 23;

    private static void assertToldApart(Function<Series, String> colour) {
        for (Map.Entry<String, double[]> vision : VISION.entrySet()) {
            for (int i = 0; i < Series.COUNT; i++) {
                for (int j = 0; j < i; j++) {
                    double d = distance(lab(seen(colour.apply(Series.of(i)), vision.getValue())), lab(seen(colour.apply(Series.of(j)), vision.getValue())));
                    assertTrue(d > TOLD_APART, Series.of(i) + " and " + Series.of(j) + ", " + vision.getKey() + ": " + d);
                }
            }
        }
    }

    @Test
    void given_any_two_light_colours_when_seen_by_colour_blind_eyes_then_they_can_be_told_apart() {
        assertToldApart(Series::light);
    }

    @Test
    void given_any_two_dark_colours_when_seen_by_colour_blind_eyes_then_they_can_be_told_apart() {
        assertToldApart(Series::dark);
    }

    @Test
    void given_each_colour_when_set_against_its_paper_then_the_contrast_is_at_least_three() {
        // Web Content Accessibility Guidelines 2.1, criterion 1.4.11: 3 to 1 for graphical objects.
        for (Series s : Series.values()) {
            double onWhite = 1.05 / (luminance(linear(s.light())) + 0.05);
            double onDark = (luminance(linear(s.dark())) + 0.05) / (luminance(linear("#11171d")) + 0.05);
            assertTrue(onWhite >= 3, s + " on white: " + onWhite);
            assertTrue(onDark >= 3, s + " on dark: " + onDark);
        }
    }

    @Test
    void given_the_six_series_when_drawn_then_no_two_markers_have_one_shape() {
        List<String> shapes = Arrays.stream(Series.values()).map(s -> s.marker(0, 0)).toList();
        assertEquals(Series.COUNT, shapes.stream().distinct().count());
        assertEquals(Series.of(0), Series.of(6));
    }
}
