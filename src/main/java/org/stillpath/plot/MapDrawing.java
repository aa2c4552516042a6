package org.stillpath.plot;

import java.math.BigDecimal;
import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.stillpath.task.MapFigure;

/** Draws a {@link MapFigure}: pale colours with three to five labelled contours; where there is no value, none. */
final class MapDrawing {
    private static final double PIXELS_PER_POINT = 2;
    private static final int LEVELS = 5;

    private final MapFigure figure;
    private final Width width;
    private final Canvas canvas = new Canvas();

    MapDrawing(MapFigure figure, Width width) {
        this.figure = figure;
        this.width = width;
    }

    Picture picture() {
        String answer = Plane.typeset(figure.answer());
        double top = canvas.heading(Plane.typeset(figure.question()), answer, width.points())
                + Plane.above(figure.up(), width);
        double height = width == Width.FULL ? 230 : 150;
        double[] x = figure.x();
        double[] y = figure.y();
        Plane plane = Plane.of(canvas, width, top, height, figure.across(), ends(x), figure.up(), ends(y));
        Box plot = plane.plot();
        double low = Double.POSITIVE_INFINITY;
        double high = Double.NEGATIVE_INFINITY;
        for (double v : figure.values()) {
            if (Double.isFinite(v)) {
                low = Math.min(low, v);
                high = Math.max(high, v);
            }
        }
        boolean varies = high > low;
        canvas.add(colours(plane, low, varies ? high : low + 1));
        Labels labels = new Labels(new Box(plot.left() + 2, plot.top() + 1, plot.right(), plot.bottom() - 1));
        if (varies) {
            contours(plane, labels, low, high);
        }
        double bottom = plane.axes(figure.across().label(), figure.up().label());
        String told = figure.value().label() + " from " + said(low) + " to " + said(high);
        return canvas.picture(
                answer,
                Plane.typeset(figure.question() + ". " + figure.answer() + ". Map of " + told + "."),
                width.points(),
                bottom);
    }

    private String said(double v) {
        return Double.isFinite(v)
                ? org.stillpath.unit.Display.of(v, figure.value().unit(), 1e-4 * Math.abs(v))
                        .toString()
                : "nothing";
    }

    private static Plane.Range ends(double[] v) {
        double a = v[0];
        double b = v[v.length - 1];
        return new Plane.Range(Math.min(a, b), Math.max(a, b));
    }

    private Item.Colours colours(Plane plane, double low, double high) {
        Box plot = plane.plot();
        int columns = (int) Math.ceil(plot.width() * PIXELS_PER_POINT);
        int rows = (int) Math.ceil(plot.height() * PIXELS_PER_POINT);
        double[] px = points(figure.x(), true, plane);
        double[] py = points(figure.y(), false, plane);
        int[] argb = new int[columns * rows];
        for (int j = 0; j < rows; j++) {
            double v = plot.top() + (j + 0.5) * plot.height() / rows;
            for (int i = 0; i < columns; i++) {
                double u = plot.left() + (i + 0.5) * plot.width() / columns;
                double value = at(px, py, u, v);
                argb[j * columns + i] =
                        Double.isNaN(value) ? 0 : 0xFF000000 | Cividis.pale((value - low) / (high - low));
            }
        }
        return new Item.Colours(plot.left(), plot.top(), plot.width(), plot.height(), columns, rows, argb);
    }

    private static double[] points(double[] si, boolean across, Plane plane) {
        double[] p = new double[si.length];
        for (int i = 0; i < p.length; i++) {
            p[i] = across ? plane.x(si[i]) : plane.y(si[i]);
        }
        return p;
    }

    /** Bilinear between the values about a point; NaN beside a value that is not there. */
    private double at(double[] px, double[] py, double u, double v) {
        int c = cell(px, u);
        int r = cell(py, v);
        double s = (u - px[c]) / (px[c + 1] - px[c]);
        double t = (v - py[r]) / (py[r + 1] - py[r]);
        double[] values = figure.values();
        int n = px.length;
        double below = values[r * n + c] * (1 - s) + values[r * n + c + 1] * s;
        double above = values[(r + 1) * n + c] * (1 - s) + values[(r + 1) * n + c + 1] * s;
        return below * (1 - t) + above * t;
    }

    /** The interval that holds a place; points ascend or descend. */
    private static int cell(double[] p, double at) {
        int i = 0;
        boolean ascending = p[p.length - 1] > p[0];
        while (i + 2 < p.length && (ascending ? at > p[i + 1] : at < p[i + 1])) {
            i++;
        }
        return i;
    }

    private void contours(Plane plane, Labels labels, double low, double high) {
        Ruler ruler = Ruler.of(low, high, figure.value().unit(), figure.value().shown(), LEVELS);
        double[] px = points(figure.x(), true, plane);
        double[] py = points(figure.y(), false, plane);
        Contours contours = new Contours(px, py, figure.values());
        List<Polyline> lines = new ArrayList<>();
        List<String> texts = new ArrayList<>();
        String unit =
                ruler.unit().symbol().equals("1") ? "" : " " + ruler.unit().symbol();
        String power = ruler.power() == 0 ? "" : "·10^" + (ruler.power() < 0 ? "−" : "") + Math.abs(ruler.power());
        for (Ruler.Tick t : ruler.ticks()) {
            double si = ruler.unit()
                    .toSi(BigDecimal.valueOf(t.at())
                            .scaleByPowerOfTen(ruler.power())
                            .doubleValue());
            List<Polyline> level = contours.at(si);
            for (int i = 0; i < level.size(); i++) {
                Polyline thin = level.get(i).thinned(0.05);
                canvas.stroke(thin, Pen.firm(Ink.GREY, 0.6));
                labels.line(thin, 0.5, thin);
                if (i == 0) {
                    lines.add(thin);
                    texts.add(t.text() + power + unit);
                }
            }
        }
        for (int i = 0; i < lines.size(); i++) {
            String text = texts.get(i);
            Optional<Labels.Place> place =
                    labels.place(plane.beside(lines.get(i), text), lines.get(i), Labels.DISTANCE);
            if (place.isPresent() && !place.get().isTied()) {
                canvas.words(
                        text,
                        place.get().box(),
                        Ink.INK,
                        labels.isCrossed(place.get().box()));
            } else {
                canvas.miss(text);
            }
        }
    }
}
