package org.stillpath.task;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Vector;
import org.stillpath.job.Section;
import org.stillpath.medium.AirMedium;
import org.stillpath.medium.AtmosphereMedium;
import org.stillpath.medium.EarthChart;
import org.stillpath.medium.Ground;
import org.stillpath.medium.IndexField;
import org.stillpath.medium.Medium;
import org.stillpath.path.Chord;
import org.stillpath.path.Sightings;
import org.stillpath.task.PanelFigure.Axis;
import org.stillpath.task.PanelFigure.Curve;
import org.stillpath.task.PanelFigure.Level;
import org.stillpath.task.PanelFigure.Mark;
import org.stillpath.task.PanelFigure.Measure;
import org.stillpath.task.PanelFigure.Panel;
import org.stillpath.task.PanelFigure.Shape;
import org.stillpath.task.PanelFigure.Style;
import org.stillpath.task.PanelFigure.Tone;
import org.stillpath.unit.Display;

/**
 * The figures of a sight: {@code profile}, {@code sightline}, {@code transfer} and {@code view}. They are made of what the search
 * found; no ray is shot for them.
 */
final class SightFigures {
    /** Names that a job may ask for. */
    static final List<String> NAMES = List.of("profile", "sightline", "transfer", "view");
    /** Those that show the transfer curve. */
    private static final List<String> CURVED = List.of("transfer", "view");
    /** What is drawn where the job says nothing. */
    static final List<String> USUAL = List.of("sightline");

    private static final int LINE = 160;
    private static final int HEIGHTS = 400;
    /** Part of the range of heights above the ground that does not decide how wide the profile is drawn. */
    private static final double SKIN = 0.01;

    private static final int COLUMNS = 120;
    private static final int ROWS = 90;
    /** Air whose bend varies by less than this factor bends evenly. */
    private static final double EVEN = 1.3;
    /** More folds than this are marked without the word. */
    private static final int MOST_FOLDS = 6;
    /** Ground further below the paths than this many times their range of heights is left out. */
    private static final double FAR_BELOW = 3;
    /** Least angle under which a thing is drawn, rad: three minutes of arc. */
    private static final double LEAST_ANGLE = 1e-3;

    private static final double MINUTE = Math.PI / 180 / 60;

    /**
     * What a job wants.
     *
     * @param names figures
     * @param said whether the job names them, so that it is told what cannot be drawn
     * @param thing what is drawn in the figure {@code view}; empty where the program chooses
     */
    record Wanted(List<String> names, boolean said, Optional<SightTarget.Kind> thing) {
        static Wanted read(Section job, Scene scene) {
            List<String> names = Figures.read(job, scene, NAMES, USUAL).names();
            String[] words = Arrays.stream(SightTarget.Kind.values())
                    .map(SightTarget.Kind::word)
                    .toArray(String[]::new);
            Optional<String> thing = job.find("view").map(v -> v.word(words)).filter(w -> !w.isEmpty());
            return new Wanted(
                    names,
                    scene.figures().isPresent(),
                    thing.map(w -> SightTarget.Kind.valueOf(w.toUpperCase(Locale.ROOT))));
        }
    }

    /** What was sighted and found. */
    record Found(
            double distance,
            double height,
            Optional<double[]> span,
            Sightings.Outcome seen,
            List<ImageRow> images,
            String headline) {}

    private final Wanted wanted;
    private final boolean drawn;
    private final Scene scene;
    private final SightlineTask.Setting setting;
    private final double eye;
    private final double radius;
    private final Ground ground;

    SightFigures(Wanted wanted, boolean drawn, Scene scene, SightlineTask.Setting setting, double eye) {
        this.wanted = wanted;
        this.drawn = drawn;
        this.scene = scene;
        this.setting = setting;
        this.eye = eye;
        this.radius = setting.chart().radius();
        this.ground = setting.chart().ground();
    }

    /** Whether figures are wanted at all. */
    boolean drawn() {
        return drawn;
    }

    /** Figures of a sighted target; what cannot be drawn is told in the warnings. */
    List<Figure> of(Found found, List<String> warnings) {
        List<Figure> list = new ArrayList<>();
        // a series runs thousands of sights and draws none: the curve is joined only for what shows it
        SightCurve curve = wanted.names().stream().anyMatch(CURVED::contains)
                ? SightCurve.of(found.seen(), object(found)[1])
                : SightCurve.NONE;
        for (String name : wanted.names()) {
            if (CURVED.contains(name) && curve.pieces().isEmpty()) {
                warnings.add("the figure `" + name + "` is not drawn: no ray got to the target's distance");
                continue;
            }
            if (!drawn) {
                continue;
            }
            switch (name) {
                case "profile" -> list.add(profile(range(found), found.distance(), levels(found)));
                case "sightline" -> list.add(section(found));
                case "transfer" -> list.add(transfer(found, curve));
                default -> list.add(view(found, curve));
            }
        }
        return list;
    }

