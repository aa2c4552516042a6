package org.stillpath.geometry;

/** How far a surface has moved along the +z of its own frame, as a smooth function of place. */
@FunctionalInterface
public interface Displacement {
    /**
     * The displacement with its derivatives.
     *
     * @param x place in the surface's frame, metres; likewise {@code y}, {@code z}
     * @param out receives the displacement (metres), its gradient (3) and its Hessian (xx, xy, xz, yy, yz, zz; 1/m)
     */
    void evaluate(double x, double y, double z, double[] out);
}
