package org.stillpath.path;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Optional;
import org.hipparchus.linear.EigenDecompositionSymmetric;
import org.hipparchus.linear.MatrixUtils;
import org.hipparchus.linear.RealMatrix;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;
import org.stillpath.ray.Action;
import org.stillpath.ray.Columns;
import org.stillpath.ray.Element;
import org.stillpath.ray.Ending;
import org.stillpath.ray.RayStart;
import org.stillpath.ray.State;
import org.stillpath.ray.Status;
import org.stillpath.ray.Traced;
import org.stillpath.ray.Tracer;
import org.stillpath.ray.Train;

/**
 * The second variation of the optical length of a stationary path, as a finite matrix (Morse's reduction; Milnor, <i>Morse
 * Theory</i>, section 15; the pieces' characteristic functions after Luneburg).
 *
 * <p>The path is cut at its surfaces, and within media into pieces so short that none holds a point conjugate to its start: by
 * Sturm's comparison those on which ω Δτ stays below π, −ω² the least eigenvalue of ½∇∇n². The optical length is then a
 * function of the cut points, across the path, and of the meeting points, in their surfaces. With a piece's transfer matrix
 * (A, B; C, D) across the ray its second derivatives are B⁻¹A, −B⁻¹ and D B⁻¹; a surface adds its curvature times the jump
 * of the momentum. The matrix is block-tridiagonal; its negative directions are counted by elimination (Haynsworth's
 * additivity of inertia), and shares no code with the count of conjugate points.
 */
final class SecondVariation {
    private static final double NULL_DIRECTION = 1e-6;
    private static final double TOLERANCE = 1e-8;
    /** Most that ω Δτ may be on a piece; well below π, since ω is sampled at three places. */
    private static final double LONGEST_PHASE = 1;

    private static final int PIECES = 8;
    private static final int DEEPEST = 12;

    private final Train train;
    private final Vector from;
    private final Columns columns;
    private final int width;
    private final Samples sample = new Samples(1);
    private final double[] f = new double[10];

    /**
     * What is found.
     *
     * @param negative number of independent ways of bending the path that shorten it
     * @param overInterfaces the kind over the meeting points alone; {@link StationaryPath.Kind#NONE} where there are none
     */
    record Counts(int negative, StationaryPath.Kind overInterfaces) {}

    /** Where pieces join: along unit vectors that span where the point may go. */
    record Station(Vector[] tangents, double[][] bend) {}

    /** A piece: its transfer across the ray by 2×2 blocks, and places, momenta and forces at both ends. */
    record Piece(
            double[][] a,
            double[][] b,
            double[][] d,
            Vector[] startAxes,
            Vector[] endAxes,
            Vector startMomentum,
            Vector endMomentum,
            Vector startForce,
            Vector endForce,
            double[][] c) {}

    SecondVariation(Train train, Vector from, Optional<Vector> normal) {
        this.train = train;
        this.from = from;
        this.columns = normal.map(Columns.ACROSS::in).orElse(Columns.ACROSS);
        this.width = normal.isPresent() ? 1 : 2;
    }

    /** Directions in which a joint may move: two, or one in a plane. */
    int width() {
        return width;
    }

    /** How columns start. */
    Columns columns() {
        return columns;
    }

    /**
     * Counts.
     *
     * @param train what the path meets
     * @param from its start, metres
     * @param launch its direction there
     * @param length its geometric length, metres
     * @param normal confines bends to a plane
     * @return nothing where an ideal thin lens stands in the way, whose added length is no function of the meeting point alone
     */
    static Optional<Counts> of(Train train, Vector from, Vector launch, double length, Optional<Vector> normal) {
        if (train.elements().stream().anyMatch(e -> e.action() instanceof Action.ThinLens)) {
            return Optional.empty();
        }
        return new SecondVariation(train, from, normal).counts(launch, length);
    }

    /**
     * A path cut to pieces.
     *
     * @param legs the pieces, in order
     * @param joints what lies between them, one less
     */
    record Chain(List<Leg> legs, List<Joint> joints) {}

    /** A piece with where it starts, in which medium, and how long it is. */
    record Leg(Piece piece, IndexField field, RayStart start, double length) {}

