package org.stillpath.ray;

import org.stillpath.geometry.Vector;

/**
 * Where a ray starts.
 *
 * @param position metres, job's coordinates
 * @param direction unit vector
 * @param parallel whether the ray belongs to a parallel beam; otherwise it comes from a point source at {@code position}.
 *     Only an ideal thin lens asks, since the optical length through it depends on where the object is
 */
public record RayStart(Vector position, Vector direction, boolean parallel) {
    public RayStart {
        if (Math.abs(direction.norm() - 1) > 1e-12) {
            throw new IllegalArgumentException("direction must be a unit vector: " + direction);
        }
    }

    /** A ray of a point source. */
    public static RayStart of(Vector position, Vector direction) {
        return new RayStart(position, direction.unit(), false);
    }
}
