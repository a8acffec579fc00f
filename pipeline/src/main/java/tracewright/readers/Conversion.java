package tracewright.readers;

import java.util.Optional;
import tracewright.study.Flavor;
import tracewright.study.Layout;
import tracewright.study.Layout.Boundary;
import tracewright.study.Layout.BoundarySign;
import tracewright.study.Layout.Counts;
import tracewright.study.Layout.TimeOrigin;

/**
 * From stored numbers of one dataset to the conventions of {@link tracewright.study.Observable}.
 * <pre>
 *  every number   times factor                     (sign, volume, flavours, normalisation)
 *  stored slice   t0 + t mod T, or t               (time axis absolute, or relative to the source)
 *  two-point      times eta where t0 + t &gt;= T      (eta = -1 if antiperiodic and still included: the sample sits beyond the boundary)
 *  connected      times eta if t0 + separation &gt;= T (the sign is the sink's and belongs to all insertions of that source)
 * </pre>
 *
 * @param stored   length of the stored time axis
 * @param kept     slices kept: T, or separation + 1
 * @param extent   T
 * @param absolute whether the time axis counts from the lattice's zero
 * @param perTime  eta of slices beyond the boundary (two-point); 1: nothing to do
 * @param perSink  eta of correlators whose sink is beyond the boundary (connected); 1: nothing to do
 */
record Conversion(int stored, int kept, int extent, boolean absolute, double perTime, double perSink, double factor) {

    static Conversion of(Layout layout, Layout.Dataset dataset) {
        int t = layout.timeExtent();
        double volume = (double) layout.spatialExtent() * layout.spatialExtent() * layout.spatialExtent();
        if (dataset instanceof Layout.Dataset.TwoPoint d) {
            return new Conversion(t, t, t, d.time() == TimeOrigin.ABSOLUTE, eta(d.boundary(), d.boundarySign()), 1, 1);
        }
        if (dataset instanceof Layout.Dataset.Connected d) {
            boolean absolute = d.time() == TimeOrigin.ABSOLUTE;
            int kept = d.separation() + 1;
            return new Conversion(absolute ? t : kept, kept, t, absolute, 1, eta(d.boundary(), d.boundarySign()), 1);
        }
        if (dataset instanceof Layout.Dataset.Loop d) {
            double sign = d.convention() == Layout.LoopConvention.TRACE_INVERSE ? -1 : 1;
            double flavors = d.flavor() == Flavor.LIGHT && d.counts() == Counts.ONE_FLAVOR ? 2 : 1;
            return new Conversion(t, t, t, false, 1, 1, sign * flavors * volume(d.volume(), volume));
        }
        Layout.Dataset.ActionDensity d = (Layout.Dataset.ActionDensity) dataset;
        return new Conversion(t, t, t, false, 1, 1, density(d) * volume(d.volume(), volume));
    }

    private static double eta(Boundary boundary, BoundarySign sign) {
        return boundary == Boundary.ANTIPERIODIC && sign == BoundarySign.INCLUDED ? -1 : 1;
    }

    private static double volume(Layout.Volume declared, double sites) {
        return declared == Layout.Volume.AVERAGE ? sites : 1;
    }

    /** E = G^2 / 4 = (t^2 E) / t^2, t in units of a^2. */
    private static double density(Layout.Dataset.ActionDensity d) {
        return switch (d.convention()) {
            case E -> 1;
            case G2 -> 0.25;
            case T2E -> 1 / (d.flowTime() * d.flowTime());
        };
    }

    /**
     * Converts one configuration.
     *
     * @param in          numbers of the configuration, [source][hit][time] at the distances of {@code steps} from {@code from}; read
     * @param sourceTimes [source]; one zero for loops and densities
     * @param out         [source][kept], flat; overwritten
     * @return whether all of {@code out} is finite
     */
    boolean apply(double[] in, int from, Steps steps, int[] sourceTimes, double[] out) {
        double residue = 0;
        for (int s = 0; s < sourceTimes.length; s++) {
            int t0 = sourceTimes[s];
            int base = from + s * steps.source();
            int before = Math.min(kept, extent - t0);
            double f = t0 + kept - 1 >= extent ? factor * perSink : factor;
            int start = absolute ? t0 : 0;
            int wrapped = absolute ? 0 : before;
            ConversionKernels.segment(in, base + start * steps.time(), steps, f, out, s * kept, before);
            ConversionKernels.segment(in, base + wrapped * steps.time(), steps, f * perTime, out, s * kept + before, kept - before);
            residue += ConversionKernels.residue(out, s * kept, kept);
        }
        return residue == 0;
    }

    /** Slice of the stored time axis that holds slice {@code t} of the result. */
    int storedSlice(int sourceTime, int t) {
        return absolute ? (sourceTime + t) % extent : t;
    }

    /** Distances between neighbours in a stored record; hits is the length of the hit axis. */
    record Steps(int source, int hit, int time, int hits) {
    }

    /** What is done to the numbers, for people; empty: nothing. */
    Optional<String> inWords() {
        StringBuilder words = new StringBuilder();
        if (absolute) {
            words.append(", time shifted to the source");
        }
        if (perTime < 0) {
            words.append(", sign removed from slices with t0 + t >= ").append(extent);
        }
        if (perSink < 0) {
            words.append(", sign removed from sources with t0 + ").append(kept - 1).append(" >= ").append(extent);
        }
        if (factor != 1) {
            words.append(", multiplied by ").append(factor);
        }
        return words.isEmpty() ? Optional.empty() : Optional.of(words.substring(2));
    }
}
