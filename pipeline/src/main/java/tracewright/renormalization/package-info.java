/**
 * From bare matrix elements in lattice units to renormalised contributions in MeV.
 * <pre>
 *  &lt;qbar q&gt; connected + disconnected, a m_q --SigmaTerms--&gt; sigma_q = m_q &lt;qbar q&gt;           (invariant)
 *  a&lt;E&gt;(t) at flow times t ------------------GluonPart----&gt; &lt;(beta/2g) F^2&gt;                  (flow, given factor)
 *  both, gamma_m ----------------------------Anomaly------&gt; &lt;(beta/2g) F^2 + gamma_m sum m qbar q&gt;
 * </pre>
 * Conventions: gamma_m = -d ln m / d ln mu is positive; E = (1/4) G^a G^a with the coupling inside G = gF, so that
 * (beta/2g) F^2 = (2 beta(g)/g^3) E. Route, scheme and scale travel with every number ({@code Renormalized}).
 */
package tracewright.renormalization;
