/**
 * The command line: words to calls, outcomes to exit statuses.
 * <pre>
 *  tracewright run|validate|synth ... --&gt; study, analysis, results, report, synth --&gt; 0 done, 1 bug, 2 usage, 3 data, 4 requirement
 * </pre>
 * Errors go to standard error, results to files, tables to standard output. Start reading at {@code Main}.
 */
package tracewright.cli;
