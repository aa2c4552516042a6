package org.stillpath.formula;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.offset;

import java.util.Map;
import java.util.Random;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.stillpath.unit.Dimension;

/** Formulas as loops over blocks of points against the evaluator, and the index made of them against its definition. */
class BlockCompilerTest {
    private static final int POINTS = 37;
    private static final int FORMULAS = 400;
    private static final double WAVELENGTH = 632.8e-9;

    private static double[][] points(Random random) {
        double[][] p = new double[3][POINTS];
        for (double[] row : p) {
            for (int i = 0; i < POINTS; i++) {
                row[i] = 3 * random.nextDouble() - 1.5;
            }
        }
        return p;
    }

    private static double[][] rows(int rows) {
        return new double[rows][POINTS];
    }

    /** Random formulas; fused products and own exponentials may differ in the last digits, which some formulas magnify. */
    @Test
    void givesWhatTheEvaluatorGives() {
        Random random = new Random(20261205);
        long compared = 0;
        long off = 0;
        for (int n = 0; n < FORMULAS; n++) {
            Formula f = CompilerTest.parsable(random);
            double[] arguments =
                    CompilerTest.values(f, random.nextDouble(), random.nextDouble(), 0.5 + random.nextDouble());
            for (Order order : Order.values()) {
                Program program = f.executable(order).program();
                BlockCompiler.Compiled code = BlockCompiler.compile(program).orElseThrow();
                double[][] p = points(random);
                Samples[] charts = CompilerTest.charts(program, p[0], p[1], p[2], order);
                Samples wanted = new Samples(POINTS);
                Evaluator.run(program, p[0], p[1], p[2], POINTS, arguments, WAVELENGTH, charts, order, wanted);
                Samples found = new Samples(POINTS);
                double[] cells = new double[code.cells()];
                code.kernel()
                        .run(p[0], p[1], p[2], POINTS, arguments, WAVELENGTH, charts, found, rows(code.rows()), cells);
                for (int k = 0; k < 10; k++) {
                    double[] w = Evaluator.component(wanted, k);
                    double[] o = Evaluator.component(found, k);
                    for (int i = 0; i < POINTS; i++) {
                        boolean both = Double.isFinite(w[i]) && Double.isFinite(o[i]);
                        boolean neither = !Double.isFinite(w[i]) && !Double.isFinite(o[i]);
                        compared++;
                        off += neither || (both && Math.abs(o[i] - w[i]) <= 1e-9 * (1 + Math.abs(w[i]))) ? 0 : 1;
                    }
                }
            }
        }
        assertThat(compared).isGreaterThan(400_000);
        assertThat(off).as("of %d", compared).isLessThan(compared / 2000);
    }

    @ParameterizedTest
    @ValueSource(
            strings = {
                "1.5*sqrt(1 - 0.1*(r/L)^2)",
                "1.5*sqrt(1 - 0.1*(r/L)^2 + 0.02*(r/L)^4)",
                "1 + 3e-4*exp(-z/L)",
                "1.4 + 0.1*exp(-(rho/L)^2)*sin(3*x/L)*cos(y/L)",
                "1.3 + 0.1*log(2 + z/L) + 0.01*tanh(x/L)",
                "1.5/(1 + 0.1*(rho/L)^2)",
                "1.5 + 0.01*r/L",
                "1.6 - alpha*0.1*abs(x/L)"
            })
    void makesTheIndexOfAFormula(String text) throws FormulaException {
        Map<String, Dimension> with = Map.of("L", Dimension.LENGTH, "alpha", Dimension.NONE);
        Formula f = Formula.parse(text, Names.of(Names.PLACE, with), Dimension.NONE);
        double[] arguments = CompilerTest.values(f, 0.3, 0, 2);
        Random random = new Random(20261206);
        double[][] p = points(random);
        Samples n = new Samples(POINTS);
        Samples e = new Samples(POINTS);
        Samples alone = new Samples(1);
        f.sample(p[0], p[1], p[2], POINTS, arguments, WAVELENGTH, Order.HESSIAN, n);
        IndexBlocks blocks = IndexBlocks.of(f, false).orElseThrow();
        blocks.sample(p[0], p[1], p[2], POINTS, arguments, WAVELENGTH, Chart.NONE, Order.HESSIAN, e);
        for (int i = 0; i < POINTS; i++) {
            double v = n.value[i];
            assertThat(e.value[i]).isCloseTo((v - 1) * (v + 1), offset(1e-14));
            assertThat(e.gx[i]).isCloseTo(v * n.gx[i], offset(1e-13));
            assertThat(e.gz[i]).isCloseTo(v * n.gz[i], offset(1e-13));
            assertThat(e.hxx[i]).isCloseTo(v * n.hxx[i] + n.gx[i] * n.gx[i], offset(1e-12));
            assertThat(e.hyz[i]).isCloseTo(v * n.hyz[i] + n.gy[i] * n.gz[i], offset(1e-12));
            // what a point gives does not depend on the points beside it
            blocks.sample(
                    new double[] {p[0][i]},
                    new double[] {p[1][i]},
                    new double[] {p[2][i]},
                    1,
                    arguments,
                    WAVELENGTH,
                    Chart.NONE,
                    Order.HESSIAN,
                    alone);
            assertThat(alone.value[0]).isEqualTo(e.value[i]);
            assertThat(alone.gy[0]).isEqualTo(e.gy[i]);
            assertThat(alone.hxy[0]).isEqualTo(e.hxy[i]);
        }
    }

    @Test
    void saysWhereTheIndexIsUndefined() throws FormulaException {
        for (String text : new String[] {"sqrt(1 - (r/L)^2)", "1 - (r/L)^2", "1 - log(2 - r/L)"}) {
            Formula f = Formula.parse(text, Names.of(Names.PLACE, Map.of("L", Dimension.LENGTH)), Dimension.NONE);
            Samples out = new Samples(3);
            double[] x = {0.5, "1 - log(2 - r/L)".equals(text) ? 2.5 : 1.5, 0.1};
            IndexBlocks.of(f, false)
                    .orElseThrow()
                    .sample(
                            x,
                            new double[3],
                            new double[3],
                            3,
                            new double[] {1},
                            WAVELENGTH,
                            Chart.NONE,
                            Order.GRADIENT,
                            out);
            assertThat(out.value[0]).as(text).isFinite();
            assertThat(out.value[1]).as(text).isNaN();
            assertThat(out.value[2]).as(text).isFinite();
        }
    }
}
