package org.stillpath.io;

import java.nio.ByteBuffer;
import java.nio.ByteOrder;
import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.regex.Pattern;
import org.stillpath.job.Lattice;
import org.stillpath.problem.Place;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Words;
import org.stillpath.unit.Decimal;

/**
 * Legacy files of VTK ({@code # vtk DataFile Version ..}), text or binary (high byte first), with a rectilinear grid or
 * structured points; after "File Formats for VTK Version 4.2", The VTK User's Guide, and for metadata blocks the VTK 8.2
 * page on the legacy information format.
 *
 * <p>The file is walked once, noting where each array starts and stepping over its numbers; then the coordinates and the
 * array that is wanted are read. Nothing is reserved before it is known that the file is long enough for it. Mutable on
 * purpose; belongs to one file.
 */
final class VtkLegacy {
    /** What the first line starts with, whatever the case of its letters. */
    static final String MAGIC = "# vtk datafile version";

    private static final Pattern BLANKS = Pattern.compile("[ \t\r]+");

    private final byte[] bytes;
    /** The bytes as characters, one each. */
    private final String text;

    private final String source;
    private final Lattice.Wanted wanted;
    private final Place asked;

    private int pos;
    private boolean binary;
    private boolean rectilinear;
    private final long[] planes = new long[3];
    private int nodes;
    private final double[] origin = {0, 0, 0};
    private final double[] spacing = {1, 1, 1};
    private final Run[] axes = {Run.NONE, Run.NONE, Run.NONE};
    private int dimensionsAt = -1;
    private int dataAt;
    private final List<VtkBlock.Array> arrays = new ArrayList<>();
    private final List<Run> runs = new ArrayList<>();
    private boolean onCells;

    /**
     * Numbers in the file.
     *
     * @param start offset of the first; −1 for none
     * @param count how many
     * @param type their type
     * @param header offset of the line that announces them
     */
    private record Run(int start, int count, VtkType type, int header) {
        static final Run NONE = new Run(-1, 0, VtkType.FLOAT64, 0);
    }

    private VtkLegacy(byte[] bytes, String source, Lattice.Wanted wanted, Place asked) {
        this.bytes = bytes;
        this.text = new String(bytes, StandardCharsets.ISO_8859_1);
        this.source = source;
        this.wanted = wanted;
        this.asked = asked;
    }

    /** Whether a file starts as one of these. */
    static boolean isOne(byte[] bytes) {
        String start = new String(bytes, 0, Math.min(bytes.length, MAGIC.length()), StandardCharsets.ISO_8859_1);
        return start.toLowerCase(Locale.ROOT).equals(MAGIC);
    }

    /**
     * Reads a grid.
     *
     * @param bytes the file
     * @param source its name, for places
     * @param wanted which array
     * @param asked where the job names the file
     * @throws ProblemException if it holds no such grid
     */
    static Lattice read(byte[] bytes, String source, Lattice.Wanted wanted, Place asked) {
        VtkBlock.check(wanted, source, asked);
        return new VtkLegacy(bytes, source, wanted, asked).lattice();
    }

    private Lattice lattice() {
        line();
        line();
        int start = pos;
        String format = line().strip().toUpperCase(Locale.ROOT);
        if (!format.equals("ASCII") && !format.equals("BINARY")) {
            throw fault(start, "the third line must say ASCII or BINARY, not " + Words.quoted(format));
        }
        binary = format.equals("BINARY");
        start = skipBlank();
        String[] words = words();
        if (!words[0].equalsIgnoreCase("DATASET") || words.length != 2) {
            throw fault(start, "\"DATASET RECTILINEAR_GRID\" or \"DATASET STRUCTURED_POINTS\" is needed here");
        }
        rectilinear = words[1].equalsIgnoreCase("RECTILINEAR_GRID");
        if (!rectilinear && !words[1].equalsIgnoreCase("STRUCTURED_POINTS")) {
            throw fault(
                    start,
                    "a data set " + Words.quoted(words[1]) + " is no rectilinear grid; RECTILINEAR_GRID or"
                            + " STRUCTURED_POINTS is needed, other meshes must be put on one first");
        }
        boolean data = false;
        while (skipBlank() < bytes.length) {
            data = section(data);
        }
        return taken();
    }

    private Lattice taken() {
        needDimensions(text.length());
        Place end = place(dataAt > 0 ? dataAt : text.length());
        int chosen = VtkBlock.chosen(arrays, onCells, wanted, source, end, asked);
        double[][] at = new double[3][];
        Place[] where = VtkBlock.thrice(place(dimensionsAt));
        for (int a = 0; a < 3; a++) {
            int n = (int) planes[a];
            if (!rectilinear) {
                at[a] = VtkBlock.even(0, n, origin[a], spacing[a]);
            } else if (axes[a].start() < 0) {
                throw fault(dimensionsAt, "\"" + "XYZ".charAt(a) + "_COORDINATES " + n + " double\" is missing");
            } else {
                at[a] = numbers(axes[a]);
                where[a] = place(axes[a].header());
            }
        }
        return VtkBlock.lattice(source, at, where, arrays.get(chosen), numbers(runs.get(chosen)));
    }

