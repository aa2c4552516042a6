package org.stillpath.unit;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.math.BigDecimal;
import java.math.MathContext;
import org.apache.commons.rng.UniformRandomProvider;
import org.apache.commons.rng.simple.RandomSource;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;

class QuantityTest {
    /** The doubles nearest to the exact decimal values: written out, the compiler rounds them. */
    @Test
    void decimalUnitsGiveTheNearestDouble() throws UnitException {
        assertThat(si("633 nm")).isEqualTo(6.33E-7);
        assertThat(si("0.9 mm")).isEqualTo(9e-4);
        assertThat(si("0.304 1/mm")).isEqualTo(304.0);
        assertThat(si("587.5618 nm")).isEqualTo(5.875618e-7);
        assertThat(si("20 degC")).isEqualTo(293.15);
        assertThat(si("-40 °C")).isEqualTo(233.15);
        assertThat(si("20°C")).isEqualTo(293.15);
        assertThat(si("101.325 kPa")).isEqualTo(101325.0);
        assertThat(si("-6.5 K/km")).isEqualTo(-0.0065);
        assertThat(si("50 %")).isEqualTo(0.5);
        assertThat(si("50%")).isEqualTo(0.5);
        assertThat(si("420 ppm")).isEqualTo(420e-6);
        assertThat(si("1e-3")).isEqualTo(1e-3);
        assertThat(si("5.2 um")).isEqualTo(5.2e-6);
        assertThat(si("5.2 µm")).isEqualTo(5.2e-6);
        assertThat(si("-2.5 dpt")).isEqualTo(-2.5);
        assertThat(si("−3 mm")).isEqualTo(-0.003);
        assertThat(si(" .5 m ")).isEqualTo(0.5);
        assertThat(si("0")).isEqualTo(0);
    }

    /** The double nearest to the exact product, for random decimals; seed literal. */
    @Test
    void everyDecimalIsRoundedOnce() throws UnitException {
        UniformRandomProvider random = RandomSource.XO_RO_SHI_RO_128_PP.create(20260711L);
        for (int i = 0; i < 2000; i++) {
            String number = (random.nextInt(100000) + 1) + "." + random.nextInt(1000000);
            assertThat(si(number + " nm")).isEqualTo(Double.parseDouble(number + "e-9"));
            assertThat(si(number + " 1/mm")).isEqualTo(Double.parseDouble(number + "e3"));
            double degrees = new BigDecimal(number)
                    .multiply(new BigDecimal("3.14159265358979323846264338327950288"))
                    .divide(BigDecimal.valueOf(180), new MathContext(34))
                    .doubleValue();
            assertThat(si(number + " deg")).isEqualTo(degrees);
        }
    }

    @ParameterizedTest
    @CsvSource(
            delimiter = '|',
            quoteCharacter = '`',
            value = {
                // angle in arc seconds, worked by hand: (degrees * 60 + minutes) * 60 + seconds
                "12°30'15.5\" | 45015.5",
                "12° 30' 15.5\" | 45015.5",
                "12°30′15.5″ | 45015.5",
                "-12°30'15.5\" | -45015.5",
                "-0°05'00\" | -300",
                "-0°00'00.5\" | -0.5",
                "0°0'1\" | 1",
                "12° | 43200",
                "12.5° | 45000",
                "12.5 ° | 45000",
                "30' | 1800",
                "30'15\" | 1815",
                "15\" | 15",
                "1.5' | 90",
                "12°15\" | 43215",
                "15 arcsec | 15",
                "2 arcmin | 120",
                "100 gon | 324000",
                "359°59'59.9999\" | 1295999.9999",
            })
    void readsAngles(String text, BigDecimal arcSeconds) throws UnitException {
        Quantity q = Quantity.parse(text);
        double expected = arcSeconds
                .multiply(new BigDecimal("3.14159265358979323846264338327950288"))
                .divide(BigDecimal.valueOf(648000), new MathContext(34))
                .doubleValue();
        assertThat(q.value()).isEqualTo(expected);
        assertThat(q.flavour()).isEqualTo(Flavour.ANGLE);
        assertThat(q.dimension()).isEqualTo(Dimension.NONE);
    }

    @ParameterizedTest
    @CsvSource(
            delimiter = '|',
            quoteCharacter = '`',
            value = {
                "5mm | 1 | \"5mm\" needs a blank between number and unit: 5 mm",
                "0,5 mm | 1 | \"0,5 mm\": decimals are written with a point here",
                "5 mmm | 2 | \"mmm\" is not a unit known here; did you mean mm?",
                "3 W/(m Kk) | 7 | \"Kk\" is not a unit known here; did you mean K?",
                "5 K / km | 2 | \"K / km\" does not read as a unit; write it as in W/(m K), kg m/s^2 or 1/mm, without blanks around the slash",
                "5 1/degC | 2 | \"1/degC\" does not read as a unit; within a composite unit write K for a difference of temperatures",
                "abc | 0 | \"abc\" does not start with a number",
                "NaN | 0 | \"NaN\" does not start with a number",
                "`` | 0 | there is no value",
                "0x10 m | 0 | \"0x10 m\" is not a number with a unit",
                "12°75'00\" | 3 | \"12°75'00\"\": minutes and seconds stay below 60",
                "12.5°30' | 5 | \"12.5°30'\": only the last part of an angle may have decimals",
                "12°-30' | 3 | \"12°-30'\" does not read as degrees, minutes and seconds, as in 12°30'15.5\"",
                "12'30° | 3 | \"12'30°\" does not read as degrees, minutes and seconds, as in 12°30'15.5\"",
                "12°30 | 3 | \"12°30\" does not read as degrees, minutes and seconds, as in 12°30'15.5\"",
                "1e400 m | 0 | \"1e400 m\" is too large to compute with",
                "1e-400 m | 0 | \"1e-400 m\" is too small to be told from 0",
                "1e-320 nm | 0 | \"1e-320 nm\" is too small to be told from 0",
                "1e999999999999 | 0 | \"1e999999999999\" is too large to compute with",
                "5 qqqqqq | 2 | \"qqqqqq\" is not a unit known here",
            })
    void saysWhatIsWrongAndWhere(String text, int offset, String message) {
        String given = text == null ? "" : text;
        assertThatThrownBy(() -> Quantity.parse(given)).isInstanceOfSatisfying(UnitException.class, e -> {
            assertThat(e.getMessage()).isEqualTo(message);
            assertThat(e.offset()).isEqualTo(offset);
        });
    }

