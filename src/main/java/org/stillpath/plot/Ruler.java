package org.stillpath.plot;

import java.math.BigDecimal;
import java.util.ArrayList;
import java.util.List;
import org.stillpath.unit.Display;
import org.stillpath.unit.Unit;
import org.stillpath.unit.Units;

/**
 * An axis of any quantity: a readable unit, a power of ten where even that leaves long numbers, and ticks at round values.
 *
 * @param unit unit of the ticks
 * @param power power of ten that ticks are counted in
 * @param low lower end, in units times the power; {@code high} likewise
 * @param ticks within the ends
 */
record Ruler(Unit unit, int power, double low, double high, List<Tick> ticks) {
    private static final int SMALL = -4;
    private static final int LARGE = 5;

    /**
     * A tick.
     *
     * @param at in units times the power
     * @param text as written
     */
    record Tick(double at, String text) {}

    Ruler {
        ticks = List.copyOf(ticks);
    }

    /**
     * Over a range.
     *
     * @param low in SI; {@code high} likewise, above it
     * @param si SI unit symbol
     * @param shown unit of the ticks; empty: one that suits the size
     * @param most ticks at most
     */
    static Ruler of(double low, double high, String si, String shown, int most) {
        double size = Math.max(Math.abs(low), Math.abs(high));
        String symbol = shown.isEmpty() ? Display.of(size, si, 0).unit() : shown;
        Unit unit = Units.parse(symbol.isEmpty() ? "1" : symbol).orElseThrow();
        double a = unit.fromSi(low);
        double b = unit.fromSi(high);
        double largest = Math.max(Math.abs(a), Math.abs(b));
        int leading = largest > 0 ? (int) Math.floor(Math.log10(largest)) : 0;
        int power = leading < SMALL || leading > LARGE ? leading : 0;
        double factor = Math.pow(10, -power);
        a *= factor;
        b *= factor;
        BigDecimal step = Scale.step((b - a) / Math.max(most, 1));
        List<Tick> ticks = new ArrayList<>();
        double s = step.doubleValue();
        for (long k = (long) Math.ceil(a / s - 1e-9); k <= (long) Math.floor(b / s + 1e-9); k++) {
            BigDecimal value = step.multiply(BigDecimal.valueOf(k));
            ticks.add(new Tick(value.doubleValue(), Scale.plain(value, Math.max(step.scale(), 0))));
        }
        return new Ruler(unit, power, a, b, ticks);
    }

    /** A value in SI as a part of the way from low to high. */
    double part(double si) {
        return (unit.fromSi(si) * Math.pow(10, -power) - low) / (high - low);
    }

    double part(Tick tick) {
        return (tick.at() - low) / (high - low);
    }

    /** What the axis shows: {@code back focal distance / mm}. */
    String name(String label) {
        String symbol = unit.symbol().equals("1") ? "" : unit.symbol();
        if (power == 0) {
            return symbol.isEmpty() ? label : label + " / " + symbol;
        }
        String ten = "10^" + (power < 0 ? "−" : "") + Math.abs(power);
        return label + " / " + (symbol.isEmpty() ? ten : "(" + ten + " " + symbol + ")");
    }

    /** Width of the widest tick label, points. */
    double widest() {
        return ticks.stream().mapToDouble(t -> Canvas.width(t.text())).max().orElse(0);
    }

    /** Whether tick labels stand clear of each other over so many points. */
    boolean isClear(double points) {
        return Axes.areClear(
                ticks.stream().map(Tick::text).toList(),
                ticks.stream().mapToDouble(t -> part(t) * points).toArray());
    }
}
