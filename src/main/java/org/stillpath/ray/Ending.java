package org.stillpath.ray;

import org.stillpath.geometry.Vector;
import org.stillpath.medium.EarthChart;

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

    /**
     * At the first crossing of an earth radius: the plane through the earth's centre, or the upright plane of a flat earth,
     * that stands at a distance along the datum, across the sight.
     *
     * @param chart the earth
     * @param distance metres along the datum, positive
     */
    record AtVertical(EarthChart chart, double distance) implements Ending {
        public AtVertical {
            if (!(distance > 0 && distance < 1.5 * chart.radius())) {
                throw new IllegalArgumentException(
                        "distance must be above 0 and below a quarter of the earth's girth: " + distance);
            }
        }
    }

    /**
     * Where the clearance over the ground is least for the first time; a ray that comes no nearer to the ground after its
     * start is lost.
     *
     * @param chart the earth and its ground
     * @param scale about how far away that is, metres: what steps are judged against
     */
    record AtLowest(EarthChart chart, double scale) implements Ending {
        public AtLowest {
            if (!(scale > 0)) {
                throw new IllegalArgumentException("scale must be positive: " + scale);
            }
        }
    }
}
