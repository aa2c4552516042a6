package org.stillpath.plot;

import java.math.BigDecimal;
import java.util.ArrayList;
import java.util.Collections;
import java.util.LinkedHashSet;
import java.util.List;
import java.util.Set;
import org.stillpath.task.CurveFigure;
import org.stillpath.task.CurveFigure.Axis;
import org.stillpath.task.CurveFigure.Curve;
import org.stillpath.task.CurveFigure.Measure;
import org.stillpath.task.CurveFigure.Panel;
import org.stillpath.task.CurveFigure.Point;
import org.stillpath.task.SectionFigure.Role;

/**
 * Draws a {@link CurveFigure}: its panels side by side on wide paper, below each other on narrow. Curves are cut off where they
 * leave a panel. In panels that look closer samples show as dots where they stand apart.
 */
final class CurveDrawing {
    private static final double GUTTER = 10;
    /** Samples at least so far from both neighbours show as dots, points. */
    private static final double APART = 4;

    /** Between two ticks of a logarithmic axis, points. */
    private static final double LEAST_STEP = 13;

    private static final double THINNING = 0.03;
    private static final Pen ZERO = Pen.firm(Ink.GREY, 0.5);

    /** By number of the curve, going round. */
    private static final List<Pen> PENS = List.of(
            Pen.firm(Ink.INK, 0.9),
            Pen.dashed(Ink.GREEN, 1.1, 5.0, 2.0),
            Pen.dashed(Ink.ORANGE, 1.2, 7.0, 2.0, 1.5, 2.0),
            Pen.dashed(Ink.SKY, 1.2, 1.5, 1.5));

    private final CurveFigure figure;
    private final Width width;
    private final Canvas canvas = new Canvas();
    private final List<String> told = new ArrayList<>();

    CurveDrawing(CurveFigure figure, Width width) {
        this.figure = figure;
        this.width = width;
    }

    Picture picture() {
        double right = width.points();
        double y = canvas.heading(figure.question(), SectionDrawing.typeset(figure.answer()), right);
        y = legend(y) + 2;
        int count = figure.panels().size();
        boolean beside = width == Width.FULL;
        double each = beside ? (right - (count - 1) * GUTTER) / count : right;
        double height = beside ? 150 : count == 1 ? 110 : count == 2 ? 66 : 52;
        double bottom = y;
        for (int i = 0; i < count; i++) {
            double left = beside ? i * (each + GUTTER) : 0;
            double low = panel(figure.panels().get(i), left, left + each, y, height);
            bottom = Math.max(bottom, low);
            y = beside ? y : low + 2;
        }
        return canvas.picture(SectionDrawing.typeset(figure.answer()), description(), right, bottom);
    }

    private List<String> names() {
        Set<String> names = new LinkedHashSet<>();
        figure.panels().forEach(p -> p.curves().forEach(c -> names.add(c.label())));
        return List.copyOf(names);
    }

    private double legend(double top) {
        Legend legend = new Legend(width.points());
        for (Role role : List.of(Role.MINIMUM, Role.SADDLE, Role.DEGENERATE, Role.RAY)) {
            long count = figure.panels().get(0).points().stream()
                    .filter(p -> p.role() == role)
                    .count();
            if (count > 0) {
                legend.mark(role, Legend.words(role, count));
            }
        }
        List<String> names = names();
        if (names.size() > 1) {
            for (int i = 0; i < names.size(); i++) {
                legend.line(PENS.get(i % PENS.size()), Canvas.clean(names.get(i)));
            }
        }
        return legend.draw(canvas, top);
    }

    /**
     * How an axis' values lie on paper: as they are, or logarithmic on both sides of zero. An inverse hyperbolic sine, since a
     * line that turns into a logarithm at a point has a corner there, which every curve would show.
     */
    private static double place(Axis axis, double value) {
        if (axis.linear() == 0) {
            return value;
        }
        double t = Math.abs(value) / (2 * axis.linear());
        return Math.signum(value) * Math.log10(t + Math.hypot(t, 1));
    }

