package org.stillpath.plot;

import java.awt.geom.AffineTransform;
import java.awt.geom.Path2D;
import java.io.IOException;
import java.io.InputStream;
import java.io.UncheckedIOException;
import java.nio.ByteBuffer;
import java.nio.charset.StandardCharsets;
import java.util.HashMap;
import java.util.Map;
import java.util.Objects;

/**
 * A TrueType face from the program's own resources: widths and outlines of its glyphs, after the OpenType specification
 * 1.9, tables {@code head}, {@code hhea}, {@code hmtx}, {@code maxp}, {@code cmap} (formats 4 and 12), {@code loca} and
 * {@code glyf}.
 *
 * <p>Chosen against {@code java.awt.Font}, which asks the system's fontconfig even for a font from a file and throws where
 * there is none. It costs this class; what is left out is kerning and hinting, which do not show at 200 dots an inch.
 */
final class Typeface {
    /** Names under which the face is asked for in SVG, with what to take where it is not installed. */
    static final String FAMILY = "'Source Sans 3','Source Sans Pro','Noto Sans','Helvetica Neue',Arial,sans-serif";

    /** Height of a capital letter, and reach below the baseline, in parts of the size (OS/2 table of the face). */
    static final double CAPITAL = 0.66;

    static final double ASCENDER = 0.73;
    static final double DESCENDER = 0.21;

    /** What stands in for a character that the face lacks. */
    private static final Map<Integer, String> STAND_INS = Map.of(
            0x2032, "'", 0x2033, "\"", 0x2212, "-", 0x00D7, "x", 0x2009, " ", 0x202F, " ", 0x00A0, " ", 0x03BC, "µ");

    private final int weight;
    private final ByteBuffer data;
    private final int glyf;
    private final int loca;
    private final boolean longOffsets;
    private final int hmtx;
    private final int metrics;
    private final int cmap;
    private final int cmapFormat;
    private final double unitsPerEm;

    private Typeface(byte[] bytes, int weight) {
        this.weight = weight;
        data = ByteBuffer.wrap(bytes);
        Map<String, Integer> tables = new HashMap<>();
        for (int i = 0; i < u16(4); i++) {
            tables.put(new String(bytes, 12 + 16 * i, 4, StandardCharsets.ISO_8859_1), data.getInt(12 + 16 * i + 8));
        }
        int head = at(tables, "head");
        unitsPerEm = u16(head + 18);
        longOffsets = u16(head + 50) == 1;
        metrics = u16(at(tables, "hhea") + 34);
        hmtx = at(tables, "hmtx");
        glyf = at(tables, "glyf");
        loca = at(tables, "loca");
        int base = at(tables, "cmap");
        int best = -1;
        int format = 0;
        for (int i = 0; i < u16(base + 2); i++) {
            int table = base + data.getInt(base + 4 + 8 * i + 4);
            int kind = u16(table);
            if ((kind == 4 || kind == 12) && kind > format) {
                best = table;
                format = kind;
            }
        }
        if (best < 0) {
            throw new IllegalArgumentException("the face has no cmap of format 4 or 12");
        }
        cmap = best;
        cmapFormat = format;
    }

    private static final class Faces {
        static final Typeface REGULAR = load("SourceSans3-Regular.ttf", 400);
        static final Typeface SEMIBOLD = load("SourceSans3-SemiBold.ttf", 600);

        private static Typeface load(String resource, int weight) {
            try (InputStream in = Objects.requireNonNull(Typeface.class.getResourceAsStream(resource), resource)) {
                return new Typeface(in.readAllBytes(), weight);
            } catch (IOException e) {
                throw new UncheckedIOException("cannot read the program's own typeface " + resource, e);
            }
        }
    }

    /** The face for labels. */
    static Typeface regular() {
        return Faces.REGULAR;
    }

    /** The face for titles. */
    static Typeface semibold() {
        return Faces.SEMIBOLD;
    }

    /** Weight as CSS counts it. */
    int weight() {
        return weight;
    }

