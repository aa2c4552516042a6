package org.stillpath.ray;

import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.medium.IndexField;

/**
 * The production engine: explicit Runge-Kutta-Nyström pairs for q'' = ½∇n²(q), {@link NystromPair}.
 *
 * <p>The force does not depend on the momentum, so a Nyström pair needs fewer stages than a general pair of the same order;
 * optical excess and length are integrated with the same weights at no further sample. Loose tolerances use 8(6), with eight
 * samples a step, tight ones 12(10) with seventeen. Steps are controlled on place, direction, excess and length, and on the
 * Jacobi columns where there are any. A step aims at the goal when that is near, events are looked for on an interpolant of
 * fifth order, and what it finds is landed on by stepping again, so that the interpolant only guesses. Nothing is allocated
 * in the loop.
 */
public final class NystromPropagator implements Propagator {
    /** Tolerances below this use the pair of order 12: where it became cheaper on the analytic cases. */
    private static final double TIGHT = 1e-8;
    /** The local error aimed at, as a fraction of the tolerance. */
    static final double CAUTION = 0.1;
    /** No tolerance asks for less than rounding leaves. */
    private static final double LEAST_TOLERANCE = 1e-16;

    private static final double SAFETY = 0.9;
    private static final double LEAST_FACTOR = 0.1;
    private static final double MOST_FACTOR = 6;
    /** A step reaches at most this part of the scene, so that what is small in it is not stepped over. */
    static final double LONGEST = 0.5;
    /** An aimed step goes this much beyond its goal, so that the goal lies inside it. */
    static final double BEYOND = 1.02;

    /** A step that shrinks to this part of the scene is no step. */
    static final double SHORTEST = 1e-15;

    static final int MOST_STEPS = 2_000_000;
    private static final int LANDING_ROUNDS = 12;
    private static final int TRAIL_POINTS_PER_STEP = 8;

    private final double scale;
    private final double stride;
    private final double tolerance;
    private final double estimateTolerance;
    private final double opening;
    private final NystromPair pair;
    private final Flow flow = new Flow();
    private final double[] x = new double[1];
    private final double[] y = new double[1];
    private final double[] z = new double[1];
    private final Samples s = new Samples(1);
    private final StepPath path = new StepPath();
    private long evaluations;
    private double localErrors;

    private double[] end = new double[0];
    private double[] saved = new double[0];
    private double[] rate = new double[0];
    /** Stage rates: force, excess, length, then the force of each column. */
    private double[][] k = new double[0][];
    /** Weighted sums of the stage rates. */
    private double[] stage = new double[0];

    private double[] momentum = new double[0];
    private double[] placeError = new double[0];
    private double[] momentumError = new double[0];

    private double[] values = new double[0];
    private double suggested = Double.NaN;

    /**
     * @param tolerance error wanted at the end of a ray of usual length, as a fraction of the scale; it steers, and does not
     *     promise
     * @param scale length of the scene, metres: what positions are judged against
     * @param stride multiplies the longest step, and the first step towards a target that is nearer than it
     */
    public NystromPropagator(double tolerance, double scale, double stride) {
        this(tolerance, scale, stride, pairFor(tolerance));
    }

    /** The same with a pair of one's own choice. */
    NystromPropagator(double tolerance, double scale, double stride, NystromPair pair) {
        if (!(tolerance > 0) || !(scale > 0) || !(stride > 0 && stride <= 1)) {
            throw new IllegalArgumentException("tolerance and scale must be positive, stride at most 1: " + tolerance
                    + ", " + scale + ", " + stride);
        }
        this.stride = stride;
        this.tolerance = Math.max(tolerance, LEAST_TOLERANCE);
        this.scale = scale;
        this.pair = pair;
        this.estimateTolerance = estimateTolerance(tolerance, pair);
        this.opening = opening(tolerance, pair);
    }

    /** The first step as a part of the length over which the force changes. */
    static double opening(double tolerance, NystromPair pair) {
        return 3 * Math.pow(estimateTolerance(tolerance, pair), 1.0 / (pair.lower() + 1));
    }

    /** The pair that serves a tolerance best. */
    static NystromPair pairFor(double tolerance) {
        return tolerance < TIGHT ? NystromPair.TWELVE_TEN : NystromPair.EIGHT_SIX;
    }

