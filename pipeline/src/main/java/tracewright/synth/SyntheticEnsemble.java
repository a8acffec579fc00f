package tracewright.synth;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.Collections;
import java.util.Comparator;
import java.util.List;
import java.util.function.Predicate;
import tracewright.readers.EnsembleSource;
import tracewright.study.ConfigurationId;
import tracewright.study.Flavor;
import tracewright.study.Observable;

/**
 * One ensemble of an invented theory, made in memory from (truth, ensemble, seed); the recipe stands in the package comment.
 * All numbers exist once the object does, so what is asked for, in which order and how often has no influence on them.
 */
public final class SyntheticEnsemble implements EnsembleSource {

    private final Truth.Ensemble ensemble;
    private final List<Channel> channels;
    private final List<Observable> observables;
    private final List<ConfigurationId> configurations;
    private final List<int[]> sourceTimes;          // [configuration]
    private final List<List<double[]>> values;      // [observable][configuration], flat as Observable says

    private SyntheticEnsemble(Truth.Ensemble ensemble, List<Channel> channels, List<Observable> observables, List<ConfigurationId> configurations,
                              List<int[]> sourceTimes, List<List<double[]>> values) {
        this.ensemble = ensemble;
        this.channels = channels;
        this.observables = observables;
        this.configurations = configurations;
        this.sourceTimes = sourceTimes;
        this.values = values;
    }

    /** The ensemble of that name, with the truth's own seed. */
    public static SyntheticEnsemble generate(Truth truth, String ensemble) {
        return generate(truth, ensemble, truth.seed());
    }

    /** The ensemble of that name; another seed is another, independent measurement of the same theory. */
    public static SyntheticEnsemble generate(Truth truth, String ensemble, long seed) {
        Truth.Ensemble wanted = truth.ensemble(ensemble);
        Generator generator = new Generator(truth.theory(), wanted, seed);
        List<ConfigurationId> ids = new ArrayList<>();
        List<int[]> times = new ArrayList<>();
        List<Truth.Stream> streams = new ArrayList<>(wanted.streams());
        streams.sort(Comparator.comparing(Truth.Stream::name));
        for (Truth.Stream stream : streams) {
            generator.run(stream, ids, times);
        }
        return new SyntheticEnsemble(wanted, generator.channels(), generator.observables(), Collections.unmodifiableList(ids), times,
            generator.values());
    }

    @Override
    public String name() {
        return ensemble.name();
    }

    @Override
    public int timeExtent() {
        return ensemble.timeExtent();
    }

    @Override
    public int spatialExtent() {
        return ensemble.spatialExtent();
    }

    @Override
    public List<String> inWords() {
        return observables.stream().map(o -> o.id() + ": made in memory").toList();
    }

    /** Two-point functions (pion first), connected three-point functions, loops, densities. */
    @Override
    public List<Observable> observables() {
        return observables;
    }

    @Override
    public List<ConfigurationId> configurations(Observable observable) {
        Checks.that(observables.contains(observable), "the ensemble has no " + observable.id());
        return configurations;
    }

    @Override
    public void read(Predicate<Observable> wanted, Predicate<ConfigurationId> chosen, Sink sink) {
        for (int o = 0; o < observables.size(); o++) {
            Observable observable = observables.get(o);
            if (wanted.test(observable)) {
                for (int i = 0; i < configurations.size(); i++) {
                    if (chosen.test(configurations.get(i))) {
                        sink.accept(observable, configurations.get(i), sourceTimes(observable, i), values.get(o).get(i).clone());
                    }
                }
            }
        }
    }

    private int[] sourceTimes(Observable observable, int i) {
        if (!observable.hasSources()) {
            return new int[0];
        }
        int[] all = sourceTimes.get(i);
        return observable instanceof Observable.Connected ? Arrays.copyOf(all, ensemble.connectedSources()) : all.clone();
    }

    /**
     * Sum of the squared weights with which a hadron's two-point function follows the latent fields at sink time t: the part of
     * Var[C2]/Cbar^2 that carries the signal. Has to stay well below one for correlators that look like real ones.
     */
    public double signalVariance(String hadron, int t) {
        return channel(hadron).signalVariance(t);
    }

    /** Var[C2(t; t0)]/Cbar(t)^2 for one source, signalVariance + N(t)^2. */
    public double relativeVariance(String hadron, int t) {
        Channel channel = channel(hadron);
        return channel.signalVariance(t) + channel.noise(t) * channel.noise(t);
    }

    /** Exact expectation Cbar(t) of a two-point function. */
    public double expectedTwoPoint(String hadron, int t) {
        return channel(hadron).mean(t);
    }

    private Channel channel(String hadron) {
        return channels.stream().filter(c -> c.name().equals(hadron)).findFirst()
            .orElseThrow(() -> new IllegalArgumentException("the ensemble has no hadron '" + hadron + "'"));
    }

    /** Observables that the truth asks for on an ensemble, in the order of {@link #observables()}. */
    static List<Observable> observablesOf(Truth.Theory theory, Truth.Ensemble ensemble) {
        List<Observable> all = new ArrayList<>();
        all.add(new Observable.TwoPoint(theory.pion().name()));
        theory.baryons().keySet().forEach(hadron -> all.add(new Observable.TwoPoint(hadron)));
        if (ensemble.connectedSources() > 0) {
            for (String hadron : theory.baryons().keySet()) {
                ensemble.separations().forEach(separation -> all.add(new Observable.Connected(hadron, Flavor.LIGHT, separation)));
            }
        }
        all.add(new Observable.Loop(Flavor.LIGHT));
        all.add(new Observable.Loop(Flavor.STRANGE));
        theory.operators().densities().forEach(density -> all.add(new Observable.ActionDensity(density.flowTime())));
        return List.copyOf(all);
    }
}
