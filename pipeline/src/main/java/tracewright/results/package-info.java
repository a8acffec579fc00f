/**
 * What a run hands over: one immutable {@link tracewright.results.Results} value, and the files written from it.
 * <pre>
 *                       +--&gt; ResultsJson   results.json     contract tracewright-results/1, see results.schema.json
 *  stages --&gt; Results --+--&gt; BudgetCsv     budget.csv       one row per contribution
 *                       +--&gt; SamplesHdf5   samples.h5       every number with its samples, covariance of all
 *                       +--&gt; BudgetTable   terminal
 *             Figure ------&gt; FigureCsv     plots/*.csv      the numbers of a plot
 *             Provenance --------------&gt;   provenance.json  what was read, with which program and cuts
 *
 *  all files --&gt; OutputFolder: lock, staging folder beside the target, flush, rename; whole or not at all
 * </pre>
 * Comes in: central values and samples in MeV, in lattice units or as pure numbers, as {@code Results.Quantity.unit} says; budgets
 * in MeV. Goes out: bytes that depend on the arguments alone; no clock, no locale, no environment (the lock of the output folder,
 * which names host and process, is no output). Published errors come from one place, {@code Published}; machine files carry
 * all digits of a double (the shortest text that reads back to it) and never NaN or infinity. Start reading at {@code ResultsJson}.
 */
package tracewright.results;