    /** What a pair's estimate may be: it is that of the lower order, and what it stands for is smaller by the orders between. */
    static double estimateTolerance(double tolerance, NystromPair pair) {
        return Math.pow(CAUTION * Math.max(tolerance, LEAST_TOLERANCE), (pair.lower() + 1.0) / (pair.order() + 1.0));
    }

    @Override
    public long evaluations() {
        return evaluations + flow.evaluations();
    }

    @Override
    public double localErrors() {
        return localErrors;
    }

    /**
     * Follows a ray for a given parameter, whatever it meets.
     *
     * @param state advanced in place
     * @param tau how far, dτ = ds/n, metres; positive
     * @return whether it got there; otherwise the state is the last sound one
     */
    boolean follow(double[] state, IndexField field, double tau) {
        fit(state);
        if (!stage(field, state, k[0])) {
            return false;
        }
        double h = firstStep(state, field);
        double done = 0;
        for (int i = 0; i < MOST_STEPS; i++) {
            if (h >= tau - done) {
                h = tau - done;
            } else if (2 * h > tau - done) {
                h = 0.5 * (tau - done);
            }
            double error = step(pair, state, field, h);
            if (!(error <= 1)) {
                h *= Double.isNaN(error) ? LEAST_FACTOR : factor(error);
                if (!(h * speed(state) > SHORTEST * scale)) {
                    return false;
                }
                continue;
            }
            System.arraycopy(end, 0, state, 0, state.length);
            done += h;
            if (done >= tau * (1 - 1e-15)) {
                return true;
            }
            h = Math.min(h * factor(error), longest(state));
            if (!lead(field, state)) {
                return false;
            }
        }
        return false;
    }

    /** One step of a given length, whatever its error; for tests of the pairs. False where the field is undefined. */
    boolean single(double[] state, IndexField field, double h) {
        fit(state);
        if (!stage(field, state, k[0]) || Double.isNaN(step(pair, state, field, h))) {
            return false;
        }
        System.arraycopy(end, 0, state, 0, state.length);
        return true;
    }

    @Override
    public int advance(double[] state, IndexField field, Target[] targets, Trail trail) {
        fit(state);
        if (!stage(field, state, k[0])) {
            return UNDEFINED;
        }
        flow.rate(field, state, rate);
        double[] bias = Departure.biases(state, rate, field, flow, targets, scale);
        if (values.length < targets.length) {
            values = new double[targets.length];
        }
        for (int i = 0; i < targets.length; i++) {
            values[i] = targets[i].value(state) + bias[i];
        }
        double h = firstStep(state, field);
        boolean undefined = false;
        for (int i = 0; i < MOST_STEPS; i++) {
            double aim = (i == 0 && stride < 1 ? stride : BEYOND) * aim(targets, bias, state);
            boolean aimed = aim < h && !undefined;
            double taken = aimed ? aim : h;
            path.begin(state, k[0]);
            double error = step(pair, state, field, taken);
            if (error <= 1 && !lead(field, end)) {
                error = Double.NaN;
            }
            if (!(error <= 1)) {
                undefined = Double.isNaN(error);
                h = taken * (undefined ? 0.25 : factor(error));
                if (!(h * speed(state) > SHORTEST * scale)) {
                    return undefined ? UNDEFINED : STUCK;
                }
                continue;
            }
            // what the estimate of lower order means for the formula that is used
            localErrors += CAUTION * tolerance * Math.pow(error, (pair.order() + 1.0) / (pair.lower() + 1.0));
            path.finish(end, k[0], taken);
            System.arraycopy(end, 0, state, 0, state.length);
            int met = event(state, field, targets, bias, taken, trail);
            if (met >= 0) {
                suggested = h;
                return met;
            }
            note(trail, field, taken);
            for (int t = 0; t < targets.length; t++) {
                values[t] = targets[t].value(state) + bias[t];
            }
            h = Math.min(aimed ? Math.max(h, taken * factor(error)) : taken * factor(error), longest(state));
        }
        return STUCK;
    }

    private void fit(double[] state) {
        if (end.length != state.length) {
            int width = 5 + 3 * State.columns(state);
            end = new double[state.length];
            saved = new double[state.length];
            rate = new double[state.length];
            k = new double[Math.max(pair.stages(), NystromPair.SIX_FOUR.stages())][width];
            stage = new double[width];
            momentum = new double[width];
            placeError = new double[width];
            momentumError = new double[width];
        }
    }

