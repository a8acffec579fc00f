/**
 * From correlators with samples to energies and matrix elements, in lattice units.
 * <pre>
 *  C2(t) ------------------+--&gt; EnergyFits ------&gt; energy
 *                          |
 *  C2(t), C3(t, tau) ------+--&gt; ElementFits -----&gt; &lt;O&gt; by plateau, summation, two-state fit
 *                                    |
 *                  every window -----+--&gt; average with Akaike-type weights, spread as a choice group
 * </pre>
 * Formulas: a two-point function is sum_n A_n exp(-E_n t); a ratio R(t, tau) = C3/C2 tends to the ground-state element g00.
 * All fits are kept with chi-squared, expectation, p-value and weight. Start reading at {@code WindowAverage}.
 */
package tracewright.extraction;
