package org.stillpath.medium;

import java.math.BigDecimal;
import java.math.MathContext;
import java.util.Locale;

/** Numbers in messages. */
final class Words {
    private Words() {}

    /** A length in the unit that reads best, to nine digits: {@code 0.4 mm}. */
    static String length(double metres) {
        double size = Math.abs(metres);
        if (size == 0) {
            return "0 mm";
        }
        if (!Double.isFinite(metres)) {
            return metres + " m";
        }
        if (size >= 1e3) {
            return number(metres / 1e3) + " km";
        }
        if (size >= 1) {
            return number(metres) + " m";
        }
        if (size >= 1e-5) {
            return number(metres * 1e3) + " mm";
        }
        return number(metres * 1e6) + " um";
    }

    /** A number to nine digits without trailing zeros. */
    static String number(double value) {
        if (value == 0 || !Double.isFinite(value)) {
            return value == 0 ? "0" : Double.toString(value);
        }
        double size = Math.abs(value);
        if (size < 1e-4 || size >= 1e7) {
            return String.format(Locale.ROOT, "%.6g", value);
        }
        return new BigDecimal(value)
                .round(new MathContext(9))
                .stripTrailingZeros()
                .toPlainString();
    }
}
