package tracewright.synth;

import java.nio.file.Path;
import java.util.List;
import java.util.Map;
import java.util.Optional;

/** A small truth for tests, written in Java so that they need no file. */
final class InventedTheory {

    private InventedTheory() {
    }

    static Truth truth() {
        return new Truth(Truth.SCHEMA, "toy", "", 20_260_101L, theory(), List.of(ensemble()));
    }

    static Truth.Theory theory() {
        return new Truth.Theory(3, 0.28, 0.135, 2.6, 0.092, -0.04,
            new Truth.Pion("pion", 0.5, new Truth.Excited(0.9, 0.4)),
            Map.of("nucleon", nucleon()), operators(), new Truth.Noise(0.004, 0.03, 0.5, 0.7, 0.1, 0.5));
    }

    static Truth.Baryon nucleon() {
        return new Truth.Baryon(new Truth.Linear(0.89, 1.9, 1.5), 0.9, new Truth.Linear(0.043, 0.05, -0.3), 0, 0.7, 0.02,
            new Truth.Excited(0.6, 0.7), new Truth.Mixing(-0.15, 0.6), new Truth.Mixing(-0.2, 0.5), new Truth.Mixing(-0.1, 0.8));
    }

    static Truth.Operators operators() {
        return new Truth.Operators(new Truth.SliceOperator(-0.35, 50, 0), new Truth.SliceOperator(-0.30, 12, 2),
            List.of(new Truth.FlowedDensity(1, 0.085, 42), new Truth.FlowedDensity(2, 0.040, 40), new Truth.FlowedDensity(3, 0.025, 38)),
            0.6, -0.3, 0.99);
    }

    static Truth.Ensemble ensemble() {
        return new Truth.Ensemble("oak", Path.of("oak.yaml"), Truth.Width.FLOAT32, 0.113, 0.30, 16, 12,
            List.of(new Truth.Stream("a", 10, 168, 2, Optional.empty())), 1.0, new Truth.Sources(4, 1, 4, 3), 2, List.of(3, 5));
    }
}
