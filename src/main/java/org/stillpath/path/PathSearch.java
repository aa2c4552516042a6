package org.stillpath.path;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.stillpath.geometry.Vector;
import org.stillpath.ray.Columns;
import org.stillpath.ray.Ending;
import org.stillpath.ray.RayStart;
import org.stillpath.ray.State;
import org.stillpath.ray.Status;
import org.stillpath.ray.Traced;
import org.stillpath.ray.Tracer;
import org.stillpath.ray.Train;

/**
 * Finds the stationary optical paths between two points by shooting.
 *
 * <p>A ray is followed to where its distance from the target is least; what it misses by, across the ray, is a smooth function
 * of its direction, and the Jacobi fields give the derivative. In a plane of symmetry the direction is an angle: the fan is
 * refined until a cubic through two neighbours predicts the ray between them, zeros and turning points are bracketed, and
 * the brackets narrowed. Elsewhere the cone is covered, and Newton's method starts wherever a ray's own derivative puts a zero
 * nearby. A ray may pass the target more than once; each passage is searched for itself.
 */
public final class PathSearch {
    private static final int FAN = 180;
    private static final int MOST_SHOTS = 20_000;
    private static final int DEEPEST = 22;
    private static final int RINGS = 36;
    private static final int PASSAGES = 2;
    private static final double GLANCE = 1e-9;
    private static final double REACH = 12;
    private static final double NULL_DIRECTION = 1e-6;
    /** A step of Newton's method turns the launch by no more than this, rad. */
    private static final double LONGEST_TURN = 0.3;

    private final Query query;
    private final double chord;
    private final Vector axis;
    private final Optional<Vector> normal;
    private final Columns columns;
    private final List<Root> roots = new ArrayList<>();
    private final List<Sample> samples = new ArrayList<>();
    private int shots;

    /**
     * What is searched.
     *
     * @param train the surfaces that are met in order; none where one medium is everywhere
     * @param from start, metres
     * @param to target, metres
     * @param around axis of the cone of directions; zero: the chord
     * @param halfAngle of the cone, rad, to π
     * @param plane normal of the plane to which the search is confined; zero: not confined
     * @param accuracy of the result
     */
    public record Query(
            Train train, Vector from, Vector to, Vector around, double halfAngle, Vector plane, double accuracy) {
        public Query {
            if (!(halfAngle > 0 && halfAngle <= Math.PI)) {
                throw new IllegalArgumentException("halfAngle must be above 0 and at most pi: " + halfAngle);
            }
            if (to.minus(from).norm() == 0) {
                throw new IllegalArgumentException("from and to must differ: " + from);
            }
        }

        boolean confined() {
            return plane.norm() > 0;
        }
    }

    /** A direction that may lead to the target at its how-manieth passage. */
    private record Root(Vector direction, int passage) {}

    /** One ray at one passage: its miss across the ray and the derivative over the direction's two components. */
    private record Shot(Vector direction, double[] miss, double[] slope, double length) {
        double size() {
            return Math.hypot(miss[0], miss[1]);
        }
    }

    private PathSearch(Query query) {
        this.query = query;
        this.chord = query.to.minus(query.from).norm();
        Optional<Vector> found = query.confined()
                ? Optional.of(query.plane.unit())
                : new Symmetry(query.train, query.from, query.to).plane();
        Vector toward = query.around.norm() > 0
                ? query.around.unit()
                : query.to.minus(query.from).unit();
        boolean inPlane = found.isPresent() && Math.abs(found.get().dot(toward)) < 1e-9;
        this.normal = inPlane ? found : Optional.empty();
        this.axis = toward;
        this.columns = normal.map(Columns.RAY::in).orElse(Columns.RAY);
    }

    /**
     * All stationary paths found, by optical length.
     *
     * @param query what is searched
     */
    public static Outcome run(Query query) {
        PathSearch search = new PathSearch(query);
        for (int passage = 1; passage <= PASSAGES; passage++) {
            if (search.normal.isPresent()) {
                search.fan(passage);
            } else {
                search.cone(passage);
            }
        }
        List<StationaryPath> paths = search.polished();
        search.samples.sort(Comparator.comparingInt(Sample::passage).thenComparingDouble(Sample::angle));
        return new Outcome(paths, search.normal.isPresent(), search.shots, search.samples, search.normal);
    }

