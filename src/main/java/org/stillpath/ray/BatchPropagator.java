package org.stillpath.ray;

import java.util.Queue;
import java.util.function.ObjIntConsumer;
import org.jspecify.annotations.Nullable;
import org.stillpath.formula.Order;
import org.stillpath.medium.IndexField;

/**
 * What {@link NystromPropagator} does for one ray, for many at once: each lane of a {@link RayBatch} advances until it meets the
 * first of its targets. A step in which a target is passed is made again, up to where an interpolant puts the zero, which costs
 * one or two steps more; whatever is not a plain crossing (a contact, two targets close together, the edge of a field) is left to
 * the engine for one ray from the start of that step on, so that there is one place that knows about such things.
 *
 * <p>Mutable, one a thread.
 */
final class BatchPropagator {
    /** Rays in a batch: rows of this length fill vector units and stay in the nearest cache. */
    private static final int LANES = 64;

    /** What is left before a target, as a part of the scene, when the last step onto it is a short series. */
    private static final double NEAR = 1e-9;

    /** The sum of a target's values at both ends of a step over its greatest change, when it surely has no zero between. */
    private static final double CLEAR = 2.2;
    /** How little a target's slope may change over a step in which it surely has no turning point. */
    private static final double EVEN = 0.05;

    private static final int LANDING_ROUNDS = 6;

    private static final int GOES_ON = Integer.MIN_VALUE;

    /** A ray on its way through one smooth piece of a field. */
    interface Leg {
        /** Its state, see {@link State}; advanced in place. */
        double[] state();

        /** What ends its way. */
        Target[] targets();

        /** Takes note of samples that were taken for it, and of the local errors that its steps were estimated to have. */
        void spent(long samples, double errors);
    }

    /** What is known about a lane. */
    private static final class Lane<L extends Leg> {
        private final L leg;
        private final Target[] targets;
        private final double[] bias;
        private final double[] values;
        /** d/dτ of the targets where the next step starts. */
        private final double[] slopes;
        /** The force where it set out: good enough for a parabola. */
        private final double[] force;

        private final double excess;
        private final double length;
        private double tau;
        private double errors;
        private int steps;
        /** The target on which the next step is to land; −1 for none. */
        private int landing = -1;
        /** Whether that is where the ray's parabola meets the target, and no interpolant has looked for others yet. */
        private boolean guessed;
        /** Whether a guess went wrong and steps go beyond targets from now on. */
        private boolean wary;

        private int rounds;
        /** The step that is wanted whether or not a target is near. */
        private double wanted;

        Lane(L leg, double[] bias, double[] values, double[] force) {
            this.leg = leg;
            this.targets = leg.targets();
            this.excess = leg.state()[State.EXCESS];
            this.length = leg.state()[State.LENGTH];
            this.bias = bias;
            this.values = values;
            this.slopes = new double[values.length];
            this.force = force;
        }
    }

    private final NystromPair pair;
    private final double scale;
    private final double stride;
    private final double opening;
    private final RayBatch batch;
    private final NystromPropagator alone;
    private final Flow flow = new Flow();
    private final StepPath path = new StepPath();
    private final double[] rate;
    private final double[] now;
    private final double[] ahead;
    private final double[] startRates = new double[5];
    private final double[] endRates = new double[5];
    private final double[] samples;
    private final Trail noTrail = Trail.of(false, Columns.PLANES);

    /**
     * @param columns Jacobi columns carried
     * @param tolerance as {@link NystromPropagator} takes it; likewise {@code scale} and {@code stride}
     */
    BatchPropagator(int columns, double tolerance, double scale, double stride) {
        this.pair = NystromPropagator.pairFor(tolerance);
        this.scale = scale;
        this.stride = stride;
        this.batch = new RayBatch(pair, LANES, columns, true, tolerance, scale);
        this.alone = new NystromPropagator(tolerance, scale, stride);
        this.rate = new double[State.size(columns)];
        this.now = new double[State.COLUMNS];
        this.ahead = new double[State.COLUMNS];
        this.samples = new double[LANES];
        this.opening = scale * NystromPropagator.opening(tolerance, pair);
    }

