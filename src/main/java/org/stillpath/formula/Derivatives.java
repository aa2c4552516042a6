package org.stillpath.formula;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.TreeSet;

/**
 * Exact gradients and Hessians of a graph's nodes with respect to x, y and z.
 *
 * <p>A formula F is taken as a function of independent coordinates q: x, y, z, r², ρ², the charted ones, and every root
 * of a sum of squares (r and ρ are such roots). Its partial derivatives over them are symbolic; the chain rule
 *
 * <pre>  ∂F/∂x_a = Σ F_i q_i,a      ∂²F/∂x_a∂x_b = Σ (Σ ∂_j F_i q_j,b) q_i,a + Σ F_i q_i,ab </pre>
 *
 * then leads to x, y and z. A root w = √u has w_a = u_a/2w and w_ab = (u_ab/2 − w_a w_b)/w. Where w = 0, on the axis,
 * w_a is taken as 0 and F_w/w as its limit F_ww: right for every F that is even in w, and the mean over all directions of
 * the gradient, which is zero, for a cone. Writing everything in x, y and z instead would be shorter, and undefined
 * there. At the axis of a sum of squares that is not linear in each of its roots (such as √(x⁴ + y²)) the Hessian does
 * not exist, and what is given is the limit along no particular direction.
 *
 * <p>Hash-consing makes partial derivatives that are equal one node, so what the value, the gradient and the Hessian have
 * in common is computed once.
 */
final class Derivatives {
    /** More roots than this in one formula are differentiated like any other function, without the limit on the axis. */
    private static final int MOST_ROOTS = 6;

    private static final double TWO_OVER_ROOT_PI = 2 / Math.sqrt(Math.PI);
    private static final double LN_10 = Math.log(10);

    private final Graph g;
    /** Roots that are coordinates of their own. */
    private final TreeSet<Integer> roots = new TreeSet<>();

    private final Map<Integer, int[]> partials = new HashMap<>();
    private final Map<Integer, Cartesian> cartesians = new HashMap<>();

    /**
     * Value and derivatives of one expression, as nodes.
     *
     * @param value the expression
     * @param gradient derivatives with respect to x, y, z
     * @param hessian xx, xy, xz, yy, yz, zz; empty if not asked for
     */
    record Cartesian(int value, List<Integer> gradient, List<Integer> hessian) {
        /** All nodes in the order of the arrays of {@link Samples}. */
        List<Integer> outputs() {
            List<Integer> all = new ArrayList<>(10);
            all.add(value);
            all.addAll(gradient);
            all.addAll(hessian);
            return all;
        }
    }

    Derivatives(Graph graph, int root) {
        this.g = graph;
        boolean[] used = reachable(root);
        for (int id = 0; id <= root && roots.size() < MOST_ROOTS; id++) {
            if (used[id] && g.node(id).op() == Op.NORM) {
                roots.add(id);
            }
        }
    }

    /** Nodes that {@code root} depends on; does not look below roots that are coordinates. */
    private boolean[] reachable(int root) {
        boolean[] used = new boolean[root + 1];
        used[root] = true;
        for (int id = root; id >= 0; id--) {
            if (used[id] && !roots.contains(id)) {
                for (int o : g.node(id).operands()) {
                    used[o] = true;
                }
            }
        }
        return used;
    }

    /** Gradient, and Hessian if wanted, of a node. */
    Cartesian cartesian(int root, boolean second) {
        Cartesian known = cartesians.get(root);
        if (known == null || (second && known.hessian().isEmpty())) {
            known = chain(root, second);
            cartesians.put(root, known);
        }
        return known;
    }

    private Cartesian chain(int root, boolean second) {
        List<Integer> coordinates = coordinates(root);
        int n = coordinates.size();
        int[] first = new int[n];
        int[][] slopes = new int[n][];
        for (int i = 0; i < n; i++) {
            first[i] = partial(root, coordinates.get(i));
            slopes[i] = slope(coordinates.get(i));
        }
        int[] gradient = {g.zero, g.zero, g.zero};
        for (int a = 0; a < 3; a++) {
            for (int i = 0; i < n; i++) {
                gradient[a] = g.add(gradient[a], g.times(first[i], slopes[i][a]));
            }
        }
        int[] hessian = second ? hessian(coordinates, first, slopes) : new int[0];
        return new Cartesian(root, list(gradient), list(hessian));
    }

