package tracewright.report;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.ArrayList;
import java.util.List;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import tracewright.results.Figure;

@DisplayNameGeneration(ReplaceUnderscores.class)
class PlotRangeTest {

    /** Nine fitted points around 0.5 with error 0.01. */
    private static List<Figure.Point> plateau() {
        List<Figure.Point> points = new ArrayList<>();
        for (int t = 1; t <= 9; t++) {
            points.add(new Figure.Point(t, t % 2 == 0 ? 0.49 : 0.51, 0.01, true));
        }
        return points;
    }

    private static PlotRange range(List<Figure.Point> points) {
        return PlotRange.upright(List.of(new Figure.Points("", points)), false);
    }

    @Test
    void given_a_plateau_when_ranged_then_all_error_bars_are_inside_with_a_small_margin() {
        PlotRange r = range(plateau());
        assertTrue(r.low() < 0.48 && r.high() > 0.52, r.toString());
        // The bars span 0.48 to 0.52; a tenth of that at either end is more than any margin should be.
        assertTrue(r.low() > 0.476 && r.high() < 0.524, r.toString());
    }

    @Test
    void given_a_plateau_with_a_wild_noisy_tail_when_ranged_then_the_tail_moves_nothing() {
        List<Figure.Point> points = plateau();
        points.add(new Figure.Point(20, -30, 55, false));
        points.add(new Figure.Point(21, 7, 90, false));
        points.add(new Figure.Point(22, 0.5, 12, true));
        assertEquals(range(plateau()), range(points));
    }

    @Test
    void given_an_unfitted_point_near_by_when_ranged_then_it_is_inside() {
        List<Figure.Point> points = plateau();
        points.add(new Figure.Point(0, 0.56, 0.01, false));
        assertTrue(range(points).holds(0.57));
    }

    @Test
    void given_a_line_far_from_everything_when_ranged_then_it_is_still_seen() {
        PlotRange r = PlotRange.upright(List.of(new Figure.Points("", plateau()),
            new Figure.Line("", List.of(new Figure.LinePoint(0, 0.8), new Figure.LinePoint(9, 0.8)), true)), false);
        assertTrue(r.holds(0.8), r.toString());
    }

    @Test
    void given_a_wish_for_zero_when_ranged_then_zero_is_inside() {
        assertTrue(PlotRange.upright(List.of(new Figure.Points("", plateau())), true).holds(0));
        assertFalse(PlotRange.upright(List.of(new Figure.Points("", plateau())), false).holds(0));
    }

    @Test
    void given_points_of_which_none_was_fitted_when_ranged_then_the_quiet_ones_decide() {
        List<Figure.Point> points = new ArrayList<>();
        plateau().forEach(p -> points.add(new Figure.Point(p.x(), p.y(), p.error(), false)));
        points.add(new Figure.Point(30, 4000, 1000, false));
        assertTrue(range(points).high() < 0.6, range(points).toString());
    }

    @Test
    void given_values_that_are_not_finite_when_ranged_then_they_are_passed_over() {
        List<Figure.Point> points = plateau();
        points.add(new Figure.Point(4, Double.NaN, 0.01, true));
        points.add(new Figure.Point(5, 0.5, Double.POSITIVE_INFINITY, true));
        points.add(new Figure.Point(Double.NaN, 0.5, 0.01, true));
        assertEquals(range(plateau()), range(points));
    }

    @Test
    void given_nothing_or_a_single_exact_value_when_ranged_then_there_is_still_an_axis() {
        assertEquals(new PlotRange(0, 1), range(List.of()));
        PlotRange constant = range(List.of(new Figure.Point(1, 3, 0, true)));
        assertTrue(constant.low() < 3 && constant.high() > 3, constant.toString());
        PlotRange zero = range(List.of(new Figure.Point(1, 0, 0, true)));
        assertTrue(zero.low() < 0 && zero.high() > 0, zero.toString());
    }
}
