package tracewright.correlators;

import java.util.List;
import java.util.Map;
import java.util.SortedSet;
import tracewright.fitters.resampling.Resampling;
import tracewright.fitters.sampled.SampleGroup;
import tracewright.fitters.sampled.SampledVector;
import tracewright.study.Observable;

/**
 * The correlators of one ensemble with their samples, in lattice units; all share one group, so every covariance among them
 * is at hand.
 * <pre>
 *  C2(t)       t = 0 .. T/2; mesons folded, [C(t) + C(T - t)]/2
 *  C3(t, tau)  tau = 0 .. t, averaged with t - tau (same source and sink at zero momentum)
 *              connected as read; disconnected and gluonic: &lt;C2(t) X(t0 + tau)&gt; - &lt;C2(t)&gt; &lt;X(t0 + tau)&gt;
 * </pre>
 * The vacuum value is averaged over the same slices t0 + tau of the same sources as the product: fluctuations of X that have
 * nothing to do with the hadron then cancel in the difference (an average over all slices has the same expectation and,
 * with fewer sources than time slices, a larger error). The difference is biased by one over the number of independent
 * configurations (the factor 1 - v of a covariance); the jackknife estimate of that bias is subtracted.
 */
public final class Correlators {

    private final CorrelatorPlan plan;
    private final Columns columns;
    private final SampledVector table;
    private final int twoPointLength;

    private Correlators(CorrelatorPlan plan, Columns columns, SampledVector table, int twoPointLength) {
        this.plan = plan;
        this.columns = columns;
        this.table = table;
        this.twoPointLength = twoPointLength;
    }

    /** Averages a reduction over configurations, sample by sample, and subtracts the vacuum inside each. */
    public static Correlators of(Reduction reduction, CorrelatorPlan plan, Resampling resampling) {
        int half = reduction.timeExtent() / 2 + 1;
        Columns out = new Columns();
        plan.hadrons().forEach(h -> out.add(Columns.twoPoint(h), half));
        plan.connected().forEach(c -> out.add(Columns.connected(c), c.separation() + 1));
        plan.products().forEach((hadron, byOperator) -> byOperator.forEach((operator, separations) ->
            separations.forEach(t -> out.add(Columns.product(hadron, operator, t), t + 1))));
        Columns in = reduction.columns();
        SampledVector table = resampling.derived(reduction.values(), in.size(), out.size(),
            (means, row) -> derive(plan, reduction.timeExtent(), in, means, out, row), true);
        return new Correlators(plan, out, table, half);
    }

    private static void derive(CorrelatorPlan plan, int extent, Columns in, double[] means, Columns out, double[] row) {
        for (String h : plan.hadrons()) {
            fold(means, in.offset(Columns.twoPoint(h)), extent, plan.mesons().contains(h), row, out.offset(Columns.twoPoint(h)));
        }
        for (Observable.Connected c : plan.connected()) {
            Columns.Entry entry = Columns.connected(c);
            symmetrize(means, in.offset(entry), c.separation(), row, out.offset(entry));
        }
        for (Map.Entry<String, Map<Observable, SortedSet<Integer>>> byHadron : plan.products().entrySet()) {
            int twoPoint = in.offset(Columns.twoPoint(byHadron.getKey()));
            byHadron.getValue().forEach((operator, separations) -> separations.forEach(t -> {
                Columns.Entry entry = Columns.product(byHadron.getKey(), operator, t);
                subtracted(means, in.offset(entry), in.offset(Columns.slice(byHadron.getKey(), operator)), means[twoPoint + t], t, row, out.offset(entry));
            }));
        }
    }

    private static void fold(double[] means, int from, int extent, boolean meson, double[] row, int to) {
        for (int t = 0; t <= extent / 2; t++) {
            double forward = means[from + t];
            row[to + t] = meson && t > 0 ? 0.5 * (forward + means[from + extent - t]) : forward;
        }
    }

    /** row(tau) = average of c3 at tau and t - tau. */
    private static void symmetrize(double[] c3, int from, int t, double[] row, int to) {
        for (int tau = 0; tau <= t; tau++) {
            row[to + tau] = 0.5 * (c3[from + tau] + c3[from + t - tau]);
        }
    }

    /** c3(tau) minus c2 times vacuum(tau), averaged over tau and t - tau. */
    private static void subtracted(double[] means, int product, int vacuum, double c2, int t, double[] row, int to) {
        for (int tau = 0; tau <= t; tau++) {
            double here = means[product + tau] - c2 * means[vacuum + tau];
            double there = means[product + t - tau] - c2 * means[vacuum + t - tau];
            row[to + tau] = 0.5 * (here + there);
        }
    }

    public CorrelatorPlan plan() {
        return plan;
    }

    public SampleGroup group() {
        return table.group();
    }

    /** Number of time slices of {@link #twoPoint}: T/2 + 1. */
    public int twoPointLength() {
        return twoPointLength;
    }

    /** Two-point function [t], t = 0 .. T/2. */
    public SampledVector twoPoint(String hadron) {
        return run(Columns.twoPoint(hadron), twoPointLength);
    }

    /**
     * Three-point function at one separation, [tau], tau = 0 .. separation.
     *
     * @param operator a connected insertion (its own separation must be the one asked for), a loop or a density
     */
    public SampledVector threePoint(String hadron, Observable operator, int separation) {
        return run(entry(hadron, operator, separation), separation + 1);
    }

    /**
     * Two- and three-point functions side by side: first C2 at the given times, then C3 at each (separation, insertion).
     *
     * @param operators one for each three-point entry: the same loop or density, or the connected insertion of that separation
     */
    public SampledVector joint(String hadron, int[] twoPointTimes, List<? extends Observable> operators, int[] separations, int[] insertions) {
        int[] places = new int[twoPointTimes.length + separations.length];
        int two = columns.offset(Columns.twoPoint(hadron));
        for (int i = 0; i < twoPointTimes.length; i++) {
            places[i] = two + twoPointTimes[i];
        }
        for (int i = 0; i < separations.length; i++) {
            places[twoPointTimes.length + i] = columns.offset(entry(hadron, operators.get(i), separations[i])) + insertions[i];
        }
        return table.select(places);
    }

    private static Columns.Entry entry(String hadron, Observable operator, int separation) {
        return operator instanceof Observable.Connected c ? Columns.connected(c) : Columns.product(hadron, operator, separation);
    }

    private SampledVector run(Columns.Entry entry, int length) {
        int[] places = new int[length];
        int offset = columns.offset(entry);
        for (int i = 0; i < length; i++) {
            places[i] = offset + i;
        }
        return table.select(places);
    }
}
