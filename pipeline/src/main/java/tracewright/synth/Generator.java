package tracewright.synth;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import tracewright.study.ConfigurationId;
import tracewright.study.Observable;

/** Runs the recipe of the package comment stream by stream and keeps every number that it makes. */
final class Generator {

    private final Truth.Theory theory;
    private final Truth.Ensemble ensemble;
    private final long seed;
    private final Autoregression chain;
    private final LatentFields latent;
    private final Map<String, Channel> channels = new LinkedHashMap<>();
    private final List<Observable> observables;
    private final List<List<double[]>> values = new ArrayList<>();
    private final double[] shifted;     // [tau][a], latent fields as seen from one source

    Generator(Truth.Theory theory, Truth.Ensemble ensemble, long seed) {
        this.theory = theory;
        this.ensemble = ensemble;
        this.seed = seed;
        this.chain = Autoregression.withTauInt(ensemble.tauInt());
        double extent = ensemble.spatialExtent();
        this.latent = LatentFields.of(theory.operators(), extent * extent * extent);
        channels.put(theory.pion().name(), Channel.pion(theory, ensemble, latent));
        theory.baryons().keySet().forEach(hadron -> channels.put(hadron, Channel.baryon(theory, ensemble, hadron, latent)));
        this.observables = SyntheticEnsemble.observablesOf(theory, ensemble);
        observables.forEach(observable -> values.add(new ArrayList<>()));
        this.shifted = new double[latent.count() * ensemble.timeExtent()];
    }

    List<Channel> channels() {
        return List.copyOf(channels.values());
    }

    List<Observable> observables() {
        return observables;
    }

    List<List<double[]>> values() {
        return values;
    }

    /** Generates one stream and appends its configurations and their source times. */
    void run(Truth.Stream stream, List<ConfigurationId> ids, List<int[]> times) {
        StreamNoise noise = new StreamNoise(stream.name());
        Gaussian gaussian = gaussian(stream.name(), "latent");
        double[] phi = new double[latent.count() * ensemble.timeExtent()];
        long previous = -1;
        for (long trajectory : stream.trajectories()) {
            double kept = previous < 0 ? 0 : chain.over((trajectory - previous) / stream.step());
            advance(phi, kept, gaussian);
            noise.advance(kept);
            int[] sources = ensemble.sources().times((trajectory - stream.first()) / stream.step(), ensemble.timeExtent());
            measure(phi, sources, noise);
            ids.add(new ConfigurationId(stream.name(), trajectory));
            times.add(sources);
            previous = trajectory;
        }
    }

    private Gaussian gaussian(String stream, String purpose) {
        return Gaussian.of(seed, ensemble.name() + "/" + stream + "/" + purpose);
    }

    private static void advance(double[] phi, double kept, Gaussian gaussian) {
        double fresh = Math.sqrt(1 - kept * kept);
        for (int k = 0; k < phi.length; k++) {
            phi[k] = kept * phi[k] + fresh * gaussian.next();
        }
    }

    private void measure(double[] phi, int[] sources, StreamNoise noise) {
        int operator = 0;
        for (int o = 0; o < observables.size(); o++) {
            Observable observable = observables.get(o);
            double[] made;
            if (observable instanceof Observable.TwoPoint two) {
                made = twoPoint(channels.get(two.hadron()), phi, sources, noise);
                noise.made.put(two.hadron(), made);
            } else if (observable instanceof Observable.Connected three) {
                made = connected(channels.get(three.hadron()), three, noise);
            } else {
                made = slices(operator++, phi, noise);
            }
            values.get(o).add(made);
        }
    }

