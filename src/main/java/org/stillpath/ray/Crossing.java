package org.stillpath.ray;

import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;

/**
 * Takes a ray and its Jacobi columns across a surface: Snell's law in vector form (Born and Wolf, <i>Principles of Optics</i>,
 * 7th ed., section 3.2.2), the mirror as the same law with the other root, and their exact linearisation with the surface's
 * curvature and both media's gradients. Holds scratch space: one object a thread.
 *
 * <p>A column at fixed τ is carried to the surface along the flow of the first medium (δτ = −N·δq/(N·p)), refracted there,
 * and carried back to fixed τ along the flow of the second, so that matrices of whole trains are symplectic to round-off.
 */
public final class Crossing {
    private final double[] f = new double[10];
    private final double[] x = new double[1];
    private final double[] y = new double[1];
    private final double[] z = new double[1];
    private final Samples before = new Samples(1);
    private final Samples after = new Samples(1);
    private final double[] n = new double[3];
    private final double[] r0 = new double[3];
    private final double[] p0 = new double[3];
    private final double[] sr = new double[3];

    /** What became of the light. */
    public enum Outcome {
        /** It went on as the surface says. */
        PASSED,
        /** It was totally reflected, and follows the reflection. */
        REFLECTED,
        /** It is totally reflected, and the state is as it was. */
        TOTAL,
        /** The index is undefined on one of the sides. */
        UNDEFINED
    }

    /**
     * Refracts.
     *
     * @param s the state on the surface; changed in place
     * @param surface the surface
     * @param from the medium before
     * @param into the medium behind
     * @param follow whether total reflection is followed
     */
    public Outcome refract(double[] s, Surface surface, IndexField from, IndexField into, boolean follow) {
        if (!prepare(s, surface, from) || !sample(into, after)) {
            return Outcome.UNDEFINED;
        }
        double c1 = s[3] * n[0] + s[4] * n[1] + s[5] * n[2];
        double squared = after.value[0] - before.value[0] + c1 * c1;
        if (squared > 0) {
            turn(s, c1, Math.copySign(Math.sqrt(squared), c1), after, false);
            return Outcome.PASSED;
        }
        if (!follow) {
            return Outcome.TOTAL;
        }
        turn(s, c1, -c1, before, true);
        return Outcome.REFLECTED;
    }

    /** Reflects; the medium stays. */
    public Outcome reflect(double[] s, Surface surface, IndexField medium) {
        if (!prepare(s, surface, medium)) {
            return Outcome.UNDEFINED;
        }
        double c1 = s[3] * n[0] + s[4] * n[1] + s[5] * n[2];
        turn(s, c1, -c1, before, true);
        return Outcome.PASSED;
    }

