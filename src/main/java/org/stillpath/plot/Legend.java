package org.stillpath.plot;

import java.util.ArrayList;
import java.util.List;
import org.stillpath.task.SectionFigure.Role;

/** Rows of samples and words below a title, for what cannot be told beside the thing itself. */
final class Legend {
    private static final double SAMPLE = 20;
    private static final double GAP = 4;
    private static final double APART = 14;
    private static final double ROW = Canvas.SIZE * 1.3;

    private final double width;
    private final List<Entry> entries = new ArrayList<>();

    /** Either a line or a mark. */
    private record Entry(List<Pen> line, List<Role> mark, String words) {
        double width() {
            return (mark.isEmpty() ? SAMPLE : 8) + GAP + Canvas.width(words);
        }
    }

    Legend(double width) {
        this.width = width;
    }

    void line(Pen pen, String words) {
        entries.add(new Entry(List.of(pen), List.of(), words));
    }

    void mark(Role role, String words) {
        entries.add(new Entry(List.of(), List.of(role), words));
    }

    /** Draws what was added, wrapped to the width; returns the y below. */
    double draw(Canvas canvas, double top) {
        if (entries.isEmpty()) {
            return top;
        }
        double x = Canvas.EDGE;
        double y = top + 3;
        for (Entry e : entries) {
            if (x > Canvas.EDGE && x + e.width() > width - Canvas.EDGE) {
                x = Canvas.EDGE;
                y += ROW;
            }
            double baseline = y + Typeface.ASCENDER * Canvas.SIZE;
            double middle = baseline - 0.32 * Canvas.SIZE;
            double at = x;
            e.line().forEach(pen -> canvas.segment(at, middle, at + SAMPLE, middle, pen));
            e.mark().forEach(role -> mark(canvas, role, at + 4, middle));
            double after = x + e.width();
            canvas.words(e.words(), after - Canvas.width(e.words()), baseline, Ink.INK);
            x = after + APART;
        }
        return y + ROW;
    }

    /** How a stationary path is drawn. */
    static Pen pen(Role role) {
        return switch (role) {
            case MINIMUM, ERECT -> Pen.firm(Ink.BLUE, 1.4);
            case SADDLE, INVERTED -> Pen.dashed(Ink.VERMILLION, 1.4, 6.0, 2.5);
            case DEGENERATE -> Pen.dashed(Ink.PURPLE, 1.9, 1.7, 1.7);
            default -> Pen.firm(Ink.INK, 0.8);
        };
    }

    /** {@code 1 minimum}, {@code 2 saddles}. */
    static String words(Role role, long count) {
        String word =
                switch (role) {
                    case MINIMUM -> count == 1 ? "minimum" : "minima";
                    case SADDLE -> count == 1 ? "saddle" : "saddles";
                    case ERECT -> count == 1 ? "erect image" : "erect images";
                    case INVERTED -> count == 1 ? "inverted image" : "inverted images";
                    case DEGENERATE -> count == 1 ? "degenerate path" : "degenerate paths";
                    default -> count == 1 ? "path" : "paths";
                };
        return count + " " + word;
    }

    /** Marks a stationary path: a disc for a minimum, a diamond for a saddle, a triangle for a degenerate one. */
    static void mark(Canvas canvas, Role role, double x, double y) {
        Ink ink = pen(role).ink();
        switch (role) {
            case SADDLE, INVERTED -> {
                area(canvas, Ink.PAPER, x, y, 4.6, 0, 1, 0, -1);
                area(canvas, ink, x, y, 3.6, 0, 1, 0, -1);
            }
            case DEGENERATE -> {
                area(canvas, Ink.PAPER, x, y, 5, 0.87, -0.5, -0.87, -0.5);
                area(canvas, ink, x, y, 3.8, 0.87, -0.5, -0.87, -0.5);
            }
            default -> {
                canvas.add(new Item.Dot(x, y, 3.6, Ink.PAPER));
                canvas.add(new Item.Dot(x, y, 2.8, ink));
            }
        }
    }

    /** A diamond, or the triangle with its tip up. */
    private static void area(Canvas canvas, Ink ink, double x, double y, double r, double... shape) {
        boolean triangle = shape[0] != 0;
        double[] px =
                triangle ? new double[] {x, x + r * shape[0], x + r * shape[2]} : new double[] {x, x + r, x, x - r};
        double[] py = triangle ? new double[] {y - r, y + r / 2, y + r / 2} : new double[] {y - r, y, y + r, y};
        canvas.add(new Item.Area(px, py, ink));
    }
}
