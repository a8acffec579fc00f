package tracewright.fitters;

import java.util.List;
import java.util.Random;
import java.util.stream.IntStream;
import tracewright.fitters.sampled.BlockLabel;
import tracewright.fitters.sampled.SampleGroup;
import tracewright.fitters.sampled.SampledVector;

/** Blocks of invented data and the sampled vectors of their means. */
public final class GaussianBlocks {

    private GaussianBlocks() {
    }

    /** [block][point]: truth plus noise of unit-variance points times {@code scale}, neighbouring points correlated by {@code rho}. */
    public static double[][] draw(int blocks, double[] truth, double[] scale, double rho, Random random) {
        double[][] x = new double[blocks][truth.length];
        for (double[] row : x) {
            double z = random.nextGaussian();
            for (int i = 0; i < row.length; i++) {
                row[i] = truth[i] + scale[i] * z;
                z = rho * z + Math.sqrt(1 - rho * rho) * random.nextGaussian();
            }
        }
        return x;
    }

    /** Blocks of one configuration each. */
    public static SampledVector jackknife(double[][] blocks) {
        return jackknife(blocks, IntStream.range(0, blocks.length).map(k -> 1).toArray());
    }

    /** Delete-one-block samples of the mean of block means, weighted with the sizes. */
    public static SampledVector jackknife(double[][] blocks, int[] sizes) {
        int points = blocks[0].length;
        int n = IntStream.of(sizes).sum();
        double[] central = new double[points];
        for (int k = 0; k < blocks.length; k++) {
            for (int i = 0; i < points; i++) {
                central[i] += sizes[k] * blocks[k][i] / n;
            }
        }
        double[] samples = new double[blocks.length * points];
        for (int k = 0; k < blocks.length; k++) {
            for (int i = 0; i < points; i++) {
                samples[k * points + i] = (n * central[i] - sizes[k] * blocks[k][i]) / (n - sizes[k]);
            }
        }
        return SampledVector.copyOf(SampleGroup.jackknife("A", labels(blocks.length), sizes), central, samples);
    }

    /** Bootstrap samples of the same mean, each block drawn by position. */
    public static SampledVector bootstrap(double[][] blocks, int[] sizes, int draws, Random random) {
        int points = blocks[0].length;
        int[] c = new int[draws * blocks.length];
        for (int b = 0; b < draws; b++) {
            for (int k = 0; k < blocks.length; k++) {
                c[b * blocks.length + random.nextInt(blocks.length)]++;
            }
        }
        SampleGroup group = SampleGroup.bootstrapOf("A", labels(blocks.length), sizes, 0, c);
        double[] samples = new double[draws * points];
        for (int b = 0; b < draws; b++) {
            for (int k = 0; k < blocks.length; k++) {
                for (int i = 0; i < points; i++) {
                    samples[b * points + i] += group.share(b, k) * blocks[k][i];
                }
            }
        }
        return SampledVector.copyOf(group, jackknife(blocks, sizes).centralRow(), samples);
    }

    private static List<BlockLabel> labels(int n) {
        return IntStream.range(0, n).mapToObj(k -> new BlockLabel("a", k)).toList();
    }
}
