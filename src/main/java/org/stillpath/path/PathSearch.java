package org.stillpath.path;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.stillpath.geometry.Vector;
import org.stillpath.ray.Columns;
import org.stillpath.ray.Status;
import org.stillpath.ray.Traced;
import org.stillpath.ray.Train;

/**
 * Finds the stationary optical paths between two points by shooting.
 *
 * <p>A ray is followed to where its distance from the target is least; what it misses by there is a smooth function of its
 * direction, and the Jacobi fields give the derivative. In a plane of symmetry that holds both points the direction is an angle
 * ({@link FanSearch}). Where symmetry does not bind all rays between the points to that plane, and where there is no such plane, a cone is
 * searched ({@link ConeSearch}). A ray may pass the target more than once; each passage is searched for itself. What is found is
 * polished by Newton's method with the Jacobi fields, or where that is too unstable by multiple shooting, and its second
 * variation is counted twice ({@link SecondVariation}).
 */
public final class PathSearch {
    /** How far a ray is followed to its first passage, in distances of the two points or, if that is more, sizes of the train. */
    public static final double REACH = 12;
    /** Most rays of a search. */
    static final int MOST_SHOTS = 20_000;

    private static final int FAN = 8;
    /** What a path may miss by, as a part of the chord, to be worth mending by multiple shooting. */
    private static final double MENDABLE = 1e-3;

    /** Launches nearer to each other than this, rad, are one. */
    private static final double ONE_DIRECTION = 1e-7;

    private static final double NULL_DIRECTION = 1e-6;
    /** The fan crowds toward its axis down to this angle, rad. */
    private static final double INNERMOST = 1e-4;

    private final Query query;
    private final double chord;
    private final Vector axis;
    private final Optional<Vector> normal;
    private final boolean bound;
    private final Columns columns;
    private final Gun gun;
    private final List<Root> roots = new ArrayList<>();
    private final List<Sample> samples = new ArrayList<>();

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

    /**
     * What a ray of a fan misses the target by.
     *
     * @param angle of the launch from the axis of the search, in its plane, rad
     * @param passage the how-manieth time it passes the target, from 1
     * @param miss metres across the ray, in the plane; NaN where the ray does not arrive
     */
    public record Sample(double angle, int passage, double miss) {}

    /** A direction that may lead to the target at its how-manieth passage. */
    private record Root(Vector direction, int passage) {}

    private PathSearch(Query query) {
        this.query = query;
        this.chord = query.to.minus(query.from).norm();
        Symmetry symmetry = new Symmetry(query.train, query.from, query.to);
        Optional<Vector> found = query.confined() ? Optional.of(query.plane.unit()) : symmetry.plane();
        Vector toward = query.around.norm() > 0
                ? query.around.unit()
                : query.to.minus(query.from).unit();
        boolean inPlane = found.isPresent() && Math.abs(found.get().dot(toward)) < 1e-9;
        this.normal = inPlane ? found : Optional.empty();
        this.bound = normal.isPresent() && (query.confined() || symmetry.binds(normal.get()));
        this.axis = toward;
        this.columns = bound ? Columns.RAY.in(normal.orElseThrow()) : Columns.RAY;
        this.gun = new Gun(query.train, query.from, query.to, columns);
    }

    /**
     * All stationary paths found, by optical length.
     *
     * @param query what is searched
     */
    public static Outcome run(Query query) {
        PathSearch search = new PathSearch(query);
        search.normal.ifPresent(search::fan);
        if (!search.bound) {
            for (Passage p : ConeSearch.run(search.gun, search.axis, query.halfAngle, search.chord)) {
                search.roots.add(new Root(p.direction(), p.which()));
            }
        }
        boolean exhausted = search.gun.shots() > MOST_SHOTS;
        List<StationaryPath> paths = search.polished();
        return new Outcome(
                paths,
                search.bound,
                search.normal,
                search.axis,
                search.samples,
                search.gun.ended(),
                search.gun.shots(),
                search.gun.evaluations(),
                exhausted);
    }

    /**
     * What a search found, and how it was bounded.
     *
     * @param paths by optical length
     * @param planar whether only directions in one plane were searched
     * @param normal of the plane of symmetry, or to which the search was confined; empty where there is none
     * @param axis of the cone or fan, a unit vector
     * @param samples what the rays in the plane missed by, by passage and angle; empty where there is no plane
     * @param ended how many rays ended before they passed the target, by the way they did
     * @param shots number of rays traced
     * @param evaluations number of points at which fields were sampled
     * @param exhausted whether it stopped at its limit of rays
     */
    public record Outcome(
            List<StationaryPath> paths,
            boolean planar,
            Optional<Vector> normal,
            Vector axis,
            List<Sample> samples,
            Map<Status, Integer> ended,
            int shots,
            long evaluations,
            boolean exhausted) {
        public Outcome {
            paths = List.copyOf(paths);
            samples = List.copyOf(samples);
            ended = Map.copyOf(ended);
        }

        /** The same with other paths. */
        public Outcome withPaths(List<StationaryPath> others) {
            return new Outcome(others, planar, normal, axis, samples, ended, shots, evaluations, exhausted);
        }
    }

    // ---- in a plane

    private Vector at(double angle, Vector side) {
        return axis.times(Math.cos(angle)).plus(Math.sin(angle), side).unit();
    }

