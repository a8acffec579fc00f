package tracewright.tests;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.nio.file.Path;
import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Set;
import java.util.TreeMap;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.Future;
import java.util.stream.Collectors;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import tracewright.analysis.Analysis;
import tracewright.results.Results;
import tracewright.study.RecordFile;
import tracewright.study.Study;
import tracewright.study.StudyFile;
import tracewright.synth.SyntheticEnsemble;
import tracewright.synth.Truth;
import tracewright.synth.TruthJson;

/**
 * The whole chain, from synthetic numbers to the budget, repeated over independent ensembles of a theory whose truth is known.
 * Intervals of one published error cover the truth in 68.3 % of all repetitions within three binomial standard errors. Tag: law.
 */
@DisplayNameGeneration(ReplaceUnderscores.class)
class CoverageTest {

    private static final Path RESOURCES = Path.of("src/test/resources/tracewright/tests");
    private static final double NOMINAL = 0.683;

    /** Pulls of one quantity. */
    private static final class Pulls {
        private final List<Double> pulls = new ArrayList<>();

        double covered() {
            return pulls.stream().filter(z -> Math.abs(z) < 1).count() / (double) pulls.size();
        }

        double mean() {
            return pulls.stream().mapToDouble(Double::doubleValue).average().orElseThrow();
        }

        double rms() {
            return Math.sqrt(pulls.stream().mapToDouble(z -> z * z).average().orElseThrow());
        }
    }

    private static Map<String, Pulls> repeat(int repetitions, Study study, Truth truth, Set<String> hadrons) throws Exception {
        Map<String, Double> exact = TruthJson.values(truth);
        ExecutorService pool = Executors.newFixedThreadPool(2);
        try {
            List<Future<Results>> runs = new ArrayList<>();
            for (int r = 0; r < repetitions; r++) {
                long seed = 1000 + r;
                runs.add(pool.submit(() -> Analysis.run(study, List.of(SyntheticEnsemble.generate(truth, "hazel", seed)), 1, line -> { })));
            }
            Map<String, Pulls> pulls = new TreeMap<>();
            for (Future<Results> run : runs) {
                for (Results.Quantity q : run.get().quantities()) {
                    String plain = q.method().map(m -> q.id().substring(0, q.id().length() - m.length() - 1)).orElse(q.id());
                    if (hadrons.contains(q.hadron()) && exact.containsKey(plain)) {
                        pulls.computeIfAbsent(q.id(), id -> new Pulls()).pulls.add((q.number().central() - exact.get(plain)) / q.number().publishedError());
                    }
                }
                for (Results.Budget b : run.get().budgets()) {
                    pulls.computeIfAbsent(b.ensemble() + "." + b.hadron() + ".closure (" + b.decomposition() + ")", id -> new Pulls()).pulls
                        .add(b.closure().central() / b.closure().publishedError());
                }
            }
            return pulls;
        } finally {
            pool.shutdownNow();
        }
    }

    private static void judge(String title, Map<String, Pulls> pulls, int repetitions, Set<String> biased) {
        double three = 3 * Math.sqrt(NOMINAL * (1 - NOMINAL) / repetitions);
        StringBuilder table = new StringBuilder(String.format(Locale.ROOT, "%n%s: %d repetitions, one-sigma coverage %.3f +- %.3f%n%-62s %8s %10s %9s%n", title,
            repetitions, NOMINAL, three, "", "covered", "mean pull", "rms pull"));
        pulls.forEach((id, p) -> table.append(String.format(Locale.ROOT, "%-62s %8.3f %+10.2f %9.2f%s%n", id, p.covered(), p.mean(), p.rms(),
            biased.contains(id) ? "   excited states, see the test" : "")));
        System.out.println(table);
        pulls.forEach((id, p) -> assertEquals(repetitions, p.pulls.size(), id));
        String failed = pulls.entrySet().stream().filter(e -> !biased.contains(e.getKey()) && Math.abs(e.getValue().covered() - NOMINAL) > three)
            .map(e -> e.getKey() + " " + e.getValue().covered()).collect(Collectors.joining(", "));
        assertEquals("", failed);
        assertTrue(pulls.size() >= 15, "only " + pulls.keySet());
    }

    @Test
    void given_a_hadron_without_nearby_excited_states_when_measured_many_times_then_plateau_and_summation_cover() throws Exception {
        Truth truth = RecordFile.read(RESOURCES.resolve("coverage-truth.yaml"), Truth.class);
        Study study = StudyFile.read(RESOURCES.resolve("coverage-study.yaml"));
        judge("plateau and summation", repeat(400, study, truth, Set.of("pion", "lone")), 400, Set.of());
    }

    /**
     * With an excited state as in nature. A plateau fit to these separations is biased by it, several times its error, and no
     * error bar of its own can know: that it fails here shows that the theory is a real test of the other two.
     */
    @Test
    void given_an_excited_state_when_measured_many_times_then_summation_and_two_state_fits_cover_and_the_plateau_does_not() throws Exception {
        Map<String, String> excited = new LinkedHashMap<>();
        excited.put("hadrons.lone.budget", "false");
        excited.put("hadrons.nucleon.budget", "true");
        excited.put("matrix_elements.connected.publish", "two-state");
        excited.put("matrix_elements.connected.two_state",
            "{separations: 4..8, first: 4..5, margin: 1, two_point_first: 1..2, two_point_last: 8, covariance: shrunk}");
        Truth truth = RecordFile.read(RESOURCES.resolve("coverage-truth.yaml"), Truth.class);
        Study study = StudyFile.read(RESOURCES.resolve("coverage-study.yaml"), excited);
        String plateau = "hazel.nucleon.scalar-connected.light.plateau";
        Map<String, Pulls> pulls = repeat(320, study, truth, Set.of("nucleon"));
        judge("summation and two-state fits", pulls, 320, Set.of(plateau));
        assertTrue(pulls.get(plateau).covered() < 0.3, "the plateau covers " + pulls.get(plateau).covered());
    }
}
