package org.stillpath.ray;

import org.stillpath.formula.Chart;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Displacement;
import org.stillpath.geometry.Frame;
import org.stillpath.geometry.GaussPoints;
import org.stillpath.geometry.Quadric;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.ScalarField;
import org.stillpath.medium.SolidMedium;

/**
 * By how much a free plate in plane stress grows thicker (Timoshenko and Goodier, <i>Theory of Elasticity</i>, ch. 13):
 *
 * <pre>B(x, y) = ∫ (1 + ν) α (T − T₀) dz − ν α t (H − T₀)</pre>
 *
 * <p>over the thickness t between its faces, with H the {@linkplain Harmonic harmonic projection} of the temperature's mean
 * over the thickness onto the plate's disc, and T₀ the temperature at which the faces are where the job says. A uniform or
 * a linear temperature leaves the plate free of stress (H = T) and gives αt(T − T₀) and no more; one that is symmetric
 * about the axis gives (1 + ν)α about its mean. Each face takes half, the middle of the plate stays: what the plate does
 * as a whole, also its bending by a difference between its faces, whose power is of second order, is not computed; nor is
 * its growth across, which changes no plane face.
 *
 * <p>The frame is that of the front face, z along its normal. The integral is by Gauss's rule with as few points as reach
 * 1e-13 of the integral of {@value #MOST} points; a grid between parallel planes is integrated once, exactly. Derivatives
 * are exact to the second. Immutable; shared between threads.
 */
final class Swelling {
    private static final int MOST = 24;
    private static final int[] COUNTS = {1, 2, 3, 4, 6, 8, 12, 16, MOST};
    private static final double SAME = 1e-13;
    private static final int RINGS = 12;
    private static final int ANGLES = 24;

    private final SolidMedium medium;
    private final Frame own;
    private final Frame plate;
    private final Surface front;
    private final Surface back;
    private final boolean parallel;
    private final double depth;
    private final boolean aligned;
    /** The plate's origin in the medium's frame. */
    private final Vector offset;

    private final ScalarField temperature;
    private final double alpha;
    private final double poisson;
    private GaussPoints gauss = GaussPoints.of(MOST);
    private Harmonic harmonic = Harmonic.of(1, (x, y) -> SolidMedium.SIZED_AT);
    private final ThreadLocal<Work> work = ThreadLocal.withInitial(Work::new);

    private static final class Work {
        final double[] x = new double[MOST];
        final double[] y = new double[MOST];
        final double[] z = new double[MOST];
        final Samples t = new Samples(MOST);
        final Samples ends = new Samples(2);
        final double[] h = new double[6];
        final double[] low = new double[6];
        final double[] high = new double[6];
        final double[] f = new double[10];
        final double[] jet = new double[6];
    }

    /**
     * A plate.
     *
     * @param medium what it is made of
     * @param own the medium's frame in the job
     * @param front its front face as drawn
     * @param back its back face as drawn
     */
    Swelling(SolidMedium medium, Frame own, Surface front, Surface back) {
        this.medium = medium;
        this.own = own;
        this.front = front;
        this.back = back;
        this.plate = front.frame();
        this.depth = plate.fromJob(back.vertex()).z();
        this.parallel = front.form().equals(Quadric.PLANE)
                && back.form().equals(Quadric.PLANE)
                && plate.ez().minus(back.frame().ez()).norm() < 1e-15;
        this.aligned = own.ex().equals(plate.ex())
                && own.ey().equals(plate.ey())
                && own.ez().equals(plate.ez());
        this.offset = own.fromJob(plate.origin());
        ScalarField placed = medium.temperature().on(Chart.FLAT);
        double start = offset.z();
        this.temperature = parallel && aligned
                ? placed.meanAlongZ(Math.min(start, start + depth), Math.max(start, start + depth))
                        .orElse(placed)
                : placed;
        this.alpha = medium.material().elastic().expansion();
        this.poisson = medium.material().elastic().poisson();
    }

