package org.stillpath.formula;

import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.TreeMap;

/**
 * A formula and its derivatives as one directed acyclic graph in which equal expressions are one node. Nodes are numbered
 * and stand behind their operands, so that walks are loops.
 *
 * <p>Every constructor simplifies as it goes: constants are folded; a product is a coefficient times a product of whole
 * powers, whose coefficient gathers all that does not depend on the place, so that it is computed once a call; like terms
 * are added. x² + y² and r² are the same node, a coordinate of its own, and only odd powers of r need a root, so that
 * what is even in r is smooth on the axis to the last digit. A general algebra system was not wanted: these few rules
 * share nearly all that the derivatives of an index formula have in common, and cost microseconds.
 *
 * <p>Mutable while a formula is built; owned by one thread at a time.
 */
final class Graph {
    /** Whole powers up to this are multiplied out in products; larger ones are left to the power function. */
    static final int LARGEST_WHOLE_POWER = 1024;

    /** A product of more factors is not merged with another, so that derivatives do not grow as its square. */
    private static final int MOST_FACTORS = 8;

    /** What a node depends on: numbers only, values fixed during a call, or the place. */
    enum Level {
        NUMBER,
        INVARIANT,
        PLACE
    }

    /**
     * One node.
     *
     * @param op its operation
     * @param value of a constant, else 0
     * @param index of an argument or chart component, else 0
     * @param operands nodes
     * @param exponents of a product's operands, else empty
     * @param level what it depends on
     */
    record Node(Op op, double value, int index, List<Integer> operands, List<Integer> exponents, Level level) {
        int operand(int i) {
            return operands.get(i);
        }
    }

    private final List<Node> nodes = new ArrayList<>();
    private final Map<Node, Integer> ids = new HashMap<>();

    final int zero = constant(0);
    final int one = constant(1);
    final int minusOne = constant(-1);
    final int x = leaf(Op.X);
    final int y = leaf(Op.Y);
    final int z = leaf(Op.Z);

    int size() {
        return nodes.size();
    }

    Node node(int id) {
        return nodes.get(id);
    }

    Level level(int id) {
        return nodes.get(id).level();
    }

    boolean isNumber(int id) {
        return level(id) == Level.NUMBER;
    }

    private double value(int id) {
        return nodes.get(id).value();
    }

    private int intern(Node node) {
        return ids.computeIfAbsent(node, n -> {
            nodes.add(n);
            return nodes.size() - 1;
        });
    }

    private int intern(Op op, int... operands) {
        Level level = Level.NUMBER;
        List<Integer> list = new ArrayList<>(operands.length);
        for (int o : operands) {
            list.add(o);
            level = max(level, level(o));
        }
        return intern(new Node(op, 0, 0, List.copyOf(list), List.of(), level));
    }

    private static Level max(Level a, Level b) {
        return a.compareTo(b) >= 0 ? a : b;
    }

    int constant(double v) {
        return intern(new Node(Op.CONSTANT, v == 0 ? 0 : v, 0, List.of(), List.of(), Level.NUMBER));
    }

    int argument(int index) {
        return intern(new Node(Op.ARGUMENT, 0, index, List.of(), List.of(), Level.INVARIANT));
    }

    int wavelength() {
        return intern(new Node(Op.WAVELENGTH, 0, 0, List.of(), List.of(), Level.INVARIANT));
    }

    /** Component 0 to 9 of a charted coordinate: value, gradient, upper half of the Hessian by rows. */
    int chart(Coordinate coordinate, int component) {
        return intern(new Node(Op.CHART, 0, coordinate.slot() * 10 + component, List.of(), List.of(), Level.PLACE));
    }

    private int leaf(Op op) {
        return intern(new Node(op, 0, 0, List.of(), List.of(), Level.PLACE));
    }

    int squareR() {
        return leaf(Op.SQUARE_R);
    }

    int squareRho() {
        return leaf(Op.SQUARE_RHO);
    }

    int r() {
        return intern(Op.NORM, squareR());
    }

    int rho() {
        return intern(Op.NORM, squareRho());
    }

    int negate(int a) {
        return multiply(minusOne, a);
    }

    int subtract(int a, int b) {
        return add(a, negate(b));
    }

    int add(int a, int b) {
        if (isNumber(a) && isNumber(b)) {
            return constant(value(a) + value(b));
        }
        if (a == zero) {
            return b;
        }
        if (b == zero) {
            return a;
        }
        if (level(a) == level(b)) {
            int ka = coefficient(a);
            int kb = coefficient(b);
            int va = bare(a);
            int vb = bare(b);
            if (va == vb) {
                return multiply(add(ka, kb), va);
            }
            if (ka == kb) {
                if ((isSquareOf(va, x) && isSquareOf(vb, y)) || (isSquareOf(va, y) && isSquareOf(vb, x))) {
                    return multiply(ka, squareR());
                }
                if ((isSquareR(va) && isSquareOf(vb, z)) || (isSquareOf(va, z) && isSquareR(vb))) {
                    return multiply(ka, squareRho());
                }
            }
        }
        return a < b ? intern(Op.ADD, a, b) : intern(Op.ADD, b, a);
    }

