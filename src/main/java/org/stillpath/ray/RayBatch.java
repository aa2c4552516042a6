package org.stillpath.ray;

import java.util.Arrays;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.medium.IndexField;

/**
 * Steps of many rays at once through one smooth field, by the pairs of {@link NystromPropagator}: each number of a state is a row
 * over the rays (lanes), each lane has its own step, and all work that depends on the place is done in loops over a row
 * ({@link Rows}, the field's own). Against a ray at a time this keeps the processor's vector units busy and spares the calls;
 * {@code BundleBenchmark} holds the two against each other.
 *
 * <p>A lane's numbers do not depend on the lanes beside it. Besides place, momentum and Jacobi columns it carries ∫(n² − 1) dτ,
 * the optical length less τ, and if asked for, which costs a root a sample, ∫(n − 1) dτ, the length less τ.
 *
 * <p>Mutable, one a thread; nothing is allocated once it is made.
 */
final class RayBatch {
    private static final double REFUSED = Double.MAX_VALUE;
    private static final long ONE = Double.doubleToRawLongBits(1);

    /** Where rays are: rows over the lanes. */
    static final class Rays {
        /** Places by component; those of the columns follow. */
        final double[][] place;
        /** Momenta likewise. */
        final double[][] slope;
        /** ∫(n² − 1) dτ. */
        final double[] excess;
        /** ∫(n − 1) dτ, 0 if it is not carried. */
        final double[] stretch;

        private Rays(int components, int capacity) {
            place = new double[components][capacity];
            slope = new double[components][capacity];
            excess = new double[capacity];
            stretch = new double[capacity];
        }

        /** Copies a lane of other rays into one of these. */
        private void copy(Rays other, int from, int to) {
            for (int c = 0; c < place.length; c++) {
                place[c][to] = other.place[c][from];
                slope[c][to] = other.slope[c][from];
            }
            excess[to] = other.excess[from];
            stretch[to] = other.stretch[from];
        }

        /** Length of a lane's momentum. */
        double index(int lane) {
            double x = slope[0][lane];
            double y = slope[1][lane];
            double z = slope[2][lane];
            return Math.sqrt(x * x + y * y + z * z);
        }

        /** Copies the columns of a lane into a state that begins at {@code offset}. */
        void columns(double[] state, int offset, int lane) {
            for (int s = offset + State.COLUMNS, c = 3; c < place.length; s += State.COLUMN, c += 3) {
                for (int i = 0; i < 3; i++) {
                    state[s + i] = place[c + i][lane];
                    state[s + 3 + i] = slope[c + i][lane];
                }
            }
        }

        /** Copies place and momentum of a lane likewise. */
        void ray(double[] state, int offset, int lane) {
            for (int i = 0; i < 3; i++) {
                state[offset + i] = place[i][lane];
                state[offset + 3 + i] = slope[i][lane];
            }
        }
    }

    private final NystromPair pair;
    private final int components;
    private final Order order;
    private final double scale;
    private final double allowed;
    private final double shrink;
    private final double caution;

    private Rays start;
    private Rays end;
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
        this.more = new double[pair.stages()][lengths ? capacity : 0];
        this.components = 3 + 3 * columns;
        this.order = columns > 0 ? Order.HESSIAN : Order.GRADIENT;
        this.scale = scale;
        this.allowed = NystromPropagator.estimateTolerance(tolerance, pair);
        this.caution = NystromPropagator.CAUTION * tolerance;
        this.shrink = -0.5 / (pair.lower() + 1);
        this.start = new Rays(components, capacity);
        this.end = new Rays(components, capacity);
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

    /** Where the rays are. */
    Rays start() {
        return start;
    }

    /** Where the step just made ends; after {@link #settle}, where it started. */
    Rays end() {
        return end;
    }

    /** A component of the force at the start of the step just made; component 3 is n² − 1. */
    double startForce(int component, int lane) {
        return k[component < 3 ? component : components][0][lane];
    }

    /** The same at its end, where the pair has its last stage there. */
    double endForce(int component, int lane) {
        return k[component < 3 ? component : components][pair.stages() - 1][lane];
    }

    /** The next steps by lane, to be set by the caller. */
    double[] steps() {
        return h;
    }

    /** What the step just made is to be multiplied with for the next one, or for a second try. */
    double growth(int lane) {
        return NystromPropagator.held(growth[lane]);
    }

    /** Whether the step just made by a lane is good enough; false also where the field was undefined. */
    boolean good(int lane) {
        return error[lane] <= 1;
    }

    /** Takes the step just made by a lane back, whatever its error. */
    void refuse(int lane) {
        error[lane] = REFUSED;
    }

    /** Whether it was taken back. */
    boolean refused(int lane) {
        return error[lane] == REFUSED;
    }

    /** The local error that the step just made by a lane is estimated to have, as a fraction of the scale. */
    double localError(int lane) {
        double part = 1 / growth[lane];
        double power = part;
        for (int i = 0; i < pair.order(); i++) {
            power *= part;
        }
        return caution * power;
    }

    /** Whether the field was undefined in the step just made by a lane. */
    boolean undefined(int lane) {
        return Double.isNaN(error[lane]);
    }

