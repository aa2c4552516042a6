package org.stillpath.io;

import java.io.ByteArrayInputStream;
import java.io.IOException;
import java.io.InputStream;
import java.io.StringReader;
import java.nio.ByteBuffer;
import java.nio.ByteOrder;
import java.nio.charset.StandardCharsets;
import java.util.ArrayDeque;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.Deque;
import java.util.List;
import java.util.Optional;
import java.util.zip.DataFormatException;
import java.util.zip.Inflater;
import javax.xml.XMLConstants;
import javax.xml.stream.XMLInputFactory;
import javax.xml.stream.XMLStreamConstants;
import javax.xml.stream.XMLStreamException;
import javax.xml.stream.XMLStreamReader;
import org.jspecify.annotations.Nullable;
import org.stillpath.job.Lattice;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Words;
import org.stillpath.unit.Decimal;

/**
 * XML files of VTK with a rectilinear grid (.vtr) or image data (.vti); after "File Formats for VTK Version 4.2", The VTK
 * User's Guide, and the wiki page "VTK XML Formats".
 *
 * <p>The JDK's own stream reader is used, without document types and entities, so that a file can name no other file and
 * cannot grow while it is read. It runs twice over the elements: first for what there is, then for the numbers that are
 * wanted, so that the others are never kept. Appended data, which need not be XML, are cut off before and read by their
 * offset. Nothing is reserved before it is known that the file is long enough for it. Mutable on purpose; belongs to one
 * file.
 */
final class VtkXml {
    private static final String APPENDED = "<AppendedData";
    /** What the file would go on with if the appended data were empty. */
    private static final String CLOSING = "</AppendedData></VTKFile>";
    /** What zlib can make of one byte at most (1032, zlib's technical details), rounded up. */
    private static final long MOST_INFLATED = 1040;

    private final byte[] bytes;
    private final String source;
    private final Lattice.Wanted wanted;
    private final Place asked;

    /** Offset behind the start tag of the appended data; the file's length where there are none. */
    private int headEnd;
    /** Offset of the appended data themselves. */
    private int appendedStart;

    private boolean appendedRaw;

    private boolean rectilinear;
    private Optional<ByteOrder> order = Optional.empty();
    private int headerSize = 4;
    private String compressor = "";
    private @Nullable Place gridPlace;
    private @Nullable Place piecePlace;
    private int pieces;
    private final long[] first = new long[3];
    private final long[] planes = new long[3];
    private int nodes;
    private final double[] origin = {0, 0, 0};
    private final double[] spacing = {1, 1, 1};
    private boolean onCells;
    private final List<Data> onNodes = new ArrayList<>();
    private final List<Data> coordinates = new ArrayList<>();

    /**
     * A {@code DataArray}.
     *
     * @param number which it is, counted from 1
     * @param array what it is
     * @param format ascii, binary or appended
     * @param offset where it starts in the appended data
     */
    private record Data(int number, VtkBlock.Array array, String format, long offset) {
        Place place() {
            return array.place();
        }
    }

    private VtkXml(byte[] bytes, String source, Lattice.Wanted wanted, Place asked) {
        this.bytes = bytes;
        this.source = source;
        this.wanted = wanted;
        this.asked = asked;
        this.headEnd = bytes.length;
        this.appendedStart = bytes.length;
    }

    /** Whether a file may be one of these: it starts as XML does. */
    static boolean isOne(byte[] bytes) {
        int i = bytes.length > 2 && bytes[0] == (byte) 0xef ? 3 : 0;
        while (i < bytes.length && bytes[i] <= ' ' && bytes[i] > 0) {
            i++;
        }
        return i < bytes.length && bytes[i] == '<';
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
        VtkXml file = new VtkXml(bytes, source, wanted, asked);
        file.cutOff();
        return file.lattice(file.head());
    }

