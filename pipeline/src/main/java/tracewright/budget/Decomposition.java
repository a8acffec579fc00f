package tracewright.budget;

import java.util.List;
import java.util.Optional;
import tracewright.fitters.sampled.SampledNumber;

/**
 * A hadron's mass as a sum of terms, in MeV.
 *
 * @param name     {@code trace} or {@code trace-scheme}
 * @param scheme   filled if the terms depend on it
 * @param mass     measured independently of the terms, so that the closure is a test
 */
public record Decomposition(String name, Optional<String> scheme, Optional<Double> scaleGev, List<Term> terms, SampledNumber mass) {

    /** One contribution; id is {@code anomaly}, {@code sigma.light}, {@code gluon}, {@code quark.strange} ... */
    public record Term(String id, SampledNumber value) {
    }

    public Decomposition {
        terms = List.copyOf(terms);
    }

    /** Sum of the terms. */
    public SampledNumber total() {
        return SampledNumber.evaluate(v -> {
            double sum = 0;
            for (double x : v) {
                sum += x;
            }
            return sum;
        }, terms.stream().map(Term::value).toArray(SampledNumber[]::new));
    }

    /** Mass minus the sum of the terms; zero within its error if the sum rule closes. */
    public SampledNumber closure() {
        return mass.minus(total());
    }

    /** A term over the mass. */
    public SampledNumber fraction(Term term) {
        return term.value().dividedBy(mass);
    }
}
