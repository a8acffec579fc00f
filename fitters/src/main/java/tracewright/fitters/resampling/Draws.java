package tracewright.fitters.resampling;

import java.nio.ByteBuffer;
import java.nio.charset.StandardCharsets;
import java.security.MessageDigest;
import java.security.NoSuchAlgorithmException;
import java.util.List;
import tracewright.fitters.sampled.BlockLabel;

/**
 * Bootstrap multiplicities of an ensemble as a pure function of (study seed, ensemble, sample index, block label): the same for
 * every observable, thread and order, and unchanged when trajectories are appended or other streams come and go.
 * <pre>
 *   key     = first 16 bytes, big-endian, of SHA-256 of UTF-8 "seed newline ensemble"
 *   counter = (sample index, block index on the grid, first 8 bytes of SHA-256 of the stream's name, purpose)
 *   c_bk    = number of thresholds T_j &lt;= first word, T_j = floor(2^64 sum_{i&lt;=j} e^-1/i!)         Poisson with mean one
 * </pre>
 * Purpose 0 makes draws of blocks, 1 draws by position; other numbers are free for simulations.
 */
public final class Draws {

    /** Added to the purpose each time a sample came out with no configuration at all. */
    static final long REDRAW = 256;

    /** T_j, unsigned; from the series of 1/e with 60 digits. */
    private static final long[] THRESHOLDS = {
        0x5e2d58d8b3bcdf1aL, 0xbc5ab1b16779be35L, 0xeb715e1dc1582dc2L, 0xfb23979734a252f1L, 0xff1025f59174dc3dL, 0xffd90f3ba4055e19L,
        0xfffa8b71fc72c913L, 0xffff540c0914b3c9L, 0xffffed1f4aa8f120L, 0xfffffe216e641462L, 0xffffffd4d85d3183L, 0xfffffffc6da262b4L,
        0xffffffffba12d178L, 0xfffffffffb07c64cL, 0xffffffffffab8ea5L, 0xfffffffffffabe22L, 0xffffffffffffb11aL, 0xfffffffffffffba1L,
        0xffffffffffffffc5L, 0xfffffffffffffffdL, 0xffffffffffffffffL
    };

    private final long key0;
    private final long key1;

    private Draws(long key0, long key1) {
        this.key0 = key0;
        this.key1 = key1;
    }

    /** Draws of one ensemble under one study seed. */
    public static Draws of(long seed, String ensemble) {
        ByteBuffer digest = ByteBuffer.wrap(sha256(seed + "\n" + ensemble));
        return new Draws(digest.getLong(), digest.getLong());
    }

    private static byte[] sha256(String text) {
        try {
            return MessageDigest.getInstance("SHA-256").digest(text.getBytes(StandardCharsets.UTF_8));
        } catch (NoSuchAlgorithmException e) {
            throw new IllegalStateException("every Java platform has SHA-256", e);
        }
    }

    /** Word that stands for a stream in the counter. */
    static long streamWord(String stream) {
        return ByteBuffer.wrap(sha256(stream)).getLong();
    }

    /** Key words, for tests of the scheme. */
    long[] key() {
        return new long[] {key0, key1};
    }

    /** Replaces four counter words by four random words. */
    public void words(long[] counter) {
        Philox.block(counter, key0, key1);
    }

    /**
     * Multiplicities c_bk [draw][block] flat. A sample that would hold no block is drawn again with another purpose.
     *
     * @param labels [block]
     */
    public int[] multiplicities(List<BlockLabel> labels, int draws) {
        int blocks = labels.size();
        long[] streamWords = new long[blocks];
        for (int k = 0; k < blocks; k++) {
            boolean same = k > 0 && labels.get(k).stream().equals(labels.get(k - 1).stream());
            streamWords[k] = same ? streamWords[k - 1] : streamWord(labels.get(k).stream());
        }
        int[] c = new int[draws * blocks];
        for (int b = 0; b < draws; b++) {
            long purpose = 0;
            while (!draw(labels, streamWords, b, purpose, c)) {
                purpose += REDRAW;
            }
        }
        return c;
    }

    /** One sample; false if it is empty. */
    private boolean draw(List<BlockLabel> labels, long[] streamWords, int sample, long purpose, int[] c) {
        long[] words = new long[4];
        boolean any = false;
        for (int k = 0; k < streamWords.length; k++) {
            words[0] = sample;
            words[1] = labels.get(k).index();
            words[2] = streamWords[k];
            words[3] = purpose;
            words(words);
            int times = poisson(words[0]);
            c[sample * streamWords.length + k] = times;
            any |= times > 0;
        }
        return any;
    }

    /** Poisson variate of mean one from a uniform 64-bit word. */
    static int poisson(long word) {
        int times = 0;
        while (times < THRESHOLDS.length && Long.compareUnsigned(THRESHOLDS[times], word) <= 0) {
            times++;
        }
        return times;
    }

    /**
     * Places on a grid of {@code blocks} drawn with replacement: a fixed total, but every sample changes when the grid grows.
     *
     * @return [position], each below {@code blocks}
     */
    public int[] byPosition(int sample, int blocks) {
        int[] places = new int[blocks];
        long[] words = new long[4];
        for (int i = 0; i < blocks; i++) {
            if (i % 4 == 0) {
                words[0] = sample;
                words[1] = i / 4;
                words[2] = 0;
                words[3] = 1;
                words(words);
            }
            places[i] = (int) Philox.high(words[i % 4], blocks);
        }
        return places;
    }

    static long threshold(int j) {
        return THRESHOLDS[j];
    }
}
