package org.stillpath.ray;

/**
 * The path of a ray within one accepted step, from the places, momenta and forces at its ends: a quintic for the place,
 * cubics for excess and length. Guesses where targets are met; whoever needs the place itself steps there again.
 */
final class StepPath {
    /** Parts in which a step is looked through for zeros. */
    private static final int PARTS = 8;

    private static final int ROOT_ROUNDS = 60;
    /** Share of the difference between quintic and cubic that the quintic is taken to be wrong by. */
    private static final double DOUBT = 0.05;

    private double[] start = new double[0];
    private double[] end = new double[0];
    private double[] startRates = new double[0];
    private double[] endRates = new double[0];
    private final double[] cubic = new double[5];
    private final double[] quartic = new double[3];
    private final double[] quintic = new double[3];
    private final double[] square = new double[2];
    private final double[] state = new double[State.COLUMNS];
    private double h;
    private double doubt;

    /** Takes note of a step's start: the state and its rates (force, d excess/dτ, d length/dτ, forces of the columns). */
    void begin(double[] from, double[] rates) {
        if (start.length != from.length) {
            start = new double[from.length];
            end = new double[from.length];
            startRates = new double[rates.length];
            endRates = new double[rates.length];
        }
        System.arraycopy(from, 0, start, 0, from.length);
        System.arraycopy(rates, 0, startRates, 0, rates.length);
    }

    /** Takes note of its end. */
    void finish(double[] to, double[] rates, double step) {
        System.arraycopy(to, 0, end, 0, to.length);
        System.arraycopy(rates, 0, endRates, 0, rates.length);
        h = step;
        double off = 0;
        for (int i = 0; i < 3; i++) {
            double d = end[i] - start[i] - h * (start[3 + i] + 0.5 * h * startRates[i]);
            double v = h * (end[3 + i] - start[3 + i] - h * startRates[i]);
            double w = 0.5 * h * h * (endRates[i] - startRates[i]);
            cubic[i] = 10 * d - 4 * v + w;
            quartic[i] = -15 * d + 7 * v - 2 * w;
            quintic[i] = 6 * d - 3 * v + w;
            off += Math.abs(quartic[i]) / 16 + Math.abs(quintic[i]) / 32;
        }
        doubt = DOUBT * off;
        for (int i = 0; i < 2; i++) {
            double d = end[State.EXCESS + i] - start[State.EXCESS + i];
            double a = h * startRates[3 + i];
            double b = h * endRates[3 + i];
            square[i] = 3 * d - 2 * a - b;
            cubic[3 + i] = -2 * d + a + b;
        }
    }

    /** The state at the step's start, not to be changed. */
    double[] start() {
        return start;
    }

    /** The state at the step's end, not to be changed. */
    double[] end() {
        return end;
    }

    /** The rates at the step's start, not to be changed. */
    double[] startRates() {
        return startRates;
    }

    /** The rates at the step's end, not to be changed. */
    double[] endRates() {
        return endRates;
    }

    /** The whole state with its columns at a parameter from 0 to the step's length. */
    void whole(double t, double[] out) {
        at(t, out);
        double u = t / h;
        for (int at = State.COLUMNS, c = 5; at < out.length; at += State.COLUMN, c += 3) {
            for (int i = 0; i < 3; i++) {
                double q0 = start[at + i];
                double p0 = start[at + 3 + i];
                double f0 = startRates[c + i];
                double d = end[at + i] - q0 - h * (p0 + 0.5 * h * f0);
                double v = h * (end[at + 3 + i] - p0 - h * f0);
                double w = 0.5 * h * h * (endRates[c + i] - f0);
                double c3 = 10 * d - 4 * v + w;
                double c4 = -15 * d + 7 * v - 2 * w;
                double c5 = 6 * d - 3 * v + w;
                out[at + i] = q0 + t * (p0 + 0.5 * t * f0) + u * u * u * (c3 + u * (c4 + u * c5));
                out[at + 3 + i] = p0 + t * f0 + u * u * (3 * c3 + u * (4 * c4 + u * 5 * c5)) / h;
            }
        }
    }

