/**
 * From values per configuration to means with samples: blocks anchored to trajectory numbers, jackknife and bootstrap over
 * them, conversion between the two, and the choice of the block length.
 * <pre>
 *   streams, trajectories, cuts --&gt; Blocking --+--&gt; Resampling (jackknife | bootstrap) --&gt; SampleGroup
 *   seed, ensemble ----&gt; Draws (Philox) -------+         |
 *                                                        v
 *   values [configuration][i] --&gt; block sums [block][i] --&gt; SampledVector: central[i], samples[k][i]
 *
 *   IntegratedTime --&gt; BlockLength: Chosen | Impossible
 * </pre>
 * Everything is a pure function of its arguments: multiplicities depend on seed, ensemble, sample and block label alone, and
 * sums run in Monte Carlo order, so that neither threads nor the order on disk change a bit. Start reading at
 * {@link tracewright.fitters.resampling.Resampling}.
 */
package tracewright.fitters.resampling;
