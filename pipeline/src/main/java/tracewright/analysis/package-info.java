/**
 * The whole chain, from ensembles that can be read to everything that is written.
 * <pre>
 *  Study, EnsembleSource --EnsembleStage--&gt; correlators with samples            (one per ensemble)
 *                        --HadronStage----&gt; energies, bare matrix elements     (one per ensemble and hadron)
 *                        --BudgetStage----&gt; contributions in MeV, budgets      (per ensemble, then at the physical point)
 *                        --Publication----&gt; Results: quantities, budgets, figures
 * </pre>
 * Work is cut into units that do not depend on each other; each has its own slot, so the outcome is the same for any number
 * of threads. Start reading at {@code Analysis}.
 */
package tracewright.analysis;
