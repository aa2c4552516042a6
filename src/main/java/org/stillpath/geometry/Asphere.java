package org.stillpath.geometry;

import java.util.Arrays;

/**
 * A surface given by its sag, F = z − s(x, y), with two meridians and even powers of the distance from the axis:
 *
 * <pre>s = (cx x² + cy y²)/(1 + √(1 − (1 + kx) cx² x² − (1 + ky) cy² y²)) + Σ aₖ (x² + y²)^(k/2)</pre>
 *
 * <p>the form of ISO 10110-12. Where the root has no real value the surface has no points; F is continued there with the
 * root at zero, so that a search may overstep the edge, and {@link #onCap} says no. A straight line is met by sampling and
 * bisection, which costs some 300 evaluations of the sag; conicoids without powers are {@link Quadric}s and cost none.
 *
 * @param cx vertex curvature in the xz section, 1/m; {@code cy} in the yz section
 * @param kx conic constant in the xz section; {@code ky} in the yz section
 * @param exponents even exponents, each at least 2, ascending
 * @param coefficients as many coefficients; that of r^k in m^(1−k)
 */
public record Asphere(double cx, double cy, double kx, double ky, int[] exponents, double[] coefficients)
        implements Form {
    private static final int SAMPLES = 256;
    private static final int BISECTIONS = 60;

    public Asphere {
        if (exponents.length != coefficients.length) {
            throw new IllegalArgumentException("as many coefficients as exponents are needed");
        }
        for (int k : exponents) {
            if (k < 2 || k % 2 != 0) {
                throw new IllegalArgumentException("exponents must be even and at least 2: " + k);
            }
        }
        exponents = exponents.clone();
        coefficients = coefficients.clone();
    }

    /** The exponents (a copy). */
    @Override
    public int[] exponents() {
        return exponents.clone();
    }

    /** The coefficients (a copy). */
    @Override
    public double[] coefficients() {
        return coefficients.clone();
    }

    @Override
    public void evaluate(double x, double y, double z, double[] out) {
        double a = cx * x * x + cy * y * y;
        double ax = 2 * cx * x;
        double ay = 2 * cy * y;
        double ux = (1 + kx) * cx * cx;
        double uy = (1 + ky) * cy * cy;
        double under = 1 - ux * x * x - uy * y * y;
        double s;
        double sx;
        double sy;
        double sxx;
        double sxy;
        double syy;
        if (under > 0) {
            double w = Math.sqrt(under);
            double wx = -ux * x / w;
            double wy = -uy * y / w;
            double wxx = (-ux - wx * wx) / w;
            double wxy = -wx * wy / w;
            double wyy = (-uy - wy * wy) / w;
            double d = 1 + w;
            s = a / d;
            sx = (ax - s * wx) / d;
            sy = (ay - s * wy) / d;
            sxx = (2 * cx - 2 * sx * wx - s * wxx) / d;
            sxy = (-sx * wy - sy * wx - s * wxy) / d;
            syy = (2 * cy - 2 * sy * wy - s * wyy) / d;
        } else {
            s = a;
            sx = ax;
            sy = ay;
            sxx = 2 * cx;
            sxy = 0;
            syy = 2 * cy;
        }
        double u = x * x + y * y;
        for (int i = 0; i < exponents.length; i++) {
            int m = exponents[i] / 2;
            double low = m >= 2 ? power(u, m - 2) : 0;
            double mid = m >= 2 ? low * u : 1;
            double c = coefficients[i];
            s += c * mid * u;
            double first = 2 * m * c * mid;
            double second = 4.0 * m * (m - 1) * c * low;
            sx += first * x;
            sy += first * y;
            sxx += first + second * x * x;
            sxy += second * x * y;
            syy += first + second * y * y;
        }
        out[0] = z - s;
        out[1] = -sx;
        out[2] = -sy;
        out[3] = 1;
        out[4] = -sxx;
        out[5] = -sxy;
        out[6] = 0;
        out[7] = -syy;
        out[8] = 0;
        out[9] = 0;
    }

    @Override
    public boolean onCap(double x, double y, double z) {
        return 1 - (1 + kx) * cx * cx * x * x - (1 + ky) * cy * cy * y * y >= 0;
    }

    @Override
    public int crossings(double x, double y, double z, double dx, double dy, double dz, double reach, double[] out) {
        // sampled most densely where the line passes the vertex: s = middle + reach·t³ with t from −1 to 1
        double middle = -(x * dx + y * dy + z * dz);
        double span = Math.abs(middle) + reach;
        double[] f = new double[10];
        int count = 0;
        double before = Double.NaN;
        double fBefore = 0;
        for (int i = 0; i <= SAMPLES && count < out.length; i++) {
            double t = 2.0 * i / SAMPLES - 1;
            double at = middle + span * t * t * t;
            double value = along(x, y, z, dx, dy, dz, at, f);
            if (value == 0) {
                out[count++] = at;
            } else if (i > 0 && fBefore != 0 && value > 0 != fBefore > 0) {
                out[count++] = root(x, y, z, dx, dy, dz, before, at, fBefore, f);
            }
            before = at;
            fBefore = value;
        }
        return count;
    }

    @Override
    public double sag(double x, double y) {
        if (!onCap(x, y, 0)) {
            return Double.NaN;
        }
        double[] f = new double[10];
        evaluate(x, y, 0, f);
        return -f[0];
    }

    @Override
    public boolean closed() {
        return false;
    }

    @Override
    public double curvature() {
        return Math.max(Math.abs(cx), Math.abs(cy));
    }

    private double along(double x, double y, double z, double dx, double dy, double dz, double s, double[] f) {
        evaluate(x + s * dx, y + s * dy, z + s * dz, f);
        return f[0];
    }

    private double root(
            double x,
            double y,
            double z,
            double dx,
            double dy,
            double dz,
            double lo,
            double hi,
            double fLo,
            double[] f) {
        double a = lo;
        double b = hi;
        double s = 0.5 * (a + b);
        for (int i = 0; i < BISECTIONS; i++) {
            double value = along(x, y, z, dx, dy, dz, s, f);
            if (value == 0) {
                return s;
            }
            if (value > 0 == fLo > 0) {
                a = s;
            } else {
                b = s;
            }
            double slope = f[1] * dx + f[2] * dy + f[3] * dz;
            double newton = s - value / slope;
            if (newton == s) {
                return s;
            }
            s = newton > a && newton < b ? newton : 0.5 * (a + b);
        }
        return s;
    }

    private static double power(double u, int n) {
        double p = 1;
        for (int i = 0; i < n; i++) {
            p *= u;
        }
        return p;
    }

    @Override
    public boolean equals(Object o) {
        return o instanceof Asphere a
                && cx == a.cx
                && cy == a.cy
                && kx == a.kx
                && ky == a.ky
                && Arrays.equals(exponents, a.exponents)
                && Arrays.equals(coefficients, a.coefficients);
    }

    @Override
    public int hashCode() {
        return Double.hashCode(cx) + 31 * Arrays.hashCode(coefficients);
    }
}