    /**
     * One ray of a search in a plane.
     *
     * @param angle of the launch from the axis of the search, in the plane searched, rad; positive from the axis toward the
     *     plane's normal times the axis
     * @param passage which of its passages of the target is meant, from 1
     * @param miss what it misses the target by, across the ray, signed, metres; NaN where it did not arrive
     */
    public record Sample(double angle, int passage, double miss) {}

    /**
     * What a search found, and how it was bounded.
     *
     * @param paths by optical length
     * @param planar whether it was one-dimensional
     * @param shots number of rays traced
     * @param samples the rays by passage and angle; none of a search over a cone
     * @param normal unit normal of the plane searched; empty for a search over a cone
     */
    public record Outcome(
            List<StationaryPath> paths, boolean planar, int shots, List<Sample> samples, Optional<Vector> normal) {
        public Outcome {
            paths = List.copyOf(paths);
            samples = List.copyOf(samples);
        }
    }

    // ---- one ray

    private Tracer tracer(int passage, double accuracy, boolean trail, Columns how) {
        Ending ending = new Ending.Nearest(query.to, passage);
        return new Tracer(query.train, ending, new Tracer.Settings(accuracy, true, trail, how, REACH));
    }

    private @Nullable Shot shoot(Vector direction, int passage) {
        shots++;
        RayStart start = RayStart.of(query.from, direction);
        Traced t = tracer(passage, GLANCE, false, columns).glance(start, GLANCE);
        return t.status() == Status.ARRIVED ? shot(direction, t, columns) : null;
    }

    private @Nullable Shot shootAt(double angle, int passage) {
        Shot s = shoot(at(angle), passage);
        samples.add(new Sample(angle, passage, s == null ? Double.NaN : s.miss[0]));
        return s;
    }

    private Shot shot(Vector direction, Traced t, Columns how) {
        double[] y = t.state();
        double[] first = t.start();
        double n = Math.sqrt(first[3] * first[3] + first[4] * first[4] + first[5] * first[5]);
        double[][] axes = how.axes(y[3], y[4], y[5]);
        Vector off = t.position().minus(query.to);
        double[] miss = new double[2];
        double[] slope = new double[4];
        for (int r = 0; r < 2; r++) {
            miss[r] = axes[r][0] * off.x() + axes[r][1] * off.y() + axes[r][2] * off.z();
            for (int c = 0; c < 2; c++) {
                int at = State.COLUMNS + State.COLUMN * (2 + c);
                slope[2 * r + c] = n * (axes[r][0] * y[at] + axes[r][1] * y[at + 1] + axes[r][2] * y[at + 2]);
            }
        }
        return new Shot(direction, miss, slope, t.length());
    }

    // ---- in a plane

    private Vector at(double angle) {
        Vector side = normal.orElseThrow().cross(axis);
        return axis.times(Math.cos(angle)).plus(Math.sin(angle), side).unit();
    }

    private void fan(int passage) {
        List<Double> angles = new ArrayList<>();
        double half = query.halfAngle;
        for (int i = -FAN; i <= FAN; i++) {
            angles.add(half * i / FAN);
        }
        // and crowded towards the axis, where sights along flat layers have all their images
        for (double a = half / FAN; a > 1e-7; a *= 0.8) {
            angles.add(a);
            angles.add(-a);
        }
        angles.sort(Comparator.naturalOrder());
        double before = angles.get(0);
        Shot a = shootAt(before, passage);
        for (int i = 1; i < angles.size(); i++) {
            double angle = angles.get(i);
            Shot b = shootAt(angle, passage);
            interval(before, a, angle, b, passage, 0);
            before = angle;
            a = b;
        }
    }

