package org.stillpath.medium;

import java.util.Arrays;
import java.util.Optional;
import java.util.stream.IntStream;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;

/**
 * Scattered values resampled on a rectilinear grid, so that rays see a C² field whose derivatives are exact.
 *
 * <p>Each grid node gets the value there of a quadratic polynomial that is fitted to the {@value #NEIGHBOURS} nearest
 * nodes by weighted least squares (moving least squares; Lancaster and Salkauskas, Math. Comp. 37 (1981) 141), the
 * weights falling with the distance (McLain, Computer J. 17 (1974) 318). Chosen over a triangulation, whose field has
 * kinks at every face, and over radial functions, whose equations grow with the square of the nodes. A direction that the
 * neighbours do not resolve, such as the depth of two layers, is left out of a polynomial by its rank. An axis on which
 * the nodes lie in a few layers gets these as planes; others get evenly spaced ones, about as many grid nodes as there
 * are nodes in all. Nodes that form a grid are taken as they are. Corners of the grid's box without nodes are
 * extrapolated, within the range of the values.
 *
 * <p>What the grid leaves of the values at the nodes is told. Costs some 10 µs a grid node.
 */
final class ScatteredNodes {
    /** Nodes that a polynomial is fitted to: three times its terms. */
    static final int NEIGHBOURS = 30;

    private static final int TERMS = 10;
    /** An axis with no more distinct places than these is taken for layers. */
    private static final int MOST_LAYERS = 48;
    /** Places nearer than this part of the axis are one layer. */
    private static final double SAME = 1e-6;

    private static final int FEWEST_PLANES = 5;
    private static final int MOST_PLANES = 301;
    private static final int FEWEST_NODES = 20_000;
    /** Pivots below this part of the first one are no direction that the neighbours resolve. */
    private static final double RANK = 1e-6;

    private final Grid grid;
    private final int[] planes;
    private final boolean exact;
    private final double rms;
    private final double most;
    private final double span;

    private ScatteredNodes(Grid grid, int[] planes, boolean exact, double rms, double most, double span) {
        this.grid = grid;
        this.planes = planes;
        this.exact = exact;
        this.rms = rms;
        this.most = most;
        this.span = span;
    }

    /** Why nodes cannot be resampled; empty if they can. {@code columns} are x, y, z in metres and the value. */
    static Optional<String> refusal(double[][] columns) {
        double longest = 0;
        double[] length = new double[3];
        for (int a = 0; a < 3; a++) {
            length[a] = Arrays.stream(columns[a]).max().orElse(0)
                    - Arrays.stream(columns[a]).min().orElse(0);
            longest = Math.max(longest, length[a]);
        }
        for (int a = 0; a < 3; a++) {
            if (!(length[a] > SAME * longest)) {
                return Optional.of("all nodes have the same " + "xyz".charAt(a) + "; a plate has a thickness");
            }
        }
        return Optional.empty();
    }

    /** Resamples values at places, in metres; at least ten of them, not all in a plane. */
    static ScatteredNodes resample(double[] x, double[] y, double[] z, double[] value) {
        double[][] at = {x, y, z};
        double[][] axes = new double[3][];
        for (int a = 0; a < 3; a++) {
            axes[a] = layers(at[a]);
        }
        double least = Arrays.stream(value).min().orElse(0);
        double greatest = Arrays.stream(value).max().orElse(0);
        double[] values = structured(at, value);
        boolean exact = values.length > 0;
        if (exact) {
            for (int a = 0; a < 3; a++) {
                axes[a] = distinct(at[a]);
            }
        } else {
            spread(at, axes);
            values = fitted(at, value, axes, least, greatest);
        }
        Grid grid = Grid.of(axes[0], axes[1], axes[2], values, Beyond.FAULT);
        int n = value.length;
        Samples s = new Samples(n);
        grid.sample(x, y, z, n, Double.NaN, Order.VALUE, s);
        double sum = 0;
        double most = 0;
        for (int i = 0; i < n; i++) {
            double d = Math.abs(s.value[i] - value[i]);
            sum += d * d;
            most = Math.max(most, d);
        }
        int[] planes = {axes[0].length, axes[1].length, axes[2].length};
        return new ScatteredNodes(grid, planes, exact, Math.sqrt(sum / n), most, greatest - least);
    }

