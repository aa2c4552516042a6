package org.stillpath.ray;

import org.stillpath.geometry.Vector;

/** Where a ray that met all surfaces ends. */
public sealed interface Ending {
    /**
     * At the first crossing of a plane of constant z after the last surface; the point where the search begins is not
     * counted.
     *
     * @param z metres, job's coordinates
     */
    record AtZ(double z) implements Ending {}

    /**
     * At a geometric length from the start.
     *
     * @param length metres, positive
     */
    record AtLength(double length) implements Ending {}

    /**
     * At an optical length from the start.
     *
     * @param opticalLength metres, positive
     */
    record AtOpticalLength(double opticalLength) implements Ending {}

    /** At the last surface, before that surface acts. */
    record AtLastSurface() implements Ending {}

    /** Directly behind the last surface, after it has acted. */
    record BehindLastSurface() implements Ending {}

    /**
     * Behind the last surface, where the distance to a point is at a minimum. After one minimum a ray is followed for two
     * lengths of the scene to the place where the distance turns again, and so on.
     *
     * @param to the point, metres, job's coordinates
     * @param which the how-manieth minimum along the ray, from 1
     */
    record Nearest(Vector to, int which) implements Ending {
        public Nearest {
            if (which < 1) {
                throw new IllegalArgumentException("which must be at least 1: " + which);
            }
        }
    }
}
