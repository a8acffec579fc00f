package tracewright.synth;

import java.util.Arrays;
import tracewright.study.Flavor;
import tracewright.study.Layout;
import tracewright.study.Observable;

/**
 * From the conventions of {@link Observable} to those of one dataset of a layout, the reverse of what a reader does:
 * <pre>
 *  every number  divided by sign, volume, flavours and normalisation
 *  slice t       at t0 + t mod T (absolute), or at t (relative to the source)
 *  two-point     times -1 where t0 + t &gt;= T, if antiperiodic and the sign is included
 *  connected     times -1 if t0 + separation &gt;= T, likewise: the sign is the sink's
 * </pre>
 *
 * @param times    length of the stored time axis
 * @param extent   T
 * @param absolute whether the time axis counts from the lattice's zero
 * @param twoPoint sign beyond the boundary, slice by slice
 * @param sink     sign of correlators whose sink is beyond the boundary
 * @param factor   what a stored number has to be multiplied by
 */
record StoredForm(int times, int extent, boolean absolute, double twoPoint, double sink, double factor) {

    static StoredForm of(Layout layout, Layout.Dataset dataset) {
        int extent = layout.timeExtent();
        if (dataset instanceof Layout.Dataset.TwoPoint d) {
            return new StoredForm(extent, extent, d.time() == Layout.TimeOrigin.ABSOLUTE, sign(d.boundary(), d.boundarySign()), 1, 1);
        }
        if (dataset instanceof Layout.Dataset.Connected d) {
            Checks.layout(d.flavor() == Flavor.LIGHT && d.counts() == Layout.Counts.UP_PLUS_DOWN,
                "connected insertions of a synthetic ensemble are light, u+d");
            boolean absolute = d.time() == Layout.TimeOrigin.ABSOLUTE;
            return new StoredForm(absolute ? extent : d.separation() + 1, extent, absolute, 1, sign(d.boundary(), d.boundarySign()), 1);
        }
        double sites = (double) layout.spatialExtent() * layout.spatialExtent() * layout.spatialExtent();
        if (dataset instanceof Layout.Dataset.Loop d) {
            double sign = d.convention() == Layout.LoopConvention.TRACE_INVERSE ? -1 : 1;
            double flavors = d.flavor() == Flavor.LIGHT && d.counts() == Layout.Counts.ONE_FLAVOR ? 2 : 1;
            return new StoredForm(extent, extent, false, 1, 1, sign * flavors * volume(d.volume(), sites));
        }
        Layout.Dataset.ActionDensity d = (Layout.Dataset.ActionDensity) dataset;
        return new StoredForm(extent, extent, false, 1, 1, normalisation(d) * volume(d.volume(), sites));
    }

    private static double sign(Layout.Boundary boundary, Layout.BoundarySign sign) {
        return boundary == Layout.Boundary.ANTIPERIODIC && sign == Layout.BoundarySign.INCLUDED ? -1 : 1;
    }

    private static double volume(Layout.Volume volume, double sites) {
        return volume == Layout.Volume.AVERAGE ? sites : 1;
    }

    /** E = G^2/4 = (t^2 E)/t^2. */
    private static double normalisation(Layout.Dataset.ActionDensity d) {
        return switch (d.convention()) {
            case E -> 1;
            case G2 -> 0.25;
            case T2E -> 1 / (d.flowTime() * d.flowTime());
        };
    }

    /**
     * Numbers of one configuration as they are stored, [source][stored time]; what was never measured on an absolute axis is zero.
     *
     * @param sourceTimes [source]; empty for loops and densities
     * @param values      [source][t] or [time]; read
     */
    double[] encode(int[] sourceTimes, double[] values) {
        int[] sources = sourceTimes.length == 0 ? new int[1] : sourceTimes;
        int measured = values.length / sources.length;
        double[] out = new double[sources.length * times];
        Arrays.fill(out, 0);
        for (int s = 0; s < sources.length; s++) {
            double f = sources[s] + measured - 1 >= extent ? sink / factor : 1 / factor;
            for (int t = 0; t < measured; t++) {
                int slot = absolute ? (sources[s] + t) % extent : t;
                out[s * times + slot] = values[s * measured + t] * f * (sources[s] + t >= extent ? twoPoint : 1);
            }
        }
        return out;
    }
}
