package org.stillpath.ray;

import java.util.Arrays;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.medium.IndexField;

/**
 * Steps of many rays at once through one smooth field, by the pairs of {@link NystromPropagator}: each number of a state is a row
 * over the rays (lanes), each lane has its own step, and all work that depends on the place is done in loops over a row
 * ({@link Rows}, the field's own). Against a ray at a time this keeps the processor's vector units busy and spares the calls;
 * {@code RayBenchmark} holds the two against each other.
 *
 * <p>A lane's numbers do not depend on the lanes beside it. Besides place, momentum and Jacobi columns it carries ∫(n² − 1) dτ,
 * the optical length less τ, and if asked for, which costs a root a sample, ∫(n − 1) dτ, the length less τ. Mutable, one a thread; nothing is allocated once it is made.
 */
final class RayBatch {
    private static final double SAFETY = 0.9;
    private static final double LEAST_FACTOR = 0.1;
    private static final double MOST_FACTOR = 6;
    private static final long ONE = Double.doubleToRawLongBits(1);

    private final NystromPair pair;
    private final int components;
    private final Order order;
    private final double scale;
    private final double allowed;
    private final double shrink;

    private double[][] place;
    private double[][] slope;
    private double[] excess;
    private double[][] endPlace;
    private double[][] endSlope;
    private double[] endExcess;
    private final double[] h;
    private final Samples[] samples;
    /** Forces by component, then stage; the last component is n² − 1. */
    private final double[][][] k;

    private final double[][] at;
    private final double[] sum;
    private final double[] placeError;
    private final double[] slopeError;
    private final double[] error;
    private final double[] growth;
    private final Samples some;
    private final boolean lengths;
    private double[] stretch;
    private double[] endStretch;
    /** n − 1 by stage. */
    private final double[][] more;

    private int lanes;
    private long evaluations;

    /**
     * @param capacity most rays at a time
     * @param columns Jacobi columns
     * @param lengths whether ∫(n − 1) dτ is carried
     * @param tolerance as {@link NystromPropagator} takes it
     * @param scale length of the scene, metres
     */
    RayBatch(NystromPair pair, int capacity, int columns, boolean lengths, double tolerance, double scale) {
        this.pair = pair;
        this.lengths = lengths;
        this.stretch = new double[capacity];
        this.endStretch = new double[capacity];
        this.more = new double[pair.stages()][lengths ? capacity : 0];
        this.components = 3 + 3 * columns;
        this.order = columns > 0 ? Order.HESSIAN : Order.GRADIENT;
        this.scale = scale;
        this.allowed = NystromPropagator.estimateTolerance(tolerance, pair);
        this.shrink = -0.5 / (pair.lower() + 1);
        this.place = new double[components][capacity];
        this.slope = new double[components][capacity];
        this.excess = new double[capacity];
        this.endPlace = new double[components][capacity];
        this.endSlope = new double[components][capacity];
        this.endExcess = new double[capacity];
        this.h = new double[capacity];
        this.samples = new Samples[pair.stages()];
        this.some = new Samples(capacity);
        this.k = new double[components + 1][pair.stages()][];
        for (int s = 0; s < samples.length; s++) {
            samples[s] = new Samples(some);
            k[0][s] = samples[s].gx;
            k[1][s] = samples[s].gy;
            k[2][s] = samples[s].gz;
            for (int c = 3; c < components; c++) {
                k[c][s] = new double[capacity];
            }
            k[components][s] = samples[s].value;
        }
        this.at = new double[components][capacity];
        this.sum = new double[capacity];
        this.placeError = new double[capacity];
        this.slopeError = new double[capacity];
        this.error = new double[capacity];
        this.growth = new double[capacity];
    }

    /** Number of rays it holds. */
    int lanes() {
        return lanes;
    }

    /** Number of points at which fields were sampled so far. */
    long evaluations() {
        return evaluations;
    }

    /** Places by component, then lane; those of the columns follow. */
    double[][] place() {
        return place;
    }

    /** Momenta likewise. */
    double[][] slope() {
        return slope;
    }

    /** ∫(n² − 1) dτ by lane. */
    double[] excess() {
        return excess;
    }