    /** Puts a ray into a lane; {@link #prepare} must follow. */
    void load(int lane, double[] state, int offset, double step) {
        for (int c = 0; c < 3; c++) {
            start.place[c][lane] = state[offset + c];
            start.slope[c][lane] = state[offset + 3 + c];
        }
        for (int c = 3, s = State.COLUMNS; c < components; c += 3, s += State.COLUMN) {
            for (int i = 0; i < 3; i++) {
                start.place[c + i][lane] = state[offset + s + i];
                start.slope[c + i][lane] = state[offset + s + 3 + i];
            }
        }
        start.excess[lane] = 0;
        start.stretch[lane] = 0;
        h[lane] = step;
        lanes = Math.max(lanes, lane + 1);
    }

    /** Moves the last lane into one that is no longer needed. */
    void drop(int lane) {
        lanes--;
        if (lane == lanes) {
            return;
        }
        start.copy(start, lanes, lane);
        for (int c = 0; c <= components; c++) {
            k[c][0][lane] = k[c][0][lanes];
        }
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
        for (int c = 0; c < components; c++) {
            for (int i = 0; i < count; i++) {
                at[c][i] = start.place[c][fresh[i]];
            }
        }
        field.sample(at[0], at[1], at[2], count, order, some);
        evaluations += count;
        scatter(some.gx, fresh, count, k[0][0]);
        scatter(some.gy, fresh, count, k[1][0]);
        scatter(some.gz, fresh, count, k[2][0]);
        scatter(some.value, fresh, count, k[components][0]);
        if (lengths) {
            Rows.lessOne(some.value, count, sum);
            scatter(sum, fresh, count, more[0]);
        }
        for (int c = 3; c < components; c++) {
            bend(c, at, count, sum);
            scatter(sum, fresh, count, k[c][0]);
        }
    }

    private static void scatter(double[] from, int[] lanes, int count, double[] to) {
        for (int i = 0; i < count; i++) {
            to[lanes[i]] = from[i];
        }
    }

    /** The rate of a component of a column: its row of the Hessian sampled last, times the column. */
    private void bend(int component, double[][] where, int n, double[] out) {
        int first = component - component % 3;
        double[] x = where[first];
        double[] y = where[first + 1];
        double[] z = where[first + 2];
        switch (component % 3) {
            case 0 -> Rows.product(some.hxx, x, some.hxy, y, some.hxz, z, n, out);
            case 1 -> Rows.product(some.hxy, x, some.hyy, y, some.hyz, z, n, out);
            default -> Rows.product(some.hxz, x, some.hyz, y, some.hzz, z, n, out);
        }
    }

    /** One step of all lanes, each as long as {@link #steps} says. {@link #settle} makes its end the new start. */
    void step(IndexField field) {
        int n = lanes;
        if (!pair.last()) {
            sample(field, start.place, 0, n);
        }
        int stages = pair.stages();
        for (int s = 1; s < stages; s++) {
            double[] a = pair.a()[s];
            int[] used = pair.used()[s];
            for (int c = 0; c < components; c++) {
                Rows.sum(a, used, k[c], n, sum);
                Rows.place(start.place[c], start.slope[c], sum, h, pair.c()[s], n, at[c]);
            }
            sample(field, at, s, n);
        }
        Arrays.fill(placeError, 0, n, 0);
        Arrays.fill(slopeError, 0, n, 0);
        for (int c = 0; c < components; c++) {
            // the last stage of such pairs stands where the step ends
            if (pair.last()) {
                System.arraycopy(at[c], 0, end.place[c], 0, n);
            } else {
                Rows.sum(pair.b(), pair.inPlace(), k[c], n, sum);
                Rows.place(start.place[c], start.slope[c], sum, h, 1, n, end.place[c]);
            }
            Rows.sum(pair.bp(), pair.inMomentum(), k[c], n, sum);
            Rows.slope(start.slope[c], sum, h, n, end.slope[c]);
            if (c < 3) {
                Rows.sum(pair.be(), pair.usedInPlace(), k[c], n, sum);
                Rows.addSquare(sum, 1 / (scale * allowed), n, placeError);
                Rows.sum(pair.bpe(), pair.usedInMomentum(), k[c], n, sum);
                Rows.addSquare(sum, 1 / allowed, n, slopeError);
            }
        }
        double[][] e = k[components];
        Rows.sum(pair.bp(), pair.inMomentum(), e, n, sum);
        Rows.slope(start.excess, sum, h, n, end.excess);
        Rows.sum(pair.bpe(), pair.usedInMomentum(), e, n, sum);
        Rows.addSquare(sum, 1 / (scale * allowed), n, slopeError);
        if (lengths) {
            Rows.sum(pair.bp(), pair.inMomentum(), more, n, sum);
            Rows.slope(start.stretch, sum, h, n, end.stretch);
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
        for (int c = 3; c < components; c++) {
            bend(c, where, n, k[c][s]);
        }
    }

    /** Makes the ends of the step just made the new starts, but for lanes whose step was not good. */
    void settle() {
        Rays ended = end;
        end = start;
        start = ended;
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
                start.copy(end, i, i);
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
