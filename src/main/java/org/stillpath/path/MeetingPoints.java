package org.stillpath.path;

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
import org.stillpath.ray.Element;
import org.stillpath.ray.Train;

/**
 * What a path of straight segments is as a function of its meeting points with the surfaces alone: the Hessian of Σ n |Δx|
 * over the points, each bound to its surface (Lagrange's multiplier times the surface's curvature), in the tangent planes.
 */
final class MeetingPoints {
    private static final double NULL_DIRECTION = 1e-6;

    private MeetingPoints() {}

    /**
     * The kind of the path.
     *
     * @param train all of uniform media, or nothing is said
     * @param trail start, meeting points and end
     * @param normal confines the points to a plane
     */
    static StationaryPath.Kind kind(Train train, double[] trail, Optional<Vector> normal) {
        List<Element> elements = train.elements();
        int count = elements.size();
        boolean straight = train.from().uniform()
                && elements.stream().allMatch(e -> e.into().uniform() && !(e.action() instanceof Action.ThinLens))
                && trail.length == 3 * (count + 2);
        if (count == 0 || !straight) {
            return StationaryPath.Kind.NONE;
        }
        Vector[] x = new Vector[count + 2];
        for (int i = 0; i < x.length; i++) {
            x[i] = new Vector(trail[3 * i], trail[3 * i + 1], trail[3 * i + 2]);
        }
        double[] n = new double[count + 1];
        IndexField field = train.from();
        for (int i = 0; i <= count; i++) {
            n[i] = index(field, x[i]);
            if (i < count && elements.get(i).action() instanceof Action.Refract) {
                field = elements.get(i).into();
            }
        }
        int width = normal.isPresent() ? 1 : 2;
        RealMatrix hessian = MatrixUtils.createRealMatrix(width * count, width * count);
        Vector[][] tangents = new Vector[count][];
        for (int i = 0; i < count; i++) {
            tangents[i] = tangents(elements.get(i).surface(), x[i + 1], normal);
        }
        for (int i = 0; i < count; i++) {
            Vector before = x[i + 1].minus(x[i]);
            Vector behind = x[i + 2].minus(x[i + 1]);
            double[] f = new double[10];
            elements.get(i).surface().evaluate(x[i + 1].x(), x[i + 1].y(), x[i + 1].z(), f);
            Vector gradient = new Vector(f[1], f[2], f[3]);
            Vector force = before.unit().times(n[i]).minus(behind.unit().times(n[i + 1]));
            double multiplier = force.dot(gradient) / gradient.dot(gradient);
            for (int a = 0; a < width; a++) {
                for (int b = 0; b < width; b++) {
                    double sum = n[i] * second(before, tangents[i][a], tangents[i][b])
                            + n[i + 1] * second(behind, tangents[i][a], tangents[i][b])
                            - multiplier * curvature(f, tangents[i][a], tangents[i][b]);
                    hessian.setEntry(width * i + a, width * i + b, sum);
                    if (i + 1 < count) {
                        double mixed = -n[i + 1] * second(behind, tangents[i][a], tangents[i + 1][b]);
                        hessian.setEntry(width * i + a, width * (i + 1) + b, mixed);
                        hessian.setEntry(width * (i + 1) + b, width * i + a, mixed);
                    }
                }
            }
        }
        return kind(new EigenDecompositionSymmetric(hessian).getEigenvalues());
    }

    private static StationaryPath.Kind kind(double[] eigenvalues) {
        double largest = Arrays.stream(eigenvalues).map(Math::abs).max().orElse(0);
        double smallest = Arrays.stream(eigenvalues).map(Math::abs).min().orElse(0);
        if (smallest < NULL_DIRECTION * largest) {
            return StationaryPath.Kind.DEGENERATE;
        }
        long negative = Arrays.stream(eigenvalues).filter(v -> v < 0).count();
        return negative == 0
                ? StationaryPath.Kind.MINIMUM
                : negative == eigenvalues.length ? StationaryPath.Kind.MAXIMUM : StationaryPath.Kind.SADDLE;
    }

    private static Vector[] tangents(Surface surface, Vector at, Optional<Vector> normal) {
        double[] f = new double[10];
        surface.evaluate(at.x(), at.y(), at.z(), f);
        Vector up = new Vector(f[1], f[2], f[3]).unit();
        if (normal.isPresent()) {
            return new Vector[] {normal.get().cross(up).unit()};
        }
        Vector a = up.perpendicular();
        return new Vector[] {a, up.cross(a)};
    }

    /** aᵀ(1 − d dᵀ)b/|Δ| for a segment Δ of direction d. */
    private static double second(Vector segment, Vector a, Vector b) {
        double length = segment.norm();
        Vector d = segment.times(1 / length);
        return (a.dot(b) - a.dot(d) * b.dot(d)) / length;
    }

    private static double curvature(double[] f, Vector a, Vector b) {
        return a.x() * (f[4] * b.x() + f[5] * b.y() + f[6] * b.z())
                + a.y() * (f[5] * b.x() + f[7] * b.y() + f[8] * b.z())
                + a.z() * (f[6] * b.x() + f[8] * b.y() + f[9] * b.z());
    }

    private static double index(IndexField field, Vector q) {
        Samples s = new Samples(1);
        field.sample(new double[] {q.x()}, new double[] {q.y()}, new double[] {q.z()}, 1, Order.VALUE, s);
        return Math.sqrt(1 + s.value[0]);
    }
}
