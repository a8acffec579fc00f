package tracewright.study;

/** Constants of conversion between lattice units and MeV. */
public final class Units {

    /** hbar c in MeV fm; exact since the 2019 SI fixed h, c and e: CODATA 2018. */
    public static final double HBARC_MEV_FM = 197.326_980_459_302_46;

    private Units() {
    }
}
