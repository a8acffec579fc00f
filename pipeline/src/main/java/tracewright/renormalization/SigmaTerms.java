package tracewright.renormalization;

import tracewright.fitters.sampled.SampledNumber;
import tracewright.study.Study;

/** Sigma terms sigma_q = m_q &lt;qbar q&gt; in MeV. */
public final class SigmaTerms {

    private SigmaTerms() {
    }

    /**
     * Route of the study for one flavour.
     *
     * @param massLattice bare quark mass a m_q; for the light flavour the average of up and down
     * @param element     bare &lt;qbar q&gt;, connected plus disconnected; for the light flavour &lt;ubar u + dbar d&gt;
     * @param mevPerUnit  hbar c / a in MeV
     */
    public static Renormalized of(Study.SigmaRoute route, SampledNumber massLattice, SampledNumber element, SampledNumber mevPerUnit) {
        if (route instanceof Study.SigmaRoute.Invariant) {
            return Renormalized.invariant(SampledNumber.evaluate(v -> v[0] * v[1] * v[2], massLattice, element, mevPerUnit), "invariant");
        }
        throw new IllegalStateException("no sigma terms by route " + route);
    }
}
