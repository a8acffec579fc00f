package tracewright.synth;

import java.util.ArrayList;
import java.util.List;

/** One hadron's exact correlators on one ensemble in lattice units, and how they move with the latent fields. */
final class Channel {

    private final String name;
    private final boolean baryon;
    private final int timeExtent;
    private final int fields;
    private final double[] mean;            // [t], <C2>
    private final double[] noise;           // [t], N(t)
    private final double[] weights;         // [t][tau <= t][a], packed
    private final TwoStates states;
    private final TwoStates.Elements connected;

    private Channel(String name, boolean baryon, int timeExtent, int fields, TwoStates states, TwoStates.Elements connected) {
        this.name = name;
        this.baryon = baryon;
        this.timeExtent = timeExtent;
        this.fields = fields;
        this.states = states;
        this.connected = connected;
        this.mean = new double[timeExtent];
        this.noise = new double[timeExtent];
        this.weights = new double[fields * timeExtent * (timeExtent + 1) / 2];
    }

    static Channel pion(Truth.Theory theory, Truth.Ensemble ensemble, LatentFields fields) {
        double gev = ensemble.spacingFm() / TruthBudget.HBARC_GEV_FM;
        Truth.Pion pion = theory.pion();
        TwoStates states = new TwoStates(pion.amplitude(), ensemble.pionMassGev() * gev, pion.excited().gapGev() * gev, pion.excited().ratio());
        Channel channel = new Channel(pion.name(), false, ensemble.timeExtent(), fields.count(), states, new TwoStates.Elements(0, 0, 0));
        for (int t = 0; t < ensemble.timeExtent(); t++) {
            channel.mean[t] = states.periodic(t, ensemble.timeExtent());
            channel.noise[t] = theory.noise().pion();
        }
        return channel;
    }

    static Channel baryon(Truth.Theory theory, Truth.Ensemble ensemble, String hadron, LatentFields fields) {
        double gev = ensemble.spacingFm() / TruthBudget.HBARC_GEV_FM;
        Truth.Baryon baryon = theory.baryons().get(hadron);
        TruthBudget.Lattice exact = TruthBudget.of(theory, ensemble, hadron).lattice(theory);
        TwoStates states = new TwoStates(baryon.amplitude(), exact.mass(), baryon.excited().gapGev() * gev, baryon.excited().ratio());
        Channel channel = new Channel(hadron, true, ensemble.timeExtent(), fields.count(), states,
            TwoStates.Elements.of(exact.lightConnected(), baryon.connected()));
        double growth = exact.mass() - 1.5 * exact.pionMass();
        for (int t = 0; t < ensemble.timeExtent(); t++) {
            channel.mean[t] = states.forward(t);
            channel.noise[t] = theory.noise().baryon() * StrictMath.exp(growth * t);
        }
        channel.weigh(elements(theory, baryon, exact), fields);
        return channel;
    }

    private static List<TwoStates.Elements> elements(Truth.Theory theory, Truth.Baryon baryon, TruthBudget.Lattice exact) {
        List<TwoStates.Elements> all = new ArrayList<>();
        all.add(TwoStates.Elements.of(exact.lightDisconnected(), baryon.loops()));
        all.add(TwoStates.Elements.of(exact.strange(), baryon.loops()));
        for (Truth.FlowedDensity density : theory.operators().densities()) {
            all.add(TwoStates.Elements.of(exact.flowedDensity().get(density.flowTime()), baryon.gluon()));
        }
        return all;
    }

    private void weigh(List<TwoStates.Elements> elements, LatentFields latent) {
        double[] ratio = new double[fields];
        for (int t = 0; t < timeExtent; t++) {
            for (int tau = 0; tau <= t; tau++) {
                for (int b = 0; b < fields; b++) {
                    ratio[b] = states.ratio(elements.get(b), t, tau);
                }
                latent.weights(ratio, weights, at(t) + tau * fields);
            }
        }
    }

    private int at(int t) {
        return fields * t * (t + 1) / 2;
    }

    String name() {
        return name;
    }

    boolean isBaryon() {
        return baryon;
    }

    double mean(int t) {
        return mean[t];
    }

    double noise(int t) {
        return noise[t];
    }

    double connectedRatio(int t, int tau) {
        return states.ratio(connected, t, tau);
    }

    double connectedGround() {
        return connected.g00();
    }

    /** Sum over tau and fields of w^2 at that sink time: variance of C2/Cbar that comes from the latent fields. */
    double signalVariance(int t) {
        double sum = 0;
        for (int k = at(t); k < at(t + 1); k++) {
            sum += weights[k] * weights[k];
        }
        return sum;
    }

    /** sum over tau and a of w_a(t, tau) phi_a(t0 + tau), with phi already shifted to the source: [tau][a]. */
    double response(double[] shifted, int t) {
        int from = at(t);
        int n = fields * (t + 1);
        double sum = 0;
        for (int k = 0; k < n; k++) {
            sum += weights[from + k] * shifted[k];
        }
        return sum;
    }
}
