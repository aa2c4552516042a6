package org.stillpath.plot;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Optional;
import java.util.function.DoubleBinaryOperator;
import org.stillpath.task.CurveFigure;
import org.stillpath.task.Figure;
import org.stillpath.task.PanelFigure;
import org.stillpath.task.SectionFigure;
import org.stillpath.task.SectionFigure.Line;
import org.stillpath.task.SectionFigure.Mark;
import org.stillpath.task.SectionFigure.Role;
import org.stillpath.task.SectionFigure.Shading;

/** Figures to draw in tests, made from closed forms; they check drawing, not optics. */
final class Scenes {
    private Scenes() {}

    static List<SectionFigure> all() {
        return List.of(
                rod(),
                realImage(),
                virtualImage(),
                mirage(),
                lost(),
                mirrorAndLens(),
                tall(),
                paths(),
                sight(),
                awkward());
    }

    static List<CurveFigure> curves() {
        return List.of(arrival(1), arrival(2), arrival(3));
    }

    static List<Figure> figures() {
        List<Figure> list = new ArrayList<>(all());
        list.addAll(curves());
        list.addAll(panels());
        return list;
    }

    static List<PanelFigure> panels() {
        return List.of(profile(), transfer(), view());
    }

    /** An inversion about 20 m over ground at 0 m. */
    static PanelFigure profile() {
        double[] h = new double[201];
        double[] t = new double[201];
        double[] n = new double[201];
        for (int i = 0; i <= 200; i++) {
            h[i] = 0.2 * i;
            t[i] = 283.15 + 2 * Math.tanh((h[i] - 20) / 3);
            n[i] = 0.08 / t[i];
        }
        PanelFigure.Shape ground = new PanelFigure.Shape(
                PanelFigure.Tone.GROUND, new double[] {-1e3, 1e3, 1e3, -1e3}, new double[] {-50, -50, 0, 0});
        List<PanelFigure.Level> levels = List.of(
                new PanelFigure.Level("instrument 12 m", 12),
                new PanelFigure.Level("target 10 m", 10),
                new PanelFigure.Level("ground", 0));
        return new PanelFigure(
                "profile",
                "How do the temperature and the refractivity n − 1 of the air change with height?",
                "The air bends light most at 20.0 m: k = 4.35 and 0.660 K/m there",
                new PanelFigure.Axis("height above the datum", PanelFigure.Measure.LENGTH, -5, 40),
                List.of(
                        new PanelFigure.Panel(
                                "",
                                new PanelFigure.Axis("temperature", PanelFigure.Measure.TEMPERATURE, 280, 286),
                                List.of(ground),
                                List.of(new PanelFigure.Curve(PanelFigure.Style.PLAIN, "", t, h)),
                                List.of(),
                                List.of()),
                        new PanelFigure.Panel(
                                "",
                                new PanelFigure.Axis(
                                        "refractivity", PanelFigure.Measure.REFRACTIVITY, 2.79e-4, 2.86e-4),
                                List.of(ground),
                                List.of(new PanelFigure.Curve(PanelFigure.Style.PLAIN, "", n, h)),
                                levels,
                                List.of())),
                false);
    }

