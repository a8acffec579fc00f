package tracewright.extraction;

import static java.util.Objects.requireNonNull;

import java.util.List;
import tracewright.fitters.sampled.SampledNumber;

/**
 * A number in lattice units with the fits that it averages.
 *
 * @param fits     fits that entered, heaviest first
 * @param failures windows whose fit did not succeed, each with its reason
 */
public record Extracted(SampledNumber number, List<FitSummary> fits, List<String> failures) {

    public Extracted {
        requireNonNull(number, "number");
        fits = List.copyOf(fits);
        failures = List.copyOf(failures);
    }

    /** The fit with the largest weight. */
    public FitSummary heaviest() {
        return fits.get(0);
    }
}
