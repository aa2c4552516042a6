package org.stillpath.unit;

import java.util.Collections;
import java.util.LinkedHashMap;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import java.util.function.Predicate;
import org.jspecify.annotations.Nullable;

/**
 * The closed table of units, and the reading of composite ones such as {@code W/(m K)}.
 *
 * <p>Symbols follow the SI Brochure (9th edition, 2019) and UCUM, with {@code degC}, {@code deg}, {@code arcmin}, {@code
 * arcsec}, {@code gon}, {@code dpt} and {@code u} for µ. A table was chosen against a units library because such a
 * library costs half a second of start-up; the tests check every row against one. Prefixes are rows of their own, so that
 * a slip like {@code nK} for {@code mK} is a fault and not another unit.
 *
 * <p>A composite is one or more factors with blanks or dots between, then {@code /} and a factor or a group in
 * parentheses: {@code kg m/s^2}, {@code W/(m K)}, {@code 1/mm^2}, {@code m/s2}. No blanks stand around the slash; behind
 * it a product needs parentheses.
 */
public final class Units {
    /** The pure number 1. */
    private static final Unit ONE = new Unit("1", 1, 1, 0, 0, Dimension.NONE, false);

    private static final Map<String, Unit> TABLE = table();

    private Units() {}

    /**
     * A unit and where it ends.
     *
     * @param unit the unit
     * @param end offset of the first character behind it
     */
    public record Scan(Unit unit, int end) {}

    /** The unit that the whole text names; {@code mm-1} is understood besides {@code mm^-1} and {@code 1/mm}. */
    public static Optional<Unit> parse(String symbol) {
        String text = symbol.strip();
        if (text.equals("1")) {
            return Optional.of(ONE);
        }
        return new Reader(text, name -> false, true)
                .run(0)
                .filter(s -> s.end() == text.length())
                .map(Scan::unit);
    }

    /**
     * The longest run from {@code start} that reads as a unit. A factor behind a slash, dot or blank whose name {@code
     * isName} knows is not part of the unit: {@code 5 m/L} with a value {@code L} is (5 m)/L.
     */
    public static Optional<Scan> scan(String text, int start, Predicate<String> isName) {
        return new Reader(text, isName, false).run(start);
    }

    /** All simple symbols, in the order of the table. */
    public static Set<String> symbols() {
        return TABLE.keySet();
    }

