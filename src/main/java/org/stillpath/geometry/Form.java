package org.stillpath.geometry;

/**
 * The form of a surface in its own frame, vertex at the origin and the normal there along +z.
 *
 * <p>Given by F(x, y, z), zero on the surface and positive on the +z side of the vertex, with exact gradient and Hessian.
 */
public sealed interface Form permits Quadric, Asphere, Displaced {
    /**
     * F with its derivatives.
     *
     * @param x place in the surface's frame, metres; likewise {@code y}, {@code z}
     * @param out receives F (metres), its gradient (3) and its Hessian (xx, xy, xz, yy, yz, zz; 1/m)
     */
    void evaluate(double x, double y, double z, double[] out);

    /**
     * Whether a point where F is (nearly) zero belongs to the cap around the vertex, not to another sheet of F = 0 or to
     * its continuation beyond the edge of the sag.
     */
    boolean onCap(double x, double y, double z);

    /**
     * Where a straight line meets F = 0, ascending.
     *
     * @param x a point of the line in the surface's frame, metres; likewise {@code y}, {@code z}
     * @param dx unit direction; likewise {@code dy}, {@code dz}
     * @param reach how far from the point to look in both directions where the search is numerical, metres
     * @param out receives the distances along the line, metres
     * @return how many there are, at most {@code out.length}
     */
    int crossings(double x, double y, double z, double dx, double dy, double dz, double reach, double[] out);

    /**
     * Sag of the cap.
     *
     * @return z in metres, NaN beyond the edge of the surface
     */
    double sag(double x, double y);

    /** Whether the form closes on itself in every section with curvature, so that the whole of it can be meant. */
    boolean closed();

    /** The larger of the two vertex curvatures, 1/m; 0 for a plane. */
    double curvature();
}
