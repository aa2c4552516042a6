package org.stillpath.ray;

import org.stillpath.formula.Coordinate;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.EarthChart;
import org.stillpath.medium.Level;

/**
 * A smooth function along a ray whose zero ends a piece of it: a surface, the edge of a region, a seam, a plane, a length.
 * Owns scratch space: one object a thread.
 */
public abstract sealed class Target {
    private final double[] gradient = new double[10];

    /** The function's value in a state. */
    public abstract double value(double[] y);

    /**
     * Its rate along the ray, d/dτ.
     *
     * @param index the refractive index in that state
     */
    public abstract double rate(double[] y, double index);

    /** Whether {@link #rate} is only right with the force. */
    public boolean needsForce() {
        return false;
    }

    /**
     * The same where the force is known too, on which the rate of a target that looks at the momentum depends.
     *
     * @param fx ½∂n²/∂x at the state, 1/m; likewise {@code fy}, {@code fz}
     */
    public double rate(double[] y, double index, double fx, double fy, double fz) {
        return rate(y, index);
    }

    /** How much the value changes over a distance: an upper bound of |d value/d s| near the state, per metre. */
    public abstract double steepness(double[] y, double index);

    /** Whether a zero in this state counts. */
    public boolean accepts(double[] y) {
        return true;
    }

    /** A surface of a train. */
    public static final class OnSurface extends Target {
        private final Surface surface;
        private final double[] out = super.gradient;

        OnSurface(Surface surface) {
            this.surface = surface;
        }

        @Override
        public double value(double[] y) {
            surface.evaluate(y[0], y[1], y[2], out);
            return out[0];
        }

        @Override
        public double rate(double[] y, double index) {
            surface.evaluate(y[0], y[1], y[2], out);
            return out[1] * y[3] + out[2] * y[4] + out[3] * y[5];
        }

        @Override
        public double steepness(double[] y, double index) {
            surface.evaluate(y[0], y[1], y[2], out);
            return Math.sqrt(out[1] * out[1] + out[2] * out[2] + out[3] * out[3]);
        }

        @Override
        public boolean accepts(double[] y) {
            return surface.holds(y[0], y[1], y[2]);
        }
    }

    /** A plane of constant z. */
    public static final class AtZ extends Target {
        private final double z;

        AtZ(double z) {
            this.z = z;
        }

        @Override
        public double value(double[] y) {
            return y[2] - z;
        }

        @Override
        public double rate(double[] y, double index) {
            return y[5];
        }

        @Override
        public double steepness(double[] y, double index) {
            return 1;
        }
    }

    /** A level of a function of place: the edge of a valid region, or a knot of a seam. */
    public static final class OnLevel extends Target {
        private final Level level;
        private final double at;
        private final double[] out = super.gradient;

        OnLevel(Level level, double at) {
            this.level = level;
            this.at = at;
        }

        /** What the level is. */
        public String describe() {
            return level.describe();
        }

        @Override
        public double value(double[] y) {
            return level.value(y[0], y[1], y[2], out) - at;
        }

        @Override
        public double rate(double[] y, double index) {
            level.value(y[0], y[1], y[2], out);
            return out[0] * y[3] + out[1] * y[4] + out[2] * y[5];
        }

        @Override
        public double steepness(double[] y, double index) {
            level.value(y[0], y[1], y[2], out);
            return Math.sqrt(out[0] * out[0] + out[1] * out[1] + out[2] * out[2]);
        }
    }

    /** A geometric length from the start. */
    public static final class AtLength extends Target {
        private final double length;

        AtLength(double length) {
            this.length = length;
        }

        @Override
        public double value(double[] y) {
            return y[State.LENGTH] - length;
        }

        @Override
        public double rate(double[] y, double index) {
            return index;
        }

        @Override
        public double steepness(double[] y, double index) {
            return 1;
        }
    }

    /** An optical length from the start. */
    public static final class AtOpticalLength extends Target {
        private final double opticalLength;

        AtOpticalLength(double opticalLength) {
            this.opticalLength = opticalLength;
        }

        @Override
        public double value(double[] y) {
            return State.opticalLength(y) - opticalLength;
        }

        @Override
        public double rate(double[] y, double index) {
            return index * index;
        }

        @Override
        public double steepness(double[] y, double index) {
            return index;
        }
    }

