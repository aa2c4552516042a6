package org.stillpath.study;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.Arrays;
import java.util.function.ToDoubleFunction;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

/**
 * Worked examples of JCGM 100:2008 (GUM) and JCGM 101:2008, section 9, all of it. Inputs and results are from memory, except
 * where a comment says that the figure follows in closed form or was read. Tolerances are those that the documents state, or
 * half a unit of the last digit printed; for sampled figures three times their own standard deviation is added.
 */
class PublishedBudgetsTest {
    private static final MonteCarlo.Wanted TWO_DIGITS = new MonteCarlo.Wanted(0.95, 2, 2_000_000);

    private static LinearBudget linear(
            ToDoubleFunction<double[]> f, double[] x, Distribution[] inputs, double coverage) {
        Slopes.Slope[] slopes = new Slopes.Slope[x.length];
        for (int i = 0; i < x.length; i++) {
            double u = inputs[i].standardUncertainty();
            double[] results = new double[Slopes.RUNS];
            for (int k = 0; k < results.length; k++) {
                double[] p = x.clone();
                p[i] += Slopes.offset(k, u);
                results[k] = f.applyAsDouble(p);
            }
            slopes[i] = Slopes.of(results, u, Math.abs(1e-16 * f.applyAsDouble(x)));
        }
        return LinearBudget.of(
                f.applyAsDouble(x), slopes, inputs, Correlation.none(x.length).coefficients(), coverage);
    }

    private static MonteCarlo.Summary sampled(
            ToDoubleFunction<double[]> f, double[] x, Distribution[] inputs, MonteCarlo.Wanted wanted) {
        try (Crew crew = new Crew(2, Store.none(), Progress.SILENT)) {
            return MonteCarlo.run(
                            wanted,
                            1,
                            (block, from, count) -> crew.run("b", "b", count, 1, new long[2], i -> {
                                Draws draws = new Draws(7, (long) from + i);
                                double[] p = x.clone();
                                for (int k = 0; k < p.length; k++) {
                                    p[k] += inputs[k].draw(draws);
                                }
                                return new Crew.Run(new double[] {f.applyAsDouble(p)}, 0, "");
                            }))
                    .summaries()
                    .get(0);
        }
    }

    private static double sum(double[] x) {
        return Arrays.stream(x).sum();
    }

    /** JCGM 101, 9.2.2, table 2: four standard normal inputs added. u = 2 and ±3.92 follow in closed form. */
    @Test
    void addsNormalInputs() {
        Distribution[] inputs = new Distribution[4];
        Arrays.fill(inputs, new Distribution.Normal(1));
        LinearBudget b = linear(PublishedBudgetsTest::sum, new double[4], inputs, 0.95);
        assertThat(b.standardUncertainty()).isCloseTo(2, within(1e-12));
        assertThat(b.expandedUncertainty()).isCloseTo(2 * 1.959963984540054, within(1e-9));
        MonteCarlo.Summary mc = sampled(PublishedBudgetsTest::sum, new double[4], inputs, TWO_DIGITS);
        assertThat(mc.stable()).isTrue();
        assertThat(mc.tolerance()).isEqualTo(0.05);
        assertThat(mc.mean()).isCloseTo(0, within(0.01));
        assertThat(mc.standardUncertainty()).isCloseTo(2, within(0.01));
        assertThat(mc.symmetric()[0]).isCloseTo(-3.92, within(0.015));
        assertThat(mc.symmetric()[1]).isCloseTo(3.92, within(0.015));
        assertThat(mc.agrees(b)).isTrue();
    }

    /** JCGM 101, 9.2.3, table 3: four uniform inputs of standard deviation 1: 95 % interval ±3.88; the GUM's is validated. */
    @Test
    void addsUniformInputs() {
        Distribution[] inputs = new Distribution[4];
        Arrays.fill(inputs, new Distribution.Uniform(Math.sqrt(3)));
        LinearBudget b = linear(PublishedBudgetsTest::sum, new double[4], inputs, 0.95);
        MonteCarlo.Summary mc = sampled(PublishedBudgetsTest::sum, new double[4], inputs, TWO_DIGITS);
        assertThat(b.expandedUncertainty()).isCloseTo(3.92, within(0.005));
        assertThat(mc.symmetric()[0]).isCloseTo(-3.88, within(0.015));
        assertThat(mc.symmetric()[1]).isCloseTo(3.88, within(0.015));
        assertThat(mc.agrees(b)).isTrue();
    }

