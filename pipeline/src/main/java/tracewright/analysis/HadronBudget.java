package tracewright.analysis;

import java.util.ArrayList;
import java.util.EnumMap;
import java.util.List;
import java.util.Map;
import tracewright.budget.Decomposition;
import tracewright.budget.TraceBudget;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.renormalization.GluonPart;
import tracewright.renormalization.Renormalized;
import tracewright.renormalization.SigmaTerms;
import tracewright.study.Flavor;
import tracewright.study.Study;

/**
 * Contributions to one hadron's mass on one ensemble, in MeV.
 *
 * @param gluon (beta/2g) F^2 with its flow-time limit
 */
record HadronBudget(
    String ensemble, String hadron, SampledNumber mass, Map<Flavor, Renormalized> sigmas, GluonPart gluon, SampledNumber anomaly,
    List<Decomposition> decompositions) {

    static HadronBudget of(Study study, PreparedEnsemble ensemble, HadronElements hadron) {
        HadronElements.Elements elements = hadron.elements().orElseThrow();
        SampledNumber mass = hadron.energy().number().times(ensemble.mevPerUnit());
        Map<Flavor, Renormalized> sigmas = new EnumMap<>(Flavor.class);
        Map<Flavor, SampledNumber> values = new EnumMap<>(Flavor.class);
        for (Flavor flavor : ensemble.flavors()) {
            SampledNumber quark = EnsembleStage.constant(ensemble.settings().quarkMassLattice().get(flavor));
            Renormalized sigma = SigmaTerms.of(study.renormalization().sigma(), quark, scalar(elements, flavor), ensemble.mevPerUnit());
            sigmas.put(flavor, sigma);
            values.put(flavor, sigma.value());
        }
        GluonPart gluon = GluonPart.of(study.renormalization(), flowed(ensemble, elements), ensemble.mevPerUnit(), hadron.name());
        SampledNumber gammaM = EnsembleStage.constant(study.renormalization().gammaM());
        SampledNumber anomaly = TraceBudget.anomaly(gluon.part().value(), values, gammaM);
        List<Decomposition> decompositions = List.of(
            TraceBudget.invariant(mass, anomaly, values),
            TraceBudget.schemeDependent(mass, gluon.part().value(), values, gammaM, study.renormalization().scheme(), study.renormalization().scaleGev()));
        return new HadronBudget(hadron.ensemble(), hadron.hadron(), mass, sigmas, gluon, anomaly, decompositions);
    }

    /** Bare &lt;qbar q&gt;: connected, where the flavour has valence quarks in the hadron, plus disconnected. */
    private static SampledNumber scalar(HadronElements.Elements elements, Flavor flavor) {
        SampledNumber disconnected = elements.disconnected().get(flavor).published(0).number();
        HadronElements.Scanned connected = elements.connected().get(flavor);
        return connected == null ? disconnected : disconnected.plus(connected.published(0).number());
    }

    private static List<GluonPart.FlowedElement> flowed(PreparedEnsemble ensemble, HadronElements.Elements elements) {
        List<GluonPart.FlowedElement> flowed = new ArrayList<>();
        HadronStage.members(ensemble).forEach(i ->
            flowed.add(new GluonPart.FlowedElement(ensemble.flowTimes().get(i), elements.gluon().published(i).number())));
        return flowed;
    }
}
