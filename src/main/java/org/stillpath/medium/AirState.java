package org.stillpath.medium;

import java.util.ArrayList;
import java.util.List;
import org.stillpath.formula.Order;

/**
 * Air of one state under one law.
 *
 * @param law the law
 * @param temperature kelvin, above 0
 * @param pressure total pressure in pascal, above 0
 * @param vapourPressure partial pressure of water vapour in pascal, from 0 to {@code pressure}; for a relative humidity
 *     it is that times the law's {@linkplain AirLaw#saturation saturation pressure}
 */
public record AirState(AirLaw law, double temperature, double pressure, double vapourPressure) {
    public AirState {
        if (!(temperature > 0 && Double.isFinite(temperature))) {
            throw new IllegalArgumentException("temperature must be above 0 K: " + temperature);
        }
        if (!(pressure > 0 && Double.isFinite(pressure))) {
            throw new IllegalArgumentException("pressure must be above 0 Pa: " + pressure);
        }
        if (!(vapourPressure >= 0 && vapourPressure <= pressure)) {
            throw new IllegalArgumentException(
                    "vapourPressure must be from 0 to the pressure " + pressure + " Pa: " + vapourPressure);
        }
    }

    /** Dry air at 20 °C and 101.325 kPa with 420 ppm of carbon dioxide after Ciddor: the air that catalogues refer to. */
    public static AirState laboratory() {
        return new AirState(Ciddor.of(AirLaw.USUAL_CO2), 293.15, 101325, 0);
    }

    /**
     * The phase refractivity n − 1.
     *
     * @param wavelength vacuum wavelength in metres, above 0
     */
    public double refractivity(double wavelength) {
        return value(law.phase(wavelength));
    }

    /**
     * The group refractivity N − λ dN/dλ.
     *
     * @param wavelength vacuum wavelength in metres, above 0
     */
    public double groupRefractivity(double wavelength) {
        return value(law.group(wavelength));
    }

    /** The same air at another temperature in kelvin. */
    AirState at(double kelvin) {
        return new AirState(law, kelvin, pressure, vapourPressure);
    }

    /** What of this state and wavelength lies outside the range that the law was published for; empty where nothing does. */
    public List<String> warnings(double wavelength) {
        List<String> list = new ArrayList<>(law.warnings(wavelength));
        list.addAll(law.warnings(temperature, pressure, vapourPressure, ""));
        return List.copyOf(list);
    }

    private double value(AirLaw.Dispersion d) {
        double[] jet = new double[AirLaw.JET];
        law.refractivity(d, temperature, pressure, vapourPressure, Order.VALUE, jet);
        return jet[AirLaw.N];
    }
}