    /**
     * JCGM 101, 9.2.4, table 4: one uniform input dominates (standard deviation 10): GUM ±19.9, samples ±17.0, not validated.
     */
    @Test
    void findsThatOneDominantUniformInputIsNotNormal() {
        Distribution[] inputs = new Distribution[4];
        Arrays.fill(inputs, new Distribution.Uniform(Math.sqrt(3)));
        inputs[3] = new Distribution.Uniform(10 * Math.sqrt(3));
        LinearBudget b = linear(PublishedBudgetsTest::sum, new double[4], inputs, 0.95);
        MonteCarlo.Summary mc =
                sampled(PublishedBudgetsTest::sum, new double[4], inputs, new MonteCarlo.Wanted(0.95, 2, 200_000));
        assertThat(b.standardUncertainty()).isCloseTo(10.1, within(0.05));
        assertThat(b.expandedUncertainty()).isCloseTo(19.9, within(0.05));
        assertThat(mc.tolerance()).isEqualTo(0.5);
        assertThat(mc.symmetric()[0]).isCloseTo(-17.0, within(0.1));
        assertThat(mc.symmetric()[1]).isCloseTo(17.0, within(0.1));
        assertThat(mc.agrees(b)).isFalse();
    }

    /**
     * JCGM 101, 9.3, table 6: mass calibration, in mg from nominal: the sensitivity to the air density vanishes at the
     * estimates, so the first-order budget is too small.
     */
    @Test
    void calibratesAMass() {
        // inputs: reference mass, added mass (mg), densities of air, weight and reference (kg/m³)
        double[] x = {100_000.000, 1.234, 1.20, 8e3, 8e3};
        Distribution[] inputs = {
            new Distribution.Normal(0.050),
            new Distribution.Normal(0.020),
            new Distribution.Uniform(0.10),
            new Distribution.Uniform(1e3),
            new Distribution.Uniform(50)
        };
        ToDoubleFunction<double[]> f = p -> (p[0] + p[1]) * (1 + (p[2] - 1.2) * (1 / p[3] - 1 / p[4])) - 100_000;
        LinearBudget b = linear(f, x, inputs, 0.95);
        MonteCarlo.Summary mc = sampled(f, x, inputs, new MonteCarlo.Wanted(0.95, 2, 300_000));
        assertThat(b.value()).isCloseTo(1.2340, within(0.00005));
        assertThat(b.standardUncertainty()).isCloseTo(0.0539, within(0.00005));
        assertThat(b.value() - b.expandedUncertainty()).isCloseTo(1.1285, within(0.0001));
        assertThat(b.value() + b.expandedUncertainty()).isCloseTo(1.3395, within(0.0001));
        assertThat(mc.mean()).isCloseTo(1.2341, within(0.0005));
        assertThat(mc.standardUncertainty()).isCloseTo(0.0754, within(0.0005));
        assertThat(mc.shortest()[0]).isCloseTo(1.0834, within(0.005));
        assertThat(mc.shortest()[1]).isCloseTo(1.3825, within(0.005));
        assertThat(mc.agrees(b)).isFalse();
    }

    private static MonteCarlo.Summary loss(double x1, double r) {
        double u = 0.005;
        Correlation c = new Correlation(new double[][] {{1, r}, {r, 1}});
        Distribution[] inputs = {new Distribution.Normal(u), new Distribution.Normal(u)};
        try (Crew crew = new Crew(2, Store.none(), Progress.SILENT)) {
            return MonteCarlo.run(
                            new MonteCarlo.Wanted(0.95, 2, 400_000),
                            1,
                            (block, from, count) -> crew.run("b", "b", count, 1, new long[2], i -> {
                                double[] x = c.draw(inputs, new Draws(11, (long) from + i));
                                double a = x1 + x[0];
                                return new Crew.Run(new double[] {a * a + x[1] * x[1]}, 0, "");
                            }))
                    .summaries()
                    .get(0);
        }
    }

