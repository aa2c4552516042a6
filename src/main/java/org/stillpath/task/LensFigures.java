package org.stillpath.task;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.stillpath.geometry.Vector;
import org.stillpath.ray.Action;
import org.stillpath.ray.Element;
import org.stillpath.ray.Ending;
import org.stillpath.ray.RayStart;
import org.stillpath.ray.Status;
import org.stillpath.ray.Traced;
import org.stillpath.ray.Tracer;
import org.stillpath.ray.Train;

/** The figures of the task {@code lens}: real rays through the train, and the construction of an image by principal rays. */
final class LensFigures {
    private static final int RAYS = 11;
    /** Pictures need no more. */
    private static final double ACCURACY = 1e-6;

    private final Train train;
    private final Gaussian g;
    private final double first;
    private final double last;
    private final double along;
    private final double scale;
    private final boolean afocal;
    private final Optional<LensTask.Thing> object;

    /**
     * @param lastVertex where the axial ray leaves the last surface
     * @param scale the train's own length, metres
     */
    LensFigures(
            Train train,
            Scene scene,
            Gaussian g,
            Vector lastVertex,
            double scale,
            boolean afocal,
            Optional<LensTask.Thing> object) {
        this.train = train;
        this.g = g;
        this.first = train.elements().get(0).surface().vertex().z();
        this.last = lastVertex.z();
        long mirrors = train.elements().stream()
                .filter(e -> e.action() instanceof Action.Reflect)
                .count();
        this.along = mirrors % 2 == 0 ? 1 : -1;
        this.scale = scale;
        this.afocal = afocal;
        this.object = object.filter(t -> Double.isFinite(t.distance()));
    }

    /** A fan or a beam in the yz section, traced through the train to its focus or image. */
    SectionFigure rays(String answer) {
        double before = Math.max(0.4 * scale, 1e-9);
        double behind = behind();
        Ending ending = new Ending.AtZ(last + along * behind);
        Tracer tracer = new Tracer(train, ending, new Tracer.Settings(ACCURACY, false, true));
        double height = beamHeight();
        List<Traced> traced = new ArrayList<>();
        for (int i = 0; i < RAYS; i++) {
            double h = height * (2.0 * i / (RAYS - 1) - 1);
            RayStart start;
            if (object.isPresent() && object.get().distance() > 0) {
                Vector from = new Vector(
                        0, object.get().height(), first - object.get().distance());
                start = RayStart.of(from, new Vector(0, h, first).minus(from));
            } else {
                start = new RayStart(new Vector(0, h, first - before), Vector.Z, true);
            }
            traced.add(tracer.trace(start));
        }
        List<SectionFigure.Mark> marks = new ArrayList<>();
        List<SectionFigure.Line> lines = new ArrayList<>();
        double left = object.isPresent() ? first - object.get().distance() : first - before;
        lines.add(line(SectionFigure.Role.AXIS, "", left, 0, last + along * behind, 0));
        if (!afocal) {
            double focus = last + along * g.backFocalDistance();
            if (within(focus, left, last + along * behind)) {
                marks.add(new SectionFigure.Mark("F′", focus, 0));
            }
            double plane = last + along * g.rearPrincipalPlane();
            if (within(plane, left, last + along * behind) && plane != last) {
                lines.add(line(SectionFigure.Role.PLANE, "H′", plane, -1.1 * height, plane, 1.1 * height));
            }
        }
        return RayFigure.of(train, traced, answer, lines, marks);
    }

    /** Object, principal rays and image; the backward extensions where the image is virtual. */
    SectionFigure construction(String answer) {
        LensTask.Thing thing = object.orElseThrow();
        List<SectionFigure.Line> lines = new ArrayList<>();
        List<SectionFigure.Mark> marks = new ArrayList<>();
        double zObject = first - thing.distance();
        double h = thing.height() == 0 ? 0.1 * scale : thing.height();
        boolean atInfinity = g.imagesToInfinity(thing.distance(), scale);
        double image = atInfinity ? Double.NaN : last + along * g.imageDistance(thing.distance());
        double m = g.magnification(thing.distance());
        boolean virtual = !atInfinity && g.imageDistance(thing.distance()) < 0;
        double reach = atInfinity ? thing.distance() : Math.abs(image - last);
        double right = last + along * Math.max(virtual ? 0.6 * reach : 1.15 * reach, 0.5 * scale);
        if (!afocal) {
            double focus = last + along * g.backFocalDistance();
            right = along * Math.max(along * right, along * focus + 0.1 * Math.abs(focus - last));
        }
        lines.addAll(RayFigure.outlines(train, RayFigure.Extent.of(train, h, Math.abs(m) < 10 ? m * h : h)));
        lines.add(line(SectionFigure.Role.AXIS, "", Math.min(zObject, virtual ? image : zObject), 0, right, 0));
        if (afocal) {
            throughAfocal(lines, zObject, h, image, m, right);
        } else {
            throughFocal(lines, marks, zObject, h, image, m, right, virtual);
        }
        lines.add(line(SectionFigure.Role.OBJECT, "object", zObject, 0, zObject, h));
        if (!atInfinity) {
            lines.add(line(
                    virtual ? SectionFigure.Role.VIRTUAL_IMAGE : SectionFigure.Role.IMAGE,
                    virtual ? "virtual image" : "image",
                    image,
                    0,
                    image,
                    m * h));
        }
        return new SectionFigure(
                "construction", "Where is the image?", answer, "z", "y", Optional.empty(), lines, marks);
    }

