package org.stillpath.task;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import java.util.TreeMap;
import java.util.stream.IntStream;
import org.stillpath.geometry.Vector;
import org.stillpath.ray.RayStart;
import org.stillpath.ray.Status;
import org.stillpath.ray.Traced;
import org.stillpath.ray.Tracer;
import org.stillpath.wave.Pupil;
import org.stillpath.wave.Wavefront;

/**
 * The rays of one point of the object over the pupil, as straight lines behind the last surface. Weights are shares of the
 * pupil's area; rays that do not come through are counted, and left out of averages.
 *
 * <p>Rays are traced once. How good they are is known from the edge of the pupil and its centre, which are traced twice and
 * told apart; a second trace of every ray would double the cost and say the same.
 */
final class Bundle {
    /** Rays of the rim that are traced twice, at most twice as many. */
    private static final int MOST_TWICE = 32;
    /** Difference of two distances from the centroid, over them, up to which they are one. */
    private static final double SAME_RING = 1e-6;

    private final int size;
    /** Pupil x, y, weight; place x, y, z; direction x, y, z; optical length: one array each. */
    private final double[][] rays;

    private final double index;
    private final List<Pupil.Point> lost = new ArrayList<>();
    private final Map<String, Double> reasons = new TreeMap<>();
    private final double lostWeight;
    private final Optional<Traced> chief;
    private final double positionError;
    private final double directionError;
    private final double pathError;
    private final boolean accurate;

    private Bundle(
            double[][] rays,
            int size,
            List<Pupil.Point> lost,
            Map<String, Double> reasons,
            Optional<Traced> chief,
            double index,
            double[] errors,
            boolean accurate) {
        this.rays = rays;
        this.size = size;
        this.lost.addAll(lost);
        this.reasons.putAll(reasons);
        this.lostWeight = lost.stream().mapToDouble(Pupil.Point::weight).sum();
        this.chief = chief;
        this.index = index;
        this.positionError = errors[0];
        this.directionError = errors[1];
        this.pathError = errors[2];
        this.accurate = accurate;
    }

    /**
     * Traces a bundle.
     *
     * @param source where its rays start
     * @param tracer ends behind the last surface
     * @param pupil where it is sampled, rim included
     * @param accuracy that is asked for
     */
    static Bundle of(PupilRays source, Tracer tracer, Pupil pupil, double accuracy) {
        List<Pupil.Point> points = pupil.pointsWithRim();
        double[][] rays = new double[10][points.size()];
        List<Pupil.Point> lost = new ArrayList<>();
        Map<String, Double> reasons = new TreeMap<>();
        Optional<Traced> chief = source.start(0, 0).map(tracer::trace).filter(t -> t.status() == Status.ARRIVED);
        double[] errors = new double[3];
        double index = 1;
        boolean accurate = true;
        if (chief.isPresent()) {
            index = chief.get().index();
            accurate = chief.get().accurate();
            larger(errors, chief.get());
        }
        int size = 0;
        int rim = 0;
        double tolerance = Math.max(0.01 * accuracy, 1e-15);
        for (Pupil.Point p : points) {
            Optional<RayStart> start = source.start(p.x(), p.y());
            if (start.isEmpty()) {
                lost.add(p);
                reasons.merge("no ray reaches the stop there", p.weight(), Double::sum);
                continue;
            }
            boolean told = p.weight() == 0 && rim++ % (1 + pupil.angular() / MOST_TWICE) == 0;
            Traced t = tracer.glance(start.get(), tolerance);
            if (t.status() != Status.ARRIVED) {
                lost.add(p);
                reasons.merge(reason(t), p.weight(), Double::sum);
                continue;
            }
            if (told) {
                Traced twice = tracer.trace(start.get());
                if (twice.status() == Status.ARRIVED) {
                    larger(errors, twice);
                    accurate &= twice.accurate();
                    Vector off = twice.position().minus(t.position());
                    errors[0] = Math.max(errors[0], twice.errors().position() + off.norm());
                    errors[2] = Math.max(
                            errors[2],
                            twice.errors().opticalLength() + Math.abs(twice.opticalLength() - t.opticalLength()));
                    t = twice;
                }
            }
            Vector q = t.position();
            Vector d = t.direction();
            double[] row = {p.x(), p.y(), p.weight(), q.x(), q.y(), q.z(), d.x(), d.y(), d.z(), t.opticalLength()};
            for (int k = 0; k < row.length; k++) {
                rays[k][size] = row[k];
            }
            size++;
        }
        return new Bundle(rays, size, lost, reasons, chief, index, errors, accurate);
    }

    private static void larger(double[] errors, Traced t) {
        errors[0] = Math.max(errors[0], t.errors().position());
        errors[1] = Math.max(errors[1], t.errors().direction());
        errors[2] = Math.max(errors[2], t.errors().opticalLength());
    }

