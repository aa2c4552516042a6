package org.stillpath.plot;

import java.util.ArrayList;
import java.util.EnumSet;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import org.stillpath.task.PanelFigure;
import org.stillpath.task.PanelFigure.Axis;
import org.stillpath.task.PanelFigure.Curve;
import org.stillpath.task.PanelFigure.Mark;
import org.stillpath.task.PanelFigure.Measure;
import org.stillpath.task.PanelFigure.Panel;
import org.stillpath.task.PanelFigure.Shape;
import org.stillpath.task.PanelFigure.Style;
import org.stillpath.task.PanelFigure.Tone;
import org.stillpath.task.SectionFigure.Role;

/** Draws a {@link PanelFigure}: its panels side by side at both widths, the shared axis labelled at the left one alone. */
final class PanelDrawing {
    /** Least height of a panel, points. */
    private static final double LEAST = 70;

    private static final double GUTTER = 24;
    private static final double THINNING = 0.03;
    private static final Pen LEVEL = Pen.dashed(Ink.GREY, 0.5, 1.0, 2.0);
    private static final double[] GAPS = {2, 5, 9, 16, 26};
    /** Directions in which a label may stand from its point, the best first. */
    private static final int[][] SIDES = {{1, -1}, {1, 1}, {-1, -1}, {-1, 1}, {0, -1}, {0, 1}, {1, 0}, {-1, 0}};

    private static final Set<Style> MARKED = EnumSet.of(Style.ERECT, Style.INVERTED, Style.FOLD);
    private static final Scale.Unit CELSIUS = new Scale.Unit("°C", 1, 0);
    private static final Scale.Unit PPM = new Scale.Unit("ppm", 1e-6, 0);
    private static final List<Scale.Unit> LENGTHS = List.of(
            new Scale.Unit("km", 1e3, 3),
            new Scale.Unit("m", 1, 0.02),
            new Scale.Unit("mm", 1e-3, 0.03),
            new Scale.Unit("µm", 1e-6, 0));
    private static final double MINUTE = Math.PI / 180 / 60;
    private static final List<Scale.Unit> ANGLES = List.of(
            new Scale.Unit("deg", 60 * MINUTE, 10),
            new Scale.Unit("arcmin", MINUTE, 0.2),
            new Scale.Unit("arcsec", MINUTE / 60, 0));

    private final PanelFigure figure;
    private final Width width;
    private final Canvas canvas = new Canvas();
    private final List<String> told = new ArrayList<>();

    PanelDrawing(PanelFigure figure, Width width) {
        this.figure = figure;
        this.width = width;
    }

    Picture picture() {
        double right = width.points();
        String answer = SectionDrawing.typeset(figure.answer());
        double y = legend(canvas.heading(figure.question(), answer, right)) + 2;
        boolean titled = figure.panels().stream().anyMatch(p -> !p.title().isEmpty());
        double top = Math.ceil(y + (titled ? Canvas.SIZE * 1.25 : 0) + Axes.ABOVE);
        double height = width == Width.FULL ? 165 : 120;
        int count = figure.panels().size();
        double end = right - Canvas.EDGE - 8;
        double left = Canvas.EDGE + 30;
        double each = 0;
        // the labels of the ticks decide how much room is left, and with one scale for both directions that decides the
        // ticks
        for (int i = 0; i < 3; i++) {
            each = Math.floor((end - left - (count - 1) * GUTTER) / count);
            height = figure.equal() ? Math.min(height, Math.ceil(Math.max(LEAST, each * form()))) : height;
            View view = view(figure.panels().get(0), new Box(left, top, left + each, top + height));
            Scale up = scale(figure.up(), view.v(top + height), view.v(top), (int) (height / 20));
            left = Math.ceil(Canvas.EDGE + Axes.leftOf(up));
        }
        for (int i = 0; i < count; i++) {
            double start = left + i * (each + GUTTER);
            panel(figure.panels().get(i), i, new Box(start, top, start + each, top + height), y);
        }
        canvas.words(name(figure.up()), Canvas.EDGE, top - Typeface.DESCENDER * Canvas.SIZE - 5, Ink.INK);
        return canvas.picture(answer, description(), right, top + height + Axes.BELOW);
    }

