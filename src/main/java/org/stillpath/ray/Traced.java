package org.stillpath.ray;

import java.util.Arrays;
import org.stillpath.geometry.Vector;

/**
 * A ray as it ended, in SI and the job's coordinates.
 *
 * @param status how it ended
 * @param element index of the element at which it ended early, −1 where it did not end at one
 * @param state the state at the end, see {@link State}, with four Jacobi columns where a transfer was asked for
 * @param start the state at the start
 * @param index refractive index at the end
 * @param force ½∇n² at the end, in the medium in which the ray ended, three components, 1/m
 * @param errors estimated errors
 * @param accurate whether the errors are within the asked accuracy
 * @param note in words, why it ended early and where; empty where it arrived
 * @param trail places passed as x, y, z triples, if they were asked for
 * @param conjugates lengths from the start at which points conjugate to it lie, metres, ascending, a double one twice; empty
 *     where they were not asked for
 * @param evaluations number of points at which fields were sampled, both runs together
 */
public record Traced(
        Status status,
        int element,
        double[] state,
        double[] start,
        double index,
        double[] force,
        Errors errors,
        boolean accurate,
        String note,
        double[] trail,
        double[] conjugates,
        long evaluations) {

    /**
     * Estimated numerical errors of a ray's end, from a second run at a tighter tolerance and from rounding.
     *
     * @param position metres
     * @param direction radians
     * @param opticalLength metres
     * @param length metres
     * @param drift largest |p|²/n² − 1 that built up along the ray before an interface reset it: the drift of H = 0, reported
     *     and never hidden by rescaling on the way
     */
    public record Errors(double position, double direction, double opticalLength, double length, double drift) {}

    public Traced {
        state = state.clone();
        start = start.clone();
        trail = trail.clone();
        conjugates = conjugates.clone();
        force = force.clone();
    }

    /** ½∇n² at the end (a copy). */
    @Override
    public double[] force() {
        return force.clone();
    }

    /** The state at the end (a copy). */
    @Override
    public double[] state() {
        return state.clone();
    }

    /** The state at the start (a copy). */
    @Override
    public double[] start() {
        return start.clone();
    }

    /** The places passed (a copy). */
    @Override
    public double[] trail() {
        return trail.clone();
    }

    /** Lengths to the conjugate points (a copy). */
    @Override
    public double[] conjugates() {
        return conjugates.clone();
    }

    /** Where the ray ended, metres. */
    public Vector position() {
        return new Vector(state[0], state[1], state[2]);
    }

    /** Unit direction of the light at the end. */
    public Vector direction() {
        return new Vector(state[3], state[4], state[5]).unit();
    }

    /** Optical length from the start, metres. */
    public double opticalLength() {
        return State.opticalLength(state);
    }

    /** Geometric length from the start, metres. */
    public double length() {
        return state[State.LENGTH];
    }

    /** Whether a transfer matrix was carried and exists: the ray crosses the end plane of constant z. */
    public boolean hasTransfer() {
        return State.columns(state) == State.TRANSFER_COLUMNS && state[State.P + 2] != 0;
    }

    /**
     * The 4×4 ray-transfer matrix by rows: d(x, y, px, py at the end)/d(x, y, px, py at the start), both on planes of constant
     * z through the ray's ends, p the index times the direction cosines.
     *
     * @throws IllegalStateException if no transfer was carried
     */
    public double[][] transfer() {
        if (!hasTransfer()) {
            throw new IllegalStateException("no transfer matrix was carried along this ray");
        }
        double[][] m = new double[4][4];
        for (int c = 0; c < 4; c++) {
            int at = State.COLUMNS + State.COLUMN * c;
            double dt = -state[at + 2] / state[5];
            m[0][c] = state[at] + state[3] * dt;
            m[1][c] = state[at + 1] + state[4] * dt;
            m[2][c] = state[at + 3] + force[0] * dt;
            m[3][c] = state[at + 4] + force[1] * dt;
        }
        return m;
    }

    @Override
    public boolean equals(Object o) {
        return o instanceof Traced t && status == t.status && Arrays.equals(state, t.state);
    }

    @Override
    public int hashCode() {
        return Arrays.hashCode(state);
    }
}
