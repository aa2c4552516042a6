package org.stillpath.path;

import java.util.Arrays;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;
import org.stillpath.medium.Level;

/**
 * One march of the first-arrival fronts through a grid. Mutable, used once by one thread.
 *
 * <p>The unknown is the factor U of S = n₀ r (1 + U). With the unit vector d away from the source and ε = (n² − n₀²)/n₀²
 * the equation |∇S| = n reads
 *
 * <pre>Σ (d_k (1 + U) + r ∂_k U)² = 1 + ε</pre>
 *
 * <p>Nodes next to the source get U from the straight segment, less what bending saves. Then nodes are accepted in the order
 * of S, each from accepted neighbours. Two things remain that would cost the order: neighbours that came too late for a
 * difference of second order, and axes along which a node is lower than both neighbours, where Godunov's rule takes ∂S = 0
 * though near the source the slope lost is of the order h/r. So the nodes are polished in the order of their acceptance, with
 * all neighbours known: where an axis has no lower neighbour, the slope is taken over from the node upwind.
 */
final class March {
    /** Nodes this many cells or less from the source, along each axis, get their value from the expansion about it. */
    private static final double NEAR = 2 + 1e-9;

    private static final int POLISHINGS = 12;
    /** What the change of a round must fall to, as a part of the first round's, for polishing to stop. A round gains a digit. */
    private static final double SETTLED = 1e-6;

    /** How much a node may exceed the straight way from its neighbour: what the index may change between them. */
    private static final double SLACK = 1.05;
    /** How much, of the straight way, S may rise again behind an upwind neighbour that a difference still reaches across. */
    private static final double TURN = 0.5;

    /** The steepest slope, as a part of n₀, along an axis without an upwind neighbour. */
    private static final double STEEP = 0.25;

    /** Gauss-Legendre places and weights on [0, 1]. */
    private static final double GAUSS = 0.5 * Math.sqrt(0.6);

    private static final double[] PLACES = {0.5 - GAUSS, 0.5, 0.5 + GAUSS};
    private static final double[] WEIGHTS = {5 / 18.0, 8 / 18.0, 5 / 18.0};

    private static final byte OPEN = 0;
    private static final byte FIXED = 1;
    private static final byte WALL = 2;
    private static final byte ACCEPTED = 4;

    private final IndexField field;
    private final Vector source;
    private final FrontGrid grid;
    private final int dimensions;
    private final int[] count;
    private final int[] stride;
    private final double[] h;
    private final double[] at;
    private final double excess;
    private final double square;

    private final byte[] kind;
    private final double[] eps;
    /** U, and S/n₀. */
    private final double[] u;

    private final double[] s;
    /** The heap from the front; from the back the accepted nodes in their order. Together they never exceed the grid. */
    private final int[] heap;

    private final int[] place;
    private int inHeap;
    private int accepted;

    // the node in hand
    private final int[] index = new int[3];
    private final double[] d = new double[3];
    private final double[] alpha = new double[3];
    private final double[] beta = new double[3];
    private final double[] behind = new double[3];
    private final boolean[] used = new boolean[3];
    private double r;
    private double ratio;

    /**
     * @param source inside the grid, where the field is defined
     * @param e n² − 1 at the source
     */
    March(IndexField field, Vector source, double e, FrontGrid grid) {
        this.field = field;
        this.source = source;
        this.grid = grid;
        this.dimensions = grid.axes().size();
        this.count = grid.axes().stream().mapToInt(FrontGrid.Axis::count).toArray();
        this.h = grid.axes().stream().mapToDouble(FrontGrid.Axis::spacing).toArray();
        this.stride = new int[dimensions];
        int size = 1;
        for (int k = 0; k < dimensions; k++) {
            stride[k] = size;
            size *= count[k];
        }
        this.at = grid.coordinatesInside(source, "source");
        this.excess = e;
        this.square = 1 + e;
        this.kind = new byte[size];
        this.eps = new double[size];
        this.u = new double[size];
        this.s = new double[size];
        this.heap = new int[size];
        this.place = new int[size];
    }

