package tracewright.report;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import tracewright.fitters.autocorrelation.IntegratedTime;
import tracewright.fitters.sampled.NeighbourTerm;
import tracewright.fitters.sampled.SampleGroup;
import tracewright.fitters.sampled.SampledNumber;

/** Errors and shares of variance of a published number: the one place where the report asks a number for its uncertainty. */
final class Published {

    private Published() {
    }

    /** Part of a number's variance that one cause is answerable for. */
    record Share(String cause, double share) {
    }

    static double error(SampledNumber x) {
        return x.publishedError();
    }

    private static Map<String, Double> varianceByGroup(SampledNumber x) {
        return x.publishedVarianceByGroup();
    }

    static String paper(SampledNumber x) {
        return Numbers.paper(x.central(), error(x));
    }

    /** Shares of the variance, largest first, equal ones in the order of their names; empty for a number without error. */
    static List<Share> shares(SampledNumber x) {
        Map<String, Double> parts = new LinkedHashMap<>(varianceByGroup(x));
        double total = parts.values().stream().mapToDouble(Double::doubleValue).sum();
        if (!(total > 0)) {
            return List.of();
        }
        return parts.entrySet().stream()
            .map(e -> new Share(e.getKey(), e.getValue() / total))
            .sorted(Comparator.comparingDouble(Share::share).reversed().thenComparing(Share::cause))
            .toList();
    }

    /**
     * Whether each ensemble's blocks were long enough for this number: what neighbouring blocks say, and the integrated time of
     * its pseudo-values where the number lives on one ensemble.
     */
    static String blocks(SampledNumber x) {
        List<SampleGroup> ensembles = x.groups().stream().filter(SampleGroup::isEnsemble).toList();
        List<String> remarks = new ArrayList<>();
        ensembles.forEach(g -> remark(x, g.key()).ifPresent(remarks::add));
        String verdict = ensembles.isEmpty() ? Numbers.NONE : remarks.isEmpty() ? "long enough" : String.join("; ", remarks);
        return ensembles.size() == 1 ? verdict + time(x, ensembles.get(0).key()) : verdict;
    }

    private static Optional<String> remark(SampledNumber x, String ensemble) {
        Optional<NeighbourTerm> term = x.neighbourTerm(ensemble);
        if (term.isEmpty()) {
            return Optional.of(ensemble + ": not known");
        }
        String factor = ", variance times " + Numbers.fixed(term.get().factor(), 2);
        return switch (term.get().verdict()) {
            case LONG -> Optional.empty();
            case SHORT -> Optional.of(ensemble + ": short" + factor);
            case USELESS -> Optional.of(ensemble + ": far too short" + factor);
        };
    }

    private static String time(SampledNumber x, String ensemble) {
        return x.integratedTime(ensemble).map(IntegratedTime::estimate).map(e -> "; \u03c4 = " + Numbers.paper(e.tau(), e.tauError())).orElse("");
    }

    /** The cause with the largest share. */
    static Optional<Share> dominant(SampledNumber x) {
        return shares(x).stream().findFirst();
    }
}