    /** Whether the face has a glyph of its own for a character. */
    boolean has(int codePoint) {
        return glyph(codePoint) != 0;
    }

    /** Width of a line of text of a size in points. */
    double width(String text, double size) {
        double sum = 0;
        for (int cp : drawable(text).codePoints().toArray()) {
            sum += advance(glyph(cp));
        }
        return sum * size / unitsPerEm;
    }

    /** Outline of a line of text whose baseline starts at (x, y), y downward. */
    Path2D outline(String text, double x, double y, double size) {
        Path2D.Double path = new Path2D.Double(Path2D.WIND_NON_ZERO);
        double scale = size / unitsPerEm;
        double at = x;
        for (int cp : drawable(text).codePoints().toArray()) {
            int glyph = glyph(cp);
            add(path, glyph, new AffineTransform(scale, 0, 0, -scale, at, y), 0);
            at += advance(glyph) * scale;
        }
        return path;
    }

    private String drawable(String text) {
        StringBuilder out = new StringBuilder(text.length());
        text.codePoints().forEach(cp -> {
            if (has(cp)) {
                out.appendCodePoint(cp);
            } else {
                out.append(STAND_INS.getOrDefault(cp, "?"));
            }
        });
        return out.toString();
    }

    private static int at(Map<String, Integer> tables, String name) {
        return Objects.requireNonNull(tables.get(name), name);
    }

    private int u16(int at) {
        return data.getShort(at) & 0xFFFF;
    }

    private int advance(int glyph) {
        return u16(hmtx + 4 * Math.min(glyph, metrics - 1));
    }

    private int glyph(int cp) {
        return cmapFormat == 12 ? glyphOfGroups(cp) : glyphOfSegments(cp);
    }

    private int glyphOfGroups(int cp) {
        int low = 0;
        int high = data.getInt(cmap + 12) - 1;
        while (low <= high) {
            int mid = (low + high) >>> 1;
            int group = cmap + 16 + 12 * mid;
            if (cp < data.getInt(group)) {
                high = mid - 1;
            } else if (cp > data.getInt(group + 4)) {
                low = mid + 1;
            } else {
                return data.getInt(group + 8) + cp - data.getInt(group);
            }
        }
        return 0;
    }

    private int glyphOfSegments(int cp) {
        int twice = u16(cmap + 6);
        int ends = cmap + 14;
        int starts = ends + twice + 2;
        for (int i = 0; i < twice; i += 2) {
            if (cp <= u16(ends + i)) {
                int start = u16(starts + i);
                if (cp < start) {
                    return 0;
                }
                int offset = u16(starts + 2 * twice + i);
                int delta = u16(starts + twice + i);
                if (offset == 0) {
                    return (cp + delta) & 0xFFFF;
                }
                int glyph = u16(starts + 2 * twice + i + offset + 2 * (cp - start));
                return glyph == 0 ? 0 : (glyph + delta) & 0xFFFF;
            }
        }
        return 0;
    }

    private void add(Path2D path, int glyph, AffineTransform to, int depth) {
        int from = longOffsets ? data.getInt(loca + 4 * glyph) : 2 * u16(loca + 2 * glyph);
        int end = longOffsets ? data.getInt(loca + 4 * glyph + 4) : 2 * u16(loca + 2 * glyph + 2);
        if (end == from || depth > 8) {
            return;
        }
        int at = glyf + from;
        int contours = data.getShort(at);
        if (contours >= 0) {
            addSimple(path, at + 10, contours, to);
        } else {
            addComposite(path, at + 10, to, depth);
        }
    }

