package tracewright.report;

import java.util.List;
import java.util.Map;
import java.util.Optional;
import tracewright.results.Results;

/** Ids of the results in words for people. */
final class Words {

    private Words() {
    }

    /** Reserved name of the extrapolated point. */
    static final String PHYSICAL = "physical";

    static String ensemble(String name) {
        return name.equals(PHYSICAL) ? "physical point" : name;
    }

    /** A cause of uncertainty, from its key in variance tables. */
    static String cause(String key) {
        if (key.startsWith("input:")) {
            return "input " + key.substring(6);
        }
        if (key.startsWith("choice:")) {
            return "choice of " + key.substring(7);
        }
        if (key.startsWith("fit:")) {
            return "covariance noise of " + key.substring(4);
        }
        return "gauge noise of " + key;
    }

    /** Number of the colour for a kind of cause: gauge noise 0, inputs 1, choices 2, covariance noise 3. */
    static int causeKind(String key) {
        return key.startsWith("input:") ? 1 : key.startsWith("choice:") ? 2 : key.startsWith("fit:") ? 3 : 0;
    }

    static final List<String> CAUSE_KINDS = List.of("gauge noise", "inputs with errors", "choices", "noise of estimated covariances");

    static String term(String id) {
        if (id.startsWith("sigma.")) {
            return "\u03c3\u00a0" + id.substring(6);
        }
        if (id.startsWith("quark.")) {
            return id.substring(6) + " quark trace";
        }
        return id.equals("gluon") ? "gluon trace" : id.replace('.', ' ');
    }

    static String scheme(Optional<String> scheme, Optional<Double> scaleGev) {
        String at = scaleGev.map(s -> "\u03bc = " + Numbers.plain(s) + " GeV").orElse("");
        return scheme.map(s -> at.isEmpty() ? s : s + ", " + at).orElse(at);
    }

    static String decomposition(Results.Budget b) {
        String scheme = scheme(b.scheme(), b.scaleGev());
        String name = switch (b.decomposition()) {
            case "trace" -> "Trace sum rule, renormalisation-group invariant terms";
            case "trace-scheme" -> "Trace sum rule, quark and gluon parts";
            default -> "Decomposition " + b.decomposition();
        };
        return scheme.isEmpty() ? name : name + " (" + scheme + ")";
    }

    private static final Map<String, String> TOPICS = Map.of(
        "effective-mass", "Effective masses",
        "ratio", "Ratios",
        "summed-ratio", "Summed ratios",
        "flow-time", "Flow-time extrapolation",
        "extrapolation", "Extrapolation",
        "budget", "Budget");

    private static final List<String> TOPIC_ORDER = List.of("budget", "effective-mass", "ratio", "summed-ratio", "flow-time", "extrapolation");

    private static final Map<String, String> TOPIC_HELP = Map.of(
        "effective-mass", "Logarithmic slope of the two-point function; where it levels off, the ground state stands alone. The band is the fitted energy.",
        "ratio", "Three-point over two-point function against insertion time; excited states bend the ends and shift the middle, "
            + "both less at larger source-sink separation. The band is the extracted matrix element.",
        "summed-ratio", "Ratio summed over insertion times against source-sink separation; the slope is the matrix element.",
        "flow-time", "Operator at positive flow time, matched to the physical scheme; the straight part leads to the value at zero flow time.",
        "extrapolation", "One point per ensemble; the band runs to the continuum, to infinite volume and to physical quark masses.",
        "budget", "Contributions as fractions of the mass.");

    static String topic(String topic) {
        return TOPICS.getOrDefault(topic, topic.isEmpty() ? "Other figures" : Phrase.capital(topic.replace('-', ' ')));
    }

    static String topicHelp(String topic) {
        return TOPIC_HELP.getOrDefault(topic, "");
    }

    /** Place of a topic in the page; unknown ones come last. */
    static int topicRank(String topic) {
        int at = TOPIC_ORDER.indexOf(topic);
        return at < 0 ? TOPIC_ORDER.size() : at;
    }
}