    private void interval(double ta, @Nullable Shot a, double tb, @Nullable Shot b, int passage, int depth) {
        if ((a == null && b == null) || shots > MOST_SHOTS) {
            return;
        }
        double middle = 0.5 * (ta + tb);
        if (a == null || b == null) {
            if (depth < DEEPEST) {
                Shot m = shootAt(middle, passage);
                interval(ta, a, middle, m, passage, depth + 1);
                interval(middle, m, tb, b, passage, depth + 1);
            }
            return;
        }
        double h = tb - ta;
        double ma = a.miss[0];
        double mb = b.miss[0];
        double sa = a.slope[0] * h;
        double sb = b.slope[0] * h;
        boolean crosses = ma > 0 != mb > 0;
        // how far from zero a cubic with these ends stays at least
        double swing = Math.abs(mb - ma) + Math.abs(sa) + Math.abs(sb);
        if (!crosses && Math.min(Math.abs(ma), Math.abs(mb)) > swing) {
            return;
        }
        Shot m = shootAt(middle, passage);
        double predicted = 0.5 * (ma + mb) + 0.125 * (sa - sb);
        boolean smooth = m != null && Math.abs(m.miss[0] - predicted) <= 1e-3 * swing + 1e-13 * chord;
        if (m != null && smooth) {
            half(ta, a, middle, m, passage);
            half(middle, m, tb, b, passage);
        } else if (depth < DEEPEST) {
            interval(ta, a, middle, m, passage, depth + 1);
            interval(middle, m, tb, b, passage, depth + 1);
        }
    }

    /** An interval on which a cubic holds: a change of sign is one root, a turning point between may be two. */
    private void half(double ta, Shot a, double tb, Shot b, int passage) {
        if (a.miss[0] > 0 != b.miss[0] > 0) {
            narrow(ta, a, tb, b, passage);
            return;
        }
        if (a.slope[0] > 0 == b.slope[0] > 0 || a.slope[0] * a.miss[0] > 0) {
            return;
        }
        // the turning point, by the sign of the slope
        double lo = ta;
        double hi = tb;
        Shot turning = a;
        for (int i = 0; i < 40 && hi - lo > 1e-12; i++) {
            double t = 0.5 * (lo + hi);
            Shot m = shootAt(t, passage);
            if (m == null) {
                return;
            }
            turning = m;
            if (m.miss[0] > 0 != a.miss[0] > 0) {
                narrow(ta, a, t, m, passage);
                narrow(t, m, tb, b, passage);
                return;
            }
            if (m.slope[0] > 0 == a.slope[0] > 0) {
                lo = t;
            } else {
                hi = t;
            }
        }
        if (Math.abs(turning.miss[0]) < Math.sqrt(query.accuracy) * 1e-3 * chord) {
            roots.add(new Root(turning.direction, passage));
        }
    }

    private void narrow(double ta, Shot a, double tb, Shot b, int passage) {
        double lo = ta;
        double hi = tb;
        Shot low = a;
        double t = 0.5 * (lo + hi);
        Shot best = Math.abs(a.miss[0]) < Math.abs(b.miss[0]) ? a : b;
        for (int i = 0; i < 60; i++) {
            Shot m = shootAt(t, passage);
            if (m == null) {
                return;
            }
            best = m;
            if (m.miss[0] > 0 == low.miss[0] > 0) {
                lo = t;
                low = m;
            } else {
                hi = t;
            }
            double step = -m.miss[0] / m.slope[0];
            double next = t + step;
            if (Math.abs(step) < 1e-13 || hi - lo < 1e-14) {
                break;
            }
            t = next > lo && next < hi ? next : 0.5 * (lo + hi);
        }
        // a change of sign across a jump is no root
        if (Math.abs(best.miss[0]) < 1e-5 * chord) {
            roots.add(new Root(best.direction, passage));
        }
    }

    // ---- over a cone

    private void cone(int passage) {
        double ring = query.halfAngle / RINGS;
        List<Double> polar = new ArrayList<>();
        for (int i = 1; i <= RINGS; i++) {
            polar.add(i * ring);
        }
        for (double a = 0.5 * ring; a > 1e-5; a *= 0.5) {
            polar.add(a);
        }
        polar.add(0.0);
        Vector u = axis.perpendicular();
        Vector v = axis.cross(u);
        List<Vector> tried = new ArrayList<>();
        for (double p : polar) {
            int count = p == 0 ? 1 : (int) Math.max(8, Math.ceil(2 * Math.PI * Math.sin(p) / ring));
            for (int i = 0; i < count && shots < MOST_SHOTS; i++) {
                double q = 2 * Math.PI * (i + 0.5 * (count % 2)) / count;
                Vector d = axis.times(Math.cos(p))
                        .plus(Math.sin(p) * Math.cos(q), u)
                        .plus(Math.sin(p) * Math.sin(q), v)
                        .unit();
                Shot s = shoot(d, passage);
                if (s != null) {
                    start(s, Math.max(2 * Math.min(ring, Math.max(p, 1e-5)), 1e-4), passage, tried);
                }
            }
        }
    }

