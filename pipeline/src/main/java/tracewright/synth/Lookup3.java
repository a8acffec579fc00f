package tracewright.synth;

/**
 * The checksum of HDF5 metadata: the 32-bit hash "lookup3" for byte strings, initial value 0 (B. Jenkins, 2006, public domain;
 * HDF5 File Format Specification, version 3.0, names it for superblocks and object headers).
 */
final class Lookup3 {

    private int a;
    private int b;
    private int c;

    private Lookup3(int length) {
        a = 0xdeadbeef + length;
        b = a;
        c = a;
    }

    static int hash(byte[] bytes) {
        Lookup3 state = new Lookup3(bytes.length);
        int at = 0;
        for (; bytes.length - at > 12; at += 12) {
            state.add(bytes, at);
            state.mix();
        }
        if (at == bytes.length) {
            return state.c;     // nothing at all was given
        }
        state.add(bytes, at);
        state.finish();
        return state.c;
    }

    private void add(byte[] bytes, int at) {
        a += word(bytes, at);
        b += word(bytes, at + 4);
        c += word(bytes, at + 8);
    }

    /** Little-endian word; bytes beyond the end are zero. */
    private static int word(byte[] bytes, int at) {
        int word = 0;
        for (int k = 0; k < 4 && at + k < bytes.length; k++) {
            word |= (bytes[at + k] & 0xff) << (8 * k);
        }
        return word;
    }

    private void mix() {
        a = (a - c) ^ Integer.rotateLeft(c, 4);
        c += b;
        b = (b - a) ^ Integer.rotateLeft(a, 6);
        a += c;
        c = (c - b) ^ Integer.rotateLeft(b, 8);
        b += a;
        a = (a - c) ^ Integer.rotateLeft(c, 16);
        c += b;
        b = (b - a) ^ Integer.rotateLeft(a, 19);
        a += c;
        c = (c - b) ^ Integer.rotateLeft(b, 4);
        b += a;
    }

    private void finish() {
        c = (c ^ b) - Integer.rotateLeft(b, 14);
        a = (a ^ c) - Integer.rotateLeft(c, 11);
        b = (b ^ a) - Integer.rotateLeft(a, 25);
        c = (c ^ b) - Integer.rotateLeft(b, 16);
        a = (a ^ c) - Integer.rotateLeft(c, 4);
        b = (b ^ a) - Integer.rotateLeft(a, 14);
        c = (c ^ b) - Integer.rotateLeft(b, 24);
    }
}
