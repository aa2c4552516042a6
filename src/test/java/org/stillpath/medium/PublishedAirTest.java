package org.stillpath.medium;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.nio.file.Path;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.stillpath.formula.Order;
import org.stillpath.geometry.Frame;
import org.stillpath.io.FileSources;
import org.stillpath.problem.Problems;

/**
 * Laws of air against each other and against formulas that the program does not have. Values marked recomputed were evaluated
 * from the published formula with 40 digits by someone other than the author of the program.
 */
class PublishedAirTest {
    private static AirLaw law(String word) {
        return AirLaw.of(word, 450e-6).orElseThrow();
    }

    private static AirState state(String law, double celsius, double pascal, double vapour) {
        return new AirState(law(law), celsius + 273.15, pascal, vapour);
    }

    @Test
    void birchAndDownsAndCiddorDifferByWhatTheyState() {
        // Birch and Downs, Metrologia 31 (1994) 315; Ciddor, Applied Optics 35 (1996) 1566: 633 nm, 20 degC, 100 kPa,
        // dry;
        // recomputed, and within the 1e-8 that both state
        double difference = state("birch-downs-1994", 20, 1e5, 0).refractivity(633e-9)
                - state("ciddor-1996", 20, 1e5, 0).refractivity(633e-9);
        assertThat(difference).isCloseTo(-1.049238860237e-9, within(1e-13));
    }

    @Test
    void theGroupFormulaOfIagIsTheDerivativeOfItsPhaseFormula() {
        // N_ph = A + B/l^2 + C/l^4 gives N_g = A + 3B/l^2 + 5C/l^4: 3 x 1.62887 = 4.88661 and 5 x 0.01360 = 0.068
        // (IAG resolution 3, 1999, prints 4.88660 and 0.06800; recomputed)
        for (double um : new double[] {0.4, 0.55, 0.85, 1.6}) {
            AirState air = state("iag-1999", 0, 101325, 0);
            double h = 1e-4;
            double slope = (air.refractivity((um + h) * 1e-6) - air.refractivity((um - h) * 1e-6)) / (2 * h);
            double group = air.groupRefractivity(um * 1e-6);
            assertThat(group * 1e6)
                    .isCloseTo((air.refractivity(um * 1e-6) - um * slope) * 1e6, within(2e-5 / (um * um) + 1e-6));
        }
    }

    @Test
    void iagAndCiddorAgreeWithinAPartInAMillion() {
        // 0.85 um, 15 degC, 1013.25 hPa, 60 %; the closed formula states 1 ppm; recomputed difference 0.0359 ppm
        double vapour = 0.6 * Saturation.DAVIS.pressure(288.15, 101325);
        double difference = state("iag-1999", 15, 101325, vapour).groupRefractivity(850e-9)
                - state("ciddor-1996", 15, 101325, vapour).groupRefractivity(850e-9);
        assertThat(difference * 1e6).isCloseTo(0.0359005559334, within(0.3));
    }

    @Test
    void p453AgreesWithTwoOtherRadioFormulas() {
        // 1000 hPa of dry air and 13.25 hPa of vapour at 288.15 K: Rueger 2002 (FIG XXII) "best average" 332.8078,
        // Essen and Froome 1951 (IUGG 1963) 331.7097 (both recomputed); P.453 states 0.5 %
        double n = state("radio-p453", 15, 101325, 1325).refractivity(0.01) * 1e6;
        assertThat(n).isCloseTo(332.8078245346, within(0.005 * n)).isCloseTo(331.7096946152, within(0.005 * n));
        assertThat(n).isBetween(331.7096946152, 332.8078245346);
    }

    @ParameterizedTest
    @CsvSource({
        // IAPWS R7-97 (IF97), equation 30, table 35; values from memory of the table, equal to this evaluation
        "300, 3536.58941, 1.8e-5",
        "500, 2638897.76, 0.0132",
        "600, 12344314.6, 0.062"
    })
    void theSecondOracleOfSaturationIsRight(double kelvin, double expected, double tolerance) {
        assertThat(if97(kelvin)).isCloseTo(expected, within(tolerance));
    }

    @Test
    void saturationAgreesWithOtherFormulas() {
        for (double t = 1; t <= 40; t += 3) {
            double pure = if97(t + 273.15);
            assertThat(Saturation.DAVIS.pressure(t + 273.15, 101325)).isCloseTo(pure, within(0.0005 * pure));
            // Buck, J. Appl. Meteorol. 20 (1981) 1527, without enhancement: 23.37282 hPa at 20 degC (recomputed)
            double buck = 611.21 * Math.exp(17.502 * t / (240.97 + t));
            assertThat(Saturation.MAGNUS.pressure(t + 273.15, 101325)).isCloseTo(buck, within(0.004 * buck));
        }
        assertThat(611.21 * Math.exp(17.502 * 20 / 260.97)).isCloseTo(2337.282472851, within(1e-6));
    }

