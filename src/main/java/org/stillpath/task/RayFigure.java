package org.stillpath.task;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Frame;
import org.stillpath.geometry.Quadric;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;
import org.stillpath.medium.Level;
import org.stillpath.ray.Action;
import org.stillpath.ray.Element;
import org.stillpath.ray.Status;
import org.stillpath.ray.Traced;
import org.stillpath.ray.Train;

/**
 * Draws traced rays and their train as a section: the train's z to the right, or without a train the axis along which the
 * rays run; upward the axis across it along which they spread most. Rays that leave the section are seen in projection.
 */
final class RayFigure {
    private static final int COLUMNS = 240;
    private static final int ROWS = 120;
    private static final int OUTLINE = 96;
    /** More rays than this only blacken a picture. */
    private static final int MOST_RAYS = 60;

    static final String[] NAMES = {"x", "y", "z"};

    private RayFigure() {}

    static SectionFigure of(Train train, List<Traced> rays, String answer) {
        return of(train, rays, answer, List.of(), List.of());
    }

    /** The same with further lines and marks on top, in the yz section. */
    static SectionFigure of(
            Train train,
            List<Traced> rays,
            String answer,
            List<SectionFigure.Line> furtherLines,
            List<SectionFigure.Mark> marks) {
        Extent extent = Extent.of(rays.stream().map(Traced::trail).toList(), train);
        List<SectionFigure.Line> lines = new ArrayList<>(outlines(train, extent));
        int every = Math.max(1, (rays.size() + MOST_RAYS - 1) / MOST_RAYS);
        for (int i = 0; i < rays.size(); i += every) {
            line(rays.get(i), extent).ifPresent(lines::add);
        }
        lines.addAll(furtherLines);
        return new SectionFigure(
                "rays",
                "Where do the rays go?",
                answer,
                NAMES[extent.across],
                NAMES[extent.up],
                shading(train, extent),
                lines,
                marks);
    }

    private static Optional<SectionFigure.Line> line(Traced ray, Extent extent) {
        double[] trail = ray.trail();
        int n = trail.length / 3;
        if (n < 2) {
            return Optional.empty();
        }
        double[] u = new double[n];
        double[] v = new double[n];
        for (int i = 0; i < n; i++) {
            u[i] = trail[3 * i + extent.across];
            v[i] = trail[3 * i + extent.up];
        }
        SectionFigure.Role role = ray.status() == Status.ARRIVED ? SectionFigure.Role.RAY : SectionFigure.Role.LOST_RAY;
        String label = ray.status() == Status.ARRIVED ? "" : ray.status().word();
        return Optional.of(new SectionFigure.Line(role, label, u, v));
    }

    /** Surfaces, stops, lenses and the edges of what lies between two caps; each once. */
    static List<SectionFigure.Line> outlines(Train train, Extent extent) {
        List<SectionFigure.Line> lines = new ArrayList<>();
        List<Surface> drawn = new ArrayList<>();
        List<Element> elements = train.elements();
        for (int i = 0; i < elements.size(); i++) {
            Element e = elements.get(i);
            Surface s = e.surface();
            if (!drawn.contains(s)) {
                drawn.add(s);
                lines.addAll(outline(e, extent));
            }
            if (i + 1 < elements.size()) {
                edge(e, elements.get(i + 1), train, extent, lines);
            }
        }
        return lines;
    }

    private static List<SectionFigure.Line> outline(Element e, Extent extent) {
        Surface s = e.surface();
        if (e.action() instanceof Action.Stop) {
            if (Double.isInfinite(s.aperture())) {
                return List.of();
            }
            double rim = Math.max(1.6 * s.aperture(), 1.1 * extent.size());
            return List.of(
                    straight(s, SectionFigure.Role.STOP, s.aperture(), rim, extent),
                    straight(s, SectionFigure.Role.STOP, -s.aperture(), -rim, extent));
        }
        double size = Double.isInfinite(s.aperture()) ? 1.15 * extent.size() : s.aperture();
        if (e.action() instanceof Action.ThinLens lens) {
            String label = lens.focalLength() > 0 ? "" : "diverging";
            SectionFigure.Line l = straight(s, SectionFigure.Role.THIN_LENS, -size, size, extent);
            return List.of(new SectionFigure.Line(l.role(), label, l.u(), l.v()));
        }
        SectionFigure.Role role =
                e.action() instanceof Action.Reflect ? SectionFigure.Role.MIRROR : SectionFigure.Role.SURFACE;
        List<double[]> points = s.whole() ? around(s) : cap(s, size, extent);
        return points.size() < 2 ? List.of() : List.of(project(points, s.frame(), role, extent));
    }

    private static SectionFigure.Line straight(
            Surface s, SectionFigure.Role role, double from, double to, Extent extent) {
        boolean x = extent.up == 0;
        List<double[]> points =
                List.of(new double[] {x ? from : 0, x ? 0 : from, 0}, new double[] {x ? to : 0, x ? 0 : to, 0});
        return project(points, s.frame(), role, extent);
    }

