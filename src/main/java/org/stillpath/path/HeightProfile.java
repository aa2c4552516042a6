package org.stillpath.path;

import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.medium.IndexField;

/**
 * The refractivity along one earth radius of a sight, and with it n·r, whose extremes say which rays turn and which are
 * trapped (Bouguer: n r cos e is constant along a ray where the air depends on the height alone). Over a flat earth n stands
 * for n·r. Holds scratch space: one object a thread.
 */
final class HeightProfile {
    private final IndexField field;
    private final double radius;
    private final double distance;
    private final double sin;
    private final double cos;
    private final double[] x = new double[1];
    private final double[] y = new double[1];
    private final double[] z = new double[1];
    private final Samples s = new Samples(1);
    private long evaluations;

    /**
     * The profile above one place of the datum.
     *
     * @param field in the frame of the sight
     * @param radius of the datum, metres; infinite for a flat earth
     * @param distance along the datum, metres
     */
    HeightProfile(IndexField field, double radius, double distance) {
        this.field = field;
        this.radius = radius;
        this.distance = distance;
        double angle = distance / radius;
        this.sin = Math.sin(angle);
        this.cos = Math.cos(angle);
    }

    /** Number of points at which the field was sampled. */
    long evaluations() {
        return evaluations;
    }

    double radius() {
        return radius;
    }

    /** Samples at a height; false where the field is undefined. */
    private boolean at(double height, Order order) {
        if (Double.isInfinite(radius)) {
            x[0] = distance;
            z[0] = height;
        } else {
            x[0] = (radius + height) * sin;
            double half = Math.sin(0.5 * distance / radius);
            z[0] = height * cos - 2 * radius * half * half;
        }
        y[0] = 0;
        evaluations++;
        field.sample(x, y, z, 1, order, s);
        return !Double.isNaN(s.value[0]);
    }

    /** Refractivity n − 1 at a height, metres; NaN where it is undefined. */
    double refractivity(double height) {
        return at(height, Order.VALUE) ? s.value[0] / (1 + Math.sqrt(1 + s.value[0])) : Double.NaN;
    }

    /** dn/dh at a height, 1/m. */
    double gradient(double height) {
        return at(height, Order.GRADIENT) ? (s.gx[0] * sin + s.gz[0] * cos) / Math.sqrt(1 + s.value[0]) : Double.NaN;
    }

    /** |∇n| at a height, 1/m. */
    double steepness(double height) {
        return at(height, Order.GRADIENT)
                ? Math.sqrt((s.gx[0] * s.gx[0] + s.gy[0] * s.gy[0] + s.gz[0] * s.gz[0]) / (1 + s.value[0]))
                : Double.NaN;
    }

    /**
     * n·r at a height less n·r at another, over n·r there, without cancellation: the small-difference form (h − h₁)(1 + ν) +
     * (ν − ν₁)(R + h₁), over (1 + ν₁)(R + h₁).
     */
    double lift(double height, double other) {
        return lift(height, refractivity(height), other, refractivity(other));
    }

    /** The same with the refractivities known. */
    double lift(double height, double here, double other, double there) {
        double turn = Double.isInfinite(radius) ? 0 : (height - other) * (1 + here) / (radius + other);
        return (turn + (here - there)) / (1 + there);
    }

    /** d(n·r)/dh, n + r dn/dh: below 0 where a level ray bends more than the earth. Over a flat earth dn/dh, 1/m. */
    double rise(double height) {
        if (!at(height, Order.GRADIENT)) {
            return Double.NaN;
        }
        double n = Math.sqrt(1 + s.value[0]);
        double g = (s.gx[0] * sin + s.gz[0] * cos) / n;
        return Double.isInfinite(radius) ? g : n + (radius + height) * g;
    }

    /**
     * The elevation, rad, not negative, with which a ray leaves one height so that it turns at another; NaN where no ray from
     * there turns at the other.
     */
    double turning(double from, double at) {
        double l = lift(at, from);
        return l <= 0 ? 2 * Math.asin(Math.sqrt(Math.min(1, -0.5 * l))) : Double.NaN;
    }
}
