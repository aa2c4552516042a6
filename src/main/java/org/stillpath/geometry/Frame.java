package org.stillpath.geometry;

/**
 * A right-handed Cartesian frame in the job's coordinates.
 *
 * @param origin origin, in metres of the job's coordinates
 * @param ex unit vector along the frame's x; {@code ey} and {@code ez} likewise, mutually perpendicular
 */
public record Frame(Vector origin, Vector ex, Vector ey, Vector ez) {
    /** The job's own coordinates. */
    public static final Frame JOB = new Frame(Vector.ZERO, new Vector(1, 0, 0), new Vector(0, 1, 0), Vector.Z);

    private static final double TOLERANCE = 1e-12;

    public Frame {
        boolean good = Math.abs(ex.norm() - 1) < TOLERANCE
                && Math.abs(ey.norm() - 1) < TOLERANCE
                && ex.cross(ey).minus(ez).norm() < TOLERANCE
                && Math.abs(ex.dot(ey)) < TOLERANCE;
        if (!good) {
            throw new IllegalArgumentException(
                    "axes must be orthonormal and right-handed: " + ex + ", " + ey + ", " + ez);
        }
    }

    /** The job's axes at another origin. */
    public static Frame at(Vector origin) {
        return new Frame(origin, JOB.ex, JOB.ey, JOB.ez);
    }

    /**
     * A frame whose z runs along {@code axis}: the job's axes turned by the smallest rotation that takes +z there (about
     * x for an axis along -z).
     */
    public static Frame along(Vector origin, Vector axis) {
        Vector w = axis.unit();
        Vector v = Vector.Z.cross(w);
        double c = w.z();
        if (v.norm() == 0) {
            return c > 0 ? at(origin) : new Frame(origin, JOB.ex, JOB.ey.times(-1), JOB.ez.times(-1));
        }
        // Rodrigues: R a = a + v × a + v × (v × a) / (1 + c), and 1/(1 + c) = (1 - c)/|v|² where c is near -1
        double f = c > -0.5 ? 1 / (1 + c) : (1 - c) / v.dot(v);
        return new Frame(origin, turned(JOB.ex, v, f), turned(JOB.ey, v, f), w);
    }

    /**
     * A frame at {@code origin} turned by Rx(ax)·Ry(ay), right-handed: about x, then about the turned y.
     *
     * @param ax turn about x in radians
     * @param ay turn about the turned y in radians
     */
    public static Frame tilted(Vector origin, double ax, double ay) {
        double cx = Math.cos(ax);
        double sx = Math.sin(ax);
        double cy = Math.cos(ay);
        double sy = Math.sin(ay);
        return new Frame(
                origin, new Vector(cy, sx * sy, -cx * sy), new Vector(0, cx, sx), new Vector(sy, -sx * cy, cx * cy));
    }

    /** Whether the axes are the job's own, so that only the origin differs. */
    public boolean isShiftOnly() {
        return ex.equals(JOB.ex) && ey.equals(JOB.ey) && ez.equals(JOB.ez);
    }

    /** A point of this frame in the job's coordinates. */
    public Vector toJob(Vector p) {
        return origin.plus(directionToJob(p));
    }

    /** A direction of this frame in the job's coordinates. */
    public Vector directionToJob(Vector d) {
        return ex.times(d.x()).plus(d.y(), ey).plus(d.z(), ez);
    }

    /** A point of the job's coordinates in this frame. */
    public Vector fromJob(Vector p) {
        return directionFromJob(p.minus(origin));
    }

    /** A direction of the job's coordinates in this frame. */
    public Vector directionFromJob(Vector d) {
        return new Vector(d.dot(ex), d.dot(ey), d.dot(ez));
    }

    private static Vector turned(Vector a, Vector v, double f) {
        Vector va = v.cross(a);
        return a.plus(va).plus(f, v.cross(va));
    }
}
