package org.stillpath.path;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.stillpath.geometry.Vector;

/**
 * Finds the directions of a cone in which rays meet a target: the zeros of the miss over a triangulated cap of the sphere.
 *
 * <p>A triangle whose misses stay farther from zero than they change is left. Where the derivatives at the corners predict the
 * middles of the sides, and the map from directions to misses keeps its orientation, there is one zero at most, and Newton's
 * method goes for it. Any other triangle is split into four, so that triangles gather where folds of the map (caustics), its
 * jumps and edges come near the target, and nowhere else. Chosen against a fine uniform mesh, which costs ten times as many rays
 * and still misses nearly merged pairs.
 *
 * <p>What shows neither in values nor derivatives at the corners of the first mesh is missed. Costs some 250 rays, 20 for a
 * zero, and some hundred more where a fold passes close to the target.
 */
final class ConeSearch {
    /** Sides of the triangles of the first mesh, rad. */
    private static final double SPACING = Math.toRadians(8);

    private static final int FEWEST_RINGS = 4;
    /** Rings crowd toward the axis down to this angle, rad: long sights through layers have all their images there. */
    private static final double INNERMOST = 1e-4;

    private static final int DEEPEST = 16;
    /** From this depth on only derivatives decide what is left, so that jumps are not followed along their whole length. */
    private static final int DEEP = 3;
    /** How well the middles of sides must be predicted, as a part of how much the misses change. */
    private static final double PREDICTED = 0.01;

    /** Most that the map's determinant may vary over a triangle with one zero. */
    private static final double VARIATION = 4;

    private static final double LOOSE = 1e-6;
    private static final double TIGHT = 1e-10;
    /** A step of Newton's method turns the launch by no more than this, rad. */
    private static final double LONGEST_TURN = 0.3;

    private static final double DEGENERATE = 1e-5;

    private final Gun gun;
    private final double chord;
    private final List<Passage> roots = new ArrayList<>();
    private final Map<Long, Node> middles = new HashMap<>();
    private int nodes;

    private ConeSearch(Gun gun, double chord) {
        this.gun = gun;
        this.chord = chord;
    }

    /** A direction that has been shot. */
    private record Node(int id, Vector direction, List<Passage> passages) {
        @Nullable Passage at(int branch) {
            return branch < passages.size() ? passages.get(branch) : null;
        }
    }

    private record Triangle(Node a, Node b, Node c, int depth) {}

    /**
     * Searches.
     *
     * @param gun shoots the rays
     * @param axis of the cone, a unit vector
     * @param halfAngle of the cone, rad
     * @param chord distance of the two points, metres
     * @return passages that meet the target, to some 1e-9 of the chord
     */
    static List<Passage> run(Gun gun, Vector axis, double halfAngle, double chord) {
        ConeSearch search = new ConeSearch(gun, chord);
        for (Triangle t : search.mesh(axis, halfAngle)) {
            for (int branch = 0; branch < Gun.PASSAGES; branch++) {
                search.look(t, branch);
            }
        }
        return search.roots;
    }

    /** Rings of directions around the axis, joined to triangles. */
    private List<Triangle> mesh(Vector axis, double halfAngle) {
        int rings = Math.max(FEWEST_RINGS, (int) Math.ceil(halfAngle / SPACING));
        double step = halfAngle / rings;
        List<double[]> plan = new ArrayList<>();
        plan.add(new double[] {0, 1});
        int inner = (int) Math.max(0, Math.floor(Math.log(step / INNERMOST) / Math.log(2)));
        for (int i = inner; i >= 1; i--) {
            plan.add(new double[] {step / Math.pow(2, i), 6});
        }
        for (int i = 1; i <= rings; i++) {
            double polar = i * step;
            plan.add(new double[] {polar, Math.max(6, Math.ceil(2 * Math.PI * Math.sin(polar) / step))});
        }
        Vector u = axis.perpendicular();
        Vector v = axis.cross(u);
        List<Triangle> triangles = new ArrayList<>();
        List<Node> before = List.of();
        for (int ring = 0; ring < plan.size(); ring++) {
            double polar = plan.get(ring)[0];
            int count = (int) plan.get(ring)[1];
            List<Node> now = new ArrayList<>();
            for (int i = 0; i < count; i++) {
                double azimuth = 2 * Math.PI * i / count;
                now.add(node(axis.times(Math.cos(polar))
                        .plus(Math.sin(polar) * Math.cos(azimuth), u)
                        .plus(Math.sin(polar) * Math.sin(azimuth), v)
                        .unit()));
            }
            join(before, now, triangles);
            before = now;
        }
        return triangles;
    }

