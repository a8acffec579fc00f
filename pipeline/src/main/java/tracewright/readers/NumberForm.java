package tracewright.readers;

import io.jhdf.object.datatype.CompoundDataType;
import io.jhdf.object.datatype.CompoundDataType.CompoundDataMember;
import io.jhdf.object.datatype.DataType;
import io.jhdf.object.datatype.FixedPoint;
import io.jhdf.object.datatype.FloatingPoint;
import java.nio.ByteBuffer;
import java.nio.ByteOrder;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import java.util.Set;
import tracewright.study.Layout.ComplexForm;

/**
 * Where the real part of each stored number stands and how its bytes are read: element k of an array occupies bytes
 * k stride + offset onwards.
 *
 * @param stride bytes from one element to the next
 * @param offset bytes from the start of an element to its real part
 */
record NumberForm(Kind kind, ByteOrder order, int stride, int offset, String inWords) {

    /** Machine types that hold numbers. */
    enum Kind {
        FLOAT16, FLOAT32, FLOAT64, INT8, INT16, INT32, INT64, UINT8, UINT16, UINT32, UINT64
    }

    private static final Set<String> REAL = Set.of("re", "r", "real");
    private static final Set<String> IMAGINARY = Set.of("im", "i", "imag");

    /** Form of a dataset's elements; empty if they are no numbers of that complex form. */
    static Optional<NumberForm> of(DataType type, ComplexForm complex) {
        if (complex == ComplexForm.COMPOUND) {
            return type instanceof CompoundDataType c ? compound(c) : Optional.empty();
        }
        return plain(type).map(f -> complex == ComplexForm.TRAILING ? f.paired() : f);
    }

    private static Optional<NumberForm> compound(CompoundDataType type) {
        List<CompoundDataMember> members = type.getMembers();
        boolean complete = members.size() == 2 && members.stream().anyMatch(m -> IMAGINARY.contains(lower(m)));
        return members.stream()
            .filter(m -> complete && REAL.contains(lower(m)) && isSingle(m))
            .findFirst()
            .flatMap(m -> plain(m.getDataType()).map(f -> f.inside(type.getSize(), m.getOffset())));
    }

    /** Version 1 of the type's encoding gives dimensions to every member, later ones to none; arrays have a type of their own there. */
    private static boolean isSingle(CompoundDataMember m) {
        return m.getDimensionSize() == null || m.getDimensionSize().length == 0;
    }

    private static String lower(CompoundDataMember m) {
        return m.getName().toLowerCase(Locale.ROOT);
    }

    private static Optional<NumberForm> plain(DataType type) {
        if (type instanceof FloatingPoint f) {
            return Optional.ofNullable(floating(f.getSize(), f.getExponentSize()))
                .map(k -> new NumberForm(k, f.getByteOrder(), f.getSize(), 0, words(k, f.getByteOrder())));
        }
        if (type instanceof FixedPoint i) {
            return Optional.ofNullable(whole(i.getSize(), i.isSigned()))
                .map(k -> new NumberForm(k, i.getByteOrder(), i.getSize(), 0, words(k, i.getByteOrder())));
        }
        return Optional.empty();
    }

    private static Kind floating(int size, int exponentBits) {
        if (size == 8 && exponentBits == 11) {
            return Kind.FLOAT64;
        }
        if (size == 4 && exponentBits == 8) {
            return Kind.FLOAT32;
        }
        return size == 2 && exponentBits == 5 ? Kind.FLOAT16 : null;
    }

    private static Kind whole(int size, boolean signed) {
        return switch (size) {
            case 1 -> signed ? Kind.INT8 : Kind.UINT8;
            case 2 -> signed ? Kind.INT16 : Kind.UINT16;
            case 4 -> signed ? Kind.INT32 : Kind.UINT32;
            case 8 -> signed ? Kind.INT64 : Kind.UINT64;
            default -> null;
        };
    }

    private static String words(Kind kind, ByteOrder order) {
        return kind.name().toLowerCase(Locale.ROOT) + (order == ByteOrder.BIG_ENDIAN ? " big-endian" : "");
    }

    private NumberForm paired() {
        return new NumberForm(kind, order, 2 * stride, 0, inWords + " pairs on the last axis");
    }

    private NumberForm inside(int size, int at) {
        return new NumberForm(kind, order, size, at, "compound of " + inWords + " pairs");
    }

    /**
     * Reads real parts.
     *
     * @param bytes whole elements, the first one wanted at byte {@code from}; read by absolute position
     * @param out   [outFrom + k outStep], k = 0..count-1; overwritten
     */
    void decode(ByteBuffer bytes, int from, int count, double[] out, int outFrom, int outStep) {
        if (outStep == 1 && stride == 8 && kind == Kind.FLOAT64) {
            bytes.slice(from, count * 8).order(order).asDoubleBuffer().get(0, out, outFrom, count);
            return;
        }
        ByteBuffer b = bytes.duplicate().order(order);
        int at = from + offset;
        switch (kind) {
            case FLOAT64 -> {
                for (int k = 0; k < count; k++) {
                    out[outFrom + k * outStep] = b.getDouble(at + k * stride);
                }
            }
            case FLOAT32 -> {
                for (int k = 0; k < count; k++) {
                    out[outFrom + k * outStep] = b.getFloat(at + k * stride);
                }
            }
            default -> {
                for (int k = 0; k < count; k++) {
                    out[outFrom + k * outStep] = rare(b, at + k * stride);
                }
            }
        }
    }

    private double rare(ByteBuffer b, int at) {
        return switch (kind) {
            case FLOAT16 -> FloatingPoint.toFloat(b.getShort(at));
            case FLOAT32 -> b.getFloat(at);
            case FLOAT64 -> b.getDouble(at);
            case INT8 -> b.get(at);
            case INT16 -> b.getShort(at);
            case INT32 -> b.getInt(at);
            case INT64 -> b.getLong(at);
            case UINT8 -> Byte.toUnsignedInt(b.get(at));
            case UINT16 -> Short.toUnsignedInt(b.getShort(at));
            case UINT32 -> Integer.toUnsignedLong(b.getInt(at));
            case UINT64 -> unsigned(b.getLong(at));
        };
    }

    private static double unsigned(long bits) {
        return bits >= 0 ? bits : ((bits >>> 1) | (bits & 1)) * 2.0;
    }
}
