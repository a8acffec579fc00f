package tracewright.synth;

/**
 * Two-point function and ratio of a channel with a ground and one excited state, in lattice units.
 * <pre>
 *  C(t)     = A e^{-Mt} (1 + r e^{-Dt})
 *  R(t,tau) = [ g00 + sqrt(r) g01 (e^{-D tau} + e^{-D(t-tau)}) + r g11 e^{-Dt} ] / (1 + r e^{-Dt})
 * </pre>
 * Spectral decomposition with equal source and sink at zero momentum; r = A1/A0, D = E1 - E0.
 */
public record TwoStates(double amplitude, double mass, double gap, double ratio) {

    /** Elements of one operator: g00 and, in the same units, g01 and g11. */
    public record Elements(double g00, double g01, double g11) {

        static Elements of(double g00, Truth.Mixing relative) {
            return new Elements(g00, g00 * relative.g01(), g00 * relative.g11());
        }
    }

    /** Forward-running two-point function. */
    public double forward(int t) {
        return amplitude * StrictMath.exp(-mass * t) * (1 + ratio * StrictMath.exp(-gap * t));
    }

    /** Two-point function of a meson on a periodic lattice of T slices. */
    public double periodic(int t, int timeExtent) {
        return forward(t) + forward(timeExtent - t);
    }

    /** R(t, tau) for 0 &lt;= tau &lt;= t. */
    public double ratio(Elements g, int t, int tau) {
        double both = StrictMath.exp(-gap * tau) + StrictMath.exp(-gap * (t - tau));
        double end = StrictMath.exp(-gap * t);
        return (g.g00() + Math.sqrt(ratio) * g.g01() * both + ratio * g.g11() * end) / (1 + ratio * end);
    }
}
