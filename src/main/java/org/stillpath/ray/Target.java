package org.stillpath.ray;

import org.stillpath.formula.Samples;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
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
}
