package org.stillpath.medium;

/**
 * The absolute index of water after IAPWS R9-97 (Release on the Refractive Index of Ordinary Water Substance, 1997), with
 * the density at 101.325 kPa after Kell (J. Chem. Eng. Data 20 (1975) 97, equation 16; 0 to 150 °C, here used to 100 °C).
 *
 * <p>The release gives (n² − 1)/(n² + 2) times ρ₀/ρ as a polynomial in density, temperature and wavelength; derivatives by
 * the temperature, the density's own included, are exact.
 */
public record WaterLaw() implements SolidLaw {
    private static final double[] A = {
        0.244257733,
        0.00974634476,
        -0.00373234996,
        0.000268678472,
        0.0015892057,
        0.00245934259,
        0.90070492,
        -0.0166626219
    };
    private static final double ULTRAVIOLET = 0.2292020;
    private static final double INFRARED = 5.432937;
    private static final double REFERENCE_WAVELENGTH = 0.589e-6;
    private static final double REFERENCE_DENSITY = 1000;

    private static final double[] KELL = {
        999.83952, 16.945176, -7.9870401e-3, -46.170461e-6, 105.56302e-9, -280.54253e-12
    };
    private static final double KELL_BELOW = 16.879850e-3;

    @Override
    public boolean varies() {
        return true;
    }

    @Override
    public Slope at(double wavelength) {
        double[] at = {fixed(wavelength), perKelvin(wavelength)};
        return (kelvin, out) -> {
            double[] rho = new double[3];
            density(kelvin, rho);
            jet(at, kelvin, rho, out);
        };
    }

    /**
     * n − 1 at a density of one's own, for other pressures and for the release's check values.
     *
     * @param wavelength vacuum wavelength in metres
     * @param kelvin temperature
     * @param density kg/m³
     */
    static double refractivity(double wavelength, double kelvin, double density) {
        double[] out = new double[3];
        jet(new double[] {fixed(wavelength), perKelvin(wavelength)}, kelvin, new double[] {density, 0, 0}, out);
        return out[0];
    }

    /** What of the sum depends on the wavelength alone, with the constant. */
    private static double fixed(double wavelength) {
        double l = wavelength / REFERENCE_WAVELENGTH;
        double l2 = l * l;
        return A[0] + A[4] / l2 + A[5] / (l2 - ULTRAVIOLET * ULTRAVIOLET) + A[6] / (l2 - INFRARED * INFRARED);
    }

    /** The sum's derivative by the temperature over 273.15 K. */
    private static double perKelvin(double wavelength) {
        double l = wavelength / REFERENCE_WAVELENGTH;
        return A[2] + A[3] * l * l;
    }

    private static void jet(double[] at, double kelvin, double[] density, double[] out) {
        double r = density[0] / REFERENCE_DENSITY;
        double r1 = density[1] / REFERENCE_DENSITY;
        double r2 = density[2] / REFERENCE_DENSITY;
        double c = at[1] / AirLaw.ZERO_CELSIUS;
        // X = r (a + b r + c T + d r²)
        double sum = at[0] + A[1] * r + c * kelvin + A[7] * r * r;
        double sum1 = (A[1] + 2 * A[7] * r) * r1 + c;
        double sum2 = (A[1] + 2 * A[7] * r) * r2 + 2 * A[7] * r1 * r1;
        double x = r * sum;
        double x1 = r1 * sum + r * sum1;
        double x2 = r2 * sum + 2 * r1 * sum1 + r * sum2;
        // n² = (1 + 2X)/(1 − X), so that n² − 1 = 3X/(1 − X)
        double g = 1 / (1 - x);
        double e = 3 * x * g;
        double e1 = 3 * g * g * x1;
        double e2 = 3 * g * g * x2 + 6 * g * g * g * x1 * x1;
        double n = Math.sqrt(1 + e);
        out[0] = e / (n + 1);
        out[1] = e1 / (2 * n);
        out[2] = (e2 - 2 * out[1] * out[1]) / (2 * n);
    }

    /** Kell's density with its derivatives, kg/m³, kg/(m³ K), kg/(m³ K²). */
    private static void density(double kelvin, double[] out) {
        double t = kelvin - AirLaw.ZERO_CELSIUS;
        double p = 0;
        double p1 = 0;
        double p2 = 0;
        for (int i = KELL.length - 1; i >= 0; i--) {
            p2 = p2 * t + 2 * p1;
            p1 = p1 * t + p;
            p = p * t + KELL[i];
        }
        double g = 1 / (1 + KELL_BELOW * t);
        double k = KELL_BELOW * g;
        out[0] = p * g;
        out[1] = (p1 - p * k) * g;
        out[2] = (p2 - 2 * k * p1 + 2 * k * k * p) * g;
    }
}