    Fronts run() {
        Arrays.fill(u, Double.POSITIVE_INFINITY);
        Arrays.fill(s, Double.POSITIVE_INFINITY);
        Arrays.fill(place, -1);
        sample();
        begin();
        while (inHeap > 0) {
            int node = pop();
            kind[node] |= ACCEPTED;
            accepted++;
            heap[heap.length - accepted] = node;
            locate(node);
            int i = index[0];
            int j = index[1];
            int m = index[2];
            for (int k = 0; k < dimensions; k++) {
                int n = k == 0 ? i : k == 1 ? j : m;
                if (n > 0) {
                    update(node - stride[k]);
                }
                if (n < count[k] - 1) {
                    update(node + stride[k]);
                }
            }
        }
        double first = polish();
        double change = first;
        for (int p = 1; p < POLISHINGS && change > SETTLED * first; p++) {
            change = polish();
        }
        return new Fronts(grid, source, excess / (Math.sqrt(square) + 1), u);
    }

    /** ε at all nodes, row by row; marks the walls. */
    private void sample() {
        int row = count[0];
        double[] x = new double[row];
        double[] y = new double[row];
        double[] z = new double[row];
        Samples out = new Samples(row);
        Vector along = grid.axes().get(0).direction();
        for (int start = 0; start < kind.length; start += row) {
            Vector p = grid.node(start);
            for (int i = 0; i < row; i++) {
                x[i] = p.x() + i * h[0] * along.x();
                y[i] = p.y() + i * h[0] * along.y();
                z[i] = p.z() + i * h[0] * along.z();
            }
            ratios(x, y, z, row, out);
            for (int i = 0; i < row; i++) {
                double v = out.value[i];
                eps[start + i] = v;
                kind[start + i] = Double.isNaN(v) ? WALL : OPEN;
            }
        }
    }

    /** Puts ε in the place of n² − 1; NaN outside the limits and where there is no index. */
    private void ratios(double[] x, double[] y, double[] z, int n, Samples out) {
        field.sample(x, y, z, n, Order.VALUE, out);
        double[] g = new double[3];
        for (int i = 0; i < n; i++) {
            double v = (out.value[i] - excess) / square;
            boolean inside = v > -1 && v < Double.POSITIVE_INFINITY;
            for (Level l : field.limits()) {
                inside = inside && l.value(x[i], y[i], z[i], g) >= 0;
            }
            out.value[i] = inside ? v : Double.NaN;
        }
    }

    /**
     * The nodes next to the source: the straight segment by Gauss's rule, less the third-order term of bending, U = ∫(n − n₀)
     * ds/(n₀ r) − |a⊥|² r²/(24 n₀⁴) with a = ½∇n² across the segment (from the closed form for n² linear in place, expanded).
     */
    private void begin() {
        double[] force = force();
        double[] x = new double[PLACES.length];
        double[] y = new double[PLACES.length];
        double[] z = new double[PLACES.length];
        Samples out = new Samples(PLACES.length);
        int[] low = new int[3];
        int[] high = new int[3];
        for (int k = 0; k < dimensions; k++) {
            low[k] = (int) Math.max(0, Math.ceil(at[k] / h[k] - NEAR));
            high[k] = (int) Math.min(count[k] - 1, Math.floor(at[k] / h[k] + NEAR));
        }
        for (int m = low[2]; m <= high[2]; m++) {
            for (int j = low[1]; j <= high[1]; j++) {
                for (int i = low[0]; i <= high[0]; i++) {
                    int node = i + stride[1] * j + (dimensions == 3 ? stride[2] * m : 0);
                    if (kind[node] == WALL) {
                        continue;
                    }
                    locate(node);
                    Vector q = grid.node(node).minus(source);
                    for (int p = 0; p < PLACES.length; p++) {
                        x[p] = source.x() + PLACES[p] * q.x();
                        y[p] = source.y() + PLACES[p] * q.y();
                        z[p] = source.z() + PLACES[p] * q.z();
                    }
                    ratios(x, y, z, PLACES.length, out);
                    double mean = 0;
                    for (int p = 0; p < PLACES.length; p++) {
                        mean += WEIGHTS[p] * out.value[p] / (1 + Math.sqrt(1 + out.value[p]));
                    }
                    double along = 0;
                    double whole = 0;
                    for (int k = 0; k < dimensions; k++) {
                        along += force[k] * d[k];
                        whole += force[k] * force[k];
                    }
                    double saved = (whole - along * along) * r * r / (24 * square * square);
                    double value = mean - saved;
                    if (value > -1) {
                        kind[node] = FIXED;
                        set(node, r == 0 ? 0 : value);
                    }
                }
            }
        }
    }

