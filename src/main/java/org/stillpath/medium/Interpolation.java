package org.stillpath.medium;

/**
 * How a table of values is joined: by cubics between neighbouring knots that differ in the slopes at the knots. Each
 * constant gives the slopes; {@link Spline} does the rest.
 */
public enum Interpolation {
    /** Natural cubic spline: C², second derivative 0 at both ends (de Boor, <i>A Practical Guide to Splines</i>, ch. IV). */
    SPLINE {
        @Override
        double[] slopes(double[] u, double[] v) {
            // at the ends, second derivative 0: 2 s0 + s1 = 3 times the first secant
            return smooth(u, v, 2, 1, 3 * secant(u, v, 0), 3 * secant(u, v, u.length - 2));
        }
    },
    /** Cubic spline, C², with slope 0 at both ends: for a table that starts on an axis of symmetry. */
    CLAMPED {
        @Override
        double[] slopes(double[] u, double[] v) {
            return smooth(u, v, 1, 0, 0, 0);
        }
    },
    /**
     * Monotone where the data are, C¹ (Fritsch and Carlson, SIAM J. Numer. Anal. 17 (1980) 238): the slopes of the
     * parabola through three neighbours, 0 where the data turn, and cut back where α² + β² &gt; 9.
     */
    MONOTONE {
        @Override
        double[] slopes(double[] u, double[] v) {
            int n = u.length;
            double[] s = new double[n];
            if (n == 2) {
                s[0] = secant(u, v, 0);
                s[1] = s[0];
                return s;
            }
            for (int i = 1; i < n - 1; i++) {
                double left = secant(u, v, i - 1);
                double right = secant(u, v, i);
                double hl = u[i] - u[i - 1];
                double hr = u[i + 1] - u[i];
                s[i] = left * right > 0 ? (hr * left + hl * right) / (hl + hr) : 0;
            }
            s[0] = end(u[1] - u[0], u[2] - u[1], secant(u, v, 0), secant(u, v, 1));
            s[n - 1] = end(u[n - 1] - u[n - 2], u[n - 2] - u[n - 3], secant(u, v, n - 2), secant(u, v, n - 3));
            for (int i = 0; i < n - 1; i++) {
                double d = secant(u, v, i);
                if (d == 0) {
                    s[i] = 0;
                    s[i + 1] = 0;
                    continue;
                }
                double a = s[i] / d;
                double b = s[i + 1] / d;
                double size = Math.hypot(a, b);
                if (size > 3) {
                    s[i] = 3 / size * a * d;
                    s[i + 1] = 3 / size * b * d;
                }
            }
            return s;
        }

        /** One-sided parabola through three points, held to the sign of the end's own secant. */
        private double end(double near, double far, double first, double second) {
            double s = ((2 * near + far) * first - near * second) / (near + far);
            return s * first > 0 ? s : 0;
        }
    },
    /** Straight pieces: the slope jumps at every knot. */
    LINEAR {
        @Override
        double[] slopes(double[] u, double[] v) {
            return new double[0];
        }
    };

    /**
     * Another that as sound a hand might have taken, to see how much the joining matters: the natural spline for the monotone
     * form, the monotone form for any other.
     */
    Interpolation other() {
        return this == MONOTONE ? SPLINE : MONOTONE;
    }

    /** The word in a job file. */
    public String word() {
        return name().toLowerCase(java.util.Locale.ROOT);
    }

    /** Slopes at the knots; empty where the pieces are straight. Knots ascend; at least two. */
    abstract double[] slopes(double[] u, double[] v);

    static double secant(double[] u, double[] v, int i) {
        return (v[i + 1] - v[i]) / (u[i + 1] - u[i]);
    }

    /**
     * Slopes that make the second derivative continuous, by Thomas' algorithm. At each end the condition is {@code
     * diagonal}·s(end) + {@code beside}·s(neighbour) = right-hand side.
     */
    static double[] smooth(double[] u, double[] v, double diagonal, double beside, double first, double last) {
        int n = u.length;
        double[] upper = new double[n];
        double[] s = new double[n];
        upper[0] = beside / diagonal;
        s[0] = first / diagonal;
        for (int i = 1; i < n - 1; i++) {
            double hl = u[i] - u[i - 1];
            double hr = u[i + 1] - u[i];
            double right = 3 * (hr * secant(u, v, i - 1) + hl * secant(u, v, i));
            double pivot = 2 * (hl + hr) - hr * upper[i - 1];
            upper[i] = hl / pivot;
            s[i] = (right - hr * s[i - 1]) / pivot;
        }
        s[n - 1] = (last - beside * s[n - 2]) / (diagonal - beside * upper[n - 2]);
        for (int i = n - 2; i >= 0; i--) {
            s[i] -= upper[i] * s[i + 1];
        }
        return s;
    }
}
