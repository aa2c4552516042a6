package org.stillpath.medium;

import java.util.Optional;
import org.stillpath.formula.Order;

/**
 * The refractivity of moist air after P. E. Ciddor, "Refractive index of air: new equations for the visible and near
 * infrared", Applied Optics 35 (1996) 1566-1573, phase and group.
 *
 * <p>The law is a sum of two products: the density of dry air against that of standard dry air times the refractivity of
 * standard dry air, and likewise for the water vapour (equation 5). Only the second factors know the wavelength. The group refractivity is the exact
 * derivative of the phase law and not the Lorentz-Lorenz algorithm of Ciddor and Hill (Applied Optics 38 (1999) 1663),
 * whose printed form has a sign error (Pollinger, Applied Optics 59 (2020) 9771).
 *
 * <p>The gas constant and the molar masses are the paper's own: the standard densities were fixed with them, and newer
 * values would shift the result by parts in 1e6 of the refractivity. Stated uncertainty of the law: 2e-8 to 5e-8 in n.
 */
public final class Ciddor implements AirLaw {
    /** Shortest vacuum wavelength that the law was fitted to, metres. */
    public static final double SHORTEST = 300e-9;

    /** Longest vacuum wavelength that the law was fitted to, metres. */
    public static final double LONGEST = 1690e-9;

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
    private static final double E2 = -0.765e-8;
    // appendix A, enhancement factor
    private static final double F0 = 1.00062;
    private static final double F1 = 3.14e-8;
    private static final double F2 = 5.60e-7;

    private final double co2;
    /** Densities of unit p/(Z T) against the standard ones: of dry air, of vapour. */
    private final double dryScale;

    private final double vapourScale;

    private Ciddor(double co2) {
        this.co2 = co2;
        this.dryScale = dryMolarMass(co2) / (GAS_CONSTANT * standardDryDensity(co2));
        this.vapourScale = WATER_MOLAR_MASS / (GAS_CONSTANT * standardVapourDensity());
    }

    /**
     * The law for one content of carbon dioxide.
     *
     * @param co2 as a fraction (420 ppm is 420e-6), from 0 to 1
     */
    public static Ciddor of(double co2) {
        if (!(co2 >= 0 && co2 <= 1)) {
            throw new IllegalArgumentException("co2 must be a fraction from 0 to 1: " + co2);
        }
        return new Ciddor(co2);
    }

    @Override
    public String title() {
        return "Ciddor 1996";
    }

    @Override
    public String source() {
        return "P. E. Ciddor, Applied Optics 35 (1996) 1566-1573";
    }

    @Override
    public Range range() {
        return new Range(SHORTEST, LONGEST, 233.15, 373.15, 80e3, 120e3);
    }

    @Override
    public Saturation saturation() {
        return Saturation.DAVIS;
    }

    @Override
    public Optional<Double> fixedCo2() {
        return Optional.empty();
    }

    @Override
    public boolean dispersive() {
        return true;
    }

    @Override
    public Dispersion phase(double wavelength) {
        double s2 = AirLaw.squaredWavenumber(wavelength);
        return new Dispersion(dry(s2, co2), vapour(s2));
    }

    @Override
    public Dispersion group(double wavelength) {
        double s2 = AirLaw.squaredWavenumber(wavelength);
        return new Dispersion(dryGroup(s2, co2), vapourGroup(s2));
    }

