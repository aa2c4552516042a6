package org.stillpath.formula;

import java.util.Arrays;

/**
 * Gives the coordinates of a sight that do not follow from x, y and z alone: height, clearance and distance, which
 * depend on the shape of the earth and of the ground. Whoever knows these implements it; implementations are immutable.
 */
public interface Chart {
    /** Knows none of them: for formulas that do not use them. */
    Chart NONE = (coordinate, x, y, z, count, order, out) -> {
        throw new IllegalArgumentException(
                "a chart is needed that gives `" + coordinate.word() + "`, which the formula uses");
    };

    /** A flat earth whose ground is its datum: height and clearance are z, distance is x. */
    Chart FLAT = (coordinate, x, y, z, count, order, out) -> {
        boolean up = coordinate != Coordinate.DISTANCE;
        System.arraycopy(up ? z : x, 0, out.value, 0, count);
        if (order != Order.VALUE) {
            Arrays.fill(out.gx, 0, count, up ? 0 : 1);
            Arrays.fill(out.gy, 0, count, 0);
            Arrays.fill(out.gz, 0, count, up ? 1 : 0);
        }
        if (order == Order.HESSIAN) {
            for (double[] h : new double[][] {out.hxx, out.hxy, out.hxz, out.hyy, out.hyz, out.hzz}) {
                Arrays.fill(h, 0, count, 0);
            }
        }
    };

    /**
     * Samples one coordinate at the first {@code count} points.
     *
     * @param coordinate one with {@link Coordinate#charted()}
     * @param x points in the formula's own frame, in metres; likewise {@code y} and {@code z}
     * @param out receives the coordinate in metres and its derivatives with respect to x, y and z
     */
    void sample(Coordinate coordinate, double[] x, double[] y, double[] z, int count, Order order, Samples out);
}