    private Lattice lattice(String head) {
        walk(head, this::declared);
        Place grid = gridPlace;
        if (grid == null) {
            throw fault(
                    new Place(source, 1, 1),
                    "there is no <RectilinearGrid> or <ImageData>; other meshes must be put on one first");
        }
        Place piece = piecePlace;
        if (piece == null || pieces != 1) {
            throw fault(grid, "the grid is in " + pieces + " pieces; save it in one");
        }
        int chosen = VtkBlock.chosen(onNodes.stream().map(Data::array).toList(), onCells, wanted, source, piece, asked);
        if (rectilinear && coordinates.size() != 3) {
            throw fault(piece, "<Coordinates> needs three arrays, for x, y and z; there are " + coordinates.size());
        }
        List<Data> needed = new ArrayList<>();
        needed.add(onNodes.get(chosen));
        if (rectilinear) {
            needed.addAll(coordinates);
        }
        double[][] read = new double[4][];
        for (int i = 0; i < needed.size(); i++) {
            Data d = needed.get(i);
            int count = i == 0 ? nodes : (int) planes[i - 1];
            if (d.array().components() != 1) {
                throw fault(d.place(), "an array with one number for each place is needed here");
            }
            read[i] = d.format().equals("appended") ? appended(d, count) : new double[0];
        }
        walk(head, (xml, parents, number) -> {
            for (int i = 0; i < needed.size(); i++) {
                Data d = needed.get(i);
                if (d.number() == number && !d.format().equals("appended")) {
                    read[i] = inline(d, text(xml), i == 0 ? nodes : (int) planes[i - 1]);
                    return true;
                }
            }
            return false;
        });
        double[][] at = new double[3][];
        Place[] where = VtkBlock.thrice(piece);
        for (int a = 0; a < 3; a++) {
            if (rectilinear) {
                at[a] = read[a + 1];
                where[a] = coordinates.get(a).place();
            } else {
                at[a] = VtkBlock.even(first[a], (int) planes[a], origin[a], spacing[a]);
            }
        }
        return VtkBlock.lattice(source, at, where, onNodes.get(chosen).array(), read[0]);
    }

    // --- elements ---

    /** Looks at a start tag. */
    @FunctionalInterface
    private interface Visitor {
        /**
         * Takes an element.
         *
         * @param xml at its start tag
         * @param parents names of the elements around it, the innermost first
         * @param number for a {@code DataArray}, which it is, counted from 1; 0 for others
         * @return whether the element was read to its end
         */
        boolean element(XMLStreamReader xml, Deque<String> parents, int number) throws XMLStreamException;
    }

    private void walk(String head, Visitor visitor) {
        XMLInputFactory factory = XMLInputFactory.newDefaultFactory();
        factory.setProperty(XMLInputFactory.SUPPORT_DTD, false);
        factory.setProperty(XMLInputFactory.IS_SUPPORTING_EXTERNAL_ENTITIES, false);
        factory.setProperty(XMLInputFactory.IS_REPLACING_ENTITY_REFERENCES, false);
        factory.setProperty(XMLConstants.ACCESS_EXTERNAL_DTD, "");
        factory.setXMLResolver((publicId, systemId, base, namespace) -> {
            throw new XMLStreamException("other files are not read");
        });
        Deque<String> parents = new ArrayDeque<>();
        int number = 0;
        try {
            XMLStreamReader xml = factory.createXMLStreamReader(new StringReader(head));
            while (xml.hasNext()) {
                switch (xml.next()) {
                    case XMLStreamConstants.DTD ->
                        throw fault(
                                place(xml),
                                "a DOCTYPE stands here; VTK files have none, and it is not read. Leave it out");
                    case XMLStreamConstants.ENTITY_REFERENCE ->
                        throw fault(place(xml), "an entity stands here; VTK files have none, and it is not read");
                    case XMLStreamConstants.START_ELEMENT -> {
                        String name = xml.getLocalName();
                        boolean data = name.equals("DataArray");
                        number += data ? 1 : 0;
                        if (!visitor.element(xml, parents, data ? number : 0)) {
                            parents.push(name);
                        }
                    }
                    case XMLStreamConstants.END_ELEMENT -> parents.pop();
                    default -> {}
                }
            }
        } catch (XMLStreamException e) {
            Place at = e.getLocation() == null
                    ? new Place(source, 1, 1)
                    : new Place(
                            source,
                            Math.max(1, e.getLocation().getLineNumber()),
                            Math.max(1, e.getLocation().getColumnNumber()));
            String message = String.valueOf(e.getMessage());
            int said = message.indexOf("Message: ");
            throw fault(
                    at,
                    "this is not sound XML: "
                            + (said < 0 ? message : message.substring(said + 9)).replaceAll("\\s+", " "));
        }
    }

