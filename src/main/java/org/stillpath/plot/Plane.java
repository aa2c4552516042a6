package org.stillpath.plot;

import java.util.ArrayList;
import java.util.List;
import org.stillpath.task.ChartFigure;

/**
 * The plot of a chart of any two quantities: heading above, thin axes on two sides with outward ticks and named ends, and
 * the way from SI to points. Drawn by hand where {@link Chart} asks JFreeChart, which knows lengths in metres only here and
 * costs a third of a second at its first use; the look is the same.
 */
final class Plane {
    private static final double LINE = 0.6;

    private final Canvas canvas;
    private final Box plot;
    private final Ruler across;
    private final Ruler up;

    private Plane(Canvas canvas, Box plot, Ruler across, Ruler up) {
        this.canvas = canvas;
        this.plot = plot;
        this.across = across;
        this.up = up;
    }

    /** Low and high end of an axis, SI. */
    record Range(double low, double high) {
        /** Room beside the data, and a width for data at one point. */
        Range padded(double part) {
            double span = high - low;
            if (span > 1e-12 * Math.max(Math.abs(low), Math.abs(high))) {
                return new Range(low - part * span, high + part * span);
            }
            double size = Math.max(Math.abs(low), Math.abs(high));
            double half = size > 0 ? 0.05 * size : 1;
            return new Range(low - half, high + half);
        }
    }

    /** Lays a plot out below a heading. */
    static Plane of(
            Canvas canvas,
            Width width,
            double top,
            double height,
            ChartFigure.Axis acrossAxis,
            Range x,
            ChartFigure.Axis upAxis,
            Range y) {
        double right = width.points() - Canvas.EDGE - 8;
        Ruler up = Ruler.of(y.low(), y.high(), upAxis.unit(), upAxis.shown(), (int) Math.max(2, height / 24));
        double left = Canvas.EDGE + Axes.TICK + Axes.TICK_GAP + up.widest();
        int most = (int) Math.max(2, (right - left) / 36);
        Ruler across = Ruler.of(x.low(), x.high(), acrossAxis.unit(), acrossAxis.shown(), most);
        while (!across.isClear(right - left) && most > 1) {
            most--;
            across = Ruler.of(x.low(), x.high(), acrossAxis.unit(), acrossAxis.shown(), most);
        }
        return new Plane(canvas, new Box(left, top, right, top + height), across, up);
    }

    /** A square plot below a heading, of one scale in both directions. */
    static Plane square(
            Canvas canvas, double top, double side, ChartFigure.Axis acrossAxis, ChartFigure.Axis upAxis, Range r) {
        int most = (int) Math.max(3, side / 30);
        Ruler up = Ruler.of(r.low(), r.high(), upAxis.unit(), upAxis.shown(), most);
        Ruler across = Ruler.of(r.low(), r.high(), acrossAxis.unit(), acrossAxis.shown(), most);
        double left = Canvas.EDGE + Axes.TICK + Axes.TICK_GAP + up.widest();
        return new Plane(canvas, new Box(left, top, left + side, top + side), across, up);
    }

    Box plot() {
        return plot;
    }

    double x(double si) {
        return plot.left() + across.part(si) * plot.width();
    }

    double y(double si) {
        return plot.bottom() - up.part(si) * plot.height();
    }

    /** Points on paper; those without a place break the line. */
    Polyline line(double[] xs, double[] ys) {
        double[] px = new double[xs.length];
        double[] py = new double[xs.length];
        for (int i = 0; i < xs.length; i++) {
            px[i] = x(xs[i]);
            py[i] = y(ys[i]);
        }
        return new Polyline(px, py);
    }

    /** Room that the name of the upward axis takes above the plot, points. */
    static double above(ChartFigure.Axis upAxis, Width width) {
        // the highest tick may stand at the very top
        return Axes.ABOVE + 4 + (nameLines(upAxis.label() + " / mmmm", width) - 1) * Canvas.SIZE * 1.25;
    }

