package org.stillpath.medium;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.Map;
import java.util.stream.Stream;
import org.apache.commons.math3.ode.FirstOrderDifferentialEquations;
import org.apache.commons.math3.ode.nonstiff.DormandPrince853Integrator;
import org.junit.jupiter.api.DynamicTest;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestFactory;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;
import org.stillpath.formula.Chart;
import org.stillpath.formula.Coordinate;
import org.stillpath.formula.Formula;
import org.stillpath.formula.FormulaException;
import org.stillpath.formula.Names;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.unit.Kind;

/** The standard atmosphere, and air at rest. */
class AirPressureTest {
    private static final Humidity DRY = Humidity.none(Saturation.DAVIS);

    @TestFactory
    Stream<DynamicTest> publishedStandardAtmosphere() {
        return Rows.read("us-1976.csv").stream()
                .map(row -> DynamicTest.dynamicTest(row.text("id"), () -> {
                    double at = row.number("at");
                    double p = Us1976.pressureAt(Us1976.geopotential(at));
                    double t = Us1976.temperatureAt(Us1976.geopotential(at));
                    double value =
                            switch (row.text("quantity")) {
                                case "kelvin" -> t;
                                case "pressure" -> p / 100;
                                case "density" -> p * 28.9644e-3 / (8.31432 * t);
                                default -> Us1976.pressureAt(at) / 100;
                            };
                    assertThat(value).isCloseTo(row.number("expected"), within(row.number("tolerance")));
                }));
    }

    @ParameterizedTest
    @CsvSource({
        // p(h) of 288.15 K - 6.5 K/km h, 101325 Pa at 0, gravity of the height; mpmath's quadrature with 30 digits
        "-400, 106223.74549938153729",
        "500, 95461.283789613264079",
        "3000, 70120.849555531842423",
        "9000, 30796.276268743153737"
    })
    void dryAirInTheGravityOfTheHeight(double h, double expected) throws FormulaException {
        Hydrostatic air = Hydrostatic.of(height("288.15 K - 6.5 K/km*height"), DRY, 101325, 0, true);
        assertThat(air.table().pressure(h)).isCloseTo(expected, within(1e-13 * expected));
    }

    @ParameterizedTest
    @ValueSource(doubles = {-2000, -1, 0, 0.3, 12, 777, 8000, 30e3})
    void anEvenLapseHasAClosedForm(double h) throws FormulaException {
        Hydrostatic air = Hydrostatic.of(height("288.15 K - 6.5 K/km*height"), DRY, 9e4, 250, false);
        // p = p1 (T/T1)^(g/(R γ)) with g = 9.80665, R = 287.05287
        double t = 288.15 - 0.0065 * h;
        double t1 = 288.15 - 0.0065 * 250;
        double expected = 9e4 * Math.pow(t / t1, 9.80665 / (287.05287 * 0.0065));
        assertThat(air.table().pressure(h)).isCloseTo(expected, within(2e-14 * expected));
    }

    @Test
    void theStandardAtmosphereIsAtRest() throws FormulaException {
        // its lowest layer as a formula, through the general solver; ln p goes with 1/R, and its R*/M0 is not quite
        // 287.05287
        Hydrostatic air = Hydrostatic.of(
                height("288.15 K - 6.5 K/km*6356766 m*height/(6356766 m + height)"), DRY, 101325, 0, true);
        for (double h = -5000; h < 11e3; h += 500) {
            double other = Math.log(Us1976.pressureAt(Us1976.geopotential(h)) / 101325);
            double expected = 101325 * Math.exp(other * (8314.32 / 28.9644) / 287.05287);
            assertThat(air.table().pressure(h)).isCloseTo(expected, within(1e-13 * expected));
        }
    }