    private static double speed(double[] state) {
        return Math.sqrt(state[3] * state[3] + state[4] * state[4] + state[5] * state[5]);
    }

    private double longest(double[] state) {
        return stride * LONGEST * scale / speed(state);
    }

    private double factor(double error) {
        return held(Math.pow(error, -1.0 / (pair.lower() + 1)));
    }

    /** What a step is to be multiplied with, from what would just do. */
    static double held(double growth) {
        return Math.min(Math.max(SAFETY * growth, LEAST_FACTOR), MOST_FACTOR);
    }

    /** Makes the rates at the step's end those of the next start; false where the field is undefined. */
    private boolean lead(IndexField field, double[] state) {
        if (pair.last()) {
            System.arraycopy(k[pair.stages() - 1], 0, k[0], 0, k[0].length);
            return true;
        }
        return stage(field, state, k[0]);
    }

    /**
     * A first step from how fast the force changes along the ray, and from the Hessian where there is one: a fraction of the
     * time in which the ray would swing once, that grows with the tolerance.
     */
    private double firstStep(double[] state, IndexField field) {
        double longest = longest(state);
        double n = speed(state);
        double probe = 1e-2 * longest;
        double stiffness = 0;
        if (State.columns(state) > 0) {
            stiffness = Math.sqrt(s.hxx[0] * s.hxx[0]
                    + s.hyy[0] * s.hyy[0]
                    + s.hzz[0] * s.hzz[0]
                    + 2 * (s.hxy[0] * s.hxy[0] + s.hxz[0] * s.hxz[0] + s.hyz[0] * s.hyz[0]));
        }
        double[] f = k[0];
        if (sample(
                field,
                state[0] + probe * state[3],
                state[1] + probe * state[4],
                state[2] + probe * state[5],
                Order.GRADIENT)) {
            double dx = s.gx[0] - f[0];
            double dy = s.gy[0] - f[1];
            double dz = s.gz[0] - f[2];
            stiffness = Math.max(stiffness, Math.sqrt(dx * dx + dy * dy + dz * dz) / (probe * n));
        } else {
            longest = probe;
        }
        // also no faster than the force itself turns the ray
        double force = Math.sqrt(f[0] * f[0] + f[1] * f[1] + f[2] * f[2]);
        double span = Math.min(1 / Math.sqrt(stiffness), n / force);
        double reach = opening * span;
        double h = Math.min(longest, reach);
        return suggested < h ? suggested : h;
    }

    /** τ after which the ray will be at the nearest target ahead, to second order; infinite where it nears none. */
    private double aim(Target[] targets, double[] bias, double[] state) {
        double nearest = Double.POSITIVE_INFINITY;
        double n = speed(state);
        double[] f = k[0];
        for (int t = 0; t < targets.length; t++) {
            double first = -values[t] / targets[t].rate(state, n, f[0], f[1], f[2]);
            if (!(first > 0 && first < 2 * nearest)) {
                continue;
            }
            // one Newton step from the place to which the parabola of the ray leads
            double half = 0.5 * first * first;
            for (int i = 0; i < 3; i++) {
                saved[i] = state[i] + first * state[3 + i] + half * f[i];
                saved[3 + i] = state[3 + i] + first * f[i];
            }
            saved[State.EXCESS] = state[State.EXCESS] + first * f[3];
            saved[State.LENGTH] = state[State.LENGTH] + first * f[4];
            double slope = targets[t].rate(saved, speed(saved), f[0], f[1], f[2]);
            double second = first - (targets[t].value(saved) + bias[t]) / slope;
            nearest = Math.min(nearest, second > 0.5 * first && second < 2 * first ? second : first);
        }
        return nearest;
    }

    private boolean sample(IndexField field, double qx, double qy, double qz, Order order) {
        x[0] = qx;
        y[0] = qy;
        z[0] = qz;
        field.sample(x, y, z, 1, order, s);
        evaluations++;
        // an infinite slope, at the end of a root's domain, is no force to go on with
        return Double.isFinite(s.value[0] + s.gx[0] + s.gy[0] + s.gz[0]);
    }

