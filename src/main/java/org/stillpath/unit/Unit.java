package org.stillpath.unit;

import java.math.BigDecimal;
import java.math.MathContext;

/**
 * A unit: {@code si = x · numerator · π^pi / denominator + offset}. Numerator and denominator are kept apart and whole,
 * because 633 nm is then 633/1e9, one rounding, and not 633 · 1e-9, which is another double.
 *
 * @param symbol as written
 * @param numerator whole number, exact as a double
 * @param denominator whole number, exact as a double
 * @param pi power of π in the factor: 1 for degrees, 0 for most
 * @param offset what is added in SI; 273.15 for degrees Celsius, 0 otherwise
 * @param dimension its dimension
 * @param angle whether it is a unit of plane angle
 */
public record Unit(
        String symbol,
        double numerator,
        double denominator,
        int pi,
        double offset,
        Dimension dimension,
        boolean angle) {
    /** π to 40 digits (OEIS A000796), so that its own rounding never shows in a double. */
    private static final BigDecimal PI = new BigDecimal("3.141592653589793238462643383279502884197");

    private static final MathContext DIGITS = new MathContext(40);

    /** How many SI units one of this unit is, the offset left aside. */
    public double factor() {
        return numerator * Math.pow(Math.PI, pi) / denominator;
    }

    /** From this unit to SI; one rounding for decimal units, within 2 ulp for the others. */
    public double toSi(double x) {
        double si = pi == 0 ? x * numerator / denominator : x * numerator * Math.pow(Math.PI, pi) / denominator;
        return offset == 0 ? si : si + offset;
    }

    /** From SI to this unit. */
    public double fromSi(double si) {
        double x = (offset == 0 ? si : si - offset) * denominator / numerator;
        return pi == 0 ? x : x / Math.pow(Math.PI, pi);
    }

    /**
     * From a decimal number as written, such as {@code 0.9}, to SI: the double nearest to the exact value. An infinite
     * result or a zero from digits that are not says that the range of a double was left.
     *
     * @throws NumberFormatException if the text is not a decimal number
     */
    public double toSi(String number) {
        double plain = Double.parseDouble(number);
        if (numerator == denominator && pi == 0 && offset == 0) {
            return plain;
        }
        if (!Double.isFinite(plain) || (plain == 0 && offset == 0)) {
            return plain;
        }
        if (pi == 0 && offset == 0) {
            double quotient = Decimal.quotient(number, numerator, denominator);
            if (!Double.isNaN(quotient)) {
                return quotient;
            }
        }
        return toSi(new BigDecimal(number, DIGITS));
    }

    double toSi(BigDecimal number) {
        BigDecimal top = number.multiply(new BigDecimal(numerator));
        BigDecimal bottom = new BigDecimal(denominator);
        if (pi > 0) {
            top = top.multiply(PI.pow(pi));
        } else if (pi < 0) {
            bottom = bottom.multiply(PI.pow(-pi));
        }
        BigDecimal si = top.divide(bottom, DIGITS);
        return (offset == 0 ? si : si.add(BigDecimal.valueOf(offset))).doubleValue();
    }

    Unit times(Unit o) {
        return combined(numerator * o.numerator, denominator * o.denominator, pi + o.pi, dimension.times(o.dimension));
    }

    Unit over(Unit o) {
        return combined(numerator * o.denominator, denominator * o.numerator, pi - o.pi, dimension.over(o.dimension));
    }

    Unit power(int n) {
        int size = Math.abs(n);
        double up = Math.pow(numerator, size);
        double down = Math.pow(denominator, size);
        return combined(n > 0 ? up : down, n > 0 ? down : up, pi * n, dimension.power(n, 1));
    }

    Unit named(String name) {
        return new Unit(name, numerator, denominator, pi, offset, dimension, angle);
    }

    /** A composite is no longer an angle: an angle over a length is an inverse length. */
    private static Unit combined(double up, double down, int pi, Dimension dimension) {
        double n = up;
        double d = down;
        if (n % d == 0) {
            n /= d;
            d = 1;
        } else if (d % n == 0) {
            d /= n;
            n = 1;
        }
        return new Unit("", n, d, pi, 0, dimension, false);
    }
}