    /** The cap in the surface's own section that is drawn, as far as it has a sag. */
    private static List<double[]> cap(Surface s, double size, Extent extent) {
        boolean x = extent.up == 0;
        double rim = size;
        while (Double.isNaN(s.form().sag(x ? rim : 0, x ? 0 : rim)) && rim > 1e-6 * size) {
            rim *= 0.98;
        }
        List<double[]> points = new ArrayList<>();
        for (int i = 0; i <= OUTLINE; i++) {
            double r = rim * (2.0 * i / OUTLINE - 1);
            double sag = s.form().sag(x ? r : 0, x ? 0 : r);
            if (!Double.isNaN(sag)) {
                points.add(new double[] {x ? r : 0, x ? 0 : r, sag});
            }
        }
        return points;
    }

    /** The whole ellipse of a closed quadric. */
    private static List<double[]> around(Surface s) {
        Quadric q = (Quadric) s.form();
        double c = q.curvature();
        double along = 1 / Math.abs(q.g());
        double across = 1 / Math.sqrt(Math.abs(q.g()) * c);
        List<double[]> points = new ArrayList<>();
        for (int i = 0; i <= 2 * OUTLINE; i++) {
            double a = Math.PI * i / OUTLINE;
            double z = Math.signum(q.g()) * along * (1 - Math.cos(a));
            points.add(new double[] {across * Math.sin(a), across * Math.sin(a), z});
        }
        return points;
    }

    private static SectionFigure.Line project(
            List<double[]> points, Frame frame, SectionFigure.Role role, Extent extent) {
        double[] u = new double[points.size()];
        double[] v = new double[points.size()];
        for (int i = 0; i < u.length; i++) {
            double[] p = points.get(i);
            // a closed outline is given in both sections at once; the one that is drawn keeps its share
            double x = extent.up == 0 ? p[0] : 0;
            double y = extent.up == 0 ? 0 : p[1];
            Vector q = frame.toJob(new Vector(x, y, p[2]));
            u[i] = component(q, extent.across);
            v[i] = component(q, extent.up);
        }
        return new SectionFigure.Line(role, "", u, v);
    }

    /** The cylindrical edge between two refracting caps that hold something else than the first medium between them. */
    private static void edge(Element a, Element b, Train train, Extent extent, List<SectionFigure.Line> lines) {
        boolean solid = a.action() instanceof Action.Refract
                && b.action() instanceof Action.Refract
                && a.into() != train.from()
                && !a.surface().whole()
                && !b.surface().whole()
                && Double.isFinite(a.surface().aperture() + b.surface().aperture());
        if (!solid) {
            return;
        }
        for (int side = -1; side <= 1; side += 2) {
            double[] p = rim(a.surface(), side, extent);
            double[] q = rim(b.surface(), side, extent);
            if (Double.isFinite(p[0] + q[0])) {
                lines.add(new SectionFigure.Line(
                        SectionFigure.Role.SURFACE, "", new double[] {p[0], q[0]}, new double[] {p[1], q[1]}));
            }
        }
    }

    private static double[] rim(Surface s, int side, Extent extent) {
        double r = side * s.aperture();
        boolean x = extent.up == 0;
        double sag = s.form().sag(x ? r : 0, x ? 0 : r);
        if (Double.isNaN(sag)) {
            return new double[] {Double.NaN, Double.NaN};
        }
        Vector q = s.frame().toJob(new Vector(x ? r : 0, x ? 0 : r, sag));
        return new double[] {component(q, extent.across), component(q, extent.up)};
    }

    /** The index where it varies; nothing to shade in uniform media. */
    static Optional<SectionFigure.Shading> shading(Train train, Extent extent) {
        double[] values = new double[COLUMNS * ROWS];
        double u0 = extent.least[extent.across];
        double u1 = extent.most[extent.across];
        double v1 = Math.max(Math.abs(extent.least[extent.up]), Math.abs(extent.most[extent.up]));
        double v0 = train.elements().isEmpty() ? extent.least[extent.up] : -v1;
        v1 = train.elements().isEmpty() ? extent.most[extent.up] : v1;
        if (!(u1 > u0 && v1 > v0)) {
            return Optional.empty();
        }
        Samples s = new Samples(1);
        double least = Double.POSITIVE_INFINITY;
        double most = Double.NEGATIVE_INFINITY;
        double[] q = extent.middle.clone();
        for (int row = 0; row < ROWS; row++) {
            for (int column = 0; column < COLUMNS; column++) {
                q[extent.across] = u0 + (u1 - u0) * (column + 0.5) / COLUMNS;
                q[extent.up] = v0 + (v1 - v0) * (row + 0.5) / ROWS;
                double n = index(train, q, s);
                values[row * COLUMNS + column] = n;
                if (!Double.isNaN(n)) {
                    least = Math.min(least, n);
                    most = Math.max(most, n);
                }
            }
        }
        return most - least > 1e-12
                ? Optional.of(new SectionFigure.Shading("refractive index", "1", u0, u1, v0, v1, COLUMNS, ROWS, values))
                : Optional.empty();
    }