    /** Newton's method from a ray, if its own derivative puts a zero near enough. */
    private void start(Shot first, double near, int passage, List<Vector> tried) {
        double[] step = step(first);
        if (!(Math.hypot(step[0], step[1]) <= near)) {
            return;
        }
        Vector aim = moved(first.direction, step, 1);
        for (Vector t : tried) {
            if (t.minus(aim).norm() < 0.02 * near) {
                return;
            }
        }
        tried.add(aim);
        newton(first, passage, GLANCE * chord).ifPresent(s -> roots.add(new Root(s.direction, passage)));
    }

    private Optional<Shot> newton(Shot first, int passage, double enough) {
        Shot now = first;
        for (int i = 0; i < 30 && now.size() > enough; i++) {
            double[] step = step(now);
            @Nullable Shot better = null;
            for (double share = 1; share > 1e-3 && better == null; share *= 0.5) {
                Shot s = shoot(moved(now.direction, step, share), passage);
                if (s != null && s.size() < now.size()) {
                    better = s;
                }
            }
            if (better == null) {
                break;
            }
            now = better;
        }
        return now.size() < 1e-6 * chord ? Optional.of(now) : Optional.empty();
    }

    /** The change of direction that the derivative asks for, along the start's two axes, rad. */
    private static double[] step(Shot s) {
        double[] m = s.slope;
        double det = m[0] * m[3] - m[1] * m[2];
        return new double[] {-(m[3] * s.miss[0] - m[1] * s.miss[1]) / det, -(m[0] * s.miss[1] - m[2] * s.miss[0]) / det
        };
    }

    private Vector moved(Vector direction, double[] step, double share) {
        double part = share / Math.max(1, Math.hypot(step[0], step[1]) / LONGEST_TURN);
        return turned(direction, new double[] {part * step[0], part * step[1]}, columns);
    }

    // ---- what was found

    private List<StationaryPath> polished() {
        List<StationaryPath> paths = new ArrayList<>();
        for (Root root : roots) {
            StationaryPath path = polish(root);
            if (path != null && paths.stream().noneMatch(p -> same(p, path))) {
                paths.add(path);
            }
        }
        paths.sort(Comparator.comparingDouble(StationaryPath::opticalLength));
        return paths;
    }

    /** Whether two are one path: the same within the square root of the accuracy, or members of one continuum. */
    private boolean same(StationaryPath a, StationaryPath b) {
        double apart = a.launch().minus(b.launch()).norm();
        double longer = Math.abs(a.opticalLength() - b.opticalLength()) / b.opticalLength();
        boolean continuum = a.kind() == StationaryPath.Kind.DEGENERATE
                && b.kind() == StationaryPath.Kind.DEGENERATE
                && longer < Math.max(1e-11, 10 * query.accuracy);
        return (apart < Math.max(1e-7, Math.sqrt(query.accuracy)) && longer < 1e-9) || continuum;
    }

    private @Nullable StationaryPath polish(Root root) {
        Vector direction = root.direction;
        Columns how = query.confined() ? columns : Columns.RAY;
        Traced end = trace(direction, root.passage, how, false);
        if (end.status() != Status.ARRIVED) {
            return null;
        }
        Shot best = shot(direction, end, how);
        for (int i = 0; i < 8 && best.size() > 0.01 * query.accuracy * chord; i++) {
            double[] step = query.confined() ? new double[] {-best.miss[0] / best.slope[0], 0} : step(best);
            if (normal.isPresent() && !query.confined()) {
                step = inPlane(best, how);
            }
            if (!(Math.hypot(step[0], step[1]) < 1e-2)) {
                break;
            }
            Vector next = turned(best.direction, step, how);
            Traced t = trace(next, root.passage, how, false);
            if (t.status() != Status.ARRIVED) {
                break;
            }
            Shot s = shot(next, t, how);
            if (s.size() >= best.size()) {
                break;
            }
            best = s;
        }
        if (best.size() > Math.max(1e-9, 10 * query.accuracy) * chord || passedBefore(best.direction, root.passage)) {
            return null;
        }
        return described(best, root.passage, how);
    }

