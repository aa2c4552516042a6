package org.stillpath.medium;

import org.stillpath.formula.Chart;

/**
 * Margin of one end of a hydrostatic pressure, positive inside. Where the end lies is worked out no farther than the sign at
 * the place needs ({@link HydrostaticTable#end}), so that air near the ground costs no solution up to 120 km.
 *
 * @param height the height
 * @param table the pressure
 * @param upper whether the range lies below this end
 */
record PressureEdge(Level height, HydrostaticTable table, boolean upper) implements Level {
    @Override
    public double value(double x, double y, double z, double[] gradient) {
        double h = height.value(x, y, z, gradient);
        if (!upper) {
            return h - table.end(h, false);
        }
        gradient[0] = 0 - gradient[0];
        gradient[1] = 0 - gradient[1];
        gradient[2] = 0 - gradient[2];
        return table.end(h, true) - h;
    }

    @Override
    public Level on(Chart chart) {
        return new PressureEdge(height.on(chart), table, upper);
    }

    @Override
    public String describe() {
        return new EdgeLevel(height, upper ? table.high() : table.low(), upper, "the pressure").describe();
    }
}