    /** Where two pieces join: at a surface, or within a medium. */
    record Joint(Station station, Optional<Surface> surface) {}

    private Optional<Counts> counts(Vector launch, double length) {
        return chain(launch, length).flatMap(chain -> {
            List<Piece> pieces = chain.legs.stream().map(Leg::piece).toList();
            List<Station> stations = chain.joints.stream().map(Joint::station).toList();
            int negative = negative(pieces, stations);
            List<Piece> segments = new ArrayList<>();
            List<Station> surfaces = new ArrayList<>();
            int first = 0;
            for (int i = 0; i <= stations.size(); i++) {
                if (i == stations.size() || chain.joints.get(i).surface().isPresent()) {
                    segments.add(joined(pieces.subList(first, i + 1)));
                    first = i + 1;
                    if (i < stations.size()) {
                        surfaces.add(stations.get(i));
                    }
                }
            }
            StationaryPath.Kind over = surfaces.isEmpty() ? StationaryPath.Kind.NONE : kind(dense(segments, surfaces));
            return negative < 0 ? Optional.empty() : Optional.of(new Counts(negative, over));
        });
    }

    /** Cuts the path with this launch and length; nothing where it does not get that far. */
    Optional<Chain> chain(Vector launch, double length) {
        List<Leg> legs = new ArrayList<>();
        List<Joint> joints = new ArrayList<>();
        IndexField field = train.from();
        RayStart start = RayStart.of(from, launch);
        double done = 0;
        List<Element> elements = train.elements();
        for (int i = 0; i <= elements.size(); i++) {
            boolean last = i == elements.size();
            if (!last && elements.get(i).action() instanceof Action.Stop) {
                continue;
            }
            double to = length;
            Vector before = Vector.ZERO;
            Vector behind = Vector.ZERO;
            RayStart next = start;
            if (!last) {
                Train some = new Train(train.from(), elements.subList(0, i + 1));
                Traced at = glance(some, new Ending.AtLastSurface(), RayStart.of(from, launch));
                Traced past = glance(some, new Ending.BehindLastSurface(), RayStart.of(from, launch));
                if (at.status() != Status.ARRIVED || past.status() != Status.ARRIVED) {
                    return Optional.empty();
                }
                to = at.length();
                before = momentum(at.state());
                behind = momentum(past.state());
                next = RayStart.of(past.position(), past.direction());
            }
            List<Leg> own = new ArrayList<>();
            if (!cut(field, start, to - done, own)) {
                return Optional.empty();
            }
            for (int k = 1; k < own.size(); k++) {
                joints.add(new Joint(new Station(own.get(k).piece.startAxes, new double[2][2]), Optional.empty()));
            }
            legs.addAll(own);
            if (last) {
                break;
            }
            Element e = elements.get(i);
            joints.add(new Joint(station(e.surface(), next.position(), before, behind), Optional.of(e.surface())));
            if (e.action() instanceof Action.Refract && !reflected(e.surface(), next.position(), before, behind)) {
                field = e.into();
            }
            start = next;
            done = to;
        }
        return Optional.of(new Chain(legs, joints));
    }

    Traced glance(Train through, Ending ending, RayStart start) {
        return new Tracer(through, ending, new Tracer.Settings(10 * TOLERANCE, true, false, columns, 100))
                .glance(start, TOLERANCE);
    }

    static Vector momentum(double[] y) {
        return new Vector(y[3], y[4], y[5]);
    }

    // ---- pieces

    private boolean cut(IndexField field, RayStart start, double length, List<Leg> legs) {
        if (!(length > 0)) {
            return false;
        }
        int parts = field.uniform() ? 1 : PIECES;
        RayStart at = start;
        for (int i = 0; i < parts; i++) {
            Optional<RayStart> next = cut(field, at, length / parts, legs, field.uniform() ? DEEPEST : 0);
            if (next.isEmpty()) {
                return false;
            }
            at = next.get();
        }
        return true;
    }

