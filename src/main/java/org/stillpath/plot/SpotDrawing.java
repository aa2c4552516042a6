package org.stillpath.plot;

import java.util.LinkedHashSet;
import java.util.List;
import java.util.Set;
import org.stillpath.task.SpotFigure;
import org.stillpath.unit.Display;

/**
 * Draws a {@link SpotFigure}: square frames without axes, all to one scale that a bar tells, each with its field above and
 * its size below. Wavelengths differ in colour and in mark.
 */
final class SpotDrawing {
    private static final double GAP = 10;
    private static final double DOT = 0.9;
    private static final List<Ink> INKS = List.of(Ink.BLUE, Ink.VERMILLION, Ink.GREEN, Ink.ORANGE, Ink.PURPLE, Ink.SKY);
    private static final int MOST_DOTS = 1500;

    private final SpotFigure figure;
    private final Width width;
    private final Canvas canvas = new Canvas();

    SpotDrawing(SpotFigure figure, Width width) {
        this.figure = figure;
        this.width = width;
    }

    Picture picture() {
        String answer = Plane.typeset(figure.answer());
        double top = canvas.heading(Plane.typeset(figure.question()), answer, width.points()) + 6;
        int columns = Math.min(figure.spots().size(), width == Width.FULL ? 3 : 2);
        double room = width.points() - 2 * Canvas.EDGE;
        double side = Math.min((room - (columns - 1) * GAP) / columns, width == Width.FULL ? 180 : 150);
        double reach = reach();
        double scale = 0.46 * side / reach;
        double line = 1.25 * Canvas.SIZE;
        double y = top;
        double lowest = top;
        for (int i = 0; i < figure.spots().size(); i++) {
            int column = i % columns;
            if (column == 0 && i > 0) {
                y = lowest + GAP;
            }
            double x = Canvas.EDGE + column * (side + GAP);
            lowest = Math.max(lowest, spot(figure.spots().get(i), x, y, side, scale, line));
        }
        double bottom = legend(lowest + 4, line);
        bottom = bar(bottom, scale, Math.min(side, 90));
        return canvas.picture(
                answer,
                Plane.typeset(figure.question() + " " + figure.answer() + "."),
                width.points(),
                bottom + Canvas.EDGE);
    }

    private double reach() {
        double reach = 0;
        for (SpotFigure.Spot s : figure.spots()) {
            for (SpotFigure.Colour c : s.colours()) {
                double[] x = c.points().x();
                double[] y = c.points().y();
                for (int i = 0; i < x.length; i++) {
                    reach = Math.max(reach, Math.max(Math.abs(x[i]), Math.abs(y[i])));
                }
            }
            for (SpotFigure.Circle c : s.circles()) {
                reach = Math.max(reach, c.radius());
            }
        }
        return reach > 0 ? reach : 1e-9;
    }

    /** One spot; returns the lower end of its words. */
    private double spot(SpotFigure.Spot s, double x, double y, double side, double scale, double line) {
        double at = y;
        for (String text : Canvas.wrapped(Plane.typeset(s.title()), Typeface.regular(), Canvas.SIZE, side)) {
            canvas.words(text, x, at + Typeface.ASCENDER * Canvas.SIZE, Ink.INK);
            at += line;
        }
        double cx = x + side / 2;
        double cy = at + 2 + side / 2;
        Pen pale = Pen.firm(Ink.LIGHT, 0.5);
        canvas.segment(cx - side / 2, cy, cx + side / 2, cy, pale);
        canvas.segment(cx, cy - side / 2, cx, cy + side / 2, pale);
        for (int k = 0; k < s.colours().size(); k++) {
            double[] px = s.colours().get(k).points().x();
            double[] py = s.colours().get(k).points().y();
            int stride = 1 + px.length / MOST_DOTS;
            for (int i = 0; i < px.length; i += stride) {
                mark(k, cx + scale * px[i], cy - scale * py[i]);
            }
        }
        for (int k = 0; k < s.circles().size(); k++) {
            double radius = scale * s.circles().get(k).radius();
            canvas.stroke(WavefrontDrawing.circle(cx, cy, radius), pen(k));
        }
        at = cy + side / 2 + 2;
        for (String text : Canvas.wrapped(Plane.typeset(s.note()), Typeface.regular(), Canvas.SIZE, side)) {
            canvas.words(text, x, at + Typeface.ASCENDER * Canvas.SIZE, Ink.GREY);
            at += line;
        }
        return at;
    }

