package tracewright.report;

import static org.junit.jupiter.api.Assertions.assertEquals;

import java.util.List;
import java.util.stream.IntStream;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import tracewright.results.Figure;

@DisplayNameGeneration(ReplaceUnderscores.class)
class ColouringTest {

    private static Figure.Points points(String legend) {
        return new Figure.Points(legend, List.of());
    }

    private static Figure.Band band(String legend) {
        return new Figure.Band(legend, List.of());
    }

    private static List<Integer> series(Figure.Layer... layers) {
        Colouring c = Colouring.of(List.of(layers));
        return IntStream.range(0, layers.length).mapToObj(c::series).toList();
    }

    @Test
    void given_as_many_bands_as_point_series_when_coloured_then_they_pair_in_order() {
        assertEquals(List.of(0, 1, 0, 1), series(points("a"), points("b"), band("fit a"), band("fit b")));
    }

    @Test
    void given_a_band_named_like_a_point_series_when_coloured_then_it_takes_its_colour() {
        assertEquals(List.of(0, 1, 1), series(points("a"), points("b"), band("b")));
    }

    @Test
    void given_one_band_for_several_series_when_coloured_then_it_belongs_to_none_of_them() {
        assertEquals(List.of(0, 1, 2, -1), series(points("a"), points("b"), points("c"), band("all")));
    }
}
