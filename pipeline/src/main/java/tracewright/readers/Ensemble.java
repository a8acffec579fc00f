package tracewright.readers;

import java.nio.file.Path;
import tracewright.study.Layout;

/** What is being read: the ensemble's name, its layout and the file it came from, and the folder of its data. */
record Ensemble(String name, Layout layout, Path layoutFile, Path folder) {
}
