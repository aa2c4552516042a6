package org.stillpath.medium;

import java.util.Optional;
import org.stillpath.formula.Order;

/**
 * The closed formula for electronic distance measurement of the International Association of Geodesy, Resolution 3 of
 * Birmingham 1999 (J. M. Rüeger, report of the ad-hoc working party, Travaux de l'AIG 1999): visible and near infrared,
 * 375 ppm of carbon dioxide, accuracy 1 ppm, since it knows no compressibility.
 *
 * <p>The group formula is the published one, whose coefficients are those of the phase formula's derivative to the digits
 * printed. The ends of the range in wavelength are Ciddor's, to whose law the formula was fitted; those in temperature,
 * −30 °C to 45 °C, are from memory. A relative humidity is taken with Magnus' formula, as surveyors do.
 */
public record IagClosed() implements AirLaw {
    /** 273.15 K over 1013.25 hPa, in SI. */
    private static final double SCALE = 273.15 / 101325;
    /** 11.27e-6 K/hPa in K/Pa. */
    private static final double VAPOUR = -11.27e-8;

    @Override
    public String title() {
        return "IAG 1999";
    }

    @Override
    public String source() {
        return "International Association of Geodesy, Resolution 3 (Birmingham 1999)";
    }

    @Override
    public Range range() {
        return new Range(Ciddor.SHORTEST, Ciddor.LONGEST, 243.15, 318.15, 0, Double.POSITIVE_INFINITY);
    }

    @Override
    public Saturation saturation() {
        return Saturation.MAGNUS;
    }

    @Override
    public Optional<Double> fixedCo2() {
        return Optional.of(375e-6);
    }

    @Override
    public boolean dispersive() {
        return true;
    }

    @Override
    public Dispersion phase(double wavelength) {
        double s2 = AirLaw.squaredWavenumber(wavelength);
        return new Dispersion(1e-6 * (287.6155 + s2 * (1.62887 + s2 * 0.01360)), VAPOUR);
    }

    @Override
    public Dispersion group(double wavelength) {
        double s2 = AirLaw.squaredWavenumber(wavelength);
        return new Dispersion(1e-6 * (287.6155 + s2 * (4.88660 + s2 * 0.06800)), VAPOUR);
    }

    @Override
    public void refractivity(
            Dispersion d, double temperature, double pressure, double vapour, Order order, double[] jet) {
        double a = SCALE * d.dry();
        double over = 1 / temperature;
        double n = (a * pressure + d.vapour() * vapour) * over;
        jet[N] = n;
        if (order == Order.VALUE) {
            return;
        }
        jet[T] = -n * over;
        jet[P] = a * over;
        jet[E] = d.vapour() * over;
        if (order == Order.HESSIAN) {
            jet[TT] = 2 * n * over * over;
            jet[TP] = -a * over * over;
            jet[TE] = -d.vapour() * over * over;
            jet[PP] = 0;
            jet[PE] = 0;
            jet[EE] = 0;
        }
    }
}