    /** First walk: takes down what there is. */
    private boolean declared(XMLStreamReader xml, Deque<String> parents, int number) {
        String name = xml.getLocalName();
        String parent = parents.isEmpty() ? "" : parents.peek();
        Place place = place(xml);
        if (parents.isEmpty()) {
            root(xml, name, place);
        } else if (parents.size() == 1 && (name.equals("RectilinearGrid") || name.equals("ImageData"))) {
            gridPlace = place;
            rectilinear = name.equals("RectilinearGrid");
            if (!rectilinear) {
                triple(xml, "Origin", origin, place);
                triple(xml, "Spacing", spacing, place);
                double[] turn = numbers(attribute(xml, "Direction"));
                if (turn.length > 0 && !Arrays.equals(turn, new double[] {1, 0, 0, 0, 1, 0, 0, 0, 1})) {
                    throw fault(place, "Direction turns the grid; give it along its own axes, and turn the medium");
                }
            }
        } else if (name.equals("Piece")) {
            pieces++;
            piecePlace = place;
            extent(xml, place);
        } else if (name.equals("DataArray") && parent.equals("PointData")) {
            onNodes.add(data(xml, number, place));
        } else if (name.equals("DataArray") && parent.equals("CellData")) {
            onCells = true;
        } else if (name.equals("DataArray") && parent.equals("Coordinates")) {
            coordinates.add(data(xml, number, place));
        }
        return false;
    }

    private void root(XMLStreamReader xml, String name, Place place) {
        String type = attribute(xml, "type");
        if (!name.equals("VTKFile")) {
            throw fault(place, "this XML file starts with <" + name + ">; <VTKFile> is expected");
        }
        if (!type.equals("RectilinearGrid") && !type.equals("ImageData")) {
            throw fault(
                    place,
                    "a VTK file of type " + Words.quoted(type) + " is no rectilinear grid; RectilinearGrid or ImageData"
                            + " is needed, other meshes must be put on one first");
        }
        switch (attribute(xml, "byte_order")) {
            case "LittleEndian" -> order = Optional.of(ByteOrder.LITTLE_ENDIAN);
            case "BigEndian" -> order = Optional.of(ByteOrder.BIG_ENDIAN);
            case "" -> order = Optional.empty();
            default -> throw fault(place, "byte_order must be LittleEndian or BigEndian");
        }
        switch (attribute(xml, "header_type")) {
            case "", "UInt32" -> headerSize = 4;
            case "UInt64" -> headerSize = 8;
            default -> throw fault(place, "header_type must be UInt32 or UInt64");
        }
        compressor = attribute(xml, "compressor");
        if (!compressor.isEmpty() && !compressor.equals("vtkZLibDataCompressor")) {
            throw fault(
                    place,
                    "data compressed by " + Words.quoted(compressor)
                            + " are not read; save them by zlib or as they are");
        }
    }

    private void extent(XMLStreamReader xml, Place place) {
        double[] ends = numbers(attribute(xml, "Extent"));
        if (ends.length != 6) {
            throw fault(place, "Extent needs six whole numbers, first and last of x, y and z");
        }
        for (int a = 0; a < 3; a++) {
            double low = ends[2 * a];
            double high = ends[2 * a + 1];
            if (low != Math.rint(low) || high != Math.rint(high) || Math.abs(low) > 1e9 || Math.abs(high) > 1e9) {
                throw fault(place, "Extent needs six whole numbers, first and last of x, y and z");
            }
            first[a] = (long) low;
            planes[a] = Math.max(0, (long) high - (long) low + 1);
        }
        nodes = VtkBlock.nodes(planes, place);
    }

    private Data data(XMLStreamReader xml, int number, Place place) {
        String name = attribute(xml, "Name");
        String type = attribute(xml, "type");
        VtkType numbers = VtkType.ofXml(type)
                .orElseThrow(() -> fault(place, Words.quoted(type) + " is not a type of number of VTK files"));
        String components = attribute(xml, "NumberOfComponents");
        double c = components.isEmpty() ? 1 : Decimal.parse(components, 0, components.length());
        if (!(c >= 0 && c <= 1e6)) {
            throw fault(place, "NumberOfComponents must be a whole number");
        }
        String format = attribute(xml, "format");
        long offset = -1;
        switch (format) {
            case "ascii", "binary" -> {}
            case "appended" -> {
                String said = attribute(xml, "offset");
                double o = Decimal.parse(said, 0, said.length());
                if (!(o >= 0 && o < bytes.length - appendedStart)) {
                    throw fault(
                            place,
                            "offset " + Words.quoted(said) + " does not lie in the appended data, which are "
                                    + (bytes.length - appendedStart) + " bytes with the file's end; it may be cut off");
                }
                offset = (long) o;
            }
            default -> throw fault(place, "format must be ascii, binary or appended");
        }
        VtkBlock.Array array = new VtkBlock.Array(name, (int) Math.max(1, c), numbers, place);
        return new Data(number, array, format, offset);
    }

