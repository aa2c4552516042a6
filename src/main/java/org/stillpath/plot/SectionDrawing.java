package org.stillpath.plot;

import java.math.BigDecimal;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.Collections;
import java.util.EnumMap;
import java.util.EnumSet;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import java.util.stream.Collectors;
import org.stillpath.task.SectionFigure;
import org.stillpath.task.SectionFigure.Line;
import org.stillpath.task.SectionFigure.Mark;
import org.stillpath.task.SectionFigure.Role;

/**
 * Draws a {@link SectionFigure}. Both directions have one scale where that leaves the picture legible; else heights (or
 * widths) are drawn larger by a round factor, which is told with scale bars. What lies outside the plot is cut off there.
 */
final class SectionDrawing {
    private static final double PAD_X = 12;
    private static final double PAD_Y = 17;

    /** Below this height of the contents, points, one scale for both directions is not legible. */
    private static final double LEAST_CONTENTS = 56;

    /** A picture that would be narrower than its height over this is drawn with larger widths. */
    private static final double TALLEST = 8;

    /** A height below this part of the width is rounding, not height. */
    private static final double FLAT = 1e-9;

    /** How far rays that go astray may widen the view, in parts of the rest. */
    private static final double STRAY = 0.2;

    private static final Set<Role> LIGHT = EnumSet.of(
            Role.RAY,
            Role.MINIMUM,
            Role.SADDLE,
            Role.DEGENERATE,
            Role.ERECT,
            Role.INVERTED,
            Role.PRINCIPAL_RAY,
            Role.LOST_RAY);

    private static final double HATCH = 4.5;
    private static final double THINNING = 0.03;
    private static final Pen CONTOUR = Pen.firm(Ink.GREY, 0.4);
    private static final Pen FRONT = Pen.firm(Ink.GREEN, 0.5);
    private static final int MOST_FRONTS = 10;

    /** Back to front. */
    private static final List<Role> ORDER = List.of(
            Role.AXIS,
            Role.PLANE,
            Role.GROUND,
            Role.EXTENSION,
            Role.RAY,
            Role.DEGENERATE,
            Role.SADDLE,
            Role.MINIMUM,
            Role.INVERTED,
            Role.ERECT,
            Role.CLEARANCE,
            Role.LOST_RAY,
            Role.PRINCIPAL_RAY,
            Role.SURFACE,
            Role.MIRROR,
            Role.THIN_LENS,
            Role.STOP,
            Role.OBJECT,
            Role.VIRTUAL_IMAGE,
            Role.IMAGE);

    private final SectionFigure figure;
    private final Width width;
    private final Canvas canvas = new Canvas();
    private final Optional<Shade> shade;

    SectionDrawing(SectionFigure figure, Width width) {
        this.figure = figure;
        this.width = width;
        shade = figure.shading().map(Shade::new).filter(Shade::isShown);
    }

    /** The place of the plot and its scales. {@code exaggeration}: heights over widths. */
    private record Layout(Box plot, View view, double exaggeration, Axes axes) {}

    /** One line as drawn: its parts inside the plot. */
    private record Drawn(Line line, Polyline whole, List<Polyline> parts) {}

    Picture picture() {
        double right = width.points();
        double top = canvas.heading(figure.question(), typeset(figure.answer()), right);
        Bounds bounds = bounds();
        // the height of the strip depends only on whether heights are exaggerated, which no shift of the plot changes
        Layout trial = layout(bounds, top);
        double below = strip(legend(top), trial);
        Layout layout = layout(bounds, below);
        draw(layout);
        double bottom = layout.plot().bottom() + Axes.BELOW;
        return canvas.picture(typeset(figure.answer()), description(layout), right, bottom);
    }

    /** Plain text's hyphen before a number as the minus sign that it means. */
    static String typeset(String plain) {
        return plain.replaceAll("(?<![\\w.])-(?=\\d)", "−");
    }

    // ---- where things go

    private Bounds bounds() {
        Bounds sure = new Bounds();
        Bounds astray = new Bounds();
        Bounds guides = new Bounds();
        for (Line line : figure.lines()) {
            switch (line.role()) {
                case LOST_RAY -> astray.add(line.u(), line.v());
                case AXIS -> guides.add(line.u(), line.v());
                case PLANE -> {
                    sure.addAcross(line.u());
                    guides.add(line.u(), line.v());
                }
                default -> sure.add(line.u(), line.v());
            }
        }
        figure.marks().forEach(m -> sure.add(new double[] {m.u()}, new double[] {m.v()}));
        shade.map(Shade::shading).ifPresent(s -> add(sure, s));
        figure.fronts().ifPresent(s -> add(sure, s));
        if (!sure.isComplete()) {
            sure.add(astray);
        } else {
            sure.add(astray.within(sure, STRAY));
        }
        if (!sure.isComplete()) {
            sure.add(guides);
        }
        return sure.isComplete() ? sure : new Bounds(0, 1, 0, 1);
    }

