package tracewright.synth;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;

/**
 * Exact values of the invented theory for one baryon, on one ensemble or at the physical point (a = 0, physical pion mass):
 * what an analysis of the synthetic data should find. Energies in GeV.
 * <pre>
 *  anomaly = M - sigma_light - sigma_strange - closure        gluon = anomaly - gamma_m (sigma_light + sigma_strange)
 * </pre>
 *
 * @param spacingFm        lattice spacing, 0 at the physical point
 * @param pionMassGev      pion mass
 * @param massGev          mass of the baryon
 * @param sigmaLightGev    m &lt;ubar u + dbar d&gt;
 * @param sigmaStrangeGev  m_s &lt;sbar s&gt;
 * @param anomalyGev       &lt;(beta/2g) F^2 + gamma_m sum m qbar q&gt;
 * @param gluonGev         &lt;(beta/2g) F^2&gt;
 * @param closureGev       M - anomaly - sigma_light - sigma_strange
 */
public record TruthBudget(String ensemble, String hadron, double spacingFm, double pionMassGev, double massGev, double sigmaLightGev,
                          double sigmaStrangeGev, double anomalyGev, double gluonGev, double closureGev) {

    /** hbar c in GeV fm; exact since the 2019 SI fixed h, c and e: CODATA 2018. */
    public static final double HBARC_GEV_FM = 0.197_326_980_459_302_47;

    /** Name of the extrapolated point. */
    public static final String PHYSICAL = "physical";

    /** The exact values of one baryon on one ensemble. */
    public static TruthBudget of(Truth.Theory theory, Truth.Ensemble ensemble, String hadron) {
        return at(theory, ensemble.name(), ensemble.spacingFm(), ensemble.pionMassGev(), hadron);
    }

    /** The exact values of one baryon in the continuum at the physical pion mass. */
    public static TruthBudget physical(Truth.Theory theory, String hadron) {
        return at(theory, PHYSICAL, 0, theory.physicalPionGev(), hadron);
    }

    private static TruthBudget at(Truth.Theory theory, String name, double spacingFm, double pionGev, String hadron) {
        Truth.Baryon baryon = baryon(theory, hadron);
        double mass = baryon.mass().atGev(spacingFm, pionGev);
        double light = new Truth.Linear(0, baryon.mass().perMpi2(), baryon.sigmaLightPerFm2()).atGev(spacingFm, pionGev);
        double strange = baryon.sigmaStrange().atGev(spacingFm, pionGev);
        double anomaly = mass - light - strange - baryon.closureDefectGev();
        double gluon = anomaly - theory.gammaM() * (light + strange);
        return new TruthBudget(name, hadron, spacingFm, pionGev, mass, light, strange, anomaly, gluon, baryon.closureDefectGev());
    }

    static Truth.Baryon baryon(Truth.Theory theory, String hadron) {
        Truth.Baryon baryon = theory.baryons().get(hadron);
        Checks.that(baryon != null, "the theory has no baryon '" + hadron + "'; it has " + theory.baryons().keySet());
        return baryon;
    }

    /** Every baryon on every ensemble and at the physical point, in the order of the truth file. */
    public static List<TruthBudget> all(Truth truth) {
        List<TruthBudget> all = new ArrayList<>();
        for (Truth.Ensemble ensemble : truth.ensembles()) {
            truth.theory().baryons().keySet().forEach(hadron -> all.add(of(truth.theory(), ensemble, hadron)));
        }
        truth.theory().baryons().keySet().forEach(hadron -> all.add(physical(truth.theory(), hadron)));
        return all;
    }

    /** The values that lattice ratios on the ensemble give, in units of the spacing; meaningless at the physical point. */
    public Lattice lattice(Truth.Theory theory) {
        Checks.that(spacingFm > 0, "no lattice units at the physical point");
        Truth.Baryon baryon = baryon(theory, hadron);
        double gev = spacingFm / HBARC_GEV_FM;
        double lightMass = lightQuarkGev(theory, pionMassGev);
        double condensate = sigmaLightGev / lightMass;
        double element = gluonGev * gev / (-2 * theory.b0());
        Map<Double, Double> flowed = new LinkedHashMap<>();
        for (Truth.FlowedDensity density : theory.operators().densities()) {
            flowed.put(density.flowTime(), element * (1 + theory.flowSlope() * density.flowTime()));
        }
        return new Lattice(massGev * gev, pionMassGev * gev, lightMass * gev, theory.strangeMassGev() * gev,
            condensate * baryon.connectedFraction(), condensate * (1 - baryon.connectedFraction()), sigmaStrangeGev / theory.strangeMassGev(),
            element, flowed);
    }

    /** Mass of one light quark from Mpi^2 = 2 B m, in GeV. */
    static double lightQuarkGev(Truth.Theory theory, double pionGev) {
        return pionGev * pionGev / (2 * theory.condensateGev());
    }

    /**
     * Lattice units.
     *
     * @param mass              a M
     * @param pionMass          a Mpi
     * @param lightQuarkMass    a m of one light quark
     * @param strangeQuarkMass  a m_s
     * @param lightConnected    connected part of &lt;ubar u + dbar d&gt;
     * @param lightDisconnected disconnected part of &lt;ubar u + dbar d&gt;
     * @param strange           &lt;sbar s&gt;
     * @param density           a &lt;E&gt; at flow time zero, gluon part over -2 b0; negative
     * @param flowedDensity     a &lt;E(t)&gt; by flow time t/a^2
     */
    public record Lattice(double mass, double pionMass, double lightQuarkMass, double strangeQuarkMass, double lightConnected,
                          double lightDisconnected, double strange, double density, Map<Double, Double> flowedDensity) {
    }
}
