package org.stillpath.medium;

import java.util.Optional;
import org.stillpath.formula.Order;

/**
 * The radio refractivity of Recommendation ITU-R P.453-14, annex 1, equation 6, better than 0.5 % to 100 GHz. The same
 * for phase and group, since air hardly disperses radio waves.
 */
public record RadioP453() implements AirLaw {
    private static final Dispersion NONE = new Dispersion(1, 1);
    // 77.6, 72 and 3.75e5 for pressures in hPa, with N in millionths
    private static final double DRY = 77.6e-8;
    private static final double WET = (72 - 77.6) * 1e-8;
    private static final double DIPOLE = 3.75e-3;

    @Override
    public String title() {
        return "ITU-R P.453";
    }

    @Override
    public String source() {
        return "Recommendation ITU-R P.453-14 (2019), annex 1";
    }

    /** From 100 GHz down, and the temperatures of its saturation pressure over water. */
    @Override
    public Range range() {
        return new Range(299792458 / 100e9, Double.POSITIVE_INFINITY, 233.15, 323.15, 0, Double.POSITIVE_INFINITY);
    }

    @Override
    public Saturation saturation() {
        return Saturation.P453;
    }

    @Override
    public Optional<Double> fixedCo2() {
        return Optional.empty();
    }

    @Override
    public boolean dispersive() {
        return false;
    }

    @Override
    public Dispersion phase(double wavelength) {
        return NONE;
    }

    @Override
    public Dispersion group(double wavelength) {
        return NONE;
    }

    @Override
    public void refractivity(
            Dispersion d, double temperature, double pressure, double vapour, Order order, double[] jet) {
        double over = 1 / temperature;
        double u = (DRY * pressure + WET * vapour) * over;
        double v = DIPOLE * vapour * over * over;
        jet[N] = u + v;
        if (order == Order.VALUE) {
            return;
        }
        jet[T] = -(u + 2 * v) * over;
        jet[P] = DRY * over;
        jet[E] = (WET + DIPOLE * over) * over;
        if (order == Order.HESSIAN) {
            jet[TT] = (2 * u + 6 * v) * over * over;
            jet[TP] = -DRY * over * over;
            jet[TE] = -(WET + 2 * DIPOLE * over) * over * over;
            jet[PP] = 0;
            jet[PE] = 0;
            jet[EE] = 0;
        }
    }
}
