package org.stillpath.formula;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.stillpath.formula.Term.Operator;
import org.stillpath.unit.Dimension;

/**
 * Finds what a formula's dimensions forbid, before anything is computed: sums of unlike quantities, functions of
 * quantities with a unit, powers whose unit would depend on a value. All faults are collected; a term at fault is taken
 * to be right by the terms around it, so that one slip gives one message. On the way, operations on constants without a
 * finite result are found.
 *
 * <p>A bare 0 has every dimension, so that {@code max(x, 0)} and {@code z > 0} need no unit.
 */
final class DimensionCheck {
    private final Tree tree;
    private final List<FormulaException.Fault> faults = new ArrayList<>();
    private final Sort[] sorts;

    /**
     * What is known of a term.
     *
     * @param dimension its dimension, if known
     * @param known false behind a fault
     * @param zero whether it is a bare 0
     * @param point whether it is a temperature written in degC
     * @param constant whether {@code value} is its value everywhere
     */
    private record Sort(
            Dimension dimension, boolean known, boolean zero, boolean point, boolean constant, double value) {
        static final Sort UNKNOWN = new Sort(Dimension.NONE, false, false, false, false, Double.NaN);

        static Sort of(Dimension dimension) {
            return new Sort(dimension, true, false, false, false, Double.NaN);
        }

        Sort withValue(double v) {
            return new Sort(dimension, known, zero, point, true, v);
        }

        Sort withDimension(Dimension d, boolean isPoint) {
            return new Sort(d, known, false, isPoint, false, Double.NaN);
        }

        /** Whether it may be anything. */
        boolean open() {
            return !known || zero;
        }

        boolean pure() {
            return open() || dimension.isNone();
        }
    }

    private DimensionCheck(Tree tree) {
        this.tree = tree;
        this.sorts = new Sort[tree.size()];
    }

    /**
     * The dimension of a formula.
     *
     * @param expected what it should be, if that is known
     * @throws FormulaException with all faults
     */
    static Dimension check(Tree tree, Optional<Dimension> expected) throws FormulaException {
        DimensionCheck check = new DimensionCheck(tree);
        Sort root = check.run();
        if (expected.isPresent() && !root.open() && !root.dimension().equals(expected.get())) {
            check.fault(
                    tree.root(),
                    "`" + tree.rootText() + "` is " + root.dimension().describe() + "; "
                            + expected.get().describe() + " is needed");
        }
        check.throwIfAny();
        return expected.filter(d -> root.open()).orElse(root.dimension());
    }

    /** Checks that two formulas may be compared. */
    static void checkComparison(Tree left, Tree right, int offset) throws FormulaException {
        DimensionCheck check = new DimensionCheck(left);
        Sort l = check.run();
        DimensionCheck other = new DimensionCheck(right);
        Sort r = other.run();
        check.faults.addAll(other.faults);
        if (!l.open() && !r.open() && !l.dimension().equals(r.dimension())) {
            check.faults.add(new FormulaException.Fault(
                    offset,
                    "`" + left.rootText() + "`, " + l.dimension().describe() + ", cannot be compared with `"
                            + right.rootText() + "`, " + r.dimension().describe()));
        }
        check.throwIfAny();
    }

    private void throwIfAny() throws FormulaException {
        if (!faults.isEmpty()) {
            throw new FormulaException(faults);
        }
    }

    private Sort run() {
        for (int i = 0; i < sorts.length; i++) {
            sorts[i] = sort(i, tree.terms().get(i));
        }
        return sorts[tree.root()];
    }

    private Sort sort(int at, Term term) {
        if (term instanceof Term.Constant t) {
            return new Sort(t.dimension(), true, t.bare() && t.value() == 0, t.temperaturePoint(), true, t.value());
        } else if (term instanceof Term.Position t) {
            return Sort.of(t.coordinate().dimension());
        } else if (term instanceof Term.Argument t) {
            return Sort.of(t.dimension());
        } else if (term instanceof Term.Negative t) {
            Sort a = sorts[t.operand()];
            notPoint(t.operand(), "negated");
            return a.constant() ? a.withValue(-a.value()) : a;
        } else if (term instanceof Term.Binary t) {
            Sort a = sorts[t.left()];
            Sort b = sorts[t.right()];
            Sort result = binary(at, t, a, b);
            if (a.constant() && b.constant()) {
                double value = t.operator().apply(a.value(), b.value());
                if (!Double.isFinite(value) && Double.isFinite(a.value()) && Double.isFinite(b.value())) {
                    fault(at, Wording.undefined(t.operator(), a.value(), b.value()) + " in `" + tree.text(at) + "`");
                }
                return result.withValue(value);
            }
            return result;
        } else if (term instanceof Term.Call t) {
            Sort a = sorts[t.operand()];
            Sort result = call(at, t, a);
            if (a.constant()) {
                double value = t.function().apply(a.value());
                if (!Double.isFinite(value) && Double.isFinite(a.value())) {
                    fault(at, Wording.undefined(t.function(), a.value()) + " in `" + tree.text(at) + "`");
                }
                return result.withValue(value);
            }
            return result;
        } else if (term instanceof Term.Pair t) {
            Sort a = sorts[t.left()];
            Sort b = sorts[t.right()];
            Sort common = alike(a, b);
            if (!a.open() && !b.open() && !a.dimension().equals(b.dimension())) {
                fault(
                        t.right(),
                        "`" + tree.text(t.right()) + "` is " + b.dimension().describe() + " and `"
                                + tree.text(t.left()) + "` is " + a.dimension().describe() + "; "
                                + t.function().word() + " needs operands of one dimension");
                common = Sort.UNKNOWN;
            }
            Sort result = t.function().keepsDimension() || !common.known() ? common : Sort.of(Dimension.NONE);
            return a.constant() && b.constant() ? result.withValue(t.function().apply(a.value(), b.value())) : result;
        }
        return Sort.UNKNOWN;
    }

