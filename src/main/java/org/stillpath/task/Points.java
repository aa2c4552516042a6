package org.stillpath.task;

import java.util.Arrays;

/**
 * Places of a line, a shape or a series of a figure, in SI; equal where all their numbers are.
 *
 * @param x to the right
 * @param y upward
 */
public record Points(double[] x, double[] y) {
    public Points {
        x = x.clone();
        y = y.clone();
    }

    /** Values to the right (a copy). */
    @Override
    public double[] x() {
        return x.clone();
    }

    /** Values upward (a copy). */
    @Override
    public double[] y() {
        return y.clone();
    }

    /** Number of values to the right. */
    int across() {
        return x.length;
    }

    /** Number of values upward. */
    int up() {
        return y.length;
    }

    @Override
    public boolean equals(Object o) {
        return o instanceof Points p && Arrays.equals(x, p.x) && Arrays.equals(y, p.y);
    }

    @Override
    public int hashCode() {
        return 31 * Arrays.hashCode(x) + Arrays.hashCode(y);
    }
}