    /** The rates at a state; false where the field is undefined. */
    private boolean stage(IndexField field, double[] state, double[] out) {
        boolean columns = out.length > 5;
        if (!sample(field, state[0], state[1], state[2], columns ? Order.HESSIAN : Order.GRADIENT)) {
            return false;
        }
        force(out);
        lengths(out);
        for (int at = State.COLUMNS, c = 5; c < out.length; at += State.COLUMN, c += 3) {
            bend(state[at], state[at + 1], state[at + 2], out, c);
        }
        return true;
    }

    private void force(double[] out) {
        out[0] = s.gx[0];
        out[1] = s.gy[0];
        out[2] = s.gz[0];
    }

    /** The rates of optical excess and length; a root and a division, so only for the stages that weigh in them. */
    private void lengths(double[] out) {
        double e = s.value[0];
        double n = Math.sqrt(1 + e);
        out[3] = n * e / (1 + n);
        out[4] = n;
    }

    private void bend(double dx, double dy, double dz, double[] out, int c) {
        out[c] = s.hxx[0] * dx + s.hxy[0] * dy + s.hxz[0] * dz;
        out[c + 1] = s.hxy[0] * dx + s.hyy[0] * dy + s.hyz[0] * dz;
        out[c + 2] = s.hxz[0] * dx + s.hyz[0] * dy + s.hzz[0] * dz;
    }

    /**
     * One step from a state, whose rates stand in {@code k[0]}, into {@link #end}.
     *
     * @return the estimated error over what is allowed; NaN where the field is undefined at a stage
     */
    private double step(NystromPair rk, double[] from, IndexField field, double h) {
        int stages = rk.stages();
        double hh = h * h;
        Order order = k[0].length > 5 ? Order.HESSIAN : Order.GRADIENT;
        for (int i = 1; i < stages; i++) {
            sum(rk.a()[i], rk.used()[i], stage);
            double ch = rk.c()[i] * h;
            if (!sample(
                    field,
                    from[0] + (ch * from[3] + hh * stage[0]),
                    from[1] + (ch * from[4] + hh * stage[1]),
                    from[2] + (ch * from[5] + hh * stage[2]),
                    order)) {
                return Double.NaN;
            }
            double[] ki = k[i];
            force(ki);
            if (rk.bp()[i] != 0 || rk.bpe()[i] != 0) {
                lengths(ki);
            }
            for (int at = State.COLUMNS, c = 5; c < ki.length; at += State.COLUMN, c += 3) {
                bend(
                        from[at] + (ch * from[at + 3] + hh * stage[c]),
                        from[at + 1] + (ch * from[at + 4] + hh * stage[c + 1]),
                        from[at + 2] + (ch * from[at + 5] + hh * stage[c + 2]),
                        ki,
                        c);
            }
        }
        return finish(rk, from, h);
    }

    /**
     * The sum of the stages' rates with weights, over those whose weight is not 0, into {@code out}. One loop over the stages
     * with all sums in registers, against a loop a component: it took half of the time of a search's rays before.
     */
    private void sum(double[] weights, int[] used, double[] out) {
        double fx = 0;
        double fy = 0;
        double fz = 0;
        double excess = 0;
        double length = 0;
        if (out.length == 5) {
            for (int j : used) {
                double w = weights[j];
                double[] r = k[j];
                fx = Math.fma(w, r[0], fx);
                fy = Math.fma(w, r[1], fy);
                fz = Math.fma(w, r[2], fz);
                excess = Math.fma(w, r[3], excess);
                length = Math.fma(w, r[4], length);
            }
        } else {
            double ax = 0;
            double ay = 0;
            double az = 0;
            double bx = 0;
            double by = 0;
            double bz = 0;
            for (int j : used) {
                double w = weights[j];
                double[] r = k[j];
                fx = Math.fma(w, r[0], fx);
                fy = Math.fma(w, r[1], fy);
                fz = Math.fma(w, r[2], fz);
                excess = Math.fma(w, r[3], excess);
                length = Math.fma(w, r[4], length);
                ax = Math.fma(w, r[5], ax);
                ay = Math.fma(w, r[6], ay);
                az = Math.fma(w, r[7], az);
                bx = Math.fma(w, r[8], bx);
                by = Math.fma(w, r[9], by);
                bz = Math.fma(w, r[10], bz);
            }
            out[5] = ax;
            out[6] = ay;
            out[7] = az;
            out[8] = bx;
            out[9] = by;
            out[10] = bz;
            for (int c = 11; c < out.length; c += 3) {
                column(weights, used, c, out);
            }
        }
        out[0] = fx;
        out[1] = fy;
        out[2] = fz;
        out[3] = excess;
        out[4] = length;
    }

