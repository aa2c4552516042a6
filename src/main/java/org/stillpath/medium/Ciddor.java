package org.stillpath.medium;

import java.util.ArrayList;
import java.util.List;

/**
 * The refractivity of moist air after P. E. Ciddor, "Refractive index of air: new equations for the visible and near
 * infrared", Applied Optics 35 (1996) 1566-1573, phase and group.
 *
 * <p>The law is a sum of two products: the density of dry air against that of standard dry air times the refractivity of
 * standard dry air, and likewise for the water vapour (equation 5). Only the second factors know the wavelength, so one
 * state of the air is worked out once, in {@link #of}, and serves all wavelengths. The group refractivity is the exact
 * derivative of the phase law and not the Lorentz-Lorenz algorithm of Ciddor and Hill (Applied Optics 38 (1999) 1663),
 * whose printed form has a sign error (Pollinger, Applied Optics 59 (2020) 9771).
 *
 * <p>The gas constant and the molar masses are the paper's own: the standard densities were fixed with them, and newer
 * values would shift the result by parts in 1e6 of the refractivity. Stated uncertainty of the law: 2e-8 to 5e-8 in n.
 */
public final class Ciddor {
    /** Shortest vacuum wavelength that the law was fitted to, metres. */
    public static final double SHORTEST = 300e-9;

    /** Longest vacuum wavelength that the law was fitted to, metres. */
    public static final double LONGEST = 1690e-9;

    /** Temperature of 0 °C in kelvin. */
    private static final double ZERO_CELSIUS = 273.15;

    // equation 1, for σ² in 1/µm²
    private static final double K0 = 238.0185;
    private static final double K1 = 5792105;
    private static final double K2 = 57.362;
    private static final double K3 = 167917;
    // equation 3
    private static final double W0 = 295.235;
    private static final double W1 = 2.6422;
    private static final double W2 = -0.032380;
    private static final double W3 = 0.004028;
    private static final double VAPOUR_CORRECTION = 1.022;
    // equation 4: J/(mol K), kg/mol
    private static final double GAS_CONSTANT = 8.314510;
    private static final double WATER_MOLAR_MASS = 0.018015;
    // equation 12, compressibility after Davis, Metrologia 29 (1992) 67
    private static final double A0 = 1.58123e-6;
    private static final double A1 = -2.9331e-8;
    private static final double A2 = 1.1043e-10;
    private static final double B0 = 5.707e-6;
    private static final double B1 = -2.051e-8;
    private static final double C0 = 1.9898e-4;
    private static final double C1 = -2.376e-6;
    private static final double D = 1.83e-11;
    private static final double E = -0.765e-8;

    private final double temperature;
    private final double pressure;
    private final double vapourPressure;
    private final double co2;
    private final double dryDensity;
    private final double vapourDensity;

    private Ciddor(double temperature, double pressure, double vapourPressure, double co2) {
        this.temperature = temperature;
        this.pressure = pressure;
        this.vapourPressure = vapourPressure;
        this.co2 = co2;
        double t = temperature - ZERO_CELSIUS;
        double xw = enhancement(t, pressure) * vapourPressure / pressure;
        double ma = dryMolarMass(co2);
        double molar = pressure / (compressibility(t, pressure, xw) * GAS_CONSTANT * temperature);
        this.dryDensity = molar * ma * (1 - xw) / standardDryDensity(co2);
        this.vapourDensity = molar * WATER_MOLAR_MASS * xw / standardVapourDensity();
    }

    /**
     * The law for one state of the air.
     *
     * @param temperature in kelvin, above 0
     * @param pressure total pressure in pascal, above 0
     * @param vapourPressure partial pressure of water vapour in pascal, from 0 to {@code pressure}; for a relative
     *     humidity it is that times {@link #saturationPressure}
     * @param co2 content of carbon dioxide as a fraction (420 ppm is 420e-6), from 0 to 1
     */
    public static Ciddor of(double temperature, double pressure, double vapourPressure, double co2) {
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
        if (!(co2 >= 0 && co2 <= 1)) {
            throw new IllegalArgumentException("co2 must be a fraction from 0 to 1: " + co2);
        }
        return new Ciddor(temperature, pressure, vapourPressure, co2);
    }

    /**
     * The phase refractivity n − 1 (equation 5).
     *
     * @param wavelength vacuum wavelength in metres, above 0
     */
    public double refractivity(double wavelength) {
        double s2 = squaredWavenumber(wavelength);
        return dryDensity * dry(s2, co2) + vapourDensity * vapour(s2);
    }

    /**
     * The group refractivity n − 1 + σ dn/dσ, the derivative of equation 5.
     *
     * @param wavelength vacuum wavelength in metres, above 0
     */
    public double groupRefractivity(double wavelength) {
        double s2 = squaredWavenumber(wavelength);
        return dryDensity * dryGroup(s2, co2) + vapourDensity * vapourGroup(s2);
    }

