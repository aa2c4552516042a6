package org.stillpath.medium;

/**
 * How the index of a solid or a liquid depends on wavelength and temperature. What it gives is absolute, relative to
 * vacuum; what was measured in air is converted by the law itself, at one place.
 */
public sealed interface SolidLaw permits Sellmeier, WaterLaw, GivenSlope {
    /**
     * The law at one wavelength.
     *
     * @param wavelength vacuum wavelength in metres, above 0
     */
    Slope at(double wavelength);

    /** Whether the index depends on the temperature at all. */
    boolean varies();

    /** The index at one wavelength as a function of temperature. */
    interface Slope {
        /**
         * The refractivity with its derivatives.
         *
         * @param kelvin temperature
         * @param out receives n − 1, dn/dT in 1/K and d²n/dT² in 1/K²; NaN where the law gives no index
         */
        void jet(double kelvin, double[] out);

        /** n − 1 at a temperature in kelvin. */
        default double refractivity(double kelvin) {
            double[] out = new double[3];
            jet(kelvin, out);
            return out[0];
        }
    }
}