    /** Fills the band between two rings with triangles. */
    private static void join(List<Node> in, List<Node> out, List<Triangle> triangles) {
        int i = 0;
        int o = 0;
        int ins = in.size();
        int outs = out.size();
        if (ins == 0) {
            return;
        }
        while (i < ins || o < outs) {
            Node a = in.get(i % ins);
            Node b = out.get(o % outs);
            // the side that lags behind goes on
            boolean outer = ins == 1 || i >= ins || (o < outs && (o + 0.5) * ins <= (i + 0.5) * outs);
            if (ins == 1 && o >= outs) {
                return;
            }
            Node next = outer ? out.get((o + 1) % outs) : in.get((i + 1) % ins);
            triangles.add(new Triangle(a, b, next, 0));
            if (outer) {
                o++;
            } else {
                i++;
            }
        }
    }

    private Node node(Vector direction) {
        return new Node(nodes++, direction, gun.shoot(direction, LOOSE));
    }

    private Node middle(Node a, Node b) {
        long key = (long) Math.min(a.id, b.id) << 32 | Math.max(a.id, b.id);
        Node known = middles.get(key);
        if (known == null) {
            known = node(a.direction.plus(b.direction).unit());
            middles.put(key, known);
        }
        return known;
    }

    private void look(Triangle t, int branch) {
        Node[] corners = {t.a, t.b, t.c};
        int arriving = 0;
        double nearest = Double.POSITIVE_INFINITY;
        double farthest = 0;
        double swing = 0;
        double size = 0;
        for (int i = 0; i < 3; i++) {
            Passage p = corners[i].at(branch);
            if (p == null) {
                continue;
            }
            arriving++;
            nearest = Math.min(nearest, p.miss());
            farthest = Math.max(farthest, p.miss());
            for (int j = 1; j < 3; j++) {
                Node other = corners[(i + j) % 3];
                Vector turn = other.direction.minus(p.direction());
                size = Math.max(size, turn.norm());
                double change = p.change(turn).norm();
                Passage q = other.at(branch);
                if (t.depth < DEEP && q != null) {
                    change = Math.max(change, q.off().minus(p.off()).norm());
                }
                swing = Math.max(swing, change);
            }
        }
        swing *= t.depth < DEEP ? 1.5 : 2;
        if (arriving == 0 || nearest > swing + 1e-9 * chord || gun.shots() > PathSearch.MOST_SHOTS || size < 1e-12) {
            return;
        }
        if (arriving == 3 && farthest < LOOSE * chord) {
            // an image of the start: all these directions meet it
            keep(corners[0].passages.get(branch));
            return;
        }
        Node ab = middle(t.a, t.b);
        Node bc = middle(t.b, t.c);
        Node ca = middle(t.c, t.a);
        Node[] all = {t.a, t.b, t.c, ab, bc, ca};
        Passage best = null;
        boolean complete = true;
        double least = Double.POSITIVE_INFINITY;
        double most = 0;
        int positive = 0;
        for (Node n : all) {
            Passage p = n.at(branch);
            if (p == null) {
                complete = false;
                continue;
            }
            best = best == null || p.miss() < best.miss() ? p : best;
            double det = p.determinant();
            least = Math.min(least, Math.abs(det));
            most = Math.max(most, Math.abs(det));
            positive += det > 0 ? 1 : 0;
        }
        boolean smooth = complete
                && predicted(t.a, ab, t.b, branch)
                && predicted(t.b, bc, t.c, branch)
                && predicted(t.c, ca, t.a, branch);
        if (best == null || (smooth && excluded(all, branch, swing))) {
            return;
        }
        boolean single = smooth && (positive == 0 || positive == all.length) && most < VARIATION * least;
        if (single || t.depth >= DEEPEST) {
            if (best.turn().norm() < 2 * size) {
                newton(best).ifPresent(this::keep);
            }
            return;
        }
        if (t.depth >= DEEP && best.turn().norm() < 2 * size) {
            Optional<Passage> root = newton(best);
            if (root.isPresent()
                    && root.get().direction().minus(best.direction()).norm() < 2 * size) {
                keep(root.get());
                double[] sizes = root.get().singular();
                if (sizes[0] < DEGENERATE * Math.max(sizes[1], chord)) {
                    return;
                }
            }
        }
        look(new Triangle(t.a, ab, ca, t.depth + 1), branch);
        look(new Triangle(ab, t.b, bc, t.depth + 1), branch);
        look(new Triangle(ca, bc, t.c, t.depth + 1), branch);
        look(new Triangle(ab, bc, ca, t.depth + 1), branch);
    }