    private boolean isSquareOf(int id, int base) {
        Node n = node(id);
        return n.op() == Op.PRODUCT
                && n.operands().size() == 1
                && n.operand(0) == base
                && n.exponents().get(0) == 2;
    }

    private boolean isSquareR(int id) {
        return node(id).op() == Op.SQUARE_R;
    }

    /** What of a product depends on less than the rest of it does; 1 if nothing. */
    private int coefficient(int id) {
        Node n = node(id);
        return n.op() == Op.SCALE ? n.operand(0) : isNumber(id) ? id : one;
    }

    /** A product without its {@link #coefficient}. */
    private int bare(int id) {
        Node n = node(id);
        return n.op() == Op.SCALE ? n.operand(1) : isNumber(id) ? one : id;
    }

    int multiply(int a, int b) {
        if (isNumber(a) && isNumber(b)) {
            return constant(value(a) * value(b));
        }
        if (a == zero || b == zero) {
            return zero;
        }
        if (a == one) {
            return b;
        }
        if (b == one) {
            return a;
        }
        Level level = max(level(a), level(b));
        int ka = level(a) == level ? coefficient(a) : a;
        int kb = level(b) == level ? coefficient(b) : b;
        int va = level(a) == level ? bare(a) : one;
        int vb = level(b) == level ? bare(b) : one;
        int k = multiply(ka, kb);
        if (va == one) {
            return scale(k, vb);
        }
        if (vb == one) {
            return scale(k, va);
        }
        int product = product(va, vb);
        // the product may have lost what it depended on, or gained a coefficient, by cancellation
        return level(product) == level && node(product).op() != Op.SCALE ? scale(k, product) : multiply(k, product);
    }

    private int scale(int k, int v) {
        if (k == one) {
            return v;
        }
        if (k == zero || v == one) {
            return k;
        }
        Node n = node(v);
        if (n.op() == Op.TIMES) {
            return times(multiply(k, n.operand(0)), n.operand(1));
        }
        return intern(Op.SCALE, k, v);
    }

    /** A product that is not taken apart, so that {@code a} stays shared between several of them. */
    int times(int a, int b) {
        if (level(a) != Level.PLACE || level(b) != Level.PLACE) {
            return multiply(a, b);
        }
        Node n = node(b);
        if (n.op() == Op.SCALE) {
            return times(multiply(n.operand(0), a), n.operand(1));
        }
        return intern(Op.TIMES, a, b);
    }

    private int product(int a, int b) {
        TreeMap<Integer, Integer> factors = new TreeMap<>();
        boolean merge = factorCount(a) + factorCount(b) <= MOST_FACTORS;
        collect(factors, a, 1, merge);
        collect(factors, b, 1, merge);
        return fromFactors(factors);
    }

    private int factorCount(int id) {
        Node n = node(id);
        return n.op() == Op.PRODUCT ? n.operands().size() : 1;
    }

    private void collect(Map<Integer, Integer> factors, int id, int exponent, boolean merge) {
        Node n = node(id);
        if (n.op() == Op.PRODUCT && merge) {
            for (int i = 0; i < n.operands().size(); i++) {
                factors.merge(n.operand(i), n.exponents().get(i) * exponent, Integer::sum);
            }
        } else {
            factors.merge(id, exponent, Integer::sum);
        }
    }

    /** The product of whole powers, put into its normal form. */
    private int fromFactors(Map<Integer, Integer> factors) {
        int rest = one;
        List<Integer> operands = new ArrayList<>();
        List<Integer> exponents = new ArrayList<>();
        for (Map.Entry<Integer, Integer> f : factors.entrySet()) {
            int exponent = f.getValue();
            if (exponent == 0) {
                continue;
            }
            Node base = node(f.getKey());
            if (base.op() == Op.NORM && exponent != 1) {
                rest = multiply(rest, power(base.operand(0), Math.floorDiv(exponent, 2)));
                exponent = Math.floorMod(exponent, 2);
            } else if (base.op() == Op.ABS && Math.abs(exponent) > 1) {
                int odd = exponent % 2;
                rest = multiply(rest, power(base.operand(0), exponent - odd));
                exponent = odd;
            } else if (base.op() == Op.SQRT && factors.getOrDefault(base.operand(0), 0) != 0) {
                exponent = Math.addExact(exponent, 2 * factors.getOrDefault(base.operand(0), 0));
            } else if (hasRoot(f.getKey(), factors)) {
                continue;
            }
            if (exponent != 0) {
                operands.add(f.getKey());
                exponents.add(exponent);
            }
        }
        int product = operands.isEmpty()
                ? one
                : operands.size() == 1 && exponents.get(0) == 1 ? operands.get(0) : internProduct(operands, exponents);
        return rest == one ? product : product == one ? rest : multiply(rest, product);
    }

