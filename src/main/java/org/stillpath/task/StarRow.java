package org.stillpath.task;

import java.util.Map;
import java.util.OptionalDouble;

/**
 * A star as a result states it.
 *
 * @param apparentZenith its apparent zenith distance, rad
 * @param refraction how much higher it looks than it is, rad; empty where no star can be seen there
 * @param top height at which the air of the job ends, or was left, metres
 * @param note why nothing is seen, or what is doubtful; empty otherwise
 * @param errors estimated numerical errors by key
 */
public record StarRow(
        double apparentZenith, OptionalDouble refraction, double top, String note, Map<String, Double> errors) {
    public StarRow {
        errors = Map.copyOf(errors);
    }
}