    /** Takes the moments; a plate without is not stressed. */
    Swelling settled() {
        double radius = 0.5 * medium.diameter();
        gauss = GaussPoints.of(fewest(radius));
        harmonic = Harmonic.of(radius, this::mean);
        return this;
    }

    /** Mean temperature over the thickness, NaN where it is not known. */
    double mean(double x, double y) {
        Work w = work.get();
        faces(x, y, w);
        return mean(x, y, w);
    }

    private double mean(double x, double y, Work w) {
        int n = gauss.count();
        sample(x, y, w, Order.VALUE);
        double sum = 0;
        for (int i = 0; i < n; i++) {
            sum += gauss.weight(i) * w.t.value[i];
        }
        return sum;
    }

    private int fewest(double radius) {
        double[][] places = new double[13][];
        double[] exact = new double[places.length];
        GaussPoints most = GaussPoints.of(MOST);
        gauss = most;
        double scale = 0;
        for (int i = 0; i < places.length; i++) {
            double r = 0.98 * radius * i / (places.length - 1);
            places[i] = new double[] {r * Math.cos(2.4 * i), r * Math.sin(2.4 * i)};
            exact[i] = mean(places[i][0], places[i][1]);
            scale = Math.max(scale, Math.abs(exact[i]));
        }
        for (int count : COUNTS) {
            gauss = GaussPoints.of(count);
            boolean same = true;
            for (int i = 0; i < places.length && same; i++) {
                double d = Math.abs(mean(places[i][0], places[i][1]) - exact[i]);
                same = !(d > SAME * scale);
            }
            if (same) {
                return count;
            }
        }
        return MOST;
    }

    /** The movement of a face along the z of its own frame. */
    Displacement of(Surface face, boolean isFront) {
        Frame f = face.frame();
        double cosine = f.ez().dot(plate.ez());
        double share = (isFront ? -0.5 : 0.5) * Math.signum(depth) * cosine;
        Vector origin = plate.fromJob(f.origin());
        Vector ax = new Vector(f.ex().dot(plate.ex()), f.ey().dot(plate.ex()), f.ez().dot(plate.ex()));
        Vector ay = new Vector(f.ex().dot(plate.ey()), f.ey().dot(plate.ey()), f.ez().dot(plate.ey()));
        return (x, y, z, out) -> {
            double u = origin.x() + ax.x() * x + ax.y() * y + ax.z() * z;
            double v = origin.y() + ay.x() * x + ay.y() * y + ay.z() * z;
            Work w = work.get();
            if (!jet(u, v, w)) {
                java.util.Arrays.fill(out, 0, 10, 0);
                return;
            }
            double[] b = w.jet;
            out[0] = share * b[0];
            out[1] = share * (b[1] * ax.x() + b[2] * ay.x());
            out[2] = share * (b[1] * ax.y() + b[2] * ay.y());
            out[3] = share * (b[1] * ax.z() + b[2] * ay.z());
            out[4] = share * form(b, ax.x(), ay.x(), ax.x(), ay.x());
            out[5] = share * form(b, ax.x(), ay.x(), ax.y(), ay.y());
            out[6] = share * form(b, ax.x(), ay.x(), ax.z(), ay.z());
            out[7] = share * form(b, ax.y(), ay.y(), ax.y(), ay.y());
            out[8] = share * form(b, ax.y(), ay.y(), ax.z(), ay.z());
            out[9] = share * form(b, ax.z(), ay.z(), ax.z(), ay.z());
        };
    }

    /** The largest movement of a face over the plate's disc, from a sample of places, with room; metres. */
    double most() {
        double radius = 0.5 * medium.diameter();
        double most = 0;
        double[] b = new double[6];
        for (int i = 0; i <= RINGS; i++) {
            for (int k = 0; k < (i == 0 ? 1 : ANGLES); k++) {
                double angle = 2 * Math.PI * k / ANGLES;
                double r = radius * i / RINGS;
                if (jet(r * Math.cos(angle), r * Math.sin(angle), b)) {
                    most = Math.max(most, Math.abs(b[0]));
                }
            }
        }
        return most;
    }

