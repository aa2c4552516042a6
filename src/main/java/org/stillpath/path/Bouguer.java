package org.stillpath.path;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Optional;
import org.apache.commons.math3.analysis.integration.gauss.GaussIntegratorFactory;
import org.apache.commons.math3.util.Pair;
import org.stillpath.medium.IndexField;

/**
 * The second method for sights through air that depends on the height alone: Bouguer's invariant n·r·cos e = C makes the
 * distance, the length and the optical length of a ray integrals over the height, from turning point to turning point:
 *
 * <p>θ = ∫ C dr/(r √(n²r² − C²)), L = ∫ n r dr/√(..), S = ∫ n² r dr/√(..), and for a star's refraction ∫ −(dn/n) cot e
 * (for example Smart, <i>Textbook on Spherical Astronomy</i>, ch. III). The root is taken of (nr − C)(nr + C) with nr − C
 * without differences of nearly equal numbers, and h = h_turn ± u² takes the singularity of a turning point away.
 *
 * <p>Quadrature is Commons Math's Gauss-Legendre rule, so that nothing numerical is shared with the ray engine that it checks.
 * Costs some hundred field samples a ray.
 */
public final class Bouguer {
    private static final int POINTS = 14;
    private static final int MOST_PARTS = 64;
    /**
     * Change of a half leg's distance, metres, at which its parts are no longer halved: a rule of 14 points gains eight digits
     * with each halving where it converges, so that the last sum is far better than this.
     */
    private static final double SETTLED = 1e-7;

    /** √0.6, the outer node of Gauss' rule of three points. */
    private static final double ROOT = Math.sqrt(0.6);

    private static final int MOST_TURNS = 200;
    /** Heights sampled a node: three of the climb to it, and itself. */
    private static final int STRIDE = 4;

    private static final double[] NODES;
    private static final double[] WEIGHTS;

    static {
        Pair<double[], double[]> rule = rule(POINTS);
        NODES = rule.getFirst();
        WEIGHTS = rule.getSecond();
    }

    private final HeightProfile air;
    private final double[] knots;
    private final double[] heights = new double[STRIDE * POINTS];
    private final double[] nu = new double[STRIDE * POINTS];
    private final double[] rise = new double[STRIDE * POINTS];

    private Bouguer(HeightProfile air, double[] knots) {
        this.air = air;
        this.knots = knots;
    }

    private static Pair<double[], double[]> rule(int points) {
        var g = new GaussIntegratorFactory().legendre(points);
        double[] nodes = new double[points];
        double[] weights = new double[points];
        for (int i = 0; i < points; i++) {
            nodes[i] = g.getPoint(i);
            weights[i] = g.getWeight(i);
        }
        return new Pair<>(nodes, weights);
    }

    /**
     * The integrals through a field.
     *
     * @param field in the frame of a sight
     * @param radius of the datum, metres; infinite for a flat earth
     * @return empty where the field depends on more than the height
     */
    public static Optional<Bouguer> of(IndexField field, double radius) {
        if (!field.ofHeightAlone()) {
            return Optional.empty();
        }
        return Optional.of(new Bouguer(new HeightProfile(field, radius, 0), HeightProfile.knots(field)));
    }

    /**
     * What a ray has passed.
     *
     * @param distance along the datum, metres
     * @param length metres
     * @param excess ∫ (n − 1) ds, metres
     */
    public record Passed(double distance, double length, double excess) {}

    /**
     * Follows a ray through given turning points to a height.
     *
     * @param from height of the start, metres
     * @param elevation of the launch, rad
     * @param turns about the heights at which the ray turns before its end, in order; they are refined
     * @param to height of the end, metres
     * @return empty where the ray cannot do this
     */
    public Optional<Passed> follow(double from, double elevation, double[] turns, double to) {
        if (turns.length > MOST_TURNS) {
            return Optional.empty();
        }
        double half = Math.sin(0.5 * elevation);
        // (C − n₁r₁)/(n₁r₁)
        double bend = -2 * half * half;
        double[] heights = new double[turns.length];
        for (int i = 0; i < turns.length; i++) {
            heights[i] = turn(from, bend, turns[i]);
            if (Double.isNaN(heights[i])) {
                return Optional.empty();
            }
        }
        double[] sums = new double[3];
        double at = from;
        boolean atTurn = false;
        for (int i = 0; i <= turns.length; i++) {
            double next = i < turns.length ? heights[i] : to;
            boolean toTurn = i < turns.length;
            leg(from, bend, at, atTurn, next, toTurn, sums);
            at = next;
            atTurn = toTurn;
        }
        return Double.isNaN(sums[0] + sums[1] + sums[2])
                ? Optional.empty()
                : Optional.of(new Passed(sums[0], sums[1], sums[2]));
    }