    /** Whether the root of this factor is a factor too, which then takes it in: u·√u is the third power of √u. */
    private boolean hasRoot(int base, Map<Integer, Integer> factors) {
        Integer root = ids.get(new Node(Op.SQRT, 0, 0, List.of(base), List.of(), level(base)));
        return root != null && factors.getOrDefault(root, 0) != 0;
    }

    private int internProduct(List<Integer> operands, List<Integer> exponents) {
        Level level = Level.NUMBER;
        for (int o : operands) {
            level = max(level, level(o));
        }
        return intern(new Node(Op.PRODUCT, 0, 0, List.copyOf(operands), List.copyOf(exponents), level));
    }

    /** A product with the exponent of its {@code i}-th factor lowered by one. */
    int lowered(int product, int i) {
        Node n = node(product);
        TreeMap<Integer, Integer> factors = new TreeMap<>();
        for (int k = 0; k < n.operands().size(); k++) {
            factors.put(n.operand(k), n.exponents().get(k) - (k == i ? 1 : 0));
        }
        return fromFactors(factors);
    }

    int reciprocal(int a) {
        return power(a, -1);
    }

    int divide(int a, int b) {
        if (isNumber(b)) {
            int k = coefficient(a);
            if (isNumber(k)) {
                return multiply(constant(value(k) / value(b)), bare(a));
            }
        }
        return multiply(a, reciprocal(b));
    }

    /** A whole power, |n| up to {@link #LARGEST_WHOLE_POWER}. */
    int power(int a, int n) {
        if (n == 0) {
            return one;
        }
        if (n == 1 || a == one) {
            return a;
        }
        if (isNumber(a)) {
            return constant(n == -1 ? 1 / value(a) : Math.pow(value(a), n));
        }
        Node node = node(a);
        if (node.op() == Op.SCALE) {
            return multiply(power(node.operand(0), n), power(node.operand(1), n));
        }
        boolean merge = true;
        for (int e : node.exponents()) {
            merge &= Math.abs((long) e * n) <= LARGEST_WHOLE_POWER;
        }
        TreeMap<Integer, Integer> factors = new TreeMap<>();
        collect(factors, a, n, merge);
        return fromFactors(factors);
    }

    /** A power with any exponent, itself a node. */
    int raise(int a, int b) {
        if (isNumber(a) && isNumber(b)) {
            return constant(Math.pow(value(a), value(b)));
        }
        if (isNumber(b)) {
            double v = value(b);
            double whole = Math.floor(v);
            if (v == whole && Math.abs(v) <= LARGEST_WHOLE_POWER) {
                return power(a, (int) v);
            }
            if (2 * v == Math.rint(2 * v) && Math.abs(2 * v) <= LARGEST_WHOLE_POWER) {
                return power(sqrt(a), (int) (2 * v));
            }
            double part = v - whole;
            if (part > 0 && part < 1 && Math.abs(whole) <= LARGEST_WHOLE_POWER) {
                // one call of the power function serves the value and all derivatives
                return multiply(power(a, (int) whole), intern(Op.POWER, a, constant(part)));
            }
        }
        return intern(Op.POWER, a, b);
    }

    int sqrt(int a) {
        if (isNumber(a)) {
            return constant(Math.sqrt(value(a)));
        }
        int outer = coefficient(a);
        int inner = bare(a);
        int number = isNumber(outer) ? outer : coefficient(outer);
        int invariant = isNumber(outer) ? one : bare(outer);
        if (value(number) > 0 && evenPowers(invariant) && (evenPowers(inner) || isSumOfSquares(inner))) {
            int k = multiply(constant(Math.sqrt(value(number))), rootOfEven(invariant));
            return multiply(k, evenPowers(inner) ? rootOfEven(inner) : intern(Op.NORM, inner));
        }
        Node n = node(inner);
        if (value(number) > 0
                && invariant == one
                && n.op() == Op.PRODUCT
                && n.operands().size() == 1
                && n.exponents().get(0) > 1) {
            // an odd power: √(u³) is the third power of √u, whose slope at 0 is 0 and not 0/0
            return multiply(
                    constant(Math.sqrt(value(number))),
                    power(sqrt(n.operand(0)), n.exponents().get(0)));
        }
        return intern(Op.SQRT, a);
    }

