package tracewright.synth;

import java.nio.charset.StandardCharsets;
import java.util.Locale;

/** A page for people that stands beside generated data: what they are, and the exact answers. */
final class TruthPage {

    static final String FILE = "README.md";

    private TruthPage() {
    }

    static byte[] of(Truth truth) {
        StringBuilder page = new StringBuilder("# Synthetic ensembles of the theory \"" + truth.name() + "\"\n\n");
        page.append("Nothing here was measured: `tracewright synth` made every number from an invented theory, so that the answers are known\n")
            .append("exactly. The same truth file gives the same numbers (seed ").append(truth.seed()).append("); `sha256sum -c ")
            .append(OutputFolder.LIST).append("` checks the files.\n");
        if (!truth.about().isBlank()) {
            page.append('\n').append(truth.about()).append('\n');
        }
        ensembles(page, truth);
        answers(page, truth);
        page.append("\nThe same numbers with all digits, and those in lattice units, stand in `").append(TruthJson.FILE).append("`. The flowed action density of the\n")
            .append("theory obeys -2 b0 <E(t)> = gluon (1 + slope t/a^2) with ").append(truth.theory().flavors()).append(" flavours and a slope of ")
            .append(truth.theory().flowSlope()).append("; gamma_m is ").append(truth.theory().gammaM()).append(".\n");
        return page.toString().getBytes(StandardCharsets.UTF_8);
    }

    private static void ensembles(StringBuilder page, Truth truth) {
        page.append("\n| ensemble | a (fm) | Mpi (MeV) | N_s^3 x T | streams | configurations | sources | a m_light | a m_strange |\n")
            .append("| --- | --- | --- | --- | --- | --- | --- | --- | --- |\n");
        for (Truth.Ensemble e : truth.ensembles()) {
            double gev = e.spacingFm() / TruthBudget.HBARC_GEV_FM;
            page.append(String.format(Locale.ROOT, "| %s | %s | %.1f | %d^3 x %d | %d | %d | %d | %.8f | %.8f |", e.name(), e.spacingFm(),
                1000 * e.pionMassGev(), e.spatialExtent(), e.timeExtent(), e.streams().size(), e.streams().stream().mapToInt(s -> s.trajectories().size()).sum(),
                e.sources().count(), TruthBudget.lightQuarkGev(truth.theory(), e.pionMassGev()) * gev, truth.theory().strangeMassGev() * gev)).append('\n');
        }
    }

    private static void answers(StringBuilder page, Truth truth) {
        page.append("\nExact answers in MeV: mass = anomaly + sigma terms (+ closure), anomaly = gluon + gamma_m (sum of sigma terms).\n")
            .append("\n| ensemble | hadron | mass | sigma light | sigma strange | anomaly | gluon | closure |\n")
            .append("| --- | --- | --- | --- | --- | --- | --- | --- |\n");
        for (TruthBudget b : TruthBudget.all(truth)) {
            page.append(String.format(Locale.ROOT, "| %s | %s | %.2f | %.2f | %.2f | %.2f | %.2f | %.2f |", b.ensemble(), b.hadron(), 1000 * b.massGev(),
                1000 * b.sigmaLightGev(), 1000 * b.sigmaStrangeGev(), 1000 * b.anomalyGev(), 1000 * b.gluonGev(), 1000 * b.closureGev())).append('\n');
        }
    }
}