    private static int nameLines(String name, Width width) {
        return Canvas.wrapped(name, Typeface.regular(), Canvas.SIZE, width.points() - 2 * Canvas.EDGE)
                .size();
    }

    /** Draws the axes; returns the lower end of the picture. */
    double axes(String acrossLabel, String upLabel) {
        Pen pen = Pen.firm(Ink.INK, LINE);
        canvas.segment(plot.left(), plot.top(), plot.left(), plot.bottom(), pen);
        canvas.segment(plot.left(), plot.bottom(), plot.right(), plot.bottom(), pen);
        double half = (Typeface.ASCENDER - Typeface.DESCENDER) * Canvas.SIZE / 2 - 0.5;
        for (Ruler.Tick t : up.ticks()) {
            double y = plot.bottom() - up.part(t) * plot.height();
            canvas.segment(plot.left() - Axes.TICK, y, plot.left(), y, pen);
            double x = plot.left() - Axes.TICK - Axes.TICK_GAP - Canvas.width(t.text());
            canvas.words(t.text(), x, y + half, Ink.INK);
        }
        double baseline = plot.bottom() + Axes.TICK + Axes.TICK_GAP + Typeface.ASCENDER * Canvas.SIZE;
        for (Ruler.Tick t : across.ticks()) {
            double x = plot.left() + across.part(t) * plot.width();
            canvas.segment(x, plot.bottom(), x, plot.bottom() + Axes.TICK, pen);
            double wide = Canvas.width(t.text());
            double from = Math.min(x - wide / 2, plot.right() + 8 - wide);
            canvas.words(t.text(), from, baseline, Ink.INK);
        }
        double edge = plot.right() + 8;
        List<String> below =
                Canvas.wrapped(across.name(acrossLabel), Typeface.regular(), Canvas.SIZE, edge - Canvas.EDGE);
        double y = baseline;
        for (String line : below) {
            y += 1.25 * Canvas.SIZE;
            canvas.words(line, edge - Canvas.width(line), y, Ink.INK);
        }
        List<String> over = Canvas.wrapped(up.name(upLabel), Typeface.regular(), Canvas.SIZE, edge - Canvas.EDGE);
        double at = plot.top() - Typeface.DESCENDER * Canvas.SIZE - 9 - (over.size() - 1) * 1.25 * Canvas.SIZE;
        for (String line : over) {
            canvas.words(line, Canvas.EDGE, at, Ink.INK);
            at += 1.25 * Canvas.SIZE;
        }
        return y + Typeface.DESCENDER * Canvas.SIZE + Canvas.EDGE;
    }

    /** Places for a label along a line, the best first: above, below, right and left of points from its end to its start. */
    List<Labels.Place> beside(Polyline line, String text) {
        List<Labels.Place> places = new ArrayList<>();
        double wide = Canvas.width(text);
        double tall = Canvas.height();
        for (int i = 0; i <= 40; i++) {
            double part = 1 - i / 40.0;
            double[] p = line.at(part);
            double away = 10 * Math.abs(part - 0.8);
            double[][] corners = {
                {p[0] - wide / 2, p[1] - tall - 4},
                {p[0] - wide / 2, p[1] + 4},
                {p[0] + 5, p[1] - tall / 2},
                {p[0] - wide - 5, p[1] - tall / 2},
                {p[0] + 4, p[1] - tall - 3},
                {p[0] - wide - 4, p[1] - tall - 3},
                {p[0] + 4, p[1] + 3},
                {p[0] - wide - 4, p[1] + 3},
                {p[0] + 10, p[1] - tall - 12},
                {p[0] - wide - 10, p[1] - tall - 12}
            };
            for (double[] c : corners) {
                places.add(new Labels.Place(new Box(c[0], c[1], c[0] + wide, c[1] + tall), away, p[0], p[1]));
            }
        }
        return places;
    }

    /** Plain text's hyphen before a number as the minus sign that it means. */
    static String typeset(String plain) {
        return plain.replaceAll("(?<![\\w.])-(?=\\d)", "−");
    }
}