    /** The field. */
    Grid grid() {
        return grid;
    }

    /** Number of planes along each axis. */
    int[] planes() {
        return planes.clone();
    }

    /** Whether the nodes form a grid. */
    boolean exact() {
        return exact;
    }

    /** Root mean square of what the grid leaves at the nodes. */
    double rms() {
        return rms;
    }

    /** The most that the grid leaves at a node. */
    double most() {
        return most;
    }

    /** The span of the values. */
    double span() {
        return span;
    }

    /** The different places along an axis, ascending; places within {@link #SAME} are one. */
    private static double[] distinct(double[] u) {
        double[] sorted = u.clone();
        Arrays.sort(sorted);
        double near = SAME * (sorted[sorted.length - 1] - sorted[0]);
        int count = 1;
        for (int i = 1; i < sorted.length; i++) {
            if (sorted[i] - sorted[count - 1] > near) {
                sorted[count++] = sorted[i];
            }
        }
        return Arrays.copyOf(sorted, count);
    }

    /** The layers of an axis; none where there are too many. */
    private static double[] layers(double[] u) {
        double[] d = distinct(u);
        return d.length <= MOST_LAYERS ? d : new double[0];
    }

    /** Values by grid node where the nodes form a grid; none otherwise. */
    private static double[] structured(double[][] at, double[] value) {
        double[][] axes = {distinct(at[0]), distinct(at[1]), distinct(at[2])};
        long nodes = (long) axes[0].length * axes[1].length * axes[2].length;
        if (nodes != value.length) {
            return new double[0];
        }
        double[] values = new double[value.length];
        Arrays.fill(values, Double.NaN);
        for (int i = 0; i < value.length; i++) {
            int index = 0;
            for (int a = 2; a >= 0; a--) {
                index = index * axes[a].length + nearest(axes[a], at[a][i]);
            }
            values[index] = value[i];
        }
        return Arrays.stream(values).anyMatch(Double::isNaN) ? new double[0] : values;
    }

    private static int nearest(double[] axis, double u) {
        int i = Arrays.binarySearch(axis, u);
        if (i >= 0) {
            return i;
        }
        int above = Math.min(-i - 1, axis.length - 1);
        int below = Math.max(above - 1, 0);
        return u - axis[below] < axis[above] - u ? below : above;
    }

    /** Puts evenly spaced planes on the axes without layers. */
    private static void spread(double[][] at, double[][] axes) {
        double nodes = Math.max(FEWEST_NODES, at[0].length);
        double extents = 1;
        int open = 0;
        double[] first = new double[3];
        double[] length = new double[3];
        for (int a = 0; a < 3; a++) {
            first[a] = Arrays.stream(at[a]).min().orElse(0);
            length[a] = Arrays.stream(at[a]).max().orElse(0) - first[a];
            if (axes[a].length > 0) {
                nodes /= axes[a].length;
            } else {
                extents *= length[a];
                open++;
            }
        }
        double step = open == 0 ? 0 : Math.pow(extents / nodes, 1.0 / open);
        for (int a = 0; a < 3; a++) {
            if (axes[a].length == 0) {
                int n = (int) Math.max(FEWEST_PLANES, Math.min(MOST_PLANES, Math.round(length[a] / step) + 1));
                axes[a] = new double[n];
                for (int i = 0; i < n; i++) {
                    axes[a][i] = first[a] + length[a] * i / (n - 1);
                }
            }
        }
    }

