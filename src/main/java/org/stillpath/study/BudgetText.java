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

    /** {@code 2.120 mm to 2.350 mm}. */
    static String interval(Watched w, double[] ends, double u) {
        Display.Reading low = Display.of(ends[0], w.unitOrOne(), 0.1 * u);
        return low + " to " + in(ends[1], low.unit(), 0.1 * u);
    }

    private static String in(double si, String unit, double error) {
        return Display.in(si, unit.isEmpty() ? "1" : unit, error).toString();
    }
}
