package tracewright.renormalization;

/**
 * First two coefficients of the beta function of SU(3) with n flavours, which do not depend on the scheme:
 * <pre>
 *  mu dg/dmu = -g^3 (b0 + b1 g^2 + ...),   b0 = (11 - 2n/3)/(4 pi)^2,   b1 = (102 - 38n/3)/(4 pi)^4
 * </pre>
 * Gross, Wilczek, Phys. Rev. Lett. 30 (1973) 1343; Politzer, ibid. 1346; Caswell, Phys. Rev. Lett. 33 (1974) 244;
 * Jones, Nucl. Phys. B75 (1974) 531.
 */
public record BetaFunction(int flavors) {

    private static final double FOUR_PI_SQUARED = 16 * Math.PI * Math.PI;

    public BetaFunction {
        if (flavors < 0 || flavors > 6) {
            throw new IllegalArgumentException(flavors + " active flavours; need 0 to 6");
        }
    }

    public double b0() {
        return (11 - 2 * flavors / 3.0) / FOUR_PI_SQUARED;
    }

    public double b1() {
        return (102 - 38 * flavors / 3.0) / (FOUR_PI_SQUARED * FOUR_PI_SQUARED);
    }
}
