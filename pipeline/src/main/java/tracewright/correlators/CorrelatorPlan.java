package tracewright.correlators;

import static java.util.Objects.requireNonNull;

import java.util.ArrayList;
import java.util.Collections;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Set;
import java.util.SortedSet;
import java.util.TreeMap;
import java.util.TreeSet;
import tracewright.study.Observable;

/**
 * What is needed of one ensemble: two-point functions by hadron (folded or not), connected insertions, and products of
 * two-point functions with loops and densities at a list of separations.
 *
 * @param mesons      hadrons whose two-point functions are periodic and folded; the others are not
 * @param connected   connected insertions needed
 * @param products    by hadron, the loops and densities whose product with it is needed, each with its separations
 */
public record CorrelatorPlan(
    List<String> hadrons, Set<String> mesons, List<Observable.Connected> connected, Map<String, Map<Observable, SortedSet<Integer>>> products) {

    public CorrelatorPlan {
        hadrons = List.copyOf(hadrons);
        mesons = Set.copyOf(mesons);
        connected = List.copyOf(connected);
        Map<String, Map<Observable, SortedSet<Integer>>> copy = new TreeMap<>();
        products.forEach((hadron, byOperator) -> {
            Map<Observable, SortedSet<Integer>> inner = new LinkedHashMap<>();
            byOperator.forEach((operator, separations) -> {
                if (operator.hasSources()) {
                    throw new IllegalArgumentException(operator.id() + " is no loop or density; only those form products with two-point functions");
                }
                inner.put(operator, Collections.unmodifiableSortedSet(new TreeSet<>(requireNonNull(separations))));
            });
            copy.put(hadron, Collections.unmodifiableMap(inner));
        });
        products = Collections.unmodifiableMap(copy);
    }

    /** Every observable that has to be read. */
    public List<Observable> observables() {
        Set<Observable> needed = new java.util.LinkedHashSet<>();
        products.values().forEach(byOperator -> needed.addAll(byOperator.keySet()));
        hadrons.forEach(h -> needed.add(new Observable.TwoPoint(h)));
        needed.addAll(connected);
        return new ArrayList<>(needed);
    }
}