    /**
     * Whether the quadratic through six nodes of a triangle has no zero in it: it lies in the convex hull of its Bézier points, and
     * the hull leaves out the origin if these are seen from there within less than half a turn.
     *
     * @param nodes corners, then middles of the sides from the first to the second corner and on
     */
    private static boolean excluded(Node[] nodes, int branch, double swing) {
        Vector mean = Vector.ZERO;
        for (Node n : nodes) {
            mean = mean.plus(n.passages.get(branch).arrival());
        }
        if (!(mean.norm() > 4)) {
            return false;
        }
        Vector u = mean.unit().perpendicular();
        Vector v = mean.unit().cross(u);
        double[] angles = new double[nodes.length];
        for (int i = 0; i < nodes.length; i++) {
            Vector q = nodes[i].passages.get(branch).off();
            if (i >= 3) {
                Vector a = nodes[i - 3].passages.get(branch).off();
                Vector b = nodes[(i - 2) % 3].passages.get(branch).off();
                q = q.times(2).plus(-0.5, a.plus(b));
            }
            double x = q.dot(u);
            double y = q.dot(v);
            if (Math.hypot(x, y) < PREDICTED * swing) {
                return false;
            }
            angles[i] = Math.atan2(y, x);
        }
        Arrays.sort(angles);
        double gap = angles[0] + 2 * Math.PI - angles[angles.length - 1];
        for (int i = 1; i < angles.length; i++) {
            gap = Math.max(gap, angles[i] - angles[i - 1]);
        }
        return gap > Math.PI + 2 * PREDICTED;
    }

    /** Whether a cubic along a side predicts the miss at its middle. */
    private boolean predicted(Node a, Node m, Node b, int branch) {
        Passage pa = a.passages.get(branch);
        Passage pb = b.passages.get(branch);
        Passage pm = m.passages.get(branch);
        Vector turn = b.direction.minus(a.direction);
        Vector ca = pa.change(turn);
        Vector cb = pb.change(turn);
        Vector guess = pa.off().plus(pb.off()).times(0.5).plus(ca.minus(cb).times(0.125));
        double swing = ca.norm() + cb.norm() + pb.off().minus(pa.off()).norm();
        return pm.off().minus(guess).norm() <= PREDICTED * swing + LOOSE * chord;
    }

    private Optional<Passage> newton(Passage first) {
        Passage now = first;
        double enough = 10 * TIGHT * chord;
        for (int i = 0; i < 30 && now.miss() > enough; i++) {
            Vector turn = now.turn();
            double part = 1 / Math.max(1, turn.norm() / LONGEST_TURN);
            @Nullable Passage better = null;
            for (double share = part; share > 1e-3 * part && better == null; share *= 0.5) {
                for (Passage p : gun.shoot(now.direction().plus(share, turn).unit(), TIGHT)) {
                    if (p.miss() < (better == null ? now.miss() : better.miss())) {
                        better = p;
                    }
                }
            }
            if (better == null) {
                break;
            }
            now = better;
        }
        return now.miss() < 1e-6 * chord ? Optional.of(now) : Optional.empty();
    }

    private void keep(Passage root) {
        for (Passage r : roots) {
            if (r.which() == root.which()
                    && r.direction().minus(root.direction()).norm() < 1e-8) {
                return;
            }
        }
        roots.add(root);
    }
}