    private static String reason(Traced t) {
        return t.element() < 0 ? t.status().word() : t.status().word() + " at surfaces[" + t.element() + "]";
    }

    /** Whether any light comes through. */
    boolean hasLight() {
        return lostWeight < 1 - 1e-9 && size > 0;
    }

    /** The chief ray, where it comes through. */
    Optional<Traced> chief() {
        return chief;
    }

    /** Whether the asked accuracy was reached by the rays that tell. */
    boolean accurate() {
        return accurate;
    }

    /** Places of the pupil from which no light comes through. */
    List<Pupil.Point> lost() {
        return List.copyOf(lost);
    }

    /** Share of the pupil's area from which no light comes through. */
    double lostShare() {
        return Math.min(1, lostWeight);
    }

    /** Where and how light is lost, with shares of the pupil's area, for people. */
    List<String> reasons() {
        return reasons.entrySet().stream()
                .filter(e -> e.getValue() > 0)
                .map(e -> String.format(Locale.ROOT, "%s (%.3g %%)", e.getKey(), 100 * e.getValue()))
                .toList();
    }

    /** Index of the medium behind the last surface. */
    double index() {
        return index;
    }

    /** Error of a ray's place across at a plane, metres. */
    double placeError(double z) {
        return positionError + directionError * farthest(z);
    }

    private double farthest(double z) {
        double far = 0;
        for (int i = 0; i < size; i++) {
            far = Math.max(far, Math.abs((z - rays[5][i]) / rays[8][i]));
        }
        return far;
    }

    /** Error of a path difference judged at a plane, metres. */
    double waveError(double z) {
        double longest = 0;
        for (int i = 0; i < size; i++) {
            longest = Math.max(longest, Math.abs(rays[9][i]));
        }
        double spot = hasLight() ? rms(z) : 0;
        return 2 * (pathError + index * positionError * spread() + index * directionError * spot)
                + 8 * Math.ulp(longest + farthest(z));
    }

    /** Error of direction cosines. */
    double directionError() {
        return directionError;
    }

    /** Root mean square of the slopes about their mean. */
    double spread() {
        return about(slopes(), meanSlope());
    }

    /** Places where the rays meet a plane of constant z: x and y, metres, in the order of their pupil points. */
    double[][] at(double z) {
        double[][] p = new double[2][size];
        for (int i = 0; i < size; i++) {
            double s = (z - rays[5][i]) / rays[8][i];
            p[0][i] = rays[3][i] + s * rays[6][i];
            p[1][i] = rays[4][i] + s * rays[7][i];
        }
        return p;
    }

    /** Slopes of the rays to z, along x and y, in the order of their pupil points. */
    double[][] slopes() {
        double[][] p = new double[2][size];
        for (int i = 0; i < size; i++) {
            p[0][i] = rays[6][i] / rays[8][i];
            p[1][i] = rays[7][i] / rays[8][i];
        }
        return p;
    }

    /** Weighted mean slope. */
    double[] meanSlope() {
        return centroid(slopes());
    }

    /** Index times the largest sine between a ray and the mean direction. */
    double edgeSine() {
        Vector mean = meanDirection();
        double most = 0;
        for (int i = 0; i < size; i++) {
            Vector d = new Vector(rays[6][i], rays[7][i], rays[8][i]);
            most = Math.max(most, d.cross(mean).norm());
        }
        return index * most;
    }

    /** Weighted mean of places; the weights are those of the rays. */
    private double[] centroid(double[][] p) {
        double sum = 0;
        double[] c = new double[2];
        for (int i = 0; i < size; i++) {
            sum += rays[2][i];
            c[0] += rays[2][i] * p[0][i];
            c[1] += rays[2][i] * p[1][i];
        }
        c[0] /= sum;
        c[1] /= sum;
        return c;
    }

    /** Weighted mean of the places at a plane, metres. */
    double[] centroid(double z) {
        return centroid(at(z));
    }

    /** Weight of a ray; 0 on the rim. */
    double weight(int ray) {
        return rays[2][ray];
    }

    /** Number of rays that came through. */
    int size() {
        return size;
    }

    /** Root of the mean square distance from the centroid at a plane, metres. */
    double rms(double z) {
        return about(z, centroid(z));
    }

    /** Root of the mean square distance from a point at a plane, metres. */
    double about(double z, double[] centre) {
        return about(at(z), centre);
    }

    private double about(double[][] p, double[] centre) {
        double sum = 0;
        double square = 0;
        for (int i = 0; i < size; i++) {
            sum += rays[2][i];
            square += rays[2][i]
                    * ((p[0][i] - centre[0]) * (p[0][i] - centre[0]) + (p[1][i] - centre[1]) * (p[1][i] - centre[1]));
        }
        return Math.sqrt(square / sum);
    }