    @ParameterizedTest
    @ValueSource(
            strings = {
                "5 m m m/(",
                "°",
                "-",
                "+ 5 m",
                ".",
                "e5",
                "5 °°",
                "5 '\"",
                "1/mm",
                "5 m^",
                "5 (m)",
                "12°30'15.5\"x"
            })
    void neverCrashes(String text) {
        assertThatThrownBy(() -> Quantity.parse(text)).isInstanceOf(UnitException.class);
    }

    @Test
    void kindsRefuseWithTheRemedy() throws UnitException {
        assertThat(Kind.INVERSE_LENGTH.refusal(Quantity.parse("0.31 mm")))
                .contains("\"0.31 mm\" is a length; an inverse length is needed, such as 0.31 1/mm");
        assertThat(Kind.INVERSE_LENGTH.refusal(Quantity.parse("0.31")))
                .contains("\"0.31\" has no unit; an inverse length is needed, such as 0.31 1/mm");
        assertThat(Kind.INVERSE_LENGTH.refusal(Quantity.parse("2 dpt"))).isEmpty();
        assertThat(Kind.LENGTH.refusal(Quantity.parse("0"))).isEmpty();
        assertThat(Kind.LENGTH.refusal(Quantity.parse("0 K")))
                .contains("\"0 K\" is a temperature; a length is needed, such as 0 mm");
        assertThat(Kind.ANGLE.refusal(Quantity.parse("3")))
                .contains("\"3\" has no unit; an angle is needed, such as 3 deg");
        assertThat(Kind.ANGLE.refusal(Quantity.parse("3 mrad"))).isEmpty();
        assertThat(Kind.NUMBER.refusal(Quantity.parse("3 deg")))
                .contains("\"3 deg\" is an angle; a pure number is needed, such as 3");
        assertThat(Kind.NUMBER.refusal(Quantity.parse("3 %"))).isEmpty();
        assertThat(Kind.TEMPERATURE.refusal(Quantity.parse("20 degC"))).isEmpty();
        assertThat(Kind.TEMPERATURE.refusal(Quantity.parse("293 K"))).isEmpty();
        assertThat(Kind.TEMPERATURE_DIFFERENCE.refusal(Quantity.parse("15 K"))).isEmpty();
        assertThat(Kind.TEMPERATURE_DIFFERENCE.refusal(Quantity.parse("15 degC")))
                .contains("\"15 degC\" is a point on the temperature scale;"
                        + " a temperature difference is needed, such as 15 K");
        assertThat(Kind.of(Dimension.LENGTH.power(2, 1)).refusal(Quantity.parse("1 mm^2")))
                .isEmpty();
        assertThat(Kind.of(Dimension.LENGTH)).isSameAs(Kind.LENGTH);
    }

    @ParameterizedTest
    @CsvSource({
        "0.00205, m, NaN, 2.05 mm",
        "0.0020500001234, m, 1e-9, 2.050000 mm",
        "0.0020516, m, 3e-7, 2.0516 mm",
        "0.0020516, m, 3e-6, 2.052 mm",
        "633e-9, m, 0, 633 nm",
        "5.2e-6, m, 0, 5.2 µm",
        "900, m, 0, 900 m",
        "6371000, m, 0, 6371 km",
        "-0.0148, m, 0, -14.8 mm",
        "0, m, 0, 0 mm",
        "1.5e-18, m, 0, 1.5e-9 nm",
        "0.0025, rad, 0, 2.5 mrad",
        "0.333333333333333, 1, 0, 0.3333333333",
        "0.3333, 1, 0.5, 0.3",
        "101325, Pa, 0, 1013.25 hPa",
        "1234567.8, K, 300, 1234600 K",
        "12345678901234, 1, 0, 1.23456789e13",
        "487.8, 1/m, 0, 487.8 1/m",
    })
    void showsAsManyDigitsAsTheErrorSupports(double si, String unit, double error, String expected) {
        assertThat(Display.of(si, unit, error)).hasToString(expected);
    }

    @Test
    void saysSevenDigitsAtMost() {
        assertThat(Display.brief(0.003056359843, "m", 1e-12)).hasToString("3.056360 mm");
        assertThat(Display.brief(0.003056359843, "m", 3e-6)).hasToString("3.056 mm");
        assertThat(Display.brief(1234567.8, "K", 0)).hasToString("1234568 K");
    }

    @Test
    void showsInAChosenUnit() {
        assertThat(Display.in(487.8, "dpt", 0)).hasToString("487.8 dpt");
        assertThat(Display.in(Math.PI / 648000, "arcsec", Math.PI / 648000 * 0.01))
                .hasToString("1.00 arcsec");
        assertThat(Display.in(Double.POSITIVE_INFINITY, "mm", 0).number()).isEqualTo("infinite");
        assertThatThrownBy(() -> Display.in(1, "furlong", 0)).isInstanceOf(IllegalArgumentException.class);
    }

    private static double si(String text) throws UnitException {
        return Quantity.parse(text).value();
    }
}
