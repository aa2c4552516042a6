package org.stillpath.medium;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;

import org.hipparchus.analysis.interpolation.SplineInterpolator;
import org.hipparchus.analysis.polynomials.PolynomialSplineFunction;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.EnumSource;

class SplineTest {
    private static final double[] U = {-3, -2.2, -1.5, -0.7, 0, 0.6, 1.4, 2.1, 3};
    private static final double[] V = {1.402, 1.431, 1.462, 1.489, 1.5, 1.494, 1.467, 1.437, 1.405};

    @Test
    void naturalSplineAgreesWithHipparchus() {
        Spline s = Spline.of(U, V, Interpolation.SPLINE, Beyond.FAULT);
        PolynomialSplineFunction other = new SplineInterpolator().interpolate(U, V);
        for (double u = -3; u < 3; u += 0.013) {
            int c = s.cell(u);
            assertThat(s.value(c, u)).isCloseTo(other.value(u), within(4e-15));
            assertThat(s.slope(c, u))
                    .isCloseTo(other.polynomialSplineDerivative().value(u), within(1e-14));
            assertThat(s.curvature(c, u))
                    .isCloseTo(
                            other.polynomialSplineDerivative()
                                    .polynomialSplineDerivative()
                                    .value(u),
                            within(1e-13));
        }
    }

    @Test
    void clampedSplineOfACosineConvergesWithTheFourthPower() {
        // the error bound of complete cubic splines, 5/384 h⁴ max|f''''| (Hall and Meyer, J. Approx. Theory 16 (1976)
        // 105)
        for (int n : new int[] {8, 16, 32}) {
            double[] u = new double[n + 1];
            double[] v = new double[n + 1];
            for (int i = 0; i <= n; i++) {
                u[i] = Math.PI * i / n;
                v[i] = Math.cos(u[i]);
            }
            Spline s = Spline.of(u, v, Interpolation.CLAMPED, Beyond.FAULT);
            double h = Math.PI / n;
            double worst = 0;
            for (double x = 0; x <= Math.PI; x += 0.001) {
                worst = Math.max(worst, Math.abs(s.value(x) - Math.cos(x)));
            }
            assertThat(worst).isBetween(0.05 * 5.0 / 384 * Math.pow(h, 4), 1.0001 * 5.0 / 384 * Math.pow(h, 4));
            assertThat(s.slope(0, 0)).isZero();
            assertThat(s.slope(n - 1, Math.PI)).isCloseTo(0, within(1e-13));
        }
    }

    @Test
    void twoKnotsOfANaturalSplineAreALine() {
        Spline s = Spline.of(new double[] {1, 3}, new double[] {2, 6}, Interpolation.SPLINE, Beyond.FAULT);
        assertThat(s.value(1.5)).isCloseTo(3, within(1e-15));
        assertThat(s.curvature(0, 2)).isZero();
    }

    @Test
    void cubicSplinesHaveContinuousSecondDerivatives() {
        for (Interpolation how : new Interpolation[] {Interpolation.SPLINE, Interpolation.CLAMPED}) {
            Spline s = Spline.of(U, V, how, Beyond.FAULT);
            for (int i = 1; i < U.length - 1; i++) {
                assertThat(s.curvature(i - 1, U[i])).isCloseTo(s.curvature(i, U[i]), within(1e-13));
                assertThat(s.slope(i - 1, U[i])).isCloseTo(s.slope(i, U[i]), within(1e-14));
            }
        }
    }

    @Test
    void monotoneDataStayMonotone() {
        // RPN 14 of Fritsch and Carlson 1980, table 1, the data that made the method known; values from memory
        double[] u = {7.99, 8.09, 8.19, 8.7, 9.2, 10, 12, 15, 20};
        double[] v = {0, 2.76429e-5, 4.37498e-2, 0.169183, 0.469428, 0.943740, 0.998636, 0.999919, 0.999994};
        Spline s = Spline.of(u, v, Interpolation.MONOTONE, Beyond.FAULT);
        double before = s.value(7.99);
        for (double x = 7.99; x <= 20; x += 0.001) {
            double now = s.value(x);
            assertThat(now).isGreaterThanOrEqualTo(before - 1e-16);
            before = now;
        }
        assertThat(s.overshoot().cells()).isZero();
        Spline natural = Spline.of(u, v, Interpolation.SPLINE, Beyond.FAULT);
        assertThat(natural.overshoot().cells()).isPositive();
    }

    @Test
    void monotoneSplineIsFlatWhereTheDataTurnAndFollowsAParabola() {
        double[] u = {0, 1, 2, 3, 4};
        double[] v = {0, 1, 4, 9, 0};
        Spline s = Spline.of(u, v, Interpolation.MONOTONE, Beyond.FAULT);
        assertThat(s.slope(2, 3)).isZero();
        // the three-point slopes of u² at 1 and 2 are exact, and no cut is needed between
        assertThat(s.value(1.5)).isCloseTo(2.25, within(1e-15));
    }

