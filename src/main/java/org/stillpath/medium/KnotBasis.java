package org.stillpath.medium;

/**
 * Cubic B-splines on the knots of one axis of a grid, with the natural end conditions (second derivative 0). Immutable.
 *
 * <p>On n knots there are n + 2 B-splines; the two end conditions leave as many free coefficients as there are knots. The
 * knots are continued outward with the end spacing, which is one choice among many that span the same splines (de Boor,
 * <i>A Practical Guide to Splines</i>, ch. IX). Each cell keeps the polynomials of the four B-splines that live on it,
 * sixteen numbers, so that an evaluation needs no recursion.
 */
final class KnotBasis {
    private final double[] knots;
    /** By cell, by B-spline, by power of the distance from the cell's left knot. */
    private final double[] polynomials;
    // the tridiagonal system of the interpolation conditions, end conditions eliminated, factored
    private final double[] lower;
    private final double[] pivot;
    private final double[] upper;
    private final double[] firstEnd;
    private final double[] lastEnd;

    /**
     * The basis of some knots.
     *
     * @param knots ascending, at least two
     */
    KnotBasis(double[] knots) {
        int n = knots.length;
        if (n < 2) {
            throw new IllegalArgumentException("an axis needs two or more knots: " + n);
        }
        for (int i = 1; i < n; i++) {
            if (!(knots[i] > knots[i - 1])) {
                throw new IllegalArgumentException(
                        "knots must ascend: " + knots[i - 1] + " is followed by " + knots[i]);
            }
        }
        this.knots = knots.clone();
        this.polynomials = new double[16 * (n - 1)];
        double[] e = new double[n + 6];
        System.arraycopy(knots, 0, e, 3, n);
        for (int i = 1; i <= 3; i++) {
            e[3 - i] = knots[0] - i * (knots[1] - knots[0]);
            e[n + 2 + i] = knots[n - 1] + i * (knots[n - 1] - knots[n - 2]);
        }
        for (int c = 0; c < n - 1; c++) {
            fill(e, c);
        }
        // row i: coefficients of B-splines i, i+1, i+2 at knot i
        this.lower = new double[n];
        this.pivot = new double[n];
        this.upper = new double[n];
        for (int i = 0; i < n - 1; i++) {
            lower[i] = polynomials[16 * i];
            pivot[i] = polynomials[16 * i + 4];
            upper[i] = polynomials[16 * i + 8];
        }
        double h = knots[n - 1] - knots[n - 2];
        lower[n - 1] = value(n - 2, 1, h);
        pivot[n - 1] = value(n - 2, 2, h);
        upper[n - 1] = value(n - 2, 3, h);
        // second derivative 0 gives the outermost coefficient from its two neighbours
        double d0 = second(0, 0, 0);
        this.firstEnd = new double[] {-second(0, 1, 0) / d0, -second(0, 2, 0) / d0};
        double d3 = second(n - 2, 3, h);
        this.lastEnd = new double[] {-second(n - 2, 2, h) / d3, -second(n - 2, 1, h) / d3};
        pivot[0] += lower[0] * firstEnd[0];
        upper[0] += lower[0] * firstEnd[1];
        pivot[n - 1] += upper[n - 1] * lastEnd[0];
        lower[n - 1] += upper[n - 1] * lastEnd[1];
        for (int i = 1; i < n; i++) {
            lower[i] /= pivot[i - 1];
            pivot[i] -= lower[i] * upper[i - 1];
        }
    }

    /** Number of knots. */
    int count() {
        return knots.length;
    }

    /** The knots (a copy). */
    double[] knots() {
        return knots.clone();
    }

    double first() {
        return knots[0];
    }

    double last() {
        return knots[knots.length - 1];
    }

    /**
     * Turns values at the knots into coefficients, in place.
     *
     * @param line at 1 .. n the values; at 0 .. n + 1 the coefficients afterwards
     */
    void solve(double[] line) {
        int n = knots.length;
        for (int i = 1; i < n; i++) {
            line[i + 1] -= lower[i] * line[i];
        }
        line[n] /= pivot[n - 1];
        for (int i = n - 2; i >= 0; i--) {
            line[i + 1] = (line[i + 1] - upper[i] * line[i + 2]) / pivot[i];
        }
        line[0] = firstEnd[0] * line[1] + firstEnd[1] * line[2];
        line[n + 1] = lastEnd[0] * line[n] + lastEnd[1] * line[n - 1];
    }

    /** Whether {@code u} lies in cell {@code c}, its ends included. */
    boolean holds(int c, double u) {
        return u >= knots[c] && u <= knots[c + 1];
    }

    /** The cell of {@code u}, the nearest end cell for a place outside. */
    int cell(double u) {
        int low = 0;
        int high = knots.length - 1;
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

    /** Whether a place lies on the axis or within one width of the end cell from it. */
    boolean reaches(double u) {
        int n = knots.length;
        return u >= 2 * knots[0] - knots[1] && u <= 2 * knots[n - 1] - knots[n - 2];
    }

    /** The four B-splines of cell {@code c} at {@code u}, with first and second derivatives, from {@code at} on, 12 numbers. */
    void weights(int c, double u, double[] out, int at) {
        double t = u - knots[c];
        for (int b = 0; b < 4; b++) {
            int p = 16 * c + 4 * b;
            double p1 = polynomials[p + 1];
            double p2 = polynomials[p + 2];
            double p3 = polynomials[p + 3];
            out[at + b] = polynomials[p] + t * (p1 + t * (p2 + t * p3));
            out[at + 4 + b] = p1 + t * (2 * p2 + t * 3 * p3);
            out[at + 8 + b] = 2 * p2 + t * 6 * p3;
        }
    }

    private double value(int c, int b, double t) {
        int p = 16 * c + 4 * b;
        return polynomials[p] + t * (polynomials[p + 1] + t * (polynomials[p + 2] + t * polynomials[p + 3]));
    }

    private double second(int c, int b, double t) {
        int p = 16 * c + 4 * b;
        return 2 * polynomials[p + 2] + 6 * t * polynomials[p + 3];
    }

    /** The polynomials of cell {@code c} by the recursion of Cox and de Boor, on the continued knots {@code e}. */
    private void fill(double[] e, int c) {
        double origin = e[c + 3];
        double[][] now = {{0, 0, 0, 0}, {0, 0, 0, 0}, {0, 0, 0, 0}, {1, 0, 0, 0}, {0, 0, 0, 0}};
        // now[m] is the B-spline of the present order that starts at e[c + m]; only those on this cell are not 0
        for (int k = 2; k <= 4; k++) {
            double[][] next = new double[5][4];
            for (int m = 4 - k; m <= 3; m++) {
                double left = e[c + m];
                double rise = e[c + m + k - 1] - left;
                double right = e[c + m + k];
                double fall = right - e[c + m + 1];
                for (int q = 0; q < 4; q++) {
                    // (u - left)/rise · now[m] + (right - u)/fall · now[m + 1], with u = origin + t
                    double here = now[m][q] * (origin - left) / rise + now[m + 1][q] * (right - origin) / fall;
                    double raised = q == 0 ? 0 : now[m][q - 1] / rise - now[m + 1][q - 1] / fall;
                    next[m][q] = here + raised;
                }
            }
            now = next;
        }
        for (int b = 0; b < 4; b++) {
            System.arraycopy(now[b], 0, polynomials, 16 * c + 4 * b, 4);
        }
    }
}