    /**
     * Advances rays to their targets.
     *
     * @param legs taken from here
     * @param field a smooth field
     * @param bundled the same made ready for bundles
     * @param done told of each ray, in the order in which they end, with what {@link Propagator#advance} would return
     */
    <L extends Leg> void advance(Queue<L> legs, IndexField field, IndexField bundled, ObjIntConsumer<L> done) {
        @SuppressWarnings({"unchecked", "rawtypes"})
        Lane<L>[] lanes = new Lane[LANES];
        int[] fresh = new int[LANES];
        while (batch.lanes() > 0 || !legs.isEmpty()) {
            int filled = 0;
            while (batch.lanes() < LANES) {
                L leg = legs.poll();
                if (leg == null) {
                    break;
                }
                Lane<L> lane = enter(leg, field);
                if (lane == null) {
                    done.accept(leg, Propagator.UNDEFINED);
                    continue;
                }
                int at = batch.lanes();
                lanes[at] = lane;
                fresh[filled++] = at;
                batch.load(at, leg.state(), 0, lane.wanted);
                samples[at] = 0;
            }
            if (batch.lanes() == 0) {
                return;
            }
            batch.prepare(bundled, fresh, filled);
            for (int i = 0; i < batch.lanes(); i++) {
                aim(lanes[i], i);
            }
            batch.step(bundled);
            for (int i = 0; i < batch.lanes(); i++) {
                samples[i] += pair.stages() - (pair.last() ? 1 : 0);
                check(lanes[i], i, field);
            }
            batch.settle();
            for (int i = batch.lanes() - 1; i >= 0; i--) {
                Lane<L> lane = lanes[i];
                int met = after(lane, i, field);
                if (met != GOES_ON) {
                    lane.leg.spent((long) samples[i], lane.errors);
                    batch.drop(i);
                    lanes[i] = lanes[batch.lanes()];
                    samples[i] = samples[batch.lanes()];
                    done.accept(lane.leg, met);
                }
            }
        }
    }

    private <L extends Leg> @Nullable Lane<L> enter(L leg, IndexField field) {
        double[] y = leg.state();
        if (!flow.rate(field, y, rate)) {
            return null;
        }
        Target[] targets = leg.targets();
        double[] bias = Departure.biases(y, rate, field, flow, targets, scale);
        double[] values = new double[targets.length];
        for (int t = 0; t < targets.length; t++) {
            values[t] = targets[t].value(y) + bias[t];
        }
        Lane<L> lane = new Lane<>(leg, bias, values, new double[] {rate[3], rate[4], rate[5]});
        double n = Math.sqrt(square(y[3]) + square(y[4]) + square(y[5]));
        double force = Math.sqrt(square(rate[3]) + square(rate[4]) + square(rate[5]));
        lane.wanted = Math.min(Math.min(stride * NystromPropagator.LONGEST * scale, opening) / n, n / force);
        return lane;
    }

    private static double square(double v) {
        return v * v;
    }

    /** Shortens a lane's next step where a target is near. */
    private void aim(Lane<?> lane, int i) {
        if (lane.landing >= 0) {
            return;
        }
        gather(lane, i, batch.start(), lane.tau, now);
        double n = Math.sqrt(square(now[3]) + square(now[4]) + square(now[5]));
        double nearest = lane.wanted;
        int which = -1;
        for (int t = 0; t < lane.targets.length; t++) {
            lane.slopes[t] = lane.targets[t].rate(now, n);
            double first = -lane.values[t] / lane.slopes[t];
            if (first > 0 && NystromPropagator.BEYOND * first < nearest) {
                nearest = NystromPropagator.BEYOND * first;
                which = t;
            }
        }
        batch.steps()[i] = nearest;
        if (which >= 0 && !lane.wary && !lane.targets[which].needsForce()) {
            guess(lane, i, which, nearest / NystromPropagator.BEYOND, n);
        }
    }

    /** Lets the next step end where the ray's parabola meets a target: between the knots of a grid that is mostly enough. */
    private void guess(Lane<?> lane, int i, int which, double first, double index) {
        Target target = lane.targets[which];
        double[] f = lane.force;
        double half = 0.5 * first * first;
        for (int c = 0; c < 3; c++) {
            ahead[c] = now[c] + first * now[3 + c] + half * f[c];
            ahead[3 + c] = now[3 + c] + first * f[c];
        }
        ahead[State.EXCESS] = now[State.EXCESS] + first * index * (index - 1);
        ahead[State.LENGTH] = now[State.LENGTH] + first * index;
        double n = Math.sqrt(square(ahead[3]) + square(ahead[4]) + square(ahead[5]));
        double second = first - (target.value(ahead) + lane.bias[which]) / target.rate(ahead, n);
        if (second > 0.9 * first && second < 1.1 * first) {
            batch.steps()[i] = second;
            lane.landing = which;
            lane.rounds = 0;
            lane.guessed = true;
        }
    }

