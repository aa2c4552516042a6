package org.stillpath.ray;

import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.medium.IndexField;

/**
 * The right-hand side of the ray equation, and the last short step onto a target. Holds scratch space: one object a thread.
 */
final class Flow {
    /** A target is met when it is this many times the double rounding of the place away, or nothing more is gained. */
    private static final int POLISH_ROUNDS = 6;

    private final double[] x = new double[1];
    private final double[] y = new double[1];
    private final double[] z = new double[1];
    private final Samples s = new Samples(1);
    private long evaluations;

    /** Number of points at which fields were sampled so far. */
    long evaluations() {
        return evaluations;
    }

    /** The samples taken last. */
    Samples samples() {
        return s;
    }

    /** Samples a field at a place; false where it is undefined. */
    boolean sample(IndexField field, double qx, double qy, double qz, Order order) {
        x[0] = qx;
        y[0] = qy;
        z[0] = qz;
        field.sample(x, y, z, 1, order, s);
        evaluations++;
        return !Double.isNaN(s.value[0]);
    }

    /** The refractive index in the last samples. */
    double index() {
        return Math.sqrt(1 + s.value[0]);
    }

    /** d/dτ of a state into {@code rate}; false where the field is undefined. */
    boolean rate(IndexField field, double[] state, double[] rate) {
        int columns = State.columns(state);
        if (!sample(field, state[0], state[1], state[2], columns > 0 ? Order.HESSIAN : Order.GRADIENT)) {
            return false;
        }
        double n = index();
        rate[0] = state[3];
        rate[1] = state[4];
        rate[2] = state[5];
        rate[3] = s.gx[0];
        rate[4] = s.gy[0];
        rate[5] = s.gz[0];
        rate[State.EXCESS] = n * s.value[0] / (1 + n);
        rate[State.LENGTH] = n;
        for (int c = 0; c < columns; c++) {
            int at = State.COLUMNS + State.COLUMN * c;
            double dx = state[at];
            double dy = state[at + 1];
            double dz = state[at + 2];
            rate[at] = state[at + 3];
            rate[at + 1] = state[at + 4];
            rate[at + 2] = state[at + 5];
            rate[at + 3] = s.hxx[0] * dx + s.hxy[0] * dy + s.hxz[0] * dz;
            rate[at + 4] = s.hxy[0] * dx + s.hyy[0] * dy + s.hyz[0] * dz;
            rate[at + 5] = s.hxz[0] * dx + s.hyz[0] * dy + s.hzz[0] * dz;
        }
        return true;
    }

    /**
     * Moves a state that is very near a target onto it by Newton's method with second-order Taylor steps: the distance left
     * by the search is so short that these are exact to round-off.
     */
    void polish(double[] state, IndexField field, Target target, double[] rate) {
        double best = Math.abs(target.value(state));
        for (int round = 0; round < POLISH_ROUNDS && best > 0; round++) {
            if (!rate(field, state, rate)) {
                return;
            }
            double slope = target.rate(state, index(), s.gx[0], s.gy[0], s.gz[0]);
            double dt = -target.value(state) / slope;
            if (slope == 0 || !Double.isFinite(dt)) {
                return;
            }
            shift(state, rate, dt);
            double now = Math.abs(target.value(state));
            if (now >= best) {
                shift(state, rate, -dt);
                return;
            }
            best = now;
        }
    }

    /** A second-order Taylor step along the flow. */
    void shift(double[] state, double[] rate, double dt) {
        double half = 0.5 * dt * dt;
        double ax = s.gx[0] * half;
        double ay = s.gy[0] * half;
        double az = s.gz[0] * half;
        for (int i = 0; i < state.length; i++) {
            state[i] += rate[i] * dt;
        }
        state[0] += ax;
        state[1] += ay;
        state[2] += az;
    }
}