    /** Place, momentum, excess and length at a parameter from 0 to the step's length; columns are left as they are. */
    void at(double t, double[] out) {
        double u = t / h;
        for (int i = 0; i < 3; i++) {
            double c = cubic[i];
            double d = quartic[i];
            double e = quintic[i];
            out[i] = start[i] + t * (start[3 + i] + 0.5 * t * startRates[i]) + u * u * u * (c + u * (d + u * e));
            out[3 + i] = start[3 + i] + t * startRates[i] + u * u * (3 * c + u * (4 * d + u * 5 * e)) / h;
        }
        for (int i = 0; i < 2; i++) {
            out[State.EXCESS + i] =
                    start[State.EXCESS + i] + t * startRates[3 + i] + u * u * (square[i] + u * cubic[3 + i]);
        }
    }

    /**
     * The first accepted zero of a target, or a contact so close that only the ray itself can tell.
     *
     * @param bias added to the target's value
     * @param startValue the target's value, bias included, at the step's start
     * @param from where to begin, from 0 to the step's length; likewise {@code until}
     * @return its parameter; infinite if there is none
     */
    double firstZero(Target target, double bias, double startValue, double from, double until) {
        double length = end[State.LENGTH] - start[State.LENGTH];
        double steep = Math.max(target.steepness(start, startRates[4]), target.steepness(end, endRates[4]));
        double endValue = target.value(end) + bias;
        boolean farFromBoth = Math.abs(startValue) + Math.abs(endValue) > 2 * steep * length + doubt * steep;
        if (farFromBoth && startValue > 0 == endValue > 0) {
            return Double.POSITIVE_INFINITY;
        }
        double t0 = from;
        double v0 = from == 0 ? startValue : value(target, bias, from);
        double r0 = rate(target, from);
        for (int part = 1; part <= PARTS; part++) {
            double t1 = from + (until - from) * part / PARTS;
            double v1 = t1 == h ? endValue : value(target, bias, t1);
            double r1 = rate(target, t1);
            double root = Double.POSITIVE_INFINITY;
            if (v0 > 0 != v1 > 0) {
                root = zero(target, bias, t0, v0, t1, v1);
            } else if (r0 * v0 < 0 && r1 * v1 > 0) {
                double nearest = extremum(target, t0, r0, t1);
                double v = value(target, bias, nearest);
                if (v > 0 != v0 > 0) {
                    root = zero(target, bias, t0, v0, nearest, v);
                    if (!accepted(target, root)) {
                        root = zero(target, bias, nearest, v, t1, v1);
                    }
                } else if (Math.abs(v) <= doubt * steep) {
                    root = nearest;
                }
            }
            if (root <= until && accepted(target, root)) {
                return root;
            }
            t0 = t1;
            v0 = v1;
            r0 = r1;
        }
        return Double.POSITIVE_INFINITY;
    }

    private boolean accepted(Target target, double t) {
        at(t, state);
        return target.accepts(state);
    }

    private double value(Target target, double bias, double t) {
        at(t, state);
        return target.value(state) + bias;
    }

    private double rate(Target target, double t) {
        at(t, state);
        double u = t / h;
        return target.rate(
                state,
                Math.sqrt(state[3] * state[3] + state[4] * state[4] + state[5] * state[5]),
                (1 - u) * startRates[0] + u * endRates[0],
                (1 - u) * startRates[1] + u * endRates[1],
                (1 - u) * startRates[2] + u * endRates[2]);
    }

    /** Zero between two values of different sign: regula falsi with the Illinois change. */
    private double zero(Target target, double bias, double a, double va, double b, double vb) {
        double lo = a;
        double hi = b;
        double fLo = va;
        double fHi = vb;
        for (int round = 0; round < ROOT_ROUNDS && Math.abs(hi - lo) > 1e-13 * h; round++) {
            double t = hi - fHi * (hi - lo) / (fHi - fLo);
            if (!(t >= Math.min(lo, hi) && t <= Math.max(lo, hi))) {
                t = 0.5 * (lo + hi);
            }
            double v = value(target, bias, t);
            if (v == 0) {
                return t;
            }
            if (v > 0 == fHi > 0) {
                fLo *= 0.5;
            } else {
                lo = hi;
                fLo = fHi;
            }
            hi = t;
            fHi = v;
        }
        return hi;
    }

    /** Where the rate changes its sign, by bisection and secants on the interpolant. */
    private double extremum(Target target, double a, double ra, double b) {
        double lo = a;
        double hi = b;
        for (int round = 0; round < ROOT_ROUNDS && hi - lo > 1e-10 * h; round++) {
            double t = 0.5 * (lo + hi);
            if (rate(target, t) > 0 == ra > 0) {
                lo = t;
            } else {
                hi = t;
            }
        }
        return 0.5 * (lo + hi);
    }
}
