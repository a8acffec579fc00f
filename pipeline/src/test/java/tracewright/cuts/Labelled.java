package tracewright.cuts;

import java.util.List;
import java.util.Map;
import java.util.TreeMap;
import java.util.function.Predicate;
import java.util.stream.LongStream;
import tracewright.readers.EnsembleSource;
import tracewright.study.ConfigurationId;
import tracewright.study.Observable;

/** An ensemble that has labels and no numbers: cuts must get by with that. */
record Labelled(Map<Observable, List<ConfigurationId>> labels) implements EnsembleSource {

    static Labelled of(Observable observable, List<ConfigurationId> ids) {
        return new Labelled(Map.of(observable, ids));
    }

    Labelled and(Observable observable, List<ConfigurationId> ids) {
        Map<Observable, List<ConfigurationId>> more = new TreeMap<>(java.util.Comparator.comparing(Observable::id));
        more.putAll(labels);
        more.put(observable, ids);
        return new Labelled(more);
    }

    /** {@code stream:first, first + step ..}, {@code count} of them. */
    static List<ConfigurationId> run(String stream, long first, long step, int count) {
        return LongStream.range(0, count).mapToObj(i -> new ConfigurationId(stream, first + i * step)).toList();
    }

    @Override
    public String name() {
        return "toy";
    }

    @Override
    public int timeExtent() {
        return 8;
    }

    @Override
    public int spatialExtent() {
        return 4;
    }

    @Override
    public List<Observable> observables() {
        return List.copyOf(labels.keySet());
    }

    @Override
    public List<String> inWords() {
        return List.of();
    }

    @Override
    public List<ConfigurationId> configurations(Observable observable) {
        return labels.getOrDefault(observable, List.of());
    }

    @Override
    public void read(Predicate<Observable> wanted, Predicate<ConfigurationId> configurations, Sink sink) {
        throw new AssertionError("cuts open no numbers");
    }
}
