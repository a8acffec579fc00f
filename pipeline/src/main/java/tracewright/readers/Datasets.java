package tracewright.readers;

import java.util.Optional;
import tracewright.study.Layout;

/** Questions that are asked of every kind of dataset. */
final class Datasets {

    private Datasets() {
    }

    /** Where source times stand; empty for loops and densities. */
    static Optional<Layout.SourceTimes> sources(Layout.Dataset dataset) {
        if (dataset instanceof Layout.Dataset.TwoPoint d) {
            return Optional.of(d.sources());
        }
        return dataset instanceof Layout.Dataset.Connected d ? Optional.of(d.sources()) : Optional.empty();
    }
}
