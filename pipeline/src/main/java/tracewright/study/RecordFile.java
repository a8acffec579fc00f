package tracewright.study;

import java.nio.file.Path;
import java.util.Map;
import java.util.Optional;

/** Reads any record with {@link Key}s from a YAML file, as strictly as a study. */
public final class RecordFile {

    private RecordFile() {
    }

    /** @throws InputException with cause USAGE and every problem of the file */
    public static <T extends Record> T read(Path file, Class<T> type) {
        RecordBinder binder = new RecordBinder(file, Map.of());
        Optional<T> value = binder.bind(YamlTree.read(file), type);
        if (!binder.problems().isEmpty()) {
            throw new InputException(InputException.Cause.USAGE, binder.problems());
        }
        return value.orElseThrow();
    }
}
