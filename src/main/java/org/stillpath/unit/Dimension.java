package org.stillpath.unit;

import org.jspecify.annotations.Nullable;

/**
 * Exponents of length, mass, time and temperature, as fractions over one common denominator, so that square roots keep
 * exact dimensions. Always in lowest terms.
 *
 * @param length exponent of length, times the denominator
 * @param mass exponent of mass, times the denominator
 * @param time exponent of time, times the denominator
 * @param temperature exponent of temperature, times the denominator
 * @param denominator common denominator, positive
 */
public record Dimension(int length, int mass, int time, int temperature, int denominator) {
    /** A pure number. */
    public static final Dimension NONE = whole(0, 0, 0, 0);
    /** Length. */
    public static final Dimension LENGTH = whole(1, 0, 0, 0);
    /** Mass. */
    public static final Dimension MASS = whole(0, 1, 0, 0);
    /** Time. */
    public static final Dimension TIME = whole(0, 0, 1, 0);
    /** Temperature. */
    public static final Dimension TEMPERATURE = whole(0, 0, 0, 1);

    public Dimension {
        if (denominator <= 0) {
            throw new IllegalArgumentException("denominator must be positive: " + denominator);
        }
        int common = gcd(gcd(gcd(gcd(denominator, length), mass), time), temperature);
        length /= common;
        mass /= common;
        time /= common;
        temperature /= common;
        denominator /= common;
    }

    /** Whole exponents of length, mass, time and temperature. */
    static Dimension whole(int length, int mass, int time, int temperature) {
        return new Dimension(length, mass, time, temperature, 1);
    }

    /**
     * The dimension of a product.
     *
     * @throws ArithmeticException if an exponent leaves the range of an int
     */
    public Dimension times(Dimension o) {
        return sum(o, 1);
    }

    /**
     * The dimension of a quotient.
     *
     * @throws ArithmeticException if an exponent leaves the range of an int
     */
    public Dimension over(Dimension o) {
        return sum(o, -1);
    }

    /**
     * The dimension of a power with the exponent {@code numerator/denominator}.
     *
     * @throws IllegalArgumentException if the exponent's denominator is zero
     * @throws ArithmeticException if an exponent leaves the range of an int
     */
    public Dimension power(int numerator, int denominator) {
        if (denominator == 0) {
            throw new IllegalArgumentException("denominator of an exponent must not be 0");
        }
        int sign = denominator < 0 ? -1 : 1;
        int n = Math.multiplyExact(sign, numerator);
        return new Dimension(
                Math.multiplyExact(length, n),
                Math.multiplyExact(mass, n),
                Math.multiplyExact(time, n),
                Math.multiplyExact(temperature, n),
                Math.multiplyExact(this.denominator, Math.multiplyExact(sign, denominator)));
    }

    /** Whether this is a pure number. */
    public boolean isNone() {
        return equals(NONE);
    }

    /** In words with an article: {@code a length}, {@code an inverse length}, {@code a temperature over a length}. */
    public String describe() {
        String known = denominator == 1 ? name() : "";
        return known.isEmpty() ? "a quantity in " + symbol() : known;
    }

    /** The coherent SI unit, as this program reads and writes it: {@code 1}, {@code m}, {@code 1/m}, {@code K/m}. */
    public String symbol() {
        if (denominator == 1 && temperature == 0) {
            if (is(-1, 1, -2, 0)) {
                return "Pa";
            }
            if (is(2, 1, -2, 0)) {
                return "J";
            }
            if (is(2, 1, -3, 0)) {
                return "W";
            }
            if (is(1, 1, -2, 0)) {
                return "N";
            }
        }
        StringBuilder over = new StringBuilder();
        StringBuilder under = new StringBuilder();
        int below = part(mass, "kg", over, under)
                + part(length, "m", over, under)
                + part(temperature, "K", over, under)
                + part(time, "s", over, under);
        String top = over.length() == 0 ? "1" : over.toString();
        if (below == 0) {
            return top;
        }
        return top + "/" + (below > 1 ? "(" + under + ")" : under.toString());
    }

