package org.stillpath.path;

import java.util.Set;
import java.util.TreeSet;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.medium.IndexField;
import org.stillpath.medium.Seam;

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
    private final double half;
    private double[] x = new double[1];
    private double[] y = new double[1];
    private double[] z = new double[1];
    private Samples s = new Samples(1);

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
        this.half = Math.sin(0.5 * angle);
    }

    /** Heights at which a derivative of a field jumps, ascending. */
    static double[] knots(IndexField field) {
        TreeSet<Double> knots = new TreeSet<>();
        double[] gradient = new double[3];
        for (Seam seam : field.seams()) {
            // along z above the eye's foot a seam of height is the height itself
            double at0 = seam.coordinate().value(0, 0, 0, gradient);
            double at1 = seam.coordinate().value(0, 0, 1, gradient);
            if (Math.abs(at0) < 1e-9 && Math.abs(at1 - 1) < 1e-9) {
                for (double k : seam.knots()) {
                    knots.add(k);
                }
            } else if (field.ofHeightAlone()) {
                kinks(seam, knots, gradient);
            }
        }
        return knots.stream().mapToDouble(Double::doubleValue).toArray();
    }

    /** Kinks of a formula: its own functions of the height, whose zeros are looked for from 10 m below the datum to 100 km. */
    private static void kinks(Seam seam, Set<Double> knots, double[] gradient) {
        double before = Double.NaN;
        double last = -10;
        for (int i = 0; i <= 400; i++) {
            double h = i <= 40 ? -10 + 0.25 * i : 0.01 * Math.pow(1e7, (i - 41) / 359.0);
            double value = seam.coordinate().value(0, 0, h, gradient);
            for (double k : seam.knots()) {
                if (before < k != value < k && !Double.isNaN(before)) {
                    double low = last;
                    double high = h;
                    for (int j = 0; j < 60; j++) {
                        double middle = 0.5 * (low + high);
                        boolean under = seam.coordinate().value(0, 0, middle, gradient) < k;
                        if (under == before < k) {
                            low = middle;
                        } else {
                            high = middle;
                        }
                    }
                    knots.add(0.5 * (low + high));
                }
            }
            before = value;
            last = h;
        }
    }

    double radius() {
        return radius;
    }

    /** Samples at a height; false where the field is undefined. */
    private boolean at(double height, Order order) {
        put(0, height);
        field.sample(x, y, z, 1, order, s);
        return !Double.isNaN(s.value[0]);
    }

    private void put(int i, double height) {
        if (Double.isInfinite(radius)) {
            x[i] = distance;
            z[i] = height;
        } else {
            x[i] = (radius + height) * sin;
            z[i] = height * cos - 2 * radius * half * half;
        }
    }

    /** Samples at many heights at once, which costs a field made of several quantities half as much a height. */
    private void at(double[] heights, int count, Order order) {
        if (x.length < count) {
            x = new double[count];
            y = new double[count];
            z = new double[count];
            s = new Samples(count);
        }
        for (int i = 0; i < count; i++) {
            put(i, heights[i]);
        }
        field.sample(x, y, z, count, order, s);
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
        return refractivityAndSteepness(height)[1];
    }

    /** n − 1 and |∇n| at a height, 1/m, by one sample of the field. */
    double[] refractivityAndSteepness(double height) {
        double[] n = new double[1];
        double[] g = new double[1];
        refractivityAndSteepness(new double[] {height}, n, g);
        return new double[] {n[0], g[0]};
    }

    /** The same at many heights. */
    void refractivityAndSteepness(double[] heights, double[] refractivity, double[] steepness) {
        at(heights, heights.length, Order.GRADIENT);
        for (int i = 0; i < heights.length; i++) {
            double n = Math.sqrt(1 + s.value[i]);
            double g = Math.sqrt(s.gx[i] * s.gx[i] + s.gy[i] * s.gy[i] + s.gz[i] * s.gz[i]);
            refractivity[i] = s.value[i] / (1 + n);
            steepness[i] = Double.isNaN(n) ? Double.NaN : g / n;
        }
    }

    /** Refractivity and d(n·r)/dh at many heights, as {@link #refractivity} and {@link #rise} give them. */
    void refractivityAndRise(double[] heights, int count, double[] refractivity, double[] rise) {
        at(heights, count, Order.GRADIENT);
        for (int i = 0; i < count; i++) {
            double n = Math.sqrt(1 + s.value[i]);
            refractivity[i] = s.value[i] / (1 + n);
            rise[i] = Double.isNaN(n) ? Double.NaN : rise(i, heights[i], n);
        }
    }

    private double rise(int i, double height, double n) {
        double g = (s.gx[i] * sin + s.gz[i] * cos) / n;
        return Double.isInfinite(radius) ? g : n + (radius + height) * g;
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

    /** At many heights, dn/dh over n and how it changes: along a ray, d(elevation)/d(distance on the datum) = (1 + r n'/n)/R, and its derivative. */
    void turns(double[] heights, int count, double[] turn, double[] change) {
        at(heights, count, Order.HESSIAN);
        for (int i = 0; i < count; i++) {
            double n2 = 1 + s.value[i];
            double f = s.gx[i] * sin + s.gz[i] * cos;
            // ½∇∇n² along the radius is n n'' + n'²
            double h = s.hxx[i] * sin * sin + 2 * s.hxz[i] * sin * cos + s.hzz[i] * cos * cos;
            double g = f / n2;
            double g1 = h / n2 - 2 * g * g;
            boolean none = Double.isNaN(n2);
            boolean flat = Double.isInfinite(radius);
            turn[i] = none ? Double.NaN : flat ? g : (1 + (radius + heights[i]) * g) / radius;
            change[i] = none ? Double.NaN : flat ? g1 : (g + (radius + heights[i]) * g1) / radius;
        }
    }

    /** d(n·r)/dh, n + r dn/dh: below 0 where a level ray bends more than the earth. Over a flat earth dn/dh, 1/m. */
    double rise(double height) {
        return at(height, Order.GRADIENT) ? rise(0, height, Math.sqrt(1 + s.value[0])) : Double.NaN;
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
