package org.stillpath.medium;

import java.util.Arrays;
import java.util.Optional;

/**
 * A table of values of one variable, joined by cubics. Immutable; evaluation allocates nothing and is exact to rounding
 * for the cubics, derivatives included.
 *
 * <p>Each cell keeps its four polynomial coefficients about its left knot: twice the memory of slopes alone, for half the
 * arithmetic in the innermost loop. A cell is found by bisection.
 *
 * <p>Usage: {@code int c = s.cell(u); s.value(c, u); s.slope(c, u); s.curvature(c, u)}.
 */
public final class Spline {
    /** Cell number below the first knot. */
    static final int BELOW = -1;

    private final double[] knots;
    private final double[] values;
    private final double[] coefficients;
    private final Interpolation interpolation;
    private final Beyond beyond;

    private Spline(double[] knots, double[] values, Interpolation interpolation, Beyond beyond) {
        this.knots = knots;
        this.values = values;
        this.interpolation = interpolation;
        this.beyond = beyond;
        this.coefficients = cells(knots, values, interpolation.slopes(knots, values));
    }

    /**
     * Joins a table.
     *
     * @param knots places, ascending, at least two
     * @param values values there, as many, finite
     */
    public static Spline of(double[] knots, double[] values, Interpolation interpolation, Beyond beyond) {
        if (knots.length < 2 || knots.length != values.length) {
            throw new IllegalArgumentException(
                    "a table needs two or more knots and as many values: " + knots.length + ", " + values.length);
        }
        for (int i = 0; i < knots.length; i++) {
            if (!Double.isFinite(values[i]) || !Double.isFinite(knots[i])) {
                throw new IllegalArgumentException("knots and values must be finite: " + knots[i] + ", " + values[i]);
            }
            if (i > 0 && !(knots[i] > knots[i - 1])) {
                throw new IllegalArgumentException(
                        "knots must ascend: " + knots[i - 1] + " is followed by " + knots[i]);
            }
        }
        return new Spline(knots.clone(), values.clone(), interpolation, beyond);
    }

    /** The same table joined by {@linkplain Interpolation#other another interpolant}; empty where two knots leave no choice. */
    Optional<Spline> joinedOtherwise() {
        return knots.length < 3
                ? Optional.empty()
                : Optional.of(new Spline(knots, values, interpolation.other(), beyond));
    }

    /** The knots (a copy). */
    public double[] knots() {
        return knots.clone();
    }

    /** The values at the knots (a copy). */
    public double[] values() {
        return values.clone();
    }

    /** How the values are joined. */
    public Interpolation interpolation() {
        return interpolation;
    }

    /** What happens outside the table. */
    public Beyond beyond() {
        return beyond;
    }

    /** First knot. */
    public double first() {
        return knots[0];
    }

    /** Last knot. */
    public double last() {
        return knots[knots.length - 1];
    }

    /** The cell that holds {@code u}: -1 below the table, the number of cells above it; a knot belongs to the cell that it starts, the last one to the last cell. */
    public int cell(double u) {
        int n = knots.length;
        if (u < knots[0]) {
            return BELOW;
        }
        if (u >= knots[n - 1]) {
            return u == knots[n - 1] ? n - 2 : n - 1;
        }
        int low = 0;
        int high = n - 1;
        while (high - low > 1) {
            int middle = (low + high) >>> 1;
            if (knots[middle] <= u) {
                low = middle;
            } else {
                high = middle;
            }
        }
        return low;
    }

    /**
     * The value at {@code u}, which lies in cell {@code cell}. Outside a table whose {@code beyond} is a fault the end
     * cubic goes on for one cell's width, so that an integrator may overstep; farther out it is NaN.
     */
    public double value(int cell, double u) {
        if (inside(cell)) {
            return cubic(cell, u);
        }
        double e = edge(cell);
        int c = end(cell);
        return switch (beyond) {
            case FAULT -> near(c, u) ? cubic(c, u) : Double.NaN;
            case HOLD -> cubic(c, e);
            case LINEAR -> cubic(c, e) + cubicSlope(c, e) * (u - e);
            case EXPONENTIAL -> cubic(c, e) * Math.exp(rate(c, e) * (u - e));
        };
    }

    /** The first derivative at {@code u}, which lies in cell {@code cell}. */
    public double slope(int cell, double u) {
        if (inside(cell)) {
            return cubicSlope(cell, u);
        }
        double e = edge(cell);
        int c = end(cell);
        return switch (beyond) {
            case FAULT -> near(c, u) ? cubicSlope(c, u) : Double.NaN;
            case HOLD -> 0;
            case LINEAR -> cubicSlope(c, e);
            case EXPONENTIAL -> cubicSlope(c, e) * Math.exp(rate(c, e) * (u - e));
        };
    }

