package tracewright.synth;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.nio.file.Path;
import java.util.HashMap;
import java.util.HashSet;
import java.util.Map;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import tracewright.readers.EnsembleFiles;
import tracewright.study.Layout;
import tracewright.study.LayoutFile;
import tracewright.study.Observable;
import tracewright.study.RecordFile;

/** The sample that ships with the program: configs/sample-truth.yaml, its layouts, and sample-data made from them. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class SampleTruthTest {

    private static final Truth TRUTH = RecordFile.read(Path.of("../configs/sample-truth.yaml"), Truth.class);
    /** Largest separation that the sample study uses. */
    private static final int LARGEST_TIME = 12;

    @ParameterizedTest
    @ValueSource(strings = {"alder", "birch", "cedar"})
    void given_the_sample_truth_when_generated_then_weights_are_small_and_averaged_correlators_positive(String name) {
        SyntheticEnsemble ensemble = SyntheticEnsemble.generate(TRUTH, name);
        for (String hadron : TRUTH.theory().baryons().keySet()) {
            for (int t = 0; t <= LARGEST_TIME; t++) {
                assertTrue(ensemble.signalVariance(hadron, t) < 0.35, hadron + " at t = " + t);
            }
        }
        Map<String, double[]> means = new HashMap<>();
        ensemble.read(Observable::hasSources, c -> true, (o, c, sources, values) -> {
            double[] mean = means.computeIfAbsent(o.id(), id -> new double[values.length / sources.length]);
            for (int k = 0; k < values.length; k++) {
                mean[k % mean.length] += values[k];
            }
        });
        means.forEach((id, mean) -> {
            for (int t = 0; t < Math.min(mean.length, LARGEST_TIME + 1); t++) {
                assertTrue(mean[t] > 0, id + " at t = " + t);
            }
        });
    }

    @ParameterizedTest
    @ValueSource(strings = {"alder", "birch", "cedar"})
    void given_the_data_that_ship_when_read_then_they_are_what_the_truth_generates(String name) {
        Truth.Ensemble wanted = TRUTH.ensemble(name);
        Layout layout = LayoutFile.read(wanted.layout());
        Map<String, double[]> memory = new HashMap<>();
        Map<String, int[]> times = new HashMap<>();
        SyntheticEnsemble.generate(TRUTH, name).read(o -> true, c -> true, (o, c, sources, values) -> {
            memory.put(o.id() + " " + c, values);
            times.put(o.id() + " " + c, sources);
        });
        HashSet<String> seen = new HashSet<>();
        EnsembleFiles.open(name, layout, wanted.layout(), Path.of("../sample-data", name)).read(o -> true, c -> true, (o, c, sources, values) -> {
            String id = o.id() + " " + c;
            assertTrue(memory.containsKey(id), id);
            assertArrayEquals(times.get(id), sources, id);
            double[] expected = memory.get(id);
            for (int k = 0; k < expected.length; k++) {
                assertEquals(expected[k], values[k], 1.2e-7 * Math.abs(expected[k]), id);      // one float32 rounding and one by a factor
            }
            seen.add(id);
        });
        assertEquals(memory.keySet(), seen);
    }
}