    /** ∫(n − 1) dτ by lane, 0 if it is not carried. */
    double[] stretch() {
        return stretch;
    }

    /** The next steps by lane, to be set by the caller. */
    double[] steps() {
        return h;
    }

    /** What the step just made is to be multiplied with for the next one, or for a second try. */
    double growth(int lane) {
        return Math.min(Math.max(SAFETY * growth[lane], LEAST_FACTOR), MOST_FACTOR);
    }

    /** Whether the step just made by a lane is good enough; false also where the field was undefined. */
    boolean good(int lane) {
        return error[lane] <= 1;
    }

    /** Whether the field was undefined in the step just made by a lane. */
    boolean undefined(int lane) {
        return Double.isNaN(error[lane]);
    }

    /** Puts a ray into a lane; {@link #prepare} must follow. */
    void load(int lane, double[] state, int offset, double step) {
        for (int c = 0; c < 3; c++) {
            place[c][lane] = state[offset + c];
            slope[c][lane] = state[offset + 3 + c];
        }
        for (int c = 3, s = State.COLUMNS; c < components; c += 3, s += State.COLUMN) {
            for (int i = 0; i < 3; i++) {
                place[c + i][lane] = state[offset + s + i];
                slope[c + i][lane] = state[offset + s + 3 + i];
            }
        }
        excess[lane] = 0;
        stretch[lane] = 0;
        h[lane] = step;
        lanes = Math.max(lanes, lane + 1);
    }

    /** Moves the last lane into one that is no longer needed. */
    void drop(int lane) {
        lanes--;
        if (lane == lanes) {
            return;
        }
        for (int c = 0; c < components; c++) {
            place[c][lane] = place[c][lanes];
            slope[c][lane] = slope[c][lanes];
        }
        for (int c = 0; c <= components; c++) {
            k[c][0][lane] = k[c][0][lanes];
        }
        excess[lane] = excess[lanes];
        stretch[lane] = stretch[lanes];
        if (lengths) {
            more[0][lane] = more[0][lanes];
        }
        h[lane] = h[lanes];
        error[lane] = error[lanes];
        growth[lane] = growth[lanes];
    }

    /** Computes the rates at the start of some lanes that were just loaded. */
    void prepare(IndexField field, int[] fresh, int count) {
        if (!pair.last() || count == 0) {
            return;
        }
        for (int i = 0; i < count; i++) {
            for (int c = 0; c < 3; c++) {
                at[c][i] = place[c][fresh[i]];
            }
        }
        field.sample(at[0], at[1], at[2], count, order, some);
        evaluations += count;
        for (int i = 0; i < count; i++) {
            int lane = fresh[i];
            k[0][0][lane] = some.gx[i];
            k[1][0][lane] = some.gy[i];
            k[2][0][lane] = some.gz[i];
            k[components][0][lane] = some.value[i];
            if (lengths) {
                more[0][lane] = some.value[i] / (1 + Math.sqrt(1 + some.value[i]));
            }
            for (int c = 3; c < components; c += 3) {
                double x = place[c][lane];
                double y = place[c + 1][lane];
                double z = place[c + 2][lane];
                k[c][0][lane] = Math.fma(some.hxz[i], z, Math.fma(some.hxy[i], y, some.hxx[i] * x));
                k[c + 1][0][lane] = Math.fma(some.hyz[i], z, Math.fma(some.hyy[i], y, some.hxy[i] * x));
                k[c + 2][0][lane] = Math.fma(some.hzz[i], z, Math.fma(some.hyz[i], y, some.hxz[i] * x));
            }
        }
    }

