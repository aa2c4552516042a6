package org.stillpath.medium;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;

/**
 * The solution of the hydrostatic equation d ln p/dh = f(h, p) as a table of polynomials, relative error about 1e-14.
 *
 * <p>Each piece of height holds ln(p/p₀) as a Chebyshev polynomial of degree up to 17: f is taken at 17 Chebyshev points,
 * integrated term by term, and taken again with the new pressure until nothing changes (Picard; Clenshaw and Curtis,
 * Numer. Math. 2 (1960) 197). A piece is halved until the last coefficients no longer count. Against a Runge-Kutta method
 * with an interpolant this costs a few more evaluations once, and gives a representation that is as accurate between its
 * points as at them.
 *
 * <p>Pieces are solved from the given height outward as far as they are asked for, since a sight of some kilometres needs the
 * lowest few hundred metres of 120 km. Each follows from those before it alone, so that no digit depends on what was asked
 * earlier, or by which thread. Where the pressure ends is told by blocks that double with the distance from the given height:
 * within the block of the height that is asked about, for the same reason.
 *
 * <p>Pieces are short near the datum and near the height where the pressure was given, where thin layers lie, and
 * longer with the distance from both, a fifth of it, at most 2 km. A bump of the temperature much thinner than a twentieth of
 * that distance may be stepped over (a step of it is not): one of 4 K and 5 m weighs 1e-5 in the pressure above it.
 */
final class HydrostaticTable {
    /** Lowest height that is tried, metres. */
    static final double LOWEST = -12e3;
    /** Highest height that is tried, metres. */
    static final double HIGHEST = 120e3;

    /** Distance from the given height that the first blocks reach to, metres: what a sight over some kilometres asks for. */
    private static final double BLOCK = 128;

    private static final int DEGREE = 16;
    private static final double SHORTEST_USUAL = 0.2;
    private static final double LONGEST = 2e3;
    private static final double TOLERANCE = 2e-16;
    private static final int MOST_PIECES = 20_000;
    private static final double COLDEST = 1;
    private static final double HOTTEST = 1e4;
    /** cos(π j k/DEGREE). */
    private static final double[][] COSINES = cosines();

    private static final double[][] FROM_LOW = integrals(true);
    private static final double[][] FROM_HIGH = integrals(false);

    /** What the equation is. */
    interface Rate {
        /** Whether the rate depends on the pressure, so that it must be asked again once that is better known. */
        boolean coupled();

        /**
         * Takes up heights, metres: what does not depend on the pressure is worked out here, once for all turns.
         */
        void over(double[] heights);

        /**
         * Fills d ln p/dh at the heights taken up last; NaN where nothing is known.
         *
         * @param pressures pascal
         * @param rates receives 1/m
         */
        void at(double[] pressures, double[] rates);
    }

    /**
     * What is solved so far. Immutable, so that it is read without a lock.
     *
     * @param ends ends of the pieces, ascending, one more than pieces
     * @param bases pressure at the end of a piece that lies nearer to where it was given
     * @param coefficients Chebyshev coefficients of ln(p/base), a piece behind the other
     * @param starts where each piece's begin, and where the last one's end
     * @param noLower whether nothing is known below
     * @param noHigher whether nothing is known above
     */
    @SuppressWarnings("ArrayRecordComponent") // never leaves this class
    private record Solved(
            double[] ends, double[] bases, double[] coefficients, int[] starts, boolean noLower, boolean noHigher) {
        static Solved of(March downward, March upward) {
            List<Piece> down = downward.pieces;
            List<Piece> up = upward.pieces;
            int below = down.size();
            int n = below + up.size();
            double[] ends = new double[n + 1];
            double[] bases = new double[n];
            int[] starts = new int[n + 1];
            ends[0] = downward.at;
            for (int i = 0; i < n; i++) {
                Piece piece = i < below ? down.get(below - 1 - i) : up.get(i - below);
                ends[i + 1] = piece.high();
                bases[i] = piece.base();
                starts[i + 1] = starts[i] + piece.coefficients().length;
            }
            double[] coefficients = new double[starts[n]];
            for (int i = 0; i < n; i++) {
                double[] c = (i < below ? down.get(below - 1 - i) : up.get(i - below)).coefficients();
                System.arraycopy(c, 0, coefficients, starts[i], c.length);
            }
            return new Solved(ends, bases, coefficients, starts, downward.ended, upward.ended);
        }

        double low() {
            return ends[0];
        }

        double high() {
            return ends[ends.length - 1];
        }

        boolean holds(double h) {
            return bases.length > 0 && h >= low() && h <= high();
        }

        double pressure(double h) {
            int i = 0;
            for (int above = bases.length; above - i > 1; ) {
                int middle = (i + above) >>> 1;
                if (ends[middle] <= h) {
                    i = middle;
                } else {
                    above = middle;
                }
            }
            double s = ((h - ends[i]) - (ends[i + 1] - h)) / (ends[i + 1] - ends[i]);
            double b1 = 0;
            double b2 = 0;
            for (int k = starts[i + 1] - 1; k > starts[i]; k--) {
                double b = 2 * s * b1 - b2 + coefficients[k];
                b2 = b1;
                b1 = b;
            }
            return bases[i] * Math.exp(s * b1 - b2 + coefficients[starts[i]]);
        }
    }

