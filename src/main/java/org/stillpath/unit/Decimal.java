package org.stillpath.unit;

import java.util.OptionalDouble;

/**
 * Decimal numbers as people write them: {@code 12}, {@code -0.5}, {@code .5}, {@code 1e-3}. Scanned by hand, because a
 * regular expression costs more to compile than a whole job file takes to read, and because {@link Double#parseDouble}
 * alone lets {@code NaN}, {@code 0x1p3} and {@code 5d} through.
 */
public final class Decimal {
    /** Every whole number of so many digits is a long. */
    private static final int MOST_DIGITS = 18;
    /** Every whole number up to here is a double. */
    private static final long MOST_EXACT = 1L << 53;

    private static final int MOST_EXACT_POWER = 22;
    private static final long FIFTEEN_DIGITS = 1_000_000_000_000_000L;
    /** Powers of ten that are exact as doubles. */
    private static final double[] POWERS = {
        1e0, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18, 1e19,
        1e20, 1e21, 1e22
    };

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

    /**
     * A short plain number times {@code numerator / denominator}, as the nearest double: where both products are exact
     * their quotient is rounded once. NaN where this way cannot tell, which is so for exponents and more than 15 digits.
     *
     * @param number digits with at most one point and a sign
     * @param numerator whole
     * @param denominator whole, above 0
     */
    static double quotient(String number, double numerator, double denominator) {
        int start = !number.isEmpty() && isSign(number.charAt(0)) ? 1 : 0;
        long digits = 0;
        int scale = 0;
        boolean point = false;
        for (int i = start; i < number.length(); i++) {
            char c = number.charAt(i);
            if (c >= '0' && c <= '9') {
                digits = 10 * digits + (c - '0');
                scale += point ? 1 : 0;
            } else if (c == '.' && !point) {
                point = true;
            } else {
                return Double.NaN;
            }
            if (digits >= FIFTEEN_DIGITS) {
                return Double.NaN;
            }
        }
        if (scale > MOST_EXACT_POWER) {
            return Double.NaN;
        }
        double top = digits * numerator;
        double bottom = denominator * POWERS[scale];
        // a product is exact where nothing is left of it
        boolean exact =
                Math.fma((double) digits, numerator, -top) == 0 && Math.fma(denominator, POWERS[scale], -bottom) == 0;
        return !exact ? Double.NaN : start == 1 && number.charAt(0) != '+' ? -top / bottom : top / bottom;
    }

    /** The number that the whole text is, if it is one and not beyond the range of a double. */
    public static OptionalDouble parse(String text) {
        double value = parse(text, 0, text.length());
        return Double.isNaN(value) ? OptionalDouble.empty() : OptionalDouble.of(value);
    }

    /**
     * The number that a part of a text is; NaN where it is none, or beyond the range of a double. Makes no object for
     * most numbers of up to 18 digits and a small power of ten, so that millions of cells are read in seconds. Up to 2^53
     * the digits are an exact double, and their product or quotient with the exact power one rounding, hence the nearest
     * double (Clinger 1990, the fast path). For longer ones see {@link #longer}; what remains goes the general way.
     *
     * @param text the text
     * @param start offset of the first character
     * @param end offset behind the last character
     */
    public static double parse(String text, int start, int end) {
        int i = start;
        boolean negative = false;
        if (i < end && isSign(text.charAt(i))) {
            negative = text.charAt(i) != '+';
            i++;
        }
        long digits = 0;
        int count = 0;
        int scale = 0;
        boolean point = false;
        for (; i < end; i++) {
            char c = text.charAt(i);
            if (c >= '0' && c <= '9') {
                // zeros in front do not count
                count += count > 0 || c != '0' ? 1 : 0;
                if (count > MOST_DIGITS) {
                    return general(text, start, end);
                }
                digits = 10 * digits + (c - '0');
                scale -= point ? 1 : 0;
            } else if (c == '.' && !point) {
                point = true;
            } else {
                break;
            }
        }
        if (i < end && (text.charAt(i) == 'e' || text.charAt(i) == 'E')) {
            i++;
            boolean down = i < end && isSign(text.charAt(i)) && text.charAt(i) != '+';
            i += i < end && isSign(text.charAt(i)) ? 1 : 0;
            int power = 0;
            int first = i;
            for (; i < end && power < 1000 && text.charAt(i) >= '0' && text.charAt(i) <= '9'; i++) {
                power = 10 * power + (text.charAt(i) - '0');
            }
            if (i == first) {
                return general(text, start, end);
            }
            scale += down ? -power : power;
        }
        if (i != end || digits == 0 || scale < -MOST_EXACT_POWER || scale > MOST_EXACT_POWER) {
            return general(text, start, end);
        }
        double size;
        if (digits <= MOST_EXACT) {
            size = scale < 0 ? digits / POWERS[-scale] : digits * POWERS[scale];
        } else {
            size = longer(digits, scale);
            if (Double.isNaN(size)) {
                return general(text, start, end);
            }
        }
        return negative ? -size : size;
    }

    /**
     * {@code digits · 10^scale} as the nearest double; NaN where this way cannot tell. The digits are split into two
     * doubles, the quotient or product is formed with its own error by a fused multiplication (Dekker 1971), and the sum
     * of the two, known to about 100 bits, is rounded once. Near the middle between two doubles, and at powers of two,
     * where the spacing changes, that does not decide.
     */
    private static double longer(long digits, int scale) {
        double high = digits;
        double low = digits - (long) high;
        double power = POWERS[Math.abs(scale)];
        double first;
        double rest;
        if (scale < 0) {
            first = high / power;
            rest = (Math.fma(-first, power, high) + low) / power;
        } else {
            first = high * power;
            rest = Math.fma(high, power, -first) + low * power;
        }
        double sum = first + rest;
        double left = Math.abs(rest - (sum - first));
        double half = 0.5 * Math.ulp(sum);
        boolean sure = left < half * (1 - 0x1p-30) && (Double.doubleToRawLongBits(sum) & 0xfffffffffffffL) != 0;
        return sure ? sum : Double.NaN;
    }

    /** Any number, and whatever is none. */
    private static double general(String text, int start, int end) {
        String part = text.substring(start, end);
        if (part.isEmpty() || end(part, 0) != part.length()) {
            return Double.NaN;
        }
        double value = Double.parseDouble(ascii(part));
        return Double.isFinite(value) ? value : Double.NaN;
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
