package tracewright.fitters.resampling;

/**
 * Random words as a pure function of counter and key: Philox 4x64 with ten rounds, Salmon, Moraes, Dror, Shaw, SC11 (2011),
 * doi:10.1145/2063384.2063405. No state, so draws do not depend on order or threads.
 */
public final class Philox {

    private static final long MULTIPLIER_0 = 0xD2E7470EE14C6C93L;
    private static final long MULTIPLIER_1 = 0xCA5A826395121157L;
    private static final long WEYL_0 = 0x9E3779B97F4A7C15L;   // golden ratio
    private static final long WEYL_1 = 0xBB67AE8584CAA73BL;   // sqrt(3) - 1
    private static final int ROUNDS = 10;

    private Philox() {
    }

    /**
     * Ten rounds, in place.
     *
     * @param words four counter words; overwritten with four random words
     */
    public static void block(long[] words, long key0, long key1) {
        long c0 = words[0];
        long c1 = words[1];
        long c2 = words[2];
        long c3 = words[3];
        long k0 = key0;
        long k1 = key1;
        for (int round = 0; round < ROUNDS; round++) {
            long low0 = MULTIPLIER_0 * c0;
            long low1 = MULTIPLIER_1 * c2;
            long next0 = high(MULTIPLIER_1, c2) ^ c1 ^ k0;
            c2 = high(MULTIPLIER_0, c0) ^ c3 ^ k1;
            c0 = next0;
            c1 = low1;
            c3 = low0;
            k0 += WEYL_0;
            k1 += WEYL_1;
        }
        words[0] = c0;
        words[1] = c1;
        words[2] = c2;
        words[3] = c3;
    }

    /** Upper half of the unsigned 128-bit product. */
    static long high(long a, long b) {
        return Math.multiplyHigh(a, b) + ((a >> 63) & b) + ((b >> 63) & a);
    }
}
