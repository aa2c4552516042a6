package org.stillpath.formula;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Random;
import org.hipparchus.analysis.differentiation.DSFactory;
import org.hipparchus.analysis.differentiation.DerivativeStructure;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.stillpath.unit.Dimension;

class FormulaTest {
    private static final Map<String, Dimension> WITH = Map.of(
            "a", Dimension.LENGTH, "g", Dimension.LENGTH.power(-1, 1), "L", Dimension.LENGTH, "n0", Dimension.NONE);
    private static final Map<String, Double> VALUES = Map.of("a", 0.7, "g", 0.9, "L", 2.0, "n0", 1.6);

    private static Formula parse(String text) throws FormulaException {
        return Formula.parse(text, Names.of(Names.PLACE, WITH));
    }

    private static Samples sample(Formula f, double x, double y, double z) {
        Samples s = new Samples(1);
        double[] arguments = f.arguments().stream().mapToDouble(VALUES::get).toArray();
        f.sample(new double[] {x}, new double[] {y}, new double[] {z}, 1, arguments, 500e-9, Order.HESSIAN, s);
        return s;
    }

    private static double value(String text) throws FormulaException {
        return sample(parse(text), 0.3, -0.4, 1.2).value[0];
    }

    @ParameterizedTest
    @CsvSource({
        "-2^2, -4",
        "2^3^2, 512",
        "2^-2, 0.25",
        "8/4/2, 1",
        "2-3-4, -5",
        "2*3 + 4*5, 26",
        "-(2 - 5)*2, 6",
        "1e3 + .5, 1000.5",
        "--3, 3",
        "'min(3, 1, 2) + max(3, 5)', 6",
        "'hypot(3, 4)', 5",
        "abs(-2.5), 2.5",
        "log10(1000), 3",
        "pi/pi, 1",
        "sqrt(16)^3, 64",
        "(2)^(0.5)*(2)^(0.5), 2.0000000000000004",
        "'atan2(1, 1)*4/pi', 1",
        "sech(0), 1",
        "(L/(1 m))^100, 1.2676506002282294e30",
        "(L/(1 m))^-70, 8.470329472543003e-22",
        "30 deg*180/pi, 30"
    })
    void isOrdinaryMathematics(String text, double expected) throws FormulaException {
        assertThat(value(text)).isCloseTo(expected, within(2e-15 * Math.abs(expected)));
    }

    /** A unit stands directly after a number and only there; a part behind a slash that is a name is no unit. */
    @ParameterizedTest
    @CsvSource({
        "0.5 m^2, 0.5",
        "500 mm * 1 m, 0.5",
        "0.01 1/mm * 3 m, 30",
        "5 m/L, 2.5",
        "5 m/a, 7.142857142857143",
        "2 W/(m K)/(1 W/(m K)), 2",
        "g*a, 0.63",
        "1 km/(1 m), 1000",
        "1/2 m * 1 m, 0.5"
    })
    void readsUnitsBehindNumbersOnly(String text, double expected) throws FormulaException {
        assertThat(value(text)).isCloseTo(expected, within(1e-14 * expected));
    }

    @ParameterizedTest
    @CsvSource(
            delimiter = '|',
            value = {
                "1.5 + 0.01*x            | 6  | a length",
                "sqrt(x)*1 + 1           | -1 | cannot be added",
                "exp(x)                  | 4  | a pure number",
                "x^y                     | -1 | exponent",
                "gg*x                    | 0  | did you mean `g`",
                "n0*sqrt(1 - (g*r)^2     | 7  | not closed",
                "2 x                     | 2  | a product is written with *",
                "sinus(1)                | 0  | no function has this name",
                "1 +                     | -1 | ",
                "min(1)                  | -1 | "
            })
    void tellsWhatIsWrong(String text, int offset, String words) {
        assertThatThrownBy(() -> Formula.parse(text, Names.of(Names.PLACE, WITH), Dimension.NONE))
                .isInstanceOfSatisfying(FormulaException.class, e -> {
                    assertThat(e.faults()).isNotEmpty();
                    if (words != null) {
                        assertThat(e.faults().get(0).message()).contains(words);
                    }
                    if (offset >= 0) {
                        assertThat(e.faults().get(0).offset()).isEqualTo(offset);
                    }
                });
    }

    @Test
    void limitsLengthAndDepth() {
        String deep = "(".repeat(Formula.DEEPEST_NESTING + 1) + "1" + ")".repeat(Formula.DEEPEST_NESTING + 1);
        String longText = "1" + "+1".repeat(Formula.LONGEST_TEXT);
        for (String text : List.of(deep, longText, "-".repeat(3000) + "1", "2^".repeat(1500) + "2")) {
            assertThatThrownBy(() -> parse(text)).isInstanceOf(FormulaException.class);
        }
    }

