package org.stillpath.plot;

import java.util.List;
import org.stillpath.task.BarFigure;
import org.stillpath.task.ChartFigure;

/** Draws a {@link BarFigure}: each bar below its name, its value at its end. */
final class BarDrawing {
    private static final double ROW = 26;
    private static final double THICK = 8;

    private final BarFigure figure;
    private final Width width;
    private final Canvas canvas = new Canvas();

    BarDrawing(BarFigure figure, Width width) {
        this.figure = figure;
        this.width = width;
    }

    Picture picture() {
        String answer = Plane.typeset(figure.answer());
        double top = canvas.heading(Plane.typeset(figure.question()), answer, width.points()) + 6;
        double low = -figure.limit();
        double high = figure.limit();
        double widest = 0;
        for (BarFigure.Bar b : figure.bars()) {
            low = Math.min(low, b.value());
            high = Math.max(high, b.value());
            widest = Math.max(widest, Canvas.width(Plane.typeset(b.said())));
        }
        double left = Canvas.EDGE + 4;
        double right = width.points() - Canvas.EDGE - 8;
        // room for the values beyond the ends of the bars
        double room = Math.min(0.45, (widest + 8) / (right - left));
        double span = Math.max(high - low, 1e-300);
        double share = low < 0 ? 1 - 2 * room : 1 - room;
        double total = span / Math.max(share, 0.1);
        double from = low < 0 ? low - room * total : 0;
        double to = from + total;
        int most = (int) Math.max(2, (right - left) / 40);
        ChartFigure.Axis axis = figure.across();
        Ruler ruler = Ruler.of(from, to, axis.unit(), axis.shown(), most);
        while (!ruler.isClear(right - left) && most > 1) {
            most--;
            ruler = Ruler.of(from, to, axis.unit(), axis.shown(), most);
        }
        double y = top;
        double bottom = top + ROW * figure.bars().size() + 4;
        double zero = left + ruler.part(0) * (right - left);
        for (double limit : figure.limit() > 0 ? new double[] {-figure.limit(), figure.limit()} : new double[0]) {
            double x = left + ruler.part(limit) * (right - left);
            canvas.segment(x, top, x, bottom, Pen.dashed(Ink.LIGHT, 0.7, 3.0, 2.0));
        }
        for (BarFigure.Bar b : figure.bars()) {
            boolean beyond = figure.limit() > 0 && Math.abs(b.value()) > figure.limit();
            double end = left + ruler.part(b.value()) * (right - left);
            double baseline = y + Typeface.ASCENDER * Canvas.SIZE;
            String name = shortened(b.label(), right - left);
            canvas.words(name, name(name, zero, left, right), baseline, Ink.INK);
            double upper = y + Canvas.height() + 1;
            if (Math.abs(end - zero) > 0.3) {
                canvas.add(new Item.Area(
                        new double[] {zero, end, end, zero},
                        new double[] {upper, upper, upper + THICK, upper + THICK},
                        beyond ? Ink.VERMILLION : Ink.BLUE));
            }
            String said = Plane.typeset(b.said());
            double middle = upper + THICK / 2 + (Typeface.ASCENDER - Typeface.DESCENDER) * Canvas.SIZE / 2 - 0.5;
            boolean toTheLeft = b.value() < 0;
            double x = toTheLeft ? end - 4 - Canvas.width(said) : end + 4;
            canvas.words(said, Math.max(Canvas.EDGE, x), middle, beyond ? Ink.VERMILLION : Ink.GREY);
            y += ROW;
        }
        double end = axis(ruler, left, right, bottom, zero, top);
        return canvas.picture(answer, description(), width.points(), end);
    }

    /** Where a name starts: at zero, unless it would leave the paper. */
    private static double name(String text, double zero, double left, double right) {
        return Math.max(left, Math.min(zero + 4, right + 8 - Canvas.width(text)));
    }

    private static String shortened(String text, double room) {
        String clean = Canvas.clean(text);
        List<String> lines = Canvas.wrapped(clean, Typeface.regular(), Canvas.SIZE, room);
        if (lines.size() < 2) {
            return clean;
        }
        List<String> narrow = Canvas.wrapped(clean, Typeface.regular(), Canvas.SIZE, room - Canvas.width("…") - 1);
        return narrow.get(0) + "…";
    }

    private double axis(Ruler ruler, double left, double right, double bottom, double zero, double top) {
        Pen pen = Pen.firm(Ink.INK, 0.6);
        canvas.segment(zero, top, zero, bottom, pen);
        canvas.segment(left, bottom, right, bottom, pen);
        double baseline = bottom + Axes.TICK + Axes.TICK_GAP + Typeface.ASCENDER * Canvas.SIZE;
        for (Ruler.Tick t : ruler.ticks()) {
            double x = left + ruler.part(t) * (right - left);
            canvas.segment(x, bottom, x, bottom + Axes.TICK, pen);
            double wide = Canvas.width(t.text());
            double from = Math.max(Canvas.EDGE, Math.min(x - wide / 2, right + 8 - wide));
            canvas.words(t.text(), from, baseline, Ink.INK);
        }
        double y = baseline;
        for (String line : Canvas.wrapped(
                ruler.name(figure.across().label()), Typeface.regular(), Canvas.SIZE, right + 8 - Canvas.EDGE)) {
            y += 1.25 * Canvas.SIZE;
            canvas.words(line, right + 8 - Canvas.width(line), y, Ink.INK);
        }
        return y + Typeface.DESCENDER * Canvas.SIZE + Canvas.EDGE;
    }

    private String description() {
        StringBuilder text = new StringBuilder(figure.question())
                .append(". ")
                .append(figure.answer())
                .append(".");
        for (BarFigure.Bar b : figure.bars()) {
            text.append(' ').append(b.label()).append(": ").append(b.said()).append('.');
        }
        return Plane.typeset(text.toString());
    }
}
