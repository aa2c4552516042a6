package org.stillpath.ray;

/**
 * Layout of the state of a ray in a {@code double[]}: place q (metres), momentum p = n·(unit tangent), excess ∫(n − 1) ds and
 * length ∫ ds (metres), then for each Jacobi column δq (metres) and δp. Plain arrays, since integrators work on them.
 */
public final class State {
    /** Index of the first coordinate of q. */
    public static final int Q = 0;
    /** Index of the first component of p. */
    public static final int P = 3;
    /** Index of the excess S − L. */
    public static final int EXCESS = 6;
    /** Index of the length L. */
    public static final int LENGTH = 7;
    /** Index of the first Jacobi column. */
    public static final int COLUMNS = 8;
    /** Numbers a column: δq and δp. */
    public static final int COLUMN = 6;
    /** Jacobi columns of a full ray-transfer: δx, δy, δpx, δpy at the start plane. */
    public static final int TRANSFER_COLUMNS = 4;

    private State() {}

    /** Length of the array for so many columns. */
    public static int size(int columns) {
        return COLUMNS + COLUMN * columns;
    }

    /** Number of columns in a state. */
    public static int columns(double[] y) {
        return (y.length - COLUMNS) / COLUMN;
    }

    /** Optical length S from the start, metres. */
    public static double opticalLength(double[] y) {
        return y[EXCESS] + y[LENGTH];
    }
}
