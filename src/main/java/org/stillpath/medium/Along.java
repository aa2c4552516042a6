package org.stillpath.medium;

import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;

/**
 * The coordinate of a profile, in the medium's own frame (metres), with the chain rule from a function of it to a
 * function of place.
 */
public enum Along {
    /** The frame's x. */
    X {
        @Override
        double at(double x, double y, double z) {
            return x;
        }

        @Override
        double at(double x, double y, double z, double[] gradient) {
            return linear(x, 0, gradient);
        }

        @Override
        void spread(double u, double f1, double f2, double x, double y, double z, Order order, Samples out, int i) {
            clear(order, out, i);
            out.gx[i] = f1;
            if (order == Order.HESSIAN) {
                out.hxx[i] = f2;
            }
        }
    },
    /** The frame's y. */
    Y {
        @Override
        double at(double x, double y, double z) {
            return y;
        }

        @Override
        double at(double x, double y, double z, double[] gradient) {
            return linear(y, 1, gradient);
        }

        @Override
        void spread(double u, double f1, double f2, double x, double y, double z, Order order, Samples out, int i) {
            clear(order, out, i);
            out.gy[i] = f1;
            if (order == Order.HESSIAN) {
                out.hyy[i] = f2;
            }
        }
    },
    /** The frame's z. */
    Z {
        @Override
        double at(double x, double y, double z) {
            return z;
        }

        @Override
        double at(double x, double y, double z, double[] gradient) {
            return linear(z, 2, gradient);
        }

        @Override
        void spread(double u, double f1, double f2, double x, double y, double z, Order order, Samples out, int i) {
            clear(order, out, i);
            out.gz[i] = f1;
            if (order == Order.HESSIAN) {
                out.hzz[i] = f2;
            }
        }
    },
    /** The distance from the frame's z axis, √(x² + y²). */
    R {
        @Override
        double at(double x, double y, double z) {
            return Math.sqrt(x * x + y * y);
        }

        @Override
        double at(double x, double y, double z, double[] gradient) {
            return radial(x, y, 0, gradient);
        }

        @Override
        void spread(double u, double f1, double f2, double x, double y, double z, Order order, Samples out, int i) {
            spreadRadial(u, f1, f2, x, y, 0, 0, order, out, i);
        }
    },
    /** The distance from the frame's origin, √(x² + y² + z²). */
    RHO {
        @Override
        double at(double x, double y, double z) {
            return Math.sqrt(x * x + y * y + z * z);
        }

        @Override
        double at(double x, double y, double z, double[] gradient) {
            return radial(x, y, z, gradient);
        }

        @Override
        void spread(double u, double f1, double f2, double x, double y, double z, Order order, Samples out, int i) {
            spreadRadial(u, f1, f2, x, y, z, 1, order, out, i);
        }
    };

    /** The word in a job file. */
    public String word() {
        return name().toLowerCase(java.util.Locale.ROOT);
    }

    /** Whether the coordinate is a distance, which ends at 0. */
    public boolean isDistance() {
        return this == R || this == RHO;
    }

    /** The coordinate of a point. */
    abstract double at(double x, double y, double z);

    /** The coordinate of a point and its gradient; the gradient is 0 on the axis, or in the centre, of a distance. */
    abstract double at(double x, double y, double z, double[] gradient);

    /**
     * Fills gradient and Hessian of f(u(x, y, z)) at sample {@code i}.
     *
     * <p>On the axis (or in the centre) of a distance the gradient is 0 and the Hessian f'' in every direction across:
     * the limit for a function that is flat there. For one that is not, the axis is the tip of a cone, and no limit
     * exists.
     *
     * @param u the coordinate there
     * @param f1 f'(u)
     * @param f2 f''(u)
     */
    abstract void spread(double u, double f1, double f2, double x, double y, double z, Order order, Samples out, int i);

    private static double linear(double u, int axis, double[] gradient) {
        gradient[0] = 0;
        gradient[1] = 0;
        gradient[2] = 0;
        gradient[axis] = 1;
        return u;
    }

    private static double radial(double x, double y, double z, double[] gradient) {
        double u = Math.sqrt(x * x + y * y + z * z);
        double k = u == 0 ? 0 : 1 / u;
        gradient[0] = k * x;
        gradient[1] = k * y;
        gradient[2] = k * z;
        return u;
    }

    private static void clear(Order order, Samples out, int i) {
        out.gx[i] = 0;
        out.gy[i] = 0;
        out.gz[i] = 0;
        if (order == Order.HESSIAN) {
            out.hxx[i] = 0;
            out.hxy[i] = 0;
            out.hxz[i] = 0;
            out.hyy[i] = 0;
            out.hyz[i] = 0;
            out.hzz[i] = 0;
        }
    }

    /** For u = √(x² + y² + (z²)); {@code free} is 1 where z takes part, else 0. */
    private static void spreadRadial(
            double u,
            double f1,
            double f2,
            double x,
            double y,
            double z,
            double free,
            Order order,
            Samples out,
            int i) {
        // across: f'/u, whose limit at u = 0 is f''
        double across = u == 0 ? f2 : f1 / u;
        out.gx[i] = u == 0 ? 0 : across * x;
        out.gy[i] = u == 0 ? 0 : across * y;
        out.gz[i] = u == 0 ? 0 : across * z;
        if (order == Order.HESSIAN) {
            double k = u == 0 ? 0 : 1 / u;
            double nx = k * x;
            double ny = k * y;
            double nz = k * z;
            double d = f2 - across;
            out.hxx[i] = across + d * nx * nx;
            out.hxy[i] = d * nx * ny;
            out.hxz[i] = d * nx * nz;
            out.hyy[i] = across + d * ny * ny;
            out.hyz[i] = d * ny * nz;
            out.hzz[i] = free * across + d * nz * nz;
        }
    }
}
