package org.stillpath.path;

import org.stillpath.geometry.Vector;
import org.stillpath.ray.Columns;
import org.stillpath.ray.State;
import org.stillpath.ray.Traced;

/**
 * A ray where it passes its target: the place there less the target, which is across the ray, and its exact derivative over the
 * launch direction. Both are smooth vectors of space as long as the passage exists, whatever the ray's own axes do.
 *
 * @param direction unit vector of the launch
 * @param which the how-manieth passage, from 1
 * @param off place less target, metres
 * @param byFirst derivative of {@code off} over the turn of the launch toward the first of its two axes, m/rad
 * @param bySecond the same for the second
 * @param axes the two unit vectors across the launch
 * @param arrival unit direction at the passage
 * @param across the two unit vectors across the arrival
 * @param length geometric length of the ray, metres
 */
record Passage(
        Vector direction,
        int which,
        Vector off,
        Vector byFirst,
        Vector bySecond,
        Vector[] axes,
        Vector arrival,
        Vector[] across,
        double length) {

    /** The passage at which a traced ray with columns across it has ended. */
    static Passage of(Vector direction, int which, Traced ray, Vector target, Columns columns) {
        double[] y = ray.state();
        double[] first = ray.start();
        double[] f = ray.force();
        double n = Math.sqrt(first[3] * first[3] + first[4] * first[4] + first[5] * first[5]);
        Vector p = new Vector(y[3], y[4], y[5]);
        Vector force = new Vector(f[0], f[1], f[2]);
        Vector off = ray.position().minus(target);
        double along = p.dot(p) + off.dot(force);
        Vector[] by = new Vector[2];
        for (int c = 0; c < 2; c++) {
            int at = State.COLUMNS + State.COLUMN * (State.columns(y) - 2 + c);
            Vector q = new Vector(y[at], y[at + 1], y[at + 2]);
            Vector m = new Vector(y[at + 3], y[at + 4], y[at + 5]);
            // how much later the neighbour is nearest
            double later = -(q.dot(p) + off.dot(m)) / along;
            by[c] = q.plus(later, p).times(n);
        }
        Vector[] start = vectors(columns.axes(first[3], first[4], first[5]));
        Vector[] end = vectors(columns.axes(y[3], y[4], y[5]));
        return new Passage(direction, which, off, by[0], by[1], start, p.unit(), end, ray.length());
    }

    private static Vector[] vectors(double[][] axes) {
        return new Vector[] {
            new Vector(axes[0][0], axes[0][1], axes[0][2]), new Vector(axes[1][0], axes[1][1], axes[1][2])
        };
    }

    /** What it misses the target by, metres. */
    double miss() {
        return off.norm();
    }

    /** By how much the miss changes, to first order, for a turn of the launch by a small vector across it. */
    Vector change(Vector turn) {
        return byFirst.times(turn.dot(axes[0])).plus(turn.dot(axes[1]), bySecond);
    }

    /** The derivative of the miss across the arrival over the launch's two axes, by rows. */
    double[] slope() {
        return new double[] {
            across[0].dot(byFirst), across[0].dot(bySecond), across[1].dot(byFirst), across[1].dot(bySecond)
        };
    }

    /** Determinant of the map from launch directions to the plane across the arrival, m²/rad²: its sign is the image's parity. */
    double determinant() {
        double[] m = slope();
        return m[0] * m[3] - m[1] * m[2];
    }

    /** Singular values of {@link #slope}, the smaller first, m/rad. */
    double[] singular() {
        double[] m = slope();
        double sum = m[0] * m[0] + m[1] * m[1] + m[2] * m[2] + m[3] * m[3];
        double det = Math.abs(m[0] * m[3] - m[1] * m[2]);
        double large = Math.sqrt(0.5 * (sum + Math.sqrt(Math.max(0, (sum - 2 * det) * (sum + 2 * det)))));
        return new double[] {large == 0 ? 0 : det / large, large};
    }

    /**
     * The turn of the launch that takes the miss away, to first order: the least where there are many, and the best in the
     * least squares where there is none.
     */
    Vector turn() {
        double[] m = slope();
        double[] e = {across[0].dot(off), across[1].dot(off)};
        double[] sizes = singular();
        if (sizes[1] == 0) {
            return Vector.ZERO;
        }
        double first;
        double second;
        if (sizes[0] > 1e-9 * sizes[1]) {
            double det = m[0] * m[3] - m[1] * m[2];
            first = -(m[3] * e[0] - m[1] * e[1]) / det;
            second = -(m[0] * e[1] - m[2] * e[0]) / det;
        } else {
            // of rank one: M⁺ = Mᵀ/|M|²
            double square = sizes[1] * sizes[1];
            first = -(m[0] * e[0] + m[2] * e[1]) / square;
            second = -(m[1] * e[0] + m[3] * e[1]) / square;
        }
        return axes[0].times(first).plus(second, axes[1]);
    }

    /** The turn within the plane that the first axis and the launch span. */
    Vector turnInPlane(Vector side) {
        Vector change = change(side);
        double square = change.dot(change);
        return square == 0 ? Vector.ZERO : side.times(-change.dot(off) / square);
    }
}
