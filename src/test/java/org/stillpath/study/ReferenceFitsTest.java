package org.stillpath.study;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.Arrays;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.MethodSource;

/**
 * Nonlinear regressions of the NIST Statistical Reference Datasets (www.itl.nist.gov/div898/strd), lower and average
 * difficulty, from both starts each, unweighted: certified parameters and their standard deviations to six digits. The data
 * of Misra1a and its certified values were compared with public copies of the file; the rest is from memory, and borne out by the
 * certified residual sums of squares, which no wrong digit in the data would reproduce.
 */
class ReferenceFitsTest {
    private static final double[] MISRA_Y = {
        10.07, 14.73, 17.94, 23.93, 29.61, 35.18, 40.02, 44.82, 50.76, 55.05, 61.01, 66.40, 75.47, 81.78
    };
    private static final double[] MISRA_X = {
        77.6, 114.9, 141.1, 190.8, 239.9, 289.0, 332.8, 378.4, 434.8, 477.3, 536.8, 593.1, 689.1, 760.0
    };
    private static final double[] MGH17_Y = {
        0.844, 0.908, 0.932, 0.936, 0.925, 0.908, 0.881, 0.850, 0.818, 0.784, 0.751, 0.718, 0.685, 0.658, 0.628, 0.603,
        0.580, 0.558, 0.538, 0.522, 0.506, 0.490, 0.478, 0.467, 0.457, 0.448, 0.438, 0.431, 0.424, 0.420, 0.414, 0.411,
        0.406
    };

    @FunctionalInterface
    private interface Curve {
        double at(double x, double[] b);
    }

    private record Case(
            String name,
            double[] x,
            double[] y,
            Curve curve,
            double[][] starts,
            double[] certified,
            double[] deviations,
            double squares) {
        @Override
        public String toString() {
            return name;
        }
    }

    static Stream<Case> cases() {
        double[] tens = new double[33];
        for (int i = 0; i < tens.length; i++) {
            tens[i] = 10.0 * i;
        }
        return Stream.of(
                new Case(
                        "Misra1a (lower)",
                        MISRA_X,
                        MISRA_Y,
                        (x, b) -> b[0] * (1 - Math.exp(-b[1] * x)),
                        new double[][] {{500, 0.0001}, {250, 0.0005}},
                        new double[] {2.3894212918E+02, 5.5015643181E-04},
                        new double[] {2.7070075241E+00, 7.2668688436E-06},
                        1.2455138894E-01),
                new Case(
                        "Misra1b (lower)",
                        MISRA_X,
                        MISRA_Y,
                        (x, b) -> b[0] * (1 - Math.pow(1 + b[1] * x / 2, -2)),
                        new double[][] {{500, 0.0001}, {300, 0.0002}},
                        new double[] {3.3799746163E+02, 3.9039091287E-04},
                        new double[] {3.1643950207E+00, 4.2547321834E-06},
                        7.5464681533E-02),
                new Case(
                        "Misra1c (average)",
                        MISRA_X,
                        MISRA_Y,
                        (x, b) -> b[0] * (1 - Math.pow(1 + 2 * b[1] * x, -0.5)),
                        new double[][] {{500, 0.0001}, {600, 0.0002}},
                        new double[] {6.3642725809E+02, 2.0813627256E-04},
                        new double[] {4.6638326572E+00, 1.7728423155E-06},
                        4.0966836971E-02),
                new Case(
                        "Misra1d (average)",
                        MISRA_X,
                        MISRA_Y,
                        (x, b) -> b[0] * b[1] * x / (1 + b[1] * x),
                        new double[][] {{500, 0.0001}, {450, 0.0003}},
                        new double[] {4.3736970754E+02, 3.0227324449E-04},
                        new double[] {3.6489174345E+00, 2.9334354479E-06},
                        5.6419295283E-02),
                new Case(
                        "MGH17 (average)",
                        tens,
                        MGH17_Y,
                        (x, b) -> b[0] + b[1] * Math.exp(-x * b[3]) + b[2] * Math.exp(-x * b[4]),
                        new double[][] {{0.5, 1.5, -1, 0.01, 0.02}},
                        new double[] {
                            3.7541005211E-01, 1.9358469127E+00, -1.4646871366E+00, 1.2867534640E-02, 2.2122699662E-02
                        },
                        new double[0],
                        5.4648946975E-05));
    }

