package org.stillpath.medium;

import org.stillpath.formula.Chart;

/**
 * A margin that is widened a little: the edge of a temperature field in a plate whose faces bulge past it.
 *
 * @param level the margin
 * @param slack by how much its region is widened, metres
 */
record SlackLevel(Level level, double slack) implements Level {
    @Override
    public double value(double x, double y, double z, double[] gradient) {
        double value = level.value(x, y, z, gradient);
        double steep = Math.sqrt(gradient[0] * gradient[0] + gradient[1] * gradient[1] + gradient[2] * gradient[2]);
        return value + slack * steep;
    }

    @Override
    public Level on(Chart chart) {
        Level placed = level.on(chart);
        return placed == level ? this : new SlackLevel(placed, slack);
    }

    @Override
    public String describe() {
        return level.describe();
    }
}