    private static void add(Bounds bounds, SectionFigure.Shading s) {
        bounds.add(new double[] {s.u0(), s.u1()}, new double[] {s.v0(), s.v1()});
    }

    private Layout layout(Bounds b, double stripBottom) {
        boolean full = width == Width.FULL;
        double most = full ? 195 : 160;
        double least = full ? 96 : 84;
        double plotTop = stripBottom + Axes.ABOVE;
        double left = Canvas.EDGE + 30;
        Layout layout = fit(b, plotTop, left, most, least);
        // the labels of the ticks decide how much room is left; they hardly depend on it
        for (int i = 0; i < 2; i++) {
            left = Canvas.EDGE + Axes.leftOf(layout.axes().up());
            layout = fit(b, plotTop, left, most, least);
        }
        return layout;
    }

    private Layout fit(Bounds b, double stripTop, double leftEdge, double most, double least) {
        // whole points, since JFreeChart rounds the place of a plot to them
        double top = Math.ceil(stripTop);
        double left = Math.ceil(leftEdge);
        double right = Math.floor(width.points() - Canvas.EDGE - 8);
        double inner = right - left - 2 * PAD_X;
        double u = b.acrossSpan();
        double v = b.upSpan() < FLAT * u ? 0 : b.upSpan();
        if (u == 0 && v == 0) {
            u = 1e-3;
        }
        double tallest = most - 2 * PAD_Y;
        double across = u > 0 ? inner / u : tallest / v;
        double contents = v * across;
        double exaggeration = 1;
        if (contents > tallest) {
            double up = tallest / v;
            double shrunk = up / across;
            exaggeration = shrunk * TALLEST >= 1 ? 1 : 1 / roundFactor(inner / (u * up));
            across = up / exaggeration;
        } else if (v > 0 && contents < LEAST_CONTENTS) {
            exaggeration = roundFactor((width == Width.FULL ? 150 : 105) / contents);
        }
        double up = across * exaggeration;
        double height = Math.ceil(Math.max(least, Math.min(most, v * up + 2 * PAD_Y)));
        Box plot = new Box(left, top, right, top + height);
        View view = new View(b.acrossMiddle(), b.upMiddle(), (left + right) / 2, top + height / 2, across, up);
        return new Layout(plot, view, exaggeration, axes(plot, view, exaggeration));
    }

    private static double roundFactor(double most) {
        double power = Math.pow(10, Math.floor(Math.log10(most)));
        double best = power;
        for (double f : new double[] {1.5, 2, 3, 4, 5, 6, 8}) {
            if (f * power <= most && f * power >= 2) {
                best = f * power;
            }
        }
        return best;
    }

    private static Axes axes(Box plot, View view, double exaggeration) {
        double u0 = view.u(plot.left());
        double u1 = view.u(plot.right());
        double v0 = view.v(plot.bottom());
        double v1 = view.v(plot.top());
        double tall = Math.max(Math.abs(v0), Math.abs(v1));
        Scale.Unit acrossUnit = Scale.unitFor(Math.max(Math.abs(u0), Math.abs(u1)));
        Scale.Unit upUnit = Scale.unitFor(tall);
        if (exaggeration == 1 && tall / acrossUnit.size() > 0.05) {
            upUnit = acrossUnit;
        }
        int count = (int) Math.max(2, plot.width() / 36);
        Scale across = Scale.of(u0, u1, acrossUnit, count);
        while (!Axes.isClear(across, view.across())) {
            count--;
            across = Scale.of(u0, u1, acrossUnit, count);
        }
        Scale up = Scale.of(v0, v1, upUnit, (int) Math.max(2, plot.height() / 22));
        return new Axes(across, up);
    }

    // ---- the strip between title and plot: what the shading means, and how scales differ

    /** Which kinds of paths there are, and how many of each; returns the y below. */
    private double legend(double top) {
        Legend legend = new Legend(width.points());
        for (Role role : List.of(Role.ERECT, Role.INVERTED, Role.MINIMUM, Role.SADDLE, Role.DEGENERATE)) {
            long count = figure.lines().stream().filter(l -> l.role() == role).count();
            if (count > 0) {
                legend.line(Legend.pen(role), Legend.words(role, count));
            }
        }
        figure.fronts().ifPresent(f -> legend.line(FRONT, Canvas.clean(f.quantity())));
        return legend.draw(canvas, top);
    }