    private void fan(Vector plane) {
        Vector side = plane.cross(axis);
        FanSearch.Shooter shooter = (angle, tolerance) -> {
            List<Passage> passages = gun.shoot(at(angle, side), tolerance);
            double[] miss = new double[passages.size()];
            double[] slope = new double[passages.size()];
            for (int i = 0; i < miss.length; i++) {
                Passage p = passages.get(i);
                Vector across = plane.cross(p.arrival());
                miss[i] = p.off().dot(across);
                slope[i] = p.change(plane.cross(p.direction())).dot(across);
            }
            return new FanSearch.Shot(angle, miss, slope);
        };
        FanSearch.Outcome found = FanSearch.run(shooter, fan(query.halfAngle), chord, query.accuracy);
        for (FanSearch.Root r : found.roots()) {
            roots.add(new Root(at(r.angle(), side), r.branch() + 1));
        }
        int branches =
                found.samples().stream().mapToInt(s -> s.miss().length).max().orElse(0);
        for (int b = 0; b < branches; b++) {
            for (FanSearch.Shot s : found.samples()) {
                samples.add(new Sample(s.angle(), b + 1, s.arrives(b) ? s.miss()[b] : Double.NaN));
            }
        }
    }

    /** Angles of the first fan: even, and crowded toward the axis, where sights along flat layers have all their images. */
    private static double[] fan(double half) {
        List<Double> angles = new ArrayList<>();
        for (int i = -FAN; i <= FAN; i++) {
            angles.add(half * i / FAN);
        }
        for (double a = 0.5 * half / FAN; a > INNERMOST; a *= 0.5) {
            angles.add(a);
            angles.add(-a);
        }
        return angles.stream().mapToDouble(Double::doubleValue).sorted().toArray();
    }

    // ---- what was found

    private List<StationaryPath> polished() {
        List<StationaryPath> paths = new ArrayList<>();
        for (Root root : roots) {
            // one direction gives one path, and both the fan and the cone may have found it
            if (paths.stream().anyMatch(p -> p.launch().minus(root.direction).norm() < ONE_DIRECTION)) {
                continue;
            }
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
        return (apart < Math.max(ONE_DIRECTION, Math.sqrt(query.accuracy)) && longer < 1e-9) || continuum;
    }

    private @Nullable StationaryPath polish(Root root) {
        Columns how = (query.confined() ? columns : Columns.RAY).withConjugates();
        Traced ray = gun.trace(root.direction, root.passage, query.accuracy, true, how);
        if (ray.status() != Status.ARRIVED) {
            return null;
        }
        Passage best = Passage.of(root.direction, root.passage, ray, query.to, how);
        for (int i = 0; i < 8 && best.miss() > 0.1 * query.accuracy * chord; i++) {
            Vector turn = query.confined() || bound
                    ? best.turnInPlane(normal.orElseThrow().cross(best.direction()))
                    : best.turn();
            if (!(turn.norm() < 1e-2)) {
                break;
            }
            Vector direction = best.direction().plus(turn).unit();
            Traced again = gun.trace(direction, root.passage, query.accuracy, true, how);
            if (again.status() != Status.ARRIVED) {
                break;
            }
            Passage next = Passage.of(direction, root.passage, again, query.to, how);
            if (next.miss() >= best.miss()) {
                break;
            }
            best = next;
            ray = again;
        }
        Optional<MultipleShooting.Mended> mended = Optional.empty();
        if (best.miss() > query.accuracy * chord && best.miss() < MENDABLE * chord) {
            mended = MultipleShooting.mend(
                    query, best.direction(), best.length(), query.confined() ? normal : Optional.empty());
        }
        if ((mended.isEmpty() && best.miss() > Math.max(1e-9, 10 * query.accuracy) * chord)
                || passedBefore(best.direction(), root.passage)) {
            return null;
        }
        return described(best, ray, mended);
    }

    /** Whether a ray reaches the target at an earlier passage, where its path has ended. */
    private boolean passedBefore(Vector direction, int passage) {
        return passage > 1
                && gun.shoot(direction, 1e-9).stream().anyMatch(p -> p.which() < passage && p.miss() < 1e-6 * chord);
    }

    private StationaryPath described(Passage best, Traced t, Optional<MultipleShooting.Mended> mended) {
        double[] sizes = best.singular();
        if (query.confined()) {
            double inPlane = Math.abs(best.slope()[0]);
            sizes = new double[] {inPlane, inPlane};
        }
        // the scale is what a unit turn would miss by in a uniform medium, not the larger value, which has no bound
        double scale = NULL_DIRECTION * best.length();
        int nullDirections = sizes[0] >= scale ? 0 : sizes[1] >= scale || query.confined() ? 1 : 2;
        boolean degenerate = nullDirections > 0;
        List<Double> before = new ArrayList<>();
        for (double c : t.conjugates()) {
            if (c < best.length() * (1 - (degenerate ? 1e-3 : 1e-12))) {
                before.add(c);
            }
        }
        int index = before.size();
        Optional<SecondVariation.Counts> counts = SecondVariation.of(
                query.train, query.from, best.direction(), t.length(), query.confined() ? normal : Optional.empty());
        StationaryPath.Kind kind = degenerate
                ? StationaryPath.Kind.DEGENERATE
                : index == 0 ? StationaryPath.Kind.MINIMUM : StationaryPath.Kind.SADDLE;
        MultipleShooting.Mended whole = mended.orElseGet(() -> MultipleShooting.Mended.of(t, best));
        return new StationaryPath(
                whole.opticalLength(),
                whole.length(),
                whole.launch(),
                whole.arrival(),
                kind,
                index,
                counts.map(SecondVariation.Counts::negative).orElse(index),
                nullDirections,
                before.stream().mapToDouble(Double::doubleValue).toArray(),
                counts.map(SecondVariation.Counts::overInterfaces).orElse(StationaryPath.Kind.NONE),
                whole.residual(),
                whole.points(),
                whole.errors());
    }
}
