package org.stillpath.plot;

import java.util.Arrays;
import org.stillpath.task.ChartFigure;
import org.stillpath.task.WavefrontFigure;
import org.stillpath.unit.Display;

/**
 * Draws a {@link WavefrontFigure}: the pupil in colours that part at zero, level lines at the marks of the scale, and beside
 * it the scale, in lengths on its left and in waves on its right. Where no light comes through the pupil is grey.
 */
final class WavefrontDrawing {
    private static final double PIXELS_PER_POINT = 2;
    private static final double SCALE_WIDTH = 10;
    private static final int BLOCKED = 0xFF000000 | 0xD0D0D0;
    private static final int LEVELS = 6;

    private final WavefrontFigure figure;
    private final Width width;
    private final Canvas canvas = new Canvas();
    private final double[] values;

    WavefrontDrawing(WavefrontFigure figure, Width width) {
        this.figure = figure;
        this.width = width;
        this.values = figure.values();
    }

    Picture picture() {
        String answer = Plane.typeset(figure.answer());
        ChartFigure.Axis across = new ChartFigure.Axis(figure.across(), "m", "");
        ChartFigure.Axis up = new ChartFigure.Axis(figure.up(), "m", "");
        double top = canvas.heading(Plane.typeset(figure.question()), answer, width.points()) + Plane.above(up, width);
        double side = width == Width.FULL ? 200 : 112;
        double r = figure.radius();
        Plane plane = Plane.square(canvas, top, side, across, up, new Plane.Range(-r, r));
        double most = largest();
        double limit = most > 0 ? most : figure.wavelength();
        colours(plane, limit);
        Ruler lengths = Ruler.of(-limit, limit, "m", "", LEVELS);
        if (most > 0) {
            levels(plane, lengths);
        }
        circle(plane);
        double bottom = plane.axes(figure.across(), figure.up());
        scale(plane.plot(), lengths, limit);
        return canvas.picture(
                answer,
                Plane.typeset(figure.question() + " " + figure.answer() + ". Path differences up to "
                        + Display.of(most, "m", 1e-3 * most) + " over a pupil."),
                width.points(),
                bottom);
    }

    private double largest() {
        double most = 0;
        for (int j = 0; j < figure.side(); j++) {
            for (int i = 0; i < figure.side(); i++) {
                double v = values[j * figure.side() + i];
                if (Math.hypot(figure.place(i), figure.place(j)) <= 1 && Double.isFinite(v)) {
                    most = Math.max(most, Math.abs(v));
                }
            }
        }
        return most;
    }

    private void colours(Plane plane, double limit) {
        Box plot = plane.plot();
        int pixels = (int) Math.ceil(plot.width() * PIXELS_PER_POINT);
        int[] argb = new int[pixels * pixels];
        for (int j = 0; j < pixels; j++) {
            double y = 1 - 2 * (j + 0.5) / pixels;
            for (int i = 0; i < pixels; i++) {
                double x = 2 * (i + 0.5) / pixels - 1;
                if (x * x + y * y <= 1) {
                    double v = at(x, y);
                    argb[j * pixels + i] = Double.isNaN(v) ? BLOCKED : 0xFF000000 | Diverging.of(v / limit);
                }
            }
        }
        canvas.add(new Item.Colours(plot.left(), plot.top(), plot.width(), plot.height(), pixels, pixels, argb));
    }

    /** Bilinear between the lattice's values, NaN beside one that is not there. */
    private double at(double x, double y) {
        int side = figure.side();
        double u = 0.5 * (x + 1) * (side - 1);
        double v = 0.5 * (y + 1) * (side - 1);
        int c = Math.min((int) u, side - 2);
        int r = Math.min((int) v, side - 2);
        double s = u - c;
        double t = v - r;
        int k = r * side + c;
        return (values[k] * (1 - s) + values[k + 1] * s) * (1 - t)
                + (values[k + side] * (1 - s) + values[k + side + 1] * s) * t;
    }

