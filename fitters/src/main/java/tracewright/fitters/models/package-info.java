/**
 * Models of correlators and ratios: values, analytic derivatives, and start values found from the data.
 * <pre>
 *  Exponentials, PeriodicExponentials   C(t) = sum A_n exp(-E_n t) [+ t -&gt; T - t],   E_n = E_0 + sum exp(delta_k)
 *  TwoStateJoint                        C2(t) and C3(t, tau) with common energies and overlaps
 *  Plateau, Summation                   R = g00,   S(t) = c + g00 t
 *  LinearTerms                          f_i = sum_j b_j X_ij
 *
 *  data, errors --MatrixPencil, grid--&gt; ExponentialStarts: energies, then amplitudes by linear least squares
 * </pre>
 * Times and energies in lattice units. The spectral forms are the only physics in this library.
 */
package tracewright.fitters.models;