    /**
     * Figures where there is no target: the profile of the air, and a warning for each other that the job asks for.
     *
     * @param what the kind of sight, in words
     * @param lowest height to show, metres; {@code highest} likewise
     */
    List<Figure> without(String what, double lowest, double highest, double distance, List<String> warnings) {
        List<Figure> list = new ArrayList<>();
        for (String name : wanted.names()) {
            if (name.equals("profile") && drawn) {
                list.add(profile(
                        new double[] {lowest, highest},
                        distance,
                        List.of(new Level("instrument " + metres(eye), eye), groundLevel(0))));
            } else if (!name.equals("profile") && wanted.said()) {
                warnings.add("the figure `" + name + "` is not drawn: " + what
                        + " has no target at a distance and height of which images could be shown");
            }
        }
        return list;
    }

    // ---- places and numbers

    private double[] place(double distance, double height) {
        if (Double.isInfinite(radius)) {
            return new double[] {distance, height};
        }
        double a = distance / radius;
        double s = Math.sin(0.5 * a);
        return new double[] {(radius + height) * Math.sin(a), height * Math.cos(a) - 2 * radius * s * s};
    }

    /** n − 1 at distances along the datum and heights, metres. */
    private double[] refractivity(double[] distance, double[] height) {
        int n = distance.length;
        double[] x = new double[n];
        double[] z = new double[n];
        for (int i = 0; i < n; i++) {
            double[] p = place(distance[i], height[i]);
            x[i] = p[0];
            z[i] = p[1];
        }
        IndexField field = setting.field();
        Samples s = new Samples(n);
        field.sample(x, new double[n], z, n, Order.VALUE, s);
        double[] out = new double[n];
        for (int i = 0; i < n; i++) {
            out[i] = s.value[i] / (1 + Math.sqrt(1 + s.value[i]));
        }
        return out;
    }

    /** Kelvin, where the medium has a temperature. */
    private Optional<double[]> temperature(double[] distance, double[] height) {
        Medium medium = scene.through().orElseThrow();
        EarthChart chart = setting.chart();
        if (medium instanceof AirMedium air) {
            double[] same = new double[distance.length];
            Arrays.fill(same, air.state().temperature());
            return Optional.of(same);
        }
        if (!(medium instanceof AtmosphereMedium air)) {
            return Optional.empty();
        }
        double[] x = new double[distance.length];
        double[] z = new double[distance.length];
        for (int i = 0; i < x.length; i++) {
            double[] p = place(distance[i], height[i]);
            x[i] = p[0];
            z[i] = p[1];
        }
        return Optional.of(air.temperatures(air.frame(Vector.ZERO), chart, x, z));
    }

    static String metres(double h) {
        double rounded = Math.rint(h * 1000) / 1000;
        return Display.in(rounded, "m", 0).toString();
    }

    private static String far(double d) {
        return Display.in(d, d < 2000 ? "m" : "km", d < 2000 ? 1 : 10).toString();
    }

    private static String minutes(double rad) {
        return Display.in(rad / MINUTE, "1", 0.01).number() + "′";
    }

    private static String three(double value) {
        return value == 0
                ? "0"
                : Display.in(value, "1", Math.pow(10, Math.floor(Math.log10(Math.abs(value))) - 2))
                        .number();
    }

    // ---- profile

    /** Heights that light passes, with the ground below them where it is near. */
    private double[] range(Found f) {
        double low = Math.min(eye, f.height());
        double high = Math.max(eye, f.height());
        for (ImageRow i : f.images()) {
            for (double[] p : i.points()) {
                low = Math.min(low, p[1]);
                high = Math.max(high, p[1]);
            }
        }
        double floor = Math.min(ground.height(0), ground.height(f.distance()));
        if (low - floor <= FAR_BELOW * (high - low) || (high - low < 0.05 && low - floor < 10)) {
            low = Math.min(low, floor);
        }
        double room = Math.max(high - low, 0.1);
        return new double[] {low, high + 0.1 * room};
    }

