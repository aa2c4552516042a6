package org.stillpath.medium;

/**
 * Saturation pressure of water vapour over liquid water, after the source that each law of air was published with: a
 * relative humidity means nothing without one. They differ by up to 0.3 % at 20 °C, 1e-9 in the index of light.
 *
 * <p>Each gives its exact derivatives, so that fields of humidity have exact gradients.
 */
public enum Saturation {
    /** Giacomo 1982 and Davis 1992 as in Ciddor 1996, appendix A, without the enhancement factor, which that law applies itself. */
    DAVIS {
        @Override
        void jet(double temperature, double pressure, double[] out) {
            double t = temperature;
            double value = Math.exp(1.2378847e-5 * t * t - 1.9121316e-2 * t + 33.93711047 - 6.3431645e3 / t);
            double slope = 2 * 1.2378847e-5 * t - 1.9121316e-2 + 6.3431645e3 / (t * t);
            double bend = 2 * 1.2378847e-5 - 2 * 6.3431645e3 / (t * t * t);
            exponential(value, slope, bend, out);
        }
    },
    /** Magnus' formula with the constants of WMO-No. 8, annex 4.B, after Sonntag 1990; −45 °C to 60 °C. */
    MAGNUS {
        @Override
        void jet(double temperature, double pressure, double[] out) {
            double t = temperature - AirLaw.ZERO_CELSIUS;
            double d = 243.12 + t;
            double value = 611.2 * Math.exp(17.62 * t / d);
            double slope = 17.62 * 243.12 / (d * d);
            exponential(value, slope, -2 * slope / d, out);
        }
    },
    /** Recommendation ITU-R P.453-14, equations 9 and 10, with the enhancement factor of moist air; −40 °C to 50 °C. */
    P453 {
        @Override
        boolean ofPressure() {
            return true;
        }

        @Override
        void jet(double temperature, double pressure, double[] out) {
            double t = temperature - AirLaw.ZERO_CELSIUS;
            double d = t + 257.14;
            double u = (18.678 - t / 234.5) * t / d;
            double slope = (18.678 - 2 * t / 234.5 - u) / d;
            double bend = (-2 / 234.5 - 2 * slope) / d;
            exponential(611.21 * Math.exp(u), slope, bend, out);
            double hPa = pressure / 100;
            double factor = 1 + 1e-4 * (7.2 + hPa * (0.00320 + 5.9e-7 * t * t));
            double byT = 1e-4 * hPa * 2 * 5.9e-7 * t;
            double byTT = 1e-4 * hPa * 2 * 5.9e-7;
            double byP = 1e-6 * (0.00320 + 5.9e-7 * t * t);
            double byTP = 1e-6 * 2 * 5.9e-7 * t;
            double value = out[VALUE];
            double first = out[BY_T];
            out[BY_TT] = factor * out[BY_TT] + 2 * byT * first + byTT * value;
            out[BY_TP] = byP * first + byTP * value;
            out[BY_T] = factor * first + byT * value;
            out[BY_P] = byP * value;
            out[VALUE] = factor * value;
        }
    };

    /** Places in the array that {@link #jet} fills: the pressure. */
    static final int VALUE = 0;
    /** Its derivative by temperature. */
    static final int BY_T = 1;
    /** Its derivative by the pressure of the air. */
    static final int BY_P = 2;
    /** Twice by temperature. */
    static final int BY_TT = 3;
    /** By both. */
    static final int BY_TP = 4;
    /** Length of the array; the second derivative by the pressure is 0 for all of them. */
    static final int JET = 5;

    /**
     * Fills value and derivatives, in SI units.
     *
     * @param temperature kelvin
     * @param pressure of the air, pascal
     * @param out {@link #JET} numbers
     */
    abstract void jet(double temperature, double pressure, double[] out);

    /** Whether it depends on the pressure of the air. */
    boolean ofPressure() {
        return false;
    }

    /**
     * The saturation pressure in pascal.
     *
     * @param temperature kelvin
     * @param pressure of the air, pascal
     */
    public double pressure(double temperature, double pressure) {
        double[] out = new double[JET];
        jet(temperature, pressure, out);
        return out[VALUE];
    }

    /** For exp(u(T)) with u' and u''. */
    private static void exponential(double value, double slope, double bend, double[] out) {
        out[VALUE] = value;
        out[BY_T] = value * slope;
        out[BY_P] = 0;
        out[BY_TT] = value * (slope * slope + bend);
        out[BY_TP] = 0;
    }
}