    /**
     * JCGM 101, 9.4, comparison loss Y = X1² + X2² in microwave power calibration, u = 0.005 for both, correlated by r; results
     * in 10⁻⁶. Mean x1² + 2u² and variance 4u²x1² + 4u⁴(1 + r²) follow in closed form, as does the shortest interval of x1 = 0
     * without correlation, an exponential distribution: [0, −50 ln 0.05]. The other intervals are from memory.
     */
    @ParameterizedTest
    @CsvSource({
        "0.000, 0.0,   50,  50,    0,  150",
        "0.010, 0.0,  150, 112,    0,  367",
        "0.050, 0.0, 2550, 502, 1590, 3543",
        "0.000, 0.9,   50,  67,    0,  185",
        "0.010, 0.9,  150, 121,   13,  398",
        "0.050, 0.9, 2550, 505, 1628, 3555"
    })
    void comparesLosses(double x1, double r, double mean, double u, double low, double high) {
        double exact = Math.sqrt(4 * 25e-6 * x1 * x1 + 4 * 6.25e-10 * (1 + r * r));
        MonteCarlo.Summary mc = loss(x1, r);
        double tolerance = mc.tolerance();
        assertThat(mc.mean()).isCloseTo(x1 * x1 + 5e-5, within(tolerance));
        assertThat(mc.standardUncertainty()).isCloseTo(exact, within(tolerance));
        assertThat(1e6 * mc.mean()).isCloseTo(mean, within(0.5 + 1e6 * tolerance));
        assertThat(1e6 * mc.standardUncertainty()).isCloseTo(u, within(0.5 + 1e6 * tolerance));
        assertThat(1e6 * mc.shortest()[0]).isCloseTo(low, within(0.5 + 2e6 * tolerance));
        assertThat(1e6 * mc.shortest()[1]).isCloseTo(high, within(0.5 + 2e6 * tolerance));
        // the linear budget knows of neither the mean's shift nor the skew
        Distribution[] inputs = {new Distribution.Normal(0.005), new Distribution.Normal(0.005)};
        LinearBudget b = linear(p -> p[0] * p[0] + p[1] * p[1], new double[] {x1, 0}, inputs, 0.95);
        assertThat(b.standardUncertainty()).isCloseTo(2 * x1 * 0.005, within(1e-12));
        assertThat(mc.agrees(b)).isFalse();
    }

    /**
     * JCGM 101, 9.5: gauge block, deviation from 50 mm in nm. Results of 10⁶ samples were read in Metrology 2(1), 3 (2022),
     * section 4.1, which repeats the example: 838 nm, u = 36 nm, 99 % from 745 nm to 932 nm; the GUM's interval, 745 nm to 931
     * nm with u = 32 nm, and the inputs (table 10) are from memory. A half-width that is itself inexact (6.4.3) is a uniform
     * deviate times a uniform half-width.
     */
    @Test
    void calibratesAGaugeBlock() {
        Distribution one = new Distribution.Uniform(1);
        double[] x = {623, 215, 0, 0, 11.5e-6, -0.1, 0, 0, 0, 0, 0};
        Distribution[] inputs = {
            new Distribution.Student(25, 18),
            new Distribution.Student(6, 24),
            new Distribution.Student(4, 5),
            new Distribution.Student(7, 8),
            new Distribution.Uniform(2e-6),
            new Distribution.Normal(0.2),
            new Distribution.Arcsine(0.5),
            one,
            one,
            one,
            one
        };
        ToDoubleFunction<double[]> f = p -> {
            double expansion = (1e-6 + 0.1e-6 * p[7]) * p[8];
            double warmth = (0.050 + 0.025 * p[9]) * p[10];
            double standard = 50e6 + p[0];
            return p[0] + p[1] + p[2] + p[3] - standard * (expansion * (p[5] + p[6]) + p[4] * warmth);
        };
        MonteCarlo.Summary mc = sampled(f, x, inputs, new MonteCarlo.Wanted(0.99, 2, 2_000_000));
        assertThat(mc.tolerance()).isEqualTo(0.5);
        assertThat(mc.mean()).isCloseTo(838, within(0.5));
        assertThat(mc.standardUncertainty()).isCloseTo(36, within(0.5));
        assertThat(mc.shortest()[0]).isCloseTo(745, within(1.0));
        assertThat(mc.shortest()[1]).isCloseTo(932, within(1.0));
    }

