package org.stillpath.path;

import java.util.Arrays;
import org.stillpath.medium.Ground;
import org.stillpath.ray.Status;

/**
 * A ray of the search through air of height alone, in height and elevation along the datum, with its derivative over the launch
 * elevation: dh/dx = (1 + h/R) tan e, de/dx = G(h), from a {@link LayerTable}, by the pair of Dormand and Prince, J. Comp. Appl.
 * Math. 6 (1980) 19, of orders 5 and 4. Mutable, one a search.
 */
final class LayerShot {
    /** The pair's matrix, row behind row: row i has i numbers. */
    private static final double[] A = {
        0.2,
        3 / 40.0,
        9 / 40.0,
        44 / 45.0,
        -56 / 15.0,
        32 / 9.0,
        19372 / 6561.0,
        -25360 / 2187.0,
        64448 / 6561.0,
        -212 / 729.0,
        9017 / 3168.0,
        -355 / 33.0,
        46732 / 5247.0,
        49 / 176.0,
        -5103 / 18656.0,
        35 / 384.0,
        0,
        500 / 1113.0,
        125 / 192.0,
        -2187 / 6784.0,
        11 / 84.0
    };

    private static final double[] E = {
        71 / 57600.0, 0, -71 / 16695.0, 71 / 1920.0, -17253 / 339200.0, 22 / 525.0, -1 / 40.0
    };
    /** How much finer a step is taken than the search asks: where a layer only just keeps a ray, errors grow a thousandfold. */
    private static final double FINER = 1e-3;

    private static final int MOST_STEPS = 20_000;
    private static final int LOOKS = 4;

    private final LayerTable table;
    private final Ground ground;
    private final double sunk;
    private final double distance;
    private final boolean level;
    private final double[] knots;
    private final double[][] k = new double[7][4];
    private final double[] y = new double[4];
    private final double[] z = new double[4];
    private int cell;

    LayerShot(LayerTable table, Ground ground, double sunk, double distance) {
        this.table = table;
        this.ground = ground;
        this.sunk = sunk;
        this.distance = distance;
        this.level = ground.isLevel();
        this.knots = ground.knots().orElse(new double[0]);
    }

    /** Height at the end of the last shot that arrived, metres. */
    double height() {
        return y[0];
    }

    /** d height/d launch elevation there, m/rad. */
    double slope() {
        return y[2];
    }

    /** Follows a ray to the distance. */
    Status to(double from, double elevation, double tolerance) {
        double allowed = Math.max(FINER * tolerance, 1e-13) * distance;
        y[0] = from;
        y[1] = elevation;
        y[2] = 0;
        y[3] = 1;
        double x = 0;
        if (!rate(y, k[0])) {
            return Status.OUTSIDE;
        }
        double h = 0.05 * distance;
        for (int i = 0; i < MOST_STEPS; i++) {
            h = Math.min(h, piece(x));
            boolean last = x + h >= distance * (1 - 1e-15);
            if (last) {
                h = distance - x;
            }
            double error = step(h, allowed);
            if (!(error <= 1)) {
                if (Double.isNaN(error) && h < 1e-9 * distance) {
                    return grounded(x) ? Status.GROUNDED : Status.OUTSIDE;
                }
                h *= Double.isNaN(error) ? 0.25 : Math.max(0.1, 0.9 * Math.pow(error, -0.2));
                if (h < 1e-13 * distance) {
                    return Status.LOST;
                }
                continue;
            }
            if (dips(x, h)) {
                return Status.GROUNDED;
            }
            System.arraycopy(z, 0, y, 0, 4);
            double[] first = k[0];
            k[0] = k[6];
            k[6] = first;
            if (last) {
                return Status.ARRIVED;
            }
            x += h;
            h *= Math.min(5, 0.9 * Math.pow(Math.max(error, 1e-10), -0.2));
        }
        return Status.LOST;
    }