    /** A cubic: erect, inverted, erect. */
    static PanelFigure transfer() {
        double[] e = new double[121];
        double[] h = new double[121];
        for (int i = 0; i <= 120; i++) {
            double s = (i - 60) / 40.0;
            e[i] = 1e-3 * s;
            h[i] = 10 + 4 * (s * s * s - s);
        }
        int a = 60 - 23;
        int b = 60 + 23;
        return new PanelFigure(
                "transfer",
                "Which heights at the target's distance are seen at which elevations?",
                "The target's height 10 m is seen at 3.44′, 0.00′, −3.44′",
                new PanelFigure.Axis("true height at the target's distance", PanelFigure.Measure.LENGTH, 0, 20),
                List.of(new PanelFigure.Panel(
                        "",
                        new PanelFigure.Axis("apparent elevation", PanelFigure.Measure.ANGLE, -1.8e-3, 1.6e-3),
                        List.of(),
                        List.of(
                                new PanelFigure.Curve(PanelFigure.Style.ERECT, "erect", part(e, 0, a), part(h, 0, a)),
                                new PanelFigure.Curve(
                                        PanelFigure.Style.INVERTED, "inverted", part(e, a, b), part(h, a, b)),
                                new PanelFigure.Curve(
                                        PanelFigure.Style.ERECT, "erect", part(e, b, 120), part(h, b, 120))),
                        List.of(new PanelFigure.Level("target 10 m", 10)),
                        List.of(
                                new PanelFigure.Mark(PanelFigure.Style.FOLD, "fold", e[a], h[a]),
                                new PanelFigure.Mark(PanelFigure.Style.FOLD, "fold", e[b], h[b]),
                                new PanelFigure.Mark(PanelFigure.Style.ERECT, "1", 1e-3, 10),
                                new PanelFigure.Mark(PanelFigure.Style.INVERTED, "2", 0, 10),
                                new PanelFigure.Mark(PanelFigure.Style.ERECT, "3", -1e-3, 10)))),
                false);
    }

    private static double[] part(double[] all, int from, int to) {
        return Arrays.copyOfRange(all, from, to + 1);
    }

    /** A square on the ground, and twice as tall beside it. */
    static PanelFigure view() {
        PanelFigure.Axis across = new PanelFigure.Axis("across", PanelFigure.Measure.ANGLE, -2e-3, 2e-3);
        List<PanelFigure.Panel> panels = new ArrayList<>();
        for (int k = 1; k <= 2; k++) {
            panels.add(new PanelFigure.Panel(
                    k == 1 ? "true, without air" : "seen (grey: ground)",
                    across,
                    List.of(
                            new PanelFigure.Shape(
                                    PanelFigure.Tone.DARK,
                                    new double[] {-5e-4, 5e-4, 5e-4, -5e-4},
                                    new double[] {0, 0, k * 1e-3, k * 1e-3}),
                            new PanelFigure.Shape(
                                    PanelFigure.Tone.GROUND, new double[] {-1, 1, 1, -1}, new double[] {-1, -1, 0, 0})),
                    List.of(),
                    List.of(),
                    List.of(new PanelFigure.Mark(PanelFigure.Style.ERECT, k == 1 ? "target" : "1", 1.5e-3, k * 8e-4))));
        }
        return new PanelFigure(
                "view",
                "What does a telescope show of a staff of 1.00 m at 1000 m?",
                "The staff is seen once, 2.75′ higher than it is and 2.00 times as tall",
                new PanelFigure.Axis("elevation", PanelFigure.Measure.ANGLE, -5e-4, 2.3e-3),
                panels,
                true);
    }

    /** A sight over the ground: one ray of each kind and the lowest clearance. */
    static SectionFigure sight() {
        return new SectionFigure(
                "sightline",
                "Which ways does light take? Images are numbered from above; thin dashes: the straight line",
                "2 images of the target: erect, inverted from above; lowest clearance 0.25 m at 450 m",
                "distance along the datum",
                "height above the datum",
                Optional.empty(),
                List.of(
                        line(Role.GROUND, "", 0, 0, 600, 0),
                        line(Role.EXTENSION, "", 0, 1.5, 600, 0.5),
                        line(Role.ERECT, "1", 0, 1.5, 300, 0.9, 600, 0.5),
                        line(Role.INVERTED, "2", 0, 1.5, 300, 0.5, 450, 0.25, 600, 0.5),
                        line(Role.CLEARANCE, "lowest 0.25 m", 450, 0, 450, 0.25)),
                List.of(new Mark("instrument 1.5 m", 0, 1.5), new Mark("target 0.5 m", 600, 0.5)));
    }

