package org.stillpath.task.survey;

/**
 * Textbook formulas of surveying, as they are used without a profile of the air. SI and radians throughout; they hold for even
 * bending (one k) and for the accuracy of their series, and say nothing where that fails.
 */
public final class Classical {
    /** The coefficient of refraction that is taken where nothing is known, after Gauss. Common practice, no source. */
    public static final double USUAL_K = 0.13;

    /** Exponent of Kukkamäki's temperature profile that is usual by day. */
    public static final double USUAL_EXPONENT = -1 / 3.0;

    private Classical() {}

    /**
     * Height difference from one zenith angle: s cos z + (1 − k)(s sin z)²/(2R) + hi − ht (trigonometric levelling; Rüeger,
     * <i>Electronic Distance Measurement</i>, 4th ed. 1996).
     *
     * @param slope slope distance, metres
     * @param zenith zenith angle at the instrument, rad
     * @param k coefficient of refraction
     * @param radius of the earth, metres; infinite for a flat earth
     * @param instrument height of the instrument above its mark, metres
     * @param target height of the target above its mark, metres
     */
    public static double heightDifference(
            double slope, double zenith, double k, double radius, double instrument, double target) {
        double level = slope * Math.sin(zenith);
        return slope * Math.cos(zenith) + (1 - k) * level * level / (2 * radius) + instrument - target;
    }

    /**
     * Height difference from simultaneous reciprocal zenith angles: D tan((z₂ − z₁)/2)(1 + Hm/R) (Torge; Jordan, Eggert and
     * Kneissl); it holds where the refraction is the same at both ends.
     *
     * @param distance along the datum, metres
     * @param mean mean height above the datum, metres
     */
    public static double reciprocalHeightDifference(
            double distance, double fore, double back, double mean, double radius) {
        return distance * Math.tan(0.5 * (back - fore)) * (1 + mean / radius);
    }

    /** k from reciprocal zenith angles: 1 − (z₁ + z₂ − π) R/D (Bomford; Jordan, Eggert and Kneissl). */
    public static double reciprocalCoefficient(double distance, double fore, double back, double radius) {
        return 1 - (fore + back - Math.PI) * radius / distance;
    }

    /**
     * First velocity correction: d' (N_REF − N_L)/(1 + N_L) (Rüeger 1996, section 6.2).
     *
     * @param raw distance as measured for the reference refractivity, metres
     * @param reference reference refractivity, a fraction
     * @param air group refractivity of the air, the mean of both ends
     */
    public static double firstVelocity(double raw, double reference, double air) {
        return raw * (reference - air) / (1 + air);
    }

    /** Second velocity correction: −(k − k²) d³/(12 R²) (Rüeger 1996, section 6.4). */
    public static double secondVelocity(double distance, double k, double radius) {
        return -(k - k * k) * distance * distance * distance / (12 * radius * radius);
    }

    /** Arc to chord: −k² d³/(24 R²) (Rüeger 1996, chapter 7). */
    public static double arcToChord(double distance, double k, double radius) {
        return -k * k * distance * distance * distance / (24 * radius * radius);
    }

    /**
     * Refraction of a level sight over a slope, in a temperature a + b zᶜ: how much too high it meets the staff (Kukkamäki 1938,
     * Publ. Finnish Geodetic Institute 25).
     *
     * @param index what b zᶜ stands for in the index: b dn/dT, a change of index at z = 1 m
     * @param exponent c
     * @param distance metres
     * @param eye height of the line above the ground at the instrument, metres
     * @param staff the same at the staff
     */
    public static double kukkamaki(double index, double exponent, double distance, double eye, double staff) {
        double slope = (eye - staff) / distance;
        if (Math.abs(slope) < 1e-6) {
            return index * exponent * Math.pow(eye, exponent - 1) * distance * distance / 2;
        }
        double c1 = exponent + 1;
        return index
                / (slope * slope)
                * (exponent / c1 * Math.pow(eye, c1) - staff * Math.pow(eye, exponent) + Math.pow(staff, c1) / c1);
    }

    /** Dip of the horizon: √(2h(1 − k)/R), first order, even k. */
    public static double dip(double height, double k, double radius) {
        return Math.sqrt(2 * height * (1 - k) / radius);
    }

    /** Distance of the horizon: √(2hR/(1 − k)), first order, even k. */
    public static double horizon(double height, double k, double radius) {
        return Math.sqrt(2 * height * radius / (1 - k));
    }

    /**
     * Refraction of a star after Bennett (J. Navigation 35 (1982) 255), 1010 hPa and 10 °C: cot(h + 7.31/(h + 4.4)), rad.
     *
     * @param altitude apparent, rad
     */
    public static double bennett(double altitude) {
        double h = Math.toDegrees(altitude);
        return Math.toRadians(1 / Math.tan(Math.toRadians(h + 7.31 / (h + 4.4))) / 60);
    }

    /**
     * Refraction of a star after Sæmundsson (Sky &amp; Telescope 72 (1986) 70), 1010 hPa and 10 °C: 1.02 cot(h + 10.3/(h +
     * 5.11)), rad.
     *
     * @param altitude true, rad
     */
    public static double saemundsson(double altitude) {
        double h = Math.toDegrees(altitude);
        return Math.toRadians(1.02 / Math.tan(Math.toRadians(h + 10.3 / (h + 5.11))) / 60);
    }

    /**
     * k from the gradient of the temperature: 503 (P/T²)(0.0342 K/m + dT/dz), P in hPa (for example Brunner (ed.), <i>Geodetic
     * Refraction</i>, 1984; Hirt and others, J. Geophys. Res. 115 (2010) D21102).
     *
     * @param pressure pascal
     * @param temperature kelvin
     * @param gradient K/m
     */
    public static double coefficient(double pressure, double temperature, double gradient) {
        return 503 * (pressure / 100) / (temperature * temperature) * (0.0342 + gradient);
    }
}