    /**
     * The three principal rays from the object's tip: parallel to the axis and then through F′; through F and then parallel;
     * through the nodal points.
     */
    private void throughFocal(
            List<SectionFigure.Line> lines,
            List<SectionFigure.Mark> marks,
            double zObject,
            double h,
            double image,
            double m,
            double right,
            boolean virtual) {
        double front = first + g.frontPrincipalPlane();
        double rear = last + along * g.rearPrincipalPlane();
        double focus = last + along * g.backFocalDistance();
        double frontFocus = first + g.frontFocalDistance();
        double tall = 1.2 * Math.max(Math.abs(h), Math.abs(m) < 10 ? Math.abs(m * h) : 0);
        if (front == rear) {
            lines.add(line(SectionFigure.Role.PLANE, "H = H′", front, -tall, front, tall));
        } else {
            lines.add(line(SectionFigure.Role.PLANE, "H", front, -tall, front, tall));
            lines.add(line(SectionFigure.Role.PLANE, "H′", rear, -tall, rear, tall));
        }
        marks.add(new SectionFigure.Mark("F", frontFocus, 0));
        marks.add(new SectionFigure.Mark("F′", focus, 0));
        // slopes along the light behind the train, of a ray at height y on H that comes from the tip:
        // n′u′ = n u − Φ y, with u = (y − h)/distance from the tip to H
        double toPlane = front - zObject;
        double throughFocus = toPlane == 0 || zObject == frontFocus
                ? Double.NaN
                : h + (0 - h) * (front - zObject) / (frontFocus - zObject);
        double[] heights = {h, throughFocus, nodalHeight(toPlane, h)};
        for (double y : heights) {
            if (!Double.isFinite(y) || toPlane == 0) {
                continue;
            }
            double u = (y - h) / toPlane;
            double slope = (g.before() * u - g.power() * y) / g.behind();
            double endZ = right;
            double endY = y + slope * along * (right - rear);
            lines.add(new SectionFigure.Line(
                    SectionFigure.Role.PRINCIPAL_RAY, "", new double[] {zObject, front, rear, endZ}, new double[] {
                        h, y, y, endY
                    }));
            if (virtual && Double.isFinite(image)) {
                lines.add(line(SectionFigure.Role.EXTENSION, "", rear, y, image, m * h));
            }
        }
    }

    /** Height on H of the ray from the tip through the front nodal point, which lies (n′ − n)/Φ behind H. */
    private double nodalHeight(double toPlane, double h) {
        double nodalFromPlane = (g.behind() - g.before()) / g.power();
        return h * nodalFromPlane / (toPlane + nodalFromPlane);
    }

    /** An afocal train has no principal planes: two rays from the tip through its matrix. */
    private void throughAfocal(
            List<SectionFigure.Line> lines, double zObject, double h, double image, double m, double right) {
        double d = first - zObject;
        for (double slope : new double[] {0, d > 0 ? -h / d : 0}) {
            double y = h + slope * d;
            double out = g.a() * y + g.b() * g.before() * slope;
            double outSlope = (g.c() * y + g.d() * g.before() * slope) / g.behind();
            lines.add(new SectionFigure.Line(
                    SectionFigure.Role.PRINCIPAL_RAY, "", new double[] {zObject, first, last, right}, new double[] {
                        h, y, out, out + outSlope * along * (right - last)
                    }));
            if (along * (image - last) < 0) {
                lines.add(line(SectionFigure.Role.EXTENSION, "", last, out, image, m * h));
            }
        }
    }

    /** How far behind the last vertex the picture goes, metres. */
    private double behind() {
        double distance = Double.NaN;
        if (object.isPresent() && !g.imagesToInfinity(object.get().distance(), scale)) {
            distance = g.imageDistance(object.get().distance());
        } else if (object.isEmpty() && !afocal) {
            distance = g.backFocalDistance();
        }
        double least = 0.5 * scale;
        double most = 8 * scale + (object.isPresent() ? 3 * object.get().distance() : 0);
        return distance > 0 ? Math.max(Math.min(1.1 * distance, most), 0.2 * scale) : least;
    }

    /** Half the height of the beam that is drawn: a good part of the smallest aperture, or of what bends the light. */
    private double beamHeight() {
        double aperture = Double.POSITIVE_INFINITY;
        double radius = Double.POSITIVE_INFINITY;
        for (Element e : train.elements()) {
            aperture = Math.min(aperture, e.surface().aperture());
            double c = e.surface().form().curvature();
            radius = Math.min(radius, c > 0 ? 1 / c : Double.POSITIVE_INFINITY);
            if (e.action() instanceof Action.ThinLens lens) {
                radius = Math.min(radius, Math.abs(lens.focalLength()));
            }
        }
        double wanted =
                Double.isFinite(aperture) ? 0.85 * aperture : Double.isFinite(radius) ? 0.25 * radius : 0.1 * scale;
        return largestThatPasses(wanted);
    }

    /** The beam's height, made smaller until its rim goes through. */
    private double largestThatPasses(double wanted) {
        Tracer tracer = new Tracer(train, new Ending.BehindLastSurface(), new Tracer.Settings(ACCURACY, false, false));
        double h = wanted;
        for (int i = 0; i < 12; i++) {
            Vector from = object.filter(t -> t.distance() > 0)
                    .map(t -> new Vector(0, t.height(), first - t.distance()))
                    .orElse(new Vector(0, h, first - scale));
            Vector toward = new Vector(0, h, first);
            if (tracer.trace(RayStart.of(from, toward.minus(from))).status() == Status.ARRIVED) {
                return h;
            }
            h *= 0.8;
        }
        return wanted;
    }

    private static boolean within(double z, double a, double b) {
        return z >= Math.min(a, b) && z <= Math.max(a, b);
    }

    private static SectionFigure.Line line(
            SectionFigure.Role role, String label, double u0, double v0, double u1, double v1) {
        return new SectionFigure.Line(role, label, new double[] {u0, u1}, new double[] {v0, v1});
    }
}