    /** Paths of all three kinds with wavefronts: circles about the start. */
    static SectionFigure paths() {
        double[] box = {-2, 2, -0.6, 0.6};
        Shading index =
                shading("refractive index", box, 200, 60, (z, y) -> 1 + 0.3 * Math.exp(-(y * y + z * z) / 0.25));
        Shading lengths = shading(
                "wavefronts, by optical length from the start", box, 200, 60, (z, y) -> 1.1 * Math.hypot(z + 2, y));
        Shading fronts = new Shading(lengths.quantity(), "m", -2, 2, -0.6, 0.6, 200, 60, lengths.values());
        return new SectionFigure(
                "paths",
                "Which ways can light take?",
                "4 stationary paths; the first, a minimum, has the optical length 4.2271869 m",
                "z",
                "y",
                Optional.of(index),
                Optional.of(fronts),
                List.of(
                        line(Role.MINIMUM, "path 0", -2, 0, 0, 0.45, 2, 0.1),
                        line(Role.MINIMUM, "path 1", -2, 0, 0, -0.4, 2, 0.1),
                        line(Role.SADDLE, "path 2", -2, 0, 0, -0.03, 2, 0.1),
                        line(Role.DEGENERATE, "path 3", -2, 0, 0, 0.25, 2, 0.1)),
                List.of(new Mark("from", -2, 0), new Mark("to", 2, 0.1)));
    }

    /** A cubic with three zeros, two of them close, and a second branch with a gap; in up to three panels. */
    static CurveFigure arrival(int panels) {
        double[] x = new double[801];
        double[] y = new double[801];
        double[] other = new double[801];
        for (int i = 0; i <= 800; i++) {
            double s = i / 400.0 - 1;
            // crowded toward the zeros
            x[i] = 1.05 * s * s * s;
            y[i] = 900 * Math.sin(x[i]) * (x[i] - 2.0e-3) * (x[i] + 5e-5);
            other[i] = Math.abs(x[i]) < 0.2 ? Double.NaN : 300 * x[i];
        }
        double[][] ranges = {{-1.05, 1.05, 900, 1e-6}, {-8e-4, 2.75e-3, 1e-6, 0}, {-7e-5, 2e-5, 1e-9, 0}};
        String[] titles = {"all angles searched", "near all paths", "near the closest paths"};
        List<CurveFigure.Panel> list = new ArrayList<>();
        for (int i = 0; i < panels; i++) {
            double[] r = ranges[i];
            list.add(new CurveFigure.Panel(
                    panels == 1 ? "" : titles[i],
                    new CurveFigure.Axis("launch angle toward +y", CurveFigure.Measure.ANGLE, r[0], r[1], 0),
                    new CurveFigure.Axis("miss", CurveFigure.Measure.LENGTH, -r[2], r[2], r[3]),
                    List.of(
                            new CurveFigure.Curve("1st passage of the target", x, y),
                            new CurveFigure.Curve("2nd passage of the target", x, other)),
                    List.of(
                            new CurveFigure.Point(Role.MINIMUM, 0, 0),
                            new CurveFigure.Point(Role.DEGENERATE, -5e-5, 0),
                            new CurveFigure.Point(Role.SADDLE, 2e-3, 0))));
        }
        return new CurveFigure(
                "arrival",
                "Which launch angles reach the target?",
                "3 launch angles reach the target: −0.05, 0.00 and 2.00 mrad from the chord toward +y"
                        + " ".repeat(panels),
                list);
    }

    static Line line(Role role, String label, double... uv) {
        double[] u = new double[uv.length / 2];
        double[] v = new double[uv.length / 2];
        for (int i = 0; i < u.length; i++) {
            u[i] = uv[2 * i];
            v[i] = uv[2 * i + 1];
        }
        return new Line(role, label, u, v);
    }

    static Shading shading(String quantity, double[] box, int columns, int rows, DoubleBinaryOperator value) {
        double[] values = new double[columns * rows];
        for (int r = 0; r < rows; r++) {
            for (int c = 0; c < columns; c++) {
                values[r * columns + c] = value.applyAsDouble(
                        box[0] + (c + 0.5) * (box[1] - box[0]) / columns,
                        box[2] + (r + 0.5) * (box[3] - box[2]) / rows);
            }
        }
        return new Shading(quantity, "1", box[0], box[1], box[2], box[3], columns, rows, values);
    }

