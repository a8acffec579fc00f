package tracewright.study;

import java.lang.reflect.ParameterizedType;
import java.lang.reflect.RecordComponent;
import java.lang.reflect.Type;
import java.nio.file.Path;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.stream.Stream;
import tools.jackson.core.JacksonException;
import tools.jackson.databind.JsonNode;
import tools.jackson.databind.json.JsonMapper;
import tools.jackson.databind.node.ArrayNode;
import tools.jackson.databind.node.ObjectNode;

/**
 * JSON Schemas (draft 2020-12) of study and layout files, made of the same records and {@link Key}s that bind them, so that an
 * editor can complete and check a file while it is written. What no single key can tell only the program checks.
 * <pre>
 *  record           object, additionalProperties false, required where there is no default
 *  sealed interface oneOf, told apart by the selector's const
 *  enum             enum of words            Map, List   object, array
 *  other values     a type, or a pattern for the notations of {@link Scalars}
 * </pre>
 */
public final class StudySchema {

    private static final String DRAFT = "https://json-schema.org/draft/2020-12/schema";
    private static final String NAME = "[a-z][a-z0-9-]*";

    private final JsonMapper mapper = JsonMapper.builder().build();

    private StudySchema() {
    }

    /** Schema of a study file as JSON text. */
    public static String study() {
        return new StudySchema().file(Study.class, StudyFile.SCHEMA, "Tracewright study");
    }

    /** Schema of a layout file as JSON text. */
    public static String layout() {
        return new StudySchema().file(Layout.class, LayoutFile.SCHEMA, "Tracewright layout");
    }

    private String file(Class<?> type, String format, String title) {
        ObjectNode schema = mapper.createObjectNode().put("$schema", DRAFT).put("title", title);
        schema.setAll(record(type, Optional.empty()));
        ObjectNode first = (ObjectNode) schema.get("properties").get("schema");
        first.removeAll().put("const", format);
        return mapper.writerWithDefaultPrettyPrinter().writeValueAsString(schema).replace("\r\n", "\n") + "\n";
    }

    private ObjectNode schema(Type type) {
        if (type instanceof ParameterizedType generic) {
            return parameterized((Class<?>) generic.getRawType(), generic.getActualTypeArguments());
        }
        Class<?> raw = (Class<?>) type;
        if (raw == InputRef.class) {
            return numberOr(Scalars.PATTERNS.get(UncertainValue.class) + "|" + NAME);
        }
        if (raw == Path.class) {
            return typed("string").put("minLength", 1);
        }
        if (Scalars.READERS.containsKey(raw)) {
            return scalar(raw);
        }
        if (raw.isEnum()) {
            return words(raw);
        }
        return raw.isSealed() ? selected(raw) : record(raw, Optional.empty());
    }

    private ObjectNode parameterized(Class<?> raw, Type[] arguments) {
        if (raw == Optional.class) {
            return schema(arguments[0]);
        }
        if (raw == List.class) {
            return typed("array").set("items", schema(arguments[0]));
        }
        if (raw == Map.class) {
            ObjectNode map = typed("object");
            if (((Class<?>) arguments[0]).isEnum()) {
                map.set("propertyNames", words((Class<?>) arguments[0]));
            }
            return map.set("additionalProperties", schema(arguments[1]));
        }
        throw new IllegalStateException("no schema for " + raw);
    }

    private ObjectNode scalar(Class<?> raw) {
        if (raw == UncertainValue.class) {
            return numberOr(Scalars.PATTERNS.get(raw));
        }
        if (raw == Span.class || raw == Study.BlockChoice.class) {
            return either(typed("integer").put("minimum", raw == Span.class ? 0 : 1), text(Scalars.PATTERNS.get(raw)));
        }
        if (Scalars.PATTERNS.containsKey(raw)) {
            return text(Scalars.PATTERNS.get(raw));
        }
        if (raw == String.class) {   // a word that looks like a number is still a word
            ObjectNode any = mapper.createObjectNode();
            any.putArray("type").add("string").add("number").add("boolean");
            return any;
        }
        if (raw == double.class || raw == Double.class) {
            return typed("number");
        }
        if (raw == boolean.class || raw == Boolean.class) {
            return typed("boolean");
        }
        boolean small = raw == int.class || raw == Integer.class;
        return typed("integer").put("minimum", small ? Integer.MIN_VALUE : Long.MIN_VALUE).put("maximum", small ? Integer.MAX_VALUE : Long.MAX_VALUE);
    }

    private ObjectNode record(Class<?> type, Optional<Selector> selector) {
        ObjectNode record = typed("object");
        ObjectNode properties = record.putObject("properties");
        ArrayNode required = mapper.createArrayNode();
        selector.ifPresent(s -> {
            properties.putObject(s.value()).put("const", type.getAnnotation(Case.class).value());
            required.add(s.value());
        });
        for (RecordComponent c : type.getRecordComponents()) {
            String key = Words.key(c.getName());
            properties.set(key, property(c));
            if (c.getAnnotation(Key.class).byDefault().isEmpty() && c.getType() != Optional.class) {
                required.add(key);
            }
        }
        record.set("required", required);
        return record.put("additionalProperties", false);
    }

    private ObjectNode property(RecordComponent component) {
        Key key = component.getAnnotation(Key.class);
        ObjectNode property = schema(component.getGenericType()).put("description", key.value());
        if (!key.byDefault().isEmpty()) {
            property.set("default", written(key.byDefault()));
        }
        return property;
    }

    /** A default as JSON: what is no number, truth value, list or mapping is a word. */
    private JsonNode written(String text) {
        try {
            return mapper.readTree(text);
        } catch (JacksonException e) {
            return mapper.getNodeFactory().stringNode(text);
        }
    }

    private ObjectNode selected(Class<?> sealed) {
        Optional<Selector> selector = Optional.of(sealed.getAnnotation(Selector.class));
        ObjectNode schema = mapper.createObjectNode();
        ArrayNode cases = schema.putArray("oneOf");
        Stream.of(sealed.getPermittedSubclasses()).forEach(c -> cases.add(record(c, selector)));
        return schema;
    }

    private ObjectNode words(Class<?> type) {
        ObjectNode schema = mapper.createObjectNode();
        ArrayNode words = schema.putArray("enum");
        Stream.of(type.getEnumConstants()).forEach(c -> words.add(Words.of((Enum<?>) c)));
        return schema;
    }

    private ObjectNode typed(String type) {
        return mapper.createObjectNode().put("type", type);
    }

    private ObjectNode text(String pattern) {
        return typed("string").put("pattern", "^(?:" + pattern + ")$");
    }

    private ObjectNode numberOr(String pattern) {
        return either(typed("number"), text(pattern));
    }

    private ObjectNode either(ObjectNode one, ObjectNode other) {
        ObjectNode schema = mapper.createObjectNode();
        schema.putArray("anyOf").add(one).add(other);
        return schema;
    }
}
