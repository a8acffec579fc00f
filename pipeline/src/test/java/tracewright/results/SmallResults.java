package tracewright.results;

import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.stream.IntStream;
import tracewright.fitters.sampled.BlockLabel;
import tracewright.fitters.sampled.SampleGroup;
import tracewright.fitters.sampled.SampledNumber;

/**
 * A made-up run of one ensemble, {@code a09}: five blocks of two configurations, a spacing with an error and two alternatives of
 * a fit. Jackknife samples are chosen so that variances come out as whole numbers: with equal blocks w = 4/5.
 */
final class SmallResults {

    private SmallResults() {
    }

    /** Five equal blocks of stream r0, neighbours on the grid. */
    static SampleGroup blocks() {
        return blocks(0, 1, 2, 3, 4);
    }

    static SampleGroup blocks(int... indices) {
        List<BlockLabel> labels = IntStream.of(indices).mapToObj(i -> new BlockLabel("r0", i)).toList();
        return SampleGroup.jackknife("a09", labels, IntStream.of(indices).map(i -> 2).toArray());
    }

    /** Samples at central + each deviation; deviations sum to zero, so the centre is the central value. */
    static SampledNumber jackknifed(double central, double... deviations) {
        double[] samples = deviations.clone();
        for (int k = 0; k < samples.length; k++) {
            samples[k] += central;
        }
        return SampledNumber.of(central, blocks(), samples);
    }

    /** 900 MeV; variance of a09: 4/5 (25 + 0 + 0 + 0 + 25) = 40. Neighbouring blocks do not correlate: no product of neighbours. */
    static SampledNumber mass() {
        return jackknifed(900, 5, 0, 0, 0, -5);
    }

    /** 810 MeV; variance of a09: 4/5 (1 + 1) = 1.6, of input:spacing_a09: 9, of choice:window: 0.5 (4 + 4) = 4. */
    static SampledNumber anomaly() {
        return jackknifed(810, 1, 0, -1, 0, 0)
            .withGroup(SampleGroup.input("spacing_a09", 1), new double[] {813, 807})
            .withGroup(SampleGroup.choice("window", new double[] {0.5, 0.5}), new double[] {812, 808});
    }

    /** 60 MeV; variance of a09: 4/5 (1 + 1) = 1.6. */
    static SampledNumber light() {
        return jackknifed(60, 0, 0, 1, 0, -1);
    }

    static Results.Budget budget() {
        SampledNumber total = anomaly().plus(light());
        return new Results.Budget("nucleon", "a09", "trace", Optional.empty(), Optional.empty(),
            List.of(term("anomaly", anomaly()), term("sigma.light", light())), total, mass(), mass().minus(total));
    }

    static Results.Term term(String id, SampledNumber value) {
        return new Results.Term(id, value, value.dividedBy(mass()));
    }

    static Results.Quantity quantity(String id, SampledNumber number) {
        return new Results.Quantity(id, "a09", "nucleon", "sigma", Optional.of("light"), Optional.empty(), number, "MeV", Optional.of("MSbar"),
            Optional.of(2.0), Optional.of("invariant"), Optional.of("plateau"),
            List.of(new Results.Fit("t 8..14, one state", 11.5, 6.9, 7, 0.12, 0.75, 1.02, 59.5, 1.25)));
    }

    static Results.EnsembleSummary ensemble() {
        Map<String, Integer> removed = new LinkedHashMap<>();
        removed.put("thermalization", 3);
        removed.put("exclude", 1);
        return new Results.EnsembleSummary("a09", 64, 32, SampledNumber.input("spacing_a09", 0.0904, 0.0021), 14, 10, Map.of("r0", 10), removed, 4,
            5, 20, "as the study says", List.of(new Results.Autocorrelation("nucleon two-point function, t = 10", 6.5, 1.5, "")),
            List.of("/c2: nucleon two-point function, real"));
    }

    static Results of(List<Results.Quantity> quantities, List<Results.Budget> budgets) {
        Map<String, String> choices = new LinkedHashMap<>();
        choices.put("resampling", "jackknife");
        choices.put("covariance of plateau fits", "full");
        return new Results(new Results.StudySummary("small", 7, "jackknife", choices), List.of(ensemble()), quantities, budgets, List.of(),
            List.of("a warning, with \"quotes\""));
    }

    /** One quantity and one budget. */
    static Results complete() {
        return of(List.of(quantity("a09.nucleon.sigma.light.plateau", light()), quantity("a09.nucleon.anomaly", anomaly())), List.of(budget()));
    }
}
