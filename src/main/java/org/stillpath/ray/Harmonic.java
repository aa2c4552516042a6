package org.stillpath.ray;

import org.stillpath.geometry.GaussPoints;

/**
 * The projection of a function over a disc onto harmonic functions, H = Re Σ cₘ (x + iy)ᵐ, from the function's moments
 * against rᵐ cos mθ and rᵐ sin mθ. It is what a free plate's stress leaves of its temperature: σx + σy = Eα(H − T).
 *
 * <p>Terms that are round-off of the function's span are left out, so that what is symmetric stays so.
 */
final class Harmonic {
    private static final int HIGHEST = 16;
    private static final int RINGS = 48;
    private static final int ANGLES = 96;
    private static final double ROUNDING = 1e-13;

    private final double[] re;
    private final double[] im;
    private final double radius;

    private Harmonic(double[] re, double[] im, double radius) {
        this.re = re;
        this.im = im;
        this.radius = radius;
    }

    /** A function over a disc about the origin; NaN where it is unknown. */
    @FunctionalInterface
    interface Over {
        /** Its value, x and y in metres. */
        double at(double x, double y);
    }

    /**
     * Projects.
     *
     * @param radius of the disc, metres
     * @param function defined all over the disc
     */
    static Harmonic of(double radius, Over function) {
        double[] re = new double[HIGHEST + 1];
        double[] im = new double[HIGHEST + 1];
        double least = Double.POSITIVE_INFINITY;
        double most = Double.NEGATIVE_INFINITY;
        double first = function.at(0, 0);
        GaussPoints gauss = GaussPoints.of(RINGS);
        for (int i = 0; i < RINGS; i++) {
            // equal areas: Gauss points in r², as pupils are sampled
            double r = Math.sqrt(gauss.at(i));
            for (int k = 0; k < ANGLES; k++) {
                double angle = 2 * Math.PI * k / ANGLES;
                double value = function.at(radius * r * Math.cos(angle), radius * r * Math.sin(angle));
                least = Math.min(least, value);
                most = Math.max(most, value);
                double weight = gauss.weight(i) / ANGLES * (value - first);
                double power = 1;
                for (int m = 0; m <= HIGHEST; m++) {
                    re[m] += weight * power * Math.cos(m * angle);
                    im[m] -= weight * power * Math.sin(m * angle);
                    power *= r;
                }
            }
        }
        double trifle = ROUNDING * (Math.abs(first) + most - least);
        for (int m = 0; m <= HIGHEST; m++) {
            // the mean of r^2m cos² mθ over the unit disc is 1/(2m + 2), and 1 for m = 0
            double norm = m == 0 ? 1 : 2.0 * m + 2;
            re[m] = significant(norm * re[m], trifle);
            im[m] = significant(norm * im[m], trifle);
        }
        re[0] += first;
        int highest = HIGHEST;
        while (highest > 0 && re[highest] == 0 && im[highest] == 0) {
            highest--;
        }
        return new Harmonic(java.util.Arrays.copyOf(re, highest + 1), java.util.Arrays.copyOf(im, highest + 1), radius);
    }

    private static double significant(double value, double trifle) {
        return Math.abs(value) <= trifle ? 0 : value;
    }

    /**
     * H with its derivatives.
     *
     * @param x metres; likewise {@code y}
     * @param out receives H, ∂x, ∂y, ∂xx, ∂xy, ∂yy
     */
    void jet(double x, double y, double[] out) {
        double u = x / radius;
        double v = y / radius;
        double pr = 0;
        double pi = 0;
        double dr = 0;
        double di = 0;
        double er = 0;
        double ei = 0;
        for (int m = re.length - 1; m >= 0; m--) {
            double t = er * u - ei * v + 2 * dr;
            ei = er * v + ei * u + 2 * di;
            er = t;
            t = dr * u - di * v + pr;
            di = dr * v + di * u + pi;
            dr = t;
            t = pr * u - pi * v + re[m];
            pi = pr * v + pi * u + im[m];
            pr = t;
        }
        out[0] = pr;
        out[1] = dr / radius;
        out[2] = -di / radius;
        out[3] = er / (radius * radius);
        out[4] = -ei / (radius * radius);
        out[5] = -out[3];
    }
}
