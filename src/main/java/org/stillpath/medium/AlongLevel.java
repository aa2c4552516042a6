package org.stillpath.medium;

/**
 * A coordinate of the medium's frame as a level, for seams at knots.
 *
 * @param along the coordinate
 */
record AlongLevel(Along along) implements Level {
    @Override
    public double value(double x, double y, double z, double[] gradient) {
        return along.at(x, y, z, gradient);
    }

    @Override
    public String describe() {
        return along.word();
    }
}
