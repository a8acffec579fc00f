package tracewright.study;

import java.lang.reflect.RecordComponent;
import java.nio.file.Path;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.Optional;
import java.util.stream.Stream;

/** A study or layout written out with every default and override filled in, in the order of its records. */
public final class ResolvedText {

    private ResolvedText() {
    }

    /** YAML-like text, one key per line; the same value always gives the same text. */
    public static String of(Record value) {
        StringBuilder text = new StringBuilder();
        record(value, "", text);
        return text.toString();
    }

    private static void record(Record value, String indent, StringBuilder text) {
        for (RecordComponent c : value.getClass().getRecordComponents()) {
            entry(Words.key(c.getName()), component(value, c), indent, text);
        }
    }

    private static Object component(Record value, RecordComponent c) {
        try {
            var accessor = c.getAccessor();
            accessor.setAccessible(true);
            return accessor.invoke(value);
        } catch (ReflectiveOperationException e) {
            throw new IllegalStateException(e);
        }
    }

    private static void entry(String key, Object value, String indent, StringBuilder text) {
        if (value instanceof Optional<?> o) {
            o.ifPresent(v -> entry(key, v, indent, text));
        } else if (value instanceof Map<?, ?> m) {
            text.append(indent).append(key).append(":\n");
            m.forEach((k, v) -> entry(k instanceof Enum<?> e ? Words.of(e) : k.toString(), v, indent + "  ", text));
        } else if (value instanceof List<?> l && l.stream().anyMatch(RecordFileValue::isNested)) {
            text.append(indent).append(key).append(":\n");
            for (int i = 0; i < l.size(); i++) {
                entry(Integer.toString(i), l.get(i), indent + "  ", text);
            }
        } else if (RecordFileValue.isNested(value)) {
            text.append(indent).append(key).append(":\n");
            Case word = value.getClass().getAnnotation(Case.class);
            if (word != null) {
                text.append(indent).append("  ").append(selector(value)).append(": ").append(word.value()).append('\n');
            }
            record((Record) value, indent + "  ", text);
        } else {
            text.append(indent).append(key).append(": ").append(scalar(value)).append('\n');
        }
    }

    private static String selector(Object value) {
        return Stream.of(value.getClass().getInterfaces()).map(i -> i.getAnnotation(Selector.class)).filter(Objects::nonNull)
            .findFirst().orElseThrow().value();
    }

    private static String scalar(Object value) {
        if (value instanceof Enum<?> e) {
            return Words.of(e);
        }
        if (value instanceof UncertainValue v) {
            return v.value() + " +- " + v.error();
        }
        if (value instanceof InputRef r) {
            return r.value().value() + " +- " + r.value().error() + " (" + r.name() + ")";
        }
        if (value instanceof Path p) {
            return Optional.ofNullable(p.getFileName()).map(Path::toString).orElse("");   // no more: folders above belong to the machine
        }
        if (value instanceof List<?> l) {
            return l.stream().map(ResolvedText::scalar).toList().toString();
        }
        if (value instanceof Study.BlockChoice b) {
            return b.length().map(String::valueOf).orElse("auto");
        }
        return notation(value);
    }

    /** The way a file writes it. */
    private static String notation(Object value) {
        if (value instanceof Study.FlowWindow w) {
            return w.first() + ".." + w.last();
        }
        if (value instanceof Study.TrajectoryRange r) {
            return r.first() + ".." + r.last();
        }
        if (value instanceof Study.Exclusion x) {
            return x.stream() + ":" + x.first() + (x.last() == x.first() ? "" : ".." + x.last());
        }
        if (value instanceof Study.Expected x) {
            return x.stream() + ":" + x.first() + ".." + x.last() + " step " + x.step();
        }
        return value.toString();
    }

    /** Which records are mappings in a file rather than single values. */
    private static final class RecordFileValue {
        static boolean isNested(Object value) {
            return value instanceof Record && !Scalars.READERS.containsKey(value.getClass()) && !(value instanceof InputRef);
        }
    }
}
