package org.stillpath.task;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import org.stillpath.geometry.Frame;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.ray.Element;
import org.stillpath.ray.Ending;
import org.stillpath.ray.Plate;
import org.stillpath.ray.RayStart;
import org.stillpath.ray.Traced;
import org.stillpath.ray.Tracer;
import org.stillpath.ray.Train;
import org.stillpath.ray.TrainPlan;
import org.stillpath.wave.Pupil;

/** The figure of the task {@code window} that is its own: the temperature in the yz section through its plates. */
final class WindowFigures {
    private static final int COLUMNS = 240;
    private static final int ROWS = 160;
    private static final int RAYS = 7;
    private static final int OUTLINE = 48;
    /** Half the height of a plate without a diameter, in footprints of the beam. */
    private static final double SHOWN = 1.5;

    private static final double ZERO_CELSIUS = 273.15;

    private final TrainPlan plan;
    private final Scene scene;
    private final WindowBeam beam;
    private final double footprint;

    WindowFigures(TrainPlan plan, Scene scene, WindowBeam beam, double footprint) {
        this.plan = plan;
        this.scene = scene;
        this.beam = beam;
        this.footprint = footprint;
    }

    /** Temperature as shading, in degrees Celsius, with the beam's edges and axis above it; none without a solid. */
    Optional<Figure> temperature() {
        List<Plate> plates = plan.plates();
        if (plates.isEmpty()) {
            return Optional.empty();
        }
        Train train = plan.at(scene.wavelength());
        List<SectionFigure.Line> lines = new ArrayList<>();
        double low = Double.POSITIVE_INFINITY;
        double high = Double.NEGATIVE_INFINITY;
        double up = 0;
        for (Plate p : plates) {
            for (Vector v : corners(p)) {
                low = Math.min(low, v.z());
                high = Math.max(high, v.z());
                up = Math.max(up, Math.abs(v.y()));
            }
        }
        for (Element e : train.elements()) {
            lines.add(face(e.surface(), half(plates, e.surface())));
        }
        for (Plate p : plates) {
            List<Vector> c = corners(p);
            lines.add(line(SectionFigure.Role.SURFACE, c.get(0), c.get(1)));
            lines.add(line(SectionFigure.Role.SURFACE, c.get(2), c.get(3)));
        }
        double room = 0.25 * (high - low);
        lines.addAll(rays(train, high + room));
        double[] celsius = shade(plates, low, high, up);
        double coldest =
                Arrays.stream(celsius).filter(t -> !Double.isNaN(t)).min().orElse(Double.NaN);
        double hottest =
                Arrays.stream(celsius).filter(t -> !Double.isNaN(t)).max().orElse(Double.NaN);
        String answer = Double.isNaN(coldest)
                ? "The temperature is not known in this section"
                : hottest - coldest < 1e-6
                        ? String.format(Locale.ROOT, "The temperature is %.2f °C throughout", hottest)
                        : String.format(
                                Locale.ROOT,
                                "The temperature spans %.3g K, from %.2f °C to %.2f °C",
                                hottest - coldest,
                                coldest,
                                hottest);
        SectionFigure.Shading shading =
                new SectionFigure.Shading("temperature", "°C", low, high, -up, up, COLUMNS, ROWS, celsius);
        return Optional.of(new SectionFigure(
                "temperature",
                "How warm is the window in its yz section?",
                answer,
                "z",
                "y",
                Optional.of(shading),
                lines,
                List.of()));
    }

    private double half(Plate p) {
        return p.radius() > 0 ? p.radius() : SHOWN * footprint;
    }

    /** The half height at which a face is drawn: that of the plate that it bounds. */
    private double half(List<Plate> plates, Surface face) {
        return plates.stream()
                .filter(p -> p.frontFace().frame().equals(face.frame())
                        || p.backFace().frame().equals(face.frame()))
                .mapToDouble(this::half)
                .max()
                .orElse(Double.isInfinite(face.aperture()) ? SHOWN * footprint : face.aperture());
    }

    /** Upper front, upper back, lower front, lower back, in the yz section of the job. */
    private List<Vector> corners(Plate p) {
        double half = half(p);
        return List.of(
                rim(p.frontFace(), half), rim(p.backFace(), half), rim(p.frontFace(), -half), rim(p.backFace(), -half));
    }

