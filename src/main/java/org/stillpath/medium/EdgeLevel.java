package org.stillpath.medium;

/**
 * Margin of one edge of a table: the distance from the edge, positive inside.
 *
 * @param along the table's coordinate
 * @param edge its value at the edge, metres
 * @param upper whether the table lies below the edge
 */
record EdgeLevel(Along along, double edge, boolean upper) implements Level {
    @Override
    public double value(double x, double y, double z, double[] gradient) {
        double u = along.at(x, y, z, gradient);
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
        return along.word() + (upper ? " < " : " > ") + Told.length(edge) + ", the edge of the table";
    }
}