    private int[] hessian(List<Integer> coordinates, int[] first, int[][] slopes) {
        int n = coordinates.size();
        int[] hessian = new int[6];
        Arrays.fill(hessian, g.zero);
        for (int i = 0; i < n; i++) {
            int[] along = {g.zero, g.zero, g.zero};
            // a derivative may depend on coordinates that the formula itself does not: 1/(1 + r²) of atan(r) on r²
            for (int j : coordinates(first[i])) {
                int mixed = partial(first[i], j);
                int[] slope = slope(j);
                for (int b = 0; b < 3; b++) {
                    along[b] = g.add(along[b], g.times(mixed, slope[b]));
                }
            }
            int[] bend = bend(coordinates.get(i), first[i], slopes[i]);
            for (int a = 0, k = 0; a < 3; a++) {
                for (int b = a; b < 3; b++, k++) {
                    hessian[k] = g.add(g.add(hessian[k], g.times(along[b], slopes[i][a])), bend[k]);
                }
            }
        }
        return hessian;
    }

    private static List<Integer> list(int[] ids) {
        return Arrays.stream(ids).boxed().toList();
    }

    private List<Integer> coordinates(int root) {
        List<Integer> found = new ArrayList<>();
        boolean[] used = reachable(root);
        for (int id = 0; id <= root; id++) {
            if (used[id]) {
                Graph.Node node = g.node(id);
                boolean coordinate =
                        switch (node.op()) {
                            case X, Y, Z, SQUARE_R, SQUARE_RHO -> true;
                            case CHART -> true;
                            default -> roots.contains(id);
                        };
                if (coordinate) {
                    found.add(id);
                }
            }
        }
        return found;
    }

    private static Coordinate charted(Graph.Node node) {
        return Coordinate.CHARTED.get(node.index() / 10);
    }

    /** Derivatives of a coordinate with respect to x, y, z. */
    private int[] slope(int id) {
        Graph.Node node = g.node(id);
        int two = g.constant(2);
        return switch (node.op()) {
            case X -> new int[] {g.one, g.zero, g.zero};
            case Y -> new int[] {g.zero, g.one, g.zero};
            case Z -> new int[] {g.zero, g.zero, g.one};
            case SQUARE_R -> new int[] {g.multiply(two, g.x), g.multiply(two, g.y), g.zero};
            case SQUARE_RHO -> new int[] {g.multiply(two, g.x), g.multiply(two, g.y), g.multiply(two, g.z)};
            case CHART -> new int[] {g.chart(charted(node), 1), g.chart(charted(node), 2), g.chart(charted(node), 3)};
            default -> {
                int over = g.call(Op.RECIPROCAL_OR_ZERO, id);
                List<Integer> inner = cartesian(node.operand(0), false).gradient();
                int half = g.constant(0.5);
                int[] slope = new int[3];
                for (int a = 0; a < 3; a++) {
                    slope[a] = g.times(over, g.multiply(half, inner.get(a)));
                }
                yield slope;
            }
        };
    }

    /** F_i q_i,ab for a coordinate q_i with the partial derivative F_i. */
    private int[] bend(int id, int first, int[] slope) {
        Graph.Node node = g.node(id);
        int[] bend = new int[6];
        Arrays.fill(bend, g.zero);
        switch (node.op()) {
            case X, Y, Z -> {}
            case SQUARE_R, SQUARE_RHO -> {
                int twice = g.multiply(g.constant(2), first);
                bend[0] = twice;
                bend[3] = twice;
                bend[5] = node.op() == Op.SQUARE_RHO ? twice : g.zero;
            }
            case CHART -> {
                for (int k = 0; k < 6; k++) {
                    bend[k] = g.times(first, g.chart(charted(node), 4 + k));
                }
            }
            default -> {
                // F_w (u_ab/2 − w_a w_b)/w with F_w/w → F_ww at w = 0
                int ratio = first == g.zero
                        ? g.zero
                        : g.unlessZero(id, g.times(first, g.call(Op.RECIPROCAL_OR_ZERO, id)), partial(first, id));
                List<Integer> inner = cartesian(node.operand(0), true).hessian();
                int half = g.constant(0.5);
                for (int a = 0, k = 0; a < 3; a++) {
                    for (int b = a; b < 3; b++, k++) {
                        int curvature = g.subtract(g.multiply(half, inner.get(k)), g.times(slope[a], slope[b]));
                        bend[k] = g.times(ratio, curvature);
                    }
                }
            }
        }
        return bend;
    }

