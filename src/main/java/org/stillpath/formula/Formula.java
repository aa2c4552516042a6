package org.stillpath.formula;

import java.util.ArrayList;
import java.util.Collections;
import java.util.EnumSet;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import java.util.TreeMap;
import org.stillpath.formula.Term.Operator;
import org.stillpath.unit.Dimension;

/**
 * A formula of the place with exact first and second derivatives, checked for dimension. Immutable and thread-safe.
 *
 * <p>Sampling walks the formula's operations over blocks of points, which is ready at once, and has the JVM
 * compile them once that has paid ({@link Executable} says when), which gives the same bits at the speed of code written
 * by hand. Values of names are run-time arguments: nothing is compiled again for other values.
 *
 * <p>Derivatives are symbolic ({@link Derivatives} says how, and how they behave on the axis), against dual numbers,
 * which repeat the same work for every component, and against differences, which lose half the digits. They are made
 * when they are first asked for, since many formulas never are.
 */
public final class Formula {
    /** Longest text that is read, in UTF-16 code units. */
    public static final int LONGEST_TEXT = 4000;
    /** Deepest nesting of parentheses, signs and powers that is read. */
    public static final int DEEPEST_NESTING = 100;

    private final Tree tree;
    private final Dimension dimension;
    private final List<String> arguments;
    /** Number of {@link #arguments}. */
    private final int arity;

    private final Set<Coordinate> coordinates;
    /** Place of each of {@link #arguments} among the tree's names. */
    private final int[] argumentPlaces;

    private final Executable value = new Executable(Order.VALUE, () -> program(Order.VALUE));
    private final Executable gradient = new Executable(Order.GRADIENT, () -> program(Order.GRADIENT));
    private final Executable hessian = new Executable(Order.HESSIAN, () -> program(Order.HESSIAN));

    private Formula(Tree tree, Dimension dimension, Optional<Formula> within) {
        this.tree = tree;
        this.dimension = dimension;
        EnumSet<Coordinate> used = EnumSet.noneOf(Coordinate.class);
        TreeMap<Integer, String> mentioned = new TreeMap<>();
        for (Term term : tree.terms()) {
            if (term instanceof Term.Position t) {
                used.add(t.coordinate());
            } else if (term instanceof Term.Argument t) {
                mentioned.put(t.index(), tree.arguments().get(t.index()));
            }
        }
        coordinates = Collections.unmodifiableSet(used);
        arguments = within.map(Formula::arguments).orElseGet(() -> List.copyOf(mentioned.values()));
        arity = arguments.size();
        argumentPlaces = new int[tree.arguments().size()];
        for (int i = 0; i < argumentPlaces.length; i++) {
            argumentPlaces[i] = arguments.indexOf(tree.arguments().get(i));
        }
    }

    /**
     * Reads a formula.
     *
     * @param text the formula, by the grammar in the package's documentation
     * @param names what it may mention
     * @param expected the dimension that its value must have
     * @throws FormulaException with all faults that could be found
     */
    public static Formula parse(String text, Names names, Dimension expected) throws FormulaException {
        return of(new Parser(text, names).formula(), Optional.of(expected));
    }

    /**
     * Reads a formula of any dimension.
     *
     * @throws FormulaException with all faults that could be found
     */
    public static Formula parse(String text, Names names) throws FormulaException {
        return of(new Parser(text, names).formula(), Optional.empty());
    }

    static Formula of(Tree tree, Optional<Dimension> expected) throws FormulaException {
        return new Formula(tree, DimensionCheck.check(tree, expected), Optional.empty());
    }

    /** The formula as written. */
    public String text() {
        return tree.rootText();
    }

    /** The dimension of its value. */
    public Dimension dimension() {
        return dimension;
    }

    /** Names of the `with` values that it uses, in the order in which they were given. */
    public List<String> arguments() {
        return arguments;
    }

    /** The coordinates that it mentions. */
    public Set<Coordinate> coordinates() {
        return coordinates;
    }

    /** Whether it mentions a coordinate. */
    public boolean uses(Coordinate c) {
        return coordinates.contains(c);
    }

    /** Whether its value is the same at every place. */
    public boolean uniform() {
        return coordinates.isEmpty() || coordinates.equals(EnumSet.of(Coordinate.WAVELENGTH));
    }

