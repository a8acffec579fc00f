/**
 * The study and layout files, and the vocabulary that all stages share.
 * <pre>
 *  study.yaml  --StudyFile---+                                        +--&gt; Study
 *  layout.yaml --LayoutFile--+--YamlTree (lines)--RecordBinder (keys)--+--&gt; Layout          every problem at once, with its line
 *  --set key=value ----------+
 * </pre>
 * Keys are the record components in snake_case; nothing is accepted that no record asks for. Start reading at {@code Study}.
 */
package tracewright.study;