    @ParameterizedTest
    @CsvSource({
        "293.15 K - 6.5 K/km*height - 8 K*exp(-height/(4 m)), 300",
        "303.15 K - 9.8 K/km*height + 20 K*exp(-height/(0.1 m)), 50",
        "283.15 K - 6.5 K/km*height + 2 K*(1 + tanh((height - 1200 m)/(3 m))), 2500"
    })
    void moistAirAgreesWithAnotherIntegrator(String temperature, double top) throws FormulaException {
        ScalarField t = height(temperature);
        Humidity humid = new Humidity(Humidity.Kind.RELATIVE, new Constant(0.7), Saturation.DAVIS);
        Hydrostatic air = Hydrostatic.of(t, humid, 1e5, 0, true);
        FirstOrderDifferentialEquations equation = new FirstOrderDifferentialEquations() {
            @Override
            public int getDimension() {
                return 1;
            }

            @Override
            public void computeDerivatives(double h, double[] y, double[] rate) {
                double kelvin = sample(t, h).value[0];
                double p = Math.exp(y[0]);
                double e = 0.7 * Saturation.DAVIS.pressure(kelvin, p);
                double g = 9.80665 * Math.pow(6356766 / (6356766 + h), 2);
                rate[0] = -g / (287.05287 * kelvin) * (1 - 0.378 * e / p);
            }
        };
        double[] y = {Math.log(1e5)};
        new DormandPrince853Integrator(1e-6, 0.01 * top, 1e-14, 1e-14).integrate(equation, 0, y, top, y);
        double expected = Math.exp(y[0]);
        // the integrator's own error, 1e-14 a step in ln p, a few hundred steps
        assertThat(air.table().pressure(top)).isCloseTo(expected, within(2e-12 * expected));
    }

    @Test
    void aTemperatureThatEndsEndsThePressure() throws FormulaException {
        Hydrostatic air = Hydrostatic.of(height("288.15 K - 6.5 K/km*height"), DRY, 101325, 0, true);
        // 1 K is reached at 44.177 km
        assertThat(air.table().high()).isCloseTo(287.15 / 0.0065, within(1e-3));
        assertThat(air.table().low()).isEqualTo(HydrostaticTable.LOWEST);
        assertThat(air.table().pressure(45e3)).isNaN();
        assertThat(air.explain(0, 0, 45e3)).contains("height = 45 km", "hydrostatic pressure");
        assertThat(air.limits()).hasSize(2);
        Hydrostatic log = Hydrostatic.of(height("290 K + log((height + 1 cm)/(1 m))*1 K"), DRY, 101325, 2, true);
        assertThat(log.table().low()).isCloseTo(-0.01, within(1e-8));
        assertThat(log.table().size()).isLessThan(2000);
    }

    @Test
    void aPieceGoesOnPastItsEdge() {
        Spline s = Spline.of(
                new double[] {0, 100, 200}, new double[] {290, 280, 300}, Interpolation.LINEAR, Beyond.LINEAR);
        ScalarField t = ChartProfile.of(Coordinate.HEIGHT, s, 0);
        Hydrostatic whole = Hydrostatic.of(t, DRY, 101325, 0, false);
        Pressure piece = whole.piece(new int[0], t.piece(new int[] {1}), DRY.quantity(), 0, 100);
        for (double h : new double[] {50, 100, 101, 120}) {
            double expected = 101325 * Math.pow((290 - 0.1 * h) / 290, 9.80665 / (287.05287 * 0.1));
            Samples out = new Samples(1);
            piece.sample(
                    new double[1],
                    new double[1],
                    new double[] {h},
                    1,
                    sample(t.piece(new int[] {1}), h),
                    out,
                    Order.HESSIAN,
                    out);
            assertThat(out.value[0]).isCloseTo(expected, within(1e-13 * expected));
        }
    }

    private static Samples sample(ScalarField f, double h) {
        Samples s = new Samples(1);
        f.on(Chart.FLAT).sample(new double[1], new double[1], new double[] {h}, 1, Double.NaN, Order.HESSIAN, s);
        return s;
    }

    static ScalarField height(String formula) throws FormulaException {
        return FormulaField.of(
                Formula.parse(formula, Names.of(Names.SIGHT, Map.of()), Kind.TEMPERATURE.dimension()), Map.of());
    }
}
