package org.stillpath.path;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.ray.Action;
import org.stillpath.ray.Columns;
import org.stillpath.ray.Ending;
import org.stillpath.ray.RayStart;
import org.stillpath.ray.Status;
import org.stillpath.ray.Traced;
import org.stillpath.ray.Tracer;
import org.stillpath.ray.Train;

/**
 * Polishes a path that is too unstable for single shooting: where a last bit of the launch direction moves the end by more than
 * the asked accuracy.
 *
 * <p>The path is cut as {@link SecondVariation} cuts it. Unknown are the places of the joints, across the path or in their
 * surfaces; each piece between two of them is a short two-point problem that single shooting solves to rounding. Newton's
 * method makes the jumps of the momentum at the joints vanish (Stoer and Bulirsch, <i>Introduction to Numerical Analysis</i>,
 * section 7.3.5, with the pieces as extremals and the block-tridiagonal second variation as the derivative). Costs a few rays a
 * piece and round.
 */
final class MultipleShooting {
    private static final int ROUNDS = 8;
    private static final int TURNS = 8;
    /** Jumps of the momentum's direction that count as none, rad. */
    private static final double SMOOTH = 1e-13;

    private final SecondVariation variation;
    private final Vector from;
    private final Vector to;
    private final double accuracy;
    private final Optional<Vector> normal;

    /**
     * A path in pieces.
     *
     * @param launch unit direction at the start
     * @param arrival unit direction at the target
     * @param opticalLength metres
     * @param length metres
     * @param residual largest miss of a piece or, times the path's length, jump of direction, metres
     * @param points places passed, x, y, z triples
     * @param errors estimated errors of optical length, length (metres) and direction (rad)
     */
    record Mended(
            Vector launch,
            Vector arrival,
            double opticalLength,
            double length,
            double residual,
            double[] points,
            double[] errors) {}

    private MultipleShooting(PathSearch.Query query, Optional<Vector> normal) {
        this.variation = new SecondVariation(query.train(), query.from(), normal);
        this.from = query.from();
        this.to = query.to();
        this.accuracy = query.accuracy();
        this.normal = normal;
    }

    /**
     * Mends a ray that passes near its target.
     *
     * @param launch unit direction
     * @param length geometric length to where it is nearest to the target, metres
     * @param normal confines it to a plane
     * @return nothing where an ideal thin lens stands in the way, or the pieces do not come together
     */
    static Optional<Mended> mend(PathSearch.Query query, Vector launch, double length, Optional<Vector> normal) {
        if (query.train().elements().stream().anyMatch(e -> e.action() instanceof Action.ThinLens)) {
            return Optional.empty();
        }
        MultipleShooting shooting = new MultipleShooting(query, normal);
        return shooting.variation.chain(launch, length).flatMap(shooting::mended);
    }

    private Optional<Mended> mended(SecondVariation.Chain chain) {
        int n = chain.legs().size();
        if (n < 2) {
            return Optional.empty();
        }
        Vector[] places = new Vector[n + 1];
        Vector[] directions = new Vector[n];
        for (int i = 0; i < n; i++) {
            places[i] = chain.legs().get(i).start().position();
            directions[i] = chain.legs().get(i).start().direction();
        }
        places[0] = from;
        places[n] = to;
        Traced[] rays = new Traced[n];
        double best = Double.POSITIVE_INFINITY;
        for (int round = 0; round < ROUNDS; round++) {
            for (int i = 0; i < n; i++) {
                Optional<Traced> ray = connect(chain.legs().get(i), places[i], places[i + 1], directions[i]);
                if (ray.isEmpty()) {
                    return Optional.empty();
                }
                rays[i] = ray.get();
                directions[i] = SecondVariation.momentum(ray.get().start()).unit();
            }
            List<SecondVariation.Piece> pieces = new ArrayList<>();
            for (int i = 0; i < n; i++) {
                pieces.add(variation.piece(rays[i], chain.legs().get(i).field()));
            }
            List<SecondVariation.Station> stations = new ArrayList<>();
            double[][] jumps = new double[n - 1][variation.width()];
            double worst = 0;
            for (int i = 0; i + 1 < n; i++) {
                Vector before = SecondVariation.momentum(rays[i].state());
                Vector behind = SecondVariation.momentum(rays[i + 1].start());
                SecondVariation.Joint joint = chain.joints().get(i);
                Vector meeting = places[i + 1];
                SecondVariation.Station s = joint.surface()
                        .map(f -> variation.station(f, meeting, before, behind))
                        .orElse(joint.station());
                stations.add(s);
                for (int k = 0; k < variation.width(); k++) {
                    jumps[i][k] = before.minus(behind).dot(s.tangents()[k]);
                    worst = Math.max(worst, Math.abs(jumps[i][k]) / before.norm());
                }
            }
            if (worst < SMOOTH || worst >= 0.5 * best) {
                return worst < 1e-9 ? Optional.of(result(rays, worst)) : Optional.empty();
            }
            best = worst;
            double[][] moves = solve(pieces, stations, jumps);
            for (int i = 0; i + 1 < n; i++) {
                Vector moved = places[i + 1];
                for (int k = 0; k < variation.width(); k++) {
                    moved = moved.plus(moves[i][k], stations.get(i).tangents()[k]);
                }
                Vector off = moved;
                places[i + 1] =
                        chain.joints().get(i).surface().map(f -> onto(f, off)).orElse(moved);
            }
        }
        return Optional.empty();
    }