    private void addComposite(Path2D path, int start, AffineTransform to, int depth) {
        int at = start;
        int flags;
        do {
            flags = u16(at);
            int part = u16(at + 2);
            at += 4;
            double dx = 0;
            double dy = 0;
            boolean words = (flags & 0x1) != 0;
            if ((flags & 0x2) != 0) {
                dx = words ? data.getShort(at) : data.get(at);
                dy = words ? data.getShort(at + 2) : data.get(at + 1);
            }
            at += words ? 4 : 2;
            double a = 1;
            double b = 0;
            double c = 0;
            double d = 1;
            if ((flags & 0x8) != 0) {
                a = data.getShort(at) / 16384.0;
                d = a;
                at += 2;
            } else if ((flags & 0x40) != 0) {
                a = data.getShort(at) / 16384.0;
                d = data.getShort(at + 2) / 16384.0;
                at += 4;
            } else if ((flags & 0x80) != 0) {
                a = data.getShort(at) / 16384.0;
                b = data.getShort(at + 2) / 16384.0;
                c = data.getShort(at + 4) / 16384.0;
                d = data.getShort(at + 6) / 16384.0;
                at += 8;
            }
            AffineTransform inner = new AffineTransform(to);
            inner.concatenate(new AffineTransform(a, b, c, d, dx, dy));
            add(path, part, inner, depth + 1);
        } while ((flags & 0x20) != 0);
    }

    private void addSimple(Path2D path, int start, int contours, AffineTransform to) {
        int points = contours == 0 ? 0 : u16(start + 2 * contours - 2) + 1;
        int at = start + 2 * contours;
        at += 2 + u16(at);
        int[] flags = new int[points];
        for (int i = 0; i < points; ) {
            int flag = data.get(at++) & 0xFF;
            int times = (flag & 0x8) != 0 ? (data.get(at++) & 0xFF) + 1 : 1;
            for (int k = 0; k < times; k++) {
                flags[i++] = flag;
            }
        }
        double[] p = new double[2 * points];
        at = coordinates(at, flags, 0x2, 0x10, p, 0);
        coordinates(at, flags, 0x4, 0x20, p, 1);
        to.transform(p, 0, p, 0, points);
        int first = 0;
        for (int c = 0; c < contours; c++) {
            int last = u16(start + 2 * c);
            addContour(path, p, flags, first, last);
            first = last + 1;
        }
    }

    private int coordinates(int start, int[] flags, int small, int same, double[] p, int offset) {
        int at = start;
        int value = 0;
        for (int i = 0; i < flags.length; i++) {
            boolean set = (flags[i] & same) != 0;
            if ((flags[i] & small) != 0) {
                int step = data.get(at++) & 0xFF;
                value += set ? step : -step;
            } else if (!set) {
                value += data.getShort(at);
                at += 2;
            }
            p[2 * i + offset] = value;
        }
        return at;
    }

    /** Points on the curve are joined by lines, points off it are the poles of parabolas; two of those in a row have a point on the curve between them. */
    private static void addContour(Path2D path, double[] p, int[] flags, int first, int last) {
        int n = last - first + 1;
        if (n < 2) {
            return;
        }
        int start = -1;
        for (int i = first; i <= last && start < 0; i++) {
            start = (flags[i] & 1) != 0 ? i : -1;
        }
        double sx = start >= 0 ? p[2 * start] : (p[2 * first] + p[2 * last]) / 2;
        double sy = start >= 0 ? p[2 * start + 1] : (p[2 * first + 1] + p[2 * last + 1]) / 2;
        path.moveTo(sx, sy);
        int begin = start >= 0 ? start - first + 1 : 0;
        int count = start >= 0 ? n - 1 : n;
        boolean off = false;
        double ox = 0;
        double oy = 0;
        for (int k = 0; k < count; k++) {
            int i = first + (begin + k) % n;
            double x = p[2 * i];
            double y = p[2 * i + 1];
            boolean on = (flags[i] & 1) != 0;
            if (on && off) {
                path.quadTo(ox, oy, x, y);
            } else if (on) {
                path.lineTo(x, y);
            } else if (off) {
                path.quadTo(ox, oy, (ox + x) / 2, (oy + y) / 2);
            }
            off = !on;
            ox = x;
            oy = y;
        }
        if (off) {
            path.quadTo(ox, oy, sx, sy);
        }
        path.closePath();
    }
}
