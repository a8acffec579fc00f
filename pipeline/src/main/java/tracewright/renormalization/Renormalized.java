package tracewright.renormalization;

import static java.util.Objects.requireNonNull;

import java.util.Optional;
import tracewright.fitters.sampled.SampledNumber;

/**
 * A contribution in MeV with how it was renormalised.
 *
 * @param scheme empty if the number is independent of it
 */
public record Renormalized(SampledNumber value, String route, Optional<String> scheme, Optional<Double> scaleGev) {

    public Renormalized {
        requireNonNull(value, "value");
        requireNonNull(route, "route");
    }

    static Renormalized invariant(SampledNumber value, String route) {
        return new Renormalized(value, route, Optional.empty(), Optional.empty());
    }
}
