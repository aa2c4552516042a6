package org.stillpath.task.survey;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

/**
 * The textbook formulas against check values. Unless a row says otherwise the values were recomputed from the published formula
 * with 40 digits, by someone other than the author of the class.
 */
class ClassicalTest {
    private static final double R = 6_371_000;

    @Test
    void heightFromOneZenithAngle() {
        // standard trigonometric levelling (Rueger 1996; DIN 18709 practice); recomputed
        assertThat(Classical.heightDifference(3456.789, Math.toRadians(88.7654321), 0.13, R, 1.55, 1.62))
                .isCloseTo(75.22412195031, within(1e-9));
    }

    @Test
    void reciprocalHeights() {
        // Torge; Jordan, Eggert and Kneissl; Bomford; recomputed
        double fore = Math.toRadians(89.6);
        double back = Math.toRadians(90.4389);
        assertThat(Classical.reciprocalHeightDifference(5000, fore, back, 500, R))
                .isCloseTo(36.607444416, within(1e-9));
        assertThat(Classical.reciprocalCoefficient(5000, fore, back, R)).isCloseTo(0.1349034707053, within(1e-9));
    }

    @ParameterizedTest
    @CsvSource({
        // Rueger 1996, 4th ed., sections 6.4 and 7; recomputed
        "1000, 0.13, -2.322021029947e-07, -1.734843298236e-08, -2.495505359771e-07",
        "10000, 0.13, -0.0002322021029947, -1.734843298236e-05, -0.0002495505359771",
        "20000, 0.13, -0.001857616823958, -0.0001387874638589, -0.001996404287817",
        "50000, 0.13, -0.02902526287434, -0.002168554122795, -0.03119381699713",
        "65000, 0.13, -0.06376850253492, -0.004764313407781, -0.0685328159427",
        "50000, 0.25, -0.0481188044999, -0.008019800749983, -0.05613860524988",
        "20000, -1.0, 0.03284910387193, -0.008212275967982, 0.02463682790395"
    })
    void velocityAndArcCorrections(double d, double k, double second, double arc, double sum) {
        assertThat(Classical.secondVelocity(d, k, R)).isCloseTo(second, within(1e-12));
        assertThat(Classical.arcToChord(d, k, R)).isCloseTo(arc, within(1e-12));
        // the algebraic sum of the two, -(2k - k^2) d^3/(24 R^2)
        assertThat(Classical.secondVelocity(d, k, R) + Classical.arcToChord(d, k, R))
                .isCloseTo(-(2 * k - k * k) * d * d * d / (24 * R * R), within(1e-15))
                .isCloseTo(sum, within(1e-12));
    }

    @Test
    void kukkamaki() {
        // Kukkamaki 1938, Publ. Finnish Geodetic Institute 25: slope 3 %, T = a + 1.9116 K z^(-1/3), dn/dT = -0.9e-6;
        // recomputed
        assertThat(Classical.kukkamaki(-9e-7 * 1.9116, -1 / 3.0, 30, 1.6, 0.7))
                .isCloseTo(0.0001910102940816, within(1e-12));
        // a slope that vanishes leaves the level form b c Z^(c-1) L^2/2
        assertThat(Classical.kukkamaki(-9e-7 * 1.9116, -1 / 3.0, 30, 1.6, 1.6 - 1e-4))
                .isCloseTo(Classical.kukkamaki(-9e-7 * 1.9116, -1 / 3.0, 30, 1.6, 1.6), within(1e-8));
    }

    @Test
    void horizon() {
        // first order, constant k, 100 m; recomputed
        assertThat(Math.toDegrees(Classical.dip(100, 0.13, R)) * 60).isCloseTo(17.9657232092, within(1e-9));
        assertThat(Classical.horizon(100, 0.13, R)).isCloseTo(38270.06272727, within(1e-6));
        // rules of thumb, common practice, no source: 1.76' sqrt(h), 3.86 km sqrt(h), geometric 1.93'
        assertThat(Math.toDegrees(Classical.dip(1, 0.16, R)) * 60).isCloseTo(1.76, within(0.02));
        assertThat(Classical.horizon(1, 0.145, R) / 1e3).isCloseTo(3.86, within(0.03));
        assertThat(Math.toDegrees(Classical.dip(1, 0, R)) * 60).isCloseTo(1.93, within(0.01));
    }