    /** ½∇n² at the source along the axes; 0 where it is not known. */
    private double[] force() {
        Samples out = new Samples(1);
        field.sample(
                new double[] {source.x()},
                new double[] {source.y()},
                new double[] {source.z()},
                1,
                Order.GRADIENT,
                out);
        double[] f = new double[dimensions];
        if (Double.isFinite(out.gx[0] + out.gy[0] + out.gz[0])) {
            Vector g = new Vector(out.gx[0], out.gy[0], out.gz[0]);
            for (int k = 0; k < dimensions; k++) {
                f[k] = g.dot(grid.axes().get(k).direction());
            }
        }
        return f;
    }

    /** Takes a node in hand: its indices, distance and direction from the source. */
    private void locate(int node) {
        ratio = eps[node];
        int rest = node;
        double sum = 0;
        for (int k = 0; k < dimensions; k++) {
            int next = rest / count[k];
            index[k] = rest - next * count[k];
            rest = next;
            double c = index[k] * h[k] - at[k];
            d[k] = c;
            sum += c * c;
        }
        r = Math.sqrt(sum);
        double f = r > 0 ? 1 / r : 0;
        for (int k = 0; k < dimensions; k++) {
            d[k] *= f;
        }
    }

    /** A new trial value of a node beside the front, from its accepted neighbours. */
    private void update(int node) {
        if (kind[node] != OPEN) {
            return;
        }
        locate(node);
        for (int k = 0; k < dimensions; k++) {
            int t = stride[k];
            double below = index[k] > 0 && (kind[node - t] & ACCEPTED) != 0 ? s[node - t] : Double.POSITIVE_INFINITY;
            double above = index[k] < count[k] - 1 && (kind[node + t] & ACCEPTED) != 0
                    ? s[node + t]
                    : Double.POSITIVE_INFINITY;
            behind[k] = Math.min(below, above);
            used[k] = true;
            if (behind[k] == Double.POSITIVE_INFINITY) {
                forget(k);
                continue;
            }
            int side = below <= above ? -1 : 1;
            int second = index[k] + 2 * side;
            boolean two = second >= 0
                    && second < count[k]
                    && (kind[node + 2 * side * t] & ACCEPTED) != 0
                    && s[node + 2 * side * t] <= behind[k];
            difference(node, k, side, two);
        }
        double found = solve();
        while (late(found)) {
            int last = latest();
            if (behind[last] == Double.POSITIVE_INFINITY) {
                return;
            }
            forget(last);
            found = solve();
        }
        if (r * (1 + found) < s[node]) {
            set(node, found);
        }
    }

    /** Whether a value cannot be: lower than a neighbour that it was made from, or none at all. */
    private boolean late(double found) {
        double value = r * (1 + found);
        boolean any = false;
        for (int k = 0; k < dimensions; k++) {
            any |= behind[k] < Double.POSITIVE_INFINITY;
            if (behind[k] < Double.POSITIVE_INFINITY && !(value >= behind[k])) {
                return true;
            }
        }
        return !any || Double.isNaN(found);
    }

