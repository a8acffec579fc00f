/**
 * Synthetic ensembles of an invented theory, whose every expectation value is known exactly.
 * <pre>
 *  truth.yaml --&gt; Truth --+--&gt; TruthBudget        what an analysis should find
 *                         +--&gt; SyntheticEnsemble  the measured numbers, in memory (an EnsembleSource)
 *                                     +--&gt; files in the layout that a Layout describes
 * </pre>
 * The recipe, for configuration i, source at t0, T slices, operators b (loops, densities) and as many latent fields a:
 * <pre>
 *  phi_a(x4; i)      unit normals, independent between a and x4, autoregressive in i: rho = (2 tau_int - 1)/(2 tau_int + 1),
 *                    rho^k over a gap of k configurations
 *  X_b(x4; i)      = V_b + sum_a Lambda_ba phi_a(x4; i) [+ hit noise]          Sigma = Lambda Lambda^T, Cholesky
 *  w_a(t, tau)     = sum_b (Lambda^-1)_ab R_b(t, tau)                          0 &lt;= tau &lt;= t, R_b of {@link tracewright.synth.TwoStates}
 *  C2(t; t0, i)    = Cbar(t) [ 1 + sum_{tau, a} w_a(t, tau) phi_a(t0 + tau; i) + N(t) e(t; t0, i) ]
 *  C3(t, tau; t0, i) = Rconn(t, tau) C2(t; t0, i) + Cbar(t) N(t) n3 g00 e'(tau; t0, i)
 *  N(t)            = n0 exp((M - 3/2 Mpi) t) for baryons (Parisi 1984, Lepage 1989), constant for the pion
 * </pre>
 * Because the phi are independent unit normals, for every t, tau and b exactly
 * <pre>
 *  &lt;C2(t; t0) X_b(t0 + tau)&gt; - &lt;C2&gt; &lt;X_b&gt; = Cbar(t) R_b(t, tau),    &lt;C2&gt; = Cbar(t),    &lt;X_b&gt; = V_b
 *  Var[C2]/Cbar^2 = sum w^2 + N(t)^2
 * </pre>
 * Numbers are in the conventions of {@link tracewright.study.Observable}, energies of the truth in GeV, lengths in fm.
 */
package tracewright.synth;
