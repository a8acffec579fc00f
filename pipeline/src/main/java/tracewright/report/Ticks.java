package tracewright.report;

import java.math.BigDecimal;
import java.math.RoundingMode;
import java.util.ArrayList;
import java.util.List;

/**
 * Tick marks of a linear axis: whole multiples of 1, 2 or 5 times a power of ten, at most seven of them.
 *
 * @param power power of ten taken out of the labels, written once at the end of the axis; 0 if none
 */
record Ticks(List<Tick> list, int power) {

    static final int MOST = 7;
    private static final int FEWEST = 3;
    private static final double GAP = 4;

    record Tick(double value, String label) {
    }

    Ticks {
        list = List.copyOf(list);
    }

    /** As many ticks as their labels leave room for along an axis across; three at the most crowded. */
    static Ticks across(double low, double high, double room) {
        Ticks ticks = between(low, high, MOST);
        for (int most = MOST - 1; most >= FEWEST && ticks.width() > room; most--) {
            ticks = between(low, high, most);
        }
        return ticks;
    }

    /** Width of all labels set side by side with a gap between them. */
    private double width() {
        return list.stream().mapToDouble(t -> Markup.parse(t.label).width(SvgPlot.FONT) + GAP).sum();
    }

    /** Ticks inside low..high; both finite, low below high. */
    static Ticks between(double low, double high) {
        return between(low, high, MOST);
    }

    private static Ticks between(double low, double high, int most) {
        if (!(low < high) || Double.isInfinite(high - low)) {
            throw new IllegalArgumentException("an axis from " + low + " to " + high + " has no room for ticks; need low below high, both finite");
        }
        int decade = exponent(high - low) - 2;
        for (int k = decade;; k++) {
            for (int m : new int[] {1, 2, 5}) {
                BigDecimal step = BigDecimal.valueOf(m).scaleByPowerOfTen(k);
                long first = multiple(low, step, RoundingMode.CEILING);
                long last = multiple(high, step, RoundingMode.FLOOR);
                if (last - first < most) {
                    return of(step, first, last, labelPower(Math.max(Math.abs(low), Math.abs(high))));
                }
            }
        }
    }

    private static Ticks of(BigDecimal step, long first, long last, int power) {
        int decimals = Math.max(0, step.scale() + power);
        List<Tick> ticks = new ArrayList<>();
        for (long i = first; i <= last; i++) {
            BigDecimal value = step.multiply(BigDecimal.valueOf(i));
            String label = value.movePointLeft(power).setScale(decimals, RoundingMode.HALF_EVEN).toPlainString();
            ticks.add(new Tick(value.doubleValue(), label.replace('-', '\u2212')));
        }
        return new Ticks(ticks, power);
    }

    private static long multiple(double x, BigDecimal step, RoundingMode rounding) {
        return new BigDecimal(x).divide(step, 0, rounding).longValue();
    }

    private static int labelPower(double largest) {
        int e = exponent(largest);
        return e < -3 || e > 4 ? e : 0;
    }

    private static int exponent(double x) {
        BigDecimal b = new BigDecimal(x);
        return b.precision() - b.scale() - 1;
    }
}
