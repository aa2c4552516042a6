package org.stillpath.ray;

import java.util.Arrays;
import org.stillpath.formula.Order;
import org.stillpath.medium.IndexField;

/**
 * Counts and locates the points along a ray that are conjugate to its start: where rays that leave the start in neighbouring
 * directions meet it again, each counted as often as there are such directions. Mutable, one a ray.
 *
 * <p>With the Jacobi fields (Q, P) across the ray that start at a point, a conjugate point is where Q is singular. P Q⁻¹ is
 * symmetric, an eigenvalue w jumps from −∞ to +∞ at each conjugate point, never the other way, since Q' = P. So the number between two places is the change of arg det(Q + i c P), less that of Σ arctan(c w), over −π (Morse's index
 * theorem in the form of Maslov and Arnold; Arnold, <i>Mathematical Methods of Classical Mechanics</i>, appendix 11). Watching
 * det Q for a change of sign would miss double points, as on the axis of every rod. A step is split until the argument turns
 * by less than 2 rad a part, so that no turn is lost.
 */
final class ConjugatePoints {
    private static final int DEEPEST = 40;
    private static final double MOST_TURN = 2;
    private static final double RESOLUTION = 1e-9;

    private final Flow flow = new Flow();
    private double[] lengths = new double[4];
    private int count;
    private double[] state = new double[0];
    private final Columns columns;

    ConjugatePoints(Columns columns) {
        this.columns = columns;
    }

    /** The ray's state within a step. */
    @FunctionalInterface
    interface Within {
        /** Fills a state with its columns at a parameter τ from the step's start. */
        void at(double t, double[] out);
    }

    /** What is compared at a place: det(Q + i c P) is made of Q and P, the eigenvalues of P Q⁻¹ of both. */
    private record Sample(double t, double length, double[] q, double[] p) {}

    /** Geometric lengths from the start at which conjugate points lie, ascending, each as often as it counts. */
    double[] lengths() {
        return Arrays.copyOf(lengths, count);
    }

    /** Number of samples that were taken of fields. */
    long evaluations() {
        return flow.evaluations();
    }

    /**
     * Looks through a part of a step.
     *
     * @param field the medium
     * @param within the states
     * @param from where the part begins; the very start of a ray does not count as a conjugate point of itself
     * @param to where it ends
     */
    void span(IndexField field, Within within, double from, double to, int size) {
        if (state.length != size) {
            state = new double[size];
        }
        span(field, within, sample(field, within, from), sample(field, within, to), 0, RESOLUTION * (to - from));
    }

    private void span(IndexField field, Within within, Sample a, Sample b, int depth, double least) {
        double scale = (size(a.q) + size(b.q)) / (size(a.p) + size(b.p));
        double[] da = determinant(a, scale);
        double[] db = determinant(b, scale);
        double turn = Math.atan2(db[1] * da[0] - db[0] * da[1], db[0] * da[0] + db[1] * da[1]);
        boolean coarse = Math.abs(turn) > MOST_TURN;
        int points = (int) Math.round((principal(b, scale) - principal(a, scale) - turn) / Math.PI);
        if (!coarse && points <= 0) {
            return;
        }
        if (depth < DEEPEST && b.t - a.t > least) {
            Sample middle = sample(field, within, 0.5 * (a.t + b.t));
            span(field, within, a, middle, depth + 1, least);
            span(field, within, middle, b, depth + 1, least);
            return;
        }
        for (int i = 0; i < points; i++) {
            if (count == lengths.length) {
                lengths = Arrays.copyOf(lengths, 2 * count);
            }
            lengths[count++] = b.length;
        }
    }

    private static double size(double[] m) {
        return Math.sqrt(m[0] * m[0] + m[1] * m[1] + m[2] * m[2] + m[3] * m[3]);
    }

    /** Real and imaginary part of det(Q + i c P). */
    private static double[] determinant(Sample s, double c) {
        double[] q = s.q;
        double[] p = s.p;
        double real = q[0] * q[3] - q[1] * q[2] - c * c * (p[0] * p[3] - p[1] * p[2]);
        double imaginary = c * (q[0] * p[3] + p[0] * q[3] - q[1] * p[2] - p[1] * q[2]);
        return new double[] {real, imaginary};
    }

    /** Σ arctan(c w) over the eigenvalues w of P Q⁻¹; +π/2 for each direction in which Q vanishes, as just behind it. */
    private double principal(Sample s, double c) {
        double[] q = s.q;
        double[] p = s.p;
        double det = q[0] * q[3] - q[1] * q[2];
        if (columns.planar()) {
            return q[0] == 0 ? Math.PI / 2 : Math.atan(c * p[0] / q[0]);
        }
        if (q[0] == 0 && q[1] == 0 && q[2] == 0 && q[3] == 0) {
            return Math.PI;
        }
        // P adj(Q) = det·W, symmetric up to rounding
        double a = p[0] * q[3] - p[1] * q[2];
        double b = p[1] * q[0] - p[0] * q[1];
        double b2 = p[2] * q[3] - p[3] * q[2];
        double d = p[3] * q[0] - p[2] * q[1];
        double mean = 0.5 * (a + d);
        double spread = Math.hypot(0.5 * (a - d), 0.5 * (b + b2));
        return angle(c * (mean + spread), det) + angle(c * (mean - spread), det);
    }

    private static double angle(double up, double det) {
        return det == 0 && up == 0 ? 0 : det == 0 ? Math.PI / 2 : Math.atan(up / det);
    }

    /** Q and P across the ray, row by row, from the last two columns: what of them runs along the ray is taken out along the flow. */
    private Sample sample(IndexField field, Within within, double t) {
        within.at(t, state);
        double n2 = state[3] * state[3] + state[4] * state[4] + state[5] * state[5];
        flow.sample(field, state[0], state[1], state[2], Order.GRADIENT);
        double[] f = {flow.samples().gx[0], flow.samples().gy[0], flow.samples().gz[0]};
        double[][] axes = columns.axes(state[3], state[4], state[5]);
        double[] q = new double[4];
        double[] p = new double[4];
        for (int c = 0; c < 2; c++) {
            int at = State.COLUMNS + State.COLUMN * (State.columns(state) - 2 + c);
            double along = (state[at] * state[3] + state[at + 1] * state[4] + state[at + 2] * state[5]) / n2;
            for (int r = 0; r < 2; r++) {
                for (int i = 0; i < 3; i++) {
                    q[2 * r + c] += axes[r][i] * (state[at + i] - along * state[3 + i]);
                    p[2 * r + c] += axes[r][i] * (state[at + 3 + i] - along * f[i]);
                }
            }
        }
        if (columns.planar()) {
            // a second direction that never comes back
            q = new double[] {q[0], 0, 0, Math.abs(q[0]) + Double.MIN_NORMAL};
            p = new double[] {p[0], 0, 0, 0};
        }
        return new Sample(t, state[State.LENGTH], q, p);
    }
}
