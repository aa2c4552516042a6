package org.stillpath.unit;

import java.math.BigDecimal;
import java.math.MathContext;
import java.math.RoundingMode;

/**
 * SI values for people: a unit that makes the number easy to say, and as many digits as its error supports. Files carry
 * SI and all digits; this is for the terminal, figures and pages.
 */
public final class Display {
    /** More digits than this help nobody. */
    private static final int MOST_DIGITS = 10;
    /** More digits than this do not fit a sentence or a title; the table beside it has them. */
    private static final int MOST_SAID = 7;

    private Display() {}

    /**
     * A number and its unit as text.
     *
     * @param number decimal point, hyphen for minus; {@code 1.5e-15} where plain digits would be long
     * @param unit empty for a pure number
     */
    public record Reading(String number, String unit) {
        /** {@code 2.05 mm}. */
        @Override
        public String toString() {
            return unit.isEmpty() ? number : number + " " + unit;
        }
    }

    /**
     * In a unit chosen by size: nm, µm, mm, m, km for lengths, and likewise for angles, times and pressures; other units
     * stay as they are.
     *
     * @param si value in {@code siUnit}
     * @param siUnit {@code m}, {@code rad}, {@code 1/m}, {@code 1} ...
     * @param error of the value, in {@code siUnit}; NaN or 0 where it is not known or there is none, which shows up to
     *     ten digits without trailing zeros
     */
    public static Reading of(double si, String siUnit, double error) {
        return in(si, chosen(Math.abs(si), siUnit), error);
    }

    /**
     * The same for headlines and the titles of figures, with seven digits at most.
     *
     * @param si value in {@code siUnit}
     * @param siUnit as in {@link #of}
     * @param error as in {@link #of}
     */
    public static Reading brief(double si, String siUnit, double error) {
        return in(si, chosen(Math.abs(si), siUnit), error, MOST_SAID);
    }

    /**
     * In a unit of one's own choice, such as {@code dpt} for a power or {@code arcsec} for an angle.
     *
     * @param si value in SI
     * @param unit any unit that {@link Units#parse} knows
     * @param error as in {@link #of}
     * @throws IllegalArgumentException if the unit is not known
     */
    public static Reading in(double si, String unit, double error) {
        return in(si, unit, error, MOST_DIGITS);
    }

    private static Reading in(double si, String unit, double error, int most) {
        Unit u = Units.parse(unit).orElseThrow(() -> new IllegalArgumentException("unknown unit: " + unit));
        String shown = unit.equals("1") ? "" : unit;
        if (!Double.isFinite(si)) {
            return new Reading(Double.isNaN(si) ? "unknown" : si > 0 ? "infinite" : "-infinite", shown);
        }
        return new Reading(
                number(
                        u.fromSi(si),
                        Math.abs(error * u.denominator() / u.numerator()) / Math.pow(Math.PI, u.pi()),
                        most),
                shown);
    }

    private static String chosen(double size, String siUnit) {
        return switch (siUnit) {
            case "m" ->
                size == 0 ? "mm" : size < 1e-6 ? "nm" : size < 1e-3 ? "µm" : size < 1 ? "mm" : size < 1e3 ? "m" : "km";
            case "rad" -> size < 1e-3 ? "µrad" : size < 1 ? "mrad" : "rad";
            case "s" ->
                size == 0 ? "s" : size < 1e-9 ? "ps" : size < 1e-6 ? "ns" : size < 1e-3 ? "µs" : size < 1 ? "ms" : "s";
            case "Pa" -> size < 1e2 ? "Pa" : size < 1e6 ? "hPa" : "MPa";
            default -> siUnit;
        };
    }

    /** Decimal text of {@code x} to the place of the leading digit of its error. */
    private static String number(double x, double error, int most) {
        if (x == 0) {
            return "0";
        }
        BigDecimal exact = new BigDecimal(x);
        BigDecimal rounded = exact.round(new MathContext(most, RoundingMode.HALF_EVEN));
        boolean known = error > 0 && Double.isFinite(error);
        if (known) {
            int place = (int) Math.floor(Math.log10(error));
            int leading = rounded.precision() - rounded.scale() - 1;
            int digits = Math.min(most, Math.max(1, leading - place + 1));
            rounded = exact.round(new MathContext(digits, RoundingMode.HALF_EVEN));
            // a value that rounding shortened keeps the zeros that its error supports
            if (rounded.precision() < digits) {
                rounded = rounded.setScale(rounded.scale() + digits - rounded.precision());
            }
        } else {
            rounded = rounded.stripTrailingZeros();
        }
        int exponent = rounded.precision() - rounded.scale() - 1;
        if (exponent >= -5 && exponent < MOST_DIGITS) {
            return rounded.scale() < 0 ? rounded.setScale(0).toPlainString() : rounded.toPlainString();
        }
        String digits = rounded.unscaledValue().abs().toString();
        return (rounded.signum() < 0 ? "-" : "")
                + digits.charAt(0)
                + (digits.length() > 1 ? "." + digits.substring(1) : "")
                + "e"
                + exponent;
    }
}