    @Test
    void namesTheOperationThatHasNoValue() throws FormulaException {
        Formula f = parse("n0*sqrt(1 - (g*r)^2)");
        assertThat(sample(f, 2, 0, 0).value[0]).isNaN();
        double[] arguments = f.arguments().stream().mapToDouble(VALUES::get).toArray();
        assertThat(f.explain(2, 0, 0, arguments, 500e-9)).contains("square root", "-2.24");
        assertThat(f.explain(0.1, 0, 0, arguments, 500e-9)).isEmpty();
        assertThatThrownBy(() -> parse("log(0 - 1)")).hasMessageContaining("the logarithm of -1");
    }

    /** Limits on the axis: n = n0 √(1 − g²r²) has gradient 0 and Hessian −n0 g² there; near it the closed form holds. */
    @Test
    void isRightOnTheAxis() throws FormulaException {
        Formula rod = parse("n0*sqrt(1 - (g*r)^2)");
        Samples s = sample(rod, 0, 0, 0.7);
        double curvature = -1.6 * 0.81;
        assertThat(s.gx[0]).isZero();
        assertThat(s.gy[0]).isZero();
        assertThat(s.hxx[0]).isCloseTo(curvature, within(1e-15));
        assertThat(s.hyy[0]).isCloseTo(curvature, within(1e-15));
        assertThat(s.hxy[0]).isZero();
        Samples near = sample(rod, 3e-9, -4e-9, 0);
        assertThat(near.gx[0]).isCloseTo(curvature * 3e-9, within(1e-22));
        assertThat(near.hxx[0]).isCloseTo(curvature, within(1e-14));
        Samples centre = sample(parse("n0/(1 + (rho/a)^2)"), 0, 0, 0);
        assertThat(centre.hzz[0]).isCloseTo(-2 * 1.6 / 0.49, within(1e-14));
        // written with a bare r: cos(g r) is even in r as well
        Samples even = sample(parse("n0*cos(g*r)"), 0, 0, 0);
        assertThat(even.hxx[0]).isCloseTo(curvature, within(1e-14));
        // a cone has no direction on its axis
        Samples cone = sample(parse("n0 - r/a"), 0, 0, 0);
        assertThat(cone.gx[0]).isZero();
        assertThat(cone.gy[0]).isZero();
    }

    /**
     * The exponential integral against Abramowitz and Stegun, table 5.1, and the error function against table 7.1; values from
     * memory.
     */
    @Test
    void knowsItsSpecialFunctions() throws FormulaException {
        assertThat(value("E1(1)")).isCloseTo(0.219383934395520274, within(3e-16));
        assertThat(value("E1(0.5)")).isCloseTo(0.559773594776160812, within(3e-16));
        assertThat(value("E1(2)")).isCloseTo(0.0489005107080611199, within(1e-16));
        assertThat(value("erf(1)")).isCloseTo(0.842700792949714869, within(3e-16));
    }

    @Test
    void findsItsKinks() throws FormulaException {
        assertThat(parse("max(x/a, 0) + abs(y/a - 1)").kinks()).hasSize(2);
        assertThat(parse("n0*sqrt(1 - (g*r)^2)").kinks()).isEmpty();
    }

    /** On either side of its kinks a piece is the formula itself; beyond them it goes on smoothly. */
    @Test
    void goesOnBeyondItsKinks() throws FormulaException {
        String text = "n0 + min(x/a, 0.2)*abs(y/a - 1) + sqrt((z/a)^2)";
        Formula whole = parse(text);
        assertThat(whole.kinks()).hasSize(3);
        Random random = new Random(3);
        for (int i = 0; i < 200; i++) {
            double x = random.nextDouble() - 0.5;
            double y = 2 * random.nextDouble();
            double z = random.nextDouble() - 0.5;
            boolean[] sides = {x / 0.7 > 0.2, y / 0.7 > 1, z > 0};
            Samples a = sample(whole, x, y, z);
            Samples b = sample(whole.piece(sides), x, y, z);
            assertThat(b.value[0]).isCloseTo(a.value[0], within(4e-16));
            assertThat(b.gx[0]).isCloseTo(a.gx[0], within(1e-15));
            assertThat(b.gz[0]).isCloseTo(a.gz[0], within(1e-15));
            Samples beyond = sample(whole.piece(new boolean[] {false, true, true}), x, y, z);
            assertThat(beyond.value[0]).isCloseTo(1.6 + x / 0.7 * (y / 0.7 - 1) + z / 0.7, within(1e-15));
        }
        assertThat(parse(text).piece(new boolean[3]).kinks()).isEmpty();
        assertThatThrownBy(() -> whole.piece(new boolean[2])).isInstanceOf(IllegalArgumentException.class);
    }