    private final double origin;
    /** Marches on where more is asked for; guarded by this. */
    private final Builder builder;

    private volatile Solved solved;

    private HydrostaticTable(double origin, Builder builder) {
        this.origin = origin;
        this.builder = builder;
        this.solved = Solved.of(builder.down, builder.up);
    }

    /** A piece while the table is built. */
    private record Piece(double low, double high, double base, double[] coefficients) {}

    /**
     * The solution from a height up and down, as far as the rate is known.
     *
     * @param rate the equation
     * @param pressure at {@code height}, pascal
     * @param height metres
     * @param breaks heights that pieces must not straddle, in any order
     */
    static HydrostaticTable of(Rate rate, double pressure, double height, double[] breaks) {
        return new HydrostaticTable(height, new Builder(rate, pressure, height, breaks));
    }

    /** Lowest height that it reaches, metres. Solves all that is below. */
    double low() {
        return until(LOWEST).low();
    }

    /** Highest height that it reaches, metres. Solves all that is above. */
    double high() {
        return until(HIGHEST).high();
    }

    /** Whether nothing follows from what was given: its first piece up and down is not known. */
    boolean isEmpty() {
        return until(origin + BLOCK).bases().length == 0
                && until(origin - BLOCK).bases().length == 0;
    }

    /** Number of pieces of all that it reaches. */
    int size() {
        until(LOWEST);
        return until(HIGHEST).bases().length;
    }

    /**
     * Where the pressure ends above or below a height: the end itself where it lies in the block of that height, otherwise
     * where heights are no longer tried. For margins, whose sign alone counts and whose size matters near the end alone.
     *
     * @param h metres
     * @param upper whether the end above is asked for
     */
    double end(double h, boolean upper) {
        double block = block(h);
        // on the other side of the given height the first block tells as much
        boolean same = h > origin == upper;
        double until = same ? block : block(upper ? origin + BLOCK : origin - BLOCK);
        Solved s = until(until);
        double end = upper ? s.high() : s.low();
        boolean ends = upper ? end < until : end > until;
        return ends ? end : upper ? HIGHEST : LOWEST;
    }

    /** The pressure in pascal; NaN outside the range. */
    double pressure(double h) {
        Solved s = solved;
        if (!s.holds(h)) {
            s = until(block(h));
        }
        return s.holds(h) ? s.pressure(h) : Double.NaN;
    }

    /** The far end of the block that a height lies in: {@link #BLOCK} from the given height, or twice, four times.. that. */
    private double block(double h) {
        double away = Math.abs(h - origin) / BLOCK;
        double size = BLOCK * (away > 1 ? Math.scalb(1.0, Math.getExponent(away) + 1) : 1);
        return h > origin ? Math.min(HIGHEST, origin + size) : Math.max(LOWEST, origin - size);
    }