    private List<Level> levels(Found f) {
        List<Level> list = new ArrayList<>();
        list.add(new Level("instrument " + metres(eye), eye));
        list.add(new Level("target " + metres(f.height()), f.height()));
        list.add(groundLevel(0));
        if (!ground.isLevel()) {
            list.add(new Level("ground at the target", ground.height(f.distance())));
        }
        return list;
    }

    private Level groundLevel(double distance) {
        return new Level(ground.isLevel() ? "ground" : "ground at the instrument", ground.height(distance));
    }

    private PanelFigure profile(double[] range, double distance, List<Level> levels) {
        double[] heights = new double[HEIGHTS + 1];
        double room = range[1] - range[0];
        for (int i = 0; i <= HEIGHTS; i++) {
            heights[i] = range[0] + room * i / HEIGHTS;
        }
        boolean alone = setting.field().ofHeightAlone() || distance == 0;
        double[] places = alone ? new double[] {0} : new double[] {0, 0.5 * distance, distance};
        String[] names = {alone ? "" : "at the instrument", "half-way", "at the target"};
        Style[] styles = {Style.PLAIN, Style.SECOND, Style.THIRD};
        List<Curve> warm = new ArrayList<>();
        List<Curve> bent = new ArrayList<>();
        for (int k = 0; k < places.length; k++) {
            double[] d = new double[heights.length];
            Arrays.fill(d, places[k]);
            double floor = ground.height(places[k]);
            double[] n = above(refractivity(d, heights), heights, floor);
            String name = names[k];
            Style style = styles[k];
            temperature(d, heights).ifPresent(t -> warm.add(new Curve(style, name, above(t, heights, floor), heights)));
            bent.add(new Curve(style, name, n, heights));
        }
        List<Panel> panels = new ArrayList<>();
        List<Level> bare = levels.stream().map(l -> new Level("", l.at())).toList();
        if (!warm.isEmpty()) {
            panels.add(new Panel(
                    "", axis("temperature", Measure.TEMPERATURE, warm, 0.5), ground(range), warm, bare, List.of()));
        }
        panels.add(new Panel(
                "", axis("refractivity", Measure.REFRACTIVITY, bent, 2e-8), ground(range), bent, levels, List.of()));
        double pad = 0.12 * room;
        return new PanelFigure(
                "profile",
                "How do the temperature and the refractivity n − 1 of the air change with height?",
                steepest(bent.get(0), warm),
                new Axis("height above the datum", Measure.LENGTH, range[0] - pad, range[1]),
                panels,
                false);
    }

    /** Ground below the lowest height that air can have, drawn as wide as any panel. */
    private List<Shape> ground(double[] range) {
        double floor = ground.isLevel() ? ground.height(0) : Double.NEGATIVE_INFINITY;
        double deep = range[0] - (range[1] - range[0]);
        return floor > deep ? List.of(strip(-1e3, 1e4, deep, floor)) : List.of();
    }

    private static Shape strip(double left, double right, double low, double high) {
        return new Shape(Tone.GROUND, new double[] {left, right, right, left}, new double[] {low, low, high, high});
    }

    private static double[] above(double[] values, double[] heights, double floor) {
        for (int i = 0; i < values.length; i++) {
            values[i] = heights[i] < floor - 1e-9 ? Double.NaN : values[i];
        }
        return values;
    }

    private static Axis axis(String quantity, Measure measure, List<Curve> curves, double least) {
        double low = Double.POSITIVE_INFINITY;
        double high = Double.NEGATIVE_INFINITY;
        for (Curve c : curves) {
            double[] v = c.x();
            int first = 0;
            while (first < v.length - 1 && !Double.isFinite(v[first])) {
                first++;
            }
            // laws of the air beside the ground may have a pole in it
            first = Math.min(v.length - 1, first + (int) (SKIN * HEIGHTS));
            for (int i = first; i < v.length; i++) {
                if (Double.isFinite(v[i])) {
                    low = Math.min(low, v[i]);
                    high = Math.max(high, v[i]);
                }
            }
        }
        if (!(high >= low)) {
            low = 0;
            high = least;
        }
        double pad = Math.max(0.07 * (high - low), 0.5 * least);
        return new Axis(quantity, measure, low - pad, high + pad);
    }

