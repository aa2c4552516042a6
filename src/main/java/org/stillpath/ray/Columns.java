package org.stillpath.ray;

import org.stillpath.geometry.Vector;

/**
 * How a ray's Jacobi columns start: two unit places, two unit momenta.
 *
 * @param acrossRay whether across the ray; otherwise on the plane of constant z, as the ray-transfer matrix needs them
 * @param places whether all four are carried; otherwise the momenta alone, at two thirds of the cost
 * @param conjugates whether points conjugate to the start are located
 * @param normal normal of a plane of symmetry that the ray stays in: the first of each two columns lies in it, and conjugate
 *     points count for directions in it alone; zero where there is none
 */
public record Columns(boolean acrossRay, boolean places, boolean conjugates, Vector normal) {
    /** Those of the ray-transfer matrix between planes of constant z. */
    public static final Columns PLANES = new Columns(false, true, false, Vector.ZERO);

    /** Across the ray, the momenta alone: what rays that leave a point in other directions do. */
    public static final Columns RAY = new Columns(true, false, false, Vector.ZERO);

    /** Across the ray, all four. */
    public static final Columns ACROSS = new Columns(true, true, false, Vector.ZERO);

    public Columns {
        if (!acrossRay && !places) {
            throw new IllegalArgumentException("columns on planes are all four");
        }
        if (conjugates && !acrossRay) {
            throw new IllegalArgumentException("conjugate points need columns across the ray");
        }
    }

    /** The same with conjugate points. */
    public Columns withConjugates() {
        return new Columns(acrossRay, places, true, normal);
    }

    /** The same in a plane of symmetry. */
    public Columns in(Vector planeNormal) {
        return new Columns(acrossRay, places, conjugates, planeNormal.unit());
    }

    /** Number of columns carried. */
    int count() {
        return places ? State.TRANSFER_COLUMNS : State.TRANSFER_COLUMNS / 2;
    }

    /** Whether a plane of symmetry is given. */
    boolean planar() {
        return normal.x() != 0 || normal.y() != 0 || normal.z() != 0;
    }

    /** Two unit vectors across a momentum and each other, the first in the plane of symmetry where one is given. */
    public double[][] axes(double px, double py, double pz) {
        if (planar()) {
            Vector a = normal.cross(new Vector(px, py, pz)).unit();
            return new double[][] {{a.x(), a.y(), a.z()}, {normal.x(), normal.y(), normal.z()}};
        }
        double n = Math.sqrt(px * px + py * py + pz * pz);
        double x = px / n;
        double y = py / n;
        double z = pz / n;
        // after Duff et al., J. Computer Graphics Techniques 6 (2017) 1: no branch but the sign
        double sign = Math.copySign(1, z);
        double a = -1 / (sign + z);
        double b = x * y * a;
        return new double[][] {{1 + sign * x * x * a, sign * b, -sign * x}, {b, sign + y * y * a, -y}};
    }
}