    private static Map<String, Unit> table() {
        Map<String, Unit> t = new LinkedHashMap<>(256);
        Dimension length = Dimension.LENGTH;
        add(t, "m", 1, 1, length);
        add(t, "km", 1e3, 1, length);
        add(t, "dm", 1, 10, length);
        add(t, "cm", 1, 100, length);
        add(t, "mm", 1, 1e3, length);
        micro(t, "m", length);
        add(t, "nm", 1, 1e9, length);
        add(t, "pm", 1, 1e12, length);

        Dimension time = Dimension.TIME;
        add(t, "s", 1, 1, time);
        add(t, "ms", 1, 1e3, time);
        micro(t, "s", time);
        add(t, "ns", 1, 1e9, time);
        add(t, "ps", 1, 1e12, time);
        add(t, "fs", 1, 1e15, time);
        add(t, "min", 60, 1, time);
        add(t, "h", 3600, 1, time);
        add(t, "d", 86400, 1, time);

        add(t, "kg", 1, 1, Dimension.MASS);
        add(t, "g", 1, 1e3, Dimension.MASS);
        add(t, "mg", 1, 1e6, Dimension.MASS);

        add(t, "K", 1, 1, Dimension.TEMPERATURE);
        add(t, "mK", 1, 1e3, Dimension.TEMPERATURE);
        t.put("degC", new Unit("degC", 1, 1, 0, 273.15, Dimension.TEMPERATURE, false));
        t.put("°C", new Unit("°C", 1, 1, 0, 273.15, Dimension.TEMPERATURE, false));

        Dimension pressure = Dimension.whole(-1, 1, -2, 0);
        add(t, "Pa", 1, 1, pressure);
        add(t, "hPa", 100, 1, pressure);
        add(t, "kPa", 1e3, 1, pressure);
        add(t, "MPa", 1e6, 1, pressure);
        add(t, "GPa", 1e9, 1, pressure);
        add(t, "mbar", 100, 1, pressure);
        add(t, "bar", 1e5, 1, pressure);
        add(t, "atm", 101325, 1, pressure);
        // UCUM's metre of mercury is 133.322 kPa, as in the SI Brochure's 8th edition, table 8
        add(t, "mmHg", 133322, 1e3, pressure);
        add(t, "inHg", 33863788, 1e4, pressure);

        add(t, "N", 1, 1, Dimension.whole(1, 1, -2, 0));
        add(t, "J", 1, 1, Dimension.whole(2, 1, -2, 0));
        add(t, "kJ", 1e3, 1, Dimension.whole(2, 1, -2, 0));
        Dimension power = Dimension.whole(2, 1, -3, 0);
        add(t, "W", 1, 1, power);
        add(t, "mW", 1, 1e3, power);
        add(t, "kW", 1e3, 1, power);
        Dimension frequency = Dimension.whole(0, 0, -1, 0);
        add(t, "Hz", 1, 1, frequency);
        add(t, "kHz", 1e3, 1, frequency);
        add(t, "MHz", 1e6, 1, frequency);
        add(t, "GHz", 1e9, 1, frequency);
        add(t, "THz", 1e12, 1, frequency);

        angle(t, "rad", 1, 1, 0);
        angle(t, "mrad", 1, 1e3, 0);
        angle(t, "urad", 1, 1e6, 0);
        angle(t, "µrad", 1, 1e6, 0);
        angle(t, "μrad", 1, 1e6, 0);
        angle(t, "nrad", 1, 1e9, 0);
        angle(t, "deg", 1, 180, 1);
        angle(t, "°", 1, 180, 1);
        angle(t, "arcmin", 1, 10800, 1);
        angle(t, "'", 1, 10800, 1);
        angle(t, "′", 1, 10800, 1);
        angle(t, "arcsec", 1, 648000, 1);
        angle(t, "\"", 1, 648000, 1);
        angle(t, "″", 1, 648000, 1);
        angle(t, "gon", 1, 200, 1);
        angle(t, "mgon", 1, 200000, 1);

        add(t, "%", 1, 100, Dimension.NONE);
        // a level: the name of a number, which nothing converts
        add(t, "dB", 1, 1, Dimension.NONE);
        add(t, "ppm", 1, 1e6, Dimension.NONE);
        add(t, "ppb", 1, 1e9, Dimension.NONE);
        add(t, "dpt", 1, 1, Dimension.whole(-1, 0, 0, 0));
        return Collections.unmodifiableMap(t);
    }

    private static void add(Map<String, Unit> t, String symbol, double up, double down, Dimension dimension) {
        t.put(symbol, new Unit(symbol, up, down, 0, 0, dimension, false));
    }

    /** The three ways to write micro: u, the micro sign U+00B5 and the Greek letter U+03BC. */
    private static void micro(Map<String, Unit> t, String unit, Dimension dimension) {
        add(t, "u" + unit, 1, 1e6, dimension);
        add(t, "µ" + unit, 1, 1e6, dimension);
        add(t, "μ" + unit, 1, 1e6, dimension);
    }

    private static void angle(Map<String, Unit> t, String symbol, double up, double down, int pi) {
        t.put(symbol, new Unit(symbol, up, down, pi, 0, Dimension.NONE, true));
    }

    /** Recursive descent over the grammar in the class comment; {@code pos} moves only past what was understood. */
    private static final class Reader {
        private final String text;
        private final Predicate<String> isName;
        /** The text is a unit and nothing else, so that {@code mm-1} cannot be a difference. */
        private final boolean whole;

        private int pos;

        Reader(String text, Predicate<String> isName, boolean whole) {
            this.text = text;
            this.isName = isName;
            this.whole = whole;
        }

        Optional<Scan> run(int start) {
            pos = start;
            @Nullable Unit unit;
            if (text.startsWith("1/", start)) {
                pos = start + 1;
                unit = ONE;
            } else {
                unit = factor(false);
                if (unit == null) {
                    return Optional.empty();
                }
                unit = products(unit);
            }
            int parts = 0;
            while (at(pos) == '/') {
                int slash = pos;
                pos++;
                @Nullable Unit under = at(pos) == '(' ? group() : factor(true);
                if (under == null || under.offset() != 0 || unit.offset() != 0) {
                    pos = slash;
                    break;
                }
                unit = unit.over(under);
                parts++;
            }
            if (parts == 0 && text.startsWith("1/", start)) {
                return Optional.empty();
            }
            return Optional.of(new Scan(unit.named(text.substring(start, pos)), pos));
        }

