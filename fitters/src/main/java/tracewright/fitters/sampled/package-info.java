/**
 * Sampled numbers: values that carry, for each independent cause of uncertainty, the samples of that cause. Correlations
 * between any two numbers and the share of each cause in a variance are then sums, not further analyses.
 * <pre>
 *   SampleGroup "A1"  jackknife of 120 blocks ----+
 *   SampleGroup "input:spacing"  +1, -1 ----------+--&gt; SampledNumber: central value, samples by group
 *   SampleGroup "choice:window"  7 alternatives --+          |
 *                                                           +--&gt; evaluate(f, x, y)   group by group over the union
 *   SampledVector: many numbers of one ensemble             +--&gt; covariance(x, y), varianceByGroup
 *                  in flat arrays, for kernels              +--&gt; neighbourTerm, integratedTime: were the blocks long enough?
 * </pre>
 * Blocks have names (stream and place on a grid of trajectories), so numbers from two cuts of one ensemble align block by
 * block. Start reading at {@link tracewright.fitters.sampled.SampledNumber}.
 */
package tracewright.fitters.sampled;