    /** Reads one keyword and what belongs to it; tells whether the part on points or cells has begun. */
    private boolean section(boolean data) {
        int start = pos;
        String[] words = words();
        String key = words[0].toUpperCase(Locale.ROOT);
        switch (key) {
            case "DIMENSIONS" -> {
                dimensionsAt = start;
                for (int a = 0; a < 3; a++) {
                    planes[a] = count(words, a + 1, start);
                }
                nodes = VtkBlock.nodes(planes, place(start));
            }
            case "ORIGIN" -> triple(words, origin, start);
            case "SPACING", "ASPECT_RATIO" -> triple(words, spacing, start);
            case "X_COORDINATES", "Y_COORDINATES", "Z_COORDINATES" -> {
                needDimensions(start);
                int a = key.charAt(0) - 'X';
                long n = count(words, 1, start);
                if (n != planes[a]) {
                    throw fault(start, n + " coordinates stand here, DIMENSIONS asks for " + planes[a]);
                }
                axes[a] = skip(n, type(words, 2, start), start);
            }
            case "METADATA" -> metadata();
            case "FIELD" -> field(words, start, data && !cells);
            case "POINT_DATA" -> {
                needDimensions(start);
                long n = count(words, 1, start);
                if (n != nodes) {
                    throw fault(start, "point data for " + n + " nodes, DIMENSIONS makes " + nodes);
                }
                tuples = n;
                dataAt = start;
                cells = false;
            }
            case "CELL_DATA" -> {
                tuples = count(words, 1, start);
                cells = true;
                onCells = true;
            }
            default -> attribute(key, words, start);
        }
        return data || key.equals("POINT_DATA") || key.equals("CELL_DATA");
    }

    /** Points or cells of the part that is read. */
    private long tuples;

    private boolean cells;

    private void attribute(String key, String[] words, int start) {
        switch (key) {
            case "SCALARS" -> {
                VtkType type = type(words, 2, start);
                int components = words.length > 3 ? (int) Math.min(1000, count(words, 3, start)) : 1;
                int table = skipBlank();
                String[] next = words();
                if (!next[0].equalsIgnoreCase("LOOKUP_TABLE")) {
                    throw fault(table, "after SCALARS the line \"LOOKUP_TABLE default\" is needed");
                }
                keep(name(words, 1, start), components, skip(tuples * components, type, start), !cells);
            }
            case "VECTORS", "NORMALS" -> plain(words, 3, start);
            case "TENSORS" -> plain(words, 9, start);
            case "TENSORS6" -> plain(words, 6, start);
            case "GLOBAL_IDS", "PEDIGREE_IDS", "EDGE_FLAGS" -> plain(words, 1, start);
            case "TEXTURE_COORDINATES" -> {
                int components = (int) Math.min(1000, count(words, 2, start));
                skip(tuples * components, type(words, 3, start), start);
            }
            case "COLOR_SCALARS" ->
                skip(tuples * Math.min(1000, count(words, 2, start)), binary ? VtkType.UINT8 : VtkType.FLOAT32, start);
            case "LOOKUP_TABLE" -> skip(4 * count(words, 2, start), binary ? VtkType.UINT8 : VtkType.FLOAT32, start);
            default ->
                throw fault(
                        start,
                        Words.quoted(words[0])
                                + " is not understood here; a keyword such as SCALARS or FIELD is expected,"
                                + " perhaps the numbers before it are more than announced");
        }
    }

    private void plain(String[] words, int components, int start) {
        Run run = skip(tuples * components, type(words, 2, start), start);
        keep(name(words, 1, start), components, run, !cells);
    }

    private void field(String[] words, int start, boolean onPoints) {
        long count = count(words, 2, start);
        for (long i = 0; i < count; i++) {
            int line = skipBlank();
            String[] w = words();
            if (w[0].equals("METADATA")) {
                metadata();
                i--;
                continue;
            }
            if (w.length != 4) {
                throw fault(line, "an array of a FIELD starts with a line \"NAME COMPONENTS TUPLES TYPE\"");
            }
            long components = count(w, 1, line);
            long rows = count(w, 2, line);
            if (components > Integer.MAX_VALUE || rows > Integer.MAX_VALUE) {
                throw fault(line, "the file is too short for this array");
            }
            Run run = skip(components * rows, type(w, 3, line), line);
            keep(name(w, 0, line), (int) components, run, onPoints && rows == nodes);
        }
    }

    private void keep(String name, int components, Run run, boolean onPoints) {
        if (onPoints) {
            arrays.add(new VtkBlock.Array(name, components, run.type(), place(run.header())));
            runs.add(run);
        }
    }

    /** Steps over a block that an empty line ends. */
    private void metadata() {
        boolean more = true;
        while (more && pos < bytes.length) {
            more = !line().isBlank();
        }
    }