    /** The height at which n·r = C, near a guess; NaN where there is none. */
    private double turn(double from, double bend, double guess) {
        double h = guess;
        double unit = unit(from);
        for (int i = 0; i < 30; i++) {
            double f = air.lift(h, from) - bend;
            double slope = air.rise(h) / unit;
            double step = -f / slope;
            if (!(Math.abs(step) < 1e4)) {
                return Double.NaN;
            }
            h += step;
            if (Math.abs(step) < 4e-16 * (1 + Math.abs(h))) {
                return h;
            }
            if (i > 8 && Math.abs(step) < 1e-12 * (1 + Math.abs(h))) {
                return h;
            }
        }
        return Double.NaN;
    }

    /** n·r at the eye; n over a flat earth. */
    private double unit(double from) {
        double n = 1 + air.refractivity(from);
        return Double.isInfinite(air.radius()) ? n : n * (air.radius() + from);
    }

    /** Adds one leg of monotone height to distance, length and excess: each half about its own end. */
    private void leg(double from, double bend, double a, boolean aTurns, double b, boolean bTurns, double[] sums) {
        if (a == b) {
            return;
        }
        double middle = 0.5 * (a + b);
        half(from, bend, a, aTurns, middle, sums);
        half(from, bend, b, bTurns, middle, sums);
    }

    /**
     * Half a leg, from one end of it to its middle. Where the ray turns at the end, or would turn shortly beyond it, h = turn ±
     * u² makes the integrand smooth. nr − C is summed up from the end by a three-point rule on its own derivative: differences
     * of indices would leave their rounding, which a turning point magnifies.
     */
    private void half(double from, double bend, double end, boolean turns, double middle, double[] sums) {
        double away = middle - end;
        double turn = turns ? end : turn(from, bend, end);
        double gap = (end - turn) * Math.signum(away);
        boolean squared = turns || (gap >= 0 && gap < 100 * Math.abs(away));
        double first = squared ? Math.sqrt(Math.abs(end - turn)) : 0;
        double last = squared ? Math.sqrt(Math.abs(middle - turn)) : Math.abs(away);
        double sign = Math.signum(away);
        double[] cuts = Arrays.stream(knots)
                .filter(k -> (k - end) * sign > 0 && (middle - k) * sign > 0)
                .map(k -> squared ? Math.sqrt(Math.abs(k - turn)) : Math.abs(k - end))
                .sorted()
                .toArray();
        Way way = new Way(from, bend, end, turns, turn, squared, sign, first, last, cuts);
        double[] coarse = summed(way, 1);
        double[] fine = summed(way, 2);
        // a layer much thinner than the leg is only seen by short parts
        for (int parts = 4; parts <= MOST_PARTS && !(Math.abs(fine[0] - coarse[0]) <= SETTLED); parts *= 2) {
            coarse = fine;
            fine = summed(way, parts);
        }
        for (int i = 0; i < sums.length; i++) {
            sums[i] += fine[i];
        }
    }

    /** Half a leg as it is summed: from {@code first} to {@code last} in the variable that makes it smooth, cut at knots. */
    private record Way(
            double from,
            double bend,
            double end,
            boolean turns,
            double turn,
            boolean squared,
            double sign,
            double first,
            double last,
            double[] cuts) {}

