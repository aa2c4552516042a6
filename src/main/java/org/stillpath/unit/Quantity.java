package org.stillpath.unit;

import java.math.BigDecimal;
import org.jspecify.annotations.Nullable;
import org.stillpath.problem.Words;

/**
 * A number with its unit, as a user wrote it, and what it is in SI: the double nearest to the exact value.
 *
 * @param value in SI units, radians for angles
 * @param dimension its dimension
 * @param flavour whether it was written as an angle or as a point on the temperature scale
 * @param text as written
 */
public record Quantity(double value, Dimension dimension, Flavour flavour, String text) {

    /**
     * Reads {@code 633 nm}, {@code 0.304 1/mm}, {@code 20 degC}, {@code 12°30'15.5"}, {@code 50 %}, {@code 1e-3}.
     * Between number and unit stands a blank, except before {@code % ° ' "}.
     *
     * @throws UnitException if the text is not a number with a known unit, or leaves the range of a double
     */
    public static Quantity parse(String text) throws UnitException {
        int start = 0;
        while (start < text.length() && isBlank(text.charAt(start))) {
            start++;
        }
        int last = text.length();
        while (last > start && isBlank(text.charAt(last - 1))) {
            last--;
        }
        String all = text.substring(0, last);
        int end = Decimal.end(all, start);
        if (end == start) {
            throw new UnitException(
                    all.isBlank() ? "there is no value" : Words.quoted(all.strip()) + " does not start with a number",
                    start);
        }
        int unitStart = end;
        while (unitStart < last && isBlank(all.charAt(unitStart))) {
            unitStart++;
        }
        String number = Decimal.ascii(all.substring(start, end));
        if (unitStart == last) {
            return ranged(Double.parseDouble(number), number, Dimension.NONE, Flavour.PLAIN, all, start);
        }
        char c = all.charAt(unitStart);
        if (Sexagesimal.isMark(c) && !all.startsWith("°C", unitStart)) {
            Unit second = Units.parse("arcsec").orElseThrow();
            double angle = second.toSi(Sexagesimal.seconds(all, start));
            return new Quantity(angle, Dimension.NONE, Flavour.ANGLE, all.strip());
        }
        if (unitStart == end && c != '%' && c != '°') {
            throw glued(all, start, end);
        }
        Unit unit = Units.parse(all.substring(unitStart)).orElse(null);
        if (unit == null) {
            throw unknown(all, unitStart);
        }
        Flavour flavour = unit.angle() ? Flavour.ANGLE : unit.offset() != 0 ? Flavour.TEMPERATURE_POINT : Flavour.PLAIN;
        return ranged(unit.toSi(number), number, unit.dimension(), flavour, all, start);
    }

    /** Whether it was written without a unit. */
    public boolean isBare() {
        return Decimal.end(text, 0) == text.length();
    }

    /** The number as written, without its unit; for an angle in degrees, minutes and seconds the degrees. */
    public String numberText() {
        return text.substring(0, Decimal.end(text, 0));
    }

    /** What it is, in words with an article: {@code a length}, {@code an angle}, {@code a temperature in degC}. */
    public String describe() {
        return switch (flavour) {
            case ANGLE -> "an angle";
            case TEMPERATURE_POINT -> "a point on the temperature scale";
            case PLAIN -> dimension.describe();
        };
    }

    private static Quantity ranged(
            double si, String number, Dimension dimension, Flavour flavour, String text, int start)
            throws UnitException {
        if (!Double.isFinite(si)) {
            throw new UnitException(Words.quoted(text.strip()) + " is too large to compute with", start);
        }
        if (si == 0 && flavour != Flavour.TEMPERATURE_POINT && Decimal.isNonZero(number)) {
            throw new UnitException(Words.quoted(text.strip()) + " is too small to be told from 0", start);
        }
        return new Quantity(si, dimension, flavour, text.strip());
    }

    private static UnitException glued(String text, int start, int end) {
        String shown = Words.quoted(text.strip());
        if (text.charAt(end) == ',') {
            return new UnitException(shown + ": decimals are written with a point here", end);
        }
        if (Units.parse(text.substring(end)).isPresent()) {
            return new UnitException(
                    shown + " needs a blank between number and unit: " + text.substring(start, end) + " "
                            + text.substring(end),
                    end);
        }
        return new UnitException(shown + " is not a number with a unit", start);
    }