    /**
     * JCGM 100, H.1: end gauge, in nm: l = l_S + d − l_S(δα·θ + α_S·δθ); u_c = 32 nm, ν_eff = 16, k = 2.92 at 99 %, U = 93 nm.
     */
    @Test
    void comparesAnEndGauge() {
        double[] x = {50_000_623, 215, 0, -0.1, 11.5e-6, 0};
        Distribution[] inputs = {
            new Distribution.Student(25, 18),
            new Distribution.Student(9.7, 25.6),
            new Distribution.Student(0.58e-6, 50),
            new Distribution.Normal(0.41),
            new Distribution.Normal(1.2e-6),
            new Distribution.Student(0.029, 2)
        };
        ToDoubleFunction<double[]> f = p -> p[0] + p[1] - p[0] * (p[2] * p[3] + p[4] * p[5]);
        LinearBudget b = linear(f, x, inputs, 0.99);
        assertThat(b.value()).isCloseTo(50_000_838, within(0.5));
        assertThat(b.contributions()[0]).isCloseTo(25, within(1e-3));
        assertThat(b.contributions()[2]).isCloseTo(2.9, within(0.05));
        assertThat(b.contributions()[3]).isCloseTo(0, within(1e-3));
        assertThat(b.contributions()[4]).isCloseTo(0, within(1e-3));
        assertThat(b.contributions()[5]).isCloseTo(16.6, within(0.1));
        assertThat(b.standardUncertainty()).isCloseTo(32, within(0.5));
        // the GUM states 16 for 16.7, cut off to a whole number, and k = 2.92 for it; here k is that of the number
        // itself
        assertThat(Math.floor(b.degreesOfFreedom())).isEqualTo(16);
        assertThat(Quantiles.student(0.995, 16)).isCloseTo(2.92, within(0.005));
        assertThat(b.expandedUncertainty()).isCloseTo(93, within(1.5));
    }

    /** Student's quantiles of JCGM 100, table G.2, and normal ones (tables of any textbook). */
    @Test
    void quantiles() {
        assertThat(Quantiles.student(0.975, 1)).isCloseTo(12.71, within(0.005));
        assertThat(Quantiles.student(0.975, 10)).isCloseTo(2.23, within(0.005));
        assertThat(Quantiles.student(0.995, 5)).isCloseTo(4.03, within(0.005));
        assertThat(Quantiles.student(0.975, Double.POSITIVE_INFINITY)).isCloseTo(1.959963984540054, within(1e-12));
        assertThat(Quantiles.normal(0.841344746068543)).isCloseTo(1, within(1e-12));
        // chi-square tables: 3.841 is exceeded with probability 0.05 for one degree of freedom
        assertThat(Quantiles.chiSquareBeyond(3.841, 1)).isCloseTo(0.05, within(1e-4));
    }

    /** δ of JCGM 101, 7.9.2, examples 1 and 2: u = 0.35 mg gives 0.05 mg to one digit and 0.005 mg to two. */
    @Test
    void tolerances() {
        assertThat(MonteCarlo.tolerance(0.35, 2)).isCloseTo(0.005, within(1e-15));
        assertThat(MonteCarlo.tolerance(0.35, 1)).isCloseTo(0.05, within(1e-15));
        assertThat(MonteCarlo.tolerance(2, 1)).isCloseTo(0.5, within(1e-15));
        assertThat(MonteCarlo.tolerance(0.996, 2)).isCloseTo(0.05, within(1e-15));
    }

    /** Closed forms: standard deviations of the distributions, and what their samples show. */
    @Test
    void drawsWhatItSays() {
        Distribution[] all = {
            new Distribution.Normal(2),
            new Distribution.Uniform(2),
            new Distribution.Trapezoidal(2, 0),
            new Distribution.Trapezoidal(2, 1),
            new Distribution.Arcsine(2),
            new Distribution.Student(2, 9)
        };
        double[] closed = {
            2, 2 / Math.sqrt(3), 2 / Math.sqrt(6), Math.sqrt(5.0 / 6), Math.sqrt(2), 2 * Math.sqrt(9.0 / 7)
        };
        int n = 200_000;
        for (int k = 0; k < all.length; k++) {
            double sum = 0;
            double squares = 0;
            for (int i = 0; i < n; i++) {
                double v = all[k].draw(new Draws(3, i));
                sum += v;
                squares += v * v;
            }
            assertThat(sum / n).as(all[k].word()).isCloseTo(0, within(5 * closed[k] / Math.sqrt(n)));
            assertThat(Math.sqrt(squares / n)).as(all[k].word()).isCloseTo(closed[k], within(0.01 * closed[k]));
            if (!(all[k] instanceof Distribution.Student)) {
                assertThat(all[k].standardUncertainty()).isCloseTo(closed[k], within(1e-15));
            }
        }
    }

