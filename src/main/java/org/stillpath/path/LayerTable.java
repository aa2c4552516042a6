package org.stillpath.path;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.TreeSet;
import org.stillpath.medium.IndexField;
import org.stillpath.medium.Level;

/**
 * How fast a ray's elevation changes along the datum, G = (1 + (r/n) dn/dh)/R, against the height, tabulated with its
 * derivative for the search of a sight: cubics between nodes that are halved until the middle is predicted. Only the search
 * looks here, a hundred times cheaper than at the air itself; what it finds is brought to the asked accuracy with the air.
 * Immutable.
 */
final class LayerTable {
    private static final double PREDICTED = 1e-6;
    private static final int DEPTH = 14;
    private static final int MOST = 60_000;
    private static final int DECADE = 24;
    private static final int EVEN = 200;

    private final double radius;
    private final double[] at;
    private final double[] g;
    private final double[] slope;

    private LayerTable(double radius, double[] at, double[] g, double[] slope) {
        this.radius = radius;
        this.at = at;
        this.g = g;
        this.slope = slope;
    }

    /**
     * The table of a field of height alone.
     *
     * @param radius of the datum, metres; infinite for a flat earth
     * @param knots heights at which the air's derivatives jump
     * @param low least height that matters, metres
     * @param high greatest height that matters, metres
     * @return empty where the field's region does not depend on the height alone, or nothing of it is defined
     */
    static Optional<LayerTable> of(IndexField field, double radius, double[] knots, double low, double high) {
        double[] gradient = new double[3];
        for (Level l : field.limits()) {
            l.value(0, 0, 0.5 * (low + high), gradient);
            if (Math.abs(gradient[0]) + Math.abs(gradient[1]) > 1e-9) {
                return Optional.empty();
            }
        }
        TreeSet<Double> nodes = new TreeSet<>();
        double span = high - low;
        for (int i = 0; i <= EVEN; i++) {
            nodes.add(low + span * i / EVEN);
        }
        int many = (int) Math.ceil(DECADE * Math.log10(span / 1e-3));
        for (int i = 0; i < many; i++) {
            nodes.add(low + 1e-3 * Math.pow(10, (double) i / DECADE));
        }
        for (double k : knots) {
            double beside = 1e-9 * (1 + Math.abs(k));
            if (k - beside > low && k + beside < high) {
                nodes.add(k - beside);
                nodes.add(k + beside);
            }
        }
        Builder b = new Builder(field, radius);
        double[] first = nodes.stream().mapToDouble(Double::doubleValue).toArray();
        double[] before = {Double.NaN, Double.NaN, Double.NaN};
        for (double h : first) {
            double[] here = b.node(h);
            if (Double.isNaN(here[1])) {
                if (!b.out.isEmpty()) {
                    break;
                }
                continue;
            }
            if (!b.out.isEmpty()) {
                b.between(before, here, 0);
            }
            b.out.add(here);
            before = here;
        }
        int n = b.out.size();
        if (n < 2) {
            return Optional.empty();
        }
        double[] at = new double[n];
        double[] g = new double[n];
        double[] s = new double[n];
        for (int i = 0; i < n; i++) {
            at[i] = b.out.get(i)[0];
            g[i] = b.out.get(i)[1];
            s[i] = b.out.get(i)[2];
        }
        return Optional.of(new LayerTable(radius, at, g, s));
    }

    private static final class Builder {
        private final IndexField field;
        private final HeightProfile air;
        private final double radius;
        private final double[] gradient = new double[3];
        private final List<double[]> out = new ArrayList<>();

        Builder(IndexField field, double radius) {
            this.field = field;
            this.radius = radius;
            this.air = new HeightProfile(field, radius, 0);
        }

        /** Height, G and dG/dh; NaN outside the field's region. */
        double[] node(double h) {
            for (Level l : field.limits()) {
                if (l.value(0, 0, h, gradient) < 0) {
                    return new double[] {h, Double.NaN, Double.NaN};
                }
            }
            double[] turn = air.turn(h);
            return new double[] {h, turn[0], turn[1]};
        }

        void between(double[] a, double[] b, int depth) {
            double w = b[0] - a[0];
            double[] m = node(a[0] + 0.5 * w);
            double guess = 0.5 * (a[1] + b[1]) + 0.125 * w * (a[2] - b[2]);
            double unit = Double.isInfinite(radius) ? 1e-9 : 0.01 / radius;
            boolean good = Math.abs(m[1] - guess)
                    <= PREDICTED * (unit + Math.abs(a[1]) + Math.abs(b[1]) + w * (Math.abs(a[2]) + Math.abs(b[2])));
            if (good || Double.isNaN(m[1]) || depth >= DEPTH || out.size() > MOST) {
                return;
            }
            between(a, m, depth + 1);
            out.add(m);
            between(m, b, depth + 1);
        }
    }

    double radius() {
        return radius;
    }

    /** Least height of the table. */
    double low() {
        return at[0];
    }

    /** Greatest height of the table. */
    double high() {
        return at[at.length - 1];
    }

    /**
     * The cell that holds a height, near a guess of it: in strides that double, then by bisection, since a step of a ray passes
     * few of the table's thousands of cells.
     */
    int cell(double h, int guess) {
        int lo = guess;
        int hi = guess + 1;
        for (int stride = 1; h < at[lo] && lo > 0; stride *= 2) {
            hi = lo;
            lo = Math.max(0, lo - stride);
        }
        for (int stride = 1; h >= at[hi] && hi < at.length - 1; stride *= 2) {
            lo = hi;
            hi = Math.min(at.length - 1, hi + stride);
        }
        while (hi - lo > 1) {
            int middle = (lo + hi) >>> 1;
            if (at[middle] <= h) {
                lo = middle;
            } else {
                hi = middle;
            }
        }
        return lo;
    }

    /** G at a height of a cell. */
    double value(int c, double h) {
        double w = at[c + 1] - at[c];
        double t = (h - at[c]) / w;
        double u = 1 - t;
        return u * u * (1 + 2 * t) * g[c]
                + t * t * (3 - 2 * t) * g[c + 1]
                + t * u * w * (u * slope[c] - t * slope[c + 1]);
    }

    /** dG/dh at a height of a cell. */
    double slope(int c, double h) {
        double w = at[c + 1] - at[c];
        double t = (h - at[c]) / w;
        double u = 1 - t;
        return 6 * t * u * (g[c + 1] - g[c]) / w + u * (1 - 3 * t) * slope[c] + t * (3 * t - 2) * slope[c + 1];
    }
}