    private double strip(double top, Layout layout) {
        if (shade.isEmpty() && layout.exaggeration() == 1) {
            return top;
        }
        double y = top + 3;
        if (shade.filter(s -> rampWidth(s) > width.points() - 2 * Canvas.EDGE).isPresent()) {
            for (String line : Canvas.wrapped(
                    shade.get().shading().quantity(),
                    Typeface.regular(),
                    Canvas.SIZE,
                    width.points() - 2 * Canvas.EDGE)) {
                canvas.words(line, Canvas.EDGE, y + Typeface.ASCENDER * Canvas.SIZE, Ink.INK);
                y += Canvas.SIZE * 1.25;
            }
        }
        double baseline = y + Typeface.ASCENDER * Canvas.SIZE;
        if (layout.exaggeration() == 1) {
            shade.ifPresent(s -> ramp(s, baseline));
            return y + Canvas.SIZE * 1.2 + 2;
        }
        double room = barsWidth(layout);
        double edge = width.points() - Canvas.EDGE - 8;
        if (shade.isPresent()) {
            boolean beside = Canvas.EDGE + rampWidth(shade.get()) + 14 < edge - room;
            ramp(shade.get(), beside ? y + BARS_HEIGHT - 3 : baseline);
            y += beside ? 0 : Canvas.SIZE * 1.25 + 4;
        }
        bars(layout, edge - room, y);
        return y + BARS_HEIGHT + 1;
    }

    private static final double BARS_HEIGHT = 27;
    private static final double RAMP_WIDTH = 44;

    private static String unit(Shade s) {
        return s.shading().unit().equals("1")
                ? ""
                : " " + Canvas.clean(s.shading().unit());
    }

    private static String rampStart(Shade s) {
        return Canvas.clean(s.shading().quantity()) + "  " + s.lowText() + unit(s);
    }

    private static double rampWidth(Shade s) {
        return Canvas.width(rampStart(s)) + RAMP_WIDTH + 8 + Canvas.width(s.highText() + unit(s));
    }

    private void ramp(Shade s, double baseline) {
        boolean named = rampWidth(s) <= width.points() - 2 * Canvas.EDGE;
        double x = canvas.words(named ? rampStart(s) : s.lowText() + unit(s), Canvas.EDGE, baseline, Ink.INK);
        int[] colours = new int[64];
        for (int i = 0; i < colours.length; i++) {
            colours[i] = 0xFF000000 | Cividis.pale((i + 0.5) / colours.length);
        }
        double height = Typeface.CAPITAL * Canvas.SIZE + 1;
        canvas.add(new Item.Colours(x + 4, baseline - height + 0.5, RAMP_WIDTH, height, colours.length, 1, colours));
        canvas.words(s.highText() + unit(s), x + RAMP_WIDTH + 8, baseline, Ink.INK);
    }

    private static String told(double exaggeration) {
        boolean high = exaggeration > 1;
        double factor = high ? exaggeration : 1 / exaggeration;
        String number = Scale.plain(BigDecimal.valueOf(factor), factor < 10 && factor != Math.rint(factor) ? 1 : 0);
        return (high ? "heights " : "widths ") + number + " ×";
    }

    private static Scale.Tick barAcross(Layout layout) {
        return Scale.roundLength(
                56 / layout.view().across(), layout.axes().across().in());
    }

    private static Scale.Tick barUp(Layout layout) {
        return Scale.roundLength(
                (BARS_HEIGHT - 7) / layout.view().up(), layout.axes().up().in());
    }

    private static double barsWidth(Layout layout) {
        Scale.Tick across = barAcross(layout);
        return Canvas.width(told(layout.exaggeration()))
                + 12
                + Math.max(
                        across.at() * layout.view().across() + 4 + Canvas.width(across.text()),
                        4 + Canvas.width(barUp(layout).text()));
    }

    private void bars(Layout layout, double x, double top) {
        Pen pen = Pen.firm(Ink.INK, 1);
        double foot = top + BARS_HEIGHT - 6;
        double corner = canvas.words(told(layout.exaggeration()), x, foot + 3, Ink.INK) + 12;
        Scale.Tick up = barUp(layout);
        double tip = foot - up.at() * layout.view().up();
        canvas.segment(corner, foot, corner, tip, pen);
        canvas.segment(corner - 2, tip, corner + 2, tip, pen);
        canvas.words(up.text(), corner + 4, Math.min(tip + 5.5, foot - 5), Ink.INK);
        Scale.Tick across = barAcross(layout);
        double end = corner + across.at() * layout.view().across();
        canvas.segment(corner, foot, end, foot, pen);
        canvas.segment(end, foot - 2, end, foot + 2, pen);
        canvas.words(across.text(), end + 4, foot + 3, Ink.INK);
    }

    // ---- the plot