    private double legend(double top) {
        Map<String, Pen> lines = new LinkedHashMap<>();
        figure.panels()
                .forEach(p -> p.curves().stream()
                        .filter(c -> !c.label().isEmpty() && isSeen(p, c))
                        .forEach(c -> lines.putIfAbsent(Canvas.clean(c.label()), pen(c.style()))));
        Legend legend = new Legend(width.points());
        lines.forEach((words, pen) -> legend.line(pen, words));
        return legend.draw(canvas, top);
    }

    /** Whether any part of a curve lies within its panel. */
    private boolean isSeen(Panel panel, PanelFigure.Curve curve) {
        Axis across = panel.across();
        Box box = new Box(
                across.low(), figure.up().low(), across.high(), figure.up().high());
        return !new Polyline(curve.x(), curve.y()).inside(box).isEmpty();
    }

    /** Height over width of what a panel with one scale shows. */
    private double form() {
        Axis across = figure.panels().get(0).across();
        return (figure.up().high() - figure.up().low()) / (across.high() - across.low());
    }

    private View view(Panel panel, Box plot) {
        double u0 = shown(panel.across(), panel.across().low());
        double u1 = shown(panel.across(), panel.across().high());
        double v0 = shown(figure.up(), figure.up().low());
        double v1 = shown(figure.up(), figure.up().high());
        double across = plot.width() / (u1 - u0);
        double up = plot.height() / (v1 - v0);
        if (figure.equal()) {
            across = Math.min(across, up);
            up = across;
        }
        return new View(
                (u0 + u1) / 2,
                (v0 + v1) / 2,
                (plot.left() + plot.right()) / 2,
                (plot.top() + plot.bottom()) / 2,
                across,
                up);
    }

    private void panel(Panel panel, int number, Box plot, double titleTop) {
        View view = view(panel, plot);
        int most = (int) Math.max(2, plot.width() / 24);
        Scale ruler = scale(panel.across(), view.u(plot.left()), view.u(plot.right()), most);
        while (most > 1 && !Axes.isClear(ruler, view.across())) {
            most--;
            ruler = scale(panel.across(), view.u(plot.left()), view.u(plot.right()), most);
        }
        // a single tick tells no scale
        for (int more = most + 1; ruler.ticks().size() < 2 && more <= 3 * most; more++) {
            Scale finer = scale(panel.across(), view.u(plot.left()), view.u(plot.right()), more);
            ruler = Axes.isClear(finer, view.across()) ? finer : ruler;
        }
        Scale side = scale(figure.up(), view.v(plot.bottom()), view.v(plot.top()), (int) (plot.height() / 20));
        if (number > 0) {
            side = new Scale(side.in(), List.of());
        }
        if (!panel.title().isEmpty()) {
            canvas.words(panel.title(), plot.left(), titleTop + Typeface.ASCENDER * Canvas.SIZE, Ink.GREY);
        }
        for (Shape s : panel.shapes()) {
            area(s, panel.across(), view, plot);
        }
        Chart chart = new Chart(plot, view, new Axes(ruler, side));
        Labels labels = new Labels(new Box(plot.left() + 2, plot.top(), plot.right() + 8, plot.bottom() - 1));
        for (PanelFigure.Level l : panel.levels()) {
            double y = view.y(shown(figure.up(), l.at()));
            Polyline line = new Polyline(new double[] {plot.left(), plot.right()}, new double[] {y, y});
            if (y >= plot.top() && y <= plot.bottom()) {
                chart.line(line, LEVEL);
                labels.line(line, 0.6, l);
            }
        }
        for (Curve c : panel.curves()) {
            Polyline whole = line(panel.across(), c.x(), c.y(), view);
            for (Polyline part : whole.inside(plot)) {
                chart.line(part.thinned(THINNING), pen(c.style()));
                labels.line(part, 0.9, c);
            }
        }
        chart.draw(canvas).forEach(canvas::add);
        symbols(panel, view, plot, labels);
        levels(panel, view, plot, labels);
        names(panel, view, plot, labels);
        String below = name(panel.across());
        double baseline = plot.bottom() + Axes.TICK + Axes.TICK_GAP + (Typeface.ASCENDER + 1.25) * Canvas.SIZE;
        canvas.words(below, Math.max(plot.left() - 20, plot.right() - Canvas.width(below)), baseline, Ink.INK);
        told.add((panel.title().isEmpty() ? "" : panel.title() + ", ") + below);
    }

