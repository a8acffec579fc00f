package tracewright.readers;

import java.util.Locale;
import tracewright.study.Layout;

/** What the layout declares a dataset to be, as a sentence a physicist can object to. */
final class Meaning {

    private Meaning() {
    }

    static String of(Layout.Dataset dataset) {
        if (dataset instanceof Layout.Dataset.TwoPoint d) {
            return "two-point function of the " + d.hadron() + correlator(d.time(), d.boundary(), d.boundarySign());
        }
        if (dataset instanceof Layout.Dataset.Connected d) {
            return "connected scalar insertion of the " + d.flavor().word() + counted(d.counts()) + " in the " + d.hadron() + ", sink " + d.separation()
                + " after the source" + correlator(d.time(), d.boundary(), d.boundarySign());
        }
        if (dataset instanceof Layout.Dataset.Loop d) {
            String sign = d.convention() == Layout.LoopConvention.TRACE_INVERSE ? "Tr D^-1" : "-Tr D^-1 (the operator's sign)";
            return d.flavor().word() + " quark loop" + counted(d.counts()) + " stored as " + sign + volume(d.volume());
        }
        Layout.Dataset.ActionDensity d = (Layout.Dataset.ActionDensity) dataset;
        return "gluon action density at flow time " + d.flowTime() + " a^2, stored as " + density(d.convention()) + volume(d.volume());
    }

    private static String counted(Layout.Counts counts) {
        return counts == Layout.Counts.ONE_FLAVOR ? " (one flavor)" : " (u+d)";
    }

    private static String volume(Layout.Volume volume) {
        return volume == Layout.Volume.SUM ? ", summed over space" : ", averaged over space";
    }

    private static String density(Layout.DensityConvention convention) {
        return switch (convention) {
            case E -> "E";
            case G2 -> "G^2 = 4 E";
            case T2E -> "t^2 E";
        };
    }

    private static String correlator(Layout.TimeOrigin time, Layout.Boundary boundary, Layout.BoundarySign sign) {
        return (time == Layout.TimeOrigin.ABSOLUTE ? ", time counted from the lattice's zero" : ", time counted from the source") + ", "
            + boundary.name().toLowerCase(Locale.ROOT) + " in time"
            + (boundary == Layout.Boundary.PERIODIC ? "" : sign == Layout.BoundarySign.INCLUDED ? " with the sign still included" : " with the sign already removed");
    }
}
