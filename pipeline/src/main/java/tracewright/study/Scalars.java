package tracewright.study;

import java.math.BigDecimal;
import java.util.Map;
import java.util.Optional;
import java.util.function.Function;
import java.util.regex.Matcher;
import java.util.regex.Pattern;

/** Notations of single values: text to value, or an IllegalArgumentException that says what is expected. */
final class Scalars {

    private static final Pattern UNCERTAIN = Pattern.compile("([+-]?)(\\d+)(?:\\.(\\d*))?(?:\\((\\d+)(?:\\.(\\d+))?\\))?(?:[eE]([+-]?\\d{1,3}))?");
    private static final Pattern UNCERTAIN_LATE = Pattern.compile("([+-]?)(\\d+)(?:\\.(\\d*))?[eE]([+-]?\\d{1,3})\\((\\d+)\\)");
    private static final Pattern SPAN = Pattern.compile("(\\d+)(?:\\.\\.(\\d+))?");
    private static final Pattern FLOW = Pattern.compile("(\\d+(?:\\.\\d+)?)\\.\\.(\\d+(?:\\.\\d+)?)");
    private static final Pattern EXCLUSION = Pattern.compile("([^:\\s]+):(\\d+)(?:\\.\\.(\\d+))?");
    private static final Pattern EXPECTED = Pattern.compile("([^:\\s]+):(\\d+)\\.\\.(\\d+)(?: step (\\d+))?");

    /** Notations by type. */
    static final Map<Class<?>, Function<String, Object>> READERS = Map.ofEntries(
        Map.entry(String.class, s -> s),
        Map.entry(int.class, Scalars::integer), Map.entry(Integer.class, Scalars::integer),
        Map.entry(long.class, Scalars::longInteger), Map.entry(Long.class, Scalars::longInteger),
        Map.entry(double.class, Scalars::real), Map.entry(Double.class, Scalars::real),
        Map.entry(boolean.class, Scalars::truth), Map.entry(Boolean.class, Scalars::truth),
        Map.entry(UncertainValue.class, Scalars::uncertain),
        Map.entry(Span.class, Scalars::span),
        Map.entry(Study.FlowWindow.class, Scalars::flowWindow),
        Map.entry(Study.TrajectoryRange.class, Scalars::trajectoryRange),
        Map.entry(Study.Exclusion.class, Scalars::exclusion),
        Map.entry(Study.Expected.class, Scalars::expected),
        Map.entry(Study.BlockChoice.class, Scalars::blockChoice));

    /** Notations that are more than a plain word or number, as regular expressions for the whole text. */
    static final Map<Class<?>, String> PATTERNS = Map.of(
        UncertainValue.class, UNCERTAIN.pattern() + "|" + UNCERTAIN_LATE.pattern(),
        Span.class, SPAN.pattern(),
        Study.FlowWindow.class, FLOW.pattern(),
        Study.TrajectoryRange.class, "\\d+\\.\\.\\d+",
        Study.Exclusion.class, EXCLUSION.pattern(),
        Study.Expected.class, EXPECTED.pattern(),
        Study.BlockChoice.class, "auto");

    private Scalars() {
    }

    private static IllegalArgumentException expectedText(String text, String what) {
        return new IllegalArgumentException("'" + text + "' is not " + what);
    }

    private static Object integer(String s) {
        try {
            return Integer.valueOf(s);
        } catch (NumberFormatException e) {
            throw expectedText(s, s.matches("[+-]?\\d+") ? "a whole number up to " + Integer.MAX_VALUE : "a whole number");
        }
    }

    private static Object longInteger(String s) {
        try {
            return Long.valueOf(s);
        } catch (NumberFormatException e) {
            throw expectedText(s, "a whole number");
        }
    }

    private static Object real(String s) {
        try {
            double x = Double.parseDouble(s);
            if (Double.isFinite(x) && s.matches("[+-]?[0-9.]+([eE][+-]?[0-9]+)?")) {
                return x;
            }
        } catch (NumberFormatException e) {
            throw expectedText(s, "a number");
        }
        throw expectedText(s, "a finite number");
    }