    private String steepest(Curve bent, List<Curve> warm) {
        double[] n = bent.x();
        double[] h = bent.y();
        double step = h[1] - h[0];
        double least = Double.POSITIVE_INFINITY;
        int at = -1;
        double most = 0;
        for (int i = 1; i < n.length; i++) {
            double g = h[i - 1] < ground.height(0) + SKIN * step * HEIGHTS ? 0 : Math.abs(n[i] - n[i - 1]);
            least = g > 0 ? Math.min(least, g) : least;
            if (g > most * (1 + 1e-9)) {
                most = g;
                at = i;
            }
        }
        if (at < 0 || most / step < 1e-13) {
            return "The index is the same at all heights: light runs straight";
        }
        double gradient = (n[at] - n[at - 1]) / step;
        String where = three(0.5 * (h[at] + h[at - 1])) + " m";
        String k = Double.isInfinite(radius)
                ? "n − 1 changes by " + three(1e6 * gradient) + " ppm/m"
                : "k = " + three(-gradient * radius);
        if (most < EVEN * least && !Double.isInfinite(radius)) {
            double sign = -Math.signum(gradient) * radius / step;
            String one = three(sign * least);
            String other = three(sign * most);
            return "The air bends light evenly: k " + (one.equals(other) ? "= " + one : "from " + one + " to " + other)
                    + " at these heights";
        }
        if (warm.isEmpty()) {
            return "The air bends light most at " + where + ": " + k + " there";
        }
        double[] t = warm.get(0).x();
        return "The air bends light most at " + where + ": " + k + " and " + three((t[at] - t[at - 1]) / step)
                + " K/m there";
    }

    // ---- sightline

    private SectionFigure section(Found f) {
        double[] range = range(f);
        double margin = 0.08 * (range[1] - range[0]);
        double floor = Double.POSITIVE_INFINITY;
        double[] d = new double[LINE + 1];
        double[] g = new double[LINE + 1];
        double[] straight = new double[LINE + 1];
        Chord chord = new Chord(radius, eye, f.distance(), f.height());
        double c0 = chord.elevation();
        for (int i = 0; i <= LINE; i++) {
            d[i] = f.distance() * i / LINE;
            g[i] = ground.height(d[i]);
            floor = Math.min(floor, g[i]);
            straight[i] = Double.isInfinite(radius)
                    ? eye + (f.height() - eye) * i / LINE
                    : (radius + eye) * Math.cos(c0) / Math.cos(c0 + d[i] / radius) - radius;
        }
        double low = Math.min(range[0], Arrays.stream(straight).min().orElse(range[0]));
        double most = Arrays.stream(g).max().orElse(0);
        boolean shown = most >= range[0] - margin;
        double bottom = shown ? floor : low - margin;
        double highest = Math.max(range[1], shown ? most : range[1]);
        double top = f.images().isEmpty()
                ? Math.max(highest, f.seen().limb().map(l -> l.height() * 1.05).orElse(highest))
                : highest;
        for (int i = 0; i <= LINE && shown; i++) {
            // where it runs deep in the ground it would only press the rest together
            straight[i] = straight[i] < floor - 0.1 * (top - floor) ? Double.NaN : straight[i];
        }
        List<SectionFigure.Line> lines = new ArrayList<>();
        if (shown) {
            lines.add(new SectionFigure.Line(SectionFigure.Role.GROUND, "", d, g));
        }
        lines.add(new SectionFigure.Line(SectionFigure.Role.EXTENSION, "", d, straight));
        List<SectionFigure.Mark> marks = new ArrayList<>();
        marks.add(new SectionFigure.Mark("instrument " + metres(eye), 0, eye));
        marks.add(new SectionFigure.Mark("target " + metres(f.height()), f.distance(), f.height()));
        paths(f, lines);
        clearance(f, shown, lines, marks);
        if (f.images().isEmpty()) {
            f.seen().limb().filter(l -> l.bound() != Sightings.Bound.NONE).ifPresent(l -> {
                marks.add(new SectionFigure.Mark("lowest height seen " + metres(l.height()), f.distance(), l.height()));
                if (!Double.isNaN(l.contact())) {
                    marks.add(new SectionFigure.Mark(
                            "horizon at " + far(l.contact()), l.contact(), ground.height(l.contact())));
                }
            });
        }
        return new SectionFigure(
                "sightline",
                "Which ways does light take? Images are numbered from above; thin dashes: the straight line",
                f.headline() + lowest(f),
                "distance along the datum",
                "height above the datum",
                shading(f.distance(), bottom, top),
                lines,
                marks);
    }

