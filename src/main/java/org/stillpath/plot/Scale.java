package org.stillpath.plot;

import java.math.BigDecimal;
import java.math.RoundingMode;
import java.util.ArrayList;
import java.util.List;

/**
 * A scale of an axis: a readable unit and ticks with their words. Ticks stand at round values.
 *
 * @param in the unit
 * @param ticks from below
 */
record Scale(Unit in, List<Tick> ticks) {
    /** With the least number in each unit for which it is taken: people say 900 m, but 0.4 mm. */
    private static final List<Unit> LENGTHS = List.of(
            new Unit("km", 1e3, 3),
            new Unit("m", 1, 1),
            new Unit("mm", 1e-3, 0.3),
            new Unit("µm", 1e-6, 0.3),
            new Unit("nm", 1e-9, 0));

    private static final List<Unit> ANGLES =
            List.of(new Unit("deg", Math.PI / 180, 1), new Unit("mrad", 1e-3, 0.3), new Unit("µrad", 1e-6, 0));

    private static final int[] ROUND = {1, 2, 5};

    Scale {
        ticks = List.copyOf(ticks);
    }

    /**
     * A unit in which an axis is written.
     *
     * @param symbol as written
     * @param size in SI
     * @param least number for which it is taken
     */
    record Unit(String symbol, double size, double least) {}

    /**
     * @param at place in SI
     * @param text number in the scale's unit
     */
    record Tick(double at, String text) {}

    /** Unit symbol. */
    String unit() {
        return in.symbol();
    }

    /** The unit in SI. */
    double unitSize() {
        return in.size();
    }

    /** The unit of length for a magnitude in metres. */
    static Unit unitFor(double metres) {
        return unitFor(metres, LENGTHS);
    }

    /** The unit of angle for a magnitude in rad. */
    static Unit angleUnitFor(double rad) {
        return unitFor(rad, ANGLES);
    }

    private static Unit unitFor(double size, List<Unit> units) {
        return units.stream()
                .filter(u -> size / u.size() >= u.least())
                .findFirst()
                .orElse(units.get(units.size() - 1));
    }

    /** Ticks over a range in SI, at most {@code most} of them. */
    static Scale of(double low, double high, Unit unit, int most) {
        double size = unit.size();
        double span = (high - low) / size;
        BigDecimal step = step(span / Math.max(most, 1));
        double s = step.doubleValue();
        List<Tick> ticks = new ArrayList<>();
        long first = (long) Math.ceil(low / size / s - 1e-9);
        long last = (long) Math.floor(high / size / s + 1e-9);
        for (long k = first; k <= last; k++) {
            BigDecimal value = step.multiply(BigDecimal.valueOf(k));
            ticks.add(new Tick(value.doubleValue() * size, plain(value, Math.max(step.scale(), 0))));
        }
        return new Scale(unit, ticks);
    }

    /** The least of 1, 2, 5 times a power of ten that is not below {@code least}. */
    static BigDecimal step(double least) {
        int power = (int) Math.floor(Math.log10(least));
        for (int p = power; ; p++) {
            for (int r : ROUND) {
                BigDecimal step = BigDecimal.valueOf(r).scaleByPowerOfTen(p);
                if (step.doubleValue() >= least * (1 - 1e-9)) {
                    return step;
                }
            }
        }
    }

    /** The greatest length of 1, 2, 5 times a power of ten that is not above {@code most}, in metres. */
    static Tick roundLength(double most, Unit unit) {
        BigDecimal best = step(most / unit.size() / 10);
        for (int i = 0; i < 4; i++) {
            BigDecimal next = step(best.doubleValue() * 1.01);
            if (next.doubleValue() * unit.size() > most) {
                break;
            }
            best = next;
        }
        return new Tick(best.doubleValue() * unit.size(), plain(best, Math.max(best.scale(), 0)) + " " + unit.symbol());
    }

    /** A number with a true minus sign, without exponent, and with thin spaces from five digits on. */
    static String plain(BigDecimal value, int decimals) {
        String digits = value.abs().setScale(decimals, RoundingMode.HALF_EVEN).toPlainString();
        int point = digits.indexOf('.');
        int whole = point < 0 ? digits.length() : point;
        StringBuilder out = new StringBuilder(digits);
        if (whole >= 5) {
            for (int i = whole - 3; i > 0; i -= 3) {
                out.insert(i, '\u2009');
            }
        }
        return out.chars().anyMatch(c -> c >= '1' && c <= '9') && value.signum() < 0 ? "−" + out : out.toString();
    }
}
