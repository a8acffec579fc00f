package tracewright.cuts;

import java.nio.file.Path;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import tracewright.study.InputRef;
import tracewright.study.Study;
import tracewright.study.UncertainValue;

/** Settings of the toy ensemble with one thing changed at a time. */
record Settings(long thermalization, List<Study.TrajectoryRange> ranges, List<Study.Exclusion> exclude, long stride, Optional<List<String>> streams,
    Study.Cuts.Missing missing, List<Study.Expected> expect) {

    static Settings none() {
        return new Settings(0, List.of(), List.of(), 1, Optional.empty(), Study.Cuts.Missing.ERROR, List.of());
    }

    Settings thermalization(long t) {
        return new Settings(t, ranges, exclude, stride, streams, missing, expect);
    }

    Settings range(long first, long last) {
        return new Settings(thermalization, List.of(new Study.TrajectoryRange(first, last)), exclude, stride, streams, missing, expect);
    }

    Settings exclude(String stream, long first, long last) {
        return new Settings(thermalization, ranges, List.of(new Study.Exclusion(stream, first, last)), stride, streams, missing, expect);
    }

    Settings stride(long s) {
        return new Settings(thermalization, ranges, exclude, s, streams, missing, expect);
    }

    Settings streams(String... s) {
        return new Settings(thermalization, ranges, exclude, stride, Optional.of(List.of(s)), missing, expect);
    }

    Settings drop() {
        return new Settings(thermalization, ranges, exclude, stride, streams, Study.Cuts.Missing.DROP, expect);
    }

    Settings expect(String stream, long first, long last, long step) {
        return new Settings(thermalization, ranges, exclude, stride, streams, missing, List.of(new Study.Expected(stream, first, last, step)));
    }

    Study.Ensemble ensemble() {
        return new Study.Ensemble("toy", Path.of("layout"), Path.of("data"), new InputRef("spacing", new UncertainValue(0.1, 0)), Map.of(), expect,
            new Study.Cuts(thermalization, ranges, exclude, stride, streams, Optional.empty(), missing, new Study.BlockChoice(Optional.empty())));
    }
}
