package tracewright.study;

import java.lang.reflect.InvocationTargetException;
import java.lang.reflect.ParameterizedType;
import java.lang.reflect.RecordComponent;
import java.lang.reflect.Type;
import java.nio.file.InvalidPathException;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.Collections;
import java.util.EnumMap;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.function.Function;
import java.util.stream.Stream;
import org.snakeyaml.engine.v2.nodes.MappingNode;
import org.snakeyaml.engine.v2.nodes.Node;
import org.snakeyaml.engine.v2.nodes.NodeTuple;
import org.snakeyaml.engine.v2.nodes.ScalarNode;
import org.snakeyaml.engine.v2.nodes.SequenceNode;

/**
 * Turns YAML nodes into records, strictly: every key must be a component, every component without default must have a key, every
 * value must have its type. All problems are collected; a value that cannot be made is absent and the record that needs it too.
 */
final class RecordBinder {

    private final Path file;
    private final Map<String, Optional<UncertainValue>> inputs;   // empty: defined, but its value cannot be read
    private final List<Problem> problems = new ArrayList<>();
    private final Map<String, Node> nodes = new LinkedHashMap<>();   // by dotted path

    RecordBinder(Path file, Map<String, Optional<UncertainValue>> inputs) {
        this.file = file;
        this.inputs = inputs;
    }

    /** The whole file as a record; empty if there were problems. */
    <T> Optional<T> bind(MappingNode root, Class<T> type) {
        return value(root, type, "").map(type::cast);
    }

    List<Problem> problems() {
        return problems;
    }

    /** File and line of a dotted path, or of the nearest part of it that stands in the file. */
    String where(String path) {
        for (String p = path; !p.isEmpty(); p = p.contains(".") ? p.substring(0, p.lastIndexOf('.')) : "") {
            if (nodes.containsKey(p)) {
                return YamlTree.where(nodes.get(p), file.toString());
            }
        }
        return file.toString();
    }

    private void problem(Node node, String what, String remedy) {
        problems.add(new Problem(what, YamlTree.where(node, file.toString()), remedy));
    }

    private Optional<?> value(Node node, Type type, String path) {
        nodes.putIfAbsent(path, node);
        if (type instanceof ParameterizedType generic) {
            return parameterized(node, generic, path);
        }
        Class<?> raw = (Class<?>) type;
        if (raw == Path.class) {
            return scalar(node, path).flatMap(s -> read(s, path, this::resolved));
        }
        if (raw == InputRef.class) {
            return scalar(node, path).flatMap(s -> input(s, path));
        }
        if (Scalars.READERS.containsKey(raw)) {
            return scalar(node, path).flatMap(s -> read(s, path, Scalars.READERS.get(raw)));
        }
        if (raw.isEnum()) {
            return scalar(node, path).flatMap(s -> constant(s, raw, path));
        }
        return raw.isSealed() ? selected(node, raw, path) : record(node, raw, path, "");
    }

    private Path resolved(String text) {
        try {
            return file.toAbsolutePath().getParent().resolve(text).normalize();
        } catch (InvalidPathException e) {
            throw new IllegalArgumentException("'" + text.replace('\0', '?') + "' is not a path: " + e.getReason(), e);
        }
    }

    private Optional<?> parameterized(Node node, ParameterizedType type, String path) {
        Class<?> raw = (Class<?>) type.getRawType();
        Type[] arguments = type.getActualTypeArguments();
        if (raw == Optional.class) {
            return value(node, arguments[0], path).map(Optional::of);
        }
        if (raw == List.class) {
            return list(node, arguments[0], path);
        }
        if (raw == Map.class) {
            return map(node, (Class<?>) arguments[0], arguments[1], path);
        }
        throw new IllegalStateException("no binding for " + type);
    }

    private Optional<List<?>> list(Node node, Type element, String path) {
        if (!(node instanceof SequenceNode sequence)) {
            problem(node, "'" + last(path) + "' must be a list", "write [ ... ] or one entry per line with a dash");
            return Optional.empty();
        }
        List<Object> values = new ArrayList<>();
        int bad = 0;
        for (int i = 0; i < sequence.getValue().size(); i++) {
            Node child = sequence.getValue().get(i);
            nodes.putIfAbsent(join(path, Integer.toString(i)), child);
            Optional<?> v = value(child, element, join(path, YamlTree.name(child).orElse(Integer.toString(i))));
            v.ifPresent(values::add);
            bad += v.isPresent() ? 0 : 1;
        }
        return bad > 0 ? Optional.empty() : Optional.of(Collections.unmodifiableList(values));
    }

