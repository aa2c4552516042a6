package org.stillpath.path;

import org.stillpath.geometry.Vector;

/**
 * A stationary optical path between two points, in SI and the job's coordinates.
 *
 * @param opticalLength ∫ n ds, metres
 * @param length metres
 * @param launch unit direction at the start
 * @param arrival unit direction at the target
 * @param kind for the optical length among all nearby paths
 * @param morseIndex number of independent ways of bending the path that shorten it (in its plane alone, where the search was
 *     confined to one)
 * @param reducedIndex the same number, counted by the inertia of the reduced second variation instead of conjugate points;
 *     the same where it cannot be counted so, behind an ideal thin lens
 * @param nullDirections number of independent ways of bending it that leave it equally long to second order: 0 unless it is
 *     degenerate
 * @param conjugates geometric lengths from the start to the points conjugate to it before the target, metres
 * @param overInterfaces the same question asked of the meeting points with surfaces alone; {@link Kind#NONE} where the path
 *     meets none, or an ideal thin lens
 * @param residual distance at which it misses the target, metres
 * @param points places passed, x, y, z triples, metres
 * @param errors estimated errors of optical length, length (metres) and of the directions (rad)
 */
public record StationaryPath(
        double opticalLength,
        double length,
        Vector launch,
        Vector arrival,
        Kind kind,
        int morseIndex,
        int reducedIndex,
        int nullDirections,
        double[] conjugates,
        Kind overInterfaces,
        double residual,
        double[] points,
        double[] errors) {

    /** What a stationary path is among its neighbours. */
    public enum Kind {
        /** No neighbour is shorter. */
        MINIMUM,
        /** Some are shorter, some longer. */
        SADDLE,
        /** None is longer; for meeting points with surfaces only. */
        MAXIMUM,
        /** Some are equally long to second order: the target is an image of the start, or on a caustic. */
        DEGENERATE,
        /** The question does not arise, or is not answered. */
        NONE;

        /** Its word in a result. */
        public String word() {
            return name().toLowerCase(java.util.Locale.ROOT);
        }
    }

    public StationaryPath {
        conjugates = conjugates.clone();
        points = points.clone();
        errors = errors.clone();
    }

    /** A copy. */
    @Override
    public double[] conjugates() {
        return conjugates.clone();
    }

    /** A copy. */
    @Override
    public double[] points() {
        return points.clone();
    }

    /** A copy. */
    @Override
    public double[] errors() {
        return errors.clone();
    }

    @Override
    public boolean equals(Object o) {
        return o instanceof StationaryPath p
                && opticalLength == p.opticalLength
                && launch.equals(p.launch)
                && arrival.equals(p.arrival)
                && kind == p.kind
                && morseIndex == p.morseIndex;
    }

    @Override
    public int hashCode() {
        return Double.hashCode(opticalLength) + 31 * launch.hashCode();
    }
}