    /** The partial derivative of a node with respect to a coordinate. */
    private int partial(int root, int coordinate) {
        int[] memo = partials.getOrDefault(coordinate, new int[0]);
        if (memo.length <= root) {
            int known = memo.length;
            memo = Arrays.copyOf(memo, Math.max(g.size(), 2 * known));
            Arrays.fill(memo, known, memo.length, -1);
            partials.put(coordinate, memo);
        }
        boolean[] used = reachable(root);
        for (int id = 0; id <= root; id++) {
            if (used[id] && memo[id] < 0) {
                memo[id] = rule(id, coordinate, memo);
            }
        }
        return memo[root];
    }

    private int rule(int id, int coordinate, int[] memo) {
        if (id == coordinate) {
            return g.one;
        }
        Graph.Node node = g.node(id);
        boolean fixed = true;
        if (!roots.contains(id)) {
            for (int o : node.operands()) {
                fixed &= memo[o] == g.zero;
            }
        }
        if (fixed) {
            return g.zero;
        }
        return switch (node.op()) {
            case ADD -> g.add(memo[node.operand(0)], memo[node.operand(1)]);
            case SCALE -> g.multiply(node.operand(0), memo[node.operand(1)]);
            case PRODUCT -> product(id, node, memo);
            case IF_LESS -> g.ifLess(node.operand(0), node.operand(1), memo[node.operand(2)], memo[node.operand(3)]);
            case MIN -> g.ifLess(node.operand(0), node.operand(1), memo[node.operand(0)], memo[node.operand(1)]);
            case MAX -> g.ifLess(node.operand(1), node.operand(0), memo[node.operand(0)], memo[node.operand(1)]);
            case POWER -> power(id, node, memo);
            case ATAN2 -> {
                int b = node.operand(0);
                int a = node.operand(1);
                int cross = g.subtract(g.multiply(a, memo[b]), g.multiply(b, memo[a]));
                yield g.divide(cross, g.add(g.power(a, 2), g.power(b, 2)));
            }
            default -> g.multiply(outer(id, node), memo[node.operand(0)]);
        };
    }

    private int product(int id, Graph.Node node, int[] memo) {
        int sum = g.zero;
        for (int i = 0; i < node.operands().size(); i++) {
            int factor = node.operand(i);
            if (memo[factor] != g.zero) {
                int exponent = node.exponents().get(i);
                int others = g.multiply(g.constant(exponent), g.lowered(id, i));
                sum = g.add(sum, g.multiply(others, memo[factor]));
            }
        }
        return sum;
    }

    private int power(int id, Graph.Node node, int[] memo) {
        int base = node.operand(0);
        int exponent = node.operand(1);
        int sum = g.zero;
        if (memo[base] != g.zero) {
            // a constant exponent is a proper fraction here, and dividing by the base spares a second power
            int lower = g.isNumber(exponent) ? g.divide(id, base) : g.raise(base, g.subtract(exponent, g.one));
            sum = g.multiply(g.multiply(exponent, lower), memo[base]);
        }
        if (memo[exponent] != g.zero) {
            sum = g.add(sum, g.multiply(g.multiply(id, g.call(Op.LOG, base)), memo[exponent]));
        }
        return sum;
    }

    /** The derivative of a function of one operand with respect to that operand. */
    private int outer(int id, Graph.Node node) {
        int u = node.operand(0);
        return switch (node.op()) {
            case SQRT, NORM -> g.multiply(g.constant(0.5), g.reciprocal(id));
            case EXP -> id;
            case LOG -> g.reciprocal(u);
            case LOG10 -> g.multiply(g.constant(1 / LN_10), g.reciprocal(u));
            case SIN -> g.call(Op.COS, u);
            case COS -> g.negate(g.call(Op.SIN, u));
            case TAN -> g.add(g.one, g.power(id, 2));
            case ASIN, ACOS -> {
                int under = g.multiply(g.subtract(g.one, u), g.add(g.one, u));
                int slope = g.reciprocal(g.sqrt(under));
                yield node.op() == Op.ASIN ? slope : g.negate(slope);
            }
            case ATAN -> g.reciprocal(g.add(g.one, g.power(u, 2)));
            case SINH -> g.call(Op.COSH, u);
            case COSH -> g.call(Op.SINH, u);
            case TANH -> g.power(g.call(Op.SECH, u), 2);
            case SECH -> g.negate(g.multiply(id, g.call(Op.TANH, u)));
            case ERF -> g.multiply(g.constant(TWO_OVER_ROOT_PI), g.call(Op.EXP, g.negate(g.power(u, 2))));
            case E1 -> g.negate(g.divide(g.call(Op.EXP, g.negate(u)), u));
            case ABS -> g.call(Op.SIGN, u);
            case SIGN -> g.zero;
            default -> throw new IllegalArgumentException("no derivative: " + node.op());
        };
    }
}
