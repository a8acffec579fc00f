package tracewright.report;

import java.util.Collections;
import java.util.LinkedHashMap;
import java.util.Map;
import java.util.Optional;

/**
 * Where a report comes from.
 *
 * @param entries what else is worth printing ("study file": its digest), in the order in which it is printed
 */
public record Provenance(String programVersion, Map<String, String> entries) {

    public Provenance {
        entries = Collections.unmodifiableMap(new LinkedHashMap<>(entries));
    }

    /** The version of the jar that runs, or a word for classes that were not packed. */
    public static Provenance ofThisProgram() {
        return new Provenance(Optional.ofNullable(Provenance.class.getPackage().getImplementationVersion()).orElse("(unpacked build)"), Map.of());
    }
}