    /** The nearest point of a surface to a place beside it. */
    private static Vector onto(Surface surface, Vector place) {
        double[] f = new double[10];
        Vector q = place;
        for (int i = 0; i < 4; i++) {
            surface.evaluate(q.x(), q.y(), q.z(), f);
            Vector gradient = new Vector(f[1], f[2], f[3]);
            q = q.plus(-f[0] / gradient.dot(gradient), gradient);
        }
        return q;
    }

    /** The ray of one medium from one place to another, by single shooting. */
    private Optional<Traced> connect(SecondVariation.Leg leg, Vector a, Vector b, Vector guess) {
        Columns columns = variation.columns();
        Tracer tracer = new Tracer(
                Train.through(leg.field()),
                new Ending.Nearest(b, 1),
                new Tracer.Settings(Math.max(accuracy, 1e-13), true, true, columns, 100));
        Vector direction = guess;
        double enough = 4e-16 * (b.minus(a).norm() + a.norm() + b.norm());
        Optional<Traced> best = Optional.empty();
        double least = Double.POSITIVE_INFINITY;
        for (int i = 0; i < TURNS; i++) {
            Traced ray = tracer.trace(RayStart.of(a, direction));
            if (ray.status() != Status.ARRIVED) {
                return best;
            }
            Passage passage = Passage.of(direction, 1, ray, b, columns);
            if (passage.miss() >= 0.5 * least) {
                return best;
            }
            best = Optional.of(ray);
            least = passage.miss();
            if (least < enough) {
                return best;
            }
            Vector turn = normal.isPresent() ? passage.turnInPlane(normal.get().cross(direction)) : passage.turn();
            direction = direction.plus(turn).unit();
        }
        return best;
    }

    /** How far the joints must move: the block-tridiagonal system of the second variation, by elimination and back. */
    private double[][] solve(
            List<SecondVariation.Piece> pieces, List<SecondVariation.Station> stations, double[][] jumps) {
        int n = stations.size();
        int width = variation.width();
        double[][][] diagonal = new double[n][][];
        double[][][] link = new double[n][][];
        double[][] right = new double[n][];
        for (int i = 0; i < n; i++) {
            diagonal[i] = variation.diagonal(pieces.get(i), stations.get(i), pieces.get(i + 1));
            right[i] = jumps[i].clone();
            for (int k = 0; k < width; k++) {
                right[i][k] = -right[i][k];
            }
            if (i > 0) {
                link[i] = variation.between(stations.get(i - 1), pieces.get(i), stations.get(i));
                double[][] share =
                        SecondVariation.times(SecondVariation.transposed(link[i]), variation.inverse(diagonal[i - 1]));
                double[][] drop = SecondVariation.times(share, link[i]);
                for (int r = 0; r < width; r++) {
                    for (int c = 0; c < width; c++) {
                        diagonal[i][r][c] -= drop[r][c];
                        right[i][r] -= share[r][c] * right[i - 1][c];
                    }
                }
            }
        }
        double[][] moves = new double[n][width];
        for (int i = n - 1; i >= 0; i--) {
            double[] rest = right[i].clone();
            for (int r = 0; r < width && i + 1 < n; r++) {
                for (int c = 0; c < width; c++) {
                    rest[r] -= link[i + 1][r][c] * moves[i + 1][c];
                }
            }
            double[][] inverse = variation.inverse(diagonal[i]);
            for (int r = 0; r < width; r++) {
                for (int c = 0; c < width; c++) {
                    moves[i][r] += inverse[r][c] * rest[c];
                }
            }
        }
        return moves;
    }

    private Mended result(Traced[] rays, double jump) {
        double optical = 0;
        double length = 0;
        double[] errors = new double[3];
        int points = 0;
        for (Traced ray : rays) {
            points += ray.trail().length;
        }
        double[] trail = new double[points];
        int at = 0;
        for (Traced ray : rays) {
            optical += ray.opticalLength();
            length += ray.length();
            errors[0] += ray.errors().opticalLength();
            errors[1] += ray.errors().length();
            errors[2] = Math.max(errors[2], ray.errors().direction());
            System.arraycopy(ray.trail(), 0, trail, at, ray.trail().length);
            at += ray.trail().length;
        }
        double residual = Math.max(rays[rays.length - 1].position().minus(to).norm(), jump * length / rays.length);
        errors[2] += jump;
        return new Mended(
                SecondVariation.momentum(rays[0].start()).unit(),
                rays[rays.length - 1].direction(),
                optical,
                length,
                residual,
                trail,
                errors);
    }
}
