package org.stillpath.formula;

/**
 * Elementary functions of arrays, in loops that HotSpot turns into vector code: what needs the bits of a number, or a choice, is
 * kept in short loops of its own. The reductions and polynomials are those of fdlibm (Sun Microsystems, 1993), and for the
 * exponential the series itself; against the correctly rounded result the errors stay within an ulp and a half, which a test
 * shows. Arguments outside the ranges below go to {@link Math} one at a time.
 *
 * <p>A result depends on its argument alone, not on its neighbours or its place in the array. Arrays must be different ones.
 */
final class Elementary {
    private static final double LOG2_E = 1.4426950408889634;
    private static final double LN2_HIGH = 0x1.62e42fee00000p-1;
    private static final double LN2_LOW = 0x1.a39ef35793c76p-33;
    /** Added and taken away again, it rounds to a whole number. */
    private static final double ROUND = 0x1.8p52;
    /** Beyond this the exponential is not a normal number, or its scale is none. */
    private static final double LARGEST_EXPONENT = 700;

    private static final double TWO_OVER_PI = 0.6366197723675814;
    private static final double HALF_PI_1 = 0x1.921fb54400000p0;
    private static final double HALF_PI_2 = 0x1.0b4611a600000p-34;
    private static final double HALF_PI_3 = 0x1.3198a2e037073p-69;
    /** Up to here the reduction by three parts of π/2 keeps all digits. */
    private static final double LARGEST_ANGLE = 1e5;

    private Elementary() {}

    /** eˣ; {@code turns} and {@code rest} are scratch. */
    static void exp(double[] x, int count, double[] out, double[] turns, double[] rest) {
        for (int i = 0; i < count; i++) {
            turns[i] = Math.fma(x[i], LOG2_E, ROUND) - ROUND;
        }
        for (int i = 0; i < count; i++) {
            rest[i] = Math.fma(turns[i], -LN2_LOW, Math.fma(turns[i], -LN2_HIGH, x[i]));
        }
        for (int i = 0; i < count; i++) {
            double r = rest[i];
            double p = Math.fma(r, 1.0 / 6227020800.0, 1.0 / 479001600);
            p = Math.fma(r, p, 1.0 / 39916800);
            p = Math.fma(r, p, 1.0 / 3628800);
            p = Math.fma(r, p, 1.0 / 362880);
            out[i] = Math.fma(r, p, 1.0 / 40320);
        }
        for (int i = 0; i < count; i++) {
            double r = rest[i];
            double p = Math.fma(r, out[i], 1.0 / 5040);
            p = Math.fma(r, p, 1.0 / 720);
            p = Math.fma(r, p, 1.0 / 120);
            p = Math.fma(r, p, 1.0 / 24);
            out[i] = Math.fma(r, p, 1.0 / 6);
        }
        for (int i = 0; i < count; i++) {
            double r = rest[i];
            out[i] = 1 + Math.fma(r * r, Math.fma(r, out[i], 0.5), r);
        }
        for (int i = 0; i < count; i++) {
            out[i] = Math.abs(x[i]) <= LARGEST_EXPONENT
                    ? out[i] * Double.longBitsToDouble(((long) turns[i] + 1023) << 52)
                    : Math.exp(x[i]);
        }
    }

    /** ln x; {@code turns} and {@code rest} are scratch. */
    static void log(double[] x, int count, double[] out, double[] turns, double[] rest) {
        for (int i = 0; i < count; i++) {
            // m in √½ .. √2 with x = m 2ᵏ
            long bits = Double.doubleToRawLongBits(x[i]);
            long k = (bits - 0x3fe6a09e667f3bcdL) >> 52;
            turns[i] = k;
            rest[i] = Double.longBitsToDouble(bits - (k << 52)) - 1;
        }
        for (int i = 0; i < count; i++) {
            double f = rest[i];
            double s = f / (2 + f);
            double w = s * s;
            double p = Math.fma(w, 0.14798198605116586, 0.15313837699209373);
            p = Math.fma(w, p, 0.1818357216161805);
            p = Math.fma(w, p, 0.22222198432149784);
            out[i] = Math.fma(w, p, 0.2857142874366239);
        }
        for (int i = 0; i < count; i++) {
            double f = rest[i];
            double s = f / (2 + f);
            double w = s * s;
            double p = Math.fma(w, out[i], 0.3999999999940942);
            p = w * Math.fma(w, p, 0.6666666666666735);
            double half = 0.5 * f * f;
            double low = Math.fma(s, half + p, turns[i] * LN2_LOW);
            out[i] = Math.fma(turns[i], LN2_HIGH, f - (half - low));
        }
        for (int i = 0; i < count; i++) {
            if (!(x[i] >= Double.MIN_NORMAL && x[i] < Double.POSITIVE_INFINITY)) {
                out[i] = Math.log(x[i]);
            }
        }
    }

    /** sin x; {@code turns} and {@code rest} are scratch. */
    static void sin(double[] x, int count, double[] out, double[] turns, double[] rest) {
        circular(x, count, out, turns, rest);
        for (int i = 0; i < count; i++) {
            if (Math.abs(x[i]) <= LARGEST_ANGLE) {
                out[i] = quadrant((long) turns[i], rest[i], out[i]);
            } else {
                out[i] = Math.sin(x[i]);
            }
        }
    }

    /** cos x; {@code turns} and {@code rest} are scratch. */
    static void cos(double[] x, int count, double[] out, double[] turns, double[] rest) {
        circular(x, count, out, turns, rest);
        for (int i = 0; i < count; i++) {
            if (Math.abs(x[i]) <= LARGEST_ANGLE) {
                out[i] = quadrant((long) turns[i] + 1, rest[i], out[i]);
            } else {
                out[i] = Math.cos(x[i]);
            }
        }
    }

    /** Whole quarter turns, the sine of what is left in {@code rest}, its cosine in {@code out}. */
    private static void circular(double[] x, int count, double[] out, double[] turns, double[] rest) {
        for (int i = 0; i < count; i++) {
            turns[i] = Math.fma(x[i], TWO_OVER_PI, ROUND) - ROUND;
        }
        for (int i = 0; i < count; i++) {
            double k = turns[i];
            rest[i] = Math.fma(k, -HALF_PI_3, Math.fma(k, -HALF_PI_2, Math.fma(k, -HALF_PI_1, x[i])));
        }
        for (int i = 0; i < count; i++) {
            double w = rest[i] * rest[i];
            double p = Math.fma(w, -1.1359647557788195e-11, 2.087572321298175e-09);
            p = Math.fma(w, p, -2.7557314351390663e-07);
            p = Math.fma(w, p, 2.480158728947673e-05);
            p = Math.fma(w, p, -0.001388888888887411);
            p = Math.fma(w, p, 0.0416666666666666);
            double half = 0.5 * w;
            double c = 1 - half;
            out[i] = c + (((1 - c) - half) + w * w * p);
        }
        for (int i = 0; i < count; i++) {
            double r = rest[i];
            double w = r * r;
            double p = Math.fma(w, 1.58969099521155e-10, -2.5050760253406863e-08);
            p = Math.fma(w, p, 2.7557313707070068e-06);
            p = Math.fma(w, p, -0.0001984126982985795);
            p = Math.fma(w, p, 0.00833333333332249);
            p = Math.fma(w, p, -0.16666666666666632);
            rest[i] = Math.fma(w * r, p, r);
        }
    }

    private static double quadrant(long turns, double sine, double cosine) {
        double v = (turns & 1) == 0 ? sine : cosine;
        return (turns & 2) == 0 ? v : -v;
    }
}
