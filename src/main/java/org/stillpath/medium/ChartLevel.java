package org.stillpath.medium;

import org.stillpath.formula.Chart;
import org.stillpath.formula.Coordinate;
import org.stillpath.formula.Order;
import org.stillpath.formula.PerThread;

/** A coordinate that a chart gives, as a level: for seams and edges at heights. Equal where both its parts are. */
final class ChartLevel implements Level {
    private final Coordinate coordinate;
    private final Chart chart;
    private final PerThread<Scratch> scratch = PerThread.of(Scratch::new);

    ChartLevel(Coordinate coordinate, Chart chart) {
        this.coordinate = coordinate;
        this.chart = chart;
    }

    @Override
    public double value(double x, double y, double z, double[] gradient) {
        Scratch s = scratch.get().point(x, y, z);
        chart.sample(coordinate, s.x, s.y, s.z, 1, Order.GRADIENT, s.samples);
        gradient[0] = s.samples.gx[0];
        gradient[1] = s.samples.gy[0];
        gradient[2] = s.samples.gz[0];
        double value = s.samples.value[0];
        return value;
    }

    @Override
    public Level on(Chart other) {
        return new ChartLevel(coordinate, other);
    }

    @Override
    public String describe() {
        return coordinate.word();
    }

    @Override
    public boolean equals(Object o) {
        return o instanceof ChartLevel c && c.coordinate == coordinate && c.chart.equals(chart);
    }

    @Override
    public int hashCode() {
        return 31 * coordinate.hashCode() + chart.hashCode();
    }

    @Override
    public String toString() {
        return "ChartLevel[" + describe() + "]";
    }
}