    private static Sort alike(Sort a, Sort b) {
        if (!a.known() || !b.known()) {
            return Sort.UNKNOWN;
        }
        if (a.zero() && b.zero()) {
            return a;
        }
        Sort chosen = a.zero() ? b : a;
        return chosen.withDimension(chosen.dimension(), a.point() || b.point());
    }

    private Sort binary(int at, Term.Binary t, Sort a, Sort b) {
        Operator operator = t.operator();
        switch (operator) {
            case PLUS, MINUS -> {
                if (!a.open() && !b.open() && !a.dimension().equals(b.dimension())) {
                    boolean plus = operator == Operator.PLUS;
                    boolean number = a.dimension().isNone() || b.dimension().isNone();
                    fault(
                            t.right(),
                            "`" + tree.text(t.right()) + "` is " + b.dimension().describe() + " and cannot be "
                                    + (plus ? "added to" : "subtracted from") + " `" + tree.text(t.left()) + "`, "
                                    + a.dimension().describe()
                                    + (number ? "; numbers that carry a unit need it, as in 0.01 1/mm" : ""));
                    return Sort.UNKNOWN;
                }
                if (operator == Operator.PLUS && a.point() && b.point()) {
                    fault(
                            t.right(),
                            "`" + tree.text(t.left()) + "` and `" + tree.text(t.right())
                                    + "` are both temperatures counted from 0 degC; write the difference in K");
                }
                Sort common = alike(a, b);
                return common.known() && operator == Operator.MINUS && !common.zero()
                        ? common.withDimension(common.dimension(), false)
                        : common;
            }
            case TIMES, OVER -> {
                String verb = operator == Operator.TIMES ? "multiplied" : "divided";
                notPoint(t.left(), verb);
                notPoint(t.right(), verb);
                if (!a.known() || !b.known()) {
                    return Sort.UNKNOWN;
                }
                return guarded(
                        at,
                        () -> operator == Operator.TIMES
                                ? a.dimension().times(b.dimension())
                                : a.dimension().over(b.dimension()));
            }
            case POWER -> {
                return power(at, t, a, b);
            }
        }
        throw new IllegalArgumentException("unknown operator " + operator);
    }

    private Sort power(int at, Term.Binary t, Sort a, Sort b) {
        notPoint(t.left(), "raised to a power");
        if (!b.pure()) {
            fault(
                    t.right(),
                    "the exponent `" + tree.text(t.right()) + "` is "
                            + b.dimension().describe() + "; an exponent is a pure number");
            return Sort.UNKNOWN;
        }
        if (!a.known() || !b.known()) {
            return Sort.UNKNOWN;
        }
        if (a.dimension().isNone()) {
            return Sort.of(Dimension.NONE);
        }
        if (b.constant()) {
            for (int q = 1; q <= 64; q++) {
                double p = Math.rint(b.value() * q);
                if (Math.abs(p) <= 10_000 && p / q == b.value()) {
                    int denominator = q;
                    return guarded(at, () -> a.dimension().power((int) p, denominator));
                }
            }
        }
        fault(
                t.right(),
                "`" + tree.text(t.left()) + "` is " + a.dimension().describe() + ", so its exponent `"
                        + tree.text(t.right())
                        + "` must be a constant fraction such as 2 or 1/2; or make its base a pure number");
        return Sort.UNKNOWN;
    }

    private Sort call(int at, Term.Call t, Sort a) {
        Function function = t.function();
        if (function == Function.SQRT) {
            notPoint(t.operand(), "put under a root");
            return a.known() && !a.zero() ? guarded(at, () -> a.dimension().power(1, 2)) : a;
        }
        if (function.keepsDimension()) {
            return a;
        }
        if (!a.pure()) {
            fault(
                    t.operand(),
                    "`" + tree.text(t.operand()) + "` is " + a.dimension().describe() + "; " + function.word()
                            + " needs a pure number, so divide it by "
                            + a.dimension().describe());
        }
        return Sort.of(Dimension.NONE);
    }

    private interface Compute {
        Dimension dimension();
    }

    private Sort guarded(int at, Compute compute) {
        try {
            return Sort.of(compute.dimension());
        } catch (ArithmeticException e) {
            fault(at, "the dimension of `" + tree.text(at) + "` has exponents beyond all use");
            return Sort.UNKNOWN;
        }
    }

    private void notPoint(int at, String verb) {
        if (sorts[at].point() && sorts[at].constant()) {
            fault(
                    at,
                    "`" + tree.text(at) + "` is counted from 0 degC and cannot be " + verb + "; write it in K: "
                            + Wording.brief(sorts[at].value() - 273.15) + " K for a difference, "
                            + Wording.brief(sorts[at].value()) + " K for a temperature");
        }
    }

    private void fault(int at, String message) {
        faults.add(new FormulaException.Fault(tree.starts().get(at), message));
    }
}