    /** The axis whose neighbour is the last of those that take part. */
    private int latest() {
        int last = 0;
        for (int k = 1; k < dimensions; k++) {
            last = behind[k] < Double.POSITIVE_INFINITY
                            && (behind[last] == Double.POSITIVE_INFINITY || behind[k] > behind[last])
                    ? k
                    : last;
        }
        return last;
    }

    /** Leaves an axis out, ∂S = 0; in the row of the source, ∂U = 0, which is nearer. */
    private void forget(int k) {
        behind[k] = Double.POSITIVE_INFINITY;
        used[k] = Math.abs(d[k]) * r <= 0.5 * h[k];
        alpha[k] = 0;
        beta[k] = 0;
    }

    /** The one-sided difference ∂U = αU − β toward a side, of the second order or the first. */
    private void difference(int node, int k, int side, boolean two) {
        double f = -side / h[k];
        int t = side * stride[k];
        if (two) {
            alpha[k] = 1.5 * f;
            beta[k] = f * (2 * u[node + t] - 0.5 * u[node + 2 * t]);
        } else {
            alpha[k] = f;
            beta[k] = f * u[node + t];
        }
    }

    /** The greater root of Σ(A U + B)² = 1 + ε, written so that a small U keeps its digits; NaN where there is none. */
    private double solve() {
        double a = 0;
        double b = 0;
        double c = -ratio;
        for (int k = 0; k < dimensions; k++) {
            if (used[k]) {
                double rb = r * beta[k];
                double ak = d[k] + r * alpha[k];
                a += ak * ak;
                b += ak * (d[k] - rb);
                c += rb * (rb - 2 * d[k]);
            } else {
                c -= d[k] * d[k];
            }
        }
        double root = Math.sqrt(b * b - a * c);
        return b > 0 ? -c / (b + root) : (root - b) / a;
    }

    /** One round over the nodes in the order in which they were accepted. The greatest relative change of S. */
    private double polish() {
        double most = 0;
        int last = heap.length - accepted;
        for (int m = heap.length - 1; m >= last; m--) {
            int node = heap[m];
            if ((kind[node] & FIXED) != 0) {
                continue;
            }
            locate(node);
            // of the first order where the second gives what cannot be: next to a line where two fronts meet
            double found = polished(node, true);
            if (Double.isNaN(found)) {
                found = polished(node, false);
            }
            if (!Double.isNaN(found)) {
                double value = r * (1 + found);
                most = Math.max(most, Math.abs(value - s[node]) / value);
                u[node] = found;
                s[node] = value;
            }
        }
        return most;
    }

    /**
     * A node's value from all its neighbours as they stand; NaN where it would not exceed those it was made from, or exceed one
     * by more than the straight way along the axis.
     */
    private double polished(int node, boolean second) {
        double most = Double.POSITIVE_INFINITY;
        for (int k = 0; k < dimensions; k++) {
            int t = stride[k];
            double below = index[k] > 0 ? s[node - t] : Double.POSITIVE_INFINITY;
            double above = index[k] < count[k] - 1 ? s[node + t] : Double.POSITIVE_INFINITY;
            double lower = Math.min(below, above);
            if (lower < s[node]) {
                used[k] = true;
                behind[k] = lower;
                int side = below <= above ? -1 : 1;
                double way = h[k] * Math.sqrt(1 + Math.max(ratio, eps[node + side * t]));
                int far = index[k] + 2 * side;
                boolean two = second && far >= 0 && far < count[k] && s[node + 2 * side * t] - lower <= TURN * way;
                difference(node, k, side, two);
                most = Math.min(most, lower + SLACK * way);
            } else {
                behind[k] = Double.POSITIVE_INFINITY;
                slope(node, k);
            }
        }
        double found = solve();
        while (late(found)) {
            int last = latest();
            if (behind[last] == Double.POSITIVE_INFINITY) {
                return Double.NaN;
            }
            behind[last] = Double.POSITIVE_INFINITY;
            slope(node, last);
            found = solve();
        }
        return r * (1 + found) <= most ? found : Double.NaN;
    }

