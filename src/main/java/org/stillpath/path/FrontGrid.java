package org.stillpath.path;

import java.util.ArrayList;
import java.util.List;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;

/**
 * A regular grid of nodes in a plane (two axes) or in space (three), metres and the job's coordinates.
 *
 * <p>Each axis has its own spacing: a sight of a kilometre needs metres along and millimetres across. The solver's error goes
 * with each spacing squared, times the curvature of the medium along that axis.
 *
 * @param origin the node that comes first on every axis
 * @param axes two or three, orthonormal
 */
public record FrontGrid(Vector origin, List<Axis> axes) {
    /** Most nodes a grid may have: the solver needs 41 bytes a node, so 0.7 GB. */
    public static final int MOST_NODES = 1 << 24;

    private static final double TOLERANCE = 1e-12;

    /**
     * One axis of a grid.
     *
     * @param direction unit vector
     * @param spacing distance of neighbouring nodes in metres, above 0
     * @param count number of nodes, at least 3
     */
    public record Axis(Vector direction, double spacing, int count) {
        public Axis {
            if (!(Math.abs(direction.norm() - 1) < TOLERANCE)) {
                throw new IllegalArgumentException("direction must be a unit vector: " + direction);
            }
            if (!(spacing > 0 && Double.isFinite(spacing))) {
                throw new IllegalArgumentException("spacing must be above 0: " + spacing);
            }
            if (count < 3) {
                throw new IllegalArgumentException("count must be at least 3: " + count);
            }
        }

        /** Length from the first node to the last, metres. */
        public double length() {
            return spacing * (count - 1);
        }
    }

    public FrontGrid {
        axes = List.copyOf(axes);
        if (axes.size() != 2 && axes.size() != 3) {
            throw new IllegalArgumentException("axes must be two or three: " + axes.size());
        }
        double nodes = 1;
        StringBuilder counts = new StringBuilder();
        for (int i = 0; i < axes.size(); i++) {
            nodes *= axes.get(i).count();
            counts.append(i == 0 ? "" : " x ").append(axes.get(i).count());
            for (int j = 0; j < i; j++) {
                if (!(Math.abs(axes.get(i).direction().dot(axes.get(j).direction())) < TOLERANCE)) {
                    throw new IllegalArgumentException("axes must be perpendicular: "
                            + axes.get(j).direction() + ", " + axes.get(i).direction());
                }
            }
        }
        if (nodes > MOST_NODES) {
            throw new IllegalArgumentException(
                    "counts must make at most " + MOST_NODES + " nodes: " + counts + "; maybe take a wider spacing");
        }
    }

    /**
     * The rectangle in which the least path between two points should be looked for, in the plane of the two points in which
     * the index changes most; the job's z decides where it does not change across them.
     *
     * <p>The least path has S ≤ S of the straight line, so it lies in the ellipse |q − from| + |q − to| ≤ S/n with the least n
     * in it (as long as the medium is not thinner outside). The rectangle holds that ellipse, cut at the field's {@code limits()}
     * and where it is undefined; where the straight line is blocked it reaches as far as the points are apart. Both points are
     * nodes, of the grids with twice and four times the spacing too.
     *
     * @param cells number of cells between the two points, and across: a multiple of 4, at least 16
     */
    public static FrontGrid planeAround(IndexField field, Vector from, Vector to, int cells) {
        return new Surroundings(field, from, to).grid(2, cells);
    }

    /**
     * The same in a plane of one's own choice.
     *
     * @param across with the two points spans the plane
     */
    public static FrontGrid planeAround(IndexField field, Vector from, Vector to, Vector across, int cells) {
        return new Surroundings(field, from, to, across).grid(2, cells);
    }

    /** The box in which the least path between two points should be looked for, chosen like {@link #planeAround}. */
    public static FrontGrid boxAround(IndexField field, Vector from, Vector to, int cells) {
        return new Surroundings(field, from, to).grid(3, cells);
    }

    /** Number of nodes. */
    public int size() {
        int n = 1;
        for (Axis a : axes) {
            n *= a.count();
        }
        return n;
    }

    /** The place of a node, counted with the first axis fastest. */
    public Vector node(int index) {
        Vector p = origin;
        int rest = index;
        for (Axis a : axes) {
            p = p.plus(a.spacing() * (rest % a.count()), a.direction());
            rest /= a.count();
        }
        return p;
    }

    /** Coordinates of a point along the axes, metres from the origin. */
    public double[] coordinates(Vector point) {
        Vector p = point.minus(origin);
        return axes.stream().mapToDouble(a -> a.direction().dot(p)).toArray();
    }

    /** The same region with every second node. */
    FrontGrid coarser() {
        List<Axis> list = new ArrayList<>();
        for (Axis a : axes) {
            list.add(new Axis(a.direction(), 2 * a.spacing(), (a.count() - 1) / 2 + 1));
        }
        return new FrontGrid(origin, list);
    }

    /** Coordinates of a point that must lie in the grid, to rounding. */
    double[] coordinatesInside(Vector point, String name) {
        double[] c = coordinates(point);
        Vector foot = origin;
        double length = 0;
        for (int k = 0; k < c.length; k++) {
            Axis a = axes.get(k);
            double slack = 1e-9 * a.length();
            if (!(c[k] >= -slack && c[k] <= a.length() + slack)) {
                throw new IllegalArgumentException(name + " must lie in the grid, from 0 m to " + a.length()
                        + " m along axis " + k + ": " + c[k] + " m, at " + point);
            }
            foot = foot.plus(c[k], a.direction());
            length = Math.max(length, a.length());
        }
        double off = point.minus(foot).norm();
        if (!(off <= 1e-9 * length)) {
            throw new IllegalArgumentException(name + " must lie in the grid's plane: it is " + off + " m off it");
        }
        return c;
    }
}