        private Unit products(Unit first) {
            Unit unit = first;
            while (true) {
                int before = pos;
                char c = at(pos);
                if (c == '.' || c == '·' || c == '⋅') {
                    pos++;
                } else if (c == ' ') {
                    while (at(pos) == ' ') {
                        pos++;
                    }
                } else {
                    return unit;
                }
                @Nullable Unit next = factor(true);
                if (next == null || next.offset() != 0 || unit.offset() != 0) {
                    pos = before;
                    return unit;
                }
                unit = unit.times(next);
            }
        }

        private @Nullable Unit group() {
            pos++;
            @Nullable Unit first = factor(true);
            if (first == null || first.offset() != 0) {
                return null;
            }
            Unit unit = products(first);
            if (at(pos) != ')') {
                return null;
            }
            pos++;
            return unit;
        }

        /** One symbol with its exponent, or null with {@code pos} anywhere. */
        private @Nullable Unit factor(boolean mayBeName) {
            int start = pos;
            char c = at(pos);
            if (isLetter(c)) {
                while (isLetter(at(pos))) {
                    pos++;
                }
            } else if (c == '°') {
                pos++;
                if (at(pos) == 'C' && !isLetter(at(pos + 1))) {
                    pos++;
                }
            } else if (c == '%' || c == '\'' || c == '"' || c == '′' || c == '″') {
                pos++;
            } else {
                return null;
            }
            String symbol = text.substring(start, pos);
            @Nullable Unit unit = TABLE.get(symbol);
            if (unit == null) {
                return null;
            }
            int after = pos;
            int exponent = exponent();
            if (exponent == 0) {
                return null;
            }
            char next = at(pos);
            if (next == '_' || next == '(' || (isLetter(c) && isLetter(next)) || isDigit(next)) {
                return null;
            }
            if (mayBeName && (isName.test(symbol) || isName.test(text.substring(start, pos)))) {
                return null;
            }
            if (pos == after) {
                return unit;
            }
            return unit.offset() != 0 ? null : unit.power(exponent);
        }

        /** The exponent at {@code pos}: 1 if there is none, 0 if what stands there cannot be part of a unit. */
        private int exponent() {
            char c = at(pos);
            if (c == '^') {
                int digit = at(pos + 1) == '-' ? pos + 2 : pos + 1;
                int end = digit;
                while (isDigit(at(end))) {
                    end++;
                }
                // a fraction or a long number is arithmetic on the quantity, not part of its unit
                if (end == digit || end - digit > 2 || (at(end) == '.' && isDigit(at(end + 1)))) {
                    return 1;
                }
                int value = Integer.parseInt(text.substring(pos + 1, end));
                if (value != 0) {
                    pos = end;
                }
                return value == 0 ? 1 : value;
            }
            if (isDigit(c) || (whole && c == '-' && isDigit(at(pos + 1)))) {
                int end = pos + 1;
                while (isDigit(at(end))) {
                    end++;
                }
                if (end - pos > 3 || at(end) == '.') {
                    return 0;
                }
                int value = Integer.parseInt(text.substring(pos, end));
                pos = end;
                return value;
            }
            return superscript();
        }

        private int superscript() {
            int sign = 1;
            int i = pos;
            if (at(i) == '⁻') {
                sign = -1;
                i++;
            }
            int digit = superscriptDigit(at(i));
            if (digit <= 0) {
                return 1;
            }
            pos = i + 1;
            return sign * digit;
        }

        private static int superscriptDigit(char c) {
            return switch (c) {
                case '¹' -> 1;
                case '²' -> 2;
                case '³' -> 3;
                default -> c >= '⁴' && c <= '⁹' ? c - '⁰' : -1;
            };
        }

        private char at(int i) {
            return i < text.length() ? text.charAt(i) : '\0';
        }

        private static boolean isLetter(char c) {
            return Character.isLetter(c);
        }

        private static boolean isDigit(char c) {
            return c >= '0' && c <= '9';
        }
    }
}