    /**
     * Equation 5 as N = m·(g + d x) with the molar density m = p/(Z T) of the mixture and the molar fraction x of vapour;
     * derivatives by T, p and x first, then by the chain rule through x(T, p, e).
     */
    @Override
    public void refractivity(
            Dispersion disp, double temperature, double pressure, double vapour, Order order, double[] jet) {
        double t = temperature - ZERO_CELSIUS;
        double p = pressure;
        double over = 1 / temperature;
        double f = enhancement(t, p);
        double x = f * vapour / p;
        double g = dryScale * disp.dry();
        double d = vapourScale * disp.vapour() - g;
        double q = p * over;
        double a = A0 + t * (A1 + t * A2) + (B0 + B1 * t) * x + (C0 + C1 * t) * x * x;
        double b = D + E2 * x * x;
        double z = 1 - q * a + q * q * b;
        double m = q / z;
        double l = g + d * x;
        jet[N] = m * l;
        if (order == Order.VALUE) {
            return;
        }
        double qT = -q * over;
        double aT = A1 + 2 * A2 * t + B1 * x + C1 * x * x;
        double ax = B0 + B1 * t + 2 * (C0 + C1 * t) * x;
        double bx = 2 * E2 * x;
        double zT = -qT * a - q * aT + 2 * q * qT * b;
        double zp = -over * a + 2 * q * over * b;
        double zx = -q * ax + q * q * bx;
        double mT = (qT - m * zT) / z;
        double mp = (over - m * zp) / z;
        double mx = -m * zx / z;
        double nT = mT * l;
        double np = mp * l;
        double nx = mx * l + m * d;
        double fT = 2 * F2 * t;
        double xT = fT * vapour / p;
        double xe = f / p;
        double xpe = (F1 - xe) / p;
        double xp = vapour * xpe;
        jet[T] = nT + nx * xT;
        jet[P] = np + nx * xp;
        jet[E] = nx * xe;
        if (order != Order.HESSIAN) {
            return;
        }
        double qTT = 2 * q * over * over;
        double qTp = -over * over;
        double aTx = B1 + 2 * C1 * x;
        double axx = 2 * (C0 + C1 * t);
        double zTT = -qTT * a - 2 * qT * aT - q * 2 * A2 + 2 * (qT * qT + q * qTT) * b;
        double zTp = -qTp * a - over * aT + 2 * (qT * over + q * qTp) * b;
        double zTx = -qT * ax - q * aTx + 2 * q * qT * bx;
        double zpp = 2 * over * over * b;
        double zpx = -over * ax + 2 * q * over * bx;
        double zxx = -q * axx + q * q * 2 * E2;
        double mTT = (qTT - 2 * mT * zT - m * zTT) / z;
        double mTp = (qTp - mT * zp - mp * zT - m * zTp) / z;
        double mTx = (-mT * zx - mx * zT - m * zTx) / z;
        double mpp = (-2 * mp * zp - m * zpp) / z;
        double mpx = (-mp * zx - mx * zp - m * zpx) / z;
        double mxx = (-2 * mx * zx - m * zxx) / z;
        double nTx = mTx * l + mT * d;
        double npx = mpx * l + mp * d;
        double nxx = mxx * l + 2 * mx * d;
        double xTT = 2 * F2 * vapour / p;
        double xTe = fT / p;
        double xTp = -xT / p;
        double xpp = -2 * xp / p;
        jet[TT] = mTT * l + 2 * nTx * xT + nxx * xT * xT + nx * xTT;
        jet[TP] = mTp * l + nTx * xp + npx * xT + nxx * xT * xp + nx * xTp;
        jet[TE] = (nTx + nxx * xT) * xe + nx * xTe;
        jet[PP] = mpp * l + 2 * npx * xp + nxx * xp * xp + nx * xpp;
        jet[PE] = (npx + nxx * xp) * xe + nx * xpe;
        jet[EE] = nxx * xe * xe;
    }

    /** Enhancement factor of water vapour in air (appendix A); {@code t} in °C, {@code pressure} in pascal. */
    static double enhancement(double t, double pressure) {
        return F0 + F1 * pressure + F2 * t * t;
    }

    /** Compressibility of moist air (equation 12); {@code t} in °C, {@code p} in pascal, {@code xw} molar fraction. */
    static double compressibility(double t, double p, double xw) {
        double q = p / (t + ZERO_CELSIUS);
        return 1
                - q * (A0 + t * (A1 + t * A2) + (B0 + B1 * t) * xw + (C0 + C1 * t) * xw * xw)
                + q * q * (D + E2 * xw * xw);
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
}
