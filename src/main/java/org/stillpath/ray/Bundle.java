package org.stillpath.ray;

import java.util.Arrays;
import org.stillpath.medium.IndexField;

/**
 * Follows many rays through one smooth field for a given parameter each, in batches whose lanes are filled again as rays end.
 * Rays are taken in the order given; what a ray gives does not depend on the others. Mutable, one a thread.
 */
public final class Bundle {
    /** Rays in a batch: rows of this length fill vector units and stay in the nearest cache. */
    private static final int LANES = 64;

    private final RayBatch batch;
    private final int width;
    private final double scale;
    private final double opening;
    private final int[] rays = new int[LANES];
    private final int[] fresh = new int[LANES];
    private final double[] left = new double[LANES];

    /**
     * @param columns Jacobi columns carried along, 0, 2 or 4
     * @param lengths whether geometric lengths are carried; optical lengths always are
     * @param tolerance error wanted at the end of a ray of usual length, as a fraction of the scale
     * @param scale length of the scene, metres
     */
    public Bundle(int columns, boolean lengths, double tolerance, double scale) {
        this(NystromPropagator.pairFor(tolerance), columns, lengths, tolerance, scale);
    }

    /** The same with a pair of one's own choice. */
    Bundle(NystromPair pair, int columns, boolean lengths, double tolerance, double scale) {
        this.batch = new RayBatch(pair, LANES, columns, lengths, tolerance, scale);
        this.width = State.size(columns);
        this.scale = scale;
        this.opening = NystromPropagator.LONGEST * scale * Math.min(1, NystromPropagator.opening(tolerance, pair));
    }

    /** Number of points at which fields were sampled so far. */
    public long evaluations() {
        return batch.evaluations();
    }

    /**
     * Follows rays.
     *
     * @param states {@link State}s one behind the other, from {@code first} on; advanced in place. The optical length of a state
     *     is right afterwards, its length and excess apart only if lengths are carried. A ray that comes upon a place where the
     *     field is undefined ends as NaN
     * @param tau dτ = ds/n to go, metres, positive
     * @param field smooth; {@link IndexField#forBundles} makes it quicker
     */
    public void follow(double[] states, int first, int count, double tau, IndexField field) {
        int next = 0;
        long steps = 0;
        while (batch.lanes() > 0 || next < count) {
            int filled = 0;
            while (batch.lanes() < LANES && next < count) {
                int lane = batch.lanes();
                int at = (first + next) * width;
                double n = Math.sqrt(states[at + 3] * states[at + 3]
                        + states[at + 4] * states[at + 4]
                        + states[at + 5] * states[at + 5]);
                batch.load(lane, states, at, portion(opening / n, tau));
                rays[lane] = first + next;
                left[lane] = tau;
                fresh[filled++] = lane;
                next++;
            }
            batch.prepare(field, fresh, filled);
            batch.step(field);
            batch.settle();
            steps++;
            for (int lane = batch.lanes() - 1; lane >= 0; lane--) {
                double h = batch.steps()[lane];
                if (batch.good(lane)) {
                    left[lane] -= h;
                    if (left[lane] <= 1e-15 * tau) {
                        end(lane, states, tau);
                        continue;
                    }
                }
                double n = batch.start().index(lane);
                double wanted = h * (batch.undefined(lane) ? 0.1 : batch.growth(lane));
                if (!(wanted * n > NystromPropagator.SHORTEST * scale) || steps > NystromPropagator.MOST_STEPS) {
                    Arrays.fill(states, rays[lane] * width, (rays[lane] + 1) * width, Double.NaN);
                    drop(lane);
                    continue;
                }
                batch.steps()[lane] = portion(Math.min(wanted, NystromPropagator.LONGEST * scale / n), left[lane]);
            }
        }
    }

    /** A step that leaves no crumbs: all that is left, or half of it, or as wanted. */
    private static double portion(double wanted, double left) {
        return wanted >= left ? left : 2 * wanted > left ? 0.5 * left : wanted;
    }

    private void end(int lane, double[] states, double tau) {
        int to = rays[lane] * width;
        RayBatch.Rays rays = batch.start();
        double stretch = rays.stretch[lane];
        rays.ray(states, to, lane);
        rays.columns(states, to, lane);
        states[to + State.EXCESS] += rays.excess[lane] - stretch;
        states[to + State.LENGTH] += tau + stretch;
        drop(lane);
    }

    private void drop(int lane) {
        batch.drop(lane);
        rays[lane] = rays[batch.lanes()];
        left[lane] = left[batch.lanes()];
    }
}
