package org.stillpath.path;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.Random;
import java.util.function.UnaryOperator;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;
import org.stillpath.medium.Level;
import org.stillpath.ray.Element;
import org.stillpath.ray.Train;

/**
 * Finds a plane that holds two points and in which media and surfaces are their own mirror images. A formula does not say
 * what symmetry it has, so planes that may be one are tried on random places with a fixed seed; what looks symmetric at all of
 * them is taken to be. That costs some hundred samples a plane.
 */
final class Symmetry {
    private static final int PLACES = 60;
    private static final long SEED = 20261201L;
    private static final double SAME = 1e-11;

    private final Train train;
    private final Vector from;
    private final Vector to;

    Symmetry(Train train, Vector from, Vector to) {
        this.train = train;
        this.from = from;
        this.to = to;
    }

    /** The unit normal of a plane of symmetry through both points; empty if none is found. */
    Optional<Vector> plane() {
        Vector chord = to.minus(from);
        List<Vector> hints = new ArrayList<>();
        for (Vector q : List.of(from, to, from.plus(0.37, chord))) {
            gradient(q).ifPresent(hints::add);
        }
        for (Element e : train.elements()) {
            hints.add(e.surface().frame().ez());
            hints.add(e.surface().vertex().minus(from));
            hints.add(e.surface().vertex().plus(e.surface().frame().ez()).minus(from));
        }
        hints.add(new Vector(1, 0, 0));
        hints.add(new Vector(0, 1, 0));
        hints.add(Vector.Z);
        for (Vector hint : hints) {
            Vector normal = chord.cross(hint);
            if (normal.norm() > 1e-9 * chord.norm() * hint.norm() && holds(normal.unit())) {
                return Optional.of(normal.unit());
            }
        }
        return Optional.empty();
    }

    private Optional<Vector> gradient(Vector q) {
        Samples s = new Samples(1);
        train.from().sample(new double[] {q.x()}, new double[] {q.y()}, new double[] {q.z()}, 1, Order.GRADIENT, s);
        double size = Math.abs(s.gx[0]) + Math.abs(s.gy[0]) + Math.abs(s.gz[0]);
        return size > 0 && size < Double.POSITIVE_INFINITY
                ? Optional.of(new Vector(s.gx[0], s.gy[0], s.gz[0]))
                : Optional.empty();
    }

    /** Whether everything is its own image in the plane through the start with this unit normal. */
    boolean holds(Vector normal) {
        Random random = new Random(SEED);
        return moves(places(random, q -> q.plus(-2 * q.minus(from).dot(normal), normal)));
    }

    /** Random places, each followed by its image. */
    private double[][] places(Random random, UnaryOperator<Vector> move) {
        Vector middle = from.plus(0.5, to.minus(from));
        double size = to.minus(from).norm();
        double[][] places = new double[3][2 * PLACES];
        for (int i = 0; i < PLACES; i++) {
            Vector q = middle.plus(new Vector(
                    size * (random.nextDouble() - 0.5),
                    size * (random.nextDouble() - 0.5),
                    size * (random.nextDouble() - 0.5)));
            if (i % 3 == 1) {
                // near the chord too, where media may vary on a smaller scale
                q = middle.plus(1e-2, q.minus(middle)).plus(random.nextDouble() - 0.5, to.minus(from));
            }
            put(places, 2 * i, q);
            put(places, 2 * i + 1, move.apply(q));
        }
        return places;
    }

    /** Whether media and surfaces are the same at places and their images. */
    private boolean moves(double[][] places) {
        boolean same = sameField(train.from(), places);
        for (Element e : train.elements()) {
            same = same && sameField(e.into(), places) && sameSurface(e.surface(), places);
        }
        return same;
    }

    /**
     * Whether every ray between the two points must lie in a plane of symmetry: where nothing changes along its normal, the
     * momentum along that is kept, and it is 0; where all is symmetric round a centre in the plane, so is the angular
     * momentum; round an axis through one of the points likewise. Otherwise rays may leave the plane and come back.
     */
    boolean binds(Vector normal) {
        Random random = new Random(SEED);
        double size = to.minus(from).norm();
        if (moves(places(random, q -> q.plus(size * (2 * random.nextDouble() - 1), normal)))) {
            return true;
        }
        for (Vector centre : centres(normal)) {
            if (moves(places(random, q -> centre.plus(turned(q.minus(centre), random))))) {
                return true;
            }
        }
        for (Vector point : List.of(from, to)) {
            for (Vector axis : axes(point)) {
                if (moves(places(random, q -> point.plus(round(q.minus(point), axis, random))))) {
                    return true;
                }
            }
        }
        return false;
    }