    private static Pen pen(int circle) {
        return switch (circle) {
            case 0 -> Pen.firm(Ink.INK, 0.7);
            case 1 -> Pen.dashed(Ink.INK, 0.7, 4.0, 2.0);
            default -> Pen.dashed(Ink.GREY, 0.7, 1.2, 1.8);
        };
    }

    /** A dot, an upright cross, a slanting cross, then again. */
    private void mark(int colour, double x, double y) {
        Ink ink = INKS.get(colour % INKS.size());
        double d = 1.6 * DOT;
        switch (colour % 3) {
            case 0 -> canvas.add(new Item.Dot(x, y, DOT, ink));
            case 1 -> {
                canvas.segment(x - d, y, x + d, y, Pen.firm(ink, 0.6));
                canvas.segment(x, y - d, x, y + d, Pen.firm(ink, 0.6));
            }
            default -> {
                canvas.segment(x - d, y - d, x + d, y + d, Pen.firm(ink, 0.6));
                canvas.segment(x - d, y + d, x + d, y - d, Pen.firm(ink, 0.6));
            }
        }
    }

    /** Wavelengths and circles, in as many lines as they need; returns the lower end. */
    private double legend(double top, double line) {
        Set<String> seen = new LinkedHashSet<>();
        double x = Canvas.EDGE;
        double y = top + Typeface.ASCENDER * Canvas.SIZE;
        List<SpotFigure.Colour> colours = figure.spots().get(0).colours();
        for (int k = 0; k < colours.size() + 3; k++) {
            int circle = k - colours.size();
            String label = "";
            if (circle < 0) {
                label = colours.get(k).label();
            } else {
                for (SpotFigure.Spot s : figure.spots()) {
                    if (circle < s.circles().size()) {
                        label = s.circles().get(circle).label();
                        break;
                    }
                }
            }
            if (label.isEmpty() || !seen.add(label)) {
                continue;
            }
            double wide = 14 + Canvas.width(label);
            if (x > Canvas.EDGE && x + wide > width.points() - Canvas.EDGE) {
                x = Canvas.EDGE;
                y += line;
            }
            double cx = x + 5;
            double cy = y - 3;
            if (circle < 0) {
                mark(k, cx, cy);
            } else {
                canvas.stroke(WavefrontDrawing.circle(cx, cy, 3.5), pen(circle));
            }
            canvas.words(label, x + 12, y, Ink.INK);
            x += wide + 10;
        }
        return seen.isEmpty() ? top : y + 4;
    }

    /** The scale bar: the longest round length within a room. */
    private double bar(double top, double scale, double room) {
        double longest = room / scale;
        double round = Math.pow(10, Math.floor(Math.log10(longest)));
        double length = longest >= 5 * round ? 5 * round : longest >= 2 * round ? 2 * round : round;
        String text = Display.of(length, figure.angles() ? "rad" : "m", 0).toString();
        double y = top + 8;
        double x = Canvas.EDGE + 1;
        double end = x + length * scale;
        Pen pen = Pen.firm(Ink.INK, 1);
        canvas.segment(x, y, end, y, pen);
        canvas.segment(x, y - 2.5, x, y + 2.5, pen);
        canvas.segment(end, y - 2.5, end, y + 2.5, pen);
        canvas.words(text + "", end + 5, y + 3, Ink.INK);
        return y + 6;
    }
}
