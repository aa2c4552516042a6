package org.stillpath.formula;

import org.hipparchus.special.Erf;

/**
 * Functions that the JDK lacks, for scalars, each with the source of its method; and the few small ones that derivatives
 * need.
 */
final class Special {
    /** Euler's constant (OEIS A001620). */
    private static final double EULER = 0.5772156649015329;

    private Special() {}

    /** Hyperbolic secant; 0 where the cosine overflows. */
    static double sech(double x) {
        return 1 / Math.cosh(x);
    }

    /** Error function, by Hipparchus. */
    static double erf(double x) {
        return Double.isNaN(x) ? x : Erf.erf(x);
    }

    /**
     * Exponential integral E1(x) = ∫ from x to ∞ of e^-t/t dt, to about 1e-15 of itself; infinite at 0, NaN below. Up to 1
     * the series, Abramowitz and Stegun 5.1.11; above, the continued fraction 5.1.22 in its contracted form (NIST DLMF
     * 6.9.1), evaluated from the tail.
     */
    static double e1(double x) {
        if (!(x > 0)) {
            return x == 0 ? Double.POSITIVE_INFINITY : Double.NaN;
        }
        if (x <= 1) {
            double term = 1;
            double sum = 0;
            for (int n = 1; n <= 30; n++) {
                term *= -x / n;
                double add = term / n;
                sum -= add;
                if (Math.abs(add) < 1e-18) {
                    break;
                }
            }
            return -EULER - Math.log(x) + sum;
        }
        if (x > 745) {
            return 0;
        }
        // e^x E1(x) = 1/(x+1 - 1/(x+3 - 4/(x+5 - 9/(x+7 - ..)))); the error falls as exp(-4 sqrt(x n))
        int n = (int) (100 / x) + 15;
        double tail = x + 2 * n + 1;
        for (; n >= 1; n--) {
            tail = x + 2 * n - 1 - (double) n * n / tail;
        }
        return Math.exp(-x) / tail;
    }

    /** The reciprocal, but 0 at 0: for unit vectors that vanish on the axis. */
    static double reciprocalOrZero(double a) {
        return a == 0 ? 0 : 1 / a;
    }

    /** {@code b} where {@code a} is not 0, else {@code c}: for limits on the axis. */
    static double unlessZero(double a, double b, double c) {
        return a == 0 ? c : b;
    }

    /** {@code c} where a &lt; b, else {@code d}: for the branches of a minimum or maximum. */
    static double ifLess(double a, double b, double c, double d) {
        return a < b ? c : d;
    }
}