    /** Rod of n = n0 sech(g r): sinh(g r) = sinh(g r0) cos(g z) for rays that enter parallel (Fletcher, Murphy &amp; Young 1954). */
    static SectionFigure rod() {
        double g = 304;
        double a = 0.9e-3;
        double end = 1.2 * 2 * Math.PI / g;
        List<Line> lines = new ArrayList<>();
        lines.add(line(Role.AXIS, "", -2e-3, 0, end + 1e-3, 0));
        for (int k = -5; k <= 5; k++) {
            double r0 = k / 5.0 * 0.8e-3;
            double[] u = new double[402];
            double[] v = new double[402];
            u[0] = -1.5e-3;
            v[0] = r0;
            for (int i = 0; i <= 400; i++) {
                double z = end * i / 400;
                u[i + 1] = z;
                v[i + 1] = Math.log(Math.sinh(g * r0) * Math.cos(g * z)
                                + Math.hypot(1, Math.sinh(g * r0) * Math.cos(g * z)))
                        / g;
            }
            lines.add(new Line(Role.RAY, "", u, v));
        }
        lines.add(line(Role.SURFACE, "entrance face", 0, -a, 0, a));
        lines.add(line(Role.SURFACE, "exit face", end, -a, end, a));
        lines.add(line(Role.SURFACE, "", 0, a, end, a));
        lines.add(line(Role.SURFACE, "", 0, -a, end, -a));
        Shading shading = shading(
                "refractive index",
                new double[] {-2e-3, end + 1e-3, -1.0e-3, 1.0e-3},
                200,
                60,
                (z, y) -> z < 0 || z > end || Math.abs(y) > a ? 1 : 1.607 / Math.cosh(g * y));
        return new SectionFigure(
                "rays",
                "Where does the rod gather parallel light?",
                "First focus 5.167 mm behind the entrance face (± 0.001 mm)",
                "z",
                "y",
                Optional.of(shading),
                lines,
                List.of(new Mark("F′", Math.PI / 2 / g, 0)));
    }

    static SectionFigure realImage() {
        double f = 50e-3;
        double s = 75e-3;
        double h = 10e-3;
        double t = 1 / (1 / f - 1 / s);
        double hi = -h * t / s;
        return new SectionFigure(
                "construction",
                "Where is the image, and how large?",
                "Real, inverted image 150.0 mm behind the lens, magnification −2.000",
                "z",
                "y",
                Optional.empty(),
                List.of(
                        line(Role.AXIS, "axis", -90e-3, 0, 170e-3, 0),
                        line(Role.PRINCIPAL_RAY, "parallel ray", -s, h, 0, h, t, hi),
                        line(Role.PRINCIPAL_RAY, "ray through the centre", -s, h, 0, 0, t, hi),
                        line(Role.PRINCIPAL_RAY, "focal ray", -s, h, 0, hi, t, hi),
                        line(Role.THIN_LENS, "L, f = 50 mm", 0, -26e-3, 0, 20e-3),
                        line(Role.OBJECT, "object", -s, 0, -s, h),
                        line(Role.IMAGE, "image", t, 0, t, hi)),
                List.of(new Mark("F", -f, 0), new Mark("F′", f, 0)));
    }

