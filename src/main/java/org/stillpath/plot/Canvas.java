package org.stillpath.plot;

import java.util.ArrayList;
import java.util.List;
import java.util.StringTokenizer;
import org.stillpath.unit.Units;

/** A picture in the making: collects items and the room that words take. Mutable; one for each picture. */
final class Canvas {
    /** Size of labels, points. */
    static final double SIZE = 9;
    /** Size of titles, points. */
    static final double TITLE_SIZE = 11;
    /** Room at the edges of the paper, points. */
    static final double EDGE = 4;

    private static final double LEADING = 1.25;

    private final List<Item> items = new ArrayList<>();
    private final List<Picture.Label> labels = new ArrayList<>();
    private final List<String> unplaced = new ArrayList<>();

    void add(Item item) {
        items.add(item);
    }

    void stroke(Polyline line, Pen pen) {
        items.add(new Item.Stroke(line.x(), line.y(), pen));
    }

    void segment(double x0, double y0, double x1, double y1, Pen pen) {
        items.add(new Item.Stroke(new double[] {x0, x1}, new double[] {y0, y1}, pen));
    }

    /** How many items there are; a place to come back to with {@link #addAt}. */
    int count() {
        return items.size();
    }

    void addAt(int place, Item item) {
        items.add(place, item);
    }

    void miss(String text) {
        unplaced.add(text);
    }

    List<String> unplaced() {
        return unplaced;
    }

    /** Words from x on the baseline y; returns their right end. */
    double words(String text, double x, double y, Ink ink) {
        return words(text, x, y, SIZE, Typeface.regular(), ink, false);
    }

    double words(String text, double x, double y, double size, Typeface face, Ink ink, boolean halo) {
        double right = x + face.width(text, size);
        items.add(new Item.Words(text, x, y, size, face, ink, halo));
        labels.add(new Picture.Label(text, x, y - Typeface.ASCENDER * size, right, y + Typeface.DESCENDER * size));
        return right;
    }

    /** Label words in a box of {@link #width} by {@link #height}. */
    void words(String text, Box box, Ink ink, boolean halo) {
        words(text, box.left(), box.top() + Typeface.ASCENDER * SIZE, SIZE, Typeface.regular(), ink, halo);
    }

    static double width(String text) {
        return Typeface.regular().width(text, SIZE);
    }

    /** Height of a line of label text, points. */
    static double height() {
        return (Typeface.ASCENDER + Typeface.DESCENDER) * SIZE;
    }

    /** The question, small, and the answer below it, both as many lines as they need; returns the y below them. */
    double heading(String question, String answer, double width) {
        double y = EDGE;
        for (String line : wrapped(question, Typeface.regular(), SIZE, width - 2 * EDGE)) {
            words(line, EDGE, y + Typeface.ASCENDER * SIZE, SIZE, Typeface.regular(), Ink.GREY, false);
            y += SIZE * LEADING;
        }
        y += 1;
        for (String line : wrapped(answer, Typeface.semibold(), TITLE_SIZE, width - 2 * EDGE)) {
            words(line, EDGE, y + Typeface.ASCENDER * TITLE_SIZE, TITLE_SIZE, Typeface.semibold(), Ink.INK, false);
            y += TITLE_SIZE * LEADING;
        }
        return y;
    }

    /**
     * Lines no wider than {@code width}, broken at blanks, but not between a number and its unit, and within a word only
     * where it alone is too wide.
     */
    static List<String> wrapped(String text, Typeface face, double size, double width) {
        List<String> lines = new ArrayList<>();
        String line = "";
        for (String word : words(text)) {
            String longer = line.isEmpty() ? word : line + " " + word;
            if (face.width(longer, size) <= width) {
                line = longer;
                continue;
            }
            if (!line.isEmpty()) {
                lines.add(line);
            }
            line = word;
            while (face.width(line, size) > width) {
                int cut = line.offsetByCodePoints(0, 1);
                while (face.width(line.substring(0, line.offsetByCodePoints(cut, 1)), size) <= width) {
                    cut = line.offsetByCodePoints(cut, 1);
                }
                lines.add(line.substring(0, cut));
                line = line.substring(cut);
            }
        }
        if (!line.isEmpty()) {
            lines.add(line);
        }
        return lines;
    }

    /** The words of a text; a number and its unit are one. */
    private static List<String> words(String text) {
        List<String> all = new ArrayList<>();
        for (StringTokenizer words = new StringTokenizer(clean(text)); words.hasMoreTokens(); ) {
            String word = words.nextToken();
            String before = all.isEmpty() ? "" : all.get(all.size() - 1);
            boolean number = !before.isEmpty() && Character.isDigit(before.charAt(before.length() - 1));
            if (number && Units.parse(word.replaceAll("[,;:.]$", "")).isPresent()) {
                all.set(all.size() - 1, before + " " + word);
            } else {
                all.add(word);
            }
        }
        return all;
    }

    /** Text as XML 1.0 can hold it: control characters as blanks, what is no character left out. */
    static String clean(String text) {
        StringBuilder out = new StringBuilder(text.length());
        text.codePoints().forEach(cp -> {
            if (Character.isISOControl(cp) || cp == 0x2028 || cp == 0x2029) {
                out.append(' ');
            } else if (!(cp >= 0xD800 && cp <= 0xDFFF) && (cp & 0xFFFE) != 0xFFFE) {
                out.appendCodePoint(cp);
            }
        });
        return out.toString();
    }

    Picture picture(String title, String description, double width, double height) {
        return new Picture(clean(title), clean(description), width, height, items, labels, unplaced);
    }
}