    /** Distance, length and excess of half a leg, each piece between two cuts in so many parts. */
    private double[] summed(Way way, int parts) {
        double from = way.from;
        double bend = way.bend;
        double end = way.end;
        double turn = way.turn;
        boolean squared = way.squared;
        double sign = way.sign;
        double[] cuts = way.cuts;
        double[] sums = new double[3];
        double unit = unit(from);
        double nuFrom = air.refractivity(from);
        double over = way.turns ? 0 : end == from ? -bend : air.lift(end, from) - bend;
        double reached = end;
        double first = way.first;
        double last = way.last;
        double before = first;
        for (int c = 0; c <= cuts.length; c++) {
            double after = c < cuts.length ? cuts[c] : last;
            for (int p = 0; p < parts; p++) {
                double u0 = before + (after - before) * p / parts;
                double u1 = before + (after - before) * (p + 1) / parts;
                for (int i = 0; i < POINTS; i++) {
                    double u = 0.5 * (u0 + u1) + 0.5 * (u1 - u0) * NODES[i];
                    double h = squared ? turn + sign * u * u : end + sign * u;
                    ask(i, i == 0 ? reached : heights[STRIDE * i - STRIDE + 3], h);
                }
                air.refractivityAndRise(heights, STRIDE * POINTS, nu, rise);
                for (int i = 0; i < POINTS; i++) {
                    double u = 0.5 * (u0 + u1) + 0.5 * (u1 - u0) * NODES[i];
                    double h = heights[STRIDE * i + 3];
                    double w = 0.5 * (u1 - u0) * WEIGHTS[i] * (squared ? 2 * u : 1);
                    over += climb(i, reached, h) / unit;
                    reached = h;
                    add(from, bend, h, nu[STRIDE * i + 3], nuFrom, over, w, sums);
                }
            }
            if (c < cuts.length) {
                double knot = squared ? turn + sign * after * after : end + sign * after;
                ask(0, reached, knot);
                air.refractivityAndRise(heights, STRIDE, nu, rise);
                over += climb(0, reached, knot) / unit;
                reached = knot;
            }
            before = after;
        }
        return sums;
    }

    /** Puts the heights that a climb needs among those to be sampled, and its end behind them. */
    private void ask(int i, double a, double b) {
        double half = 0.5 * (b - a);
        double middle = 0.5 * (a + b);
        int at = STRIDE * i;
        heights[at] = middle - ROOT * half;
        heights[at + 1] = middle;
        heights[at + 2] = middle + ROOT * half;
        heights[at + 3] = b;
    }

    /** n·r at one height less that at another close by, from the samples that {@link #ask} asked for. */
    private double climb(int i, double a, double b) {
        int at = STRIDE * i;
        return 0.5 * (b - a) * (5 / 9.0 * (rise[at] + rise[at + 2]) + 8 / 9.0 * rise[at + 1]);
    }

    private void add(
            double from, double bend, double h, double nu, double nuFrom, double over, double w, double[] sums) {
        boolean flat = Double.isInfinite(air.radius());
        double nr = (1 + nu) * (flat ? 1 : (air.radius() + h) / (air.radius() + from)) / (1 + nuFrom);
        double root = Math.sqrt(over * (nr + 1 + bend));
        double spread = flat ? 1 : air.radius() / (air.radius() + h);
        // nr/root is 1/sin e
        sums[0] += w * spread * (1 + bend) / root;
        sums[1] += w * nr / root;
        sums[2] += w * nu * nr / root;
    }

    /**
     * A star's refraction: how much a ray turns from a height to the top of the air, rad. The integral −∫ (dn/n) cot e.
     *
     * @param from height of the eye, metres
     * @param elevation apparent, rad, 0 or above; a ray that turns below the eye is not treated
     * @param top height at which the air ends, metres
     * @return empty where the ray cannot do this
     */
    public Optional<Double> refraction(double from, double elevation, double top) {
        if (elevation < 0 || Double.isInfinite(air.radius())) {
            return Optional.empty();
        }
        double half = Math.sin(0.5 * elevation);
        double bend = -2 * half * half;
        List<Double> cuts = new ArrayList<>();
        cuts.add(0.0);
        for (double k : knots) {
            if (k > from && k < top) {
                cuts.add(Math.sqrt(k - from));
            }
        }
        cuts.add(Math.sqrt(top - from));
        double sum = 0;
        for (int c = 1; c < cuts.size(); c++) {
            int parts = 4;
            for (int p = 0; p < parts; p++) {
                double u0 = cuts.get(c - 1) + (cuts.get(c) - cuts.get(c - 1)) * p / parts;
                double u1 = cuts.get(c - 1) + (cuts.get(c) - cuts.get(c - 1)) * (p + 1) / parts;
                for (int i = 0; i < POINTS; i++) {
                    double u = 0.5 * (u0 + u1) + 0.5 * (u1 - u0) * NODES[i];
                    double h = from + u * u;
                    double w = 0.5 * (u1 - u0) * WEIGHTS[i] * 2 * u;
                    double n = 1 + air.refractivity(h);
                    double nr = (1 + air.lift(h, from));
                    double over = air.lift(h, from) - bend;
                    double cot = (1 + bend) / Math.sqrt(over * (nr + 1 + bend));
                    sum -= w * air.gradient(h) / n * cot;
                }
            }
        }
        return Double.isNaN(sum) ? Optional.empty() : Optional.of(sum);
    }
}
