/**
 * Which configurations of an ensemble take part, and in which blocks.
 * <pre>
 *  labels of every observable --+
 *                               +--&gt; Selection (kept, removed by which cut) --+
 *  Study.Cuts ------------------+                                             +--&gt; Blocking
 *  series of the observables ------&gt; BlockChoice (integrated times, length) --+
 * </pre>
 * Works on labels alone; opens no numbers. Trajectory numbers are those of the files. Start reading at {@code Selection}.
 */
package tracewright.cuts;