    /** The second derivative at {@code u}, which lies in cell {@code cell}. */
    public double curvature(int cell, double u) {
        if (inside(cell)) {
            return cubicCurvature(cell, u);
        }
        double e = edge(cell);
        int c = end(cell);
        return switch (beyond) {
            case FAULT -> near(c, u) ? cubicCurvature(c, u) : Double.NaN;
            case HOLD, LINEAR -> 0;
            case EXPONENTIAL -> rate(c, e) * cubicSlope(c, e) * Math.exp(rate(c, e) * (u - e));
        };
    }

    /** The value at {@code u}. */
    public double value(double u) {
        return value(cell(u), u);
    }

    /**
     * The largest departure of the curve from the range of the two values at the ends of its cell: what a reader of the
     * table would not expect.
     */
    public Overshoot overshoot() {
        Overshoot worst = new Overshoot(0, 0, Double.NaN, Double.NaN);
        int count = 0;
        double range = Arrays.stream(values).max().orElse(0)
                - Arrays.stream(values).min().orElse(0);
        for (int c = 0; c < knots.length - 1; c++) {
            double low = Math.min(values[c], values[c + 1]);
            double high = Math.max(values[c], values[c + 1]);
            double here = 0;
            double place = Double.NaN;
            double a = 3 * coefficients[4 * c + 3];
            double b = 2 * coefficients[4 * c + 2];
            double d = coefficients[4 * c + 1];
            double root = Math.sqrt(b * b - 4 * a * d);
            // both roots of a t² + b t + d without cancellation; NaN where the slope never vanishes
            double q = -0.5 * (b + Math.copySign(root, b));
            for (double t : new double[] {q / a, d / q}) {
                double u = knots[c] + t;
                if (t > 0 && u < knots[c + 1]) {
                    double v = cubic(c, u);
                    double excess = Math.max(v - high, low - v);
                    if (excess > here) {
                        here = excess;
                        place = u;
                    }
                }
            }
            // a departure at the level of rounding is no news
            if (here > 1e-9 * range) {
                count++;
                if (here > worst.amount()) {
                    worst = new Overshoot(0, here, place, cubic(c, place));
                }
            }
        }
        return new Overshoot(count, worst.amount(), worst.place(), worst.value());
    }

    /**
     * Where a curve leaves the range of its data between two knots.
     *
     * @param cells number of cells in which it does
     * @param amount by how much at most; 0 for none
     * @param place where that is; NaN for none
     * @param value the value there; NaN for none
     */
    public record Overshoot(int cells, double amount, double place, double value) {}

    private boolean inside(int cell) {
        return cell >= 0 && cell < knots.length - 1;
    }

    private double edge(int cell) {
        return cell < 0 ? knots[0] : knots[knots.length - 1];
    }

    private int end(int cell) {
        return cell < 0 ? 0 : knots.length - 2;
    }

    /** Whether a place outside lies within one width of the end cell {@code c} from the table. */
    private boolean near(int c, double u) {
        double h = knots[c + 1] - knots[c];
        return u >= knots[c] - h && u <= knots[c + 1] + h;
    }

    private double rate(int c, double e) {
        return cubicSlope(c, e) / cubic(c, e);
    }

    private double cubic(int c, double u) {
        double t = u - knots[c];
        int i = 4 * c;
        return coefficients[i] + t * (coefficients[i + 1] + t * (coefficients[i + 2] + t * coefficients[i + 3]));
    }

    private double cubicSlope(int c, double u) {
        double t = u - knots[c];
        int i = 4 * c;
        return coefficients[i + 1] + t * (2 * coefficients[i + 2] + t * 3 * coefficients[i + 3]);
    }

    private double cubicCurvature(int c, double u) {
        int i = 4 * c;
        return 2 * coefficients[i + 2] + 6 * (u - knots[c]) * coefficients[i + 3];
    }

    private static double[] cells(double[] u, double[] v, double[] s) {
        int n = u.length - 1;
        double[] k = new double[4 * n];
        for (int c = 0; c < n; c++) {
            double h = u[c + 1] - u[c];
            double d = (v[c + 1] - v[c]) / h;
            k[4 * c] = v[c];
            if (s.length == 0) {
                k[4 * c + 1] = d;
            } else {
                k[4 * c + 1] = s[c];
                k[4 * c + 2] = (3 * d - 2 * s[c] - s[c + 1]) / h;
                k[4 * c + 3] = (s[c] + s[c + 1] - 2 * d) / (h * h);
            }
        }
        return k;
    }
}
