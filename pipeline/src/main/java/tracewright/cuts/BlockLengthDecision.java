package tracewright.cuts;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import tracewright.fitters.autocorrelation.IntegratedTime;
import tracewright.fitters.resampling.BlockLength;
import tracewright.study.ConfigurationId;
import tracewright.study.InputException;
import tracewright.study.Problem;
import tracewright.study.Study;

/**
 * The block length of an ensemble and why it was taken: given by the study, or by the rule of {@link BlockLength} from the
 * largest integrated autocorrelation time among the series that matter.
 *
 * @param length in trajectories
 */
public record BlockLengthDecision(int length, String reason, List<Measured> measured, List<String> warnings) {

    public BlockLengthDecision {
        measured = List.copyOf(measured);
        warnings = List.copyOf(warnings);
    }

    /**
     * Integrated autocorrelation time of one series, in trajectories; the verdict is empty if the chain was long enough for it.
     */
    public record Measured(String observable, double time, double error, String verdict) {
    }

    /**
     * @param series by name, [configuration on disk]; entries of configurations that were cut are not read
     * @throws InputException with cause USAGE if the length is to be chosen and the chain allows none, or if fewer than two
     *                        configurations or blocks are left
     */
    public static BlockLengthDecision of(String ensemble, Selection selection, Map<String, double[]> series, Study.BlockChoice choice) {
        if (selection.count() < 2) {
            throw unusable("the cuts of ensemble " + ensemble + " leave 1 of its " + selection.onDisk().size() + " configurations; an error needs two",
                "cuts of ensemble " + ensemble, "relax the cut that removed most: " + selection.removed());
        }
        List<Measured> measured = new ArrayList<>();
        List<String> warnings = new ArrayList<>();
        double slowest = 0;
        String slowestName = "";
        for (Map.Entry<String, double[]> e : series.entrySet()) {
            IntegratedTime time = measure(selection, e.getValue());
            IntegratedTime.Estimate estimate = time.estimate();
            String verdict = time instanceof IntegratedTime.TooShort t ? t.reason() : "";
            measured.add(new Measured(e.getKey(), estimate.tauTrajectories(), estimate.tauErrorTrajectories(), verdict));
            if (!verdict.isEmpty()) {
                warnings.add(ensemble + ", " + e.getKey() + ": " + verdict);
            }
            if (estimate.streamAgreement() < 0.01) {
                warnings.add(String.format(Locale.ROOT, "%s, %s: the streams' means differ (p = %.2g); look at the thermalization", ensemble, e.getKey(),
                    estimate.streamAgreement()));
            }
            if (estimate.tauTrajectories() > slowest) {
                slowest = estimate.tauTrajectories();
                slowestName = e.getKey();
            }
        }
        if (choice.length().isPresent()) {
            requireTwoBlocks(ensemble, selection, choice.length().get());
            return new BlockLengthDecision(choice.length().get(), "given by the study", measured, warnings);
        }
        return chosen(ensemble, selection, slowest, slowestName, measured, warnings);
    }

    private static void requireTwoBlocks(String ensemble, Selection selection, int length) {
        if (selection.blocks(length).blocks() < 2) {
            throw unusable("blocks of " + length + " trajectories leave 1 block of the " + selection.count() + " configurations of ensemble " + ensemble
                + "; an error needs two", "ensembles." + ensemble + ".cuts.block", "write a smaller number, or auto");
        }
    }

    private static InputException unusable(String what, String where, String remedy) {
        return new InputException(InputException.Cause.USAGE, List.of(new Problem(what, where, remedy)));
    }

    private static BlockLengthDecision chosen(
            String ensemble, Selection selection, double slowest, String slowestName, List<Measured> measured, List<String> warnings) {
        BlockLength rule = BlockLength.choose(slowest, Math.toIntExact(selection.spacing()), selection.count());
        if (rule instanceof BlockLength.Impossible no) {
            throw unusable("no block length suits ensemble " + ensemble + ": " + no.reason(), "ensembles." + ensemble + ".cuts.block", no.advice());
        }
        BlockLength.Chosen yes = (BlockLength.Chosen) rule;
        return new BlockLengthDecision(yes.trajectories(), String.format(Locale.ROOT,
            "(tau^2 N)^(1/3), at least 4 tau, from the integrated autocorrelation time of %s, %.2f trajectories", slowestName, slowest), measured, warnings);
    }

    private static IntegratedTime measure(Selection selection, double[] values) {
        List<String> streams = new ArrayList<>();
        long[] trajectories = new long[selection.count()];
        double[] kept = new double[selection.count()];
        int n = 0;
        for (int i = 0; i < values.length; i++) {
            if (selection.kept(i)) {
                ConfigurationId id = selection.onDisk().get(i);
                streams.add(id.stream());
                trajectories[n] = id.trajectory();
                kept[n++] = values[i];
            }
        }
        return IntegratedTime.measure(streams, trajectories, kept);
    }
}