    /**
     * Radius about the centroid that holds a share of the light, metres. The light of rays at one distance, as those of a ring of
     * a symmetric spot are, stands half within and half beyond it; between two distances the share grows with the area.
     */
    double encircled(double z, double share) {
        double[][] p = at(z);
        double[] c = centroid(p);
        double[] radius = new double[size];
        Arrays.setAll(radius, i -> Math.hypot(p[0][i] - c[0], p[1][i] - c[1]));
        int[] order = IntStream.range(0, size)
                .filter(i -> rays[2][i] > 0)
                .boxed()
                .sorted((a, b) -> Double.compare(radius[a], radius[b]))
                .mapToInt(Integer::intValue)
                .toArray();
        double total = Arrays.stream(order).mapToDouble(i -> rays[2][i]).sum();
        double within = 0;
        double lastShare = 0;
        double lastSquare = 0;
        int next = 0;
        while (next < order.length) {
            double r = radius[order[next]];
            double here = 0;
            while (next < order.length && radius[order[next]] <= r * (1 + SAME_RING)) {
                here += rays[2][order[next++]];
            }
            double middle = (within + 0.5 * here) / total;
            if (middle >= share) {
                return Math.sqrt(lastSquare + (share - lastShare) / (middle - lastShare) * (r * r - lastSquare));
            }
            within += here;
            lastShare = middle;
            lastSquare = r * r;
        }
        return Math.sqrt(lastSquare);
    }

    /**
     * The plane on which the rms spot radius is least, z in metres: the variance of the places is a parabola in z.
     *
     * @param near a plane near it, against which z is counted so that no digits are lost
     */
    double bestPlane(double near) {
        double[][] p = at(near);
        double[] c = centroid(p);
        double[] mean = meanSlope();
        double both = 0;
        double slopes = 0;
        for (int i = 0; i < size; i++) {
            double sx = rays[6][i] / rays[8][i] - mean[0];
            double sy = rays[7][i] / rays[8][i] - mean[1];
            both += rays[2][i] * ((p[0][i] - c[0]) * sx + (p[1][i] - c[1]) * sy);
            slopes += rays[2][i] * (sx * sx + sy * sy);
        }
        return near - both / slopes;
    }

    /** Weighted mean direction. */
    Vector meanDirection() {
        Vector sum = Vector.ZERO;
        for (int i = 0; i < size; i++) {
            sum = sum.plus(rays[2][i], new Vector(rays[6][i], rays[7][i], rays[8][i]));
        }
        return sum.unit();
    }

    /**
     * Path differences to the sphere about a point through the last vertex, less the chief ray's.
     *
     * @param centre the image point
     * @param radius of the sphere, metres
     * @param ahead whether the image point lies ahead of the light at the last vertex (real) or behind it (virtual)
     * @param chief the chief ray
     */
    Wavefront toSphere(Vector centre, double radius, boolean ahead, Traced chief) {
        return wave(chief, (q, d) -> {
            Vector o = q.minus(centre);
            double b = o.dot(d);
            // (|o|² − R²) without the loss of digits of two large squares
            double norm = o.norm();
            double c = (norm - radius) * (norm + radius);
            double root = Math.sqrt(Math.max(0, b * b - c));
            // the root of s² + 2bs + c that is not a difference of near equals
            return ahead ? (b < 0 ? c / (root - b) : -b - root) : (b > 0 ? -c / (b + root) : -b + root);
        });
    }

    /** Path differences to the plane across a direction through a point, less the chief ray's. */
    Wavefront toPlane(Vector through, Vector normal, Traced chief) {
        return wave(chief, (q, d) -> through.minus(q).dot(normal) / d.dot(normal));
    }

    /** Distance along a ray to a surface. */
    private interface Reach {
        double to(Vector place, Vector direction);
    }

    private Wavefront wave(Traced chief, Reach reach) {
        double zero = chief.opticalLength() + index * reach.to(chief.position(), chief.direction());
        double[] x = new double[size];
        double[] y = new double[size];
        double[] weight = new double[size];
        double[] path = new double[size];
        for (int i = 0; i < size; i++) {
            Vector q = new Vector(rays[3][i], rays[4][i], rays[5][i]);
            Vector d = new Vector(rays[6][i], rays[7][i], rays[8][i]);
            x[i] = rays[0][i];
            y[i] = rays[1][i];
            weight[i] = rays[2][i];
            path[i] = rays[9][i] + index * reach.to(q, d) - zero;
        }
        return new Wavefront(x, y, weight, path);
    }
}
