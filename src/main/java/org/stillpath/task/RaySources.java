package org.stillpath.task;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.stillpath.geometry.Vector;
import org.stillpath.job.Section;
import org.stillpath.job.Value;
import org.stillpath.ray.RayStart;
import org.stillpath.unit.Kind;
import org.stillpath.wave.Pupil;

/** Reads the {@code rays} of a job: single rays, fans, beams and bundles. */
final class RaySources {
    private static final int MOST_RAYS = 200_000;

    private RaySources() {}

    /** All rays in the order given; faults are collected. */
    static List<RayStart> read(Value rays) {
        List<RayStart> starts = new ArrayList<>();
        List<Value> items = rays.items();
        if (rays.isList() && items.isEmpty()) {
            rays.fault("there is no ray; add one such as {from: [0 mm, 0.2 mm, -5 mm], direction: [0, 0, 1]}");
        }
        for (Value item : items) {
            Section s = item.section();
            Optional<Value> fan = s.find("fan");
            Optional<Value> beam = s.find("beam");
            Optional<Value> bundle = s.find("bundle");
            if (fan.isPresent()) {
                fan(fan.get().section(), starts);
            } else if (beam.isPresent()) {
                beam(beam.get().section(), starts);
            } else if (bundle.isPresent()) {
                bundle(bundle.get().section(), starts);
            } else if (s.node().entries().isEmpty() || s.has("from") || s.has("direction") || s.has("toward")) {
                single(s, starts);
            } else {
                s.has("from");
            }
            s.finish();
            if (starts.size() > MOST_RAYS) {
                rays.fault("these are more than the " + MOST_RAYS + " rays that a job may have");
                return List.of();
            }
        }
        return starts;
    }

    private static void single(Section s, List<RayStart> starts) {
        Vector from = point(s.need("from", "[0 mm, 0.2 mm, -5 mm]"));
        Optional<Value> toward = s.find("toward");
        if (toward.isPresent()) {
            s.find("direction")
                    .ifPresent(v -> v.fault("a ray has a direction or a point that it goes toward, not both"));
            Vector d = point(toward.get()).minus(from);
            if (d.norm() == 0) {
                if (s.problems().isEmpty()) {
                    toward.get().fault("a ray cannot go toward the point that it comes from");
                }
                return;
            }
            starts.add(RayStart.of(from, d));
            return;
        }
        direction(s.need("direction", "[0, 0, 1]")).ifPresent(d -> starts.add(RayStart.of(from, d)));
    }

    private static void fan(Section s, List<RayStart> starts) {
        Vector from = point(s.need("from", "[0 mm, 0 mm, -5 mm]"));
        Optional<Vector> around = direction(s.need("around", "[0, 0, 1]"));
        String plane = s.need("in", "yz").word("yz", "xz", "xy");
        double half = s.need("half-angle", "8 deg").positive(Kind.ANGLE);
        int count = s.need("count", "21").count(1, MOST_RAYS);
        s.finish();
        if (half > Math.PI) {
            s.fault("half-angle", "a fan cannot reach further than 180 deg to each side");
            return;
        }
        if (around.isEmpty() || plane.isEmpty() || !(half > 0)) {
            return;
        }
        Vector a = around.get();
        Optional<Vector> side = across(axis(plane.charAt(0)), a).or(() -> across(axis(plane.charAt(1)), a));
        for (int i = 0; i < count; i++) {
            double angle = count == 1 ? 0 : half * (2.0 * i / (count - 1) - 1);
            starts.add(RayStart.of(from, a.times(Math.cos(angle)).plus(Math.sin(angle), side.orElseThrow())));
        }
    }

    private static void beam(Section s, List<RayStart> starts) {
        Optional<Vector> along = direction(s.need("along", "[0, 0, 1]"));
        Vector centre = point(s.need("centre", "[0 mm, 0 mm, -5 mm]"));
        double half = s.need("half-width", "0.8 mm").positive(Kind.LENGTH);
        Optional<Value> sampling = s.find("sampling");
        if (sampling.isPresent()) {
            Pupil pupil = Pupil.read(sampling.get());
            // a filled beam is round: the axis across it may stay in the job, a count beside the sampling may not
            s.find("across").ifPresent(v -> v.word("x", "y", "z"));
            s.find("count").ifPresent(v -> v.fault("\"sampling\" says how many rays there are; leave \"count\" out"));
            s.finish();
            along.ifPresent(a -> {
                Vector e1 = first(a);
                Vector e2 = a.cross(e1);
                for (Pupil.Point p : pupil.points()) {
                    Vector at = centre.plus(half * p.x(), e1).plus(half * p.y(), e2);
                    starts.add(new RayStart(at, a, true));
                }
            });
            return;
        }
        String across = s.need("across", "y").word("x", "y", "z");
        int count = s.need("count", "21").count(1, MOST_RAYS);
        s.finish();
        if (along.isEmpty() || across.isEmpty() || !(half > 0)) {
            return;
        }
        Optional<Vector> side = across(axis(across.charAt(0)), along.get());
        if (side.isEmpty()) {
            s.fault("across", "a beam along " + across + " has no width across " + across + "; choose another axis");
            return;
        }
        for (int i = 0; i < count; i++) {
            double offset = count == 1 ? 0 : half * (2.0 * i / (count - 1) - 1);
            starts.add(new RayStart(centre.plus(offset, side.get()), along.get(), true));
        }
    }

    private static void bundle(Section s, List<RayStart> starts) {
        Vector from = point(s.need("from", "[0 mm, 0 mm, -5 mm]"));
        Optional<Vector> around = direction(s.need("around", "[0, 0, 1]"));
        double half = s.need("half-angle", "2 deg").positive(Kind.ANGLE);
        Pupil pupil = Pupil.read(s.need("sampling", "{radial: 6, angular: 12}"));
        s.finish();
        if (half >= Math.PI / 2) {
            s.fault("half-angle", "a bundle opens by less than 90 deg to each side");
            return;
        }
        around.ifPresent(a -> {
            Vector e1 = first(a);
            Vector e2 = a.cross(e1);
            double reach = Math.tan(half);
            for (Pupil.Point p : pupil.points()) {
                starts.add(RayStart.of(from, a.plus(reach * p.x(), e1).plus(reach * p.y(), e2)));
            }
        });
    }

    /** The direction across {@code a} from which pupil angles count: x, or y where the light runs along x. */
    private static Vector first(Vector a) {
        return across(axis('x'), a).or(() -> across(axis('y'), a)).orElseThrow();
    }

    /** The part of an axis across a direction, as a unit vector; none if the two are parallel. */
    private static Optional<Vector> across(Vector axis, Vector a) {
        Vector v = axis.plus(-axis.dot(a), a);
        return v.norm() < 1e-9 ? Optional.empty() : Optional.of(v.unit());
    }

    private static Vector axis(char name) {
        return switch (name) {
            case 'x' -> new Vector(1, 0, 0);
            case 'y' -> new Vector(0, 1, 0);
            default -> Vector.Z;
        };
    }

    private static Vector point(Value v) {
        double[] p = v.point();
        return Double.isNaN(p[0] + p[1] + p[2]) ? Vector.ZERO : new Vector(p[0], p[1], p[2]);
    }

    private static Optional<Vector> direction(Value v) {
        double[] d = v.direction();
        return Double.isNaN(d[0] + d[1] + d[2]) ? Optional.empty() : Optional.of(new Vector(d[0], d[1], d[2]));
    }
}