    private static void paths(Found f, List<SectionFigure.Line> lines) {
        int count = f.images().size();
        for (int i = 0; i < count; i++) {
            ImageRow row = f.images().get(i);
            double[][] p = row.points();
            if (p.length < 2) {
                continue;
            }
            lines.add(new SectionFigure.Line(
                    row.orientation().equals("erect") ? SectionFigure.Role.ERECT : SectionFigure.Role.INVERTED,
                    count == 1 ? "" : Integer.toString(i),
                    Arrays.stream(p).mapToDouble(q -> q[0]).toArray(),
                    Arrays.stream(p).mapToDouble(q -> q[1]).toArray()));
        }
    }

    private static String where(ImageRow i, double distance) {
        double near = 1e-6 * distance;
        return i.lowestAt() < near
                ? "at the instrument"
                : i.lowestAt() > distance - near ? "at the target" : "at " + far(i.lowestAt());
    }

    private static String lowest(Found f) {
        return f.images().stream()
                .min(java.util.Comparator.comparingDouble(ImageRow::lowest))
                .map(i -> "; lowest clearance " + metres(i.lowest()) + " " + where(i, f.distance()))
                .orElse("");
    }

    private void clearance(Found f, boolean shown, List<SectionFigure.Line> lines, List<SectionFigure.Mark> marks) {
        Optional<ImageRow> lowest = f.images().stream().min(java.util.Comparator.comparingDouble(ImageRow::lowest));
        if (lowest.isEmpty()) {
            return;
        }
        double at = lowest.get().lowestAt();
        double clear = lowest.get().lowest();
        double foot = ground.height(at);
        String words = "lowest " + metres(clear);
        if (!where(lowest.get(), f.distance()).startsWith("at " + far(at))) {
            // at an end it is the height of instrument or target, which is told there
            return;
        }
        if (shown && clear > 0) {
            lines.add(new SectionFigure.Line(
                    SectionFigure.Role.CLEARANCE, words, new double[] {at, at}, new double[] {foot, foot + clear}));
        } else {
            marks.add(new SectionFigure.Mark(words, at, foot + clear));
        }
    }

    private Optional<SectionFigure.Shading> shading(double distance, double low, double high) {
        if (setting.field().uniform() || !(high > low)) {
            return Optional.empty();
        }
        double[] values = new double[COLUMNS * ROWS];
        double[] d = new double[COLUMNS];
        double[] h = new double[COLUMNS];
        for (int row = 0; row < ROWS; row++) {
            for (int c = 0; c < COLUMNS; c++) {
                d[c] = distance * (c + 0.5) / COLUMNS;
                h[c] = low + (high - low) * (row + 0.5) / ROWS;
            }
            double[] n = refractivity(d, h);
            for (int c = 0; c < COLUMNS; c++) {
                values[row * COLUMNS + c] = h[c] < ground.height(d[c]) ? Double.NaN : 1e6 * n[c];
            }
        }
        return Optional.of(
                new SectionFigure.Shading("refractivity n − 1", "ppm", 0, distance, low, high, COLUMNS, ROWS, values));
    }

    // ---- transfer

    /** The mark of an image: its sort, and its number where there are several. */
    private static Mark image(Found f, int number, double x, double y) {
        List<ImageRow> images = f.images();
        return new Mark(
                images.get(number).orientation().equals("erect") ? Style.ERECT : Style.INVERTED,
                images.size() == 1 ? "" : Integer.toString(number),
                x,
                y);
    }

    /** The foot and the top of what stands at the target, metres above the datum. */
    private double[] object(Found f) {
        if (f.span().isPresent()) {
            return f.span().get().clone();
        }
        double foot = ground.height(f.distance());
        double tall = f.height() - foot;
        double top = thing(tall, f) == SightTarget.Kind.HILLSIDE
                ? foot + tall
                : foot + Math.max(1.25 * tall, LEAST_ANGLE * f.distance());
        return new double[] {foot, top};
    }

    private SightTarget.Kind thing(double tall, Found f) {
        return wanted.thing().orElseGet(() -> SightTarget.usual(tall, f.distance(), ground.isLevel()));
    }

