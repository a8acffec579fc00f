/**
 * Averages over fit windows and models, with their spread as a cause of uncertainty of its own.
 * <pre>
 *  candidates (value, criterion) --weights p_i = exp(-IC_i/2)--&gt; sum p_i x_i,  group choice: x_i with p_i,  group fit: noise of covariances
 * </pre>
 */
package tracewright.fitters.averaging;
