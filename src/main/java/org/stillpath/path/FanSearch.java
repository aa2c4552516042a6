package org.stillpath.path;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;

/**
 * Finds the launch angles at which a fan of rays meets a target: the zeros of a miss that is known with its derivative,
 * where it is defined at all.
 *
 * <p>Chosen against a uniform fan, which misses pairs of images, and against interval methods, which would need bounds of
 * the media's derivatives. Two neighbours of a fan with their derivatives give a cubic. An interval whose misses stay farther
 * from zero than they change is left; any other is halved until the cubic predicts its middle. Then a change of sign is one
 * zero, and a turning point that may reach zero is found by the sign of the derivative, so that a pair of nearly merged zeros
 * beside a caustic is seen and a near miss beyond it is not. Where the miss jumps or ends (edges, grazing rays, kinks)
 * intervals are halved to rounding, and a change of sign across the jump is no zero.
 *
 * <p>What lies between two angles of the first fan without showing at either, in the values or derivatives, is missed. Costs
 * the first fan, and some ten shots for a zero, forty for an end or a jump near zero.
 */
public final class FanSearch {
    /** Least width to which an interval is split, rad. */
    private static final double NARROWEST = 1e-13;

    /** How well a cubic must predict the middle, as a part of how much the misses change. */
    private static final double PREDICTED = 1e-2;
    /** The same where a change of sign with slopes of one sign at both ends is all there is to see. */
    private static final double PLAIN = 5e-2;
    /** Tolerance at which the fan is shot, and at which zeros are narrowed. */
    private static final double LOOSE = 3e-6;

    private static final double TIGHT = 1e-10;
    /** What a narrowed zero may miss by, as a part of the scale; what misses by more was a jump. */
    private static final double JUMP = 1e-5;

    private final Shooter shooter;
    private final double scale;
    private final double accuracy;
    private final List<Root> roots = new ArrayList<>();
    private final List<Shot> samples = new ArrayList<>();
    private int shots;

    /** Shoots one ray. */
    @FunctionalInterface
    public interface Shooter {
        /**
         * A ray and what it misses by.
         *
         * @param angle of the launch, rad
         * @param tolerance of the tracing, relative
         */
        Shot at(double angle, double tolerance);
    }

    /**
     * One ray of a fan. A ray may pass its target more than once: each passage is a branch of the miss.
     *
     * @param angle of the launch, rad
     * @param miss by branch, metres; NaN, or an array that is shorter, where the ray does not arrive
     * @param slope derivative of each miss over the angle, m/rad
     */
    public record Shot(double angle, double[] miss, double[] slope) {
        boolean arrives(int branch) {
            return branch < miss.length && !Double.isNaN(miss[branch]);
        }
    }

    /**
     * An angle at which the target is met, good to some 1e-7 of it.
     *
     * @param angle rad
     * @param branch that meets it, from 0
     * @param touching whether two zeros have merged to one within the resolution: the target lies on a caustic
     */
    public record Root(double angle, int branch, boolean touching) {}

    /**
     * What was found.
     *
     * @param roots by branch and angle
     * @param samples all shots of the fan and its refinement, by angle
     * @param shots number of rays shot
     */
    public record Outcome(List<Root> roots, List<Shot> samples, int shots) {
        public Outcome {
            roots = List.copyOf(roots);
            samples = List.copyOf(samples);
        }
    }

    private FanSearch(Shooter shooter, double scale, double accuracy) {
        this.shooter = shooter;
        this.scale = scale;
        this.accuracy = accuracy;
    }

    /**
     * Searches.
     *
     * @param shooter shoots the rays
     * @param angles of the first fan, ascending, rad
     * @param scale length that misses are compared with, metres
     * @param accuracy relative; zeros nearer to each other than its root are one
     */
    public static Outcome run(Shooter shooter, double[] angles, double scale, double accuracy) {
        FanSearch search = new FanSearch(shooter, scale, accuracy);
        List<Shot> fan = new ArrayList<>();
        int branches = 0;
        for (double angle : angles) {
            Shot shot = search.shoot(angle, LOOSE);
            fan.add(shot);
            branches = Math.max(branches, shot.miss.length);
        }
        for (int i = 1; i < fan.size(); i++) {
            for (int branch = 0; branch < branches; branch++) {
                search.interval(fan.get(i - 1), fan.get(i), branch);
            }
        }
        search.samples.sort(Comparator.comparingDouble(Shot::angle));
        search.roots.sort(Comparator.comparingInt(Root::branch).thenComparingDouble(Root::angle));
        return new Outcome(search.roots, search.samples, search.shots);
    }

    private Shot shoot(double angle, double tolerance) {
        shots++;
        Shot shot = shooter.at(angle, tolerance);
        samples.add(shot);
        return shot;
    }