    /** What is solved, at least up or down to a height where it gets there. */
    private Solved until(double h) {
        Solved s = solved;
        boolean there = h > origin ? s.high() >= h || s.noHigher() : s.low() <= h || s.noLower();
        if (there || Double.isNaN(h)) {
            return s;
        }
        synchronized (builder) {
            builder.march(h);
            s = Solved.of(builder.down, builder.up);
            solved = s;
            return s;
        }
    }

    /** One way from the given height. Mutable, of a builder. */
    private static final class March {
        final int direction;
        final List<Piece> pieces = new ArrayList<>();
        double at;
        double pressure;
        double width = SHORTEST_USUAL;
        /** Rate at the end of the last piece, for a first guess of the next; 0 where nothing is known. */
        double slope;
        /** Whether it goes no farther. */
        boolean ended;

        March(int direction, double at, double pressure) {
            this.direction = direction;
            this.at = at;
            this.pressure = pressure;
        }
    }

    /** Mutable, for one table. */
    private static final class Builder {
        private final Rate rate;
        private final double origin;
        private final double[] breaks;
        private final March up;
        private final March down;

        private double slope;
        private final double[] heights = new double[DEGREE + 1];
        private final double[] pressures = new double[DEGREE + 1];
        private final double[] rates = new double[DEGREE + 1];
        private final double[] terms = new double[DEGREE + 1];
        private final double[] integral = new double[DEGREE + 2];
        private boolean unsound;

        Builder(Rate rate, double pressure, double origin, double[] breaks) {
            this.rate = rate;
            this.origin = origin;
            this.breaks = breaks.clone();
            this.up = new March(1, origin, pressure);
            this.down = new March(-1, origin, pressure);
            Arrays.sort(this.breaks);
        }

        /** Adds pieces until one holds a height, or no more can be had. */
        void march(double until) {
            March m = until > origin ? up : down;
            int direction = m.direction;
            double last = direction > 0 ? HIGHEST : LOWEST;
            while (!m.ended && direction * (until - m.at) > 0) {
                double at = m.at;
                double size = Math.min(Math.abs(at), Math.abs(at - origin));
                double usual = Math.max(SHORTEST_USUAL, Math.min(LONGEST, 0.2 * size));
                double least = 1e-9 * (1 + Math.abs(at));
                m.width = Math.min(2 * m.width, usual);
                double end = next(at, direction, at + direction * m.width, last);
                slope = m.slope;
                boolean good = solve(at, end, m.pressure);
                while (!good && (unsound || m.pieces.size() < MOST_PIECES / 2) && Math.abs(end - at) > least) {
                    end = at + (end - at) / 2;
                    good = solve(at, end, m.pressure);
                }
                if (unsound) {
                    m.ended = true;
                    return;
                }
                m.width = Math.abs(end - at);
                m.slope = rates[direction > 0 ? 0 : DEGREE];
                m.pieces.add(new Piece(Math.min(at, end), Math.max(at, end), m.pressure, trimmed()));
                m.pressure *= Math.exp(sum(integral, direction > 0 ? 1 : -1));
                m.at = end;
                m.ended = direction * (last - end) <= 0 || m.pieces.size() >= MOST_PIECES;
            }
        }

        private double next(double at, int direction, double end, double last) {
            double nearest = direction > 0 ? Math.min(end, last) : Math.max(end, last);
            for (double b : breaks) {
                if (direction * (b - at) > 0 && direction * (nearest - b) > 0) {
                    nearest = b;
                }
            }
            return nearest;
        }