    private static void gather(Lane<?> lane, int i, RayBatch.Rays rays, double tau, double[] out) {
        rays.ray(out, 0, i);
        out[State.EXCESS] = lane.excess + (rays.excess[i] - rays.stretch[i]);
        out[State.LENGTH] = lane.length + (tau + rays.stretch[i]);
    }

    /** Looks at the end of a step before it is taken: where a target was passed the step is refused and a shorter one set. */
    private void check(Lane<?> lane, int i, IndexField field) {
        if (!batch.good(i)) {
            return;
        }
        double h = batch.steps()[i];
        gather(lane, i, batch.end(), lane.tau + h, ahead);
        if (lane.landing >= 0) {
            landed(lane, i, h);
            return;
        }
        if (clear(lane, h)) {
            return;
        }
        gather(lane, i, batch.start(), lane.tau, now);
        rates(
                batch.startForce(0, i),
                batch.startForce(1, i),
                batch.startForce(2, i),
                batch.startForce(3, i),
                startRates);
        if (!endRates(i, field)) {
            // the step ends where the field is undefined
            giveUp(lane, i);
            return;
        }
        path.begin(now, startRates);
        path.finish(ahead, endRates, h);
        double first = Double.POSITIVE_INFINITY;
        int which = -1;
        for (int t = 0; t < lane.targets.length; t++) {
            double root = path.firstZero(lane.targets[t], lane.bias[t], lane.values[t], 0, Math.min(first, h));
            if (root < first) {
                first = root;
                which = t;
            }
        }
        if (which >= 0) {
            lane.landing = which;
            lane.guessed = false;
            lane.rounds = 0;
            batch.refuse(i);
            batch.steps()[i] = first;
        }
    }

    /** Whether a step surely met none of the targets but the one it was to land on. */
    private boolean clear(Lane<?> lane, double h) {
        double n = Math.sqrt(square(ahead[3]) + square(ahead[4]) + square(ahead[5]));
        for (int t = 0; t < lane.targets.length; t++) {
            if (t == lane.landing) {
                continue;
            }
            double value = lane.targets[t].value(ahead) + lane.bias[t];
            if (value > 0 != lane.values[t] > 0) {
                return false;
            }
            double reach = CLEAR * lane.targets[t].steepness(ahead, n) * n * h;
            if (!(Math.abs(value) + Math.abs(lane.values[t]) > reach) && !even(lane, t, value, n, h)) {
                return false;
            }
        }
        return true;
    }

    /** Whether a target changed so evenly over a step, and so little or so steadily, that it had no zero. */
    private boolean even(Lane<?> lane, int t, double value, double n, double h) {
        double before = lane.slopes[t];
        double after = lane.targets[t].rate(ahead, n);
        double most = h * Math.max(Math.abs(before), Math.abs(after));
        double surprise = value - lane.values[t] - 0.5 * h * (before + after);
        boolean steady = Math.abs(after - before) <= EVEN * Math.abs(before);
        return Math.abs(surprise) <= EVEN * most
                && (steady || Math.abs(value) + Math.abs(lane.values[t]) > CLEAR * most);
    }

    private boolean endRates(int i, IndexField field) {
        if (pair.last()) {
            rates(batch.endForce(0, i), batch.endForce(1, i), batch.endForce(2, i), batch.endForce(3, i), endRates);
            return true;
        }
        if (!flow.sample(field, ahead[0], ahead[1], ahead[2], Order.GRADIENT)) {
            return false;
        }
        samples[i]++;
        rates(flow.samples().gx[0], flow.samples().gy[0], flow.samples().gz[0], flow.samples().value[0], endRates);
        return true;
    }

    private static void rates(double fx, double fy, double fz, double e, double[] out) {
        double n = Math.sqrt(1 + e);
        out[0] = fx;
        out[1] = fy;
        out[2] = fz;
        out[3] = n * e / (1 + n);
        out[4] = n;
    }