    @SuppressWarnings({"unchecked", "rawtypes"})
    private Optional<Map<?, ?>> map(Node node, Class<?> keyType, Type valueType, String path) {
        if (!(node instanceof MappingNode mapping)) {
            problem(node, "'" + last(path) + "' must be a mapping", "write {name: value, ...} or one key per line");
            return Optional.empty();
        }
        Map<Object, Object> values = keyType.isEnum() ? new EnumMap(keyType) : new LinkedHashMap<>();
        int before = problems.size();
        for (Map.Entry<String, NodeTuple> e : entries(mapping).entrySet()) {
            Node keyNode = e.getValue().getKeyNode();
            Optional<?> key = keyType.isEnum() ? constant((ScalarNode) keyNode, keyType, path) : Optional.of(e.getKey());
            Optional<?> v = value(e.getValue().getValueNode(), valueType, join(path, e.getKey()));
            if (key.isPresent() && v.isPresent()) {
                values.put(key.get(), v.get());
            }
        }
        return problems.size() > before ? Optional.empty() : Optional.of(Collections.unmodifiableMap(values));
    }

    /** Keys of a mapping with their nodes; duplicates, merge keys and keys that are no words are problems. */
    private Map<String, NodeTuple> entries(MappingNode mapping) {
        Map<String, NodeTuple> entries = new LinkedHashMap<>();
        for (NodeTuple t : mapping.getValue()) {
            if (!(t.getKeyNode() instanceof ScalarNode key)) {
                problem(t.getKeyNode(), "a key must be a word", "write word: value");
            } else if (key.getValue().equals("<<")) {
                problem(key, "merge keys (<<) are not supported", "write the keys out");
            } else if (entries.putIfAbsent(key.getValue(), t) != null) {
                problem(key, "key '" + key.getValue() + "' stands twice; first at " + YamlTree.where(entries.get(key.getValue()).getKeyNode(), file.toString()),
                    "remove one");
            }
        }
        return entries;
    }

    private Optional<?> selected(Node node, Class<?> sealed, String path) {
        String selector = sealed.getAnnotation(Selector.class).value();
        if (!(node instanceof MappingNode mapping)) {
            problem(node, "'" + last(path) + "' must be a mapping with the key '" + selector + "'", "write {" + selector + ": ..., ...}");
            return Optional.empty();
        }
        Map<String, Class<?>> cases = new LinkedHashMap<>();
        Stream.of(sealed.getPermittedSubclasses()).forEach(c -> cases.put(c.getAnnotation(Case.class).value(), c));
        for (NodeTuple t : mapping.getValue()) {
            if (t.getKeyNode() instanceof ScalarNode k && k.getValue().equals(selector)) {
                Optional<ScalarNode> word = scalar(t.getValueNode(), join(path, selector));
                if (word.isPresent() && !cases.containsKey(word.get().getValue())) {
                    problem(t.getValueNode(), "'" + word.get().getValue() + "' is no " + selector, Nearest.advice(word.get().getValue(), cases.keySet()));
                    return Optional.empty();
                }
                return word.flatMap(w -> record(node, cases.get(w.getValue()), path, selector));
            }
        }
        problem(node, "the key '" + selector + "' is missing" + (path.isEmpty() ? "" : " in '" + path + "'"), "add " + selector + ": one of " + String.join(", ", cases.keySet()));
        return Optional.empty();
    }

    /** A record from a mapping; {@code selector} is a key that was read already. */
    private Optional<Object> record(Node node, Class<?> type, String path, String selector) {
        if (!(node instanceof MappingNode mapping)) {
            problem(node, "'" + last(path) + "' must be a mapping", "write {key: value, ...}; keys: " + String.join(", ", keys(type)));
            return Optional.empty();
        }
        Map<String, NodeTuple> entries = entries(mapping);
        List<String> known = Stream.concat(Stream.of(selector).filter(s -> !s.isEmpty()), keys(type).stream()).toList();
        entries.forEach((key, tuple) -> {
            if (!known.contains(key)) {
                problem(tuple.getKeyNode(), "unknown key '" + key + "'", Nearest.advice(key, known));
            }
        });
        RecordComponent[] components = type.getRecordComponents();
        Object[] arguments = new Object[components.length];
        boolean complete = true;
        for (int i = 0; i < components.length; i++) {
            Optional<?> v = component(mapping, entries, components[i], path);
            arguments[i] = v.orElse(null);
            complete &= v.isPresent();
        }
        return complete ? construct(mapping, type, components, arguments) : Optional.empty();
    }

