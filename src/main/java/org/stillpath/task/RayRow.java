package org.stillpath.task;

import java.util.Arrays;
import java.util.Map;
import org.stillpath.geometry.Vector;

/**
 * One traced ray as a result states it, in SI and the job's coordinates.
 *
 * @param status arrived, clipped, missed, outside, grounded, totally-reflected or lost
 * @param position where the ray ended, metres
 * @param direction unit direction of the light there
 * @param opticalLength ∫ n ds from the start, metres
 * @param length geometric length, metres
 * @param travelTime phase travel time, optical length over the speed of light, seconds
 * @param index refractive index at the end
 * @param transfer 4×4 ray-transfer matrix by rows, d(x, y, px, py at the end plane)/d(.. at the start plane); empty where
 *     none was asked for or the ray did not arrive
 * @param note in words, why the ray ended early and where; empty for a ray that arrived
 * @param errors estimated numerical errors by key: {@code position} (metres), {@code direction} (rad), {@code
 *     optical-length} (metres), {@code length} (metres), {@code index}; further keys where further values are stated
 */
public record RayRow(
        String status,
        Vector position,
        Vector direction,
        double opticalLength,
        double length,
        double travelTime,
        double index,
        double[][] transfer,
        String note,
        Map<String, Double> errors) {

    public RayRow {
        transfer = Arrays.stream(transfer).map(double[]::clone).toArray(double[][]::new);
        errors = Map.copyOf(errors);
    }

    /** The ray-transfer matrix by rows (a copy); empty where there is none. */
    @Override
    public double[][] transfer() {
        return Arrays.stream(transfer).map(double[]::clone).toArray(double[][]::new);
    }

    @Override
    public boolean equals(Object o) {
        return o instanceof RayRow r
                && status.equals(r.status)
                && position.equals(r.position)
                && direction.equals(r.direction)
                && opticalLength == r.opticalLength
                && length == r.length
                && travelTime == r.travelTime
                && index == r.index
                && Arrays.deepEquals(transfer, r.transfer)
                && note.equals(r.note)
                && errors.equals(r.errors);
    }

    @Override
    public int hashCode() {
        return position.hashCode() * 31 + status.hashCode();
    }
}