        /** Fills {@link #integral} with ln(p/known) between two heights; whether it is accurate enough. */
        private boolean solve(double known, double other, double p) {
            double low = Math.min(known, other);
            double high = Math.max(known, other);
            double half = (high - low) / 2;
            double middle = (high + low) / 2;
            for (int j = 0; j <= DEGREE; j++) {
                heights[j] = j == 0 ? high : j == DEGREE ? low : middle + half * COSINES[1][j];
                pressures[j] = rate.coupled() ? p * Math.exp(slope * (heights[j] - known)) : p;
            }
            rate.over(heights);
            double[][] integrals = known == low ? FROM_LOW : FROM_HIGH;
            double change = Double.POSITIVE_INFINITY;
            for (int turn = 0; turn < (rate.coupled() ? 30 : 1) && change > 4e-16 * p; turn++) {
                rate.at(pressures, rates);
                unsound = false;
                for (double r : rates) {
                    unsound |= !Double.isFinite(r);
                }
                if (unsound) {
                    return false;
                }
                change = 0;
                for (int j = 0; j <= DEGREE; j++) {
                    double[] row = integrals[j];
                    double y = 0;
                    for (int k = 0; k <= DEGREE; k++) {
                        y += row[k] * rates[k];
                    }
                    double fresh = p * Math.exp(half * y);
                    change = Math.max(change, Math.abs(fresh - pressures[j]));
                    pressures[j] = fresh;
                }
            }
            integrate(rates, half, known == low, terms, integral);
            double tail = Math.max(
                    Math.abs(terms[DEGREE]), Math.max(Math.abs(terms[DEGREE - 1]), Math.abs(terms[DEGREE - 2])));
            return half * tail / DEGREE <= TOLERANCE;
        }

        private double[] trimmed() {
            int n = DEGREE + 2;
            while (n > 2 && Math.abs(integral[n - 1]) < 1e-18) {
                n--;
            }
            return Arrays.copyOf(integral, n);
        }
    }

    private static double[][] cosines() {
        double[][] cosines = new double[DEGREE + 1][DEGREE + 1];
        for (int j = 0; j <= DEGREE; j++) {
            for (int k = 0; k <= DEGREE; k++) {
                cosines[j][k] = Math.cos(Math.PI * ((j * k) % (2 * DEGREE)) / DEGREE);
            }
        }
        return cosines;
    }

    /**
     * What each value at a Chebyshev point adds to the integral up to each of them, over -1..1: the way over the
     * coefficients once and for all, since every turn of every piece takes it.
     */
    private static double[][] integrals(boolean fromLow) {
        double[][] matrix = new double[DEGREE + 1][DEGREE + 1];
        double[] terms = new double[DEGREE + 1];
        double[] integral = new double[DEGREE + 2];
        for (int i = 0; i <= DEGREE; i++) {
            double[] one = new double[DEGREE + 1];
            one[i] = 1;
            integrate(one, 1, fromLow, terms, integral);
            for (int j = 0; j <= DEGREE; j++) {
                double y = integral[DEGREE + 1] * COSINES[1][j] * COSINES[DEGREE][j];
                for (int k = 0; k <= DEGREE; k++) {
                    y += integral[k] * COSINES[k][j];
                }
                matrix[j][i] = y;
            }
        }
        return matrix;
    }

    /** Chebyshev coefficients of values and of their integral from one end. */
    private static void integrate(double[] values, double half, boolean fromLow, double[] terms, double[] integral) {
        for (int k = 0; k <= DEGREE; k++) {
            double sum = 0.5 * (values[0] + values[DEGREE] * COSINES[k][DEGREE]);
            for (int j = 1; j < DEGREE; j++) {
                sum += values[j] * COSINES[k][j];
            }
            terms[k] = sum * (k == 0 || k == DEGREE ? 1.0 : 2.0) / DEGREE;
        }
        Arrays.fill(integral, 0);
        integral[1] = half * (terms[0] - terms[2] / 2);
        for (int k = 2; k <= DEGREE + 1; k++) {
            double above = k + 1 <= DEGREE ? terms[k + 1] : 0;
            integral[k] = half * (terms[k - 1] - above) / (2 * k);
        }
        integral[0] = -sum(integral, fromLow ? -1 : 1);
    }

    /** The value of an integral at an end, s = ±1. */
    private static double sum(double[] integral, int s) {
        double sum = 0;
        for (int k = DEGREE + 1; k >= 0; k--) {
            sum += s < 0 && k % 2 == 1 ? -integral[k] : integral[k];
        }
        return sum;
    }

    /** Whether a temperature is one that air may have, so that the equation goes on. */
    static boolean possible(double temperature) {
        return temperature >= COLDEST && temperature <= HOTTEST;
    }
}