    private static List<String> keys(Class<?> type) {
        return Stream.of(type.getRecordComponents()).map(c -> Words.key(c.getName())).toList();
    }

    private Optional<?> component(MappingNode mapping, Map<String, NodeTuple> entries, RecordComponent component, String path) {
        String key = Words.key(component.getName());
        Key annotation = component.getAnnotation(Key.class);
        if (entries.containsKey(key)) {
            return value(entries.get(key).getValueNode(), component.getGenericType(), join(path, key));
        }
        if (annotation != null && !annotation.byDefault().isEmpty()) {
            return value(YamlTree.compose(annotation.byDefault(), "default of " + key), component.getGenericType(), join(path, key));
        }
        if (component.getType() == Optional.class) {
            return Optional.of(Optional.empty());
        }
        problem(mapping, "the key '" + key + "' is missing" + (path.isEmpty() ? "" : " in '" + path + "'"),
            "add " + key + ": " + (annotation == null ? "" : annotation.value()));
        return Optional.empty();
    }

    private Optional<Object> construct(Node node, Class<?> type, RecordComponent[] components, Object[] arguments) {
        try {
            var constructor = type.getDeclaredConstructor(Stream.of(components).map(RecordComponent::getType).toArray(Class<?>[]::new));
            constructor.setAccessible(true);
            return Optional.of(constructor.newInstance(arguments));
        } catch (InvocationTargetException e) {
            if (e.getCause() instanceof IllegalArgumentException bad) {
                problem(node, bad.getMessage(), "mend the value");
                return Optional.empty();
            }
            throw new IllegalStateException(e.getCause());
        } catch (ReflectiveOperationException e) {
            throw new IllegalStateException(e);
        }
    }

    private Optional<ScalarNode> scalar(Node node, String path) {
        if (node instanceof ScalarNode s) {
            if (s.isPlain() && (s.getValue().isEmpty() || s.getValue().equals("null") || s.getValue().equals("~"))) {
                problem(node, "'" + last(path) + "' has no value", "write one after the colon");
                return Optional.empty();
            }
            return Optional.of(s);
        }
        problem(node, "'" + last(path) + "' must be a single value", "write " + last(path) + ": value");
        return Optional.empty();
    }

    private Optional<Object> read(ScalarNode node, String path, Function<String, Object> reader) {
        try {
            return Optional.of(reader.apply(node.getValue()));
        } catch (IllegalArgumentException e) {
            problem(node, last(path) + ": " + e.getMessage(), "mend the value");
            return Optional.empty();
        }
    }

    private Optional<Object> constant(ScalarNode node, Class<?> type, String path) {
        Map<String, Object> words = new LinkedHashMap<>();
        for (Object c : type.getEnumConstants()) {
            words.put(Words.of((Enum<?>) c), c);
        }
        if (!words.containsKey(node.getValue())) {
            problem(node, "'" + node.getValue() + "' is not a value of " + last(path), Nearest.advice(node.getValue(), words.keySet()));
            return Optional.empty();
        }
        return Optional.of(words.get(node.getValue()));
    }

    private Optional<InputRef> input(ScalarNode node, String path) {
        String text = node.getValue();
        if (inputs.containsKey(text)) {
            return inputs.get(text).map(v -> new InputRef(text, v));
        }
        try {
            String name = path.startsWith("ensembles.") ? path.substring("ensembles.".length()) : path;
            return Optional.of(new InputRef(name, Scalars.uncertain(text)));
        } catch (IllegalArgumentException e) {
            problem(node, last(path) + ": '" + text + "' is neither a number with error like 0.0904(21) nor one of the inputs",
                inputs.isEmpty() ? "write a number, or define it under inputs" : Nearest.advice(text, inputs.keySet()));
            return Optional.empty();
        }
    }

    private static String join(String path, String key) {
        return path.isEmpty() ? key : path + "." + key;
    }

    private static String last(String path) {
        return path.isEmpty() ? "file" : path.substring(path.lastIndexOf('.') + 1);
    }
}