    // --- numbers ---

    /** Steps over numbers that start here. */
    private Run skip(long count, VtkType type, int header) {
        int first = pos;
        long left = bytes.length - (long) pos;
        // in a text, each number takes a digit and a blank
        long needed = binary ? count * type.size() : 2 * count - 1;
        if (count > Integer.MAX_VALUE || needed > left) {
            throw fault(
                    header,
                    "the file is too short: " + count + " numbers are announced here, " + Math.max(0, left)
                            + " bytes follow");
        }
        if (binary) {
            pos += (int) needed;
        } else {
            for (long i = 0; i < count; i++) {
                if (skipBlank() == bytes.length) {
                    throw fault(
                            header,
                            "the file is too short: " + count + " numbers are announced here, " + i + " follow");
                }
                skipToken();
            }
        }
        return new Run(first, (int) count, type, header);
    }

    private double[] numbers(Run run) {
        if (binary) {
            ByteBuffer in =
                    ByteBuffer.wrap(bytes, run.start(), run.count() * run.type().size());
            return run.type().read(in.order(ByteOrder.BIG_ENDIAN), run.count());
        }
        double[] out = new double[run.count()];
        pos = run.start();
        for (int i = 0; i < out.length; i++) {
            int start = skipBlank();
            skipToken();
            out[i] = Decimal.parse(text, start, pos);
            if (Double.isNaN(out[i])) {
                throw fault(start, Words.quoted(text.substring(start, pos)) + " is not a number; one is needed here");
            }
        }
        return out;
    }

    private void triple(String[] words, double[] out, int start) {
        for (int a = 0; a < 3; a++) {
            double v = words.length == 4 ? Decimal.parse(words[a + 1], 0, words[a + 1].length()) : Double.NaN;
            if (Double.isNaN(v)) {
                throw fault(start, words[0] + " needs three numbers");
            }
            out[a] = v;
        }
    }

    private long count(String[] words, int i, int start) {
        double v = i < words.length ? Decimal.parse(words[i], 0, words[i].length()) : Double.NaN;
        if (!(v >= 0 && v <= 1e12 && v == Math.rint(v))) {
            throw fault(
                    start,
                    words[0] + (i < words.length ? " has " + Words.quoted(words[i]) : " lacks a word")
                            + " where a whole number is needed");
        }
        return (long) v;
    }

    private VtkType type(String[] words, int i, int start) {
        String name = i < words.length ? words[i] : "";
        return VtkType.ofLegacy(name)
                .orElseThrow(() -> fault(
                        start,
                        Words.quoted(name) + " is not a type of number that is read here; save the array as double"));
    }

    /** A name; blanks and the like stand in it as {@code %20}. */
    private String name(String[] words, int i, int start) {
        if (i >= words.length) {
            throw fault(start, words[0] + " lacks a name");
        }
        StringBuilder b = new StringBuilder();
        String w = words[i];
        for (int k = 0; k < w.length(); k++) {
            int code = w.charAt(k) == '%' && k + 2 < w.length() ? hex(w, k + 1) : -1;
            b.append(code < 0 ? w.charAt(k) : (char) code);
            k += code < 0 ? 0 : 2;
        }
        return b.toString();
    }

    private static int hex(String w, int k) {
        int high = Character.digit(w.charAt(k), 16);
        int low = Character.digit(w.charAt(k + 1), 16);
        return high < 0 || low < 0 ? -1 : 16 * high + low;
    }

    private void needDimensions(int at) {
        if (dimensionsAt < 0) {
            throw fault(at, "the line \"DIMENSIONS nx ny nz\" is missing before this");
        }
    }

    // --- text ---

    /** The rest of the line, and past its end. */
    private String line() {
        int end = text.indexOf('\n', pos);
        String line = text.substring(pos, end < 0 ? text.length() : end);
        pos = end < 0 ? text.length() : end + 1;
        return line;
    }

    /** The words of the rest of the line, at least one, an empty one if need be. */
    private String[] words() {
        return BLANKS.split(line().strip());
    }

    private int skipBlank() {
        while (pos < bytes.length && isBlank(bytes[pos])) {
            pos++;
        }
        return pos;
    }

    private void skipToken() {
        while (pos < bytes.length && !isBlank(bytes[pos])) {
            pos++;
        }
    }

    private static boolean isBlank(byte b) {
        return b == ' ' || b == '\n' || b == '\r' || b == '\t';
    }

    /** Place of an offset; lines are counted as an editor does, also through binary data. */
    private Place place(int offset) {
        int line = 1;
        int start = 0;
        for (int i = 0; i < Math.min(offset, bytes.length); i++) {
            if (bytes[i] == '\n') {
                line++;
                start = i + 1;
            }
        }
        return new Place(source, line, 1 + offset - start);
    }

    private ProblemException fault(int offset, String message) {
        return VtkBlock.fault(place(offset), message);
    }
}