    private PanelFigure transfer(Found f, SightCurve curve) {
        double[] object = object(f);
        double foot = object[0];
        double top = object[1];
        double low = foot;
        Optional<Sightings.Limb> limb = f.seen().limb().filter(l -> l.bound() != Sightings.Bound.NONE);
        if (limb.isPresent()) {
            top = Math.max(top, limb.get().height() + 0.5 * (limb.get().height() - foot));
        }
        double tallest = foot + 3 * (top - foot);
        for (SightCurve.Piece p : curve.pieces()) {
            if (p.fold()) {
                double h = p.height()[0];
                top = h > top && h < tallest ? h + 0.1 * (h - foot) : top;
            }
        }
        double room = top - low;
        double[] e = elevations(curve, low, top);
        for (ImageRow i : f.images()) {
            e[0] = Math.min(e[0], i.launch());
            e[1] = Math.max(e[1], i.launch());
        }
        double wide = Math.max(e[1] - e[0], 1e-6);
        Axis across = new Axis("apparent elevation", Measure.ANGLE, e[0] - 0.12 * wide, e[1] + 0.05 * wide);
        Axis up =
                new Axis("true height at the target's distance", Measure.LENGTH, low - 0.08 * room, top + 0.06 * room);
        List<Shape> shapes = gaps(curve, up.low() - room, top + room, across, true);
        List<Curve> curves = new ArrayList<>();
        List<Mark> marks = new ArrayList<>();
        curves.add(straight(f.distance(), up));
        double before = Double.NEGATIVE_INFINITY;
        long folds = curve.pieces().stream().filter(SightCurve.Piece::fold).count();
        for (SightCurve.Piece p : curve.pieces()) {
            boolean erect = p.erect();
            int shot = p.upTo(curve.shot());
            curves.add(new Curve(
                    erect ? Style.ERECT : Style.INVERTED,
                    erect ? "erect" : "inverted",
                    Arrays.copyOf(p.elevation(), shot + 1),
                    Arrays.copyOf(p.height(), shot + 1)));
            if (shot < p.last()) {
                curves.add(new Curve(
                        Style.THIRD,
                        "continued straight",
                        Arrays.copyOfRange(p.elevation(), shot, p.last() + 1),
                        Arrays.copyOfRange(p.height(), shot, p.last() + 1)));
            }
            double x = p.elevation()[0];
            // beside a jump turns crowd; one mark tells them
            boolean apart = Math.abs(x - before) > 0.015 * wide
                    && curve.jumps().stream().noneMatch(j -> Math.abs(j[0] - x) < 0.015 * wide);
            if (p.fold() && apart) {
                before = x;
                marks.add(new Mark(Style.FOLD, folds <= MOST_FOLDS ? "fold" : "", p.elevation()[0], p.height()[0]));
            }
        }
        for (double[] j : curve.jumps()) {
            curves.add(new Curve(Style.GUIDE, "", new double[] {j[0], j[0]}, new double[] {j[1], j[2]}));
            marks.add(new Mark(Style.NOTE, "jump", j[0], 0.5 * (j[1] + j[2])));
        }
        for (int i = 0; i < f.images().size(); i++) {
            marks.add(image(f, i, f.images().get(i).launch(), f.height()));
        }
        for (Shape s : shapes) {
            double left = Math.max(s.x()[0], across.low());
            double right = Math.min(s.x()[1], across.high());
            if (right - left > 0.06 * wide) {
                marks.add(new Mark(
                        Style.NOTE,
                        left == across.low() ? "ground" : "no light",
                        left + 0.01 * wide,
                        low + 0.9 * room));
            }
        }
        List<Level> levels = new ArrayList<>(List.of(new Level("target " + metres(f.height()), f.height())));
        limb.ifPresent(l -> levels.add(new Level("lowest seen " + metres(l.height()), l.height())));
        return new PanelFigure(
                "transfer",
                "Which heights at the target's distance are seen at which elevations?",
                transferAnswer(f, limb, curve),
                up,
                List.of(new Panel("", across, shapes, curves, levels, marks)),
                false);
    }

    private String transferAnswer(Found f, Optional<Sightings.Limb> limb, SightCurve curve) {
        String hidden = limb.map(l -> "nothing below " + metres(l.height()) + " is seen")
                .orElse("");
        if (f.images().isEmpty()) {
            return "The target's height " + metres(f.height()) + " is seen at no elevation"
                    + (hidden.isEmpty() ? "" : ": " + hidden);
        }
        String where = String.join(
                ", ", f.images().stream().limit(4).map(i -> minutes(i.launch())).toList());
        int most = curve.pieces().stream()
                .filter(SightCurve.Piece::isResolved)
                .mapToInt(p -> curve.count(0.5 * (p.low() + p.high())))
                .max()
                .orElse(1);
        return "The target's height " + metres(f.height()) + " is seen at " + where
                + (f.images().size() > 4 ? ", .." : "")
                + (f.images().size() == 1 && most > 1 ? "; other heights up to " + most + " times" : "")
                + (hidden.isEmpty() ? "" : "; " + hidden);
    }