    /** Whether a ray reaches the target at an earlier passage, where its path has ended. */
    private boolean passedBefore(Vector direction, int passage) {
        for (int earlier = 1; earlier < passage; earlier++) {
            Shot s = shoot(direction, earlier);
            if (s != null && s.size() < 1e-6 * chord) {
                return true;
            }
        }
        return false;
    }

    /** In a plane of symmetry a null direction across it must not spoil the step within it. */
    private double[] inPlane(Shot s, Columns how) {
        double[][] axes = how.axes(s.direction.x(), s.direction.y(), s.direction.z());
        Vector side = normal.orElseThrow().cross(s.direction);
        double c = side.x() * axes[0][0] + side.y() * axes[0][1] + side.z() * axes[0][2];
        double d = side.x() * axes[1][0] + side.y() * axes[1][1] + side.z() * axes[1][2];
        double r0 = s.slope[0] * c + s.slope[1] * d;
        double r1 = s.slope[2] * c + s.slope[3] * d;
        double step = -(r0 * s.miss[0] + r1 * s.miss[1]) / (r0 * r0 + r1 * r1);
        return new double[] {step * c, step * d};
    }

    private static Vector turned(Vector direction, double[] step, Columns how) {
        double[][] axes = how.axes(direction.x(), direction.y(), direction.z());
        return direction
                .plus(new Vector(axes[0][0], axes[0][1], axes[0][2]).times(step[0]))
                .plus(new Vector(axes[1][0], axes[1][1], axes[1][2]).times(step[1]))
                .unit();
    }

    private Traced trace(Vector direction, int passage, Columns how, boolean trail) {
        shots++;
        return tracer(passage, query.accuracy, trail, how).trace(RayStart.of(query.from, direction));
    }

    private StationaryPath described(Shot best, int passage, Columns how) {
        Traced t = trace(best.direction, passage, how.withConjugates(), true);
        double[] sizes = singular(best, query.confined());
        // lengths that a unit turn of the launch would miss by in a uniform medium are the scale of the second
        // variation
        boolean degenerate = sizes[0] < NULL_DIRECTION * Math.max(sizes[1], best.length);
        List<Double> before = new ArrayList<>();
        for (double c : t.conjugates()) {
            if (c < best.length * (1 - (degenerate ? 1e-3 : 1e-12))) {
                before.add(c);
            }
        }
        int index = before.size();
        StationaryPath.Kind kind = degenerate
                ? StationaryPath.Kind.DEGENERATE
                : index == 0 ? StationaryPath.Kind.MINIMUM : StationaryPath.Kind.SADDLE;
        return new StationaryPath(
                t.opticalLength(),
                t.length(),
                best.direction,
                t.direction(),
                kind,
                index,
                before.stream().mapToDouble(Double::doubleValue).toArray(),
                MeetingPoints.kind(query.train, t.trail(), query.confined() ? normal : Optional.empty()),
                best.size(),
                t.trail(),
                new double[] {
                    t.errors().opticalLength(), t.errors().length(), t.errors().direction()
                });
    }

    /** Singular values of the derivative of the miss over the launch, the smaller first; the one in the plane alone. */
    private static double[] singular(Shot s, boolean planar) {
        double[] m = s.slope;
        if (planar) {
            return new double[] {Math.abs(m[0]), Math.abs(m[0])};
        }
        double sum = m[0] * m[0] + m[1] * m[1] + m[2] * m[2] + m[3] * m[3];
        double det = Math.abs(m[0] * m[3] - m[1] * m[2]);
        double large = Math.sqrt(0.5 * (sum + Math.sqrt(Math.max(0, sum * sum - 4 * det * det))));
        return new double[] {large == 0 ? 0 : det / large, large};
    }
}
