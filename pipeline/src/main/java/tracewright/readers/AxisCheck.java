package tracewright.readers;

import java.util.ArrayList;
import java.util.EnumMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.stream.Collectors;
import tracewright.study.Layout.Axis;
import tracewright.study.Problem;

/**
 * Compares the lengths of a dataset's axes with what the layout promises. If they disagree, says which order of the axes would
 * fit, when one does.
 */
final class AxisCheck {

    private final List<Axis> declared;
    private final Map<Axis, Long> expected = new EnumMap<>(Axis.class);
    private final Map<Axis, String> because = new EnumMap<>(Axis.class);

    AxisCheck(List<Axis> declared) {
        this.declared = declared;
    }

    /** Length that an axis must have and the reason for it; an axis without one may have any length but zero. */
    AxisCheck expect(Axis axis, long length, String reason) {
        expected.put(axis, length);
        because.put(axis, reason);
        return this;
    }

    /** Throws if the shape does not fit. */
    void check(long[] dims, String where) {
        if (dims.length != declared.size()) {
            throw new Unreadable(new Problem("dataset does not match its description: it has " + dims.length + " axes (" + Shapes.text(dims)
                + "), layout says " + declared.size() + " (" + text(declared) + ")", where, rankRemedy(dims)), null);
        }
        if (fits(declared, dims)) {
            return;
        }
        throw new Unreadable("dataset does not match its description: shape " + Shapes.text(dims) + " for axes (" + text(declared) + "); "
            + mismatches(dims), where, orderRemedy(dims));
    }

    private boolean fits(List<Axis> order, long[] dims) {
        for (int k = 0; k < dims.length; k++) {
            if (dims[k] < 1 || expected.getOrDefault(order.get(k), dims[k]) != dims[k]) {
                return false;
            }
        }
        return true;
    }

    private String mismatches(long[] dims) {
        List<String> words = new ArrayList<>();
        for (int k = 0; k < dims.length; k++) {
            Axis axis = declared.get(k);
            long wanted = expected.getOrDefault(axis, Math.max(1, dims[k]));
            if (wanted != dims[k]) {
                words.add(word(axis) + " axis has length " + dims[k] + ", expected " + wanted + " (" + because.getOrDefault(axis, "at least one") + ")");
            }
        }
        return String.join("; ", words);
    }

    private String orderRemedy(long[] dims) {
        List<List<Axis>> fitting = new ArrayList<>();
        permute(new ArrayList<>(), dims, fitting);
        return switch (fitting.size()) {
            case 0 -> "no order of these axes fits: correct time_extent, sources, labels or axes in the layout, or give the file that belongs to it";
            case 1 -> "axis order (" + text(fitting.get(0)) + ") would fit: set axes to it if that is what the file holds";
            default -> "axis orders (" + fitting.stream().map(AxisCheck::text).collect(Collectors.joining(") and (")) + ") would fit: set axes to the right one";
        };
    }

    private void permute(List<Axis> begun, long[] dims, List<List<Axis>> fitting) {
        if (begun.size() == declared.size()) {
            if (fits(begun, dims)) {
                fitting.add(List.copyOf(begun));
            }
            return;
        }
        for (Axis axis : declared) {
            if (!begun.contains(axis)) {
                begun.add(axis);
                permute(begun, dims, fitting);
                begun.remove(begun.size() - 1);
            }
        }
    }

    private String rankRemedy(long[] dims) {
        if (dims.length == declared.size() + 1 && dims[dims.length - 1] == 2) {
            return "if the last axis of length 2 holds real and imaginary part, set complex = trailing; else correct axes in the layout";
        }
        return "list the axes of this dataset in the layout, slowest first, without the complex one";
    }

    static String word(Axis axis) {
        return axis.name().toLowerCase(Locale.ROOT);
    }

    static String text(List<Axis> axes) {
        return axes.stream().map(AxisCheck::word).collect(Collectors.joining(", "));
    }
}
