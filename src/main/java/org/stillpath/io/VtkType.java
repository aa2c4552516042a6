package org.stillpath.io;

import java.nio.ByteBuffer;
import java.util.Locale;
import java.util.Optional;

/** The types of number in VTK files, by their names in legacy and in XML files. */
enum VtkType {
    INT8(1, "char", "Int8"),
    UINT8(1, "unsigned_char", "UInt8"),
    INT16(2, "short", "Int16"),
    UINT16(2, "unsigned_short", "UInt16"),
    INT32(4, "int", "Int32"),
    UINT32(4, "unsigned_int", "UInt32"),
    INT64(8, "vtktypeint64", "Int64"),
    UINT64(8, "vtktypeuint64", "UInt64"),
    FLOAT32(4, "float", "Float32"),
    FLOAT64(8, "double", "Float64");

    private final int size;
    private final String legacy;
    private final String xml;

    VtkType(int size, String legacy, String xml) {
        this.size = size;
        this.legacy = legacy;
        this.xml = xml;
    }

    /** The type of a legacy file. {@code long} has another length on another system, hence is none of them. */
    static Optional<VtkType> ofLegacy(String name) {
        String word = name.toLowerCase(Locale.ROOT);
        if (word.equals("vtkidtype")) {
            return Optional.of(INT32);
        }
        for (VtkType t : values()) {
            if (t.legacy.equals(word)) {
                return Optional.of(t);
            }
        }
        return Optional.empty();
    }

    /** The type of an XML file. */
    static Optional<VtkType> ofXml(String name) {
        for (VtkType t : values()) {
            if (t.xml.equals(name)) {
                return Optional.of(t);
            }
        }
        return Optional.empty();
    }

    /** Bytes of one number. */
    int size() {
        return size;
    }

    /** As many numbers as {@code count} from the buffer's position on, in its byte order. */
    double[] read(ByteBuffer in, int count) {
        double[] out = new double[count];
        for (int i = 0; i < count; i++) {
            out[i] = switch (this) {
                case INT8 -> in.get();
                case UINT8 -> in.get() & 0xff;
                case INT16 -> in.getShort();
                case UINT16 -> in.getShort() & 0xffff;
                case INT32 -> in.getInt();
                case UINT32 -> in.getInt() & 0xffffffffL;
                case INT64 -> in.getLong();
                case UINT64 -> unsigned(in.getLong());
                case FLOAT32 -> in.getFloat();
                case FLOAT64 -> in.getDouble();
            };
        }
        return out;
    }

    private static double unsigned(long v) {
        // halved, the last bit kept for the rounding, and doubled
        return v >= 0 ? v : 2 * (double) ((v >>> 1) | (v & 1));
    }
}
