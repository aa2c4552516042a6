package org.stillpath.geometry;

/**
 * A point (metres) or a direction (no unit) in right-handed Cartesian coordinates. For specs and results; hot loops work
 * on plain doubles.
 */
public record Vector(double x, double y, double z) {
    /** The origin. */
    public static final Vector ZERO = new Vector(0, 0, 0);

    /** The unit vector along +z. */
    public static final Vector Z = new Vector(0, 0, 1);

    public Vector {
        if (!(Double.isFinite(x) && Double.isFinite(y) && Double.isFinite(z))) {
            throw new IllegalArgumentException("components must be finite: " + x + ", " + y + ", " + z);
        }
    }

    /** Sum. */
    public Vector plus(Vector o) {
        return new Vector(x + o.x, y + o.y, z + o.z);
    }

    /** This vector plus {@code factor} times {@code o}. */
    public Vector plus(double factor, Vector o) {
        return new Vector(x + factor * o.x, y + factor * o.y, z + factor * o.z);
    }

    /** Difference, this less {@code o}. */
    public Vector minus(Vector o) {
        return new Vector(x - o.x, y - o.y, z - o.z);
    }

    /** This vector times a number. */
    public Vector times(double factor) {
        return new Vector(x * factor, y * factor, z * factor);
    }

    /** Scalar product. */
    public double dot(Vector o) {
        return x * o.x + y * o.y + z * o.z;
    }

    /** Vector product, this × {@code o}. */
    public Vector cross(Vector o) {
        return new Vector(y * o.z - z * o.y, z * o.x - x * o.z, x * o.y - y * o.x);
    }

    /** Length. */
    public double norm() {
        return Math.sqrt(x * x + y * y + z * z);
    }

    /**
     * The unit vector of the same direction.
     *
     * @throws IllegalArgumentException if this vector is zero
     */
    public Vector unit() {
        double n = norm();
        if (n == 0) {
            throw new IllegalArgumentException("a zero vector has no direction");
        }
        return times(1 / n);
    }

    /** Some unit vector perpendicular to this one; x̂ for a vector along z. */
    public Vector perpendicular() {
        Vector axis = Math.abs(x) <= 0.5 * norm() ? new Vector(1, 0, 0) : new Vector(0, 1, 0);
        return axis.plus(-axis.dot(this) / dot(this), this).unit();
    }
}
