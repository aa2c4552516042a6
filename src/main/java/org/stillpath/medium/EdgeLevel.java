package org.stillpath.medium;

/**
 * Margin of one edge of a range: the distance from the edge, positive inside.
 *
 * @param coordinate the coordinate that ends, metres
 * @param edge its value at the edge, metres
 * @param upper whether the range lies below the edge
 * @param what what ends there, such as {@code the table}
 */
record EdgeLevel(Level coordinate, double edge, boolean upper, String what) implements Level {
    /** The edge of a table. */
    EdgeLevel(Level coordinate, double edge, boolean upper) {
        this(coordinate, edge, upper, "the table");
    }

    @Override
    public double value(double x, double y, double z, double[] gradient) {
        double u = coordinate.value(x, y, z, gradient);
        if (!upper) {
            return u - edge;
        }
        gradient[0] = 0 - gradient[0];
        gradient[1] = 0 - gradient[1];
        gradient[2] = 0 - gradient[2];
        return edge - u;
    }

    @Override
    public String describe() {
        return coordinate.describe() + (upper ? " < " : " > ") + Told.length(edge) + ", the edge of " + what;
    }
}
