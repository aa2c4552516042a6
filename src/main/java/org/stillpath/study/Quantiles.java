package org.stillpath.study;

import org.hipparchus.special.Beta;
import org.hipparchus.special.Erf;

/** Quantiles of the normal and of Student's distribution. */
final class Quantiles {
    private Quantiles() {}

    /** The value below which a standard normal variable lies with a probability. */
    static double normal(double probability) {
        return -Math.sqrt(2) * Erf.erfcInv(2 * probability);
    }

    /**
     * The value below which Student's t lies with a probability above one half. Bisection of the distribution function: it
     * is asked for a few times a study and never fails.
     *
     * @param degreesOfFreedom above 0; may be infinite
     */
    static double student(double probability, double degreesOfFreedom) {
        if (degreesOfFreedom > 1e8) {
            return normal(probability);
        }
        double low = 0;
        double high = 2;
        while (cumulative(high, degreesOfFreedom) < probability) {
            low = high;
            high *= 2;
        }
        for (int i = 0; i < 200 && high - low > 1e-15 * high; i++) {
            double middle = 0.5 * (low + high);
            if (cumulative(middle, degreesOfFreedom) < probability) {
                low = middle;
            } else {
                high = middle;
            }
        }
        return 0.5 * (low + high);
    }

    /** Probability that t is below a positive value (Abramowitz and Stegun 26.7.1). */
    private static double cumulative(double t, double nu) {
        return 1 - 0.5 * Beta.regularizedBeta(nu / (nu + t * t), 0.5 * nu, 0.5);
    }

    /** Probability that chi-square exceeds a value. */
    static double chiSquareBeyond(double chiSquare, double degreesOfFreedom) {
        return chiSquare <= 0
                ? 1
                : org.hipparchus.special.Gamma.regularizedGammaQ(0.5 * degreesOfFreedom, 0.5 * chiSquare);
    }
}