    /**
     * Samples the function at the first {@code count} points. Allocates nothing once the formula is compiled.
     *
     * @param x points in the formula's own frame, in metres, at least {@code count} of them; likewise {@code y}, {@code z}
     * @param argumentValues values of {@link #arguments()} in that order, in SI
     * @param wavelength vacuum wavelength in metres; any value if the formula does not use it
     * @param chart gives height, clearance and distance; {@link Chart#NONE} if the formula uses none of them
     * @param order what is wanted; arrays of {@code out} beyond it are left as they are
     * @param out receives the value in SI, its gradient and its Hessian with respect to x, y and z of the same frame. The
     *     value is NaN on a domain fault or an overflow; a derivative that does not exist is NaN or infinite in its own
     *     array; {@link #explain} says why.
     */
    public void sample(
            double[] x,
            double[] y,
            double[] z,
            int count,
            double[] argumentValues,
            double wavelength,
            Chart chart,
            Order order,
            Samples out) {
        check(x, y, z, count, argumentValues, out);
        if (count > 0) {
            executable(order).run(x, y, z, count, argumentValues, wavelength, chart, out);
        }
    }

    private void check(double[] x, double[] y, double[] z, int count, double[] argumentValues, Samples out) {
        boolean room = count <= x.length && count <= y.length && count <= z.length && count <= out.capacity();
        if (count < 0 || !room) {
            int most = Math.min(Math.min(x.length, y.length), Math.min(z.length, out.capacity()));
            throw new IllegalArgumentException("count must lie between 0 and the arrays' " + most + ": " + count);
        }
        if (argumentValues.length != arity) {
            throw new IllegalArgumentException(
                    "values are needed for " + arguments + ": " + argumentValues.length + " were given");
        }
    }

    Executable executable(Order order) {
        // two comparisons, since a switch looks the constant up in a table, and this is hot
        return order == Order.GRADIENT ? gradient : order == Order.HESSIAN ? hessian : value;
    }

    private Program program(Order order) {
        Graph graph = new Graph();
        int root = build(graph);
        if (order == Order.VALUE) {
            return Program.from(graph, List.of(root));
        }
        Derivatives derivatives = new Derivatives(graph, root);
        return Program.from(
                graph, derivatives.cartesian(root, order == Order.HESSIAN).outputs());
    }

    /** The tree as nodes of a graph; the number of its root. */
    int build(Graph g) {
        int[] ids = new int[tree.size()];
        for (int i = 0; i < ids.length; i++) {
            ids[i] = node(g, tree.terms().get(i), ids);
        }
        return ids[tree.root()];
    }

    private int node(Graph g, Term term, int[] ids) {
        if (term instanceof Term.Constant t) {
            return g.constant(t.value());
        } else if (term instanceof Term.Position t) {
            return switch (t.coordinate()) {
                case X -> g.x;
                case Y -> g.y;
                case Z -> g.z;
                case R -> g.r();
                case RHO -> g.rho();
                case WAVELENGTH -> g.wavelength();
                case HEIGHT, CLEARANCE, DISTANCE -> g.chart(t.coordinate(), 0);
            };
        } else if (term instanceof Term.Argument t) {
            return g.argument(argumentPlaces[t.index()]);
        } else if (term instanceof Term.Negative t) {
            return g.negate(ids[t.operand()]);
        } else if (term instanceof Term.Binary t) {
            int a = ids[t.left()];
            int b = ids[t.right()];
            return switch (t.operator()) {
                case PLUS -> g.add(a, b);
                case MINUS -> g.subtract(a, b);
                case TIMES -> g.multiply(a, b);
                case OVER -> g.divide(a, b);
                case POWER -> g.raise(a, b);
            };
        } else if (term instanceof Term.Call t) {
            return g.call(Op.valueOf(t.function().name()), ids[t.operand()]);
        } else if (term instanceof Term.Pair t) {
            int a = ids[t.left()];
            int b = ids[t.right()];
            return t.function() == Function.HYPOT
                    ? g.hypot(a, b)
                    : g.call(Op.valueOf(t.function().name()), a, b);
        }
        throw new IllegalArgumentException("a formula at fault has no value: " + tree.text());
    }

    /** {@link #sample(double[], double[], double[], int, double[], double, Chart, Order, Samples)} without a chart. */
    public void sample(
            double[] x,
            double[] y,
            double[] z,
            int count,
            double[] arguments,
            double wavelength,
            Order order,
            Samples out) {
        sample(x, y, z, count, arguments, wavelength, Chart.NONE, order, out);
    }

