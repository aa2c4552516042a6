package org.stillpath.formula;

import org.stillpath.unit.Dimension;

/**
 * One node of a formula's tree. Operands are indices into the {@link Tree}'s list, where they stand before the node that
 * uses them: every walk over a tree is then a loop, and a formula with two thousand terms cannot overflow a stack.
 */
sealed interface Term {
    /**
     * A number with its unit.
     *
     * @param value in SI
     * @param dimension of its unit
     * @param bare whether it has no unit
     * @param temperaturePoint whether its unit counts from a zero of its own, as degC does
     */
    record Constant(double value, Dimension dimension, boolean bare, boolean temperaturePoint) implements Term {}

    /** A coordinate. */
    record Position(Coordinate coordinate) implements Term {}

    /**
     * A value given by name.
     *
     * @param index place among {@link Tree#arguments()}
     */
    record Argument(int index, Dimension dimension) implements Term {}

    /** A name that nobody gave; told as a fault when it was read. */
    record Unknown() implements Term {}

    /** The operand with its sign changed. */
    record Negative(int operand) implements Term {}

    /** An operation written between its operands. */
    record Binary(Operator operator, int left, int right) implements Term {}

    /** A function of one operand. */
    record Call(Function function, int operand) implements Term {}

    /** A function of two operands; a minimum of three is the minimum of the minimum of two and the third. */
    record Pair(Function function, int left, int right) implements Term {}

    /** Operations written between their operands. */
    enum Operator {
        PLUS,
        MINUS,
        TIMES,
        OVER,
        POWER;

        double apply(double a, double b) {
            return switch (this) {
                case PLUS -> a + b;
                case MINUS -> a - b;
                case TIMES -> a * b;
                case OVER -> a / b;
                case POWER -> Math.pow(a, b);
            };
        }
    }
}
