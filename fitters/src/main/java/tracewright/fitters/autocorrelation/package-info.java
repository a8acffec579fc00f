/**
 * How long a Markov chain remembers: integrated autocorrelation time, the error of a mean that follows from it, and whether
 * the streams of an ensemble agree. Values go in with the stream and trajectory of each configuration, in any order; gaps
 * and uneven spacing are allowed. A chain that is too short says so and gives what it has as a lower bound.
 * <pre>
 *   streams, trajectories, values --&gt; Series (fluctuations d, sorted) --&gt; Gamma(t) --&gt; window W --+--&gt; Measured
 *                                                                                               +--&gt; TooShort (bound, length that would do)
 *    Gamma(t)
 *      |*
 *      | *                             tau = C(W) / 2 Gamma(0)
 *      |   *                           area up to W, both signs of t
 *      |      *   *
 *      +-----------|--*-----*--&gt; t     W: bias of stopping here = noise of going on
 *                  W     *
 * </pre>
 * Start reading at {@link tracewright.fitters.autocorrelation.IntegratedTime}.
 */
package tracewright.fitters.autocorrelation;
