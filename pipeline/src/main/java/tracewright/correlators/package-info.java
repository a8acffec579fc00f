/**
 * From records on disk to correlators with samples.
 * <pre>
 *  EnsembleSource --Reduction--&gt; one row per configuration: C2(t), C3(t,tau), C2(t) X(t0+tau), X(t0+tau)   (source averages)
 *                                        |
 *                 Blocking, Resampling --+--Correlators--&gt; C2(t) folded, C3(t,tau) connected and vacuum-subtracted, with samples
 * </pre>
 * Lattice units throughout. X is a loop (operator sign) or a density per time slice; the vacuum is subtracted inside every
 * sample, and the bias of order 1/N that this leaves is removed by the jackknife. Start reading at {@code Correlators}.
 */
package tracewright.correlators;