    /** What of this state and wavelength lies outside the range that the law was published for; empty where nothing does. */
    public List<String> warnings(double wavelength) {
        List<String> list = new ArrayList<>();
        if (wavelength < SHORTEST || wavelength > LONGEST) {
            list.add(outside("wavelength", Told.wavelength(wavelength), "300 nm to 1690 nm"));
        }
        double t = temperature - ZERO_CELSIUS;
        if (t < -40 || t > 100) {
            list.add(outside("temperature", Told.number(t) + " degC", "-40 degC to 100 degC"));
        }
        if (pressure < 80e3 || pressure > 120e3) {
            list.add(outside("pressure", Told.number(pressure / 1e3) + " kPa", "80 kPa to 120 kPa"));
        }
        double saturation = saturationPressure(temperature);
        if (vapourPressure > saturation * 1.001) {
            list.add("the vapour pressure " + Told.number(vapourPressure) + " Pa is above saturation, "
                    + Told.number(saturation) + " Pa at " + Told.number(t) + " degC");
        }
        return List.copyOf(list);
    }

    private static String outside(String what, String value, String range) {
        return "the " + what + " " + value + " lies outside the range of Ciddor 1996 for air, " + range;
    }

    /**
     * Saturation pressure of water vapour over liquid water in pascal (Ciddor 1996, appendix A, after Giacomo 1982 and
     * Davis 1992).
     *
     * @param temperature in kelvin
     */
    public static double saturationPressure(double temperature) {
        double t = temperature;
        return Math.exp(1.2378847e-5 * t * t - 1.9121316e-2 * t + 33.93711047 - 6.3431645e3 / t);
    }

    /** Enhancement factor of water vapour in air (appendix A); {@code t} in °C, {@code pressure} in pascal. */
    static double enhancement(double t, double pressure) {
        return 1.00062 + 3.14e-8 * pressure + 5.60e-7 * t * t;
    }

    /** Compressibility of moist air (equation 12); {@code t} in °C, {@code p} in pascal, {@code xw} molar fraction. */
    static double compressibility(double t, double p, double xw) {
        double q = p / (t + ZERO_CELSIUS);
        return 1
                - q * (A0 + t * (A1 + t * A2) + (B0 + B1 * t) * xw + (C0 + C1 * t) * xw * xw)
                + q * q * (D + E * xw * xw);
    }

    /** Density of dry air at 15 °C and 101325 Pa in kg/m³ (equation 4); {@code co2} as a fraction. */
    static double standardDryDensity(double co2) {
        double p = 101325;
        return p * dryMolarMass(co2) / (compressibility(15, p, 0) * GAS_CONSTANT * (15 + ZERO_CELSIUS));
    }

    /** Density of pure water vapour at 20 °C and 1333 Pa in kg/m³ (equation 4). */
    static double standardVapourDensity() {
        double p = 1333;
        return p * WATER_MOLAR_MASS / (compressibility(20, p, 1) * GAS_CONSTANT * (20 + ZERO_CELSIUS));
    }

    /** Refractivity of standard dry air (equations 1 and 2); {@code s2} = σ² in 1/µm². */
    static double dry(double s2, double co2) {
        return carbon(co2) * 1e-8 * (K1 / (K0 - s2) + K3 / (K2 - s2));
    }

    /** Group refractivity of standard dry air, d(σ·(n − 1))/dσ of equations 1 and 2. */
    static double dryGroup(double s2, double co2) {
        double u = K0 - s2;
        double v = K2 - s2;
        return carbon(co2) * 1e-8 * (K1 * (K0 + s2) / (u * u) + K3 * (K2 + s2) / (v * v));
    }

    /** Refractivity of standard water vapour (equation 3). */
    static double vapour(double s2) {
        return 1e-8 * VAPOUR_CORRECTION * (W0 + s2 * (W1 + s2 * (W2 + s2 * W3)));
    }

    /** Group refractivity of standard water vapour, d(σ·(n − 1))/dσ of equation 3. */
    static double vapourGroup(double s2) {
        return 1e-8 * VAPOUR_CORRECTION * (W0 + s2 * (3 * W1 + s2 * (5 * W2 + s2 * 7 * W3)));
    }

    private static double carbon(double co2) {
        return 1 + 0.534e-6 * (co2 * 1e6 - 450);
    }

    private static double dryMolarMass(double co2) {
        return 1e-3 * (28.9635 + 12.011e-6 * (co2 * 1e6 - 400));
    }

    private static double squaredWavenumber(double wavelength) {
        if (!(wavelength > 0)) {
            throw new IllegalArgumentException("wavelength must be above 0 m: " + wavelength);
        }
        double um = wavelength * 1e6;
        return 1 / (um * um);
    }
}
