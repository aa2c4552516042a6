package org.stillpath.task;

import org.stillpath.geometry.Vector;
import org.stillpath.unit.Display;

/**
 * A point of an object, before a train or at infinity.
 *
 * @param distance before the first vertex, metres; infinite for a collimated beam
 * @param x of the point, metres; of a beam the tangent of its angle toward +x; {@code y} likewise
 */
record FieldPoint(double distance, double x, double y) {
    /** The point on the axis at infinity. */
    static final FieldPoint INFINITY = new FieldPoint(Double.POSITIVE_INFINITY, 0, 0);

    boolean atInfinity() {
        return Double.isInfinite(distance);
    }

    boolean onAxis() {
        return x == 0 && y == 0;
    }

    /** The point on the axis as far away. */
    FieldPoint axis() {
        return new FieldPoint(distance, 0, 0);
    }

    /** The same with another place across. */
    FieldPoint at(double otherX) {
        return new FieldPoint(distance, otherX, y);
    }

    /** Direction of the beam of a point at infinity. */
    Vector direction() {
        return new Vector(x, y, 1).unit();
    }

    /** Angle or height for people. */
    String label() {
        if (onAxis()) {
            return "on the axis";
        }
        return (atInfinity() ? Display.in(Math.atan(y), "deg", 0) : Display.of(y, "m", 0)).toString();
    }
}