    /** C2(t; s) = Cbar(t) [1 + sum w phi + N(t) e(t; s)], [source][t]. */
    private double[] twoPoint(Channel channel, double[] phi, int[] sources, StreamNoise noise) {
        int times = ensemble.timeExtent();
        double[] out = new double[sources.length * times];
        for (int s = 0; s < sources.length; s++) {
            rotate(phi, sources[s]);
            for (int t = 0; t < times; t++) {
                double response = channel.isBaryon() ? channel.response(shifted, t) : 0;
                out[s * times + t] = channel.mean(t) * (1 + response + channel.noise(t) * noise.twoPoint(channel.name(), s, t));
            }
        }
        return out;
    }

    private void rotate(double[] phi, int t0) {
        int head = phi.length - t0 * latent.count();
        System.arraycopy(phi, phi.length - head, shifted, 0, head);
        System.arraycopy(phi, 0, shifted, head, phi.length - head);
    }

    /** C3(tau; s) = Rconn(t, tau) C2(t; s) + Cbar(t) N(t) n3 g00 e'(tau; s), [source][tau]. */
    private double[] connected(Channel channel, Observable.Connected three, StreamNoise noise) {
        int t = three.separation();
        int sources = ensemble.connectedSources();
        double[] twoPoint = noise.made.get(channel.name());
        double size = channel.mean(t) * channel.noise(t) * theory.noise().connected() * channel.connectedGround();
        double[] out = new double[sources * (t + 1)];
        for (int s = 0; s < sources; s++) {
            for (int tau = 0; tau <= t; tau++) {
                out[s * (t + 1) + tau] = channel.connectedRatio(t, tau) * twoPoint[s * ensemble.timeExtent() + t]
                    + size * noise.connected(three, s, tau);
            }
        }
        return out;
    }

    /** X_b(x4) = V_b + sum_a Lambda_ba phi_a(x4) + hit noise, [time]. */
    private double[] slices(int operator, double[] phi, StreamNoise noise) {
        double[] out = new double[ensemble.timeExtent()];
        latent.operator(operator, phi, out, 0);
        double hits = latent.hitNoise(operator);
        if (hits > 0) {
            Gaussian gaussian = noise.hits.computeIfAbsent(operator, b -> gaussian(noise.stream, "hits/" + b));
            for (int x = 0; x < out.length; x++) {
                out[x] += hits * gaussian.next();
            }
        }
        return out;
    }

    /** All noise of one stream; each part has draws of its own. */
    private final class StreamNoise {

        private final String stream;
        private final double common = Math.sqrt(theory.noise().betweenHadrons());
        private final double own = Math.sqrt(1 - theory.noise().betweenHadrons());
        private final NoiseField ofAll;
        private final Map<String, NoiseField> ofHadron = new LinkedHashMap<>();
        private final Map<Observable, NoiseField> ofConnected = new LinkedHashMap<>();
        private final Map<Integer, Gaussian> hits = new LinkedHashMap<>();
        private final Map<String, double[]> made = new LinkedHashMap<>();     // two-point functions of this configuration

        StreamNoise(String stream) {
            this.stream = stream;
            int times = ensemble.timeExtent();
            ofAll = field("noise", ensemble.sources().count(), times);
            channels.keySet().forEach(hadron -> ofHadron.put(hadron, field("noise/" + hadron, ensemble.sources().count(), times)));
            for (Observable observable : observables) {
                if (observable instanceof Observable.Connected three) {
                    ofConnected.put(three, field("noise/" + three.id(), ensemble.connectedSources(), three.separation() + 1));
                }
            }
        }

        private NoiseField field(String purpose, int sources, int times) {
            return new NoiseField(gaussian(stream, purpose), sources, times, theory.noise());
        }

        void advance(double kept) {
            ofAll.advance(kept);
            ofHadron.values().forEach(field -> field.advance(kept));
            ofConnected.values().forEach(field -> field.advance(kept));
        }

        double twoPoint(String hadron, int source, int t) {
            return common * ofAll.at(source, t) + own * ofHadron.get(hadron).at(source, t);
        }

        double connected(Observable.Connected three, int source, int tau) {
            return ofConnected.get(three).at(source, tau);
        }
    }
}