    /** Cuts on until no piece can hold a conjugate point; returns where the next one starts. */
    private Optional<RayStart> cut(IndexField field, RayStart start, double length, List<Leg> legs, int depth) {
        Traced ray = glance(Train.through(field), new Ending.AtLength(length), start);
        if (ray.status() != Status.ARRIVED) {
            return Optional.empty();
        }
        RayStart end = RayStart.of(ray.position(), ray.direction());
        if (depth < DEEPEST) {
            Vector middle = start.position().plus(end.position()).times(0.5);
            double rate =
                    Math.max(rate(field, middle), Math.max(rate(field, start.position()), rate(field, end.position())));
            if (rate * length / ray.index() > LONGEST_PHASE) {
                return cut(field, start, 0.5 * length, legs, depth + 1)
                        .flatMap(half -> cut(field, half, 0.5 * length, legs, depth + 1));
            }
        }
        legs.add(new Leg(piece(ray, field), field, start, length));
        return Optional.of(end);
    }

    /** ω, with −ω² the least eigenvalue of ½∇∇n², bounded by the matrix' norm; 1/m. */
    private double rate(IndexField field, Vector q) {
        field.sample(new double[] {q.x()}, new double[] {q.y()}, new double[] {q.z()}, 1, Order.HESSIAN, sample);
        double square = sample.hxx[0] * sample.hxx[0]
                + sample.hyy[0] * sample.hyy[0]
                + sample.hzz[0] * sample.hzz[0]
                + 2 * (sample.hxy[0] * sample.hxy[0] + sample.hxz[0] * sample.hxz[0] + sample.hyz[0] * sample.hyz[0]);
        return Math.sqrt(Math.sqrt(square));
    }

    Piece piece(Traced ray, IndexField field) {
        double[] y = ray.state();
        double[] first = ray.start();
        double[] g = ray.force();
        Vector p = momentum(y);
        Vector force = new Vector(g[0], g[1], g[2]);
        Vector[] startAxes = vectors(columns.axes(first[3], first[4], first[5]));
        Vector[] endAxes = vectors(columns.axes(y[3], y[4], y[5]));
        double[][][] blocks = new double[4][2][2];
        for (int c = 0; c < 4; c++) {
            int at = State.COLUMNS + State.COLUMN * c;
            Vector dq = new Vector(y[at], y[at + 1], y[at + 2]);
            Vector dp = new Vector(y[at + 3], y[at + 4], y[at + 5]);
            double along = dq.dot(p) / p.dot(p);
            for (int r = 0; r < 2; r++) {
                blocks[c < 2 ? 0 : 1][r][c % 2] = endAxes[r].dot(dq.plus(-along, p));
                blocks[c < 2 ? 2 : 3][r][c % 2] = endAxes[r].dot(dp.plus(-along, force));
            }
        }
        field.sample(
                new double[] {first[0]}, new double[] {first[1]}, new double[] {first[2]}, 1, Order.GRADIENT, sample);
        Vector startForce = new Vector(sample.gx[0], sample.gy[0], sample.gz[0]);
        return new Piece(
                blocks[0], blocks[1], blocks[3], startAxes, endAxes, momentum(first), p, startForce, force, blocks[2]);
    }

    private static Vector[] vectors(double[][] axes) {
        return new Vector[] {
            new Vector(axes[0][0], axes[0][1], axes[0][2]), new Vector(axes[1][0], axes[1][1], axes[1][2])
        };
    }

    /** Pieces that follow each other as one. */
    private static Piece joined(List<Piece> pieces) {
        Piece sum = pieces.get(0);
        for (Piece p : pieces.subList(1, pieces.size())) {
            sum = new Piece(
                    plus(times(p.a, sum.a), times(p.b, sum.c)),
                    plus(times(p.a, sum.b), times(p.b, sum.d)),
                    plus(times(p.c, sum.b), times(p.d, sum.d)),
                    sum.startAxes,
                    p.endAxes,
                    sum.startMomentum,
                    p.endMomentum,
                    sum.startForce,
                    p.endForce,
                    plus(times(p.c, sum.a), times(p.d, sum.c)));
        }
        return sum;
    }

    // ---- stations

