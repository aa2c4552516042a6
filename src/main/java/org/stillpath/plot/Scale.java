package org.stillpath.plot;

import java.math.BigDecimal;
import java.math.RoundingMode;
import java.util.ArrayList;
import java.util.List;

/**
 * A length scale: a readable unit and ticks at round values.
 *
 * @param unitIndex place of the unit in the table of units
 * @param step from tick to tick, in that unit
 * @param ticks from below
 */
record Scale(int unitIndex, BigDecimal step, List<Tick> ticks) {
    private static final String[] UNITS = {"km", "m", "mm", "µm", "nm"};
    private static final double[] SIZES = {1e3, 1, 1e-3, 1e-6, 1e-9};

    /** The least number in each unit for which it is taken: people say 900 m, but 0.4 mm. */
    private static final double[] LEAST = {3, 1, 0.3, 0.3, 0};

    private static final int[] ROUND = {1, 2, 5};

    Scale {
        ticks = List.copyOf(ticks);
    }

    /**
     * @param at place in metres
     * @param text number in the scale's unit
     */
    record Tick(double at, String text) {}

    /** Unit symbol. */
    String unit() {
        return UNITS[unitIndex];
    }

    /** The unit in metres. */
    double unitSize() {
        return SIZES[unitIndex];
    }

    /** Place of the unit for a magnitude in the tables above. */
    static int unitFor(double metres) {
        for (int i = 0; i < UNITS.length; i++) {
            if (metres / SIZES[i] >= LEAST[i]) {
                return i;
            }
        }
        return UNITS.length - 1;
    }

    static double size(int unit) {
        return SIZES[unit];
    }

    /** Ticks over a range in metres, at most {@code most} of them. */
    static Scale of(double low, double high, int unit, int most) {
        double size = SIZES[unit];
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
        return new Scale(unit, step, ticks);
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
    static Tick roundLength(double most, int unit) {
        BigDecimal best = step(most / SIZES[unit] / 10);
        for (int i = 0; i < 4; i++) {
            BigDecimal next = step(best.doubleValue() * 1.01);
            if (next.doubleValue() * SIZES[unit] > most) {
                break;
            }
            best = next;
        }
        return new Tick(best.doubleValue() * SIZES[unit], plain(best, Math.max(best.scale(), 0)) + " " + UNITS[unit]);
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
