package org.stillpath.path;

import java.util.Arrays;
import org.stillpath.geometry.Vector;

/**
 * First-arrival optical lengths S from a source on a grid. Their level sets are the wavefronts.
 *
 * <p>Kept is the smooth and small factor U of S = n₀ r (1 + U), with the index n₀ at the source and the distance r from it: it
 * can be interpolated right up to the source, and thin air keeps its digits.
 *
 * @param grid the nodes
 * @param source where the light comes from, metres
 * @param refractivity n₀ − 1 at the source
 * @param stretch U, one a node, the first axis fastest; infinite at walls and where no light arrives
 */
public record Fronts(FrontGrid grid, Vector source, double refractivity, double[] stretch) {
    private static final int POINTS = 4;

    public Fronts {
        if (stretch.length != grid.size()) {
            throw new IllegalArgumentException(
                    "stretch must have a value a node, " + grid.size() + ": " + stretch.length);
        }
        stretch = stretch.clone();
    }

    /** U = S/(n₀ r) − 1, one a node (a copy). */
    @Override
    public double[] stretch() {
        return stretch.clone();
    }

    /** S in metres, one a node, the first axis fastest; infinite at walls and where no light arrives. */
    public double[] opticalLengths() {
        double[] s = new double[stretch.length];
        for (int i = 0; i < s.length; i++) {
            s[i] = opticalLength(i);
        }
        return s;
    }

    /** S in metres at a node; infinite at a wall and where no light arrives. */
    public double opticalLength(int node) {
        double u = stretch[node];
        return u == Double.POSITIVE_INFINITY
                ? u
                : (1 + refractivity) * grid.node(node).minus(source).norm() * (1 + u);
    }

    /**
     * S in metres at a point, by cubic interpolation of U; infinite where no light arrives. In a cell with a wall at a corner it
     * is good to the first order only: the straight way from the best corner, with the index 1 + {@code refractivity}.
     *
     * @throws IllegalArgumentException if the point lies outside the grid
     */
    public double at(Vector point) {
        double s = bent(point);
        return s == Double.POSITIVE_INFINITY
                ? s
                : (1 + refractivity) * point.minus(source).norm() + s;
    }

    /** S − n₀ r at a point: what the factor U adds, free of cancellation. */
    double bent(Vector point) {
        double[] c = grid.coordinatesInside(point, "point");
        double r = point.minus(source).norm();
        double u = interpolated(c);
        if (Double.isFinite(u)) {
            return (1 + refractivity) * r * u;
        }
        return nearWall(c) - (1 + refractivity) * r;
    }

    /** What the least path to a point passes. */
    Arrival.Course course(Vector point) {
        return new Descent(this, stretch).course(grid.coordinates(point));
    }

    /** Lagrange's cubic through the four nodes about a point, along each axis; not finite where one of them is a wall. */
    private double interpolated(double[] c) {
        int dimensions = c.length;
        int[] first = new int[dimensions];
        double[][] weight = new double[dimensions][];
        for (int k = 0; k < dimensions; k++) {
            FrontGrid.Axis a = grid.axes().get(k);
            int points = Math.min(POINTS, a.count());
            double t = c[k] / a.spacing();
            long near = Math.round(t);
            if (Math.abs(t - near) < 1e-9) {
                // on a node: its neighbours need not be known
                first[k] = (int) Math.max(0, Math.min(a.count() - 1, near));
                weight[k] = new double[] {1};
                continue;
            }
            first[k] = (int) Math.max(0, Math.min(a.count() - points, (long) Math.floor(t) - 1));
            weight[k] = weights(t - first[k], points);
        }
        double sum = 0;
        int layers = dimensions == 3 ? weight[2].length : 1;
        int row = grid.axes().get(0).count();
        int layer = row * grid.axes().get(1).count();
        for (int m = 0; m < layers; m++) {
            double wm = dimensions == 3 ? weight[2][m] : 1;
            int at = dimensions == 3 ? (first[2] + m) * layer : 0;
            for (int j = 0; j < weight[1].length; j++) {
                for (int i = 0; i < weight[0].length; i++) {
                    sum += wm * weight[1][j] * weight[0][i] * stretch[at + (first[1] + j) * row + first[0] + i];
                }
            }
        }
        return sum;
    }

    private static double[] weights(double t, int points) {
        double[] w = new double[points];
        for (int i = 0; i < points; i++) {
            w[i] = 1;
            for (int j = 0; j < points; j++) {
                if (j != i) {
                    w[i] *= (t - j) / (i - j);
                }
            }
        }
        return w;
    }

    /** The least, over the corners of the cell, of S there and the straight way on. */
    private double nearWall(double[] c) {
        int dimensions = c.length;
        double best = Double.POSITIVE_INFINITY;
        for (int corner = 0; corner < 1 << dimensions; corner++) {
            int node = 0;
            int stride = 1;
            double distance = 0;
            for (int k = 0; k < dimensions; k++) {
                FrontGrid.Axis a = grid.axes().get(k);
                int cell = (int) Math.max(0, Math.min(a.count() - 2, Math.floor(c[k] / a.spacing())));
                int i = cell + ((corner >> k) & 1);
                distance = Math.hypot(distance, c[k] - i * a.spacing());
                node += stride * i;
                stride *= a.count();
            }
            best = Math.min(best, opticalLength(node) + (1 + refractivity) * distance);
        }
        return best;
    }

    @Override
    public boolean equals(Object o) {
        return o instanceof Fronts f
                && grid.equals(f.grid)
                && source.equals(f.source)
                && refractivity == f.refractivity
                && Arrays.equals(stretch, f.stretch);
    }

    @Override
    public int hashCode() {
        return 31 * grid.hashCode() + Arrays.hashCode(stretch);
    }

    @Override
    public String toString() {
        return "Fronts[" + grid + " from " + source + "]";
    }
}
