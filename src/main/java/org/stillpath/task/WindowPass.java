package org.stillpath.task;

import java.util.List;
import org.stillpath.geometry.Vector;
import org.stillpath.ray.Ending;
import org.stillpath.ray.RayStart;
import org.stillpath.ray.Status;
import org.stillpath.ray.Traced;
import org.stillpath.ray.Tracer;
import org.stillpath.ray.Train;

/**
 * A beam behind a train: its rays, and what they say of it together. Rays go in bundles where there are many, on all cores, twice
 * each as {@link Tracer#trace(List)} does it; the digits do not depend on how many cores there are.
 */
final class WindowPass {
    private final List<Traced> rays;
    private final Traced.Errors errors;
    private final double[] weights;
    private final double plane;
    private final Vector direction;
    private final double power;
    private final double[][] transfer;
    private final double transferError;
    private final boolean accurate;

    private WindowPass(
            List<Traced> rays,
            Traced.Errors errors,
            double[] weights,
            double plane,
            Vector direction,
            double[][] transfer,
            double transferError,
            boolean accurate) {
        this.rays = rays;
        this.errors = errors;
        this.weights = weights;
        this.plane = plane;
        this.direction = direction;
        this.transfer = transfer;
        this.transferError = transferError;
        this.accurate = accurate;
        double sum = 0;
        for (double w : weights) {
            sum += w;
        }
        this.power = sum;
    }

    /**
     * Traces a beam.
     *
     * @param train what it goes through
     * @param starts its rays, the axis last
     * @param weights of the rays, irradiance times area
     * @param plane z of the plane on which the beam is judged, metres
     * @param accuracy asked
     */
    static WindowPass of(Train train, List<RayStart> starts, double[] weights, double plane, double accuracy) {
        Ending ending = train.elements().isEmpty() ? new Ending.AtZ(plane) : new Ending.BehindLastSurface();
        Tracer tracer = new Tracer(train, ending, new Tracer.Settings(accuracy, false, false));
        int count = starts.size() - 1;
        List<Traced> rays = tracer.trace(starts.subList(0, count));
        RayStart axis = starts.get(count);
        Traced fine = new Tracer(train, ending, new Tracer.Settings(accuracy, true, false)).trace(axis);
        double loose = Math.min(0.1, 10 * accuracy);
        Traced rough = new Tracer(train, ending, new Tracer.Settings(loose, true, false)).trace(axis);
        boolean passes = fine.status() == Status.ARRIVED && fine.hasTransfer() && rough.hasTransfer();
        double[][] m = passes ? fine.transfer() : new double[0][];
        double error = 0;
        if (passes) {
            double[][] r = rough.transfer();
            for (int i = 2; i < 4; i++) {
                for (int j = 0; j < 2; j++) {
                    error = Math.max(error, Math.abs(m[i][j] - r[i][j]));
                }
            }
            double length = fine.length();
            error += 4e-16 * (4 + train.elements().size()) / length + 4e-16 * Math.abs(m[2][0]);
        }
        Vector sum = Vector.ZERO;
        double[] kept = new double[count];
        for (int i = 0; i < count; i++) {
            Traced t = rays.get(i);
            if (t.status() == Status.ARRIVED) {
                kept[i] = weights[i];
                sum = sum.plus(weights[i], t.direction());
            }
        }
        return new WindowPass(
                rays,
                largest(rays),
                kept,
                plane,
                sum.norm() > 0 ? sum.unit() : axis.direction(),
                m,
                error,
                rays.stream().allMatch(Traced::accurate));
    }

    private static Traced.Errors largest(List<Traced> rays) {
        double[] most = new double[5];
        for (Traced t : rays) {
            if (t.status() == Status.ARRIVED) {
                Traced.Errors e = t.errors();
                double[] own = {e.position(), e.direction(), e.opticalLength(), e.length(), e.drift()};
                for (int i = 0; i < most.length; i++) {
                    most[i] = Math.max(most[i], own[i]);
                }
            }
        }
        return new Traced.Errors(most[0], most[1], most[2], most[3], most[4]);
    }

    /** Whether any weighted ray came through. */
    boolean passes() {
        return power > 0;
    }

    /** Whether a ray came through. */
    boolean arrived(int ray) {
        return rays.get(ray).status() == Status.ARRIVED;
    }

    /** What became of a ray. */
    Traced ray(int ray) {
        return rays.get(ray);
    }

    /** The mean direction, weighted by irradiance; a unit vector. */
    Vector direction() {
        return direction;
    }

    /** Where the beam is judged, as the mean place of its rays there, weighted by irradiance. */
    Vector place() {
        Vector sum = Vector.ZERO;
        for (int i = 0; i < weights.length; i++) {
            if (weights[i] > 0) {
                Traced t = rays.get(i);
                Vector d = t.direction();
                Vector p = t.position();
                sum = sum.plus(weights[i] / power, p.plus((plane - p.z()) / d.z(), d));
            }
        }
        return sum;
    }

    /** Optical length of a ray to the plane across the mean direction through a point, metres. */
    double path(int ray, Vector through) {
        Traced t = rays.get(ray);
        Vector rest = through.minus(t.position());
        return t.opticalLength()
                + t.index() * rest.dot(direction) / t.direction().dot(direction);
    }

    /** Minus d(p)/d(height) about the axis, in the xz section for 0, in the yz section for 1; NaN where the axis is blocked. */
    double focalPower(int section) {
        return transfer.length == 0 ? Double.NaN : -transfer[2 + section][section];
    }

    double transferError() {
        return transferError;
    }

    /** The largest errors of the rays. */
    Traced.Errors errors() {
        return errors;
    }

    boolean accurate() {
        return accurate;
    }
}