    private void column(double[] weights, int[] used, int c, double[] out) {
        double x1 = 0;
        double y1 = 0;
        double z1 = 0;
        for (int j : used) {
            double w = weights[j];
            double[] r = k[j];
            x1 = Math.fma(w, r[c], x1);
            y1 = Math.fma(w, r[c + 1], y1);
            z1 = Math.fma(w, r[c + 2], z1);
        }
        out[c] = x1;
        out[c + 1] = y1;
        out[c + 2] = z1;
    }

    /** Sums the stages into {@link #end} and estimates the error. */
    private double finish(NystromPair rk, double[] from, double h) {
        double hh = h * h;
        sum(rk.b(), rk.usedInPlace(), stage);
        sum(rk.bp(), rk.usedInMomentum(), momentum);
        sum(rk.be(), rk.usedInPlace(), placeError);
        sum(rk.bpe(), rk.usedInMomentum(), momentumError);
        for (int i = 0; i < 3; i++) {
            end[i] = from[i] + (h * from[3 + i] + hh * stage[i]);
            end[3 + i] = from[3 + i] + h * momentum[i];
        }
        end[State.EXCESS] = from[State.EXCESS] + h * momentum[3];
        end[State.LENGTH] = from[State.LENGTH] + h * momentum[4];
        double allowed = estimateTolerance;
        double error = Math.max(
                Math.max(hh * norm(placeError, 0) / scale, h * norm(momentumError, 0)),
                h * Math.max(Math.abs(momentumError[3]), Math.abs(momentumError[4])) / scale);
        for (int at = State.COLUMNS, c = 5, column = 0; c < stage.length; at += State.COLUMN, c += 3, column++) {
            for (int i = 0; i < 3; i++) {
                end[at + i] = from[at + i] + (h * from[at + 3 + i] + hh * stage[c + i]);
                end[at + 3 + i] = from[at + 3 + i] + h * momentum[c + i];
            }
            // relative to its size; the first two columns start as unit places, the last two as unit momenta
            boolean ofPlace = column < 2;
            double ofPlaces = hh * norm(placeError, c) / ((ofPlace ? 1 : scale) + norm(end, at));
            double ofSlopes = h * norm(momentumError, c) / ((ofPlace ? 1 / scale : 1) + norm(end, at + 3));
            error = Math.max(error, Math.max(ofPlaces, ofSlopes));
        }
        return Math.abs(error) / allowed;
    }

    private static double norm(double[] v, int at) {
        return Math.sqrt(v[at] * v[at] + v[at + 1] * v[at + 1] + v[at + 2] * v[at + 2]);
    }

    private void note(Trail trail, IndexField field, double until) {
        if (until > 0) {
            trail.conjugates().ifPresent(c -> c.span(field, path::whole, 0, until, end.length));
        }
        if (trail.wanted()) {
            for (int i = 1; i <= TRAIL_POINTS_PER_STEP; i++) {
                path.at(until * i / TRAIL_POINTS_PER_STEP, saved);
                trail.add(saved[0], saved[1], saved[2]);
            }
        }
    }