    /** Level lines at the marks of the scale, inside the pupil. */
    private void levels(Plane plane, Ruler ruler) {
        int side = figure.side();
        double[] x = new double[side];
        double[] y = new double[side];
        for (int i = 0; i < side; i++) {
            x[i] = plane.x(figure.place(i) * figure.radius());
            y[i] = plane.y(figure.place(i) * figure.radius());
        }
        double[] inside = values.clone();
        for (int j = 0; j < side; j++) {
            for (int i = 0; i < side; i++) {
                if (Math.hypot(figure.place(i), figure.place(j)) > 1) {
                    inside[j * side + i] = Double.NaN;
                }
            }
        }
        Contours contours = new Contours(x, y, inside);
        for (Ruler.Tick t : ruler.ticks()) {
            double si = ruler.unit().toSi(t.at() * Math.pow(10, ruler.power()));
            for (Polyline line : contours.at(si)) {
                canvas.stroke(line.thinned(0.05), Pen.firm(Ink.GREY, t.at() == 0 ? 0.7 : 0.4));
            }
        }
    }

    private void circle(Plane plane) {
        Box plot = plane.plot();
        canvas.stroke(
                circle(0.5 * (plot.left() + plot.right()), 0.5 * (plot.top() + plot.bottom()), 0.5 * plot.width()),
                Pen.firm(Ink.INK, 0.8));
    }

    /** A circle as a closed line. */
    static Polyline circle(double x, double y, double radius) {
        double[] px = new double[97];
        double[] py = new double[97];
        Arrays.setAll(px, i -> x + radius * Math.cos(2 * Math.PI * i / 96));
        Arrays.setAll(py, i -> y + radius * Math.sin(2 * Math.PI * i / 96));
        return new Polyline(px, py);
    }

    private void scale(Box plot, Ruler lengths, double limit) {
        double wide = width == Width.FULL ? 60 : 38;
        double left = plot.right() + wide;
        double right = left + SCALE_WIDTH;
        int rows = (int) Math.ceil(plot.height() * PIXELS_PER_POINT);
        int[] argb = new int[rows];
        Arrays.setAll(argb, j -> 0xFF000000 | Diverging.of(1 - 2 * (j + 0.5) / rows));
        canvas.add(new Item.Colours(left, plot.top(), SCALE_WIDTH, plot.height(), 1, rows, argb));
        Pen pen = Pen.firm(Ink.INK, 0.6);
        canvas.segment(left, plot.top(), left, plot.bottom(), pen);
        canvas.segment(right, plot.top(), right, plot.bottom(), pen);
        double half = (Typeface.ASCENDER - Typeface.DESCENDER) * Canvas.SIZE / 2 - 0.5;
        for (Ruler.Tick t : lengths.ticks()) {
            double y = plot.bottom() - lengths.part(t) * plot.height();
            canvas.segment(left - Axes.TICK, y, left, y, pen);
            canvas.words(t.text(), left - Axes.TICK - Axes.TICK_GAP - Canvas.width(t.text()), y + half, Ink.INK);
        }
        double w = limit / figure.wavelength();
        Ruler waves = Ruler.of(-w, w, "1", "1", LEVELS);
        for (Ruler.Tick t : waves.ticks()) {
            double y = plot.bottom() - waves.part(t) * plot.height();
            canvas.segment(right, y, right + Axes.TICK, y, pen);
            canvas.words(t.text(), right + Axes.TICK + Axes.TICK_GAP, y + half, Ink.INK);
        }
        double name = plot.top() - Typeface.DESCENDER * Canvas.SIZE - 9;
        String length = lengths.name("").replace(" / ", "").strip();
        canvas.words(length, left - 2 - Canvas.width(length), name, Ink.INK);
        canvas.words(waves.power() == 0 ? "waves" : waves.name("waves"), right + 2, name, Ink.INK);
    }
}