    /** The index of the non-uniform medium at a place, NaN where there is a uniform one or none. */
    private static double index(Train train, double[] q, Samples s) {
        IndexField field = train.from();
        double aperture = Double.POSITIVE_INFINITY;
        double[] f = new double[10];
        Vector p = new Vector(q[0], q[1], q[2]);
        List<Surface> entered = new ArrayList<>();
        for (Element e : train.elements()) {
            if (e.action() instanceof Action.Reflect) {
                break;
            }
            if (!(e.action() instanceof Action.Refract)) {
                continue;
            }
            Surface surface = e.surface();
            surface.evaluate(q[0], q[1], q[2], f);
            boolean leaves = surface.whole() && entered.remove(surface);
            if (leaves) {
                continue;
            }
            boolean behind = surface.whole()
                    ? f[0] * Math.signum(((Quadric) surface.form()).g()) > 0
                    : f[0] > 0 && surface.holds(q[0], q[1], q[2]);
            if (surface.whole()) {
                entered.add(surface);
            }
            if (!behind) {
                if (!surface.whole()) {
                    break;
                }
                continue;
            }
            field = e.into();
            aperture = surface.aperture();
        }
        double[] g = new double[3];
        for (Level l : field.limits()) {
            if (l.value(p.x(), p.y(), p.z(), g) < 0) {
                return Double.NaN;
            }
        }
        if (field.uniform() || Math.hypot(q[0], q[1]) > aperture) {
            return Double.NaN;
        }
        field.sample(new double[] {q[0]}, new double[] {q[1]}, new double[] {q[2]}, 1, Order.VALUE, s);
        return Math.sqrt(1 + s.value[0]);
    }

    static double component(Vector v, int axis) {
        return axis == 0 ? v.x() : axis == 1 ? v.y() : v.z();
    }

    /** What a picture spans. */
    static final class Extent {
        final int across;
        final int up;
        final double[] least = {Double.POSITIVE_INFINITY, Double.POSITIVE_INFINITY, Double.POSITIVE_INFINITY};
        final double[] most = {Double.NEGATIVE_INFINITY, Double.NEGATIVE_INFINITY, Double.NEGATIVE_INFINITY};
        final double[] middle = new double[3];

        private Extent(List<double[]> trails, Train train) {
            for (double[] trail : trails) {
                for (int i = 0; i < trail.length; i++) {
                    least[i % 3] = Math.min(least[i % 3], trail[i]);
                    most[i % 3] = Math.max(most[i % 3], trail[i]);
                }
            }
            boolean any = least[0] <= most[0];
            double[] span = new double[3];
            for (int i = 0; i < 3; i++) {
                span[i] = any ? most[i] - least[i] : 0;
            }
            int main = 2;
            if (train.elements().isEmpty()) {
                main = span[0] > span[1] && span[0] > span[2] ? 0 : span[1] > span[2] ? 1 : 2;
            }
            int first = main == 0 ? 1 : 0;
            int second = main == 2 ? 1 : 2;
            across = main;
            up = span[first] > span[second] ? first : second;
            for (Element e : train.elements()) {
                double a = e.surface().aperture();
                double z = e.surface().vertex().z();
                least[2] = Math.min(least[2], z);
                most[2] = Math.max(most[2], z);
                if (e.surface().whole()) {
                    // the far side may lie beyond all rays
                    Quadric q = (Quadric) e.surface().form();
                    a = Math.min(a, 1 / Math.sqrt(Math.abs(q.g()) * q.curvature()));
                    least[2] = Math.min(least[2], z + Math.min(0, 2 / q.g()));
                    most[2] = Math.max(most[2], z + Math.max(0, 2 / q.g()));
                }
                if (Double.isFinite(a) && !(e.action() instanceof Action.Stop)) {
                    least[up] = Math.min(least[up], -a);
                    most[up] = Math.max(most[up], a);
                }
            }
            if (train.elements().isEmpty() && any) {
                for (int i = 0; i < 3; i++) {
                    middle[i] = 0.5 * (least[i] + most[i]);
                }
                double margin = 0.15 * span[up];
                least[up] -= margin;
                most[up] += margin;
            }
        }

        /**
         * The extent of what light passes and of a train.
         *
         * @param trails places passed, x, y, z triples
         */
        static Extent of(List<double[]> trails, Train train) {
            return new Extent(trails, train);
        }

        /** The extent of a train alone, in the yz section, that also holds two heights (metres). */
        static Extent of(Train train, double height, double another) {
            Extent e = new Extent(List.of(), train);
            for (double h : new double[] {height, another}) {
                e.least[1] = Math.min(e.least[1], -Math.abs(h));
                e.most[1] = Math.max(e.most[1], Math.abs(h));
            }
            return e;
        }

        /** Half the height of what is drawn, metres. */
        double size() {
            double size = Math.max(Math.abs(least[up]), Math.abs(most[up]));
            return size > 0 && Double.isFinite(size) ? size : 1e-3;
        }
    }
}