    private Curve straight(double distance, Axis up) {
        int n = 40;
        double[] x = new double[n + 1];
        double[] y = new double[n + 1];
        for (int i = 0; i <= n; i++) {
            y[i] = up.low() + (up.high() - up.low()) * i / n;
            x[i] = new Chord(radius, eye, distance, y[i]).elevation();
        }
        return new Curve(Style.GUIDE, "straight, without air", x, y);
    }

    /** Least and greatest elevation in which heights between two are seen. */
    private static double[] elevations(SightCurve curve, double low, double high) {
        double[] e = {Double.POSITIVE_INFINITY, Double.NEGATIVE_INFINITY};
        for (SightCurve.Piece p : curve.pieces()) {
            double a = Math.max(low, p.low());
            double b = Math.min(high, p.high());
            if (b > a) {
                for (double h : new double[] {a, b}) {
                    e[0] = Math.min(e[0], p.elevationOf(h));
                    e[1] = Math.max(e[1], p.elevationOf(h));
                }
            }
        }
        if (!(e[1] >= e[0])) {
            SightCurve.Piece first = curve.pieces().get(0);
            return new double[] {first.elevation()[0], first.elevation()[0]};
        }
        return e;
    }

    /** Strips from which no light comes, along the elevation: across the paper or up it. */
    private static List<Shape> gaps(SightCurve curve, double low, double high, Axis elevation, boolean upright) {
        List<Shape> shapes = new ArrayList<>();
        double deep = elevation.low() - 20 * (elevation.high() - elevation.low());
        for (double[] g : curve.gaps()) {
            double from = Math.max(g[0], deep);
            if (g[1] > from) {
                shapes.add(upright ? strip(from, g[1], low, high) : strip(low, high, from, g[1]));
            }
        }
        return shapes;
    }

    // ---- view

    private PanelFigure view(Found f, SightCurve curve) {
        double[] object = object(f);
        double foot = object[0];
        double tall = object[1] - foot;
        SightTarget target = new SightTarget(thing(f.height() - foot, f), tall);
        Chord base = new Chord(radius, eye, f.distance(), foot);
        Chord tip = new Chord(radius, eye, f.distance(), object[1]);
        double[] e = elevations(curve, foot, object[1]);
        double low = Math.min(base.elevation(), e[0]);
        double high = Math.max(tip.elevation(), e[1]);
        double room = Math.max(high - low, 1e-6);
        double scale = 1 / base.length();
        double half = Math.max(target.half() * scale * 1.12, 0.3 * room);
        Axis up = new Axis("elevation", Measure.ANGLE, low - 0.12 * room, high + 0.08 * room);
        Axis across = new Axis("across", Measure.ANGLE, -half, half);
        double wide = 20 * (half + room);

        List<Shape> truth = new ArrayList<>();
        int steps = 48;
        for (SightTarget.Part p : target.parts()) {
            double[] h = new double[steps + 1];
            double[] to = new double[steps + 1];
            for (int i = 0; i <= steps; i++) {
                h[i] = tall * i / steps;
                to[i] = new Chord(radius, eye, f.distance(), foot + h[i]).elevation();
            }
            mapped(p, h, to, scale, truth);
        }
        double horizon = horizon(f.distance());
        double edge = Math.max(horizon, new Chord(radius, eye, f.distance(), ground.height(f.distance())).elevation());
        truth.add(strip(-wide, wide, up.low() - 2 * room, edge));

        List<Shape> seen = new ArrayList<>();
        int drawn = 0;
        for (SightCurve.Piece p : curve.pieces()) {
            double[] h = new double[p.height().length];
            for (int i = 0; i < h.length; i++) {
                h[i] = p.height()[i] - foot;
            }
            drawn += p.isResolved() && p.high() > foot && p.low() < object[1] ? 1 : 0;
            for (SightTarget.Part part : target.parts()) {
                mapped(part, h, p.elevation(), scale, seen);
            }
        }
        seen.addAll(gaps(curve, -wide, wide, up, false));
        List<Mark> marks = new ArrayList<>();
        double side = 0.93 * half;
        for (int i = 0; i < f.images().size(); i++) {
            marks.add(image(f, i, side, f.images().get(i).launch()));
        }
        Chord aim = new Chord(radius, eye, f.distance(), f.height());
        List<Mark> aimed = List.of(new Mark(Style.ERECT, "target", side, aim.elevation()));
        List<Level> straight = List.of(new Level("", aim.elevation()));
        return new PanelFigure(
                "view",
                "What does a telescope show of a " + target.kind().word() + " of " + three(tall) + " m at "
                        + far(f.distance()) + "?",
                viewAnswer(f, target, object, drawn),
                up,
                List.of(
                        new Panel("true, without air", across, truth, List.of(), straight, aimed),
                        new Panel("seen (grey: ground)", across, seen, List.of(), List.of(), marks)),
                true);
    }