    static SectionFigure virtualImage() {
        double f = -40e-3;
        double s = 60e-3;
        double h = 12e-3;
        double t = 1 / (1 / f - 1 / s);
        double hi = -h * t / s;
        double out = 45e-3;
        double slope1 = (h - hi) / (0 - t);
        double slope3 = (0 - hi) / (0 - t);
        return new SectionFigure(
                "construction",
                "Where is the image, and how large?",
                "Virtual, erect image 24.0 mm before the lens, magnification 0.400",
                "z",
                "y",
                Optional.empty(),
                List.of(
                        line(Role.AXIS, "", -70e-3, 0, 55e-3, 0),
                        line(Role.EXTENSION, "", t, hi, 0, h),
                        line(Role.EXTENSION, "", f, 0, t, hi),
                        line(Role.PRINCIPAL_RAY, "parallel ray", -s, h, 0, h, out, h + slope1 * out),
                        line(Role.PRINCIPAL_RAY, "ray through the centre", -s, h, 0, 0, out, slope3 * out),
                        line(Role.PRINCIPAL_RAY, "focal ray", -s, h, 0, hi, out, hi),
                        line(Role.THIN_LENS, "L", 0, -20e-3, 0, 20e-3),
                        line(Role.PLANE, "H", -1.2e-3, -20e-3, -1.2e-3, 20e-3),
                        line(Role.PLANE, "H′", 1.2e-3, -20e-3, 1.2e-3, 20e-3),
                        line(Role.OBJECT, "object", -s, 0, -s, h),
                        line(Role.VIRTUAL_IMAGE, "virtual image", t, 0, t, hi)),
                List.of(new Mark("F′", f, 0), new Mark("F", -f, 0)));
    }

    static SectionFigure mirage() {
        double[] u = new double[200];
        double[] direct = new double[200];
        double[] bent = new double[200];
        for (int i = 0; i < 200; i++) {
            double d = 900.0 * i / 199;
            u[i] = d;
            direct[i] = 1.5 - 0.3 * d / 900 + 0.12 * (d / 900) * (d / 900 - 1);
            bent[i] = 0.16 + 1.3 * Math.pow((d - 460) / 460, 2) * (d < 460 ? 1.03 : 1.0);
        }
        Shading shading = shading(
                "refractive index",
                new double[] {0, 900, 0, 2},
                60,
                80,
                (d, h) -> 1 + 1e-6 * (268 - 6.5 * Math.exp(-h / 0.25)));
        return new SectionFigure(
                "rays",
                "What does an eye 1.5 m above the hot road see of the lamp?",
                "Two images: the upright one at −0.46 mrad, the inverted one 4.1 mrad below it; no other was found between"
                        + " −10 mrad and 10 mrad",
                "distance along the sight",
                "height above ground",
                Optional.of(shading),
                List.of(
                        line(Role.GROUND, "hot road", 0, 0, 900, 0),
                        new Line(Role.RAY, "upright image", u, direct),
                        new Line(Role.RAY, "inverted image", u, bent)),
                List.of(new Mark("eye", 0, 1.5), new Mark("lamp", 900, 1.2)));
    }

    static SectionFigure lost() {
        List<Line> lines = new ArrayList<>();
        lines.add(line(Role.AXIS, "", -6e-3, 0, 22e-3, 0));
        for (int k = -4; k <= 4; k++) {
            double y = k * 0.9e-3;
            if (Math.abs(k) == 4) {
                lines.add(line(Role.LOST_RAY, k == 4 ? "clipped" : "", -5e-3, y, 8e-3, y * 0.9));
            } else if (k == 3) {
                lines.add(line(Role.LOST_RAY, "totally reflected", -5e-3, y, 3e-3, y, 14e-3, 9e-3, 50, 40));
            } else {
                lines.add(line(Role.RAY, "", -5e-3, y, 0, y, 8e-3, y * 0.8, 20e-3, -y * 0.3));
            }
        }
        double[] su = new double[41];
        double[] sv = new double[41];
        for (int i = 0; i <= 40; i++) {
            double y = (i - 20) / 20.0 * 4.2e-3;
            sv[i] = y;
            su[i] = 14e-3 - Math.sqrt(14e-3 * 14e-3 - y * y);
        }
        lines.add(new Line(Role.SURFACE, "S1", su, sv));
        lines.add(line(Role.STOP, "stop", 8e-3, 2.8e-3, 8e-3, 4.2e-3));
        lines.add(line(Role.STOP, "", 8e-3, -2.8e-3, 8e-3, -4.2e-3));
        lines.add(line(Role.PLANE, "sensor", 20e-3, -3e-3, 20e-3, 3e-3));
        return new SectionFigure(
                "rays",
                "Which rays reach the sensor?",
                "6 of 9 rays reach the sensor; 2 are clipped at the stop, 1 is totally reflected",
                "z",
                "y",
                Optional.empty(),
                lines,
                List.of());
    }