    private static String attribute(XMLStreamReader xml, String name) {
        String value = xml.getAttributeValue("", name);
        return value == null ? "" : value.strip();
    }

    private static void triple(XMLStreamReader xml, String name, double[] out, Place place) {
        String text = attribute(xml, name);
        double[] three = numbers(text);
        if (text.isEmpty()) {
            return;
        }
        if (three.length != 3) {
            throw fault(place, name + " needs three numbers, not " + Words.quoted(text));
        }
        System.arraycopy(three, 0, out, 0, 3);
    }

    /** Numbers with blanks between them; none where one of them is no number. */
    private static double[] numbers(String text) {
        String[] words = text.isEmpty() ? new String[0] : text.split("\\s+");
        double[] out = new double[words.length];
        for (int i = 0; i < out.length; i++) {
            out[i] = Decimal.parse(words[i], 0, words[i].length());
            if (Double.isNaN(out[i])) {
                return new double[0];
            }
        }
        return out;
    }

    // --- numbers ---

    /** The text of an element without others in it, to its end tag. */
    private String text(XMLStreamReader xml) throws XMLStreamException {
        StringBuilder b = new StringBuilder();
        while (true) {
            switch (xml.next()) {
                case XMLStreamConstants.END_ELEMENT -> {
                    return b.toString();
                }
                case XMLStreamConstants.CHARACTERS, XMLStreamConstants.CDATA, XMLStreamConstants.SPACE ->
                    b.append(xml.getTextCharacters(), xml.getTextStart(), xml.getTextLength());
                case XMLStreamConstants.START_ELEMENT -> {
                    // <InformationKey> and the like say more about the array
                    int depth = 1;
                    while (depth > 0) {
                        int event = xml.next();
                        depth += event == XMLStreamConstants.START_ELEMENT ? 1 : 0;
                        depth -= event == XMLStreamConstants.END_ELEMENT ? 1 : 0;
                    }
                }
                case XMLStreamConstants.ENTITY_REFERENCE ->
                    throw fault(place(xml), "an entity stands here; VTK files have none, and it is not read");
                default -> {}
            }
        }
    }

    private double[] inline(Data d, String text, int count) {
        if (d.format().equals("binary")) {
            return decoded(d, new Base64Groups(text.getBytes(StandardCharsets.ISO_8859_1), 0), text.length(), count);
        }
        if (2L * count - 1 > text.length()) {
            throw fault(d.place(), count + " numbers are needed here, there are " + text.length() + " characters");
        }
        double[] out = new double[count];
        int end = 0;
        for (int i = 0; i <= count; i++) {
            int start = end;
            while (start < text.length() && text.charAt(start) <= ' ') {
                start++;
            }
            end = start;
            while (end < text.length() && text.charAt(end) > ' ') {
                end++;
            }
            if ((start == end) != (i == count)) {
                throw fault(
                        d.place(),
                        count + " numbers are needed here, there are " + (i == count ? "more" : String.valueOf(i)));
            }
            if (i < count) {
                out[i] = Decimal.parse(text, start, end);
                if (Double.isNaN(out[i])) {
                    throw fault(
                            d.place(),
                            Words.quoted(text.substring(start, end)) + ", number " + (i + 1)
                                    + " of this array, is not a number");
                }
            }
        }
        return out;
    }

    private double[] appended(Data d, int count) {
        int start = appendedStart + (int) d.offset();
        int left = bytes.length - start;
        InputStream in = appendedRaw ? new ByteArrayInputStream(bytes, start, left) : new Base64Groups(bytes, start);
        return decoded(d, in, left, count);
    }

    /** Numbers from their bytes; {@code left} is how many bytes of the file there are for them at most. */
    private double[] decoded(Data d, InputStream in, long left, int count) {
        ByteOrder byteOrder = order.orElseThrow(() -> fault(d.place(), "binary data need byte_order in <VTKFile>"));
        int needed = count * d.array().type().size();
        try {
            byte[] raw;
            if (compressor.isEmpty()) {
                long said = header(in, byteOrder, d);
                if (said != needed) {
                    throw fault(
                            d.place(),
                            "the array has " + said + " bytes, its " + count + " numbers need " + needed
                                    + "; `header_type` or `byte_order` may be wrong");
                }
                if (needed > left) {
                    throw cut(d);
                }
                raw = in.readNBytes(needed);
                if (raw.length != needed) {
                    throw cut(d);
                }
            } else {
                raw = inflated(d, in, byteOrder, left, needed);
            }
            return d.array().type().read(ByteBuffer.wrap(raw).order(byteOrder), count);
        } catch (IOException e) {
            throw fault(d.place(), String.valueOf(e.getMessage()));
        }
    }

