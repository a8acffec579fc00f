package tracewright.fitters;

import java.io.IOException;
import java.io.InputStream;
import java.io.UncheckedIOException;
import java.util.stream.IntStream;
import tools.jackson.databind.JsonNode;
import tools.jackson.databind.ObjectMapper;

/** Reference numbers of the tests; every file names its origin in its entry {@code source}. */
public final class ReferenceData {

    private ReferenceData() {
    }

    /** The file {@code name}.json beside this class. */
    public static JsonNode read(String name) {
        try (InputStream in = ReferenceData.class.getResourceAsStream(name + ".json")) {
            return new ObjectMapper().readTree(in.readAllBytes());
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    public static double[] doubles(JsonNode list) {
        return IntStream.range(0, list.size()).mapToDouble(i -> list.get(i).asDouble()).toArray();
    }

    public static int[] ints(JsonNode list) {
        return IntStream.range(0, list.size()).map(i -> list.get(i).asInt()).toArray();
    }
}
