package org.stillpath.unit;

import java.util.OptionalDouble;

/**
 * Decimal numbers as people write them: {@code 12}, {@code -0.5}, {@code .5}, {@code 1e-3}. Scanned by hand, because a
 * regular expression costs more to compile than a whole job file takes to read, and because {@link Double#parseDouble}
 * alone lets {@code NaN}, {@code 0x1p3} and {@code 5d} through.
 */
public final class Decimal {
    private Decimal() {}

    /**
     * Where the number ends that starts at {@code start}; {@code start} itself if none does. A sign may stand before it
     * (U+2212 too). An {@code e} without digits behind it is not part of the number.
     */
    public static int end(String text, int start) {
        int i = start;
        if (i < text.length() && isSign(text.charAt(i))) {
            i++;
        }
        int whole = digits(text, i);
        int count = whole - i;
        i = whole;
        if (i < text.length() && text.charAt(i) == '.') {
            int part = digits(text, i + 1);
            count += part - i - 1;
            i = count > 0 ? part : i;
        }
        if (count == 0) {
            return start;
        }
        if (i < text.length() && (text.charAt(i) == 'e' || text.charAt(i) == 'E')) {
            int e = i + 1;
            if (e < text.length() && isSign(text.charAt(e))) {
                e++;
            }
            int last = digits(text, e);
            if (last > e) {
                i = last;
            }
        }
        return i;
    }

    /** The number that the whole text is, if it is one and not beyond the range of a double. */
    public static OptionalDouble parse(String text) {
        if (text.isEmpty() || end(text, 0) != text.length()) {
            return OptionalDouble.empty();
        }
        double value = Double.parseDouble(ascii(text));
        return Double.isFinite(value) ? OptionalDouble.of(value) : OptionalDouble.empty();
    }

    /** The same number with hyphens for minus signs. */
    static String ascii(String number) {
        return number.replace('\u2212', '-');
    }

    /** Whether some digit before the exponent is not zero. */
    static boolean isNonZero(String number) {
        for (int i = 0; i < number.length(); i++) {
            char c = number.charAt(i);
            if (c == 'e' || c == 'E') {
                return false;
            }
            if (c >= '1' && c <= '9') {
                return true;
            }
        }
        return false;
    }

    static boolean isSign(char c) {
        return c == '+' || c == '-' || c == '\u2212';
    }

    private static int digits(String text, int start) {
        int i = start;
        while (i < text.length() && text.charAt(i) >= '0' && text.charAt(i) <= '9') {
            i++;
        }
        return i;
    }
}