    /** Where the distance to a point stays the same for a moment: (q − to)·p = 0. */
    public static final class Nearest extends Target {
        private final Vector to;

        Nearest(Vector to) {
            this.to = to;
        }

        /** Whether the distance is least there and not greatest. */
        boolean isNearest(double[] y, Samples force) {
            double n = Math.sqrt(y[3] * y[3] + y[4] * y[4] + y[5] * y[5]);
            return rate(y, n, force.gx[0], force.gy[0], force.gz[0]) > 0;
        }

        @Override
        public double value(double[] y) {
            return (y[0] - to.x()) * y[3] + (y[1] - to.y()) * y[4] + (y[2] - to.z()) * y[5];
        }

        @Override
        public boolean needsForce() {
            return true;
        }

        /** Without the force's part, which vanishes near the point. */
        @Override
        public double rate(double[] y, double index) {
            return index * index;
        }

        @Override
        public double rate(double[] y, double index, double fx, double fy, double fz) {
            return index * index + (y[0] - to.x()) * fx + (y[1] - to.y()) * fy + (y[2] - to.z()) * fz;
        }

        @Override
        public double steepness(double[] y, double index) {
            return 4 * index;
        }
    }

    /** A plane through the earth's centre at a distance along the datum: negative before it. */
    public static final class AtVertical extends Target {
        private final double mx;
        private final double mz;
        private final double offset;

        AtVertical(EarthChart chart, double distance) {
            boolean flat = Double.isInfinite(chart.radius());
            double angle = flat ? 0 : distance / chart.radius();
            this.mx = Math.cos(angle);
            this.mz = -Math.sin(angle);
            this.offset = flat ? distance : chart.radius() * Math.sin(angle);
        }

        @Override
        public double value(double[] y) {
            return mx * y[0] + mz * y[2] - offset;
        }

        @Override
        public double rate(double[] y, double index) {
            return mx * y[3] + mz * y[5];
        }

        @Override
        public double steepness(double[] y, double index) {
            return 1;
        }
    }

    /** Where the clearance over the ground stays the same for a moment: ∇c·p = 0. */
    public static final class AtLowest extends Target {
        /** How fast a slope changes at least, 1/m: what stands for the bend of a ray in air over a flat earth. */
        private static final double FLAT = 1e-9;

        private final EarthChart chart;
        private final double[] x = new double[1];
        private final double[] y = new double[1];
        private final double[] z = new double[1];
        private final Samples c = new Samples(1);

        AtLowest(EarthChart chart) {
            this.chart = chart;
        }

        /** Whether the clearance is least there and not greatest. */
        boolean isLowest(double[] state, Samples force) {
            double n = Math.sqrt(state[3] * state[3] + state[4] * state[4] + state[5] * state[5]);
            return rate(state, n, force.gx[0], force.gy[0], force.gz[0]) > 0;
        }

        private void sample(double[] state, Order order) {
            x[0] = state[0];
            y[0] = state[1];
            z[0] = state[2];
            chart.sample(Coordinate.CLEARANCE, x, y, z, 1, order, c);
        }

        @Override
        public double value(double[] state) {
            sample(state, Order.GRADIENT);
            return c.gx[0] * state[3] + c.gy[0] * state[4] + c.gz[0] * state[5];
        }

        @Override
        public boolean needsForce() {
            return true;
        }

        /** Without the force's part. */
        @Override
        public double rate(double[] state, double index) {
            return rate(state, index, 0, 0, 0);
        }

        @Override
        public double rate(double[] state, double index, double fx, double fy, double fz) {
            sample(state, Order.HESSIAN);
            double px = state[3];
            double py = state[4];
            double pz = state[5];
            return c.hxx[0] * px * px
                    + c.hyy[0] * py * py
                    + c.hzz[0] * pz * pz
                    + 2 * (c.hxy[0] * px * py + c.hxz[0] * px * pz + c.hyz[0] * py * pz)
                    + c.gx[0] * fx
                    + c.gy[0] * fy
                    + c.gz[0] * fz;
        }

        /** Without the force's part, and never 0, as it would be over a flat earth. */
        @Override
        public double steepness(double[] state, double index) {
            return 4 * Math.abs(rate(state, index)) / index + FLAT;
        }
    }
}