    /**
     * Passes an ideal thin lens. The optical length that the lens adds depends on the object, since no instrument images more
     * than one pair of surfaces sharply (Maxwell's theorem; Born and Wolf section 4.2.3); the object is taken where the
     * wavefront that the Jacobi columns carry has its centre.
     *
     * @param s the state on the lens, with all four columns; changed in place
     * @param lens the plane of the lens
     * @param focalLength f in metres
     * @param medium the medium on both sides
     * @param parallel whether the wavefront started plane, see {@link RayStart#parallel()}
     */
    public Outcome thinLens(double[] s, Surface lens, double focalLength, IndexField medium, boolean parallel) {
        if (!prepare(s, lens, medium)) {
            return Outcome.UNDEFINED;
        }
        Vector ex = lens.frame().ex();
        Vector ey = lens.frame().ey();
        Vector ez = lens.frame().ez();
        Vector place = lens.frame().fromJob(new Vector(s[0], s[1], s[2]));
        double index = Math.sqrt(1 + before.value[0]);
        double px = dot(ex, s, 3);
        double py = dot(ey, s, 3);
        double pz = dot(ez, s, 3);
        double along = Math.abs(pz);
        double sign = Math.signum(pz);
        double tx = px / along;
        double ty = py / along;
        double ux = tx - place.x() / focalLength;
        double uy = ty - place.y() / focalLength;
        s[State.EXCESS] += index
                * lensPath(place.x(), place.y(), tx, ty, ux, uy, wavefront(s, parallel) * index / along, focalLength);
        double w = Math.sqrt(1 + ux * ux + uy * uy);
        for (int c = 0; c < State.columns(s); c++) {
            int at = State.COLUMNS + State.COLUMN * c;
            double dt = toSurface(s, at);
            double dx = ex.x() * r0[0] + ex.y() * r0[1] + ex.z() * r0[2];
            double dy = ey.x() * r0[0] + ey.y() * r0[1] + ey.z() * r0[2];
            double dpx = ex.x() * p0[0] + ex.y() * p0[1] + ex.z() * p0[2];
            double dpy = ey.x() * p0[0] + ey.y() * p0[1] + ey.z() * p0[2];
            double dAlong = sign * (ez.x() * p0[0] + ez.y() * p0[1] + ez.z() * p0[2]);
            double dux = (dpx - tx * dAlong) / along - dx / focalLength;
            double duy = (dpy - ty * dAlong) / along - dy / focalLength;
            double dIndex = (before.gx[0] * r0[0] + before.gy[0] * r0[1] + before.gz[0] * r0[2]) / index;
            double dw = (ux * dux + uy * duy) / w;
            double qx = dIndex * ux / w + index * dux / w - index * ux * dw / (w * w);
            double qy = dIndex * uy / w + index * duy / w - index * uy * dw / (w * w);
            double qz = sign * (dIndex / w - index * dw / (w * w));
            double p2x = index * (ex.x() * ux + ey.x() * uy + ez.x() * sign) / w;
            double p2y = index * (ex.y() * ux + ey.y() * uy + ez.y() * sign) / w;
            double p2z = index * (ex.z() * ux + ey.z() * uy + ez.z() * sign) / w;
            s[at] = r0[0] - p2x * dt;
            s[at + 1] = r0[1] - p2y * dt;
            s[at + 2] = r0[2] - p2z * dt;
            s[at + 3] = ex.x() * qx + ey.x() * qy + ez.x() * qz - before.gx[0] * dt;
            s[at + 4] = ex.y() * qx + ey.y() * qy + ez.y() * qz - before.gy[0] * dt;
            s[at + 5] = ex.z() * qx + ey.z() * qy + ez.z() * qz - before.gz[0] * dt;
        }
        s[3] = index * (ex.x() * ux + ey.x() * uy + ez.x() * sign) / w;
        s[4] = index * (ex.y() * ux + ey.y() * uy + ez.y() * sign) / w;
        s[5] = index * (ex.z() * ux + ey.z() * uy + ez.z() * sign) / w;
        return Outcome.PASSED;
    }

    /**
     * Optical length over the index that an ideal thin lens adds so that all paths from an object point to its image are as
     * long as the one through the lens' centre. With slopes t before, u behind, place x on the lens, κ = 1/s the object's
     * inverse distance along the axis and κ′ = 1/f − κ, and t₀ = t − κx = u + κ′x the slope through the centre,
     * s(√(1+t₀²) − √(1+t²)) + s′(√(1+t₀²) − √(1+u²)), written so that s and s′ may be infinite.
     */
    private static double lensPath(
            double x, double y, double tx, double ty, double ux, double uy, double kappa, double focalLength) {
        double r2 = x * x + y * y;
        double kappaImage = 1 / focalLength - kappa;
        double cx = tx - kappa * x;
        double cy = ty - kappa * y;
        double centre = Math.sqrt(1 + cx * cx + cy * cy);
        double in = Math.sqrt(1 + tx * tx + ty * ty);
        double out = Math.sqrt(1 + ux * ux + uy * uy);
        return (kappa * r2 - 2 * (tx * x + ty * y)) / (centre + in)
                + (kappaImage * r2 + 2 * (ux * x + uy * y)) / (centre + out);
    }

    /**
     * Mean curvature of the wavefront that the columns carry, 1/m, positive where it diverges: ½ tr(P Q⁻¹)/n over the two
     * directions across the ray.
     */
    private double wavefront(double[] s, boolean parallel) {
        if (State.columns(s) < State.TRANSFER_COLUMNS) {
            throw new IllegalArgumentException("an ideal thin lens needs the four Jacobi columns of the ray");
        }
        Vector p = new Vector(s[3], s[4], s[5]);
        Vector a = p.perpendicular();
        Vector b = p.unit().cross(a);
        double pp = p.dot(p);
        int first = State.COLUMNS + State.COLUMN * (parallel ? 0 : 2);
        double[][] q = new double[2][2];
        double[][] m = new double[2][2];
        for (int c = 0; c < 2; c++) {
            int at = first + State.COLUMN * c;
            double dt = -(s[at] * s[3] + s[at + 1] * s[4] + s[at + 2] * s[5]) / pp;
            Vector dq = new Vector(s[at] + s[3] * dt, s[at + 1] + s[4] * dt, s[at + 2] + s[5] * dt);
            Vector dp = new Vector(
                    s[at + 3] + before.gx[0] * dt, s[at + 4] + before.gy[0] * dt, s[at + 5] + before.gz[0] * dt);
            q[0][c] = a.dot(dq);
            q[1][c] = b.dot(dq);
            m[0][c] = a.dot(dp);
            m[1][c] = b.dot(dp);
        }
        double det = q[0][0] * q[1][1] - q[0][1] * q[1][0];
        double trace = (m[0][0] * q[1][1] - m[0][1] * q[1][0] + m[1][1] * q[0][0] - m[1][0] * q[0][1]) / det;
        double curvature = 0.5 * trace / Math.sqrt(pp);
        return Double.isFinite(curvature) ? curvature : 0;
    }

