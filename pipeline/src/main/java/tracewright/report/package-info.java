/**
 * What a person reads at the end of a run: one self-contained HTML page, and each plot as a file of its own.
 * <pre>
 *  Results --+--&gt; HtmlReport --&gt; SummarySection, EnsembleSection, ... --&gt; Html --&gt; report.html
 *            |                        |
 *            +-- Figure --------------+--&gt; SvgPlot (page colours by CSS class)
 *                   |
 *                   +--&gt; SvgPlot (colours written out)  --&gt; plots/&lt;id&gt;.svg
 * </pre>
 * In come finished values in MeV or lattice units; out goes text. Nothing is computed here but shares of variance, ratios
 * of a closure to its error, and positions on paper. The same results give the same bytes. The page is written so that it is
 * well-formed XML too. Start reading at {@code HtmlReport} and {@code SvgPlot}.
 */
package tracewright.report;