    @ParameterizedTest
    @EnumSource(Interpolation.class)
    void passesThroughItsDataAndItsDerivativesAreThoseOfItsValues(Interpolation how) {
        Spline s = Spline.of(U, V, how, Beyond.FAULT);
        for (int i = 0; i < U.length; i++) {
            assertThat(s.value(U[i])).isCloseTo(V[i], within(5e-16));
        }
        double h = 1e-4;
        for (double u = -2.95; u < 2.95; u += 0.21) {
            int c = s.cell(u);
            // a cubic's central difference is off by h² f'''/6 = 2e-9 f'''
            assertThat((s.value(c, u + h) - s.value(c, u - h)) / (2 * h)).isCloseTo(s.slope(c, u), within(1e-8));
            assertThat((s.slope(c, u + h) - s.slope(c, u - h)) / (2 * h)).isCloseTo(s.curvature(c, u), within(1e-10));
        }
    }

    @Test
    void goesOnOutsideAsAsked() {
        double[] u = {0, 1, 2};
        double[] v = {3, 2, 1.5};
        Spline hold = Spline.of(u, v, Interpolation.SPLINE, Beyond.HOLD);
        assertThat(hold.value(7)).isEqualTo(1.5);
        assertThat(hold.slope(hold.cell(7), 7)).isZero();
        assertThat(hold.value(-7)).isEqualTo(3);
        Spline line = Spline.of(u, v, Interpolation.LINEAR, Beyond.LINEAR);
        assertThat(line.value(4)).isEqualTo(0.5);
        assertThat(line.value(-1)).isEqualTo(4);
        Spline decay = Spline.of(u, v, Interpolation.LINEAR, Beyond.EXPONENTIAL);
        // 1.5 exp(-(1/3)(5 - 2))
        assertThat(decay.value(5)).isCloseTo(1.5 * Math.exp(-1), within(1e-15));
        assertThat(decay.slope(2, 5)).isCloseTo(-0.5 * Math.exp(-1), within(1e-15));
        assertThat(decay.curvature(2, 5)).isCloseTo(0.5 / 3 * Math.exp(-1), within(1e-15));
    }

    @Test
    void aFaultOutsideLeavesRoomToOverstepOneCellAndNoMore() {
        Spline s = Spline.of(U, V, Interpolation.SPLINE, Beyond.FAULT);
        double beyond = Math.nextUp(3.0);
        assertThat(s.value(beyond)).isCloseTo(1.405, within(1e-14));
        assertThat(s.value(3.8)).isFinite();
        assertThat(s.value(4)).isNaN();
        assertThat(s.slope(s.cell(4), 4)).isNaN();
        assertThat(s.value(-4)).isNaN();
    }

    @Test
    void findsCells() {
        Spline s = Spline.of(U, V, Interpolation.LINEAR, Beyond.HOLD);
        assertThat(s.cell(-3)).isZero();
        assertThat(s.cell(-3.1)).isEqualTo(-1);
        assertThat(s.cell(3)).isEqualTo(7);
        assertThat(s.cell(3.1)).isEqualTo(8);
        for (int i = 0; i < U.length - 1; i++) {
            assertThat(s.cell(U[i])).isEqualTo(i);
            assertThat(s.cell(0.5 * (U[i] + U[i + 1]))).isEqualTo(i);
        }
    }

    @Test
    void tellsWhereItLeavesTheRangeOfItsData() {
        Spline s = Spline.of(new double[] {0, 1, 2, 3}, new double[] {0, 0, 1, 1}, Interpolation.SPLINE, Beyond.FAULT);
        Spline.Overshoot o = s.overshoot();
        // between 0 and 1 and, by symmetry, between 2 and 3; slopes -1/5.. from the tridiagonal system by hand:
        // s = (-0.2, 0.4 ...): s0 = -0.4, s1 = 0.8 solves 2 s0 + s1 = 0, s0 + 4 s1 + s2 = 3, s1 = s2
        assertThat(o.cells()).isEqualTo(2);
        // cubic t(t² - 1)/2.5·... has its least value at t = 1/√3
        assertThat(Math.min(Math.abs(o.place() - 1 / Math.sqrt(3)), Math.abs(o.place() - (3 - 1 / Math.sqrt(3)))))
                .isCloseTo(0, within(1e-12));
    }

    @Test
    void refusesTablesThatAreNone() {
        assertThatThrownBy(() -> Spline.of(new double[] {0}, new double[] {0}, Interpolation.SPLINE, Beyond.HOLD))
                .hasMessageContaining("two or more");
        assertThatThrownBy(() -> Spline.of(new double[] {0, 0}, new double[] {0, 1}, Interpolation.SPLINE, Beyond.HOLD))
                .hasMessageContaining("ascend");
        assertThatThrownBy(() ->
                        Spline.of(new double[] {0, 1}, new double[] {0, Double.NaN}, Interpolation.SPLINE, Beyond.HOLD))
                .hasMessageContaining("finite");
    }
}