    private static double[] fitted(double[][] at, double[] value, double[][] axes, double least, double greatest) {
        int nx = axes[0].length;
        int ny = axes[1].length;
        double[] unit = new double[3];
        for (int a = 0; a < 3; a++) {
            unit[a] = (axes[a][axes[a].length - 1] - axes[a][0]) / (axes[a].length - 1);
        }
        Bins bins = Bins.of(at, unit);
        double[] values = new double[nx * ny * axes[2].length];
        IntStream.range(0, ny * axes[2].length).parallel().forEach(row -> {
            Fit fit = new Fit();
            for (int i = 0; i < nx; i++) {
                double[] p = {axes[0][i] / unit[0], axes[1][row % ny] / unit[1], axes[2][row / ny] / unit[2]};
                double v = fit.at(bins, value, p);
                values[i + nx * row] = Math.max(least, Math.min(greatest, v));
            }
        });
        return values;
    }

    /** Nodes sorted into boxes of a few units each, in units of the planes' spacing. */
    private record Bins(double[][] at, double[] first, int[] counts, int[] start, int[] nodes) {
        private static final double EDGE = 2;

        static Bins of(double[][] metres, double[] unit) {
            int n = metres[0].length;
            double[][] at = new double[3][n];
            double[] first = new double[3];
            int[] counts = new int[3];
            for (int a = 0; a < 3; a++) {
                double low = Double.POSITIVE_INFINITY;
                double high = Double.NEGATIVE_INFINITY;
                for (int i = 0; i < n; i++) {
                    at[a][i] = metres[a][i] / unit[a];
                    low = Math.min(low, at[a][i]);
                    high = Math.max(high, at[a][i]);
                }
                first[a] = low;
                counts[a] = (int) ((high - low) / EDGE) + 1;
            }
            int[] start = new int[counts[0] * counts[1] * counts[2] + 1];
            int[] box = new int[n];
            for (int i = 0; i < n; i++) {
                int b = 0;
                for (int a = 2; a >= 0; a--) {
                    b = b * counts[a] + place(at[a][i], first[a], counts[a]);
                }
                box[i] = b;
                start[b + 1]++;
            }
            for (int b = 1; b < start.length; b++) {
                start[b] += start[b - 1];
            }
            int[] nodes = new int[n];
            int[] next = start.clone();
            for (int i = 0; i < n; i++) {
                nodes[next[box[i]]++] = i;
            }
            return new Bins(at, first, counts, start, nodes);
        }

        private static int place(double u, double first, int count) {
            return (int) Math.max(0, Math.min(count - 1, Math.floor((u - first) / EDGE)));
        }

        /** The nearest nodes to p with their squared distances, nearest last to be found first to be dropped. */
        int nearest(double[] p, int[] found, double[] distance) {
            int[] c = new int[3];
            for (int a = 0; a < 3; a++) {
                c[a] = place(p[a], first[a], counts[a]);
            }
            int rings = Math.max(counts[0], Math.max(counts[1], counts[2]));
            int count = 0;
            for (int ring = 0; ring <= rings; ring++) {
                // whatever lies in farther boxes is at least this far away
                double safe = (ring - 1) * EDGE;
                if (count == found.length && safe > 0 && distance[count - 1] <= safe * safe) {
                    break;
                }
                for (int k = Math.max(0, c[2] - ring); k <= Math.min(counts[2] - 1, c[2] + ring); k++) {
                    for (int j = Math.max(0, c[1] - ring); j <= Math.min(counts[1] - 1, c[1] + ring); j++) {
                        boolean shell = Math.abs(k - c[2]) == ring || Math.abs(j - c[1]) == ring;
                        int step = shell || ring == 0 ? 1 : 2 * ring;
                        for (int i = c[0] - ring; i <= c[0] + ring; i += step) {
                            if (i >= 0 && i < counts[0]) {
                                count = collect(i + counts[0] * (j + counts[1] * k), p, found, distance, count);
                            }
                        }
                    }
                }
            }
            return count;
        }

        private int collect(int box, double[] p, int[] found, double[] distance, int count) {
            int n = count;
            for (int s = start[box]; s < start[box + 1]; s++) {
                int node = nodes[s];
                double dx = at[0][node] - p[0];
                double dy = at[1][node] - p[1];
                double dz = at[2][node] - p[2];
                double d = dx * dx + dy * dy + dz * dz;
                if (n == found.length && d >= distance[n - 1]) {
                    continue;
                }
                int i = n < found.length ? n++ : n - 1;
                while (i > 0 && distance[i - 1] > d) {
                    distance[i] = distance[i - 1];
                    found[i] = found[i - 1];
                    i--;
                }
                distance[i] = d;
                found[i] = node;
            }
            return n;
        }
    }