    /** Random formulas: value, gradient and Hessian against Hipparchus' automatic differentiation of the same tree. */
    @Test
    void differentiatesExactly() throws FormulaException {
        Random random = new Random(20261201);
        DSFactory factory = new DSFactory(3, 2);
        int checked = 0;
        for (int i = 0; i < 600; i++) {
            Pair pair = random(random, factory, 4);
            double x = random.nextDouble() - 0.5;
            double y = random.nextDouble() - 0.5;
            double z = random.nextDouble() - 0.5;
            DerivativeStructure wanted = pair.function.at(
                    new DerivativeStructure[] {factory.variable(0, x), factory.variable(1, y), factory.variable(2, z)});
            Samples s = sample(parse(pair.text), x, y, z);
            double size = Math.abs(wanted.getValue());
            for (double d : wanted.getAllDerivatives()) {
                size = Math.max(size, Math.abs(d));
            }
            if (!(size < 1e6)) {
                continue;
            }
            checked++;
            double tolerance = 1e-11 * (1 + size);
            assertThat(s.value[0]).as(pair.text).isCloseTo(wanted.getValue(), within(tolerance));
            assertThat(s.gx[0]).as(pair.text).isCloseTo(wanted.getPartialDerivative(1, 0, 0), within(tolerance));
            assertThat(s.gy[0]).as(pair.text).isCloseTo(wanted.getPartialDerivative(0, 1, 0), within(tolerance));
            assertThat(s.gz[0]).as(pair.text).isCloseTo(wanted.getPartialDerivative(0, 0, 1), within(tolerance));
            assertThat(s.hxx[0]).as(pair.text).isCloseTo(wanted.getPartialDerivative(2, 0, 0), within(tolerance));
            assertThat(s.hxy[0]).as(pair.text).isCloseTo(wanted.getPartialDerivative(1, 1, 0), within(tolerance));
            assertThat(s.hxz[0]).as(pair.text).isCloseTo(wanted.getPartialDerivative(1, 0, 1), within(tolerance));
            assertThat(s.hyy[0]).as(pair.text).isCloseTo(wanted.getPartialDerivative(0, 2, 0), within(tolerance));
            assertThat(s.hyz[0]).as(pair.text).isCloseTo(wanted.getPartialDerivative(0, 1, 1), within(tolerance));
            assertThat(s.hzz[0]).as(pair.text).isCloseTo(wanted.getPartialDerivative(0, 0, 2), within(tolerance));
        }
        assertThat(checked).isGreaterThan(500);
    }

    private interface Differentiable {
        DerivativeStructure at(DerivativeStructure[] q);
    }

    private record Pair(String text, Differentiable function) {}

    private static Pair random(Random random, DSFactory factory, int depth) {
        if (depth == 0 || random.nextInt(6) == 0) {
            return switch (random.nextInt(6)) {
                case 0 -> new Pair("(x/(1 m))", q -> q[0]);
                case 1 -> new Pair("(y/(1 m))", q -> q[1]);
                case 2 -> new Pair("(z/(1 m))", q -> q[2]);
                case 3 ->
                    new Pair(
                            "(r/(1 m))",
                            q -> q[0].multiply(q[0]).add(q[1].multiply(q[1])).sqrt());
                case 4 ->
                    new Pair(
                            "(rho/(1 m))",
                            q -> q[0].multiply(q[0])
                                    .add(q[1].multiply(q[1]))
                                    .add(q[2].multiply(q[2]))
                                    .sqrt());
                default -> {
                    double c = 0.5 + random.nextDouble();
                    yield new Pair(Double.toString(c), q -> factory.constant(c));
                }
            };
        }
        Pair a = random(random, factory, depth - 1);
        Pair b = random(random, factory, depth - 1);
        List<Pair> choices = new ArrayList<>();
        choices.add(new Pair(
                "(" + a.text + " + " + b.text + ")", q -> a.function.at(q).add(b.function.at(q))));
        choices.add(new Pair(
                "(" + a.text + " - " + b.text + ")", q -> a.function.at(q).subtract(b.function.at(q))));
        choices.add(new Pair(
                "(" + a.text + "*" + b.text + ")", q -> a.function.at(q).multiply(b.function.at(q))));
        choices.add(new Pair(
                "(" + a.text + "/(2 + " + b.text + "^2))",
                q -> a.function
                        .at(q)
                        .divide(b.function.at(q).multiply(b.function.at(q)).add(2))));
        choices.add(new Pair("sin(" + a.text + ")", q -> a.function.at(q).sin()));
        choices.add(new Pair(
                "exp(-(" + a.text + ")^2)",
                q -> a.function.at(q).pow(2).negate().exp()));
        choices.add(new Pair(
                "sqrt(1.5 + " + a.text + "^2)",
                q -> a.function.at(q).pow(2).add(1.5).sqrt()));
        choices.add(new Pair(
                "log(3 + " + a.text + "^2)", q -> a.function.at(q).pow(2).add(3).log()));
        choices.add(new Pair("tanh(" + a.text + ")", q -> a.function.at(q).tanh()));
        choices.add(new Pair("atan(" + a.text + ")", q -> a.function.at(q).atan()));
        choices.add(new Pair(
                "((1.2 + " + a.text + "^2)^0.7)",
                q -> a.function.at(q).pow(2).add(1.2).pow(0.7)));
        choices.add(new Pair("((" + a.text + ")^3)", q -> a.function.at(q).pow(3)));
        return choices.get(random.nextInt(choices.size()));
    }
}
