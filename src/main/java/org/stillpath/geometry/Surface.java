package org.stillpath.geometry;

/**
 * A surface placed in the job's coordinates.
 *
 * @param frame its own frame: origin at the vertex, z along the normal there
 * @param form its form in that frame
 * @param whole whether all of a closed form is meant, or only the cap around the vertex
 * @param aperture semi-diameter, metres, measured from the surface's own axis; infinite where there is none
 */
public record Surface(Frame frame, Form form, boolean whole, double aperture) {

    public Surface {
        if (!(aperture > 0)) {
            throw new IllegalArgumentException("aperture must be positive: " + aperture);
        }
        if (whole && !form.closed()) {
            throw new IllegalArgumentException("only a closed form can be meant as a whole: " + form);
        }
    }

    /** A plane across z at the given height, without an aperture. */
    public static Surface plane(double z) {
        return new Surface(Frame.at(new Vector(0, 0, z)), Quadric.PLANE, false, Double.POSITIVE_INFINITY);
    }

    /** A conicoid cap of revolution about z with its vertex at the given z, without an aperture. */
    public static Surface cap(double z, double radius, double conic) {
        double c = 1 / radius;
        return new Surface(
                Frame.at(new Vector(0, 0, z)), new Quadric(c, c, (1 + conic) * c), false, Double.POSITIVE_INFINITY);
    }

    /** This surface with another aperture. */
    public Surface withAperture(double semiDiameter) {
        return new Surface(frame, form, whole, semiDiameter);
    }

    /** The vertex, metres in the job's coordinates. */
    public Vector vertex() {
        return frame.origin();
    }

    /**
     * F with its derivatives at a point of the job's coordinates.
     *
     * @param out receives F, its gradient (3) and its Hessian (6), all in the job's coordinates
     */
    public void evaluate(double x, double y, double z, double[] out) {
        Vector o = frame.origin();
        double ux = x - o.x();
        double uy = y - o.y();
        double uz = z - o.z();
        if (frame.isShiftOnly()) {
            form.evaluate(ux, uy, uz, out);
            return;
        }
        Vector a = frame.ex();
        Vector b = frame.ey();
        Vector c = frame.ez();
        form.evaluate(
                ux * a.x() + uy * a.y() + uz * a.z(),
                ux * b.x() + uy * b.y() + uz * b.z(),
                ux * c.x() + uy * c.y() + uz * c.z(),
                out);
        double g1 = out[1];
        double g2 = out[2];
        double g3 = out[3];
        out[1] = g1 * a.x() + g2 * b.x() + g3 * c.x();
        out[2] = g1 * a.y() + g2 * b.y() + g3 * c.y();
        out[3] = g1 * a.z() + g2 * b.z() + g3 * c.z();
        double hxx = out[4];
        double hxy = out[5];
        double hxz = out[6];
        double hyy = out[7];
        double hyz = out[8];
        double hzz = out[9];
        out[4] = form(a.x(), b.x(), c.x(), a.x(), b.x(), c.x(), hxx, hxy, hxz, hyy, hyz, hzz);
        out[5] = form(a.x(), b.x(), c.x(), a.y(), b.y(), c.y(), hxx, hxy, hxz, hyy, hyz, hzz);
        out[6] = form(a.x(), b.x(), c.x(), a.z(), b.z(), c.z(), hxx, hxy, hxz, hyy, hyz, hzz);
        out[7] = form(a.y(), b.y(), c.y(), a.y(), b.y(), c.y(), hxx, hxy, hxz, hyy, hyz, hzz);
        out[8] = form(a.y(), b.y(), c.y(), a.z(), b.z(), c.z(), hxx, hxy, hxz, hyy, hyz, hzz);
        out[9] = form(a.z(), b.z(), c.z(), a.z(), b.z(), c.z(), hxx, hxy, hxz, hyy, hyz, hzz);
    }

    /** Whether a point where F vanishes belongs to the surface: its cap, or all of it. Apertures are not asked. */
    public boolean holds(double x, double y, double z) {
        if (whole) {
            return true;
        }
        Vector p = frame.fromJob(new Vector(x, y, z));
        return form.onCap(p.x(), p.y(), p.z());
    }

    /** Distance of a point from the surface's own axis, metres. */
    public double distanceFromAxis(double x, double y, double z) {
        Vector p = frame.fromJob(new Vector(x, y, z));
        return Math.hypot(p.x(), p.y());
    }

    /**
     * Where a straight line meets the surface.
     *
     * @param from a point of the line, metres, job's coordinates
     * @param direction unit direction
     * @param least smallest distance along the line that counts, metres
     * @param reach how far to look where the search is numerical, metres
     * @return the first distance of at least {@code least}, NaN if there is none
     */
    public double firstCrossing(Vector from, Vector direction, double least, double reach) {
        Vector p = frame.fromJob(from);
        Vector d = frame.directionFromJob(direction);
        double[] s = new double[8];
        int count = form.crossings(p.x(), p.y(), p.z(), d.x(), d.y(), d.z(), reach, s);
        for (int i = 0; i < count; i++) {
            if (s[i] >= least
                    && (whole || form.onCap(p.x() + s[i] * d.x(), p.y() + s[i] * d.y(), p.z() + s[i] * d.z()))) {
                return s[i];
            }
        }
        return Double.NaN;
    }

    private static double form(
            double u1,
            double u2,
            double u3,
            double v1,
            double v2,
            double v3,
            double hxx,
            double hxy,
            double hxz,
            double hyy,
            double hyz,
            double hzz) {
        return u1 * (hxx * v1 + hxy * v2 + hxz * v3)
                + u2 * (hxy * v1 + hyy * v2 + hyz * v3)
                + u3 * (hxz * v1 + hyz * v2 + hzz * v3);
    }
}
