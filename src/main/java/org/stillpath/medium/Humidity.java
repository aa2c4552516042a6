package org.stillpath.medium;

import org.stillpath.formula.Order;

/**
 * How the vapour in the air is given.
 *
 * @param kind what the quantity is
 * @param quantity relative humidity as a fraction, vapour pressure in pascal or dew point in kelvin
 * @param saturation the saturation pressure that a relative humidity or a dew point refers to
 */
record Humidity(Kind kind, ScalarField quantity, Saturation saturation) {
    /** What a humidity may be given by. */
    enum Kind {
        /** Fraction of the saturation pressure over water at the air's temperature. */
        RELATIVE,
        /** Partial pressure of the vapour. */
        VAPOUR_PRESSURE,
        /** The temperature at which the vapour would be saturated over water. */
        DEW_POINT
    }

    /** Dry air. */
    static Humidity none(Saturation saturation) {
        return new Humidity(Kind.VAPOUR_PRESSURE, new Constant(0), saturation);
    }

    /** Whether there is no vapour anywhere. */
    boolean isNone() {
        return kind != Kind.DEW_POINT && quantity instanceof Constant c && c.value() == 0;
    }

    /** Whether the vapour pressure depends on the pressure of the air. */
    boolean ofPressure() {
        return kind != Kind.VAPOUR_PRESSURE && saturation.ofPressure();
    }

    /** The same with another quantity. */
    Humidity with(ScalarField other) {
        return new Humidity(kind, other, saturation);
    }

    /**
     * The vapour pressure e as a function of temperature, pressure and the quantity w, with its derivatives.
     *
     * @param saturated scratch of {@link Saturation#JET} numbers
     * @param jet receives e and its derivatives at the places of {@link AirLaw}, where E stands for w
     */
    void jet(double temperature, double pressure, double w, Order order, double[] saturated, double[] jet) {
        if (kind == Kind.VAPOUR_PRESSURE) {
            java.util.Arrays.fill(jet, 0);
            jet[AirLaw.N] = w;
            jet[AirLaw.E] = 1;
            return;
        }
        boolean relative = kind == Kind.RELATIVE;
        saturation.jet(relative ? temperature : w, pressure, saturated);
        double s = saturated[Saturation.VALUE];
        double byT = saturated[Saturation.BY_T];
        double byP = saturated[Saturation.BY_P];
        if (relative) {
            jet[AirLaw.N] = w * s;
            jet[AirLaw.T] = w * byT;
            jet[AirLaw.P] = w * byP;
            jet[AirLaw.E] = s;
        } else {
            jet[AirLaw.N] = s;
            jet[AirLaw.T] = 0;
            jet[AirLaw.P] = byP;
            jet[AirLaw.E] = byT;
        }
        if (order == Order.HESSIAN) {
            double byTT = saturated[Saturation.BY_TT];
            double byTP = saturated[Saturation.BY_TP];
            jet[AirLaw.TT] = relative ? w * byTT : 0;
            jet[AirLaw.TP] = relative ? w * byTP : 0;
            jet[AirLaw.TE] = relative ? byT : 0;
            jet[AirLaw.PP] = 0;
            jet[AirLaw.PE] = relative ? byP : byTP;
            jet[AirLaw.EE] = relative ? 0 : byTT;
        }
    }

    /** The vapour pressure in pascal. */
    double vapourPressure(double temperature, double pressure, double w) {
        double[] jet = new double[AirLaw.JET];
        jet(temperature, pressure, w, Order.VALUE, new double[Saturation.JET], jet);
        return jet[AirLaw.N];
    }
}
