package org.stillpath.medium;

import org.stillpath.formula.Coordinate;
import org.stillpath.formula.Order;
import org.stillpath.formula.PerThread;

/**
 * The ground as the margin of a region: the clearance over it, less how far below it rays are still followed. A ray that
 * leaves the region there is grounded, not outside. Equal where both its parts are.
 */
public final class GroundLevel implements Level {
    private final EarthChart chart;
    private final double sunk;
    private final PerThread<Scratch> scratch = PerThread.of(Scratch::new);

    /**
     * The ground of a chart.
     *
     * @param sunk metres below the ground at which rays end, 0 or a trifle: a target may stand on the ground itself
     */
    public GroundLevel(EarthChart chart, double sunk) {
        if (!(sunk >= 0)) {
            throw new IllegalArgumentException("sunk must not be negative: " + sunk);
        }
        this.chart = chart;
        this.sunk = sunk;
    }

    @Override
    public double value(double x, double y, double z, double[] gradient) {
        Scratch s = scratch.get().point(x, y, z);
        chart.sample(Coordinate.CLEARANCE, s.x, s.y, s.z, 1, Order.GRADIENT, s.samples);
        gradient[0] = s.samples.gx[0];
        gradient[1] = s.samples.gy[0];
        gradient[2] = s.samples.gz[0];
        return s.samples.value[0] + sunk;
    }

    @Override
    public String describe() {
        return "the ground";
    }

    @Override
    public boolean equals(Object o) {
        return o instanceof GroundLevel g && g.chart.equals(chart) && g.sunk == sunk;
    }

    @Override
    public int hashCode() {
        return 31 * chart.hashCode() + Double.hashCode(sunk);
    }

    @Override
    public String toString() {
        return "GroundLevel[" + sunk + " m below]";
    }
}