    /** Draws one panel between two edges of the paper; returns the y below it. */
    private double panel(Panel panel, double leftEdge, double rightEdge, double top, double height) {
        double y = top;
        if (!panel.title().isEmpty()) {
            for (String line : Canvas.wrapped(
                    panel.title(), Typeface.regular(), Canvas.SIZE, rightEdge - leftEdge - 2 * Canvas.EDGE)) {
                canvas.words(line, leftEdge + Canvas.EDGE, y + Typeface.ASCENDER * Canvas.SIZE, Ink.GREY);
                y += Canvas.SIZE * 1.25;
            }
        }
        double plotTop = Math.ceil(y + Axes.ABOVE);
        double right = Math.floor(rightEdge - Canvas.EDGE - 8);
        Scale up = scale(panel.up(), (int) Math.max(2, height / 20), height);
        double left = Math.ceil(leftEdge + Canvas.EDGE + Axes.leftOf(up));
        Box plot = new Box(left, plotTop, right, plotTop + height);
        double u0 = place(panel.across(), panel.across().low());
        double u1 = place(panel.across(), panel.across().high());
        double v0 = place(panel.up(), panel.up().low());
        double v1 = place(panel.up(), panel.up().high());
        View view = new View(
                (u0 + u1) / 2,
                (v0 + v1) / 2,
                (plot.left() + plot.right()) / 2,
                (plot.top() + plot.bottom()) / 2,
                plot.width() / (u1 - u0),
                plot.height() / (v1 - v0));
        int count = (int) Math.max(2, plot.width() / 22);
        Scale across = scale(panel.across(), count, plot.width());
        while (count > 1 && !Axes.isClear(across, view.across())) {
            count--;
            across = scale(panel.across(), count, plot.width());
        }
        Chart chart = new Chart(plot, view, new Axes(across, up));
        List<Item> dots = new ArrayList<>();
        if (v0 < 0 && v1 > 0) {
            double zero = view.y(0);
            chart.line(new Polyline(new double[] {left, right}, new double[] {zero, zero}), ZERO);
        }
        for (Curve curve : panel.curves()) {
            Pen pen = PENS.get(names().indexOf(curve.label()) % PENS.size());
            curve(curve, pen, panel, view, plot, chart, dots);
        }
        chart.draw(canvas).forEach(canvas::add);
        dots.forEach(canvas::add);
        for (Point p : panel.points()) {
            double x = view.x(place(panel.across(), p.x()));
            double py = view.y(place(panel.up(), p.y()));
            if (plot.holds(x, py)) {
                Legend.mark(canvas, p.role(), x, py);
            }
        }
        String note = panel.up().linear() > 0
                ? " (log beyond ±"
                        + Scale.plain(
                                BigDecimal.valueOf(
                                        panel.up().linear() / unitOf(panel.up()).size()),
                                decimals(
                                        panel.up().linear() / unitOf(panel.up()).size()))
                        + ")"
                : "";
        canvas.words(
                panel.up().quantity() + " / " + unitOf(panel.up()).symbol() + note,
                leftEdge + Canvas.EDGE,
                plot.top() - Typeface.DESCENDER * Canvas.SIZE - 5,
                Ink.INK);
        String below =
                panel.across().quantity() + " / " + unitOf(panel.across()).symbol();
        double baseline = plot.bottom() + Axes.TICK + Axes.TICK_GAP + (Typeface.ASCENDER + 1.25) * Canvas.SIZE;
        canvas.words(below, plot.right() - Canvas.width(below), baseline, Ink.INK);
        told.add((panel.title().isEmpty() ? "" : panel.title() + ", ") + below + " and "
                + panel.up().quantity() + " / " + unitOf(panel.up()).symbol() + note);
        return plot.bottom() + Axes.BELOW;
    }

    private void curve(Curve curve, Pen pen, Panel panel, View view, Box plot, Chart chart, List<Item> dots) {
        double[] x = curve.x();
        double[] y = curve.y();
        double[] u = new double[x.length];
        double[] v = new double[x.length];
        for (int i = 0; i < x.length; i++) {
            u[i] = place(panel.across(), x[i]);
            v[i] = place(panel.up(), y[i]);
        }
        Polyline whole = view.line(u, v);
        whole.inside(plot).forEach(part -> chart.line(part.thinned(THINNING), pen));
        if (panel.equals(figure.panels().get(0))) {
            return;
        }
        for (int i = 0; i < x.length; i++) {
            double px = whole.x()[i];
            double py = whole.y()[i];
            if (plot.holds(px, py) && apart(whole, i - 1, i) && apart(whole, i, i + 1)) {
                dots.add(new Item.Dot(px, py, 1, pen.ink()));
            }
        }
    }

    private static boolean apart(Polyline line, int i, int j) {
        return i < 0 || j >= line.size() || !(Math.hypot(line.x()[j] - line.x()[i], line.y()[j] - line.y()[i]) < APART);
    }

    // ---- axes

    private static Scale.Unit unitOf(Axis axis) {
        double size = Math.max(Math.abs(axis.low()), Math.abs(axis.high()));
        return axis.measure() == Measure.ANGLE ? Scale.angleUnitFor(size) : Scale.unitFor(size);
    }

    private static int decimals(double power) {
        return (int) Math.max(0, Math.ceil(-Math.log10(power) - 1e-9));
    }

    private static Scale scale(Axis axis, int most, double points) {
        Scale.Unit unit = unitOf(axis);
        if (axis.linear() == 0) {
            return Scale.of(axis.low(), axis.high(), unit, most);
        }
        // decades on both sides, as many as have room
        double span = place(axis, axis.high()) - place(axis, axis.low());
        int every = (int) Math.max(1, Math.ceil(LEAST_STEP * span / points));
        int first = 0;
        while (place(axis, axis.linear() * Math.pow(10, first)) * points / span < LEAST_STEP) {
            first++;
        }
        List<Scale.Tick> ticks = new ArrayList<>();
        for (int sign = -1; sign <= 1; sign += 2) {
            double end = sign < 0 ? -axis.low() : axis.high();
            for (int k = first; axis.linear() * Math.pow(10, k) <= end * (1 + 1e-9); k += every) {
                double value = axis.linear() * Math.pow(10, k);
                double shown = value / unit.size();
                String text = Scale.plain(BigDecimal.valueOf(sign * shown), decimals(shown));
                ticks.add(new Scale.Tick(place(axis, sign * value), text));
            }
            if (sign < 0) {
                Collections.reverse(ticks);
                ticks.add(new Scale.Tick(0, "0"));
            }
        }
        return new Scale(new Scale.Unit(unit.symbol(), 1, 0), ticks);
    }

    private String description() {
        StringBuilder out = new StringBuilder(figure.question()).append(". Panels: ");
        out.append(String.join("; ", told)).append(". Curves: ").append(String.join(", ", names()));
        return out.append('.').toString();
    }
}