    /**
     * Where the formula switches between branches: every |u|, minimum, maximum and root of a square in it that depends on
     * the place. Zeros of an absolute value that only touch (|r|) are left out.
     */
    public List<Kink> kinks() {
        return switches().stream().map(s -> new Kink(s.difference())).toList();
    }

    /**
     * The formula as it is on given sides of its kinks, continued beyond them; it has no kinks of its own but those that do
     * not show in {@link #kinks}.
     *
     * @param positive for each of {@link #kinks}, in their order, whether its difference is above zero
     */
    public Formula piece(boolean[] positive) {
        List<Switch> switches = switches();
        if (positive.length != switches.size()) {
            throw new IllegalArgumentException(
                    "positive must be as many as kinks, " + switches.size() + ": " + positive.length);
        }
        Tree.Choice[] choices = new Tree.Choice[tree.size()];
        for (int i = 0; i < positive.length; i++) {
            Switch s = switches.get(i);
            choices[s.term()] = positive[i] ? s.above() : s.below();
        }
        Tree chosen = tree.choosing(choices);
        try {
            return new Formula(chosen, DimensionCheck.check(chosen, Optional.empty()), Optional.of(this));
        } catch (FormulaException e) {
            throw new IllegalStateException("a part of a checked formula is at fault: " + chosen, e);
        }
    }

    /** A term that switches where {@code difference} changes its sign, and what stands for it on either side. */
    private record Switch(int term, Formula difference, Tree.Choice below, Tree.Choice above) {}

    private List<Switch> switches() {
        List<Switch> switches = new ArrayList<>();
        for (int i = 0; i < tree.size(); i++) {
            Term term = tree.terms().get(i);
            if (term instanceof Term.Call t && t.function() == Function.ABS) {
                add(
                        switches,
                        i,
                        tree.part(t.operand()),
                        new Tree.Choice(t.operand(), true),
                        new Tree.Choice(t.operand(), false));
            } else if (term instanceof Term.Call t
                    && t.function() == Function.SQRT
                    && tree.terms().get(t.operand()) instanceof Term.Binary power
                    && power.operator() == Operator.POWER) {
                boolean square = tree.terms().get(power.right()) instanceof Term.Constant c && c.value() == 2;
                Tree.Choice same = new Tree.Choice(i, false);
                add(
                        switches,
                        i,
                        tree.part(power.left()),
                        square ? new Tree.Choice(power.left(), true) : same,
                        square ? new Tree.Choice(power.left(), false) : same);
            } else if (term instanceof Term.Pair t && (t.function() == Function.MIN || t.function() == Function.MAX)) {
                Tree difference = Tree.difference(
                        tree.part(t.left()),
                        tree.part(t.right()),
                        tree.starts().get(i),
                        tree.ends().get(i));
                Tree.Choice left = new Tree.Choice(t.left(), false);
                Tree.Choice right = new Tree.Choice(t.right(), false);
                boolean least = t.function() == Function.MIN;
                add(switches, i, difference, least ? left : right, least ? right : left);
            }
        }
        return switches;
    }

    private void add(List<Switch> switches, int term, Tree difference, Tree.Choice below, Tree.Choice above) {
        try {
            Formula f = new Formula(difference, DimensionCheck.check(difference, Optional.empty()), Optional.of(this));
            if (!f.uniform() && f.mayChangeSign()) {
                switches.add(new Switch(term, f, below, above));
            }
        } catch (FormulaException e) {
            throw new IllegalStateException("a part of a checked formula is at fault: " + difference, e);
        }
    }

    private boolean mayChangeSign() {
        return !(tree.size() == 1
                && tree.terms().get(0) instanceof Term.Position p
                && (p.coordinate() == Coordinate.R || p.coordinate() == Coordinate.RHO));
    }

    /** {@link #explain(double, double, double, double[], double, Chart)} without a chart. */
    public String explain(double x, double y, double z, double[] argumentValues, double wavelength) {
        return explain(x, y, z, argumentValues, wavelength, Chart.NONE);
    }