    private void draw(Layout layout) {
        Box plot = layout.plot();
        View view = layout.view();
        Labels labels = new Labels(new Box(plot.left() + 4, plot.top(), plot.right(), plot.bottom() - 1));
        shade.ifPresent(s -> canvas.add(s.colours(view, plot)));
        int above = canvas.count();
        Chart chart = new Chart(plot, view, layout.axes());
        Map<String, List<Polyline>> contours = contours(plot, view, labels);
        Map<String, List<Polyline>> fronts = fronts(plot, view, labels);
        List<Drawn> drawn = new ArrayList<>();
        int principal = 0;
        Polyline light = light(view);
        int rays =
                (int) figure.lines().stream().filter(l -> l.role() == Role.RAY).count();
        for (Role role : ORDER) {
            for (Line line : figure.lines()) {
                if (line.role() != role) {
                    continue;
                }
                Polyline whole = view.line(line.u(), line.v());
                List<Polyline> parts = whole.inside(plot).stream()
                        .map(p -> p.thinned(THINNING))
                        .toList();
                Pen pen = pen(role, rays, role == Role.PRINCIPAL_RAY ? principal++ : 0);
                Drawn d = new Drawn(line, whole, parts);
                drawn.add(d);
                drawLine(d, pen, plot, light, labels, chart);
            }
        }
        // crosses above everything: rays end on stops and surfaces
        drawn.stream().filter(d -> d.line().role() == Role.LOST_RAY).forEach(d -> cross(d, plot, labels));
        for (Mark mark : figure.marks()) {
            double x = view.x(mark.u());
            double y = view.y(mark.v());
            if (plot.holds(x, y)) {
                canvas.add(new Item.Dot(x, y, 1.8, Ink.INK));
                labels.block(new Box(x, y, x, y).grown(1.8));
            }
        }
        int place = above;
        for (Item item : chart.draw(canvas)) {
            canvas.addAt(place++, item);
        }
        layout.axes().name(canvas, plot, Canvas.clean(figure.across()), Canvas.clean(figure.up()));
        place(drawn, plot, view, labels);
        Box inner = new Box(plot.left() + 2, plot.top(), plot.right() - 2, plot.bottom());
        fronts.forEach((text, lines) -> contour(text, lines, FRONT, above, inner, labels));
        contours.forEach((text, lines) -> contour(text, lines, CONTOUR, above, shaded(view), labels));
    }

    private Map<String, List<Polyline>> contours(Box plot, View view, Labels labels) {
        Map<String, List<Polyline>> all = new LinkedHashMap<>();
        if (shade.isEmpty()) {
            return all;
        }
        for (BigDecimal level : shade.get().levels()) {
            String text = Scale.plain(level, Math.max(level.scale(), 0));
            all.put(text, faint(shade.get().contours(level.doubleValue(), view), text, plot, labels));
        }
        return all;
    }

    /** Wavefronts at round optical lengths. */
    private Map<String, List<Polyline>> fronts(Box plot, View view, Labels labels) {
        Map<String, List<Polyline>> all = new LinkedHashMap<>();
        if (figure.fronts().isEmpty()) {
            return all;
        }
        SectionFigure.Shading f = figure.fronts().get();
        double[] values = f.values();
        double low = Arrays.stream(values).filter(Double::isFinite).min().orElse(0);
        double high = Arrays.stream(values).filter(Double::isFinite).max().orElse(0);
        if (high > low) {
            // between cell centres only: beyond them the lines would have to be guessed
            double[] x = new double[f.columns()];
            double[] y = new double[f.rows()];
            for (int c = 0; c < x.length; c++) {
                x[c] = view.x(f.u0() + (c + 0.5) * (f.u1() - f.u0()) / x.length);
            }
            for (int r = 0; r < y.length; r++) {
                y[r] = view.y(f.v0() + (r + 0.5) * (f.v1() - f.v0()) / y.length);
            }
            Contours contours = new Contours(x, y, values);
            for (Scale.Tick t :
                    Scale.of(low, high, Scale.unitFor(high), MOST_FRONTS).ticks()) {
                String text = t.text() + " " + Scale.unitFor(high).symbol();
                all.put(text, faint(contours.at(t.at()), text, plot, labels));
            }
        }
        return all;
    }

    /** Level lines as far as they lie in the plot, made known to the labels. */
    private static List<Polyline> faint(List<Polyline> level, Object owner, Box plot, Labels labels) {
        List<Polyline> lines = level.stream()
                .flatMap(l -> l.inside(plot).stream())
                .map(l -> l.thinned(THINNING))
                .filter(l -> l.length() > 2)
                .toList();
        for (Polyline line : lines) {
            labels.line(line, Labels.FAINT, owner);
        }
        return lines;
    }

    private static Pen pen(Role role, int rays, int number) {
        return switch (role) {
            case RAY -> Pen.firm(Ink.INK, rays <= 15 ? 0.8 : rays <= 40 ? 0.6 : 0.4);
            case MINIMUM, SADDLE, DEGENERATE, ERECT, INVERTED -> Legend.pen(role);
            case CLEARANCE -> Pen.firm(Ink.GREEN, 1.3);
            case LOST_RAY -> Pen.dashed(Ink.VERMILLION, 0.9, 4.0, 2.5);
            case PRINCIPAL_RAY ->
                switch (number % 3) {
                    case 0 -> Pen.firm(Ink.GREEN, 1.2);
                    case 1 -> Pen.dashed(Ink.ORANGE, 1.2, 8.0, 2.5);
                    default -> Pen.dashed(Ink.PURPLE, 1.2, 8.0, 2.0, 1.5, 2.0);
                };
            case EXTENSION -> Pen.dashed(Ink.GREY, 0.6, 2.5, 2.0);
            case SURFACE, MIRROR -> Pen.firm(Ink.INK, 1.4);
            case GROUND -> Pen.firm(Ink.INK, 1.1);
            case THIN_LENS -> Pen.firm(Ink.INK, 1.3);
            case STOP -> Pen.firm(Ink.INK, 2.8);
            case AXIS -> Pen.dashed(Ink.GREY, 0.5, 9.0, 2.5, 1.5, 2.5);
            case PLANE -> Pen.dashed(Ink.GREY, 0.8, 1.2, 2.0);
            case OBJECT -> Pen.firm(Ink.INK, 1.8);
            case IMAGE -> Pen.firm(Ink.BLUE, 1.8);
            case VIRTUAL_IMAGE -> Pen.dashed(Ink.BLUE, 1.8, 4.0, 2.2);
        };
    }