    private static Vector rim(Surface s, double y) {
        double sag = s.form().sag(0, y);
        return s.frame().toJob(new Vector(0, y, Double.isNaN(sag) ? 0 : sag));
    }

    private static SectionFigure.Line face(Surface s, double half) {
        double[] u = new double[OUTLINE + 1];
        double[] v = new double[OUTLINE + 1];
        for (int i = 0; i <= OUTLINE; i++) {
            Vector p = rim(s, half * (2.0 * i / OUTLINE - 1));
            u[i] = p.z();
            v[i] = p.y();
        }
        return new SectionFigure.Line(SectionFigure.Role.SURFACE, "", u, v);
    }

    private static SectionFigure.Line line(SectionFigure.Role role, Vector a, Vector b) {
        return new SectionFigure.Line(role, "", new double[] {a.z(), b.z()}, new double[] {a.y(), b.y()});
    }

    private List<SectionFigure.Line> rays(Train train, double to) {
        List<Pupil.Point> across = new ArrayList<>();
        for (int i = 0; i < RAYS; i++) {
            across.add(new Pupil.Point(0, 2.0 * i / (RAYS - 1) - 1, 1));
        }
        List<RayStart> starts = beam.starts(train, across, 0);
        Tracer tracer = new Tracer(train, new Ending.AtZ(to), new Tracer.Settings(1e-6, false, true));
        List<SectionFigure.Line> lines = new ArrayList<>();
        for (int i = 0; i < RAYS; i++) {
            Traced t = tracer.trace(starts.get(i));
            double[] trail = t.trail();
            int n = trail.length / 3;
            if (n < 2) {
                continue;
            }
            double[] u = new double[n];
            double[] v = new double[n];
            for (int k = 0; k < n; k++) {
                u[k] = trail[3 * k + 2];
                v[k] = trail[3 * k + 1];
            }
            boolean arrived = t.status() == org.stillpath.ray.Status.ARRIVED;
            lines.add(new SectionFigure.Line(
                    arrived ? SectionFigure.Role.RAY : SectionFigure.Role.LOST_RAY,
                    arrived ? "" : t.status().word(),
                    u,
                    v));
        }
        return lines;
    }

    private double[] shade(List<Plate> plates, double low, double high, double up) {
        double[] celsius = new double[COLUMNS * ROWS];
        Arrays.fill(celsius, Double.NaN);
        for (Plate p : plates) {
            Frame own = p.own();
            Frame front = p.frontFace().frame();
            List<Vector> corners = corners(p);
            double sign = Math.signum(front.fromJob(p.backFace().vertex()).z());
            double[] f = new double[10];
            for (int row = 0; row < ROWS; row++) {
                double[] x = new double[COLUMNS];
                double[] y = new double[COLUMNS];
                double[] z = new double[COLUMNS];
                boolean[] inside = new boolean[COLUMNS];
                for (int c = 0; c < COLUMNS; c++) {
                    Vector at =
                            new Vector(0, up * (2 * (row + 0.5) / ROWS - 1), low + (high - low) * (c + 0.5) / COLUMNS);
                    p.frontFace().evaluate(at.x(), at.y(), at.z(), f);
                    double behind = sign * f[0];
                    p.backFace().evaluate(at.x(), at.y(), at.z(), f);
                    double above = side(corners.get(0), corners.get(1), at);
                    double below = side(corners.get(2), corners.get(3), at);
                    inside[c] = behind >= 0 && sign * f[0] <= 0 && above * below <= 0;
                    Vector q = own.fromJob(at);
                    x[c] = q.x();
                    y[c] = q.y();
                    z[c] = q.z();
                }
                double[] kelvin = p.medium().temperatures(x, y, z);
                for (int c = 0; c < COLUMNS; c++) {
                    if (inside[c]) {
                        celsius[row * COLUMNS + c] = kelvin[c] - ZERO_CELSIUS;
                    }
                }
            }
        }
        return celsius;
    }

    /** On which side of a line through two points a point of the section lies, by its sign. */
    private static double side(Vector from, Vector to, Vector at) {
        return (to.z() - from.z()) * (at.y() - from.y()) - (to.y() - from.y()) * (at.z() - from.z());
    }
}
