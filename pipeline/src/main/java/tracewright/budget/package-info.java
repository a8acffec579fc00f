/**
 * The budget: which part of a hadron's mass comes from which term of the trace of the energy-momentum tensor.
 * <pre>
 *  M = anomaly + sum sigma_f                         "trace":        each term separately renormalisation-group invariant
 *  M = (beta/2g) F^2 + sum (1 + gamma_m) sigma_f     "trace-scheme": terms in a stated scheme and at a stated scale
 *      anomaly = (beta/2g) F^2 + gamma_m sum sigma_f
 * </pre>
 * Collins, Duncan, Joglekar, Phys. Rev. D 16 (1977) 438; Nielsen, Nucl. Phys. B 120 (1977) 212; Adler, Collins, Duncan,
 * Phys. Rev. D 15 (1977) 1712. All in MeV; matrix elements are &lt;p|O|p&gt;/(2M) at rest. Every term, fraction and closure is a
 * sampled number, so their correlations follow.
 */
package tracewright.budget;