    /**
     * The slope along an axis on which a node is lower than its neighbours: that of U at the two upwind nodes on another axis,
     * carried on, from nodes that lie before this one. (The difference across the node itself would be as good where it is
     * smooth, but it lets later places act on earlier ones, and rounds of polishing then run away behind obstacles.) A smooth
     * front gives less than h/2 over its radius, or in the row of the source what the factor has; what is steeper comes from a
     * corner or a ridge, where Godunov's ∂S = 0 holds.
     */
    private void slope(int node, int k) {
        alpha[k] = 0;
        beta[k] = 0;
        used[k] = Math.abs(d[k]) * r <= 0.5 * h[k];
        int toward = 0;
        for (int m = 0; m < dimensions; m++) {
            if (m != k && index[m] > 0 && s[node - stride[m]] < s[node + toward]) {
                toward = -stride[m];
            }
            if (m != k && index[m] < count[m] - 1 && s[node + stride[m]] < s[node + toward]) {
                toward = stride[m];
            }
        }
        if (toward == 0) {
            return;
        }
        int upwind = node + toward;
        int t = stride[k];
        boolean below = index[k] > 0 && s[upwind - t] < s[node];
        boolean above = index[k] < count[k] - 1 && s[upwind + t] < s[node];
        double rise;
        if (below && above) {
            rise = (u[upwind + t] - u[upwind - t]) / (2 * h[k]);
            int far = upwind + toward;
            if (hasTwo(toward) && s[far - t] < s[node] && s[far + t] < s[node]) {
                rise += rise - (u[far + t] - u[far - t]) / (2 * h[k]);
            }
        } else if (below) {
            rise = (u[upwind] - u[upwind - t]) / h[k];
        } else if (above) {
            rise = (u[upwind + t] - u[upwind]) / h[k];
        } else {
            return;
        }
        double whole = d[k] * (1 + u[upwind]) + r * rise;
        // no light comes out of a wall or in over the grid's edge
        boolean fromBelow = index[k] > 0 && s[node - t] < Double.POSITIVE_INFINITY;
        boolean fromAbove = index[k] < count[k] - 1 && s[node + t] < Double.POSITIVE_INFINITY;
        boolean steep = Math.abs(used[k] ? whole - d[k] : whole) > STEEP;
        if (!steep && (whole >= 0 || fromAbove) && (whole <= 0 || fromBelow)) {
            used[k] = true;
            beta[k] = -rise;
        } else {
            used[k] = false;
        }
    }

    /** Whether two nodes lie that way from the node in hand. */
    private boolean hasTwo(int toward) {
        for (int m = 0; m < dimensions; m++) {
            if (Math.abs(toward) == stride[m]) {
                return toward < 0 ? index[m] > 1 : index[m] < count[m] - 2;
            }
        }
        return false;
    }

    private void set(int node, double value) {
        u[node] = value;
        s[node] = r * (1 + value);
        int i = place[node];
        if (i < 0) {
            i = inHeap++;
        }
        while (i > 0) {
            int parent = (i - 1) >> 1;
            if (s[heap[parent]] <= s[node]) {
                break;
            }
            heap[i] = heap[parent];
            place[heap[i]] = i;
            i = parent;
        }
        heap[i] = node;
        place[node] = i;
    }

    private int pop() {
        int top = heap[0];
        int moved = heap[--inHeap];
        int i = 0;
        while (true) {
            int child = 2 * i + 1;
            if (child >= inHeap) {
                break;
            }
            if (child + 1 < inHeap && s[heap[child + 1]] < s[heap[child]]) {
                child++;
            }
            if (s[heap[child]] >= s[moved]) {
                break;
            }
            heap[i] = heap[child];
            place[heap[i]] = i;
            i = child;
        }
        heap[i] = moved;
        place[moved] = i;
        return top;
    }
}
