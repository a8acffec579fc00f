package tracewright.fitters.resampling;

import java.util.Arrays;
import tracewright.fitters.sampled.SampleGroup;
import tracewright.fitters.sampled.SampledNumber;

/** Samples of one kind from those of the other, see {@link Resampling#convert}. */
final class Conversion {

    private Conversion() {
    }

    static SampledNumber convert(SampledNumber x, SampleGroup to) {
        SampleGroup from = x.groups().stream().filter(g -> g.key().equals(to.key())).findFirst().orElse(to);
        if (from.kind() == to.kind()) {
            return x;
        }
        if (!from.labels().equals(to.labels()) || !Arrays.equals(from.blockSizes(), to.blockSizes())) {
            throw new IllegalArgumentException("cannot convert samples of " + from + " with " + from.labels().size() + " blocks to " + to
                + " with " + to.labels().size() + "; the blocks and their sizes must be the same");
        }
        double[] influence = x.influence(to.key()).orElseThrow(() -> new IllegalArgumentException("cannot convert samples of " + from
            + ": that needs three draws for each of its " + from.labels().size() + " blocks"));
        double[] samples = to.kind() == SampleGroup.Kind.BOOTSTRAP ? drawn(x.central(), influence, to) : deleted(x.central(), influence, to);
        return x.withReplaced(to, samples);
    }

    private static double[] drawn(double central, double[] influence, SampleGroup to) {
        double[] x = new double[to.size()];
        for (int b = 0; b < x.length; b++) {
            double sum = 0;
            for (int k = 0; k < influence.length; k++) {
                sum += to.share(b, k) * influence[k];
            }
            x[b] = central + sum;
        }
        return x;
    }

    private static double[] deleted(double central, double[] influence, SampleGroup to) {
        double total = to.configurations();
        double[] x = new double[influence.length];
        for (int k = 0; k < x.length; k++) {
            x[k] = central - influence[k] * to.blockSize(k) / (total - to.blockSize(k));
        }
        return x;
    }
}
