package org.stillpath.path;

import java.util.Arrays;

/**
 * One image of a target over an earth: a ray from the eye to it, in the vertical plane of the sight. Elevations are from each
 * end's own horizontal; the arrival's is that of the light on its way from the eye to the target.
 *
 * @param launch elevation at the eye, rad
 * @param arrival elevation at the target, rad
 * @param opticalLength ∫ n ds, metres
 * @param excess optical length less the chord, metres
 * @param length metres
 * @param lowest least clearance over the ground, metres
 * @param lowestAt distance along the datum where that is, metres
 * @param slope d(height at the target's vertical)/d(launch elevation), m/rad; negative for an inverted image
 * @param conjugates number of points on the way that are conjugate to the eye in the vertical plane
 * @param degenerate whether the target lies on a caustic, so that neighbours meet it too to first order
 * @param residual miss at the target's vertical, metres
 * @param points places passed: distance along the datum and height, metres, in pairs
 * @param secondMethod height at the target's vertical by this ray's launch less that by Bouguer's integral for the same launch,
 *     metres; NaN where the air depends on more than the height
 * @param errors estimated errors
 */
public record Sighting(
        double launch,
        double arrival,
        double opticalLength,
        double excess,
        double length,
        double lowest,
        double lowestAt,
        double slope,
        int conjugates,
        boolean degenerate,
        double residual,
        double[] points,
        double secondMethod,
        Errors errors) {

    /**
     * Estimated numerical errors.
     *
     * @param launch rad
     * @param arrival rad
     * @param opticalLength metres; that of the excess too
     * @param length metres
     * @param lowest metres
     * @param lowestAt metres
     * @param slope relative
     */
    public record Errors(
            double launch,
            double arrival,
            double opticalLength,
            double length,
            double lowest,
            double lowestAt,
            double slope) {}

    public Sighting {
        points = points.clone();
    }

    /** A copy. */
    @Override
    public double[] points() {
        return points.clone();
    }

    /** What the optical length is among neighbouring paths in the vertical plane. */
    public StationaryPath.Kind kind() {
        if (degenerate) {
            return StationaryPath.Kind.DEGENERATE;
        }
        return conjugates == 0 ? StationaryPath.Kind.MINIMUM : StationaryPath.Kind.SADDLE;
    }

    @Override
    public boolean equals(Object o) {
        return o instanceof Sighting s
                && launch == s.launch
                && arrival == s.arrival
                && opticalLength == s.opticalLength
                && Arrays.equals(points, s.points);
    }

    @Override
    public int hashCode() {
        return Double.hashCode(launch) + 31 * Double.hashCode(arrival);
    }
}
