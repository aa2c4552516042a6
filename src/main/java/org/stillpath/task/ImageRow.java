package org.stillpath.task;

import java.util.Arrays;
import java.util.Map;
import java.util.OptionalDouble;

/**
 * One image of a sighted target as a result states it, in SI. Elevations are above each end's own horizontal.
 *
 * @param launch elevation at which the image is seen, rad
 * @param arrival elevation of the path at the target, drawn on from the eye, rad; its negative is what an instrument there
 *     reads toward the eye
 * @param refractionAtFrom how much higher the target looks than it is, rad
 * @param refractionAtTo how much higher the eye looks from the target than it is, rad
 * @param displacement where the straight continuation of the launch meets the target's vertical, above the target, metres
 * @param coefficient k = 2 R × refraction at the eye / distance; empty over a flat earth
 * @param remark why k is no figure to go by here; empty where it is one
 * @param opticalLength ∫ n ds, metres
 * @param excess optical length less the chord, metres
 * @param length metres
 * @param lowest least clearance over the ground, metres
 * @param lowestAt distance along the datum where that is, metres
 * @param orientation erect or inverted
 * @param magnification vertical, against the straight line; negative: inverted
 * @param kind minimum, saddle or degenerate, in the vertical plane
 * @param points places passed: distance along the datum and height, metres
 * @param errors estimated numerical errors by key
 */
public record ImageRow(
        double launch,
        double arrival,
        double refractionAtFrom,
        double refractionAtTo,
        double displacement,
        OptionalDouble coefficient,
        String remark,
        double opticalLength,
        double excess,
        double length,
        double lowest,
        double lowestAt,
        String orientation,
        double magnification,
        String kind,
        double[][] points,
        Map<String, Double> errors) {

    public ImageRow {
        points = Arrays.stream(points).map(double[]::clone).toArray(double[][]::new);
        errors = Map.copyOf(errors);
    }

    /** The same image with other error estimates. */
    ImageRow withErrors(Map<String, Double> other) {
        return new ImageRow(
                launch,
                arrival,
                refractionAtFrom,
                refractionAtTo,
                displacement,
                coefficient,
                remark,
                opticalLength,
                excess,
                length,
                lowest,
                lowestAt,
                orientation,
                magnification,
                kind,
                points,
                other);
    }

    /** A copy. */
    @Override
    public double[][] points() {
        return Arrays.stream(points).map(double[]::clone).toArray(double[][]::new);
    }

    @Override
    public boolean equals(Object o) {
        return o instanceof ImageRow i
                && launch == i.launch
                && arrival == i.arrival
                && opticalLength == i.opticalLength
                && kind.equals(i.kind);
    }

    @Override
    public int hashCode() {
        return Double.hashCode(launch) + 31 * Double.hashCode(arrival);
    }
}
