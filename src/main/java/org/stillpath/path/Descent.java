package org.stillpath.path;

import java.util.List;

/**
 * The way back from a target to the source, down the slope of S: what the least path on a grid passes. Only as good as needed
 * to tell that, by steps of half a cell with S_k from U between the nodes of a cell.
 */
final class Descent {
    private static final double STEP = 0.5;
    /** Cells about the source, along each axis, in which U comes from the expansion. */
    private static final double HOME = 2.5;
    /** Cells about the target in which the grid's edge does not count, since a user may put it there. */
    private static final double START = 2;

    private final FrontGrid grid;
    private final double[] stretch;
    private final double[] source;
    private final int dimensions;
    private final double[] slope;
    private final double[] share;

    Descent(Fronts fronts, double[] stretch) {
        this.grid = fronts.grid();
        this.stretch = stretch;
        this.source = grid.coordinates(fronts.source());
        this.dimensions = source.length;
        this.slope = new double[dimensions];
        this.share = new double[dimensions];
    }

    /** What the path to a target, in coordinates along the axes, passes. */
    Arrival.Course course(double[] target) {
        List<FrontGrid.Axis> axes = grid.axes();
        double[] c = target.clone();
        int most = 0;
        for (FrontGrid.Axis a : axes) {
            most += 16 * a.count();
        }
        Arrival.Course course = Arrival.Course.FREE;
        for (int i = 0; i < most && cells(c, source) > HOME; i++) {
            if (!slope(c)) {
                return Arrival.Course.WALL;
            }
            double fastest = 0;
            for (int k = 0; k < dimensions; k++) {
                fastest = Math.max(fastest, Math.abs(slope[k]) / axes.get(k).spacing());
            }
            if (!(fastest > 0)) {
                return course;
            }
            for (int k = 0; k < dimensions; k++) {
                FrontGrid.Axis a = axes.get(k);
                c[k] = Math.max(0, Math.min(a.length(), c[k] - STEP / fastest * slope[k]));
                boolean edge = Math.min(c[k], a.length() - c[k]) < a.spacing();
                if (edge && cells(c, target) > START) {
                    course = Arrival.Course.EDGE;
                }
            }
        }
        return course;
    }

    /** Distance in cells, along the axis on which it is greatest. */
    private double cells(double[] a, double[] b) {
        double most = 0;
        for (int k = 0; k < dimensions; k++) {
            most = Math.max(most, Math.abs(a[k] - b[k]) / grid.axes().get(k).spacing());
        }
        return most;
    }

    /** ∇S/n₀; whether no wall stands at the cell or beside it. */
    private boolean slope(double[] c) {
        double u = 0;
        double[] du = new double[dimensions];
        int[] cell = new int[dimensions];
        for (int k = 0; k < dimensions; k++) {
            FrontGrid.Axis a = grid.axes().get(k);
            double t = c[k] / a.spacing();
            cell[k] = (int) Math.max(0, Math.min(a.count() - 2, Math.floor(t)));
            share[k] = t - cell[k];
        }
        int around = 1 << (2 * dimensions);
        for (int i = 0; i < around; i++) {
            int node = 0;
            int stride = 1;
            double weight = 1;
            boolean inside = true;
            boolean corner = true;
            for (int k = 0; k < dimensions; k++) {
                int offset = ((i >> (2 * k)) & 3) - 1;
                int n = cell[k] + offset;
                inside &= n >= 0 && n < grid.axes().get(k).count();
                corner &= offset == 0 || offset == 1;
                weight *= offset == 0 ? 1 - share[k] : share[k];
                node += stride * n;
                stride *= grid.axes().get(k).count();
            }
            if (!inside) {
                continue;
            }
            double value = stretch[node];
            if (value == Double.POSITIVE_INFINITY) {
                return false;
            }
            if (corner) {
                u += weight * value;
                for (int k = 0; k < dimensions; k++) {
                    boolean high = ((i >> (2 * k)) & 3) == 2;
                    double across = 1;
                    for (int m = 0; m < dimensions; m++) {
                        if (m != k) {
                            across *= ((i >> (2 * m)) & 3) == 2 ? share[m] : 1 - share[m];
                        }
                    }
                    du[k] += (high ? across : -across)
                            * value
                            / grid.axes().get(k).spacing();
                }
            }
        }
        double r = 0;
        for (int k = 0; k < dimensions; k++) {
            r = Math.hypot(r, c[k] - source[k]);
        }
        for (int k = 0; k < dimensions; k++) {
            slope[k] = (c[k] - source[k]) / r * (1 + u) + r * du[k];
        }
        return true;
    }
}
