package tracewright.results;

import java.io.ByteArrayOutputStream;
import java.util.Map;
import java.util.Optional;
import tools.jackson.core.JsonGenerator;
import tools.jackson.core.ObjectWriteContext;
import tools.jackson.core.PrettyPrinter;
import tools.jackson.core.StreamWriteFeature;
import tools.jackson.core.json.JsonFactory;
import tools.jackson.core.util.DefaultIndenter;
import tools.jackson.core.util.DefaultPrettyPrinter;

/**
 * Writes one JSON document into memory: members in the order of the calls, two spaces of indent, '\n', all digits of a double,
 * no NaN and no infinity. A refused number is reported with the subject set by {@link #subject} and its key.
 */
final class JsonOut {

    private static final JsonFactory FACTORY = JsonFactory.builder().enable(StreamWriteFeature.USE_FAST_DOUBLE_WRITER).build();

    private static final ObjectWriteContext INDENTED = new ObjectWriteContext.Base() {
        @Override
        public PrettyPrinter getPrettyPrinter() {
            DefaultPrettyPrinter printer = new DefaultPrettyPrinter();
            printer.indentObjectsWith(new DefaultIndenter("  ", "\n"));
            return printer;
        }

        @Override
        public boolean hasPrettyPrinter() {
            return true;
        }
    };

    private final ByteArrayOutputStream bytes = new ByteArrayOutputStream();
    private final JsonGenerator json = FACTORY.createGenerator(INDENTED, bytes);
    private String subject = "results";

    /** What the next numbers belong to, for messages. */
    JsonOut subject(String id) {
        subject = id;
        return this;
    }

    JsonOut object() {
        json.writeStartObject();
        return this;
    }

    JsonOut object(String key) {
        json.writeName(key);
        return object();
    }

    JsonOut endObject() {
        json.writeEndObject();
        return this;
    }

    JsonOut array(String key) {
        json.writeName(key);
        json.writeStartArray();
        return this;
    }

    JsonOut endArray() {
        json.writeEndArray();
        return this;
    }

    JsonOut text(String key, String value) {
        json.writeStringProperty(key, value);
        return this;
    }

    JsonOut text(String key, Optional<String> value) {
        json.writeName(key);
        value.ifPresentOrElse(json::writeString, json::writeNull);
        return this;
    }

    JsonOut texts(String key, Iterable<String> values) {
        array(key);
        values.forEach(json::writeString);
        return endArray();
    }

    JsonOut textMap(String key, Map<String, String> values) {
        object(key);
        values.forEach(this::text);
        return endObject();
    }

    JsonOut whole(String key, long value) {
        json.writeNumberProperty(key, value);
        return this;
    }

    JsonOut wholeMap(String key, Map<String, Integer> values) {
        object(key);
        values.forEach(this::whole);
        return endObject();
    }

    JsonOut number(String key, double value) {
        json.writeNumberProperty(key, Program.finite(value, subject + ": " + key));
        return this;
    }

    JsonOut number(String key, Optional<Double> value) {
        if (value.isPresent()) {
            return number(key, value.get());
        }
        json.writeNullProperty(key);
        return this;
    }

    JsonOut numberMap(String key, Map<String, Double> values) {
        object(key);
        values.forEach((name, value) -> json.writeNumberProperty(name, Program.finite(value, subject + ": " + key + " " + name)));
        return endObject();
    }

    /** A matrix as an array of rows. */
    JsonOut matrix(String key, double[] flat, int n) {
        array(key);
        for (int i = 0; i < n; i++) {
            json.writeStartArray();
            for (int j = 0; j < n; j++) {
                json.writeNumber(Program.finite(flat[i * n + j], subject + ": " + key + " row " + i + " column " + j));
            }
            json.writeEndArray();
        }
        return endArray();
    }

    /** Ends the document with a line break. */
    byte[] finish() {
        json.writeRaw('\n');
        json.close();
        return bytes.toByteArray();
    }
}