    /**
     * Looks for the first target met in the step just taken, and lands on it.
     *
     * @return its index with the state on it, or −1 with the state at the step's end and its rates in {@code k[0]}
     */
    private int event(double[] state, IndexField field, Target[] targets, double[] bias, double h, Trail trail) {
        double from = 0;
        double until = h;
        for (int round = 0; round < 2 * targets.length + 8 && from < h; round++) {
            double first = Double.POSITIVE_INFINITY;
            int which = -1;
            for (int t = 0; t < targets.length; t++) {
                double root = path.firstZero(targets[t], bias[t], values[t], from, Math.min(first, until));
                if (root < first) {
                    first = root;
                    which = t;
                }
            }
            if (which < 0) {
                break;
            }
            double landed = land(state, field, targets[which], bias[which], values[which], first, h);
            int earlier = landed >= 0 ? earlier(state, targets, bias, which) : -1;
            if (landed >= 0 && earlier < 0) {
                note(trail, field, landed);
                trail.add(state[0], state[1], state[2]);
                return which;
            }
            if (earlier >= 0) {
                // the interpolant had the two the other way round
                double root = path.firstZero(targets[earlier], bias[earlier], values[earlier], 0, h);
                landed = land(state, field, targets[earlier], bias[earlier], values[earlier], root, h);
                if (landed >= 0) {
                    note(trail, field, landed);
                    trail.add(state[0], state[1], state[2]);
                    return earlier;
                }
            }
            // the interpolant saw a contact that the ray itself does not make: look behind it
            from = first + 1e-3 * h;
        }
        System.arraycopy(path.end(), 0, state, 0, state.length);
        System.arraycopy(path.endRates(), 0, k[0], 0, k[0].length);
        return -1;
    }

    /** A target other than the one landed on that the ray has passed on its way there; −1 if there is none. */
    private int earlier(double[] state, Target[] targets, double[] bias, int which) {
        for (int t = 0; t < targets.length; t++) {
            double value = targets[t].value(state) + bias[t];
            boolean passed = t != which
                    && value > 0 != values[t] > 0
                    && Math.abs(value) > Departure.ON * scale * targets[t].steepness(state, speed(state));
            if (passed && targets[t].accepts(state)) {
                return t;
            }
        }
        return -1;
    }

    /**
     * Steps to the zero of a target that the interpolant puts at t, and on from there until nothing is left.
     *
     * @return its parameter within the step, with the state there; negative if the ray has no zero there
     */
    private double land(
            double[] state, IndexField field, Target target, double bias, double startValue, double t, double h) {
        if (!(t <= h) || !reach(state, field, t, h)) {
            return -1;
        }
        double at = t;
        for (int round = 0; round < LANDING_ROUNDS; round++) {
            double n = speed(state);
            double value = target.value(state) + bias;
            if (target.needsForce() && !stage(field, state, k[0])) {
                return -1;
            }
            double dt = -value
                    / (target.needsForce() ? target.rate(state, n, k[0][0], k[0][1], k[0][2]) : target.rate(state, n));
            boolean crossed = value > 0 != startValue > 0;
            if (Math.abs(dt) * n <= 1e-9 * scale) {
                // on the target itself: its bias only kept the start from being met
                flow.polish(state, field, target, rate);
                return target.accepts(state) ? Math.max(0, at) : -1;
            }
            if (crossed && dt > 0) {
                // beyond the deepest point of a grazing chord: back to where the ray comes in
                dt = -Math.max(2 * dt, 1e-3 * h);
            }
            if (!(Math.abs(dt) <= 0.1 * h)) {
                boolean touches = Math.abs(value) <= 1e-13 * scale * target.steepness(state, n);
                return touches && target.accepts(state) ? Math.max(0, at) : -1;
            }
            if (!(target.needsForce() ? moveOn(state, field, dt, h) : move(state, field, dt, h))) {
                return -1;
            }
            at += dt;
        }
        return -1;
    }

    /** Moves the state to the parameter t of the step by the shortest sound step; false where the field is undefined. */
    private boolean reach(double[] state, IndexField field, double t, double h) {
        boolean fromEnd = h - t < 0.1 * h;
        System.arraycopy(fromEnd ? path.end() : path.start(), 0, state, 0, state.length);
        double dt = fromEnd ? t - h : t;
        return dt == 0 || move(state, field, dt, h);
    }

    /** A step along the ray, forward or back, inside a step of length h that was accepted. */
    private boolean move(double[] state, IndexField field, double dt, double h) {
        return stage(field, state, k[0]) && moveOn(state, field, dt, h);
    }

    /** The same from a state whose rates stand in {@code k[0]}. */
    private boolean moveOn(double[] state, IndexField field, double dt, double h) {
        NystromPair rk = Math.abs(dt) < 0.03 * h ? NystromPair.SIX_FOUR : pair;
        if (Double.isNaN(step(rk, state, field, dt))) {
            return false;
        }
        System.arraycopy(end, 0, state, 0, state.length);
        return true;
    }
}