    private static Object truth(String s) {
        if (s.equals("true") || s.equals("false")) {
            return Boolean.valueOf(s);
        }
        throw expectedText(s, "true or false");
    }

    /** {@code 0.0904(21)}: the digits in brackets count in units of the last digit of the value. */
    static UncertainValue uncertain(String s) {
        Matcher m = UNCERTAIN.matcher(s);
        Matcher late = UNCERTAIN_LATE.matcher(s);
        if (late.matches()) {
            return uncertain(late.group(1) + late.group(2) + (late.group(3) == null ? "" : "." + late.group(3)) + "(" + late.group(5) + ")e" + late.group(4));
        }
        if (!m.matches()) {
            throw expectedText(s, "a number with error like 0.0904(21), 938(4), 1.25e-3(10), or a plain number");
        }
        String decimals = m.group(3) == null ? "" : m.group(3);
        int exponent = m.group(6) == null ? 0 : Integer.parseInt(m.group(6));
        BigDecimal value = new BigDecimal(m.group(1) + m.group(2) + (decimals.isEmpty() ? "" : "." + decimals)).scaleByPowerOfTen(exponent);
        if (m.group(4) == null) {
            return new UncertainValue(value.doubleValue(), 0);
        }
        BigDecimal error = m.group(5) == null ? new BigDecimal(m.group(4)).scaleByPowerOfTen(exponent - decimals.length())
            : new BigDecimal(m.group(4) + "." + m.group(5)).scaleByPowerOfTen(exponent);
        return new UncertainValue(value.doubleValue(), error.doubleValue());
    }

    static Span span(String s) {
        Matcher m = SPAN.matcher(s);
        if (!m.matches()) {
            throw expectedText(s, "a range like 3..7, or a single whole number");
        }
        int first = (Integer) integer(m.group(1));
        return new Span(first, m.group(2) == null ? first : (Integer) integer(m.group(2)));
    }

    private static Object flowWindow(String s) {
        Matcher m = FLOW.matcher(s);
        if (!m.matches()) {
            throw expectedText(s, "a window of flow times like 1.0..3.0");
        }
        return new Study.FlowWindow(Double.parseDouble(m.group(1)), Double.parseDouble(m.group(2)));
    }

    private static Object trajectoryRange(String s) {
        Matcher m = SPAN.matcher(s);
        if (!m.matches() || m.group(2) == null) {
            throw expectedText(s, "a range of trajectories like 100..400");
        }
        return new Study.TrajectoryRange((Long) longInteger(m.group(1)), (Long) longInteger(m.group(2)));
    }

    private static Object exclusion(String s) {
        Matcher m = EXCLUSION.matcher(s);
        if (!m.matches()) {
            throw expectedText(s, "a configuration like a:120, or a range like a:120..160");
        }
        long first = (Long) longInteger(m.group(2));
        return new Study.Exclusion(m.group(1), first, m.group(3) == null ? first : (Long) longInteger(m.group(3)));
    }

    private static Object expected(String s) {
        Matcher m = EXPECTED.matcher(s);
        if (!m.matches()) {
            throw expectedText(s, "a list of configurations like a:100..860 step 4");
        }
        return new Study.Expected(m.group(1), (Long) longInteger(m.group(2)), (Long) longInteger(m.group(3)),
            m.group(4) == null ? 1 : (Long) longInteger(m.group(4)));
    }

    private static Object blockChoice(String s) {
        if (s.equals("auto")) {
            return new Study.BlockChoice(Optional.empty());
        }
        try {
            int length = Integer.parseInt(s);
            if (length >= 1) {
                return new Study.BlockChoice(Optional.of(length));
            }
        } catch (NumberFormatException e) {
            throw expectedText(s, "a block length in trajectories, or auto");
        }
        throw expectedText(s, "a block length of one trajectory or more, or auto");
    }
}
