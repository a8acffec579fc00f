package tracewright.readers;

import java.nio.file.Path;
import java.util.List;
import java.util.function.Predicate;
import tracewright.study.ConfigurationId;
import tracewright.study.Layout;

/** The files of one path template, checked against the layout, and the datasets in them. */
interface Family {

    /** Files in the order of reading. */
    List<Path> files();

    /** Entries beside them whose names do not match the template. */
    int ignored();

    /** Configurations of one dataset, in the order of the files. */
    List<ConfigurationId> configurations(Layout.Dataset dataset);

    /** Place and shape of a dataset, for people. */
    String inWords(Layout.Dataset dataset);

    /** Hands the wanted datasets of every file to the delivery, each file opened once. */
    void read(List<Layout.Dataset> wanted, Predicate<ConfigurationId> configurations, Delivery delivery);
}