    private static double price(Role role) {
        return switch (role) {
            case AXIS, EXTENSION, PLANE -> 0.5;
            case RAY, MINIMUM, SADDLE, DEGENERATE, ERECT, INVERTED, LOST_RAY, PRINCIPAL_RAY -> 0.9;
            case CLEARANCE -> 1;
            case SURFACE, MIRROR, GROUND, THIN_LENS, STOP, OBJECT, IMAGE, VIRTUAL_IMAGE -> 2;
        };
    }

    private void drawLine(Drawn d, Pen pen, Box plot, Polyline light, Labels labels, Chart chart) {
        Role role = d.line().role();
        for (Polyline part : d.parts()) {
            labels.line(part, price(role), d.line());
        }
        switch (role) {
            case MIRROR -> hatch(d, behind(d.whole(), light), plot, labels);
            case GROUND -> ground(d, plot, labels);
            default -> {}
        }
        if (role == Role.OBJECT || role == Role.IMAGE || role == Role.VIRTUAL_IMAGE) {
            arrow(d, pen, plot, labels);
            return;
        }
        d.parts().forEach(part -> chart.line(part, pen));
        if (role == Role.THIN_LENS) {
            tips(d, pen, plot, labels);
        }
    }

    /** Filled below, so that a flat profile is still seen as what hides. */
    private void ground(Drawn d, Box plot, Labels labels) {
        for (Polyline part : d.parts()) {
            int n = part.size();
            double[] x = Arrays.copyOf(part.x(), n + 2);
            double[] y = Arrays.copyOf(part.y(), n + 2);
            x[n] = x[n - 1];
            x[n + 1] = x[0];
            y[n] = plot.bottom();
            y[n + 1] = plot.bottom();
            canvas.add(new Item.Area(x, y, Ink.LIGHT));
        }
        hatch(d, 1, plot, labels);
    }

    /** All points of rays, as one list; not a line. */
    private Polyline light(View view) {
        List<double[]> points = new ArrayList<>();
        for (Line line : figure.lines()) {
            if (LIGHT.contains(line.role())) {
                Polyline p = view.line(line.u(), line.v());
                for (int i = 0; i < p.size(); i++) {
                    points.add(new double[] {p.x()[i], p.y()[i]});
                }
            }
        }
        return Polyline.of(points);
    }

    /** The side of a mirror where there is no light: +1 to the right of its run on paper, -1 to the left. */
    private static int behind(Polyline mirror, Polyline light) {
        int last = mirror.size() - 1;
        double dx = mirror.x()[last] - mirror.x()[0];
        double dy = mirror.y()[last] - mirror.y()[0];
        double length = Math.hypot(dx, dy);
        double sum = 0;
        for (int i = 0; i < light.size(); i++) {
            double side = (dx * (light.y()[i] - mirror.y()[0]) - dy * (light.x()[i] - mirror.x()[0])) / length;
            sum += Math.max(-10, Math.min(10, side));
        }
        return sum > 0 ? -1 : 1;
    }

    /** Short strokes at 45 degrees on one side: +1 where y grows for a line that runs to the right. */
    private void hatch(Drawn d, int side, Box plot, Labels labels) {
        Pen pen = Pen.firm(Ink.INK, 0.5);
        for (Polyline part : d.parts()) {
            int turn = d.line().role() == Role.GROUND && part.x()[0] > part.x()[part.size() - 1] ? -side : side;
            double length = part.length();
            int count = (int) (length / HATCH);
            List<double[]> rim = new ArrayList<>();
            for (int i = 0; i <= count; i++) {
                double[] at = part.at(length == 0 ? 0 : (i + 0.5) * HATCH / length);
                double nx = -at[3] * turn;
                double ny = at[2] * turn;
                double ex = at[0] + HATCH * (nx - at[2]) * 0.9;
                double ey = at[1] + HATCH * (ny - at[3]) * 0.9;
                if (i < count && plot.holds(ex, ey)) {
                    canvas.segment(at[0], at[1], ex, ey, pen);
                }
                rim.add(new double[] {at[0] + nx * HATCH / 2, at[1] + ny * HATCH / 2});
            }
            if (rim.size() >= 2) {
                labels.line(Polyline.of(rim), 2, d.line());
            }
        }
    }