    /** One step of all lanes, each as long as {@link #steps} says. {@link #settle} makes its end the new start. */
    void step(IndexField field) {
        int n = lanes;
        if (!pair.last()) {
            sample(field, place, 0, n);
        }
        int stages = pair.stages();
        for (int s = 1; s < stages; s++) {
            double[] a = pair.a()[s];
            int[] used = pair.used()[s];
            for (int c = 0; c < components; c++) {
                Rows.sum(a, used, k[c], n, sum);
                Rows.place(place[c], slope[c], sum, h, pair.c()[s], n, at[c]);
            }
            sample(field, at, s, n);
        }
        Arrays.fill(placeError, 0, n, 0);
        Arrays.fill(slopeError, 0, n, 0);
        for (int c = 0; c < components; c++) {
            // the last stage of such pairs stands where the step ends
            if (pair.last()) {
                System.arraycopy(at[c], 0, endPlace[c], 0, n);
            } else {
                Rows.sum(pair.b(), pair.inPlace(), k[c], n, sum);
                Rows.place(place[c], slope[c], sum, h, 1, n, endPlace[c]);
            }
            Rows.sum(pair.bp(), pair.inMomentum(), k[c], n, sum);
            Rows.slope(slope[c], sum, h, n, endSlope[c]);
            if (c < 3) {
                Rows.sum(pair.be(), pair.usedInPlace(), k[c], n, sum);
                Rows.addSquare(sum, 1 / (scale * allowed), n, placeError);
                Rows.sum(pair.bpe(), pair.usedInMomentum(), k[c], n, sum);
                Rows.addSquare(sum, 1 / allowed, n, slopeError);
            }
        }
        double[][] e = k[components];
        Rows.sum(pair.bp(), pair.inMomentum(), e, n, sum);
        Rows.slope(excess, sum, h, n, endExcess);
        Rows.sum(pair.bpe(), pair.usedInMomentum(), e, n, sum);
        Rows.addSquare(sum, 1 / (scale * allowed), n, slopeError);
        if (lengths) {
            Rows.sum(pair.bp(), pair.inMomentum(), more, n, sum);
            Rows.slope(stretch, sum, h, n, endStretch);
        }
        Rows.error(placeError, slopeError, h, n, error);
        for (int i = 0; i < n; i++) {
            // a power by the bits: a fraction of the binary logarithm, right to a percent, which is more than a step
            // needs
            long bits = Double.doubleToRawLongBits(error[i]) - ONE;
            growth[i] = Double.longBitsToDouble(ONE + (long) (shrink * bits));
        }
    }

    private void sample(IndexField field, double[][] where, int s, int n) {
        field.sample(where[0], where[1], where[2], n, order, samples[s]);
        evaluations += n;
        if (lengths && pair.bp()[s] != 0) {
            Rows.lessOne(samples[s].value, n, more[s]);
        }
        for (int c = 3; c < components; c += 3) {
            Rows.product(some.hxx, where[c], some.hxy, where[c + 1], some.hxz, where[c + 2], n, k[c][s]);
            Rows.product(some.hxy, where[c], some.hyy, where[c + 1], some.hyz, where[c + 2], n, k[c + 1][s]);
            Rows.product(some.hxz, where[c], some.hyz, where[c + 1], some.hzz, where[c + 2], n, k[c + 2][s]);
        }
    }

    /** Makes the ends of the step just made the new starts, but for lanes whose step was not good. */
    void settle() {
        double[][] keepPlace = place;
        double[][] keepSlope = slope;
        double[] keepExcess = excess;
        place = endPlace;
        slope = endSlope;
        excess = endExcess;
        endPlace = keepPlace;
        endSlope = keepSlope;
        endExcess = keepExcess;
        double[] keepStretch = stretch;
        stretch = endStretch;
        endStretch = keepStretch;
        int last = pair.stages() - 1;
        if (pair.last()) {
            Samples kept = samples[0];
            samples[0] = samples[last];
            samples[last] = kept;
            for (double[][] rows : k) {
                double[] row = rows[0];
                rows[0] = rows[last];
                rows[last] = row;
            }
            if (lengths) {
                // the last stage has no weight, so that its row was not filled
                Rows.lessOne(samples[0].value, lanes, more[last]);
                double[] row = more[0];
                more[0] = more[last];
                more[last] = row;
            }
        }
        for (int i = 0; i < lanes; i++) {
            if (!good(i)) {
                for (int c = 0; c < components; c++) {
                    place[c][i] = endPlace[c][i];
                    slope[c][i] = endSlope[c][i];
                }
                excess[i] = endExcess[i];
                stretch[i] = endStretch[i];
                for (int c = 0; c <= components && pair.last(); c++) {
                    k[c][0][i] = k[c][last][i];
                }
                if (lengths && pair.last()) {
                    more[0][i] = more[last][i];
                }
            }
        }
    }
}
