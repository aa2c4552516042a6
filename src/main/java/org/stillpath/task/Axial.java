package org.stillpath.task;

import org.stillpath.geometry.Vector;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.ray.Action;
import org.stillpath.ray.Element;
import org.stillpath.ray.Ending;
import org.stillpath.ray.RayStart;
import org.stillpath.ray.Status;
import org.stillpath.ray.Traced;
import org.stillpath.ray.Tracer;
import org.stillpath.ray.Train;

/**
 * What the ray along a train's axis tells, traced twice so that its error is known.
 *
 * @param x Gaussian constants of the xz section; {@code y} of the yz section, {@code mean} of both
 * @param astigmatic whether the two sections differ
 * @param turned whether the train turns its meridians into each other
 * @param error of the matrix elements, lengths against the scale
 * @param scale length that "far" is judged against, metres
 * @param ray the ray, with its transfer from the first vertex to behind the last
 * @param accurate whether the asked accuracy was reached
 */
record Axial(
        Gaussian x,
        Gaussian y,
        Gaussian mean,
        boolean astigmatic,
        boolean turned,
        double error,
        double scale,
        Traced ray,
        boolean accurate) {
    static final double ROUNDING = 4e-16;
    private static final double SAME = 1e-9;
    /** Tolerance of the pass that the ray-transfer is compared with, over the accuracy: ten times that of the ray's own. */
    private static final double ROUGHER = 0.1;

    /**
     * Traces the axis of a train.
     *
     * @param train with one surface or more
     * @param asked accuracy
     * @param place of the train in the job, for faults
     * @throws ProblemException if light along the axis does not come through
     */
    static Axial of(Train train, double asked, Place place) {
        Tracer tracer = new Tracer(train, new Ending.BehindLastSurface(), new Tracer.Settings(asked, true, false));
        Vector first = train.elements().get(0).surface().vertex();
        RayStart start = RayStart.of(new Vector(0, 0, first.z()), Vector.Z);
        Traced fine = through(tracer.trace(start), place);
        // one pass is enough to compare with: its steps are others than those of the fine ray
        Traced rough = through(tracer.glance(start, ROUGHER * asked), place);
        double[][] m = fine.transfer();
        double[][] r = rough.transfer();
        double before = norm(fine.start());
        double behind = norm(fine.state());
        Gaussian x = meridian(m, 0, before, behind);
        Gaussian y = meridian(m, 1, before, behind);
        double scale = scale(train, fine);
        double error = Math.max(
                        x.difference(meridian(r, 0, before, behind), scale),
                        y.difference(meridian(r, 1, before, behind), scale))
                + ROUNDING * (4 + train.elements().size()) * (1 + Math.abs(x.a()) + Math.abs(x.d()));
        double skew = Math.max(Math.abs(m[0][1]), Math.abs(m[2][1]) * scale)
                + Math.max(Math.abs(m[0][3]) / scale, Math.abs(m[2][3]));
        return new Axial(
                x,
                y,
                Gaussian.mean(x, y),
                x.difference(y, scale) > SAME,
                skew > SAME,
                error,
                scale,
                fine,
                fine.accurate() && error <= Math.max(100 * asked, 1e-11));
    }

    /** Where the axis leaves the last surface. */
    Vector last() {
        return ray.position();
    }

    /** Error of the back focal distance, metres. */
    double backFocalError() {
        double power = Math.abs(mean.power());
        return error / power * (mean.behind() + Math.abs(mean.backFocalDistance()) / scale);
    }

    private static double norm(double[] y) {
        return Math.sqrt(y[3] * y[3] + y[4] * y[4] + y[5] * y[5]);
    }

    private static Gaussian meridian(double[][] m, int i, double before, double behind) {
        return new Gaussian(m[i][i], m[i][i + 2], m[i + 2][i], m[i + 2][i + 2], before, behind);
    }

    private static Traced through(Traced t, Place place) {
        if (t.status() != Status.ARRIVED) {
            throw new ProblemException(Problem.input(
                    place,
                    "train",
                    "light along the axis does not come through, so the train has no Gaussian constants: "
                            + t.status().word() + ", " + t.note()));
        }
        return t;
    }

    /** Length that "far" is judged against: the train's own, or where it has none, of its curvatures or focal lengths. */
    private static double scale(Train of, Traced axial) {
        double track = axial.length();
        if (track > 0) {
            return track;
        }
        double least = Double.POSITIVE_INFINITY;
        for (Element e : of.elements()) {
            double c = e.surface().form().curvature();
            least = Math.min(least, c > 0 ? 1 / c : Double.POSITIVE_INFINITY);
            if (e.action() instanceof Action.ThinLens lens) {
                least = Math.min(least, Math.abs(lens.focalLength()));
            }
        }
        return Double.isFinite(least) ? least : 1;
    }
}