    /** Whether a product has even powers only, so that it is a square and its root an absolute value. */
    private boolean evenPowers(int id) {
        Node n = node(id);
        if (id == one || n.op() == Op.SQUARE_R || n.op() == Op.SQUARE_RHO) {
            return true;
        }
        if (n.op() != Op.PRODUCT) {
            return false;
        }
        for (int i = 0; i < n.operands().size(); i++) {
            Op base = node(n.operand(i)).op();
            if (n.exponents().get(i) % 2 != 0 && base != Op.SQUARE_R && base != Op.SQUARE_RHO) {
                return false;
            }
        }
        return true;
    }

    private int rootOfEven(int id) {
        Node n = node(id);
        if (id == one) {
            return one;
        }
        if (n.op() != Op.PRODUCT) {
            return intern(Op.NORM, id);
        }
        int root = one;
        for (int i = 0; i < n.operands().size(); i++) {
            int base = n.operand(i);
            int exponent = n.exponents().get(i);
            Op op = node(base).op();
            boolean square = op == Op.SQUARE_R || op == Op.SQUARE_RHO;
            int factor = square ? power(intern(Op.NORM, base), exponent) : power(abs(base), exponent / 2);
            root = multiply(root, factor);
        }
        return root;
    }

    /** Whether a sum has only squares of the place with coefficients that cannot be negative. */
    private boolean isSumOfSquares(int id) {
        int rest = id;
        for (int terms = 0; terms < MOST_FACTORS; terms++) {
            Node n = node(rest);
            if (n.op() != Op.ADD) {
                return terms > 0 && isSquare(rest);
            }
            boolean left = isSquare(n.operand(0));
            if (!left && !isSquare(n.operand(1))) {
                return false;
            }
            rest = n.operand(left ? 1 : 0);
        }
        return false;
    }

    private boolean isSquare(int id) {
        int outer = coefficient(id);
        int number = isNumber(outer) ? outer : coefficient(outer);
        int invariant = isNumber(outer) ? one : bare(outer);
        int inner = bare(id);
        return level(id) == Level.PLACE && value(number) > 0 && evenPowers(invariant) && evenPowers(inner);
    }

    /** The square of an expression that is a root, without the root; none if it is not. */
    Optional<Integer> squareOfRoot(int a) {
        Node root = node(bare(a));
        if (root.op() != Op.SQRT && root.op() != Op.NORM) {
            return Optional.empty();
        }
        return Optional.of(multiply(power(coefficient(a), 2), root.operand(0)));
    }

    /** The expression less 1, taken from a term that does not depend on the place, where it has one, so that no digits are lost. */
    int lessOne(int a) {
        Node n = node(a);
        if (n.op() == Op.ADD) {
            for (int k = 0; k < 2; k++) {
                if (level(n.operand(k)) != Level.PLACE) {
                    return add(add(n.operand(k), minusOne), n.operand(1 - k));
                }
            }
        }
        return add(a, minusOne);
    }

    int abs(int a) {
        if (isNumber(a)) {
            return constant(Math.abs(value(a)));
        }
        Node n = node(a);
        switch (n.op()) {
            case SCALE -> {
                return multiply(abs(n.operand(0)), abs(n.operand(1)));
            }
            case PRODUCT -> {
                int product = one;
                for (int i = 0; i < n.operands().size(); i++) {
                    int exponent = n.exponents().get(i);
                    int base = exponent % 2 == 0 ? n.operand(i) : abs(n.operand(i));
                    product = multiply(product, power(base, exponent));
                }
                return product;
            }
            case ABS, NORM, SQRT, EXP, COSH, SECH, SQUARE_R, SQUARE_RHO, WAVELENGTH -> {
                return a;
            }
            default -> {
                return intern(Op.ABS, a);
            }
        }
    }

    /** A function of one operand. */
    int call(Op op, int a) {
        if (isNumber(a)) {
            return constant(op.apply(value(a), 0, 0, 0));
        }
        return switch (op) {
            case SQRT -> sqrt(a);
            case ABS -> abs(a);
            case NEGATE -> negate(a);
            case RECIPROCAL -> reciprocal(a);
            default -> intern(op, a);
        };
    }

    /** A function of two operands. */
    int call(Op op, int a, int b) {
        if (isNumber(a) && isNumber(b)) {
            return constant(op.apply(value(a), value(b), 0, 0));
        }
        if ((op == Op.MIN || op == Op.MAX) && a == b) {
            return a;
        }
        return intern(op, a, b);
    }

    /** Root of a² + b². */
    int hypot(int a, int b) {
        return sqrt(add(power(a, 2), power(b, 2)));
    }

    /** {@code c} where a &lt; b, else {@code d}. */
    int ifLess(int a, int b, int c, int d) {
        return c == d ? c : intern(Op.IF_LESS, a, b, c, d);
    }

    /** {@code b} where {@code a} is not 0, else {@code c}. */
    int unlessZero(int a, int b, int c) {
        return b == c ? b : intern(Op.UNLESS_ZERO, a, b, c);
    }
}