    /**
     * Says in words why the formula is undefined at a point, or why its derivatives are: {@code the square root of -0.013
     * in sqrt(1 - (g*r)^2)}. Works on the formula as written, without the simplifications of the evaluation.
     *
     * @return one clause without a full stop; empty if value and derivatives exist
     */
    public String explain(double x, double y, double z, double[] argumentValues, double wavelength, Chart chart) {
        double[] xs = {x};
        double[] ys = {y};
        double[] zs = {z};
        Samples out = new Samples(1);
        sample(xs, ys, zs, 1, argumentValues, wavelength, chart, Order.HESSIAN, out);
        double slopes = out.gx[0] + out.gy[0] + out.gz[0];
        double bends = out.hxx[0] + out.hxy[0] + out.hxz[0] + out.hyy[0] + out.hyz[0] + out.hzz[0];
        if (Double.isFinite(out.value[0]) && Double.isFinite(slopes) && Double.isFinite(bends)) {
            return "";
        }
        double[] values = new double[tree.size()];
        String slope = "";
        for (int i = 0; i < values.length; i++) {
            Term term = tree.terms().get(i);
            values[i] = value(term, values, xs, ys, zs, argumentValues, wavelength, chart);
            if (!Double.isFinite(values[i])) {
                return undefined(i, term, values);
            }
            if (slope.isEmpty()) {
                slope = steep(i, term, values);
            }
        }
        if (!slope.isEmpty()) {
            return slope;
        }
        String what = Double.isFinite(out.value[0]) ? "the derivatives of " : "";
        return what + "`" + text() + "` cannot be computed where its value is " + Wording.brief(values[tree.root()]);
    }

    private double value(
            Term term,
            double[] values,
            double[] x,
            double[] y,
            double[] z,
            double[] argumentValues,
            double wavelength,
            Chart chart) {
        if (term instanceof Term.Constant t) {
            return t.value();
        } else if (term instanceof Term.Position t) {
            return switch (t.coordinate()) {
                case X -> x[0];
                case Y -> y[0];
                case Z -> z[0];
                case R -> Math.sqrt(x[0] * x[0] + y[0] * y[0]);
                case RHO -> Math.sqrt(x[0] * x[0] + y[0] * y[0] + z[0] * z[0]);
                case WAVELENGTH -> wavelength;
                case HEIGHT, CLEARANCE, DISTANCE -> {
                    Samples s = new Samples(1);
                    chart.sample(t.coordinate(), x, y, z, 1, Order.VALUE, s);
                    yield s.value[0];
                }
            };
        } else if (term instanceof Term.Argument t) {
            return argumentValues[argumentPlaces[t.index()]];
        } else if (term instanceof Term.Negative t) {
            return -values[t.operand()];
        } else if (term instanceof Term.Binary t) {
            return t.operator().apply(values[t.left()], values[t.right()]);
        } else if (term instanceof Term.Call t) {
            return t.function().apply(values[t.operand()]);
        } else if (term instanceof Term.Pair t) {
            return t.function().apply(values[t.left()], values[t.right()]);
        }
        return Double.NaN;
    }

    private String undefined(int i, Term term, double[] values) {
        String in = " in `" + tree.text(i) + "`";
        if (term instanceof Term.Binary t) {
            return Wording.undefined(t.operator(), values[t.left()], values[t.right()]) + in;
        } else if (term instanceof Term.Call t) {
            return Wording.undefined(t.function(), values[t.operand()]) + in;
        } else if (term instanceof Term.Pair) {
            return "an overflow" + in;
        }
        return "`" + tree.text(i) + "` is " + Wording.brief(values[i]);
    }

    /** Says that an operation has a value but no derivative at its operands; empty if it has. */
    private String steep(int i, Term term, double[] values) {
        if (term instanceof Term.Call t) {
            double a = values[t.operand()];
            boolean edge =
                    switch (t.function()) {
                        case SQRT -> a == 0;
                        case ASIN, ACOS -> Math.abs(a) == 1;
                        default -> false;
                    };
            if (edge) {
                return "the slope of the " + t.function().description() + " of " + Wording.brief(a)
                        + " is infinite, in `" + tree.text(i) + "`";
            }
        } else if (term instanceof Term.Binary t && t.operator() == Operator.POWER && values[t.left()] == 0) {
            double p = values[t.right()];
            if (p < 2 && p != Math.rint(p)) {
                return "0 raised to the power " + Wording.brief(p) + " has no finite second derivative, in `"
                        + tree.text(i) + "`";
            }
        } else if (term instanceof Term.Pair t
                && t.function() == Function.ATAN2
                && values[t.left()] == 0
                && values[t.right()] == 0) {
            return "the arc tangent of 0 and 0 has no slope, in `" + tree.text(i) + "`";
        }
        return "";
    }

    @Override
    public String toString() {
        return "Formula[" + text() + "]";
    }
}
