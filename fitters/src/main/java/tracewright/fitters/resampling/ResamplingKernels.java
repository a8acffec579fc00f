package tracewright.fitters.resampling;

/** Loops of {@link Resampling} over flat arrays; sums run in Monte Carlo order, so that the order on disk changes no bit. */
final class ResamplingKernels {

    private ResamplingKernels() {
    }

    /**
     * Sums over the surviving configurations of each block.
     *
     * @param values [diskIndex][i], i &lt; length; read
     * @return [block][i]
     */
    static double[] blockSums(double[] values, int length, Blocking blocking) {
        if (length < 1 || values.length != (long) blocking.onDisk() * length) {
            throw new IllegalArgumentException(blocking.onDisk() + " configurations of " + length + " entries need "
                + (long) blocking.onDisk() * length + " values; got " + values.length);
        }
        double[] sums = new double[blocking.blocks() * length];
        for (int n = 0; n < blocking.configurations(); n++) {
            int at = blocking.diskIndex(n);
            int from = at * length;
            int to = blocking.blockOf(at) * length;
            for (int i = 0; i < length; i++) {
                sums[to + i] += values[from + i];
            }
        }
        return sums;
    }

    /**
     * Sum of the block sums.
     *
     * @param sums [block][i]; read
     * @return [i]
     */
    static double[] total(double[] sums, int length, int blocks) {
        double[] total = new double[length];
        for (int k = 0; k < blocks; k++) {
            int row = k * length;
            for (int i = 0; i < length; i++) {
                total[i] += sums[row + i];
            }
        }
        return total;
    }

    /**
     * Means without one block, (sum - sum_k)/(N - m_k).
     *
     * @param sums  [block][i]; read
     * @param total [i]; read
     * @return [block][i]
     */
    static double[] jackknife(double[] sums, double[] total, int length, Blocking blocking) {
        double[] samples = new double[sums.length];
        for (int k = 0; k < blocking.blocks(); k++) {
            double left = blocking.configurations() - blocking.size(k);
            int row = k * length;
            for (int i = 0; i < length; i++) {
                samples[row + i] = (total[i] - sums[row + i]) / left;
            }
        }
        return samples;
    }

    /**
     * Means of the draws, sum_k c_bk sum_k / sum_k c_bk m_k.
     *
     * @param sums           [block][i]; read
     * @param multiplicities [draw][block], c_bk; read
     * @return [draw][i]
     */
    static double[] bootstrap(double[] sums, int length, Blocking blocking, double[] multiplicities) {
        int blocks = blocking.blocks();
        int draws = multiplicities.length / blocks;
        double[] samples = new double[draws * length];
        int[] rows = new int[blocks];       // starts of the rows that were drawn
        double[] times = new double[blocks];
        for (int b = 0; b < draws; b++) {
            int used = 0;
            double drawn = 0;
            for (int k = 0; k < blocks; k++) {
                double c = multiplicities[b * blocks + k];
                if (c > 0) {
                    drawn += c * blocking.size(k);
                    rows[used] = k * length;
                    times[used++] = c;
                }
            }
            combine(sums, rows, times, used, samples, b * length, length);
            for (int i = 0; i < length; i++) {
                samples[b * length + i] /= drawn;
            }
        }
        return samples;
    }

    /** to[out + i] = sum over rows of times x from[row + i]; four rows per pass, added one by one in their order. */
    private static void combine(double[] from, int[] rows, double[] times, int used, double[] to, int out, int length) {
        int r = 0;
        for (; r + 3 < used; r += 4) {
            addFour(from, rows, times, r, to, out, length);
        }
        for (; r < used; r++) {
            addTimes(times[r], from, rows[r], to, out, length);
        }
    }

    private static void addFour(double[] from, int[] rows, double[] times, int r, double[] to, int out, int length) {
        double c0 = times[r];
        double c1 = times[r + 1];
        double c2 = times[r + 2];
        double c3 = times[r + 3];
        int r0 = rows[r];
        int r1 = rows[r + 1];
        int r2 = rows[r + 2];
        int r3 = rows[r + 3];
        for (int i = 0; i < length; i++) {
            to[out + i] = to[out + i] + c0 * from[r0 + i] + c1 * from[r1 + i] + c2 * from[r2 + i] + c3 * from[r3 + i];
        }
    }

    private static void addTimes(double c, double[] from, int at, double[] to, int out, int length) {
        for (int i = 0; i < length; i++) {
            to[out + i] += c * from[at + i];
        }
    }
}