    private void arrow(Drawn d, Pen pen, Box plot, Labels labels) {
        Polyline p = d.whole();
        int last = p.size() - 1;
        double x = p.x()[last];
        double y = p.y()[last];
        double length = p.length();
        if (length < 0.5) {
            if (plot.holds(x, y)) {
                canvas.add(new Item.Dot(x, y, 2, pen.ink()));
                labels.block(new Box(x, y, x, y).grown(2));
            }
            return;
        }
        double[] end = p.at(1);
        double head = Math.min(7, 0.7 * length);
        // the shaft ends inside the head, so that the tip stays sharp
        Box clip = plot;
        double bx = x - end[2] * head;
        double by = y - end[3] * head;
        List<double[]> shaft = new ArrayList<>();
        for (int i = 0; i < last; i++) {
            shaft.add(new double[] {p.x()[i], p.y()[i]});
        }
        shaft.add(new double[] {bx + end[2], by + end[3]});
        Polyline.of(shaft).inside(clip).forEach(part -> canvas.stroke(part, pen));
        if (plot.holds(x, y)) {
            double half = 0.42 * head;
            canvas.add(new Item.Area(
                    new double[] {x, bx - end[3] * half, bx + end[3] * half},
                    new double[] {y, by + end[2] * half, by - end[2] * half},
                    pen.ink()));
            // no other thing's label stands at the foot as if it named the arrow
            double fx = p.x()[0];
            double fy = p.y()[0] - end[3] * 7;
            labels.block(new Box(fx, fy, fx, fy).grown(6));
            labels.block(new Box(Math.min(x, bx), Math.min(y, by), Math.max(x, bx), Math.max(y, by)).grown(half / 2));
        }
    }

    /** Open tips: outward on a lens that gathers light, inward on one that spreads it, as rays of the figure tell. */
    private void tips(Drawn d, Pen pen, Box plot, Labels labels) {
        Polyline p = d.whole();
        double sign = spreads(d.line()) ? -1 : 1;
        for (int k = 0; k < 2; k++) {
            double[] end = p.at(k);
            double out = k == 0 ? -1 : 1;
            double x = end[0];
            double y = end[1];
            if (!plot.holds(x, y)) {
                continue;
            }
            double ox = end[2] * out * sign;
            double oy = end[3] * out * sign;
            for (int s = -1; s <= 1; s += 2) {
                canvas.segment(x, y, x - 5 * ox - s * 3.5 * oy, y - 5 * oy + s * 3.5 * ox, pen);
            }
            labels.block(new Box(x, y, x, y).grown(4));
        }
    }

    /** Whether rays bend away from the lens' middle where they meet it. */
    private boolean spreads(Line lens) {
        double[] lu = lens.u();
        double[] lv = lens.v();
        double at = (lu[0] + lu[lu.length - 1]) / 2;
        double middle = (lv[0] + lv[lv.length - 1]) / 2;
        double near = 1e-6 * Math.abs(lv[0] - lv[lv.length - 1]);
        double bending = 0;
        for (Line ray : figure.lines()) {
            if (ray.role() != Role.RAY && ray.role() != Role.PRINCIPAL_RAY) {
                continue;
            }
            double[] u = ray.u();
            double[] v = ray.v();
            for (int i = 1; i + 1 < u.length; i++) {
                if (Math.abs(u[i] - at) <= near && u[i] != u[i - 1] && u[i + 1] != u[i]) {
                    double turn = (v[i + 1] - v[i]) / (u[i + 1] - u[i]) - (v[i] - v[i - 1]) / (u[i] - u[i - 1]);
                    bending += turn * (v[i] - middle);
                }
            }
        }
        return bending > 0;
    }

    private void cross(Drawn d, Box plot, Labels labels) {
        double x = d.whole().x()[d.whole().size() - 1];
        double y = d.whole().y()[d.whole().size() - 1];
        Box room = new Box(x, y, x, y).grown(3);
        if (!plot.holds(room)) {
            return;
        }
        for (Pen pen : List.of(Pen.firm(Ink.PAPER, 1.9), Pen.firm(Ink.VERMILLION, 1.1))) {
            double arm = pen.ink() == Ink.PAPER ? 2.5 : 2.2;
            canvas.segment(x - arm, y - arm, x + arm, y + arm, pen);
            canvas.segment(x - arm, y + arm, x + arm, y - arm, pen);
        }
        labels.block(room);
    }

    // ---- labels

    private enum Side {
        ABOVE(0, -1),
        BELOW(0, 1),
        RIGHT(1, 0),
        LEFT(-1, 0),
        ABOVE_RIGHT(1, -1),
        ABOVE_LEFT(-1, -1),
        BELOW_RIGHT(1, 1),
        BELOW_LEFT(-1, 1);

        private final int dx;
        private final int dy;

        Side(int dx, int dy) {
            this.dx = dx;
            this.dy = dy;
        }
    }

