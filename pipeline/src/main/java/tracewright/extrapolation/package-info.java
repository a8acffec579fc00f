/**
 * From several ensembles to the physical point.
 * <pre>
 *  O(ensemble), a^2, Mpi^2 (all sampled numbers) --PhysicalPoint--&gt; O_0, coefficients, chi-squared
 *  O = O_0 + k1 a^2 + k2 (Mpi^2 - Mpi_phys^2)
 * </pre>
 * Errors of the abscissas enter because the fit is repeated inside every sample of every cause of uncertainty.
 * Units: O in MeV, a in fm, Mpi in GeV.
 */
package tracewright.extrapolation;