    /** A weighted quadratic fit about one place, by Householder's QR with column pivoting; one object a thread. */
    private static final class Fit {
        private static final double CORE = 0.01;

        private final int[] found = new int[NEIGHBOURS];
        private final double[] distance = new double[NEIGHBOURS];
        private final double[][] a = new double[TERMS][NEIGHBOURS];
        private final double[] b = new double[NEIGHBOURS];
        private final int[] order = new int[TERMS];

        double at(Bins bins, double[] value, double[] p) {
            int m = bins.nearest(p, found, distance);
            double reach = Math.sqrt(distance[m - 1]) * 1.01 + 1e-9;
            double mean = 0;
            for (int i = 0; i < m; i++) {
                mean += value[found[i]] / m;
            }
            for (int i = 0; i < m; i++) {
                int node = found[i];
                double far = 1 - Math.sqrt(distance[i]) / reach;
                double w = far / Math.sqrt(distance[i] / (reach * reach) + CORE * CORE);
                double dx = (bins.at[0][node] - p[0]) / reach;
                double dy = (bins.at[1][node] - p[1]) / reach;
                double dz = (bins.at[2][node] - p[2]) / reach;
                double[] terms = {1, dx, dy, dz, dx * dx, dy * dy, dz * dz, dx * dy, dx * dz, dy * dz};
                for (int t = 0; t < TERMS; t++) {
                    a[t][i] = w * terms[t];
                }
                b[i] = w * (value[node] - mean);
            }
            return mean + constantOf(m);
        }

        /** The coefficient of the constant term. */
        private double constantOf(int m) {
            for (int t = 0; t < TERMS; t++) {
                order[t] = t;
            }
            double firstPivot = 0;
            int rank = 0;
            for (int k = 0; k < Math.min(TERMS, m); k++) {
                // the constant is always taken first: it is what is asked for
                if (k > 0) {
                    pivot(k, m);
                }
                double[] v = a[order[k]];
                double norm = norm(v, k, m);
                if (k == 0) {
                    firstPivot = norm;
                }
                if (!(norm > RANK * firstPivot)) {
                    break;
                }
                double alpha = v[k] > 0 ? -norm : norm;
                v[k] -= alpha;
                double scale = -1 / (alpha * v[k]);
                for (int t = k + 1; t < TERMS; t++) {
                    reflect(v, a[order[t]], scale, k, m);
                }
                reflect(v, b, scale, k, m);
                // the reflector is not needed again, and the diagonal takes its place
                Arrays.fill(v, k + 1, m, 0);
                v[k] = alpha;
                rank++;
            }
            double[] c = new double[TERMS];
            for (int k = rank - 1; k >= 0; k--) {
                double s = b[k];
                for (int t = k + 1; t < rank; t++) {
                    s -= a[order[t]][k] * c[t];
                }
                c[k] = s / a[order[k]][k];
            }
            return c[0];
        }

        private void pivot(int k, int m) {
            int best = k;
            double largest = -1;
            for (int t = k; t < TERMS; t++) {
                double n = norm(a[order[t]], k, m);
                if (n > largest) {
                    largest = n;
                    best = t;
                }
            }
            int swapped = order[k];
            order[k] = order[best];
            order[best] = swapped;
        }

        private static double norm(double[] v, int from, int to) {
            double s = 0;
            for (int i = from; i < to; i++) {
                s += v[i] * v[i];
            }
            return Math.sqrt(s);
        }

        private static void reflect(double[] v, double[] target, double scale, int from, int to) {
            double s = 0;
            for (int i = from; i < to; i++) {
                s += v[i] * target[i];
            }
            s *= scale;
            for (int i = from; i < to; i++) {
                target[i] -= s * v[i];
            }
        }
    }
}
