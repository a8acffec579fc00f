package tracewright.correlators;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.function.Predicate;
import tracewright.readers.EnsembleSource;
import tracewright.study.ConfigurationId;
import tracewright.study.Observable;

/** An ensemble written down in a test: arrays by observable and configuration, handed over in the order in which they were added. */
public final class HandMade implements EnsembleSource {

    private record Array(int[] times, double[] values) {
    }

    private final int extent;
    private final Map<Observable, Map<ConfigurationId, Array>> arrays = new LinkedHashMap<>();

    public HandMade(int extent) {
        this.extent = extent;
    }

    /** A loop or density, [time]. */
    public HandMade with(Observable density, long trajectory, double... values) {
        return with(density, trajectory, new int[0], values);
    }

    /** A correlator, [source][t] flat. */
    public HandMade with(Observable observable, long trajectory, int[] times, double... values) {
        arrays.computeIfAbsent(observable, o -> new LinkedHashMap<>()).put(new ConfigurationId("a", trajectory), new Array(times.clone(), values.clone()));
        return this;
    }

    @Override
    public String name() {
        return "toy";
    }

    @Override
    public int timeExtent() {
        return extent;
    }

    @Override
    public int spatialExtent() {
        return 4;
    }

    @Override
    public List<Observable> observables() {
        return new ArrayList<>(arrays.keySet());
    }

    @Override
    public List<String> inWords() {
        return List.of();
    }

    @Override
    public List<ConfigurationId> configurations(Observable observable) {
        return arrays.getOrDefault(observable, Map.of()).keySet().stream().sorted().toList();
    }

    @Override
    public void read(Predicate<Observable> wanted, Predicate<ConfigurationId> configurations, Sink sink) {
        arrays.forEach((observable, byConfiguration) -> byConfiguration.forEach((id, array) -> {
            if (wanted.test(observable) && configurations.test(id)) {
                sink.accept(observable, id, array.times(), array.values());
            }
        }));
    }
}