    private Polyline line(Axis across, double[] x, double[] y, View view) {
        double[] u = new double[x.length];
        double[] v = new double[x.length];
        for (int i = 0; i < x.length; i++) {
            u[i] = shown(across, x[i]);
            v[i] = shown(figure.up(), y[i]);
        }
        return view.line(u, v);
    }

    private void area(Shape shape, Axis across, View view, Box plot) {
        Polyline p = line(across, shape.x(), shape.y(), view);
        double[][] cut = clip(p.x(), p.y(), plot);
        if (cut[0].length >= 3) {
            canvas.add(new Item.Area(cut[0], cut[1], ink(shape.tone())));
        }
    }

    /** The part of a polygon inside a box (Sutherland &amp; Hodgman 1974). */
    private static double[][] clip(double[] x, double[] y, Box box) {
        double[][] p = {x, y};
        double[] edges = {box.left(), -box.right(), box.top(), -box.bottom()};
        for (int k = 0; k < 4; k++) {
            int axis = k / 2;
            double sign = k % 2 == 0 ? 1 : -1;
            List<double[]> out = new ArrayList<>();
            int n = p[0].length;
            for (int i = 0; i < n; i++) {
                int j = (i + 1) % n;
                double a = sign * p[axis][i] - edges[k];
                double b = sign * p[axis][j] - edges[k];
                if (a >= 0) {
                    out.add(new double[] {p[0][i], p[1][i]});
                }
                if (a >= 0 != b >= 0) {
                    double t = a / (a - b);
                    out.add(new double[] {p[0][i] + t * (p[0][j] - p[0][i]), p[1][i] + t * (p[1][j] - p[1][i])});
                }
            }
            Polyline cut = Polyline.of(out);
            p = new double[][] {cut.x(), cut.y()};
        }
        return p;
    }

    private void symbols(Panel panel, View view, Box plot, Labels labels) {
        for (Mark m : panel.marks()) {
            double x = view.x(shown(panel.across(), m.x()));
            double y = view.y(shown(figure.up(), m.y()));
            if (MARKED.contains(m.style()) && plot.holds(x, y)) {
                mark(m.style(), x, y);
                labels.block(new Box(x, y, x, y).grown(3.5));
            }
        }
    }

    private void names(Panel panel, View view, Box plot, Labels labels) {
        for (Mark m : panel.marks()) {
            double x = view.x(shown(panel.across(), m.x()));
            double y = view.y(shown(figure.up(), m.y()));
            if (plot.holds(x, y)) {
                label(m.label(), places(m.label(), x, y, MARKED.contains(m.style()) ? 3 : 0), labels, m);
            }
        }
    }

    private void mark(Style style, double x, double y) {
        switch (style) {
            case INVERTED -> Legend.mark(canvas, Role.INVERTED, x, y);
            case FOLD -> {
                canvas.add(new Item.Dot(x, y, 3, Ink.INK));
                canvas.add(new Item.Dot(x, y, 2, Ink.PAPER));
            }
            default -> Legend.mark(canvas, Role.ERECT, x, y);
        }
    }

    private void levels(Panel panel, View view, Box plot, Labels labels) {
        for (PanelFigure.Level l : panel.levels()) {
            double y = view.y(shown(figure.up(), l.at()));
            if (l.label().isEmpty() || y < plot.top() || y > plot.bottom()) {
                continue;
            }
            double w = Canvas.width(Canvas.clean(l.label()));
            double h = Canvas.height();
            List<Labels.Place> places = new ArrayList<>();
            for (int i = 0; i <= 24; i++) {
                double x = plot.right() - w - i * (plot.width() - w - 4) / 24;
                for (int side = 0; side < 2; side++) {
                    double top = side == 0 ? y - h - 0.5 : y + 0.5;
                    places.add(new Labels.Place(
                            new Box(x, top, x + w, top + h), 0.4 * i + 2 * side, x + w / 2, side == 0 ? y - 1 : y + 1));
                }
            }
            label(l.label(), places, labels, l);
        }
    }