    /** Lines along which a label may stand anywhere: where no other line is near. */
    private static final Set<Role> SLIDING = EnumSet.of(
            Role.RAY,
            Role.MINIMUM,
            Role.SADDLE,
            Role.DEGENERATE,
            Role.ERECT,
            Role.INVERTED,
            Role.LOST_RAY,
            Role.PRINCIPAL_RAY,
            Role.EXTENSION,
            Role.AXIS);

    private static final List<Side> END_UP = List.of(
            Side.ABOVE, Side.RIGHT, Side.LEFT, Side.ABOVE_RIGHT, Side.ABOVE_LEFT, Side.BELOW_RIGHT, Side.BELOW_LEFT);
    private static final List<Side> END_DOWN = List.of(
            Side.BELOW, Side.RIGHT, Side.LEFT, Side.BELOW_RIGHT, Side.BELOW_LEFT, Side.ABOVE_RIGHT, Side.ABOVE_LEFT);
    private static final List<Side> SIDEWAYS = List.of(Side.RIGHT, Side.LEFT);
    private static final List<Side> BESIDE = List.of(
            Side.RIGHT, Side.LEFT, Side.ABOVE_RIGHT, Side.ABOVE_LEFT, Side.BELOW_RIGHT, Side.BELOW_LEFT, Side.ABOVE);
    private static final List<Side> ALONG = List.of(
            Side.ABOVE,
            Side.BELOW,
            Side.ABOVE_LEFT,
            Side.BELOW_LEFT,
            Side.ABOVE_RIGHT,
            Side.BELOW_RIGHT,
            Side.RIGHT,
            Side.LEFT);
    private static final List<Side> AROUND = List.of(
            Side.ABOVE_RIGHT,
            Side.BELOW_RIGHT,
            Side.ABOVE_LEFT,
            Side.BELOW_LEFT,
            Side.ABOVE,
            Side.BELOW,
            Side.RIGHT,
            Side.LEFT);
    private static final double[] GAPS = {2, 5, 10, 18, 30};

    /** A point beside which a label may stand, with the sides in order of preference. */
    private record Anchor(double x, double y, List<Side> sides) {}

    private void place(List<Drawn> drawn, Box plot, View view, Labels labels) {
        // the short and fixed ones first, those that can slide along a line last
        for (Mark mark : figure.marks()) {
            double x = view.x(mark.u());
            double y = view.y(mark.v());
            if (plot.holds(x, y)) {
                label(mark.label(), List.of(new Anchor(x, y, AROUND)), Ink.INK, labels, mark, false);
            } else if (!mark.label().isBlank()) {
                canvas.miss(Canvas.clean(mark.label()));
            }
        }
        List<Role> order = new ArrayList<>(ORDER);
        Collections.reverse(order);
        for (Role role : order) {
            for (Drawn d : drawn) {
                if (d.line().role() == role) {
                    label(
                            d.line().label(),
                            anchors(d),
                            role == Role.LOST_RAY ? Ink.VERMILLION : Ink.INK,
                            labels,
                            d.line(),
                            SLIDING.contains(role));
                }
            }
        }
    }

    private static List<Anchor> anchors(Drawn d) {
        List<Anchor> anchors = new ArrayList<>();
        if (d.parts().isEmpty()) {
            return anchors;
        }
        Polyline longest = d.parts().get(0);
        for (Polyline part : d.parts()) {
            longest = part.length() > longest.length() ? part : longest;
        }
        double[] first = longest.at(0);
        double[] last = longest.at(1);
        switch (d.line().role()) {
            case SURFACE, MIRROR, STOP, THIN_LENS, PLANE -> {
                // tips of a lens reach past its ends
                double past = d.line().role() == Role.THIN_LENS ? 4 : 0;
                double[] upper = first[1] < last[1] ? first : last;
                double[] lower = first[1] < last[1] ? last : first;
                anchors.add(new Anchor(upper[0], upper[1] - past, END_UP));
                anchors.add(new Anchor(lower[0], lower[1] + past, END_DOWN));
                for (double part : new double[] {0.5, 0.25, 0.75}) {
                    double[] at = longest.at(part);
                    anchors.add(new Anchor(at[0], at[1], ALONG));
                }
            }
            case OBJECT, IMAGE, VIRTUAL_IMAGE -> {
                anchors.add(new Anchor(last[0], last[1], last[1] <= first[1] ? END_UP : END_DOWN));
                double[] middle = longest.at(0.5);
                anchors.add(new Anchor(middle[0], middle[1], SIDEWAYS));
            }
            case CLEARANCE -> {
                for (double part : new double[] {0.5, 0.25, 0.75, 1, 0}) {
                    double[] at = longest.at(part);
                    anchors.add(new Anchor(at[0], at[1], BESIDE));
                }
            }
            case GROUND -> {
                for (double part : new double[] {0.5, 0.25, 0.75, 0.1, 0.9}) {
                    double[] at = longest.at(part);
                    anchors.add(new Anchor(at[0], at[1], ALONG));
                }
            }
            case RAY, MINIMUM, SADDLE, DEGENERATE, ERECT, INVERTED, LOST_RAY, PRINCIPAL_RAY, EXTENSION, AXIS -> {
                for (double part : new double[] {0.97, 0.03, 0.85, 0.15, 0.7, 0.3, 0.6, 0.45}) {
                    double[] at = longest.at(part);
                    anchors.add(new Anchor(at[0], at[1], ALONG));
                }
            }
        }
        return anchors;
    }

