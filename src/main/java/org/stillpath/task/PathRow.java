package org.stillpath.task;

import java.util.Arrays;
import java.util.Map;
import org.stillpath.geometry.Vector;

/**
 * One stationary path as a result states it, in SI and the job's coordinates.
 *
 * @param opticalLength ∫ n ds, metres
 * @param excess optical length less that of the first path, metres
 * @param length metres
 * @param travelTime optical length over the speed of light, seconds
 * @param launch unit direction at the start
 * @param arrival unit direction at the target
 * @param kind minimum, saddle or degenerate
 * @param morseIndex number of independent ways of bending the path that shorten it
 * @param nullDirections number of independent ways of bending it that leave it equally long to second order; 0 unless it is
 *     degenerate
 * @param conjugatePoints lengths from the start to the points conjugate to it, metres
 * @param overInterfaces the same question asked of its meeting points alone; empty where it meets no surface
 * @param residual miss at the target, metres
 * @param points places passed, metres
 * @param errors estimated numerical errors by key
 */
public record PathRow(
        double opticalLength,
        double excess,
        double length,
        double travelTime,
        Vector launch,
        Vector arrival,
        String kind,
        int morseIndex,
        int nullDirections,
        double[] conjugatePoints,
        String overInterfaces,
        double residual,
        double[][] points,
        Map<String, Double> errors) {

    public PathRow {
        conjugatePoints = conjugatePoints.clone();
        points = Arrays.stream(points).map(double[]::clone).toArray(double[][]::new);
        errors = Map.copyOf(errors);
    }

    /** A copy. */
    @Override
    public double[] conjugatePoints() {
        return conjugatePoints.clone();
    }

    /** A copy. */
    @Override
    public double[][] points() {
        return Arrays.stream(points).map(double[]::clone).toArray(double[][]::new);
    }

    @Override
    public boolean equals(Object o) {
        return o instanceof PathRow p
                && opticalLength == p.opticalLength
                && launch.equals(p.launch)
                && arrival.equals(p.arrival)
                && kind.equals(p.kind)
                && morseIndex == p.morseIndex;
    }

    @Override
    public int hashCode() {
        return Double.hashCode(opticalLength) + 31 * launch.hashCode();
    }
}