    /** Greatest elevation of the ground before the target along straight lines. */
    private double horizon(double distance) {
        double most = Double.NEGATIVE_INFINITY;
        for (int i = 1; i < 2 * LINE; i++) {
            double d = distance * i / (2 * LINE);
            most = Math.max(most, new Chord(radius, eye, d, ground.height(d)).elevation());
        }
        return most;
    }

    private static String single(Found f) {
        ImageRow i = f.images().get(0);
        return ", " + minutes(Math.abs(i.refractionAtFrom())) + (i.refractionAtFrom() < 0 ? " lower" : " higher")
                + " than it is and " + three(Math.abs(i.magnification())) + " times as tall";
    }

    private static String viewAnswer(Found f, SightTarget target, double[] object, int pieces) {
        String name = "The " + target.kind().word();
        double foot = object[0];
        double lowest = f.seen().limb().map(Sightings.Limb::height).orElse(foot);
        if (lowest >= object[1]) {
            return name + " of " + three(object[1] - foot) + " m is wholly hidden: nothing below " + metres(lowest)
                    + " is seen";
        }
        String hidden = lowest > foot + 1e-3 * (object[1] - foot)
                ? "; its lowest " + metres(lowest - foot) + " " + (lowest - foot < 2 ? "is" : "are") + " hidden"
                : "";
        String how =
                switch (f.images().size()) {
                    case 0 -> pieces > 1 ? " is seen in " + pieces + " parts" : " is seen once";
                    case 1 ->
                        " is seen once" + (pieces > 1 ? " at the target's height, other parts repeatedly" : "")
                                + single(f);
                    default ->
                        " is seen " + f.images().size() + " times at the target's height: "
                                + String.join(
                                        ", ",
                                        f.images().stream()
                                                .map(ImageRow::orientation)
                                                .toList())
                                + " from above";
                };
        return name + how + hidden;
    }

    /**
     * A part of a drawn thing as far as its heights lie in a range that runs one way.
     *
     * @param heights above the foot, only rising or only falling
     * @param elevations in which they are seen
     */
    private static void mapped(
            SightTarget.Part part, double[] heights, double[] elevations, double scale, List<Shape> shapes) {
        boolean rising = heights[heights.length - 1] >= heights[0];
        int n = heights.length;
        double[] h = new double[n];
        double[] e = new double[n];
        for (int i = 0; i < n; i++) {
            h[i] = heights[rising ? i : n - 1 - i];
            e[i] = elevations[rising ? i : n - 1 - i];
        }
        double[][] cut = SightTarget.slice(part, h[0], h[n - 1]);
        List<double[]> out = new ArrayList<>();
        for (int i = 0; i < cut[0].length; i++) {
            int j = (i + 1) % cut[0].length;
            double y0 = cut[1][i];
            double y1 = cut[1][j];
            out.add(new double[] {cut[0][i] * scale, at(h, e, y0)});
            // an edge bends with the curve
            for (int k = 0; k < n; k++) {
                int m = y1 > y0 ? k : n - 1 - k;
                if (h[m] > Math.min(y0, y1) && h[m] < Math.max(y0, y1)) {
                    double t = (h[m] - y0) / (y1 - y0);
                    out.add(new double[] {(cut[0][i] + t * (cut[0][j] - cut[0][i])) * scale, e[m]});
                }
            }
        }
        if (out.size() >= 3) {
            shapes.add(new Shape(
                    part.tone(),
                    out.stream().mapToDouble(p -> p[0]).toArray(),
                    out.stream().mapToDouble(p -> p[1]).toArray()));
        }
    }

    private static double at(double[] h, double[] e, double y) {
        for (int i = 1; i < h.length; i++) {
            if (y <= h[i]) {
                return h[i] == h[i - 1] ? e[i] : e[i - 1] + (y - h[i - 1]) / (h[i] - h[i - 1]) * (e[i] - e[i - 1]);
            }
        }
        return e[e.length - 1];
    }
}