    static SectionFigure mirrorAndLens() {
        List<Line> lines = new ArrayList<>();
        double[] mu = new double[31];
        double[] mv = new double[31];
        for (int i = 0; i <= 30; i++) {
            mv[i] = (i - 15) / 15.0 * 30e-3;
            mu[i] = 60e-3 - (80e-3 - Math.sqrt(80e-3 * 80e-3 - mv[i] * mv[i]));
        }
        for (int k = -2; k <= 2; k++) {
            double y = k * 12e-3;
            lines.add(line(Role.RAY, "", -40e-3, y, 60e-3 - y * y / 0.16, y, 20e-3, 0));
        }
        lines.add(new Line(Role.MIRROR, "concave mirror", mu, mv));
        return new SectionFigure(
                "rays",
                "Where does the mirror focus?",
                "Focus 40.00 mm before the mirror (± 0.02 mm)",
                "z",
                "y",
                Optional.empty(),
                lines,
                List.of(new Mark("F", 20e-3, 0)));
    }

    static SectionFigure tall() {
        Shading shading = shading(
                "refractive index",
                new double[] {-5e-3, 5e-3, -5e-3, 5e-3},
                90,
                90,
                (x, y) -> Math.hypot(x, y) < 5e-3 ? Math.sqrt(2 - Math.pow(Math.hypot(x, y) / 5e-3, 2)) : Double.NaN);
        double[] cu = new double[181];
        double[] cv = new double[181];
        for (int i = 0; i <= 180; i++) {
            cu[i] = 5e-3 * Math.cos(Math.toRadians(2 * i));
            cv[i] = 5e-3 * Math.sin(Math.toRadians(2 * i));
        }
        List<Line> lines = new ArrayList<>();
        for (int k = -4; k <= 4; k++) {
            double y = k * 1.1e-3;
            double[] u = new double[61];
            double[] v = new double[61];
            double enter = -Math.sqrt(25e-6 - y * y);
            u[0] = -8e-3;
            v[0] = y;
            for (int i = 1; i <= 60; i++) {
                double t = (i - 1) / 59.0;
                u[i] = enter + (5e-3 - enter) * t;
                v[i] = y * (1 - t * t);
            }
            lines.add(new Line(Role.RAY, "", u, v));
        }
        lines.add(new Line(Role.SURFACE, "Luneburg sphere", cu, cv));
        return new SectionFigure(
                "rays",
                "Does a Luneburg sphere focus on its rim?",
                "All 9 rays meet within 2 nm of the rim",
                "z",
                "y",
                Optional.of(shading),
                lines,
                List.of(new Mark("focus", 5e-3, 0)));
    }

    /** Marks on top of each other, odd characters, words too long for a line, coordinates that are not finite. */
    static SectionFigure awkward() {
        List<Mark> marks = new ArrayList<>();
        for (String s : Arrays.asList("A", "B", "C", "D <&\">", "point of interest", "\u0007bell", "λ Δτ 5 µm²")) {
            marks.add(new Mark(s, 1e-3 + marks.size() * 1e-6, 1e-3));
        }
        return new SectionFigure(
                "odd",
                "Is 1 < 2 & \"so\" on?\u0000",
                "A <title> with \"quotes\" & an\tunbreakableword" + "x".repeat(120) + " \uD800 30° 15′ 10.5″ − × 漢",
                "z",
                "y",
                Optional.empty(),
                List.of(
                        line(Role.RAY, "not finite", 0, 0, Double.NaN, 1e-3, 2e-3, Double.POSITIVE_INFINITY),
                        line(Role.RAY, "flat", 0, 1e-3, 2e-3, 1e-3),
                        line(Role.IMAGE, "no height", 1.5e-3, 1e-3, 1.5e-3, 1e-3)),
                marks);
    }
}