    private static double form(double[] b, double u1, double v1, double u2, double v2) {
        return b[3] * u1 * u2 + b[4] * (u1 * v2 + v1 * u2) + b[5] * v1 * v2;
    }

    /** B with its derivatives at a place of the plate's frame; false where the temperature is not known. */
    boolean jet(double x, double y, double[] out) {
        Work w = work.get();
        boolean known = jet(x, y, w);
        System.arraycopy(w.jet, 0, out, 0, 6);
        return known;
    }

    private boolean jet(double x, double y, Work w) {
        faces(x, y, w);
        sample(x, y, w, Order.HESSIAN);
        harmonic.jet(x, y, w.h);
        double low = w.low[0];
        double t = w.high[0] - low;
        double[] b = w.jet;
        java.util.Arrays.fill(b, 0);
        double k = (1 + poisson) * alpha;
        for (int i = 0; i < gauss.count(); i++) {
            double g = k * gauss.weight(i) * t;
            b[0] += g * (w.t.value[i] - SolidMedium.SIZED_AT);
            b[1] += g * w.t.gx[i];
            b[2] += g * w.t.gy[i];
            b[3] += g * w.t.hxx[i];
            b[4] += g * w.t.hxy[i];
            b[5] += g * w.t.hyy[i];
        }
        double m = poisson * alpha;
        double h = w.h[0] - SolidMedium.SIZED_AT;
        b[0] -= m * t * h;
        b[1] -= m * t * w.h[1];
        b[2] -= m * t * w.h[2];
        b[3] -= m * t * w.h[3];
        b[4] -= m * t * w.h[4];
        b[5] -= m * t * w.h[5];
        if (!parallel) {
            end(x, y, w, w.high, 1);
            end(x, y, w, w.low, -1);
        }
        return Double.isFinite(b[0] + b[1] + b[2] + b[3] + b[4] + b[5]);
    }

    /** What moving a limit of the integral adds to its derivatives (Leibniz): one face, upper or lower. */
    private void end(double x, double y, Work w, double[] z, int sign) {
        w.x[0] = x;
        w.y[0] = y;
        w.z[0] = z[0];
        carried(w, 1);
        temperature.sample(w.x, w.y, w.z, 1, Double.NaN, Order.GRADIENT, w.ends);
        turned(w.ends, 1, Order.GRADIENT);
        double k = (1 + poisson) * alpha;
        double m = poisson * alpha;
        double e = k * (w.ends.value[0] - SolidMedium.SIZED_AT) - m * (w.h[0] - SolidMedium.SIZED_AT);
        double ex = k * w.ends.gx[0] - m * w.h[1];
        double ey = k * w.ends.gy[0] - m * w.h[2];
        double ez = k * w.ends.gz[0];
        double[] b = w.jet;
        b[1] += sign * e * z[1];
        b[2] += sign * e * z[2];
        b[3] += sign * (2 * ex * z[1] + ez * z[1] * z[1] + e * z[3]);
        b[4] += sign * (ex * z[2] + ey * z[1] + ez * z[1] * z[2] + e * z[4]);
        b[5] += sign * (2 * ey * z[2] + ez * z[2] * z[2] + e * z[5]);
    }

    private void sample(double x, double y, Work w, Order order) {
        int n = gauss.count();
        double low = w.low[0];
        double t = w.high[0] - low;
        for (int i = 0; i < n; i++) {
            w.x[i] = x;
            w.y[i] = y;
            w.z[i] = low + t * gauss.at(i);
        }
        carried(w, n);
        temperature.sample(w.x, w.y, w.z, n, Double.NaN, order, w.t);
        turned(w.t, n, order);
    }

