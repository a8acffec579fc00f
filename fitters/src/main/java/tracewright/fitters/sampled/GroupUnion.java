package tracewright.fitters.sampled;

import java.util.List;
import java.util.TreeMap;

/** Where numbers of one ensemble with different block sets meet, see {@link SampleGroup#join}. */
final class GroupUnion {

    private GroupUnion() {
    }

    static SampleGroup of(SampleGroup a, SampleGroup b) {
        refuseMixture(a, b);
        TreeMap<BlockLabel, Integer> sizes = new TreeMap<>();
        for (SampleGroup g : List.of(a, b)) {
            for (int k = 0; k < g.labels().size(); k++) {
                sizes.merge(g.labels().get(k), g.blockSize(k), Math::max);
            }
        }
        List<BlockLabel> labels = List.copyOf(sizes.keySet());
        int[] m = sizes.values().stream().mapToInt(Integer::intValue).toArray();
        long length = Math.max(a.blockLength(), b.blockLength());
        return a.kind() == SampleGroup.Kind.JACKKNIFE ? SampleGroup.jackknife(a.key(), labels, m, length).aboutCentral()
            : SampleGroup.joinedBootstrap(a, b, labels, m, length, multiplicities(labels, a, b));
    }

    private static void refuseMixture(SampleGroup a, SampleGroup b) {
        String pair = a.key() + " meet: " + a + " and " + b;
        if (a.kind() != b.kind()) {
            throw new IllegalArgumentException("numbers of different kinds of " + pair + "; convert one of them to the other's kind first");
        }
        if (!a.isEnsemble()) {
            throw new IllegalArgumentException("numbers with different samples of " + pair + "; give the two causes different names");
        }
        if (a.blockLength() > 0 && b.blockLength() > 0 && a.blockLength() != b.blockLength()) {
            throw new IllegalArgumentException("numbers with blocks of " + a.blockLength() + " and of " + b.blockLength()
                + " trajectories of " + pair + "; block both alike");
        }
        if (a.kind() == SampleGroup.Kind.BOOTSTRAP && a.size() != b.size()) {
            throw new IllegalArgumentException("numbers with " + a.size() + " and with " + b.size() + " draws of " + pair
                + "; draw both equally often");
        }
    }

    /** Multiplicities on the union [draw][block]; empty when one side knows only its shares. */
    private static int[] multiplicities(List<BlockLabel> union, SampleGroup a, SampleGroup b) {
        int[] ca = a.multiplicities();
        int[] cb = b.multiplicities();
        if (ca.length == 0 || cb.length == 0) {
            return new int[0];
        }
        int[] inA = places(a, union);
        int[] inB = places(b, union);
        int draws = a.size();
        int[] c = new int[draws * inA.length];
        int disagreeing = 0;
        for (int draw = 0; draw < draws; draw++) {
            boolean agree = true;
            for (int k = 0; k < inA.length; k++) {
                int fromA = inA[k] < 0 ? 0 : ca[draw * a.labels().size() + inA[k]];
                int fromB = inB[k] < 0 ? 0 : cb[draw * b.labels().size() + inB[k]];
                agree &= inA[k] < 0 || inB[k] < 0 || fromA == fromB;
                c[draw * inA.length + k] = Math.max(fromA, fromB);
            }
            disagreeing += agree ? 0 : 1;
        }
        refuseOtherDraws(a, disagreeing);
        return c;
    }

    /** A draw that came out empty on one block set was drawn anew there; more than a few such draws mean another seed. */
    private static void refuseOtherDraws(SampleGroup a, int disagreeing) {
        if (2 * disagreeing > a.size()) {
            throw new IllegalArgumentException("numbers of " + a.key() + " meet whose multiplicities differ in " + disagreeing + " of "
                + a.size() + " draws; use one seed for both");
        }
    }

    /** Place in {@code group} of each block of {@code union}; -1 when absent. */
    static int[] places(SampleGroup group, List<BlockLabel> union) {
        List<BlockLabel> own = group.labels();
        int[] places = new int[union.size()];
        int at = 0;
        for (int k = 0; k < places.length; k++) {
            while (at < own.size() && own.get(at).compareTo(union.get(k)) < 0) {
                at++;
            }
            places[k] = at < own.size() && own.get(at).equals(union.get(k)) ? at : -1;
        }
        return places;
    }

    /**
     * Samples of a number moved to the union: deviations scaled so that the variance stays what it was.
     * <pre>
     *   jackknife   x_k -> central + sqrt(w_k/W_k) (x_k - c),  central where the block is absent
     *   bootstrap   x_b -> c + sqrt(w/W) (x_b - c)
     * </pre>
     * Hence cov(x, y) on the union is sum_k sqrt(w_k(x) w_k(y)) (x_k - c(x)) (y_k - c(y)) over the shared blocks.
     *
     * @param x [k], the number's samples; read
     */
    static double[] moved(double central, double[] x, SampleGroup from, SampleGroup to) {
        double c = from.centre(central, x, 0, 1);
        double[] out = new double[to.size()];
        if (from.kind() == SampleGroup.Kind.BOOTSTRAP) {
            for (int b = 0; b < out.length; b++) {
                out[b] = c + Math.sqrt(from.weight(b) / to.weight(b)) * (x[b] - c);
            }
            return out;
        }
        int[] places = places(from, to.labels());
        for (int k = 0; k < out.length; k++) {
            int at = places[k];
            out[k] = at < 0 ? central : central + Math.sqrt(from.weight(at) / to.weight(k)) * (x[at] - c);
        }
        return out;
    }
}
