package org.stillpath.report;

import java.math.BigDecimal;
import java.math.RoundingMode;
import java.util.Arrays;
import java.util.List;
import org.stillpath.unit.Display;
import org.stillpath.unit.Unit;
import org.stillpath.unit.Units;

/** Numbers under one another: one unit, as many decimals as their errors support, decimal points in one line. */
final class Column {
    private static final int SIGNIFICANT = 9;

    private Column() {}

    /**
     * Numbers of one kind for one column of a table.
     *
     * @param values in SI
     * @param errors their errors, likewise; not finite where unknown
     * @param unit SI unit symbol
     * @return the numbers as text with equally many decimals each, and the readable unit that fits the largest
     */
    static Cells of(double[] values, double[] errors, String unit) {
        double largest = Arrays.stream(values)
                .map(Math::abs)
                .filter(Double::isFinite)
                .max()
                .orElse(0);
        return in(values, errors, Display.of(largest, unit, 0).unit());
    }

    /** The same in a unit of one's own choice; empty for pure numbers. */
    static Cells in(double[] values, double[] errors, String shown) {
        Unit readable = Units.parse(shown.isEmpty() ? "1" : shown).orElseThrow();
        double largest = Arrays.stream(values)
                .map(Math::abs)
                .filter(Double::isFinite)
                .max()
                .orElse(0);
        int decimals = 0;
        for (double error : errors) {
            decimals = Math.max(decimals, decimals(readable.fromSi(largest), readable.fromSi(error)));
        }
        // exact numbers, such as counts and what a job gives, have no digits that say nothing
        boolean exact = Arrays.stream(errors).allMatch(e -> e == 0);
        int places = exact ? needed(values, readable, decimals) : decimals;
        List<String> texts = Arrays.stream(values)
                .mapToObj(v -> Double.isFinite(v) ? fixed(readable.fromSi(v), places) : "")
                .toList();
        return new Cells(texts, shown);
    }

    /** Numbers as text, and their unit; an empty unit for pure numbers. */
    record Cells(List<String> texts, String unit) {}

    /** Pads numbers on the left so that their decimal points stand in one line, a number without one as if it had. */
    static List<String> aligned(List<String> numbers) {
        int whole = 0;
        for (String number : numbers) {
            whole = Math.max(whole, point(number));
        }
        int width = whole;
        return numbers.stream().map(n -> " ".repeat(width - point(n)) + n).toList();
    }

    private static int point(String number) {
        for (int i = 0; i < number.length(); i++) {
            char c = number.charAt(i);
            if ("0123456789+-".indexOf(c) < 0) {
                return i;
            }
        }
        return number.length();
    }

    private static int decimals(double largest, double error) {
        int whole = largest >= 1 ? (int) Math.floor(Math.log10(largest)) + 1 : 1;
        int most = Math.max(0, SIGNIFICANT - whole);
        if (!(error > 0) || Double.isInfinite(error)) {
            return most;
        }
        return Math.max(0, Math.min(most, (int) -Math.ceil(Math.log10(error))));
    }

    /** Decimals without the zeros that all numbers end with. */
    private static int needed(double[] values, Unit readable, int most) {
        int needed = 0;
        for (double v : values) {
            if (Double.isFinite(v)) {
                BigDecimal shown = new BigDecimal(readable.fromSi(v)).setScale(most, RoundingMode.HALF_EVEN);
                needed = Math.max(needed, shown.stripTrailingZeros().scale());
            }
        }
        return needed;
    }

    private static String fixed(double value, int decimals) {
        String text =
                new BigDecimal(value).setScale(decimals, RoundingMode.HALF_EVEN).toPlainString();
        return text.matches("-0(\\.0*)?") ? text.substring(1) : text;
    }
}
