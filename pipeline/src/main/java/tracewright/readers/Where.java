package tracewright.readers;

import java.nio.file.Path;
import tracewright.study.ConfigurationId;

/** The line of a problem that says where it is. */
final class Where {

    private Where() {
    }

    static String layout(String ensemble, Path layoutFile, String entry) {
        return "ensemble " + ensemble + ", layout " + layoutFile + ", " + entry;
    }

    static String file(String ensemble, Path file) {
        return "ensemble " + ensemble + ", file " + file;
    }

    static String dataset(String file, String dataset) {
        return file + ", dataset " + dataset;
    }

    static String line(String file, long line) {
        return file + ", line " + line;
    }

    static String configuration(String place, ConfigurationId id) {
        return place + ", stream " + id.stream() + ", trajectory " + id.trajectory();
    }
}