    private int part(int exponent, String unit, StringBuilder over, StringBuilder under) {
        if (exponent == 0) {
            return 0;
        }
        StringBuilder side = exponent > 0 ? over : under;
        if (side.length() > 0) {
            side.append(' ');
        }
        side.append(unit);
        int size = Math.abs(exponent);
        if (denominator != 1) {
            int common = gcd(size, denominator);
            side.append("^(")
                    .append(size / common)
                    .append('/')
                    .append(denominator / common)
                    .append(')');
        } else if (size != 1) {
            side.append('^').append(size);
        }
        return exponent < 0 ? 1 : 0;
    }

    private String name() {
        if (mass == 0 && time == 0 && temperature == 0) {
            return switch (length) {
                case 0 -> "a pure number";
                case 1 -> "a length";
                case 2 -> "an area";
                case 3 -> "a volume";
                case -1 -> "an inverse length";
                case -2 -> "an inverse area";
                case -3 -> "an inverse volume";
                default -> "";
            };
        }
        if (mass == 0 && time == 0) {
            String base = temperature == 1 ? "a temperature" : temperature == -1 ? "an inverse temperature" : "";
            if (base.isEmpty() || length > 1 || length < -2) {
                return "";
            }
            return switch (length) {
                case 0 -> base;
                case 1 -> temperature == 1 ? "" : "a length over a temperature";
                case -1 -> temperature == 1 ? "a temperature over a length" : "";
                default -> temperature == 1 ? "a temperature over an area" : "";
            };
        }
        for (Named named : NAMED) {
            if (is(named.length, named.mass, named.time, named.temperature)) {
                return named.words;
            }
        }
        return "";
    }

    private record Named(int length, int mass, int time, int temperature, String words) {}

    private static final Named[] NAMED = {
        new Named(0, 0, 1, 0, "a time"),
        new Named(0, 0, -1, 0, "a frequency"),
        new Named(1, 0, -1, 0, "a speed"),
        new Named(1, 0, -2, 0, "an acceleration"),
        new Named(0, 1, 0, 0, "a mass"),
        new Named(-3, 1, 0, 0, "a density"),
        new Named(-1, 1, -2, 0, "a pressure"),
        new Named(-2, 1, -2, 0, "a pressure over a length"),
        new Named(1, 1, -2, 0, "a force"),
        new Named(2, 1, -2, 0, "an energy"),
        new Named(2, 1, -3, 0, "a power in watts"),
        new Named(1, 1, -3, -1, "a thermal conductivity"),
        new Named(2, 0, -2, -1, "a specific heat"),
        new Named(2, 0, -1, 0, "a diffusivity"),
    };

    /** By hand: the equality that records come with is built at first use and costs a small job tens of milliseconds. */
    @Override
    public boolean equals(@Nullable Object other) {
        return other instanceof Dimension o
                && length == o.length
                && mass == o.mass
                && time == o.time
                && temperature == o.temperature
                && denominator == o.denominator;
    }

    @Override
    public int hashCode() {
        return (((length * 31 + mass) * 31 + time) * 31 + temperature) * 31 + denominator;
    }

    private boolean is(int l, int m, int t, int k) {
        return length == l && mass == m && time == t && temperature == k && denominator == 1;
    }

    private Dimension sum(Dimension o, int sign) {
        int common = Math.multiplyExact(denominator / gcd(denominator, o.denominator), o.denominator);
        int a = common / denominator;
        int b = Math.multiplyExact(sign, common / o.denominator);
        return new Dimension(
                combine(length, a, o.length, b),
                combine(mass, a, o.mass, b),
                combine(time, a, o.time, b),
                combine(temperature, a, o.temperature, b),
                common);
    }

    private static int combine(int x, int a, int y, int b) {
        return Math.addExact(Math.multiplyExact(x, a), Math.multiplyExact(y, b));
    }

    private static int gcd(int a, int b) {
        int x = Math.abs(a);
        int y = Math.abs(b);
        while (y != 0) {
            int r = x % y;
            x = y;
            y = r;
        }
        return x;
    }
}
