package org.stillpath.study;

import org.stillpath.unit.Display;

/** Values with their uncertainties in words. */
final class BudgetText {
    private BudgetText() {}

    /** {@code 2.236 mm ± 0.114 mm}: two digits of the uncertainty, both in one unit. */
    static String said(Watched w, double value, double u) {
        Display.Reading r = Display.of(value, w.unitOrOne(), 0.1 * u);
        return r + " ± " + in(u, r.unit(), 0.1 * u);
    }

    /** {@code 2.120 mm to 2.350 mm}: both ends in the unit of the larger. */
    static String interval(Watched w, double[] ends, double u) {
        String unit = Display.of(Math.max(Math.abs(ends[0]), Math.abs(ends[1])), w.unitOrOne(), 0.1 * u)
                .unit();
        // below the last digit shown there is nothing to say
        double low = Math.abs(ends[0]) < 0.05 * u ? 0 : ends[0];
        double high = Math.abs(ends[1]) < 0.05 * u ? 0 : ends[1];
        return in(low, unit, 0.1 * u) + " to " + in(high, unit, 0.1 * u);
    }

    private static String in(double si, String unit, double error) {
        return Display.in(si, unit.isEmpty() ? "1" : unit, error).toString();
    }
}
