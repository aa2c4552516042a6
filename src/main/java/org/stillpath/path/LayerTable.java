package org.stillpath.path;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.Comparator;
import java.util.List;
import java.util.Optional;
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
    /** Heights sampled at once. */
    private static final int BLOCK = 64;

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
        double[] first = first(knots, low, high);
        Builder b = new Builder(field, radius);
        List<double[]> nodes = b.nodes(first);
        int from = 0;
        while (from < nodes.size() && Double.isNaN(nodes.get(from)[1])) {
            from++;
        }
        int until = from;
        while (until < nodes.size() && !Double.isNaN(nodes.get(until)[1])) {
            until++;
        }
        if (until - from < 2) {
            return Optional.empty();
        }
        List<double[]> all = b.refined(nodes.subList(from, until));
        int n = all.size();
        double[] at = new double[n];
        double[] g = new double[n];
        double[] s = new double[n];
        for (int i = 0; i < n; i++) {
            at[i] = all.get(i)[0];
            g[i] = all.get(i)[1];
            s[i] = all.get(i)[2];
        }
        return Optional.of(new LayerTable(radius, at, g, s));
    }

    /** The heights that are looked at first, ascending: evenly, crowded above the least, and beside the knots. */
    private static double[] first(double[] knots, double low, double high) {
        double span = high - low;
        int many = (int) Math.ceil(DECADE * Math.log10(span / 1e-3));
        double[] list = new double[EVEN + 1 + many + 2 * knots.length];
        int n = 0;
        for (int i = 0; i <= EVEN; i++) {
            list[n++] = low + span * i / EVEN;
        }
        for (int i = 0; i < many; i++) {
            list[n++] = low + 1e-3 * Math.pow(10, (double) i / DECADE);
        }
        for (double k : knots) {
            double beside = 1e-9 * (1 + Math.abs(k));
            if (k - beside > low && k + beside < high) {
                list[n++] = k - beside;
                list[n++] = k + beside;
            }
        }
        return Arrays.stream(list, 0, n).sorted().distinct().toArray();
    }

    /** Mutable, for one table. */
    private static final class Builder {
        private final IndexField field;
        private final HeightProfile air;
        private final double radius;
        private final double[] gradient = new double[3];
        private final double[] turn = new double[BLOCK];
        private final double[] change = new double[BLOCK];

        Builder(IndexField field, double radius) {
            this.field = field;
            this.radius = radius;
            this.air = new HeightProfile(field, radius, 0);
        }

        /** Height, G and dG/dh at heights; NaN outside the field's region. */
        List<double[]> nodes(double[] heights) {
            List<double[]> list = new ArrayList<>(heights.length);
            for (int from = 0; from < heights.length; from += BLOCK) {
                double[] block = Arrays.copyOfRange(heights, from, Math.min(heights.length, from + BLOCK));
                air.turns(block, block.length, turn, change);
                for (int i = 0; i < block.length; i++) {
                    boolean inside = inside(block[i]);
                    list.add(new double[] {block[i], inside ? turn[i] : Double.NaN, inside ? change[i] : Double.NaN});
                }
            }
            return list;
        }

        private boolean inside(double h) {
            for (Level l : field.limits()) {
                if (l.value(0, 0, h, gradient) < 0) {
                    return false;
                }
            }
            return true;
        }

        /** The nodes with more between them, ascending: the middles of one depth are sampled together. */
        List<double[]> refined(List<double[]> nodes) {
            List<double[]> all = new ArrayList<>(nodes);
            List<double[]> pairs = new ArrayList<>();
            for (int i = 1; i < nodes.size(); i++) {
                pairs.add(nodes.get(i - 1));
                pairs.add(nodes.get(i));
            }
            for (int depth = 0; depth < DEPTH && !pairs.isEmpty() && all.size() <= MOST; depth++) {
                double[] middles = new double[pairs.size() / 2];
                for (int i = 0; i < middles.length; i++) {
                    double low = pairs.get(2 * i)[0];
                    middles[i] = low + 0.5 * (pairs.get(2 * i + 1)[0] - low);
                }
                List<double[]> found = nodes(middles);
                List<double[]> next = new ArrayList<>();
                for (int i = 0; i < middles.length; i++) {
                    double[] a = pairs.get(2 * i);
                    double[] m = found.get(i);
                    double[] b = pairs.get(2 * i + 1);
                    if (!Double.isNaN(m[1]) && !isPredicted(a, m, b)) {
                        all.add(m);
                        next.addAll(List.of(a, m, m, b));
                    }
                }
                pairs = next;
            }
            all.sort(Comparator.comparingDouble(n -> n[0]));
            return all;
        }

        /** Whether the cubic between two nodes tells the middle. */
        private boolean isPredicted(double[] a, double[] m, double[] b) {
            double w = b[0] - a[0];
            double guess = 0.5 * (a[1] + b[1]) + 0.125 * w * (a[2] - b[2]);
            double unit = Double.isInfinite(radius) ? 1e-9 : 0.01 / radius;
            return Math.abs(m[1] - guess)
                    <= PREDICTED * (unit + Math.abs(a[1]) + Math.abs(b[1]) + w * (Math.abs(a[2]) + Math.abs(b[2])));
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
