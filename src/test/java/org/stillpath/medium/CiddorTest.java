package org.stillpath.medium;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;

import java.util.stream.Stream;
import org.junit.jupiter.api.DynamicTest;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestFactory;
import org.stillpath.geometry.Frame;

class CiddorTest {
    @TestFactory
    Stream<DynamicTest> publishedValues() {
        return Rows.read("ciddor.csv").stream()
                .map(row -> DynamicTest.dynamicTest(
                        row.text("id"),
                        () -> assertThat(value(row))
                                .isCloseTo(row.number("expected"), within(row.number("tolerance")))));
    }

    @Test
    void groupIsTheDerivativeOfPhase() {
        // n_g - 1 = N - λ dN/dλ, the derivative by Richardson's extrapolation of central differences
        AirState air = state(295, 99e3, 1500, 420e-6);
        double w = 700e-9;
        double h = 4e-9;
        double coarse = (air.refractivity(w + h) - air.refractivity(w - h)) / (2 * h);
        double fine = (air.refractivity(w + h / 2) - air.refractivity(w - h / 2)) / h;
        double derivative = (4 * fine - coarse) / 3;
        // error: h⁴ of the sixth-degree terms, about 1e-9 of the dispersion of 3e-6
        assertThat(air.groupRefractivity(w)).isCloseTo(air.refractivity(w) - w * derivative, within(1e-13));
    }

    @Test
    void tellsWhatIsOutsideThePublishedRange() {
        assertThat(state(293.15, 101325, 0, 420e-6).warnings(633e-9)).isEmpty();
        assertThat(state(293.15, 101325, 0, 420e-6).warnings(3390e-9))
                .singleElement()
                .asString()
                .contains("3390 nm", "300 nm to 1690 nm");
        assertThat(state(200, 50e3, 0, 420e-6).warnings(633e-9)).hasSize(2);
        assertThat(state(293.15, 101325, 3000, 420e-6).warnings(633e-9))
                .singleElement()
                .asString()
                .contains("saturation");
    }

    @Test
    void refusesStatesThatNoAirHas() {
        assertThatThrownBy(() -> state(-1, 101325, 0, 0)).hasMessageContaining("temperature");
        assertThatThrownBy(() -> state(293, 0, 0, 0)).hasMessageContaining("pressure");
        assertThatThrownBy(() -> state(293, 1000, 2000, 0)).hasMessageContaining("vapourPressure");
        assertThatThrownBy(() -> state(293, 1000, 0, 420)).hasMessageContaining("co2");
        assertThatThrownBy(() -> state(293, 1000, 0, 0).refractivity(Double.NaN))
                .hasMessageContaining("wavelength");
    }

    @Test
    void builtInAirKeepsTheDigitsOfItsRefractivity() {
        IndexField field = AirMedium.builtIn().field(633e-9, Frame.JOB);
        Scratch s = new Scratch();
        field.sample(s.x, s.y, s.z, 1, org.stillpath.formula.Order.VALUE, s.samples);
        double nu = AirState.laboratory().refractivity(633e-9);
        assertThat(field.uniform()).isTrue();
        assertThat(s.samples.value[0]).isEqualTo(nu * (2 + nu));
        // about 2.7e-4 for laboratory air; common practice, no source
        assertThat(nu).isBetween(2.70e-4, 2.73e-4);
    }

    private static double value(Rows.Row row) {
        double t = row.number("t");
        double p = row.number("p");
        double co2 = row.number("co2") * 1e-6;
        double wavelength = row.number("wavelength") * 1e-6;
        double s2 = 1e-12 / (wavelength * wavelength);
        return switch (row.text("quantity")) {
            case "phase" -> air(t, p, row.number("humidity"), co2).refractivity(wavelength);
            case "group" -> air(t, p, row.number("humidity"), co2).groupRefractivity(wavelength);
            case "dry" -> Ciddor.dry(s2, co2);
            case "dry-group" -> Ciddor.dryGroup(s2, co2);
            case "vapour" -> Ciddor.vapour(s2);
            case "saturation" -> Saturation.DAVIS.pressure(t + 273.15, 101325);
            case "enhancement" -> Ciddor.enhancement(t, p);
            case "compressibility" -> Ciddor.compressibility(t, p, 0);
            case "dry-density" -> Ciddor.standardDryDensity(co2);
            case "vapour-density" -> Ciddor.standardVapourDensity();
            default -> throw new IllegalArgumentException("quantity: " + row.text("quantity"));
        };
    }

    private static AirState air(double t, double p, double humidity, double co2) {
        double temperature = t + 273.15;
        return state(temperature, p, humidity * Saturation.DAVIS.pressure(temperature, p), co2);
    }

    private static AirState state(double temperature, double pressure, double vapour, double co2) {
        return new AirState(Ciddor.of(co2), temperature, pressure, vapour);
    }
}