    /** Points of the plane about which all may be symmetric. */
    private List<Vector> centres(Vector normal) {
        List<Vector> list = new ArrayList<>();
        list.add(Vector.ZERO);
        for (Element e : train.elements()) {
            list.add(e.surface().vertex());
            double c = e.surface().form().curvature();
            if (c > 0) {
                Vector ez = e.surface().frame().ez();
                list.add(e.surface().vertex().plus(1 / c, ez));
                list.add(e.surface().vertex().plus(-1 / c, ez));
            }
        }
        // where the gradients at two places meet
        Optional<Vector> a = gradient(from);
        Optional<Vector> b = gradient(to);
        if (a.isPresent() && b.isPresent()) {
            Vector u = a.get().unit();
            Vector across = normal.cross(b.get().unit());
            double steep = u.dot(across);
            if (Math.abs(steep) > 1e-12) {
                list.add(from.plus(to.minus(from).dot(across) / steep, u));
            }
        }
        list.removeIf(
                c -> Math.abs(c.minus(from).dot(normal)) > 1e-9 * to.minus(from).norm());
        return list;
    }

    /** Directions of axes through a point round which all may be symmetric. */
    private List<Vector> axes(Vector point) {
        List<Vector> list = new ArrayList<>();
        list.add(Vector.Z);
        list.add(to.minus(from).unit());
        gradient(point).map(Vector::unit).ifPresent(list::add);
        train.elements().forEach(e -> list.add(e.surface().frame().ez()));
        return list;
    }

    private static Vector turned(Vector v, Random random) {
        Vector a = new Vector(random.nextGaussian(), random.nextGaussian(), random.nextGaussian()).unit();
        return round(v, a, random);
    }

    /** A vector turned about an axis by a random angle (Rodrigues). */
    private static Vector round(Vector v, Vector axis, Random random) {
        double angle = 2 * Math.PI * random.nextDouble();
        return v.times(Math.cos(angle))
                .plus(Math.sin(angle), axis.cross(v))
                .plus((1 - Math.cos(angle)) * axis.dot(v), axis);
    }

    private static void put(double[][] places, int i, Vector q) {
        places[0][i] = q.x();
        places[1][i] = q.y();
        places[2][i] = q.z();
    }

    private static boolean sameField(IndexField field, double[][] places) {
        if (field.uniform() && field.limits().isEmpty()) {
            return true;
        }
        Samples s = new Samples(2 * PLACES);
        field.sample(places[0], places[1], places[2], 2 * PLACES, Order.VALUE, s);
        double low = Double.POSITIVE_INFINITY;
        double high = Double.NEGATIVE_INFINITY;
        for (double v : s.value) {
            low = v < low ? v : low;
            high = v > high ? v : high;
        }
        double[] g = new double[3];
        for (int i = 0; i < 2 * PLACES; i += 2) {
            boolean bothUndefined = Double.isNaN(s.value[i]) && Double.isNaN(s.value[i + 1]);
            if (!bothUndefined && !(Math.abs(s.value[i] - s.value[i + 1]) <= SAME * (high - low) + 1e-15)) {
                return false;
            }
            for (Level level : field.limits()) {
                double a = level.value(places[0][i], places[1][i], places[2][i], g);
                double b = level.value(places[0][i + 1], places[1][i + 1], places[2][i + 1], g);
                if (!(Math.abs(a - b) <= SAME * (Math.abs(a) + Math.abs(b))) && a > 0 != b > 0) {
                    return false;
                }
            }
        }
        return true;
    }

    private static boolean sameSurface(Surface surface, double[][] places) {
        double[] a = new double[10];
        double[] b = new double[10];
        for (int i = 0; i < 2 * PLACES; i += 2) {
            surface.evaluate(places[0][i], places[1][i], places[2][i], a);
            surface.evaluate(places[0][i + 1], places[1][i + 1], places[2][i + 1], b);
            if (!(Math.abs(a[0] - b[0]) <= SAME * (Math.abs(a[0]) + Math.abs(b[0])) + 1e-15)) {
                return false;
            }
        }
        return true;
    }
}