    /** Blocks of zlib: how many, their length, the last one's (0 if it is as long), the packed lengths, the blocks. */
    private byte[] inflated(Data d, InputStream in, ByteOrder byteOrder, long left, int needed) throws IOException {
        long blocks = header(in, byteOrder, d);
        long length = header(in, byteOrder, d);
        long last = header(in, byteOrder, d);
        boolean sound = blocks >= 0
                && blocks <= left / headerSize
                && length >= 0
                && length <= Integer.MAX_VALUE
                && last >= 0
                && last <= length;
        long total = sound ? (last == 0 ? blocks * length : (blocks - 1) * length + last) : -1;
        if (total != needed) {
            throw fault(
                    d.place(),
                    "the array says " + blocks + " blocks of " + length + " bytes, its numbers need " + needed
                            + " bytes; `header_type` or `byte_order` may be wrong");
        }
        if (needed > MOST_INFLATED * left) {
            throw cut(d);
        }
        int[] packed = new int[(int) blocks];
        long sum = 0;
        for (int b = 0; b < packed.length; b++) {
            long size = header(in, byteOrder, d);
            sum += size;
            if (size < 0 || size > left || sum > left) {
                throw cut(d);
            }
            packed[b] = (int) size;
        }
        byte[] raw = new byte[needed];
        int at = 0;
        Inflater inflater = new Inflater();
        try {
            for (int b = 0; b < packed.length; b++) {
                int size = b == packed.length - 1 && last > 0 ? (int) last : (int) length;
                byte[] block = in.readNBytes(packed[b]);
                if (block.length != packed[b]) {
                    throw cut(d);
                }
                inflater.reset();
                inflater.setInput(block);
                int done = 0;
                while (done < size) {
                    int n = inflater.inflate(raw, at + done, size - done);
                    if (n == 0) {
                        throw fault(d.place(), "block " + (b + 1) + " of this array is shorter than it says");
                    }
                    done += n;
                }
                at += size;
            }
        } catch (DataFormatException e) {
            throw fault(d.place(), "the compressed data of this array are damaged");
        } finally {
            inflater.end();
        }
        return raw;
    }

    private long header(InputStream in, ByteOrder byteOrder, Data d) throws IOException {
        byte[] b = in.readNBytes(headerSize);
        if (b.length != headerSize) {
            throw cut(d);
        }
        ByteBuffer buffer = ByteBuffer.wrap(b).order(byteOrder);
        return headerSize == 4 ? buffer.getInt() & 0xffffffffL : buffer.getLong();
    }

    private static ProblemException cut(Data d) {
        return fault(d.place(), "the file is too short for the numbers of this array; it may be cut off");
    }

    /** What there is of XML in the file. */
    private String head() {
        String text = FileText.decode(headEnd == bytes.length ? bytes : Arrays.copyOf(bytes, headEnd), source);
        String unmarked = text.startsWith("\ufeff") ? text.substring(1) : text;
        return headEnd == bytes.length ? unmarked : unmarked + CLOSING;
    }

    /** Finds the appended data, which may be any bytes. */
    private void cutOff() {
        int at = find(APPENDED.getBytes(StandardCharsets.US_ASCII), 0);
        int end = at < 0 ? -1 : find(new byte[] {'>'}, at);
        if (end < 0) {
            return;
        }
        String tag = new String(bytes, at, end - at, StandardCharsets.ISO_8859_1);
        if (tag.endsWith("/")) {
            return;
        }
        appendedRaw = tag.matches("(?s).*\\bencoding\\s*=\\s*[\"']raw[\"'].*");
        headEnd = end + 1;
        int mark = end + 1;
        while (mark < bytes.length && bytes[mark] != '_' && bytes[mark] <= ' ') {
            mark++;
        }
        appendedStart = Math.min(bytes.length, mark + 1);
    }

    private int find(byte[] word, int from) {
        for (int i = from; i + word.length <= bytes.length; i++) {
            int k = 0;
            while (k < word.length && bytes[i + k] == word[k]) {
                k++;
            }
            if (k == word.length) {
                return i;
            }
        }
        return -1;
    }

    private Place place(XMLStreamReader xml) {
        return new Place(
                source,
                Math.max(1, xml.getLocation().getLineNumber()),
                Math.max(1, xml.getLocation().getColumnNumber()));
    }

    private static ProblemException fault(Place place, String message) {
        return new ProblemException(Problem.input(place, "", message));
    }
}