    private static List<Labels.Place> places(String words, double x, double y, double off) {
        double w = Canvas.width(Canvas.clean(words).strip());
        double h = Canvas.height();
        List<Labels.Place> places = new ArrayList<>();
        for (double gap : GAPS) {
            for (int s = 0; s < SIDES.length; s++) {
                double cx = x + SIDES[s][0] * (gap + off + w / 2);
                double cy = y + SIDES[s][1] * (gap + (SIDES[s][0] == 0 ? off : 0) + h / 2);
                Box box = new Box(cx - w / 2, cy - h / 2, cx + w / 2, cy + h / 2);
                places.add(new Labels.Place(box, gap + 1.2 * s, x, y));
            }
        }
        return places;
    }

    private void label(String words, List<Labels.Place> places, Labels labels, Object owner) {
        String text = Canvas.clean(words).strip();
        if (text.isEmpty()) {
            return;
        }
        Optional<Labels.Place> place = labels.place(places, owner, 1.5);
        if (place.isEmpty()) {
            canvas.miss(text);
            return;
        }
        canvas.words(text, place.get().box(), Ink.INK, true);
    }

    // ---- pens, units

    private static Pen pen(Style style) {
        return switch (style) {
            case PLAIN, FOLD, NOTE -> Pen.firm(Ink.INK, 1.1);
            case SECOND -> Pen.dashed(Ink.GREEN, 1.2, 5.0, 2.0);
            case THIRD -> Pen.dashed(Ink.ORANGE, 1.3, 7.0, 2.0, 1.5, 2.0);
            case ERECT -> Legend.pen(Role.ERECT);
            case INVERTED -> Legend.pen(Role.INVERTED);
            case GUIDE -> Pen.dashed(Ink.GREY, 0.7, 2.5, 2.0);
        };
    }

    private static Ink ink(Tone tone) {
        return switch (tone) {
            case GROUND -> Ink.LIGHT;
            case DARK -> Ink.INK;
            case MIDDLE -> Ink.GREY;
            case WHITE -> Ink.PAPER;
            case SIGNAL -> Ink.ORANGE;
            case SECOND -> Ink.BLUE;
        };
    }

    /** A value as it lies on its axis: temperatures from 0 °C on. */
    private static double shown(Axis axis, double value) {
        return axis.measure() == Measure.TEMPERATURE ? value - 273.15 : value;
    }

    private static Scale.Unit unit(Axis axis) {
        double size = Math.max(Math.abs(axis.low()), Math.abs(axis.high()));
        double span = axis.high() - axis.low();
        return switch (axis.measure()) {
            case LENGTH -> unit(Math.min(size, 30 * span), LENGTHS);
            case ANGLE -> unit(Math.min(size, 3 * span), ANGLES);
            case TEMPERATURE -> CELSIUS;
            case REFRACTIVITY -> PPM;
        };
    }

    private static Scale.Unit unit(double size, List<Scale.Unit> units) {
        return units.stream()
                .filter(u -> size / u.size() >= u.least())
                .findFirst()
                .orElse(units.get(units.size() - 1));
    }

    private static String name(Axis axis) {
        return axis.quantity() + " / " + unit(axis).symbol();
    }

    /** Ticks between two values as they lie on the axis. */
    private static Scale scale(Axis axis, double low, double high, int most) {
        return Scale.of(low, high, unit(axis), most);
    }

    private String description() {
        StringBuilder out = new StringBuilder(figure.question())
                .append(". Panels over ")
                .append(name(figure.up()))
                .append(": ")
                .append(String.join("; ", told))
                .append('.');
        if (!canvas.unplaced().isEmpty()) {
            out.append(" Labels without room: ")
                    .append(String.join(", ", canvas.unplaced()))
                    .append('.');
        }
        return out.toString();
    }
}
