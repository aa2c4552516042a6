package org.stillpath.medium;

import java.util.Arrays;

/**
 * A family of surfaces on which a field or one of its derivatives jumps: the places where {@code coordinate} equals one
 * of the {@code knots}. A profile has one seam with all its knots; a grid has three; |u| in a formula has u with the
 * knot 0.
 *
 * @param coordinate smooth function of place
 * @param knots values of the coordinate, ascending, at least one
 */
public record Seam(Level coordinate, double[] knots) {
    public Seam {
        if (knots.length == 0) {
            throw new IllegalArgumentException("a seam needs at least one knot");
        }
        knots = knots.clone();
        for (int i = 1; i < knots.length; i++) {
            if (!(knots[i] > knots[i - 1])) {
                throw new IllegalArgumentException(
                        "knots must ascend: " + knots[i - 1] + " is followed by " + knots[i]);
            }
        }
    }

    /** The knots, ascending (a copy). */
    @Override
    public double[] knots() {
        return knots.clone();
    }

    /** Number of knots. */
    public int count() {
        return knots.length;
    }

    /** Knot {@code i}, counted from 0. */
    public double knot(int i) {
        return knots[i];
    }

    /** Number of knots below or at {@code u}: the index of the cell that holds it, 0 before the first knot. */
    public int cell(double u) {
        int i = Arrays.binarySearch(knots, u);
        return i >= 0 ? i + 1 : -i - 1;
    }

    @Override
    public boolean equals(Object o) {
        return o instanceof Seam s && s.coordinate.equals(coordinate) && Arrays.equals(s.knots, knots);
    }

    @Override
    public int hashCode() {
        return 31 * coordinate.hashCode() + Arrays.hashCode(knots);
    }

    @Override
    public String toString() {
        return "Seam[" + coordinate.describe() + " at " + Arrays.toString(knots) + "]";
    }
}