    /** How far it is to the next knot of the ground: between knots a look at a few places finds what stands there. */
    private double piece(double x) {
        if (knots.length == 0) {
            return Double.POSITIVE_INFINITY;
        }
        int i = Arrays.binarySearch(knots, x + 1e-9 * distance);
        int next = i >= 0 ? i + 1 : -i - 1;
        return next < knots.length ? knots[next] - x : Double.POSITIVE_INFINITY;
    }

    /** Whether the edge that was met lies at the ground: a table that starts there. */
    private boolean grounded(double x) {
        return y[0] - ground.height(x) < 1e-3 && y[1] < 0;
    }

    /** Whether the step just computed goes below the ground. */
    private boolean dips(double x, double h) {
        if (z[0] < ground.height(x + h) - sunk) {
            return true;
        }
        if (level && !(y[1] < 0 && z[1] > 0)) {
            return false;
        }
        double d0 = k[0][0] * h;
        double d1 = k[6][0] * h;
        int looks = level ? 2 * LOOKS : LOOKS;
        for (int i = 1; i < looks; i++) {
            double t = (double) i / looks;
            double u = 1 - t;
            double at = u * u * (1 + 2 * t) * y[0] + t * t * (3 - 2 * t) * z[0] + t * u * (u * d0 - t * d1);
            if (at < ground.height(x + t * h) - sunk) {
                return true;
            }
        }
        if (level) {
            // the lowest point itself, where the cubic turns
            double t = d0 / (d0 - d1);
            double u = 1 - t;
            double at = u * u * (1 + 2 * t) * y[0] + t * t * (3 - 2 * t) * z[0] + t * u * (u * d0 - t * d1);
            return at < ground.height(x) - sunk;
        }
        return false;
    }

    private boolean rate(double[] s, double[] out) {
        double h = s[0];
        if (!(h >= table.low() && h <= table.high())) {
            return false;
        }
        cell = table.cell(h, cell);
        double tan = tan(s[1]);
        double curve = 1 / table.radius();
        double up = 1 + h * curve;
        out[0] = up * tan;
        out[1] = table.value(cell, h);
        out[2] = up * (1 + tan * tan) * s[3] + tan * curve * s[2];
        out[3] = table.slope(cell, h) * s[2];
        return true;
    }

    /** A step into {@code z}; its error over what is allowed, NaN where it leaves the table. */
    private double step(double h, double allowed) {
        // the four sums side by side: half the cost of the search is here
        int at = 0;
        for (int i = 1; i < 7; i++) {
            double s0 = 0;
            double s1 = 0;
            double s2 = 0;
            double s3 = 0;
            for (int m = 0; m < i; m++) {
                double a = A[at++];
                double[] km = k[m];
                s0 += a * km[0];
                s1 += a * km[1];
                s2 += a * km[2];
                s3 += a * km[3];
            }
            z[0] = y[0] + h * s0;
            z[1] = y[1] + h * s1;
            z[2] = y[2] + h * s2;
            z[3] = y[3] + h * s3;
            if (!rate(z, k[i])) {
                return Double.NaN;
            }
        }
        double e0 = 0;
        double e1 = 0;
        double e2 = 0;
        double e3 = 0;
        for (int m = 0; m < 7; m++) {
            double a = E[m];
            double[] km = k[m];
            e0 += a * km[0];
            e1 += a * km[1];
            e2 += a * km[2];
            e3 += a * km[3];
        }
        double place = Math.max(Math.abs(h * e0), Math.abs(h * e1) * distance) / allowed;
        double rise = Math.abs(h * e2) / (1e-3 * (distance + Math.abs(z[2])));
        double turn = Math.abs(h * e3) / (1e-3 * (1 + Math.abs(z[3])));
        return Math.max(place, Math.max(rise, turn));
    }

    /** The tangent; near 0, where sights are, by its series (next term 1e-17 of it). */
    private static double tan(double x) {
        if (!(Math.abs(x) < 0.04)) {
            return Math.tan(x);
        }
        double q = x * x;
        return x + x * q * (1 / 3.0 + q * (2 / 15.0 + q * (17 / 315.0 + q * (62 / 2835.0))));
    }
}
