package org.stillpath.medium;

import java.util.Optional;
import org.stillpath.formula.Order;

/**
 * The updated formula of Edlén: K. P. Birch and M. J. Downs, Metrologia 30 (1993) 155, corrected in Metrologia 31 (1994)
 * 315, for 450 ppm of carbon dioxide. Uncertainty 3e-8 at three standard deviations in laboratory air; within 4e-9 of
 * Ciddor's there.
 *
 * <p>The wavelengths of its range, 350 nm to 650 nm, its temperatures, 15 °C to 30 °C, and its pressures, 60 kPa to 120 kPa,
 * are from memory; the term of the vapour was measured near 20 °C. A relative humidity is taken with the saturation pressure that Ciddor's law uses.
 */
public record BirchDowns() implements AirLaw {
    private static final double STANDARD = 96095.43;
    private static final double EXPANSION = 0.0036610;

    @Override
    public String title() {
        return "Birch and Downs 1994";
    }

    @Override
    public String source() {
        return "K. P. Birch and M. J. Downs, Metrologia 31 (1994) 315-316";
    }

    @Override
    public Range range() {
        return new Range(350e-9, 650e-9, 288.15, 303.15, 60e3, 120e3);
    }

    @Override
    public Saturation saturation() {
        return Saturation.DAVIS;
    }

    @Override
    public Optional<Double> fixedCo2() {
        return Optional.of(450e-6);
    }

    @Override
    public boolean dispersive() {
        return true;
    }

    @Override
    public Dispersion phase(double wavelength) {
        double s2 = AirLaw.squaredWavenumber(wavelength);
        return new Dispersion(
                1e-8 * (8342.54 + 2406147 / (130 - s2) + 15998 / (38.9 - s2)), -1e-10 * (3.7345 - 0.0401 * s2));
    }

    @Override
    public Dispersion group(double wavelength) {
        double s2 = AirLaw.squaredWavenumber(wavelength);
        double u = 130 - s2;
        double v = 38.9 - s2;
        return new Dispersion(
                1e-8 * (8342.54 + 2406147 * (130 + s2) / (u * u) + 15998 * (38.9 + s2) / (v * v)),
                -1e-10 * (3.7345 - 3 * 0.0401 * s2));
    }

    @Override
    public void refractivity(
            Dispersion d, double temperature, double pressure, double vapour, Order order, double[] jet) {
        double t = temperature - ZERO_CELSIUS;
        double c = 1e-8 * (0.601 - 0.00972 * t);
        double slope = -1e-8 * 0.00972;
        double a = EXPANSION / (1 + EXPANSION * t);
        double v = d.dry() / (STANDARD * (1 + EXPANSION * t));
        double u = pressure * (1 + c * pressure);
        jet[N] = v * u + d.vapour() * vapour;
        if (order == Order.VALUE) {
            return;
        }
        double byT = slope * pressure * pressure;
        double byP = 1 + 2 * c * pressure;
        jet[T] = v * (byT - a * u);
        jet[P] = v * byP;
        jet[E] = d.vapour();
        if (order == Order.HESSIAN) {
            jet[TT] = v * (2 * a * a * u - 2 * a * byT);
            jet[TP] = v * (2 * slope * pressure - a * byP);
            jet[TE] = 0;
            jet[PP] = v * 2 * c;
            jet[PE] = 0;
            jet[EE] = 0;
        }
    }
}