    /** Takes places from the plate's frame to the medium's. */
    private void carried(Work w, int n) {
        for (int i = 0; i < n; i++) {
            if (aligned) {
                w.x[i] += offset.x();
                w.y[i] += offset.y();
                w.z[i] += offset.z();
                continue;
            }
            Vector p = own.fromJob(plate.toJob(new Vector(w.x[i], w.y[i], w.z[i])));
            w.x[i] = p.x();
            w.y[i] = p.y();
            w.z[i] = p.z();
        }
    }

    /** Takes derivatives from the medium's axes to the plate's. */
    private void turned(Samples s, int n, Order order) {
        if (aligned || order == Order.VALUE) {
            return;
        }
        Vector a = own.directionFromJob(plate.ex());
        Vector b = own.directionFromJob(plate.ey());
        Vector c = own.directionFromJob(plate.ez());
        for (int i = 0; i < n; i++) {
            Vector g = new Vector(s.gx[i], s.gy[i], s.gz[i]);
            s.gx[i] = g.dot(a);
            s.gy[i] = g.dot(b);
            s.gz[i] = g.dot(c);
            if (order == Order.HESSIAN) {
                Vector ha = times(s, i, a);
                Vector hb = times(s, i, b);
                s.hxx[i] = ha.dot(a);
                s.hxy[i] = ha.dot(b);
                s.hyy[i] = hb.dot(b);
            }
        }
    }

    private static Vector times(Samples s, int i, Vector v) {
        return new Vector(
                s.hxx[i] * v.x() + s.hxy[i] * v.y() + s.hxz[i] * v.z(),
                s.hxy[i] * v.x() + s.hyy[i] * v.y() + s.hyz[i] * v.z(),
                s.hxz[i] * v.x() + s.hyz[i] * v.y() + s.hzz[i] * v.z());
    }

    /** z of both faces over a place of the plate's frame, with derivatives, the lower in {@code low}. */
    private void faces(double x, double y, Work w) {
        if (parallel) {
            w.low[0] = Math.min(0, depth);
            w.high[0] = Math.max(0, depth);
            return;
        }
        face(depth > 0 ? front : back, depth > 0 ? 0 : depth, x, y, w, w.low);
        face(depth > 0 ? back : front, depth > 0 ? depth : 0, x, y, w, w.high);
    }

    private void face(Surface s, double start, double x, double y, Work w, double[] out) {
        double z = start;
        Vector ez = plate.ez();
        for (int i = 0; i < 50; i++) {
            Vector p = plate.toJob(new Vector(x, y, z));
            s.evaluate(p.x(), p.y(), p.z(), w.f);
            double step = w.f[0] / (w.f[1] * ez.x() + w.f[2] * ez.y() + w.f[3] * ez.z());
            z -= step;
            if (!(Math.abs(step) > 1e-15 * Math.abs(depth))) {
                break;
            }
        }
        Vector g = plate.directionFromJob(new Vector(w.f[1], w.f[2], w.f[3]));
        double fx = -g.x() / g.z();
        double fy = -g.y() / g.z();
        Vector ha = hessian(w.f, plate.ex());
        Vector hb = hessian(w.f, plate.ey());
        Vector hc = hessian(w.f, ez);
        out[0] = z;
        out[1] = fx;
        out[2] = fy;
        double zz = hc.dot(ez);
        double xz = hc.dot(plate.ex());
        double yz = hc.dot(plate.ey());
        out[3] = -(ha.dot(plate.ex()) + 2 * xz * fx + zz * fx * fx) / g.z();
        out[4] = -(ha.dot(plate.ey()) + xz * fy + yz * fx + zz * fx * fy) / g.z();
        out[5] = -(hb.dot(plate.ey()) + 2 * yz * fy + zz * fy * fy) / g.z();
    }

    private static Vector hessian(double[] f, Vector v) {
        return new Vector(
                f[4] * v.x() + f[5] * v.y() + f[6] * v.z(),
                f[5] * v.x() + f[7] * v.y() + f[8] * v.z(),
                f[6] * v.x() + f[8] * v.y() + f[9] * v.z());
    }
}
