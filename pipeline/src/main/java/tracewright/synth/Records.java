package tracewright.synth;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import tracewright.study.ConfigurationId;
import tracewright.study.Layout;
import tracewright.study.Observable;

/** One ensemble's numbers by observable and configuration, in the stored form of each dataset of a layout. */
final class Records {

    private final Layout layout;
    private final List<ConfigurationId> configurations;
    private final Map<Observable, List<int[]>> sourceTimes = new LinkedHashMap<>();
    private final Map<Observable, List<double[]>> values = new LinkedHashMap<>();

    Records(SyntheticEnsemble ensemble, Layout layout) {
        this.layout = layout;
        Checks.layout(layout.timeExtent() == ensemble.timeExtent() && layout.spatialExtent() == ensemble.spatialExtent(),
            "the layout of " + ensemble.name() + " describes a lattice of " + layout.spatialExtent() + "^3 x " + layout.timeExtent()
                + ", the truth one of " + ensemble.spatialExtent() + "^3 x " + ensemble.timeExtent());
        this.configurations = ensemble.configurations(ensemble.observables().get(0));
        ensemble.read(o -> true, c -> true, (observable, configuration, sources, numbers) -> {
            sourceTimes.computeIfAbsent(observable, o -> new ArrayList<>()).add(sources);
            values.computeIfAbsent(observable, o -> new ArrayList<>()).add(numbers);
        });
        for (Layout.Dataset dataset : layout.datasets()) {
            Checks.layout(values.containsKey(dataset.observable()), "the layout of " + ensemble.name() + " wants " + dataset.observable().id()
                + ", which the truth does not measure");
        }
        for (Observable observable : values.keySet()) {
            Checks.layout(layout.datasets().stream().anyMatch(d -> d.observable().equals(observable)),
                "the layout of " + ensemble.name() + " has no place for " + observable.id());
        }
    }

    List<ConfigurationId> configurations() {
        return configurations;
    }

    int[] sourceTimes(Layout.Dataset dataset, int configuration) {
        return sourceTimes.get(dataset.observable()).get(configuration);
    }

    /** [source][stored time] of one configuration. */
    double[] stored(Layout.Dataset dataset, int configuration) {
        return StoredForm.of(layout, dataset).encode(sourceTimes(dataset, configuration), values.get(dataset.observable()).get(configuration));
    }

    /** Where a correlator's source times stand. */
    static Layout.SourceTimes sources(Layout.Dataset dataset) {
        if (dataset instanceof Layout.Dataset.TwoPoint d) {
            return d.sources();
        }
        if (dataset instanceof Layout.Dataset.Connected d) {
            return d.sources();
        }
        throw new IllegalArgumentException("loops and densities have no sources");
    }
}
