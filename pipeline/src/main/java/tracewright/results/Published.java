package tracewright.results;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import tracewright.fitters.sampled.NeighbourTerm;
import tracewright.fitters.sampled.SampleGroup;
import tracewright.fitters.sampled.SampledNumber;

/** Errors as they are published: the one place that decides which variance of a {@link SampledNumber} goes into a file. */
final class Published {

    private Published() {
    }

    /** One cause of uncertainty and its share of the variance, between 0 and 1. */
    record Cause(String key, double share) {
    }

    /**
     * What neighbouring blocks of one ensemble say about a number.
     *
     * @param rho1   correlation of neighbouring blocks
     * @param factor what the ensemble's variance was multiplied by, 1 or more
     */
    record Neighbours(String ensemble, String verdict, double rho1, double factor, int blocks) {
    }

    static double error(SampledNumber x) {
        return x.publishedError();
    }

    /** Variance by group in the order of the keys; the values sum to the square of {@link #error}. */
    static Map<String, Double> varianceByGroup(SampledNumber x) {
        return x.publishedVarianceByGroup();
    }

    /** One entry for each ensemble the number depends on, but for those without two neighbouring blocks or with too few draws. */
    static List<Neighbours> neighbours(SampledNumber x) {
        List<Neighbours> all = new ArrayList<>();
        for (SampleGroup g : x.groups()) {
            if (g.isEnsemble()) {
                x.neighbourTerm(g.key()).ifPresent(n -> all.add(new Neighbours(
                    g.key(), n.verdict().name().toLowerCase(Locale.ROOT), n.rho1(), n.factor(), g.labels().size())));
            }
        }
        return all;
    }

    /** What the variance of one group of the number is multiplied by when it is published; 1 unless it is an ensemble's. */
    static double factor(SampledNumber x, SampleGroup g) {
        return g.isEnsemble() ? x.neighbourTerm(g.key()).map(NeighbourTerm::factor).orElse(1.0) : 1;
    }

    /** {@link #varianceByGroup} with the largest first; equal ones in the order of their keys. */
    static Map<String, Double> varianceByShare(SampledNumber x) {
        List<Map.Entry<String, Double>> entries = new ArrayList<>(varianceByGroup(x).entrySet());
        entries.sort(Map.Entry.<String, Double>comparingByValue(Comparator.reverseOrder()).thenComparing(Map.Entry.comparingByKey()));
        Map<String, Double> sorted = new LinkedHashMap<>();
        entries.forEach(e -> sorted.put(e.getKey(), e.getValue()));
        return sorted;
    }

    /** The group with the largest variance; empty if the number has no uncertainty. */
    static Optional<Cause> largestCause(SampledNumber x) {
        Map<String, Double> parts = varianceByShare(x);
        double total = parts.values().stream().mapToDouble(Double::doubleValue).sum();
        return parts.entrySet().stream().findFirst().filter(e -> e.getValue() > 0).map(e -> new Cause(e.getKey(), e.getValue() / total));
    }

    /**
     * Distance from zero in standard errors: |value|/error; 0 for an exact zero, empty for any other number without error.
     */
    static Optional<Double> significance(SampledNumber x) {
        double error = error(x);
        if (error > 0) {
            return Optional.of(Math.abs(x.central()) / error);
        }
        return x.central() == 0 ? Optional.of(0.0) : Optional.empty();
    }
}
