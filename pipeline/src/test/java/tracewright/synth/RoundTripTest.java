package tracewright.synth;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;

import java.nio.file.Path;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import tracewright.readers.EnsembleFiles;
import tracewright.readers.EnsembleSource;
import tracewright.study.Layout;

/** What is written and read again is what was in memory, whatever the layout. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class RoundTripTest {

    @TempDir
    private Path folder;

    private record Record(int[] sourceTimes, double[] values) {
    }

    /** Tolerances: one float32 rounding and one by a factor; half a unit of the eighth digit; no rounding but the factors'. */
    @ParameterizedTest
    @CsvSource({"one, FLOAT32, 1.2e-7", "many, FLOAT32, 1.2e-7", "tables, FLOAT32, 5.1e-8", "one, FLOAT64, 5e-16", "many, FLOAT64, 5e-16",
        "tables, FLOAT64, 5e-16"})
    void given_an_ensemble_when_written_and_read_again_then_every_number_comes_back(String which, Truth.Width width, double relative) {
        Layout layout = switch (which) {
            case "one" -> ToyLayouts.oneFile();
            case "many" -> ToyLayouts.manyFiles();
            default -> ToyLayouts.tables();
        };
        List<Truth.Stream> streams = List.of(new Truth.Stream("a", 10, 40, 2, Optional.empty()), new Truth.Stream("b2", 5, 9, 1, Optional.empty()));
        Truth.Ensemble oak = InventedTheory.ensemble().withStreams(streams);
        Truth truth = InventedTheory.truth().withEnsembles(List.of(new Truth.Ensemble(oak.name(), oak.layout(), width, oak.spacingFm(),
            oak.pionMassGev(), oak.timeExtent(), oak.spatialExtent(), oak.streams(), oak.tauInt(), oak.sources(), oak.connectedSources(),
            oak.separations())));
        Synth.write(truth, Map.of("oak", layout), folder);
        Map<String, Record> memory = records(SyntheticEnsemble.generate(truth, "oak"));
        Map<String, Record> disk = records(EnsembleFiles.open("oak", layout, Path.of("oak.yaml"), folder.resolve("oak")));
        assertEquals(memory.keySet(), disk.keySet());
        memory.forEach((id, expected) -> {
            assertArrayEquals(expected.sourceTimes(), disk.get(id).sourceTimes(), id);
            double[] found = disk.get(id).values();
            assertEquals(expected.values().length, found.length, id);
            for (int k = 0; k < found.length; k++) {
                assertEquals(expected.values()[k], found[k], relative * Math.abs(expected.values()[k]), id);
            }
        });
    }

    private static Map<String, Record> records(EnsembleSource source) {
        Map<String, Record> all = new HashMap<>();
        source.read(o -> true, c -> true, (o, c, sources, values) -> all.put(o.id() + " " + c, new Record(sources.clone(), values.clone())));
        return all;
    }
}
