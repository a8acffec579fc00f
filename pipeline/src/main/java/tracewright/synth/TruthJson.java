package tracewright.synth;

import java.nio.charset.StandardCharsets;
import java.util.LinkedHashMap;
import java.util.Map;
import tools.jackson.databind.json.JsonMapper;
import tools.jackson.databind.node.ObjectNode;
import tracewright.study.Flavor;

/**
 * Writes the exact values as JSON: an object of quantities by id, {@code <ensemble>.<hadron>.<quantity>[.<flavor>]} as in results,
 * each with value and unit.
 */
public final class TruthJson {

    static final String FILE = "truth.json";
    private static final String MEV = "MeV";
    private static final String LATTICE = "lattice";
    private static final double MEV_PER_GEV = 1000;

    private final JsonMapper mapper = JsonMapper.builder().build();
    private final Truth truth;
    private final ObjectNode quantities = mapper.createObjectNode();

    private TruthJson(Truth truth) {
        this.truth = truth;
    }

    /** Exact values of all ensembles and of the physical point by id, the ids of results; MeV or lattice units as there. */
    public static Map<String, Double> values(Truth truth) {
        Map<String, Double> values = new LinkedHashMap<>();
        TruthJson json = new TruthJson(truth);
        json.everything();
        json.quantities.propertyStream().forEach(e -> values.put(e.getKey(), e.getValue().get("value").asDouble()));
        return values;
    }

    /** All ensembles and the physical point. */
    static byte[] all(Truth truth) {
        TruthJson json = new TruthJson(truth);
        json.everything();
        return json.bytes();
    }

    private void everything() {
        truth.ensembles().forEach(this::ensemble);
        truth.theory().baryons().keySet().forEach(hadron -> budget(TruthBudget.physical(truth.theory(), hadron)));
    }

    /** One ensemble. */
    static byte[] of(Truth truth, Truth.Ensemble ensemble) {
        TruthJson json = new TruthJson(truth);
        json.ensemble(ensemble);
        return json.bytes();
    }

    private void ensemble(Truth.Ensemble ensemble) {
        Truth.Theory theory = truth.theory();
        put(ensemble.name() + "." + theory.pion().name() + ".mass", ensemble.pionMassGev() * MEV_PER_GEV, MEV);
        for (String hadron : theory.baryons().keySet()) {
            TruthBudget budget = TruthBudget.of(theory, ensemble, hadron);
            budget(budget);
            lattice(ensemble.name() + "." + hadron + ".", budget.lattice(theory));
        }
    }

    private void budget(TruthBudget budget) {
        String id = budget.ensemble() + "." + budget.hadron() + ".";
        put(id + "mass", budget.massGev() * MEV_PER_GEV, MEV);
        put(id + "sigma." + Flavor.LIGHT.word(), budget.sigmaLightGev() * MEV_PER_GEV, MEV);
        put(id + "sigma." + Flavor.STRANGE.word(), budget.sigmaStrangeGev() * MEV_PER_GEV, MEV);
        put(id + "anomaly", budget.anomalyGev() * MEV_PER_GEV, MEV);
        put(id + "gluon", budget.gluonGev() * MEV_PER_GEV, MEV);
        put(id + "closure", budget.closureGev() * MEV_PER_GEV, MEV);
    }

    private void lattice(String id, TruthBudget.Lattice exact) {
        put(id + "energy", exact.mass(), LATTICE);
        put(id + "scalar-connected." + Flavor.LIGHT.word(), exact.lightConnected(), LATTICE);
        put(id + "scalar-disconnected." + Flavor.LIGHT.word(), exact.lightDisconnected(), LATTICE);
        put(id + "scalar-disconnected." + Flavor.STRANGE.word(), exact.strange(), LATTICE);
        exact.flowedDensity().forEach((flowTime, value) -> put(id + "action-density-flow-" + Double.toString(flowTime).replace('.', 'p'), value, LATTICE));
    }

    private void put(String id, double value, String unit) {
        ObjectNode entry = mapper.createObjectNode();
        entry.put("value", value);
        entry.put("unit", unit);
        quantities.set(id, entry);
    }

    private byte[] bytes() {
        ObjectNode root = mapper.createObjectNode();
        root.put("schema", "tracewright-truth-values/1");
        root.put("theory", truth.name());
        root.put("seed", truth.seed());
        root.set("quantities", quantities);
        String text = mapper.writerWithDefaultPrettyPrinter().writeValueAsString(root).replace("\r\n", "\n") + "\n";
        return text.getBytes(StandardCharsets.UTF_8);
    }
}