    Station station(Surface surface, Vector at, Vector before, Vector behind) {
        surface.evaluate(at.x(), at.y(), at.z(), f);
        Vector gradient = new Vector(f[1], f[2], f[3]);
        Vector up = gradient.unit();
        Vector a = width == 1
                ? new Vector(
                                columns.normal().x(),
                                columns.normal().y(),
                                columns.normal().z())
                        .cross(up)
                        .unit()
                : up.perpendicular();
        Vector[] tangents = {a, up.cross(a)};
        double multiplier = before.minus(behind).dot(gradient) / gradient.dot(gradient);
        double[][] bend = new double[2][2];
        for (int i = 0; i < 2; i++) {
            for (int j = 0; j < 2; j++) {
                bend[i][j] = -multiplier * curvature(tangents[i], tangents[j]);
            }
        }
        return new Station(tangents, bend);
    }

    private double curvature(Vector a, Vector b) {
        return a.x() * (f[4] * b.x() + f[5] * b.y() + f[6] * b.z())
                + a.y() * (f[5] * b.x() + f[7] * b.y() + f[8] * b.z())
                + a.z() * (f[6] * b.x() + f[8] * b.y() + f[9] * b.z());
    }

    private boolean reflected(Surface surface, Vector at, Vector before, Vector behind) {
        surface.evaluate(at.x(), at.y(), at.z(), f);
        Vector gradient = new Vector(f[1], f[2], f[3]);
        return before.dot(gradient) * behind.dot(gradient) < 0;
    }

    // ---- the matrix

    /** The block of one station: both pieces that meet there, and the surface's bend. */
    double[][] diagonal(Piece in, Station s, Piece out) {
        double[][] atEnd = times(in.d, inverse(in.b));
        double[][] atStart = times(inverse(out.b), out.a);
        double[][] h = new double[width][width];
        for (int i = 0; i < width; i++) {
            for (int j = 0; j < width; j++) {
                h[i][j] = s.bend[i][j]
                        + second(atEnd, in.endAxes, in.endMomentum, in.endForce, 1, s.tangents[i], s.tangents[j])
                        + second(
                                atStart,
                                out.startAxes,
                                out.startMomentum,
                                out.startForce,
                                -1,
                                s.tangents[i],
                                s.tangents[j]);
            }
        }
        return h;
    }

    /** ξᵀ W η, with W the second derivatives across the ray, and W p = ±f along it. */
    private double second(double[][] w, Vector[] axes, Vector p, Vector force, double sign, Vector xi, Vector eta) {
        double pp = p.dot(p);
        double alpha = xi.dot(p) / pp;
        double beta = eta.dot(p) / pp;
        double sum = sign
                * (alpha * force.dot(eta.plus(-beta, p))
                        + beta * force.dot(xi.plus(-alpha, p))
                        + alpha * beta * force.dot(p));
        for (int i = 0; i < width; i++) {
            for (int j = 0; j < width; j++) {
                sum += axes[i].dot(xi) * w[i][j] * axes[j].dot(eta);
            }
        }
        return sum;
    }

    /** The block between the station where a piece starts and that where it ends. */
    double[][] between(Station a, Piece piece, Station b) {
        double[][] inverse = inverse(piece.b);
        double[][] h = new double[width][width];
        for (int i = 0; i < width; i++) {
            for (int j = 0; j < width; j++) {
                for (int k = 0; k < width; k++) {
                    for (int l = 0; l < width; l++) {
                        h[i][j] -= piece.startAxes[k].dot(a.tangents[i])
                                * inverse[k][l]
                                * piece.endAxes[l].dot(b.tangents[j]);
                    }
                }
            }
        }
        return h;
    }

    /** Number of negative directions, by elimination block after block; −1 where a block is not finite. */
    private int negative(List<Piece> pieces, List<Station> stations) {
        int count = 0;
        double[][] before = new double[width][width];
        for (int i = 0; i < stations.size(); i++) {
            double[][] h = diagonal(pieces.get(i), stations.get(i), pieces.get(i + 1));
            double size = norm(h);
            if (i > 0) {
                double[][] link = between(stations.get(i - 1), pieces.get(i), stations.get(i));
                double[][] drop = times(transposed(link), times(inverse(before), link));
                for (int r = 0; r < width; r++) {
                    for (int c = 0; c < width; c++) {
                        h[r][c] -= drop[r][c];
                    }
                }
            }
            for (double value : eigenvalues(h)) {
                if (!Double.isFinite(value)) {
                    return -1;
                }
                count += value < -NULL_DIRECTION * size ? 1 : 0;
            }
            before = h;
        }
        return count;
    }

