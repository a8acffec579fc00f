package tracewright.extraction;

import java.nio.file.Path;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Random;
import java.util.Set;
import java.util.TreeSet;
import tracewright.correlators.CorrelatorPlan;
import tracewright.correlators.Correlators;
import tracewright.correlators.HandMade;
import tracewright.correlators.Reduction;
import tracewright.cuts.Selection;
import tracewright.fitters.resampling.Resampling;
import tracewright.study.Flavor;
import tracewright.study.InputRef;
import tracewright.study.Observable;
import tracewright.study.Study;
import tracewright.study.UncertainValue;

/**
 * Correlators of two states that are known exactly, with independent relative noise:
 * <pre>
 *  C2(t) = exp(-M t) (1 + r exp(-D t))          pion: plus t -&gt; T - t
 *  R(t, tau) = [g00 + sqrt(r) g01 (exp(-D tau) + exp(-D (t - tau))) + r g11 exp(-D t)] / [1 + r exp(-D t)]
 * </pre>
 * M = 0.45, D = 0.3, g00, g01, g11 = 3, -0.8, 1.5, on 48 time slices.
 */
record TwoStateToy(double r) {

    static final double M = 0.45;
    static final double D = 0.3;
    static final double G00 = 3;
    static final int EXTENT = 48;

    double twoPoint(int t) {
        return StrictMath.exp(-M * t) * (1 + r * StrictMath.exp(-D * t));
    }

    double ratio(int t, int tau) {
        double off = -0.8 * Math.sqrt(r) * (StrictMath.exp(-D * tau) + StrictMath.exp(-D * (t - tau)));
        return (G00 + off + 1.5 * r * StrictMath.exp(-D * t)) / (1 + r * StrictMath.exp(-D * t));
    }

    static Observable.Connected insertion(int separation) {
        return new Observable.Connected("nucleon", Flavor.LIGHT, separation);
    }

    /** Nucleon, pion and connected insertions of the nucleon on {@code configurations} independent configurations, one block each. */
    Correlators correlators(int configurations, double noise, Set<Integer> separations) {
        HandMade source = new HandMade(EXTENT);
        Random random = new Random(20_24);
        for (int i = 1; i <= configurations; i++) {
            int[] origin = {0};
            double[] nucleon = new double[EXTENT];
            double[] pion = new double[EXTENT];
            for (int t = 0; t < EXTENT; t++) {
                nucleon[t] = twoPoint(t) * (1 + noise * random.nextGaussian());
                pion[t] = (twoPoint(t) + twoPoint(EXTENT - t)) * (1 + noise * random.nextGaussian());
            }
            source.with(new Observable.TwoPoint("nucleon"), i, origin, nucleon).with(new Observable.TwoPoint("pion"), i, origin, pion);
            for (int t : new TreeSet<>(separations)) {
                double[] c3 = new double[t + 1];
                for (int tau = 0; tau <= t; tau++) {
                    c3[tau] = twoPoint(t) * ratio(t, tau) * (1 + noise * random.nextGaussian());
                }
                source.with(insertion(t), i, origin, c3);
            }
        }
        CorrelatorPlan plan = new CorrelatorPlan(List.of("nucleon", "pion"), Set.of("pion"), separations.stream().sorted().map(TwoStateToy::insertion).toList(),
            Map.of());
        Selection selection = Selection.of(source, plan.observables(), ensemble());
        return Correlators.of(Reduction.read(source, selection, plan, 1), plan, Resampling.jackknife("toy", selection.blocks(1)));
    }

    private static Study.Ensemble ensemble() {
        return new Study.Ensemble("toy", Path.of("layout"), Path.of("data"), new InputRef("spacing", new UncertainValue(0.1, 0)), Map.of(), List.of(),
            new Study.Cuts(0, List.of(), List.of(), 1, Optional.empty(), Optional.empty(), Study.Cuts.Missing.ERROR, new Study.BlockChoice(Optional.of(1))));
    }
}