    @Test
    void drawsCorrelatedInputs() {
        Distribution[] inputs = {new Distribution.Normal(1), new Distribution.Uniform(1), new Distribution.Normal(3)};
        Correlation c = new Correlation(new double[][] {{1, 0, -0.8}, {0, 1, 0}, {-0.8, 0, 1}});
        double both = 0;
        int n = 100_000;
        for (int i = 0; i < n; i++) {
            double[] x = c.draw(inputs, new Draws(5, i));
            both += x[0] * x[2] / 3;
        }
        assertThat(both / n).isCloseTo(-0.8, within(0.01));
        assertThat(new Correlation(new double[][] {{1, 1, 0}, {1, 1, 0.5}, {0, 0.5, 1}}).isSound())
                .isFalse();
        assertThat(new Correlation(new double[][] {{1, 1}, {1, 1}}).isSound()).isTrue();
    }

    /** A difference of fully correlated inputs has no uncertainty (JCGM 100, 5.2.2, note 1). */
    @Test
    void correlationCancels() {
        Distribution[] inputs = {new Distribution.Normal(1), new Distribution.Normal(1)};
        Slopes.Slope[] slopes = {new Slopes.Slope(1, 0), new Slopes.Slope(-1, 0)};
        LinearBudget b = LinearBudget.of(0, slopes, inputs, new double[][] {{1, 1}, {1, 1}}, 0.95);
        assertThat(b.standardUncertainty()).isCloseTo(0, within(1e-9));
    }

    /** Neither the unit of an input nor that of a result changes what the inputs contribute. */
    @Test
    void contributionsDoNotDependOnUnits() {
        ToDoubleFunction<double[]> f = p -> Math.exp(p[0]) * Math.sin(p[1]);
        Distribution[] inputs = {new Distribution.Normal(0.01), new Distribution.Uniform(0.02)};
        LinearBudget plain = linear(f, new double[] {0.3, 0.7}, inputs, 0.95);
        double a = 1e-9;
        double b = 1e12;
        ToDoubleFunction<double[]> scaled = p -> b * f.applyAsDouble(new double[] {p[0] / a, p[1]});
        Distribution[] small = {new Distribution.Normal(0.01 * a), inputs[1]};
        LinearBudget other = linear(scaled, new double[] {0.3 * a, 0.7}, small, 0.95);
        for (int i = 0; i < 2; i++) {
            assertThat(other.contributions()[i] / b)
                    .isCloseTo(plain.contributions()[i], within(1e-9 * plain.contributions()[i]));
        }
        assertThat(other.coverageFactor()).isEqualTo(plain.coverageFactor());
    }

    /** Derivatives against closed forms, and honest errors beside an edge. */
    @Test
    void slopesAreExtrapolated() {
        double[] results = new double[Slopes.RUNS];
        for (int k = 0; k < results.length; k++) {
            results[k] = Math.exp(1 + Slopes.offset(k, 0.1));
        }
        Slopes.Slope s = Slopes.of(results, 0.1, 1e-16);
        assertThat(s.value()).isCloseTo(Math.E, within(1e-11));
        assertThat(s.error()).isLessThan(1e-7);
        for (int k = 0; k < results.length; k++) {
            double x = Slopes.offset(k, 0.1);
            results[k] = x > 0.06 ? Double.NaN : x;
        }
        assertThat(Slopes.of(results, 0.1, 1e-16).value()).isCloseTo(1, within(1e-12));
        Arrays.fill(results, Double.NaN);
        assertThat(Slopes.of(results, 0.1, 1e-16).value()).isNaN();
    }
}