    private RealMatrix dense(List<Piece> pieces, List<Station> stations) {
        int n = stations.size();
        RealMatrix m = MatrixUtils.createRealMatrix(width * n, width * n);
        for (int i = 0; i < n; i++) {
            put(m, i, i, diagonal(pieces.get(i), stations.get(i), pieces.get(i + 1)));
            if (i > 0) {
                double[][] link = between(stations.get(i - 1), pieces.get(i), stations.get(i));
                put(m, i - 1, i, link);
                put(m, i, i - 1, transposed(link));
            }
        }
        return m;
    }

    private void put(RealMatrix m, int i, int j, double[][] block) {
        for (int r = 0; r < width; r++) {
            for (int c = 0; c < width; c++) {
                m.setEntry(width * i + r, width * j + c, block[r][c]);
            }
        }
    }

    private static StationaryPath.Kind kind(RealMatrix hessian) {
        for (double[] row : hessian.getData()) {
            for (double v : row) {
                if (!Double.isFinite(v)) {
                    return StationaryPath.Kind.DEGENERATE;
                }
            }
        }
        RealMatrix symmetric = hessian.add(hessian.transpose()).scalarMultiply(0.5);
        double[] values = new EigenDecompositionSymmetric(symmetric).getEigenvalues();
        double largest = Arrays.stream(values).map(Math::abs).max().orElse(0);
        double smallest = Arrays.stream(values).map(Math::abs).min().orElse(0);
        if (smallest < NULL_DIRECTION * largest) {
            return StationaryPath.Kind.DEGENERATE;
        }
        long negative = Arrays.stream(values).filter(v -> v < 0).count();
        return negative == 0
                ? StationaryPath.Kind.MINIMUM
                : negative == values.length ? StationaryPath.Kind.MAXIMUM : StationaryPath.Kind.SADDLE;
    }

    // ---- small matrices, of one row or two

    private double[] eigenvalues(double[][] m) {
        if (width == 1) {
            return new double[] {m[0][0]};
        }
        double mean = 0.5 * (m[0][0] + m[1][1]);
        double spread = Math.hypot(0.5 * (m[0][0] - m[1][1]), 0.5 * (m[0][1] + m[1][0]));
        return new double[] {mean - spread, mean + spread};
    }

    private double norm(double[][] m) {
        double sum = 0;
        for (int r = 0; r < width; r++) {
            for (int c = 0; c < width; c++) {
                sum += m[r][c] * m[r][c];
            }
        }
        return Math.sqrt(sum);
    }

    double[][] inverse(double[][] m) {
        if (width == 1) {
            return new double[][] {{1 / m[0][0], 0}, {0, 0}};
        }
        double det = m[0][0] * m[1][1] - m[0][1] * m[1][0];
        return new double[][] {{m[1][1] / det, -m[0][1] / det}, {-m[1][0] / det, m[0][0] / det}};
    }

    static double[][] times(double[][] a, double[][] b) {
        int n = Math.min(a.length, b.length);
        double[][] m = new double[n][n];
        for (int r = 0; r < n; r++) {
            for (int c = 0; c < n; c++) {
                for (int k = 0; k < n; k++) {
                    m[r][c] += a[r][k] * b[k][c];
                }
            }
        }
        return m;
    }

    private static double[][] plus(double[][] a, double[][] b) {
        double[][] m = new double[2][2];
        for (int r = 0; r < 2; r++) {
            for (int c = 0; c < 2; c++) {
                m[r][c] = a[r][c] + b[r][c];
            }
        }
        return m;
    }

    static double[][] transposed(double[][] m) {
        double[][] t = new double[m.length][m.length];
        for (int r = 0; r < m.length; r++) {
            for (int c = 0; c < m.length; c++) {
                t[r][c] = m[c][r];
            }
        }
        return t;
    }
}
