package org.stillpath.plot;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.stillpath.task.ChartFigure;
import org.stillpath.task.ChartFigure.Series;
import org.stillpath.task.ChartFigure.Style;

/** Draws a {@link ChartFigure}: each series with its label beside it. */
final class ChartDrawing {
    private static final double DOT = 1.7;
    private static final int MOST_DOTS = 80;
    private static final List<Ink> INKS = List.of(Ink.BLUE, Ink.ORANGE, Ink.GREEN, Ink.PURPLE, Ink.SKY);

    private final ChartFigure figure;
    private final Width width;
    private final Canvas canvas = new Canvas();

    ChartDrawing(ChartFigure figure, Width width) {
        this.figure = figure;
        this.width = width;
    }

    /** A line and the label that it wants. */
    private record Named(Polyline line, String label, Ink ink) {}

    Picture picture() {
        String answer = Plane.typeset(figure.answer());
        double top = canvas.heading(Plane.typeset(figure.question()), answer, width.points())
                + Plane.above(figure.up(), width);
        double height = width == Width.FULL ? 190 : 140;
        Plane.Range x = range(true).padded(isSteps() ? 0 : 0.03);
        Plane.Range y = isSteps()
                ? new Plane.Range(0, 1.18 * range(false).high())
                : range(false).padded(0.08);
        Plane plane = Plane.of(canvas, width, top, height, figure.across(), x, figure.up(), y);
        Box plot = plane.plot();
        Labels labels = new Labels(new Box(plot.left() + 3, plot.top(), plot.right() + 6, plot.bottom() - 1));
        List<Named> named = new ArrayList<>();
        int curves = 0;
        for (Series s : figure.series()) {
            Ink ink = s.style() == Style.CURVE ? INKS.get(curves++ % INKS.size()) : Ink.BLUE;
            draw(s, ink, plane, labels, named);
        }
        double bottom = plane.axes(figure.across().label(), figure.up().label());
        for (Named n : named) {
            label(n, plane, labels);
        }
        return canvas.picture(answer, description(), width.points(), bottom);
    }

    private boolean isSteps() {
        return figure.series().stream().anyMatch(s -> s.style() == Style.STEPS);
    }

    /** Range of all data that belongs to an axis. */
    private Plane.Range range(boolean across) {
        double low = Double.POSITIVE_INFINITY;
        double high = Double.NEGATIVE_INFINITY;
        for (Series s : figure.series()) {
            if (s.style() == Style.MARKS && !across) {
                continue;
            }
            for (double v : across ? s.x() : s.y()) {
                if (Double.isFinite(v)) {
                    low = Math.min(low, v);
                    high = Math.max(high, v);
                }
            }
        }
        return low <= high ? new Plane.Range(low, high) : new Plane.Range(0, 1);
    }

    private void draw(Series s, Ink ink, Plane plane, Labels labels, List<Named> named) {
        Box plot = plane.plot();
        double[] x = s.x();
        double[] y = s.y();
        switch (s.style()) {
            case STEPS -> {
                double floor = plot.bottom();
                double gap = 0.4;
                List<double[]> outline = new ArrayList<>();
                for (int i = 0; i < y.length; i++) {
                    double l = plane.x(x[i]);
                    double r = plane.x(x[i + 1]);
                    double t = plane.y(y[i]);
                    canvas.add(new Item.Area(
                            new double[] {l + gap, r - gap, r - gap, l + gap},
                            new double[] {floor, floor, t, t},
                            Ink.SKY));
                    // words on bars cannot be read
                    labels.block(new Box(l, t - 1, r, floor));
                    outline.add(new double[] {l, t});
                    outline.add(new double[] {r, t});
                }
                Polyline line = Polyline.of(outline);
                labels.line(line, 1, s);
                name(s, line, Ink.INK, named);
            }
            case MARKS -> {
                for (double at : x) {
                    double u = plane.x(at);
                    if (u < plot.left() || u > plot.right()) {
                        continue;
                    }
                    Polyline line = new Polyline(new double[] {u, u}, new double[] {plot.bottom(), plot.top()});
                    canvas.stroke(line, Pen.dashed(Ink.GREY, 0.7, 3.0, 2.0));
                    labels.line(line, 1, s);
                }
                double last = plane.x(x[x.length - 1]);
                if (last >= plot.left() && last <= plot.right()) {
                    double tip = plot.top() + 0.5;
                    name(s, new Polyline(new double[] {last, last}, new double[] {tip + 30, tip}), Ink.INK, named);
                }
            }
            case POINTS -> {
                for (int i = 0; i < x.length; i++) {
                    if (Double.isFinite(x[i] + y[i])) {
                        canvas.add(new Item.Dot(plane.x(x[i]), plane.y(y[i]), DOT, ink));
                    }
                }
            }
            case CURVE, MODEL -> {
                Pen pen = s.style() == Style.CURVE ? Pen.firm(ink, 1.3) : Pen.dashed(Ink.VERMILLION, 1.3, 5.0, 2.5);
                Polyline longest = null;
                for (Polyline part : plane.line(x, y).inside(plot)) {
                    Polyline thin = part.thinned(0.03);
                    canvas.stroke(thin, pen);
                    labels.line(thin, 1, s);
                    longest = longest == null || thin.length() > longest.length() ? thin : longest;
                }
                if (s.style() == Style.CURVE && x.length <= MOST_DOTS) {
                    for (int i = 0; i < x.length; i++) {
                        if (Double.isFinite(x[i] + y[i])) {
                            canvas.add(new Item.Dot(plane.x(x[i]), plane.y(y[i]), DOT, ink));
                        }
                    }
                }
                if (longest != null) {
                    name(s, longest, s.style() == Style.CURVE ? ink : Ink.VERMILLION, named);
                }
            }
        }
    }

    private static void name(Series s, Polyline line, Ink ink, List<Named> named) {
        if (!s.label().isEmpty()) {
            named.add(new Named(line, s.label(), ink));
        }
    }

    private void label(Named n, Plane plane, Labels labels) {
        String text = Canvas.clean(n.label());
        Optional<Labels.Place> place = labels.place(plane.beside(n.line(), text), n, Labels.DISTANCE);
        if (place.isEmpty()) {
            canvas.miss(text);
            return;
        }
        if (place.get().isTied()) {
            canvas.stroke(place.get().tie(), Pen.firm(Ink.GREY, 0.4));
        }
        canvas.words(
                text, place.get().box(), n.ink(), labels.isCrossed(place.get().box()));
    }

    private String description() {
        StringBuilder text = new StringBuilder(figure.question())
                .append(". ")
                .append(figure.answer())
                .append(". ")
                .append(figure.up().label())
                .append(" against ")
                .append(figure.across().label())
                .append('.');
        for (Series s : figure.series()) {
            if (!s.label().isEmpty()) {
                text.append(' ').append(s.label()).append('.');
            }
        }
        return Plane.typeset(text.toString());
    }
}
