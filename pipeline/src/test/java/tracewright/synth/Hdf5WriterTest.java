package tracewright.synth;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import io.jhdf.HdfFile;
import java.nio.ByteBuffer;
import java.nio.ByteOrder;
import java.nio.charset.StandardCharsets;
import java.util.List;
import java.util.Map;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import tracewright.study.InputException;

/** Files are read back by jHDF 0.13.0; the checksums of their metadata, which jHDF does not look at, are tested by themselves. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class Hdf5WriterTest {

    @ParameterizedTest
    @CsvSource({"'', deadbeef", "'Four score and seven years ago', 17770551"})
    void given_a_text_when_hashed_then_it_is_the_value_published_with_the_hash(String text, String hex) {
        // Driver 5 of Jenkins' lookup3.c (May 2006).
        assertEquals(hex, Integer.toHexString(Lookup3.hash(text.getBytes(StandardCharsets.US_ASCII))));
    }

    @Test
    void given_datasets_in_groups_when_written_then_a_reader_finds_shapes_and_numbers() {
        Hdf5Writer writer = new Hdf5Writer();
        writer.contiguous("/labels/n", Hdf5Writer.Type.INT64, new long[] {2}, little(16).putLong(-7).putLong(1L << 40).array());
        writer.contiguous("/labels/t0", Hdf5Writer.Type.INT32, new long[] {1, 2}, little(8).putInt(3).putInt(-5).array());
        writer.strings("/labels/stream", List.of("a", "\u00e9bauche"));
        writer.contiguous("x", Hdf5Writer.Type.FLOAT64, new long[] {2}, little(16).putDouble(1.25e-300).putDouble(-2).array());
        try (HdfFile file = HdfFile.fromBytes(writer.bytes())) {
            assertArrayEquals(new long[] {-7, 1L << 40}, (long[]) file.getDatasetByPath("/labels/n").getData());
            assertArrayEquals(new int[][] {{3, -5}}, (int[][]) file.getDatasetByPath("/labels/t0").getData());
            assertArrayEquals(new String[] {"a", "\u00e9bauche"}, (String[]) file.getDatasetByPath("/labels/stream").getData());
            assertArrayEquals(new double[] {1.25e-300, -2}, (double[]) file.getDatasetByPath("/x").getData());
        }
    }

    @Test
    void given_a_last_chunk_that_is_not_full_when_written_in_chunks_then_a_reader_finds_every_number() {
        ByteBuffer bytes = little(7 * 3 * 4);
        float[][] rows = new float[7][3];
        for (int i = 0; i < 7; i++) {
            for (int k = 0; k < 3; k++) {
                rows[i][k] = 1f / (1 + 3 * i + k);
                bytes.putFloat(rows[i][k]);
            }
        }
        Hdf5Writer writer = new Hdf5Writer();
        writer.chunked("/deep/er/x", Hdf5Writer.Type.FLOAT32, new long[] {7, 3}, 2, bytes.array());
        try (HdfFile file = HdfFile.fromBytes(writer.bytes())) {
            assertArrayEquals(rows, (float[][]) file.getDatasetByPath("/deep/er/x").getData());
        }
    }

    @Test
    void given_complex_numbers_when_written_as_a_compound_then_a_reader_finds_real_and_imaginary_parts() {
        Hdf5Writer writer = new Hdf5Writer();
        writer.contiguous("narrow", Hdf5Writer.Type.COMPLEX_FLOAT32, new long[] {2}, little(16).putFloat(1).putFloat(-2).putFloat(3).putFloat(4).array());
        writer.chunked("wide", Hdf5Writer.Type.COMPLEX_FLOAT64, new long[] {2}, 1, little(32).putDouble(1).putDouble(-2).putDouble(3).putDouble(4).array());
        try (HdfFile file = HdfFile.fromBytes(writer.bytes())) {
            Map<?, ?> narrow = (Map<?, ?>) file.getDatasetByPath("/narrow").getData();
            Map<?, ?> wide = (Map<?, ?>) file.getDatasetByPath("/wide").getData();
            assertArrayEquals(new float[] {1, 3}, (float[]) narrow.get("r"));
            assertArrayEquals(new float[] {-2, 4}, (float[]) narrow.get("i"));
            assertArrayEquals(new double[] {1, 3}, (double[]) wide.get("r"));
            assertArrayEquals(new double[] {-2, 4}, (double[]) wide.get("i"));
        }
    }

    @Test
    void given_the_same_datasets_when_written_twice_then_the_bytes_are_the_same() {
        assertArrayEquals(small(), small());
    }

    private static byte[] small() {
        Hdf5Writer writer = new Hdf5Writer();
        writer.chunked("x", Hdf5Writer.Type.FLOAT64, new long[] {2}, 1, little(16).putDouble(1).putDouble(2).array());
        return writer.bytes();
    }

    @Test
    void given_a_name_twice_or_too_many_chunks_when_written_then_both_are_refused() {
        Hdf5Writer writer = new Hdf5Writer();
        writer.contiguous("x", Hdf5Writer.Type.FLOAT32, new long[] {1}, new byte[4]);
        assertTrue(assertThrows(InputException.class, () -> writer.contiguous("/x", Hdf5Writer.Type.FLOAT32, new long[] {1}, new byte[4]))
            .getMessage().contains("two datasets are called /x"));
        assertTrue(assertThrows(IllegalArgumentException.class, () -> writer.chunked("y", Hdf5Writer.Type.FLOAT32, new long[] {65}, 1, new byte[260]))
            .getMessage().contains("65 chunks"));
    }

    private static ByteBuffer little(int size) {
        return ByteBuffer.allocate(size).order(ByteOrder.LITTLE_ENDIAN);
    }
}