    /** Names the part of the unit that is at fault. */
    private static UnitException unknown(String text, int unitStart) {
        String unit = text.substring(unitStart);
        int i = unitStart;
        while (i < text.length()) {
            int from = i;
            while (i < text.length() && (Character.isLetter(text.charAt(i)) || text.charAt(i) == '_')) {
                i++;
            }
            if (i == from) {
                i++;
                continue;
            }
            String symbol = text.substring(from, i);
            if (!Units.symbols().contains(symbol) && !(from > 0 && text.charAt(from - 1) == '°')) {
                @Nullable String near = Words.nearest(symbol, Units.symbols()).orElse(null);
                return new UnitException(
                        Words.quoted(symbol) + " is not a unit known here"
                                + (near == null ? "" : "; did you mean " + near + "?"),
                        from);
            }
        }
        String hint = "";
        if (unit.contains("degC") || unit.contains("°C")) {
            hint = "; within a composite unit write K for a difference of temperatures";
        } else if (unit.contains("/") || unit.contains("*")) {
            hint = "; write it as in W/(m K), kg m/s^2 or 1/mm, without blanks around the slash";
        }
        return new UnitException(Words.quoted(unit) + " does not read as a unit" + hint, unitStart);
    }

    private static boolean isBlank(char c) {
        return c == ' ' || c == '\t' || c == '\u00a0' || c == '\u202f' || c == '\n' || c == '\r';
    }

    /** Degrees, minutes and seconds: exact decimals, one sign for all of them, so that minus zero degrees keep it. */
    private static final class Sexagesimal {
        private Sexagesimal() {}

        static boolean isMark(char c) {
            return rank(c) >= 0;
        }

        private static int rank(char c) {
            return switch (c) {
                case '°' -> 0;
                case '\'', '′' -> 1;
                case '"', '″' -> 2;
                default -> -1;
            };
        }

        static BigDecimal seconds(String text, int start) throws UnitException {
            int i = start;
            boolean negative = false;
            if (Decimal.isSign(text.charAt(i))) {
                negative = text.charAt(i) != '+';
                i++;
            }
            BigDecimal sum = BigDecimal.ZERO;
            int previous = -1;
            boolean fraction = false;
            while (i < text.length()) {
                int end = Decimal.end(text, i);
                int mark = end;
                while (mark < text.length() && isBlank(text.charAt(mark))) {
                    mark++;
                }
                int rank = mark < text.length() ? rank(text.charAt(mark)) : -1;
                if (end == i || Decimal.isSign(text.charAt(i)) || rank <= previous) {
                    throw fault(text, i, " does not read as degrees, minutes and seconds, as in 12°30'15.5\"");
                }
                if (fraction) {
                    throw fault(text, i, ": only the last part of an angle may have decimals");
                }
                String number = text.substring(i, end);
                BigDecimal part = part(text, number, i);
                if (previous >= 0 && part.compareTo(BigDecimal.valueOf(60)) >= 0) {
                    throw fault(text, i, ": minutes and seconds stay below 60");
                }
                fraction = part.stripTrailingZeros().scale() > 0;
                sum = sum.add(part.multiply(BigDecimal.valueOf(rank == 0 ? 3600 : rank == 1 ? 60 : 1)));
                previous = rank;
                i = mark + 1;
                while (i < text.length() && isBlank(text.charAt(i))) {
                    i++;
                }
            }
            return negative ? sum.negate() : sum;
        }

        private static BigDecimal part(String text, String number, int at) throws UnitException {
            double size = Double.parseDouble(number);
            if (size > 1e9 || (size != 0 && size < 1e-30) || number.length() > 100) {
                throw fault(text, at, " is not an angle that can be computed with");
            }
            return size == 0 ? BigDecimal.ZERO : new BigDecimal(number);
        }

        private static UnitException fault(String text, int at, String message) {
            return new UnitException(Words.quoted(text.strip()) + message, at);
        }
    }
}
