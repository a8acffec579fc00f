package tracewright.cli;

/** The program's version, from the jar's manifest. */
final class Version {

    private Version() {
    }

    /** {@code 0.1.0}, or {@code development} when the classes were not started from the jar. */
    static String text() {
        String version = Version.class.getPackage().getImplementationVersion();
        return version == null ? "development" : version;
    }
}
