package tracewright.study;

/** Quark flavours of the sum rule; LIGHT is the sum of up and down with their average mass. */
public enum Flavor {
    LIGHT, STRANGE, CHARM;

    /** Lower-case word used in ids and files. */
    public String word() {
        return switch (this) {
            case LIGHT -> "light";
            case STRANGE -> "strange";
            case CHARM -> "charm";
        };
    }
}