    /** IAPWS R7-97, equation 30; coefficients from memory, proved by the values of table 35 above. */
    private static double if97(double kelvin) {
        double v = kelvin - 0.23855557567849 / (kelvin - 0.65017534844798e3);
        double a = v * v + 0.11670521452767e4 * v - 0.72421316703206e6;
        double b = -0.17073846940092e2 * v * v + 0.12020824702470e5 * v - 0.32325550322333e7;
        double c = 0.14915108613530e2 * v * v - 0.48232657361591e4 * v + 0.40511340542057e6;
        return 1e6 * Math.pow(2 * c / (-b + Math.sqrt(b * b - 4 * a * c)), 4);
    }

    @Test
    void theConstantsOfTheRefractionCoefficient() {
        // g0/R of dry air: at this fall of temperature the density does not change with height; recomputed
        assertThat(Hydrostatic.GRAVITY / Hydrostatic.GAS).isCloseTo(0.03416321878266, within(1e-12));
        // R c of k = (R c)(P/T^2)(0.0342 + dT/dz), 0.55 um, R = 6371 km, IAG 1999: "503" of the literature; recomputed
        double nu = state("iag-1999", 0, 101325, 0).refractivity(550e-9);
        assertThat(nu * 273.15 / 1013.25 * 6_371_000).isCloseTo(503.4778220437, within(1e-8));
    }

    @Test
    void whatADegreeAndAHectopascalDoToADistance() {
        // 15 degC, 1013.25 hPa, dry, 0.85 um, IAG 1999; derivatives recomputed, in ppm. Rules of thumb, common
        // practice, no
        // source: 1 ppm a degree, 0.3 ppm a hectopascal
        AirLaw iag = law("iag-1999");
        double[] jet = new double[AirLaw.JET];
        iag.refractivity(iag.group(850e-9), 288.15, 101325, 0, Order.GRADIENT, jet);
        assertThat(jet[AirLaw.T] * 1e6)
                .isCloseTo(-0.9688640969314, within(1e-9))
                .isCloseTo(-1, within(0.1));
        assertThat(jet[AirLaw.P] * 1e8).isCloseTo(0.2755274508076, within(1e-9)).isCloseTo(0.3, within(0.03));
        assertThat(jet[AirLaw.E] * 1e8).isCloseTo(-0.03911157383307, within(1e-9));
        // the D of K' = (C - D p/T + 11.27 e/T) 1e-6 d, Rueger 1996
        iag.refractivity(iag.group(850e-9), 273.15, 101325, 0, Order.VALUE, jet);
        assertThat(jet[AirLaw.N] * 1e6 * 273.15 / 1013.25).isCloseTo(79.39323495021, within(1e-9));
    }

    @Test
    void theUnstableSurfaceLayerHasItsStabilityFunctions() {
        // Dyer 1974, Paulson 1970: phi_h(-0.5) = (1 + 8)^(-1/2) = 1/3, psi_h(-0.5) = 2 ln((1 + 3)/2) = 1.38629436112
        // (recomputed), taken out of the shipped model: T(z) less what a neutral layer would have
        Problems problems = new Problems();
        Medium m = MediumFile.read("air/monin-obukhov-unstable", FileSources.of(Path.of("job.yaml"), false), problems)
                .medium();
        assertThat(problems.list()).isEmpty();
        AtmosphereMedium air = (AtmosphereMedium) m;
        double flux = 200;
        double u = 0.3;
        double rhocp = 1206;
        double k = 0.4;
        double length = u * u * u * 303.15 * rhocp / (k * 9.80665 * flux);
        double scale = flux / (rhocp * u * k);
        double z = 0.5 * length;
        double near = 1e-5 * length;
        double[] t = air.temperatures(Frame.JOB, org.stillpath.formula.Chart.FLAT, new double[4], new double[] {
            z, near, z * 1.0001, z * 0.9999
        });
        // psi(near) = 2 ln((1 + sqrt(1 + 16 near/L))/2), 8e-5
        double psiNear = 2 * Math.log((1 + Math.sqrt(1 + 16 * near / length)) / 2);
        double psi = Math.log(z / near) + psiNear + (t[0] - t[1] + 0.0098 * (z - near)) / scale;
        assertThat(psi).isCloseTo(1.38629436112, within(1e-9));
        double phi = -((t[2] - t[3]) / (0.0002 * z) + 0.0098) * z / scale;
        assertThat(phi).isCloseTo(1 / 3.0, within(1e-7));
    }
}
