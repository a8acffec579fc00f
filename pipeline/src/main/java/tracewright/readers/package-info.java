/**
 * From files on disk to records in the conventions of {@link tracewright.study.Observable}, one configuration at a time.
 * <pre>
 *  layout ----&gt; LayoutCheck --+                  (does the layout contradict itself?)
 *  folder ----&gt; PathTemplate -+-&gt; Hdf5Family ----&gt; StoredArray --+
 *                             |   labels, shapes   slabs         +-&gt; Conversion -&gt; Delivery -&gt; Sink
 *                             +-&gt; CsvFamily -----&gt; CsvGrid ------+   conventions   finite?
 *                                 labels, rows     one configuration
 * </pre>
 * In: a layout, a data folder. Out: real numbers in lattice units, checked to be finite. Memory holds a slab, not a file. Start
 * reading at {@link tracewright.readers.EnsembleFiles}.
 *
 * <p>What is accepted:
 * <table>
 * <caption>Files, shapes and labels</caption>
 * <tr><th>what</th><th>HDF5</th><th>CSV (plain, or gzip if the name ends in .gz)</th></tr>
 * <tr><td>files</td><td>one for all, for each stream or for each configuration</td><td>the same</td></tr>
 * <tr><td>axes</td><td>configuration, source, hit, time in any order; configuration, source and hit may be absent</td>
 *     <td>columns source-time, hit, time; one row per number, rows of one configuration together, every combination once</td></tr>
 * <tr><td>time axis</td><td>T; separation + 1 for connected insertions relative to the source</td><td>the same</td></tr>
 * <tr><td>numbers</td><td>float16, float32, float64 and whole numbers, either byte order; contiguous, compact, chunked, compressed (shuffle,
 *     deflate, lzf; checksums with deflate, not verified)</td><td>decimal</td></tr>
 * <tr><td>complex</td><td>compound of re and im, r and i, or real and imag, in any order, padded or not; or a last axis of length 2.
 *     The imaginary part is not read.</td><td>the column of the real part</td></tr>
 * <tr><td>stream, trajectory</td><td>constant, placeholder of the path, or dataset (whole numbers or strings; one entry for each
 *     configuration, or one for all)</td><td>column, else the placeholder {stream} or {trajectory}</td></tr>
 * <tr><td>source times</td><td>list, or dataset [source] or [configuration][source]</td><td>column, or a list</td></tr>
 * <tr><td>text</td><td>soft links inside the file are followed</td><td>UTF-8, commas, quotes doubled inside quotes, blank lines skipped,
 *     white space around fields ignored</td></tr>
 * </table>
 * Refused, each with its own message: files cut short or still open for writing, chunks that were never written, links out of the
 * file, virtual datasets and external storage, chunks over 256 MB, two configurations with one label. Values that an observable
 * does not use (imaginary parts, insertions beyond the sink) are not looked at.
 */
package tracewright.readers;