    private void label(String words, List<Anchor> anchors, Ink ink, Labels labels, Object owner, boolean slides) {
        String text = Canvas.clean(words).strip();
        if (text.isEmpty()) {
            return;
        }
        double w = Canvas.width(text);
        double h = Canvas.height();
        List<Labels.Place> places = new ArrayList<>();
        for (int a = 0; a < anchors.size(); a++) {
            Anchor anchor = anchors.get(a);
            double crowd = slides ? labels.crowd(anchor.x(), anchor.y(), owner) : 0;
            for (int g = 0; g < GAPS.length; g++) {
                for (int s = 0; s < anchor.sides().size(); s++) {
                    Side side = anchor.sides().get(s);
                    double x = anchor.x() + side.dx * (GAPS[g] + w / 2);
                    double y = anchor.y() + side.dy * (GAPS[g] + h / 2);
                    Box box = new Box(x - w / 2, y - h / 2, x + w / 2, y + h / 2);
                    places.add(new Labels.Place(box, crowd + 2.0 * a + GAPS[g] + 1.2 * s, anchor.x(), anchor.y()));
                }
            }
        }
        Optional<Labels.Place> place = labels.place(places, owner, Labels.DISTANCE);
        if (place.isEmpty()) {
            canvas.miss(text);
            return;
        }
        if (place.get().isTied()) {
            canvas.stroke(place.get().tie(), Pen.firm(Ink.GREY, 0.4));
        }
        canvas.words(text, place.get().box(), ink, true);
    }

    /** The shading's rectangle on paper, with a little room below and above. */
    private Box shaded(View view) {
        return shade.map(Shade::shading)
                .map(s -> new Box(view.x(s.u0()), view.y(s.v1()) - 3, view.x(s.u1()), view.y(s.v0()) + 3))
                .orElseGet(() -> new Box(0, 0, 0, 0));
    }

    /** Draws the lines of one level, below everything but the shading, with a gap for their label. */
    private void contour(String text, List<Polyline> lines, Pen pen, int above, Box within, Labels labels) {
        double w = Canvas.width(text) / 2;
        double h = Canvas.height() / 2;
        List<Labels.Place> places = new ArrayList<>();
        for (int l = 0; l < lines.size(); l++) {
            for (int part = 2; part < 40; part++) {
                double[] at = lines.get(l).at(part / 41.0);
                Box box = new Box(at[0] - w, at[1] - h, at[0] + w, at[1] + h);
                if (within.holds(box)) {
                    places.add(new Labels.Place(box, 3.0 * l, at[0], at[1]));
                }
            }
        }
        Optional<Labels.Place> place = labels.place(places, text, 1);
        for (Polyline line : lines) {
            List<Polyline> parts =
                    place.map(p -> line.outside(p.box().grown(0.5))).orElse(List.of(line));
            parts.forEach(p -> canvas.addAt(above, new Item.Stroke(p.x(), p.y(), pen)));
        }
        if (place.isPresent()) {
            Box box = place.get().box();
            canvas.words(text, box, pen.ink(), labels.isCrossed(box));
        } else if (!lines.isEmpty()) {
            canvas.miss(text);
        }
    }

    // ---- in words

    private String description(Layout layout) {
        Map<Role, Integer> counts = new EnumMap<>(Role.class);
        figure.lines().forEach(l -> counts.merge(l.role(), 1, Integer::sum));
        StringBuilder out = new StringBuilder(figure.question())
                .append(". Section with ")
                .append(figure.across())
                .append(" to the right and ")
                .append(figure.up())
                .append(" upward");
        if (layout.exaggeration() != 1) {
            out.append(", ").append(told(layout.exaggeration()));
        }
        out.append(". Drawn: ")
                .append(counts.entrySet().stream()
                        .map(e -> e.getKey().name().toLowerCase(Locale.ROOT).replace('_', ' ') + " (" + e.getValue()
                                + ")")
                        .collect(Collectors.joining(", ")))
                .append('.');
        shade.ifPresent(s -> out.append(" Shading: ")
                .append(s.shading().quantity())
                .append(" from ")
                .append(s.lowText())
                .append(" to ")
                .append(s.highText())
                .append('.'));
        figure.fronts()
                .ifPresent(
                        f -> out.append(" Level lines: ").append(f.quantity()).append('.'));
        if (!canvas.unplaced().isEmpty()) {
            out.append(" Labels without room: ")
                    .append(String.join(", ", canvas.unplaced()))
                    .append('.');
        }
        return out.toString();
    }
}