    @ParameterizedTest
    @CsvSource({
        // Bennett 1982, J. Navigation 35, 255; apparent altitude in deg, refraction in arc minutes; recomputed
        "0.0, 34.47753374326",
        "0.5, 28.75371017064",
        "5.0, 9.883144234182",
        "10.0, 5.391505467574",
        "45.0, 0.9948479678569",
        "90.0, -0.001351521673756"
    })
    void bennett(double apparent, double minutes) {
        assertThat(Math.toDegrees(Classical.bennett(Math.toRadians(apparent))) * 60)
                .isCloseTo(minutes, within(1e-9));
    }

    @ParameterizedTest
    @CsvSource({
        // Saemundsson 1986, Sky & Telescope 72, 70; true altitude in deg, refraction in arc minutes; recomputed
        "-0.5, 33.68779609467",
        "0.0, 28.98192738445",
        "5.0, 9.674126604114",
        "10.0, 5.407680803135",
        "45.0, 1.012707658874"
    })
    void saemundsson(double altitude, double minutes) {
        assertThat(Math.toDegrees(Classical.saemundsson(Math.toRadians(altitude))) * 60)
                .isCloseTo(minutes, within(1e-9));
    }

    @Test
    void meeusExample() {
        // Meeus, Astronomical Algorithms, 2nd ed., example 16.a; from memory of the worked example
        assertThat(Math.toDegrees(Classical.bennett(Math.toRadians(0.5))) * 60).isCloseTo(28.754, within(0.001));
        assertThat(Math.toDegrees(Classical.saemundsson(Math.toRadians(33.246 / 60))) * 60)
                .isCloseTo(24.618, within(0.001));
    }

    @ParameterizedTest
    @CsvSource({
        // k = 503 P/T^2 (0.0342 + dT/dz): Brunner (ed.) 1984; Hirt et al 2010, JGR 115, D21102; recomputed
        "1013.25, 288.15, -0.0065, 0.1700306122735",
        "1013.25, 288.15, 0.0, 0.2099294924098",
        "1013.25, 288.15, -0.0098, 0.1497742577427",
        "1013.25, 288.15, -0.0341632, 0.0002258890444644",
        "1013.25, 303.15, -0.5, -2.583264861295",
        "1013.25, 288.15, 0.1, 0.8237584175848"
    })
    void coefficientFromTheTemperatureGradient(double hPa, double kelvin, double gradient, double k) {
        assertThat(Classical.coefficient(100 * hPa, kelvin, gradient)).isCloseTo(k, within(1e-10));
    }

    @Test
    void firstVelocity() {
        // Rueger 1996, section 6.2, N of IAG 1999: 0.85 um, 35 degC, 1005 hPa, 25 hPa of vapour, N_REF = 281.8;
        // recomputed
        double ng = 287.6155 + 4.88660 / (0.85 * 0.85) + 0.06800 / Math.pow(0.85, 4);
        double n = (273.15 / 1013.25 * ng * 1005 / 308.15 - 11.27 * 25 / 308.15) * 1e-6;
        assertThat(Classical.firstVelocity(1, 281.8e-6, n)).isCloseTo(23.77520215981e-6, within(1e-14));
        // in the mountains: 0.658 um, 5 degC, 750 hPa, 5 hPa of vapour; recomputed
        double red = 287.6155 + 4.88660 / (0.658 * 0.658) + 0.06800 / Math.pow(0.658, 4);
        double high = (273.15 / 1013.25 * red * 750 / 278.15 - 11.27 * 5 / 278.15) * 1e-6;
        assertThat(Classical.firstVelocity(1, 281.8e-6, high)).isCloseTo(64.45706119453e-6, within(1e-14));
    }
}
