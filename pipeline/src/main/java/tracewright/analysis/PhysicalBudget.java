package tracewright.analysis;

import java.util.ArrayList;
import java.util.EnumMap;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.function.Function;
import tracewright.budget.Decomposition;
import tracewright.budget.TraceBudget;
import tracewright.extrapolation.PhysicalPoint;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.study.Flavor;
import tracewright.study.Study;

/**
 * Contributions to one hadron's mass at the physical point, each from its own fit over the ensembles.
 *
 * @param fits by quantity: {@code mass}, {@code gluon}, {@code sigma.light} ...
 */
record PhysicalBudget(String hadron, Map<String, PhysicalPoint> fits, SampledNumber anomaly, List<Decomposition> decompositions) {

    static PhysicalBudget of(Study study, Study.Extrapolation settings, String hadron, List<PreparedEnsemble> ensembles,
            Map<String, SampledNumber> pionMasses, List<HadronBudget> budgets) {
        Map<String, PhysicalPoint> fits = new LinkedHashMap<>();
        Function<Function<HadronBudget, SampledNumber>, List<PhysicalPoint.Entry>> entries = number -> entries(settings, ensembles, pionMasses, budgets, number);
        SampledNumber physicalPion = EnsembleStage.constant(settings.pionMassMev());
        fits.put("mass", fit(hadron + ".mass", entries.apply(HadronBudget::mass), settings, physicalPion));
        fits.put("gluon", fit(hadron + ".gluon", entries.apply(b -> b.gluon().part().value()), settings, physicalPion));
        Map<Flavor, SampledNumber> sigmas = new EnumMap<>(Flavor.class);
        for (Flavor flavor : budgets.get(0).sigmas().keySet()) {
            String quantity = "sigma." + flavor.word();
            PhysicalPoint fit = fit(hadron + "." + quantity, entries.apply(b -> b.sigmas().get(flavor).value()), settings, physicalPion);
            fits.put(quantity, fit);
            sigmas.put(flavor, fit.value());
        }
        SampledNumber gammaM = EnsembleStage.constant(study.renormalization().gammaM());
        SampledNumber mass = fits.get("mass").value();
        SampledNumber gluon = fits.get("gluon").value();
        SampledNumber anomaly = TraceBudget.anomaly(gluon, sigmas, gammaM);
        return new PhysicalBudget(hadron, fits, anomaly, List.of(
            TraceBudget.invariant(mass, anomaly, sigmas),
            TraceBudget.schemeDependent(mass, gluon, sigmas, gammaM, study.renormalization().scheme(), study.renormalization().scaleGev())));
    }

    private static PhysicalPoint fit(String name, List<PhysicalPoint.Entry> entries, Study.Extrapolation settings, SampledNumber physicalPion) {
        return PhysicalPoint.of("physical." + name, entries, settings.terms(), physicalPion);
    }

    private static List<PhysicalPoint.Entry> entries(Study.Extrapolation settings, List<PreparedEnsemble> ensembles, Map<String, SampledNumber> pionMasses,
            List<HadronBudget> budgets, Function<HadronBudget, SampledNumber> number) {
        List<PhysicalPoint.Entry> entries = new ArrayList<>();
        for (PreparedEnsemble ensemble : ensembles) {
            budgets.stream().filter(b -> b.ensemble().equals(ensemble.name()) && !settings.drop().contains(b.ensemble())).findFirst().ifPresent(b ->
                entries.add(new PhysicalPoint.Entry(ensemble.name(), ensemble.spacingFm(), pionMasses.get(ensemble.name()), number.apply(b))));
        }
        return entries;
    }
}