    private static LeastSquares.Solution solve(Case c, LeastSquares.Unknown[] bounds, double[] start) {
        double[] weight = new double[c.y().length];
        Arrays.fill(weight, 1);
        LeastSquares.Model model = points -> {
            double[][] values = new double[points.length][c.x().length];
            for (int p = 0; p < points.length; p++) {
                for (int i = 0; i < c.x().length; i++) {
                    values[p][i] = c.curve().at(c.x()[i], points[p]);
                }
            }
            return values;
        };
        return new LeastSquares(bounds, c.y(), weight, 1e-15, model).solve(start);
    }

    private static LeastSquares.Unknown[] unbounded(int n) {
        LeastSquares.Unknown[] bounds = new LeastSquares.Unknown[n];
        Arrays.fill(bounds, new LeastSquares.Unknown(Double.NEGATIVE_INFINITY, Double.POSITIVE_INFINITY));
        return bounds;
    }

    @ParameterizedTest
    @MethodSource("cases")
    void certifiedToSixDigits(Case c) {
        for (double[] start : c.starts()) {
            LeastSquares.Solution s = solve(c, unbounded(start.length), start);
            assertThat(s.chiSquare()).isCloseTo(c.squares(), within(1e-9 * c.squares()));
            for (int j = 0; j < start.length; j++) {
                assertThat(s.x()[j]).isCloseTo(c.certified()[j], within(1e-6 * Math.abs(c.certified()[j])));
            }
            double scale = Math.sqrt(s.chiSquare() / (c.y().length - start.length));
            Covariance covariance = Covariance.of(s.jacobian(), scale);
            for (int j = 0; j < c.deviations().length; j++) {
                assertThat(covariance.standard()[j]).isCloseTo(c.deviations()[j], within(1e-6 * c.deviations()[j]));
            }
        }
    }

    /** A bound that the best fit lies beyond is where the fit ends; one that it does not is without effect. */
    @Test
    void bounds() {
        Case c = cases().findFirst().orElseThrow();
        LeastSquares.Unknown free = new LeastSquares.Unknown(0, 1);
        LeastSquares.Solution s = solve(
                c, new LeastSquares.Unknown[] {new LeastSquares.Unknown(100, 220), free}, new double[] {150, 0.0005});
        assertThat(s.fixed()).containsExactly(true, false);
        assertThat(s.x()[0]).isEqualTo(220);
        // with one unknown left the sum of squares is flat in it: its derivative vanishes
        double slope = 0;
        for (int i = 0; i < c.y().length; i++) {
            slope += (s.fitted()[i] - c.y()[i]) * s.jacobian()[i][1];
        }
        assertThat(slope * s.x()[1] / s.chiSquare()).isCloseTo(0, within(1e-5));
        LeastSquares.Solution inside = solve(
                c, new LeastSquares.Unknown[] {new LeastSquares.Unknown(100, 400), free}, new double[] {150, 0.0005});
        assertThat(inside.fixed()).containsExactly(false, false);
        assertThat(inside.x()[0]).isCloseTo(c.certified()[0], within(1e-6 * c.certified()[0]));
    }

    /** b0·b1 alone acts: neither of the two is determined, and the third is. */
    @Test
    void unknownsThatCannotBeToldApart() {
        double[][] jacobian = {{2, 3, 1}, {4, 6, 0}, {6, 9, 2}};
        Covariance c = Covariance.of(jacobian, 1);
        assertThat(c.condition()).isInfinite();
        assertThat(c.standard()[0]).isNaN();
        assertThat(c.standard()[1]).isNaN();
        assertThat(c.standard()[2]).isPositive();
        assertThat(c.isWeak(0)).isTrue();
        assertThat(c.isWeak(1)).isTrue();
        assertThat(c.isWeak(2)).isFalse();
    }

    /** (JᵀJ)⁻¹ of a small case, by hand: J = (1 0; 0 2; 1 1), JᵀJ = (2 1; 1 5), inverse (5 −1; −1 2)/9. */
    @Test
    void covarianceByHand() {
        Covariance c = Covariance.of(new double[][] {{1, 0}, {0, 2}, {1, 1}}, 3);
        assertThat(c.standard()[0]).isCloseTo(3 * Math.sqrt(5.0 / 9), within(1e-14));
        assertThat(c.standard()[1]).isCloseTo(3 * Math.sqrt(2.0 / 9), within(1e-14));
        assertThat(c.correlation()[0][1]).isCloseTo(-1 / Math.sqrt(10), within(1e-14));
    }
}
