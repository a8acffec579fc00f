package tracewright.analysis;

import java.util.List;
import java.util.Map;
import java.util.Optional;
import tracewright.extraction.ElementScan;
import tracewright.extraction.Extracted;
import tracewright.study.Flavor;
import tracewright.study.Study.ElementFits.Method;

/**
 * What was extracted for one hadron on one ensemble, in lattice units.
 *
 * @param elements bare matrix elements, absent for hadrons without a budget
 */
record HadronElements(String ensemble, String hadron, Extracted energy, Optional<Elements> elements) {

    String name() {
        return ensemble + "." + hadron;
    }

    /**
     * @param connected    by flavour of the insertion
     * @param disconnected by flavour of the loop
     * @param gluon        one member per flow time
     */
    record Elements(Map<Flavor, Scanned> connected, Map<Flavor, Scanned> disconnected, Scanned gluon) {
    }

    /**
     * A scan with its results.
     *
     * @param results by method, one entry per member of the family
     * @param failed  methods without a result, each with the reason
     */
    record Scanned(String name, ElementScan scan, Method published, Map<Method, List<Extracted>> results, Map<Method, String> failed) {

        /** The result that enters the budget, of one member. */
        Extracted published(int member) {
            return results.get(published).get(member);
        }
    }
}
