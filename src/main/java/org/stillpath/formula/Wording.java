package org.stillpath.formula;

import java.math.BigDecimal;
import java.math.MathContext;
import org.stillpath.formula.Term.Operator;

/** Words for what goes wrong in an operation, shared by the reading of a formula and by its evaluation. */
final class Wording {
    private Wording() {}

    /** A number with at most six digits. */
    static String brief(double value) {
        if (!Double.isFinite(value)) {
            return Double.isNaN(value) ? "an undefined number" : value > 0 ? "infinity" : "-infinity";
        }
        BigDecimal rounded = new BigDecimal(value).round(new MathContext(6)).stripTrailingZeros();
        int exponent = rounded.precision() - rounded.scale() - 1;
        return value == 0
                ? "0"
                : exponent < -4 || exponent > 6
                        ? rounded.toString().replace("E", "e").replace("e+", "e")
                        : rounded.toPlainString();
    }

    /** Why an operation between two finite operands has no finite result. */
    static String undefined(Operator operator, double a, double b) {
        return switch (operator) {
            case OVER -> b == 0 ? "a division by 0" : "an overflow of the quotient " + brief(a) + "/" + brief(b);
            case POWER ->
                a == 0 && b < 0
                        ? "0 raised to the negative power " + brief(b)
                        : a < 0 && b != Math.rint(b)
                                ? "the negative number " + brief(a) + " raised to the fractional power " + brief(b)
                                : "an overflow of " + brief(a) + " raised to the power " + brief(b);
            default -> "an overflow";
        };
    }

    /** Why a function of a finite operand has no finite result. */
    static String undefined(Function function, double a) {
        boolean overflow = function == Function.EXP || function == Function.SINH || function == Function.COSH;
        return (overflow ? "an overflow of the " : "the ") + function.description() + " of " + brief(a);
    }
}