    private void interval(Shot a, Shot b, int branch) {
        boolean here = a.arrives(branch);
        boolean there = b.arrives(branch);
        double h = b.angle - a.angle;
        if ((!here && !there) || h < NARROWEST || shots > PathSearch.MOST_SHOTS) {
            return;
        }
        double middle = 0.5 * (a.angle + b.angle);
        if (!here || !there) {
            Shot m = shoot(middle, LOOSE);
            interval(a, m, branch);
            interval(m, b, branch);
            return;
        }
        double ma = a.miss[branch];
        double mb = b.miss[branch];
        double sa = a.slope[branch] * h;
        double sb = b.slope[branch] * h;
        double swing = Math.abs(mb - ma) + Math.abs(sa) + Math.abs(sb);
        boolean crosses = ma > 0 != mb > 0;
        if (!crosses && Math.min(Math.abs(ma), Math.abs(mb)) > swing) {
            return;
        }
        Shot m = shoot(middle, LOOSE);
        // a plain crossing needs no more than to be one: the ends hold it while it is narrowed
        double allowed = crosses && sa > 0 == sb > 0 ? PLAIN : PREDICTED;
        double guess = 0.5 * (ma + mb) + 0.125 * (sa - sb);
        boolean smooth = m.arrives(branch) && Math.abs(m.miss[branch] - guess) <= allowed * swing + LOOSE * scale;
        if (smooth) {
            half(a, m, branch);
            half(m, b, branch);
        } else {
            interval(a, m, branch);
            interval(m, b, branch);
        }
    }

    /** An interval on which a cubic holds: a change of sign is one zero, a turning point between may be two. */
    private void half(Shot a, Shot b, int branch) {
        double ma = a.miss[branch];
        double mb = b.miss[branch];
        if (ma > 0 != mb > 0) {
            narrow(a, b, branch);
            return;
        }
        double sa = a.slope[branch];
        double sb = b.slope[branch];
        if (sa > 0 == sb > 0 || sa * ma > 0) {
            return;
        }
        double h = b.angle - a.angle;
        // the parabola with these slopes turns there
        double t = sa / (sa - sb);
        double turning = 0.5 * (ma + mb) + 0.125 * h * (sa - sb) - 0.5 * h * (sb - sa) * (t - 0.5) * (t - 0.5);
        double doubt = 3 * PREDICTED * (Math.abs(mb - ma) + h * (Math.abs(sa) + Math.abs(sb))) + 10 * LOOSE * scale;
        if (turning * ma > 0 && Math.abs(turning) > doubt) {
            return;
        }
        turn(a, b, branch);
    }

    /** Finds where the miss turns, by the sign of its derivative: two zeros beside it, one, or none. */
    private void turn(Shot a, Shot b, int branch) {
        double sign = Math.signum(a.miss[branch]);
        Shot low = a;
        Shot high = b;
        double lowSlope = a.slope[branch];
        double highSlope = b.slope[branch];
        Shot best = Math.abs(a.miss[branch]) < Math.abs(b.miss[branch]) ? a : b;
        for (int i = 0; i < 60 && high.angle - low.angle > NARROWEST; i++) {
            double share = Math.max(0.01, Math.min(0.99, lowSlope / (lowSlope - highSlope)));
            Shot m = shoot(low.angle + share * (high.angle - low.angle), TIGHT);
            if (!m.arrives(branch)) {
                return;
            }
            double miss = m.miss[branch];
            if (Math.signum(miss) != sign) {
                narrow(a, m, branch);
                narrow(m, b, branch);
                return;
            }
            best = Math.abs(miss) < Math.abs(best.miss[branch]) ? m : best;
            double slope = m.slope[branch];
            // Illinois: an end that stays loses half its weight
            if (slope > 0 == a.slope[branch] > 0) {
                low = m;
                lowSlope = slope;
                highSlope *= 0.5;
            } else {
                high = m;
                highSlope = slope;
                lowSlope *= 0.5;
            }
            double bend = Math.abs(b.slope[branch] - a.slope[branch]) / (b.angle - a.angle);
            boolean turned = slope * slope < 1e-4 * bend * Math.abs(miss);
            if (turned && Math.abs(miss) > accuracy * (scale + bend)) {
                return;
            }
        }
        double bend = Math.abs(b.slope[branch] - a.slope[branch]) / (b.angle - a.angle);
        // two zeros √accuracy apart have a turning point of bend · accuracy/8 between them
        if (Math.abs(best.miss[branch]) < accuracy * (0.1 * scale + 0.125 * bend)) {
            roots.add(new Root(best.angle, branch, true));
        }
    }

    /** Newton's method, held between the two ends of a change of sign. */
    private void narrow(Shot a, Shot b, int branch) {
        double low = a.angle;
        double high = b.angle;
        boolean sign = a.miss[branch] > 0;
        Shot best = Math.abs(a.miss[branch]) < Math.abs(b.miss[branch]) ? a : b;
        double t = best.angle - best.miss[branch] / best.slope[branch];
        for (int i = 0; i < 60; i++) {
            t = t > low && t < high ? t : 0.5 * (low + high);
            Shot m = shoot(t, TIGHT);
            if (!m.arrives(branch)) {
                return;
            }
            double miss = m.miss[branch];
            best = m;
            if (miss > 0 == sign) {
                low = t;
            } else {
                high = t;
            }
            double step = -miss / m.slope[branch];
            // where the miss is steep a small step is not yet a small miss
            boolean met = Math.abs(step) < 1e-9 * Math.min(1, b.angle - a.angle) && Math.abs(miss) < 10 * TIGHT * scale;
            if (met || high - low < NARROWEST) {
                break;
            }
            t += step;
        }
        if (Math.abs(best.miss[branch]) < JUMP * scale) {
            roots.add(new Root(best.angle, branch, false));
        }
    }
}