    private boolean prepare(double[] s, Surface surface, IndexField from) {
        surface.evaluate(s[0], s[1], s[2], f);
        double size = Math.sqrt(f[1] * f[1] + f[2] * f[2] + f[3] * f[3]);
        n[0] = f[1] / size;
        n[1] = f[2] / size;
        n[2] = f[3] / size;
        for (int i = 4; i < 10; i++) {
            f[i] /= size;
        }
        x[0] = s[0];
        y[0] = s[1];
        z[0] = s[2];
        return sample(from, before);
    }

    private boolean sample(IndexField field, Samples out) {
        field.sample(x, y, z, 1, Order.GRADIENT, out);
        return !Double.isNaN(out.value[0]);
    }

    /** Turns the momentum from normal component c1 to c2, and the columns with it; {@code second} is the side left on. */
    private void turn(double[] s, double c1, double c2, Samples second, boolean mirror) {
        double mu = c2 - c1;
        double p1x = s[3];
        double p1y = s[4];
        double p1z = s[5];
        double p2x = p1x + mu * n[0];
        double p2y = p1y + mu * n[1];
        double p2z = p1z + mu * n[2];
        double scale = Math.sqrt((1 + second.value[0]) / (p2x * p2x + p2y * p2y + p2z * p2z));
        p2x *= scale;
        p2y *= scale;
        p2z *= scale;
        for (int c = 0; c < State.columns(s); c++) {
            int at = State.COLUMNS + State.COLUMN * c;
            double dt = toSurface(s, at);
            shape();
            double dc1 = p0[0] * n[0] + p0[1] * n[1] + p0[2] * n[2] + p1x * sr[0] + p1y * sr[1] + p1z * sr[2];
            double dc2;
            if (mirror) {
                dc2 = -dc1;
            } else {
                double difference = (second.gx[0] - before.gx[0]) * r0[0]
                        + (second.gy[0] - before.gy[0]) * r0[1]
                        + (second.gz[0] - before.gz[0]) * r0[2];
                dc2 = (difference + c1 * dc1) / c2;
            }
            s[at] = r0[0] - p2x * dt;
            s[at + 1] = r0[1] - p2y * dt;
            s[at + 2] = r0[2] - p2z * dt;
            s[at + 3] = p0[0] + (dc2 - dc1) * n[0] + mu * sr[0] - second.gx[0] * dt;
            s[at + 4] = p0[1] + (dc2 - dc1) * n[1] + mu * sr[1] - second.gy[0] * dt;
            s[at + 5] = p0[2] + (dc2 - dc1) * n[2] + mu * sr[2] - second.gz[0] * dt;
        }
        s[3] = p2x;
        s[4] = p2y;
        s[5] = p2z;
    }

    /** Carries a column to the surface along the flow before it, into r0 and p0; returns δτ. */
    private double toSurface(double[] s, int at) {
        double dt = -(n[0] * s[at] + n[1] * s[at + 1] + n[2] * s[at + 2]) / (n[0] * s[3] + n[1] * s[4] + n[2] * s[5]);
        r0[0] = s[at] + s[3] * dt;
        r0[1] = s[at + 1] + s[4] * dt;
        r0[2] = s[at + 2] + s[5] * dt;
        p0[0] = s[at + 3] + before.gx[0] * dt;
        p0[1] = s[at + 4] + before.gy[0] * dt;
        p0[2] = s[at + 5] + before.gz[0] * dt;
        return dt;
    }

    /** The turn of the normal for the displacement r0, which lies in the tangent plane: (I − NNᵀ)∇∇F r0/|∇F|, into sr. */
    private void shape() {
        double hx = f[4] * r0[0] + f[5] * r0[1] + f[6] * r0[2];
        double hy = f[5] * r0[0] + f[7] * r0[1] + f[8] * r0[2];
        double hz = f[6] * r0[0] + f[8] * r0[1] + f[9] * r0[2];
        double along = hx * n[0] + hy * n[1] + hz * n[2];
        sr[0] = hx - along * n[0];
        sr[1] = hy - along * n[1];
        sr[2] = hz - along * n[2];
    }

    private static double dot(Vector v, double[] s, int at) {
        return v.x() * s[at] + v.y() * s[at + 1] + v.z() * s[at + 2];
    }
}
