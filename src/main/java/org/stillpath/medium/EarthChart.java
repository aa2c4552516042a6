package org.stillpath.medium;

import java.util.Optional;
import org.stillpath.formula.Chart;
import org.stillpath.formula.Coordinate;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;

/**
 * Height, distance and clearance over a spherical or a flat earth, in the local frame of a sight: the origin on the datum
 * below {@code from}, z up there, x along the sight. Exact derivatives, without cancellation: a height of a metre over
 * 6371 km keeps all its digits, since it is (2Rz + |q|²)/(R + |q + Rẑ|) and not a difference of two radii.
 *
 * <p>The distance is measured along the datum in the sight's vertical plane, R·atan2(x, R + z), the clearance vertically
 * to the {@link Ground}: height less the ground's height at that distance. Allocates nothing.
 */
public final class EarthChart implements GroundChart {
    private final double radius;
    private final Ground ground;

    private EarthChart(double radius, Ground ground) {
        this.radius = radius;
        this.ground = ground;
    }

    /**
     * Over a sphere.
     *
     * @param radius of the datum, metres, above 0 and finite
     * @param ground heights of the ground above the datum
     */
    public static EarthChart sphere(double radius, Ground ground) {
        if (!(radius > 0 && Double.isFinite(radius))) {
            throw new IllegalArgumentException("radius must be above 0 m and finite: " + radius);
        }
        return new EarthChart(radius, ground);
    }

    /** Over a plane, z = 0: height is z, distance is x. */
    public static EarthChart flat(Ground ground) {
        return new EarthChart(Double.POSITIVE_INFINITY, ground);
    }

    /** Radius of the datum in metres; infinite for a plane. */
    public double radius() {
        return radius;
    }

    /** The ground. */
    public Ground ground() {
        return ground;
    }

    @Override
    public void sample(Coordinate coordinate, double[] x, double[] y, double[] z, int count, Order order, Samples out) {
        for (int i = 0; i < count; i++) {
            switch (coordinate) {
                case HEIGHT -> height(x[i], y[i], z[i], order, out, i);
                case DISTANCE -> distance(x[i], z[i], order, out, i);
                case CLEARANCE -> clearance(x[i], y[i], z[i], order, out, i);
                default -> throw new IllegalArgumentException("coordinate must be one of a sight: " + coordinate);
            }
        }
    }

    private void height(double x, double y, double z, Order order, Samples out, int i) {
        if (radius == Double.POSITIVE_INFINITY) {
            out.value[i] = z;
            if (order != Order.VALUE) {
                gradient(0, 0, 1, out, i);
            }
            if (order == Order.HESSIAN) {
                hessian(0, 0, 0, 0, 0, 0, out, i);
            }
            return;
        }
        double up = radius + z;
        double s = Math.sqrt(x * x + y * y + up * up);
        out.value[i] = (2 * radius * z + x * x + y * y + z * z) / (radius + s);
        if (order == Order.VALUE) {
            return;
        }
        double over = 1 / s;
        double nx = x * over;
        double ny = y * over;
        double nz = up * over;
        gradient(nx, ny, nz, out, i);
        if (order == Order.HESSIAN) {
            hessian(
                    (1 - nx * nx) * over,
                    -nx * ny * over,
                    -nx * nz * over,
                    (1 - ny * ny) * over,
                    -ny * nz * over,
                    (nx * nx + ny * ny) * over,
                    out,
                    i);
        }
    }

    private void distance(double x, double z, Order order, Samples out, int i) {
        if (radius == Double.POSITIVE_INFINITY) {
            out.value[i] = x;
            if (order != Order.VALUE) {
                gradient(1, 0, 0, out, i);
            }
            if (order == Order.HESSIAN) {
                hessian(0, 0, 0, 0, 0, 0, out, i);
            }
            return;
        }
        double up = radius + z;
        out.value[i] = radius * Math.atan2(x, up);
        if (order == Order.VALUE) {
            return;
        }
        double k = radius / (x * x + up * up);
        double gx = k * up;
        double gz = -k * x;
        gradient(gx, 0, gz, out, i);
        if (order == Order.HESSIAN) {
            double same = 2 * gx * gz / radius;
            hessian(same, 0, (gz * gz - gx * gx) / radius, 0, 0, -same, out, i);
        }
    }

    private void clearance(double x, double y, double z, Order order, Samples out, int i) {
        distance(x, z, order, out, i);
        double d = out.value[i];
        double slope = ground.slope(d);
        double curvature = ground.curvature(d);
        double dx = out.gx[i];
        double dz = out.gz[i];
        double dxx = out.hxx[i];
        double dxz = out.hxz[i];
        double dzz = out.hzz[i];
        height(x, y, z, order, out, i);
        out.value[i] -= ground.height(d);
        if (order == Order.VALUE) {
            return;
        }
        out.gx[i] -= slope * dx;
        out.gz[i] -= slope * dz;
        if (order == Order.HESSIAN) {
            out.hxx[i] -= slope * dxx + curvature * dx * dx;
            out.hxz[i] -= slope * dxz + curvature * dx * dz;
            out.hzz[i] -= slope * dzz + curvature * dz * dz;
        }
    }

    private static void gradient(double x, double y, double z, Samples out, int i) {
        out.gx[i] = x;
        out.gy[i] = y;
        out.gz[i] = z;
    }

    private static void hessian(double xx, double xy, double xz, double yy, double yz, double zz, Samples out, int i) {
        out.hxx[i] = xx;
        out.hxy[i] = xy;
        out.hxz[i] = xz;
        out.hyy[i] = yy;
        out.hyz[i] = yz;
        out.hzz[i] = zz;
    }

    @Override
    public Optional<Seam> groundSeam() {
        return ground.knots().map(k -> new Seam(new ChartLevel(Coordinate.DISTANCE, this), k));
    }

    @Override
    public Chart piece(int cell) {
        return new EarthChart(radius, ground.piece(cell));
    }

    @Override
    public boolean equals(Object o) {
        return o instanceof EarthChart e && e.radius == radius && e.ground.equals(ground);
    }

    @Override
    public int hashCode() {
        return 31 * Double.hashCode(radius) + ground.hashCode();
    }
}