    /** Looks at a step that was to land: good enough, or to be corrected, or too hard. */
    private void landed(Lane<?> lane, int i, double h) {
        Target target = lane.targets[lane.landing];
        double n = Math.sqrt(square(ahead[3]) + square(ahead[4]) + square(ahead[5]));
        double value = target.value(ahead) + lane.bias[lane.landing];
        if (lane.guessed && !clear(lane, h)) {
            wary(lane, i);
            return;
        }
        double dt = -value
                / (target.needsForce()
                        ? target.rate(ahead, n, batch.startForce(0, i), batch.startForce(1, i), batch.startForce(2, i))
                        : target.rate(ahead, n));
        if (Math.abs(dt) * n <= NEAR * scale) {
            return;
        }
        lane.rounds++;
        if (lane.guessed && !(Math.abs(dt) <= 0.1 * h)) {
            wary(lane, i);
            return;
        }
        if (lane.rounds > LANDING_ROUNDS || !(Math.abs(dt) <= 0.1 * h)) {
            giveUp(lane, i);
            return;
        }
        batch.steps()[i] = h + dt;
        batch.refuse(i);
    }

    /** Takes the step back and leaves the rest of the way to the engine for one ray. */
    private void giveUp(Lane<?> lane, int i) {
        lane.rounds = LANDING_ROUNDS + 1;
        batch.refuse(i);
    }

    /** Gives a guess up: the step is made again, and beyond what is near. */
    private void wary(Lane<?> lane, int i) {
        lane.wary = true;
        lane.guessed = false;
        lane.landing = -1;
        lane.rounds = 0;
        batch.refuse(i);
    }

    /** What becomes of a lane after a step: what it has met, or that it goes on. */
    private int after(Lane<?> lane, int i, IndexField field) {
        double h = batch.steps()[i];
        double n = batch.start().index(i);
        if (lane.rounds > LANDING_ROUNDS) {
            return alone(lane, i, field);
        }
        if (!batch.good(i)) {
            if (batch.refused(i)) {
                return GOES_ON;
            }
            // undefined places and steps that cannot be kept are rare enough for the engine that knows about them
            lane.wanted = h * batch.growth(i);
            lane.landing = -1;
            boolean hopeless = batch.undefined(i)
                    || ++lane.steps > NystromPropagator.MOST_STEPS
                    || !(lane.wanted * n > NystromPropagator.SHORTEST * scale);
            return hopeless ? alone(lane, i, field) : GOES_ON;
        }
        lane.tau += h;
        lane.errors += batch.localError(i);
        if (lane.landing >= 0) {
            return land(lane, i, field);
        }
        gather(lane, i, batch.start(), lane.tau, now);
        for (int t = 0; t < lane.targets.length; t++) {
            lane.values[t] = lane.targets[t].value(now) + lane.bias[t];
        }
        boolean aimed = h < lane.wanted;
        double grown = h * batch.growth(i);
        lane.wanted =
                Math.min(aimed ? Math.max(lane.wanted, grown) : grown, stride * NystromPropagator.LONGEST * scale / n);
        return ++lane.steps > NystromPropagator.MOST_STEPS ? alone(lane, i, field) : GOES_ON;
    }

    /** The state of a lane into that of its ray: where it is, or was at the start of the step just made. */
    private static void unload(Lane<?> lane, int i, RayBatch.Rays rays, double tau) {
        gather(lane, i, rays, tau, lane.leg.state());
        rays.columns(lane.leg.state(), 0, i);
    }

    /** The last trifle onto the target, by a short series. */
    private int land(Lane<?> lane, int i, IndexField field) {
        unload(lane, i, batch.start(), lane.tau);
        double[] y = lane.leg.state();
        Target target = lane.targets[lane.landing];
        flow.polish(y, field, target, rate);
        double n = Math.sqrt(square(y[3]) + square(y[4]) + square(y[5]));
        boolean plain = target.accepts(y);
        for (int t = 0; t < lane.targets.length && plain; t++) {
            double value = lane.targets[t].value(y) + lane.bias[t];
            boolean passed = t != lane.landing
                    && value > 0 != lane.values[t] > 0
                    && Math.abs(value) > Departure.ON * scale * lane.targets[t].steepness(y, n);
            plain = !passed;
        }
        if (plain) {
            return lane.landing;
        }
        // two targets together: the engine for one ray sorts them out, from the start of the step
        unload(lane, i, batch.end(), lane.tau - batch.steps()[i]);
        return run(lane, field);
    }

    /** Leaves the rest of a lane's way to the engine for one ray. */
    private int alone(Lane<?> lane, int i, IndexField field) {
        unload(lane, i, batch.start(), lane.tau);
        return run(lane, field);
    }

    private int run(Lane<?> lane, IndexField field) {
        long before = alone.evaluations();
        double errorsBefore = alone.localErrors();
        int met = alone.advance(lane.leg.state(), field, lane.targets, noTrail);
        lane.leg.spent(alone.evaluations() - before, alone.localErrors() - errorsBefore);
        return met;
    }
}
