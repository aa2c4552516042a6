package org.stillpath.medium;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;

import org.hipparchus.analysis.interpolation.SplineInterpolator;
import org.junit.jupiter.api.Test;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Frame;

class GridTest {
    private static final double[] X = {-2, -1.1, 0.3, 0.9, 2.4};
    private static final double[] Y = {-1, 0, 0.5, 1.7};
    private static final double[] Z = {0, 1.5, 3.2, 5, 6, 8.5};

    @Test
    void alongALineThroughNodesItIsTheNaturalSplineOfOneDimension() {
        Grid g = Grid.of(X, Y, Z, values(), Beyond.FAULT);
        // a natural spline in y and z that passes through node (j, k) is, as a function of x, the natural spline of
        // that row
        for (int k = 0; k < Z.length; k++) {
            for (int j = 0; j < Y.length; j++) {
                double[] row = new double[X.length];
                for (int i = 0; i < X.length; i++) {
                    row[i] = f(X[i], Y[j], Z[k]);
                }
                var other = new SplineInterpolator().interpolate(X, row);
                for (double x = -2; x < 2.4; x += 0.37) {
                    assertThat(value(g, x, Y[j], Z[k])).isCloseTo(other.value(x), within(1e-14));
                }
            }
        }
    }

    @Test
    void betweenNodesItIsTheSplineOfSplines() {
        Grid g = Grid.of(X, Y, Z, values(), Beyond.FAULT);
        double y = 0.2;
        double z = 4.4;
        double x = -0.6;
        double[] sheet = new double[X.length];
        for (int i = 0; i < X.length; i++) {
            double[] column = new double[Y.length];
            for (int j = 0; j < Y.length; j++) {
                double[] depth = new double[Z.length];
                for (int k = 0; k < Z.length; k++) {
                    depth[k] = f(X[i], Y[j], Z[k]);
                }
                column[j] = new SplineInterpolator().interpolate(Z, depth).value(z);
            }
            sheet[i] = new SplineInterpolator().interpolate(Y, column).value(y);
        }
        assertThat(value(g, x, y, z))
                .isCloseTo(new SplineInterpolator().interpolate(X, sheet).value(x), within(1e-14));
    }

    @Test
    void derivativesAreThoseOfTheValues() {
        IndexField field = new FieldMedium(
                        Declaration.of("block"), Grid.of(X, Y, Z, values(), Beyond.FAULT), true, false)
                .field(Double.NaN, Frame.JOB);
        for (double[] p : new double[][] {{-0.6, 0.2, 4.4}, {2.1, -0.7, 0.4}, {0.31, 1.2, 7}}) {
            // third derivatives are of order 1: differences with h = 1e-4 are off by about 1e-9
            Differences.check(field, p[0], p[1], p[2], 1e-4, 2e-8, 1);
        }
    }

    @Test
    void aBilinearFunctionIsReproducedEverywhere() {
        double[] v = new double[2 * 3 * 2];
        double[] x = {0, 1};
        double[] y = {0, 1, 3};
        double[] z = {-1, 4};
        for (int k = 0; k < 2; k++) {
            for (int j = 0; j < 3; j++) {
                for (int i = 0; i < 2; i++) {
                    v[i + 2 * (j + 3 * k)] = 1 + 2 * x[i] - 3 * y[j] + z[k] * x[i] * y[j];
                }
            }
        }
        Grid g = Grid.of(x, y, z, v, Beyond.FAULT);
        assertThat(value(g, 0.3, 2.2, 1.7)).isCloseTo(1 + 0.6 - 6.6 + 1.7 * 0.3 * 2.2, within(1e-14));
    }

    @Test
    void endsAtItsFaces() {
        Grid g = Grid.of(X, Y, Z, values(), Beyond.FAULT);
        assertThat(g.limits()).hasSize(6);
        assertThat(g.seams(Double.NaN)).hasSize(3);
        assertThat(value(g, 2.4 + 1e-9, 0, 0)).isCloseTo(value(g, 2.4, 0, 0), within(1e-8));
        assertThat(value(g, 5, 0, 0)).isNaN();
        assertThat(g.explain(0, 0, 9, Double.NaN)).contains("z = 9 m", "0 mm to 8.5 m");
        assertThat(g.explain(0, 0, 3, Double.NaN)).isEmpty();
    }

    @Test
    void heldGridsStayFlatOutside() {
        Grid g = Grid.of(X, Y, Z, values(), Beyond.HOLD);
        Samples s = new Samples(1);
        g.sample(new double[] {9}, new double[] {0.2}, new double[] {4.4}, 1, Double.NaN, Order.HESSIAN, s);
        assertThat(s.value[0]).isEqualTo(value(g, 2.4, 0.2, 4.4));
        assertThat(s.gx[0]).isZero();
        assertThat(s.hxx[0]).isZero();
        assertThat(s.hxy[0]).isZero();
        assertThat(s.gy[0]).isNotZero();
        assertThat(g.limits()).isEmpty();
    }

    @Test
    void batchesAndSinglePointsAgreeToTheBit() {
        Grid g = Grid.of(X, Y, Z, values(), Beyond.FAULT);
        double[] x = {0, 2.4, -2, 0.3, -1.05};
        double[] y = {0, 1.7, -1, 0.49, 1.2};
        double[] z = {0, 8.5, 3.2, 3.21, 7};
        Samples all = new Samples(5);
        g.sample(x, y, z, 5, Double.NaN, Order.VALUE, all);
        for (int i = 0; i < 5; i++) {
            assertThat(all.value[i]).isEqualTo(value(g, x[i], y[i], z[i]));
        }
    }

    @Test
    void aPieceIsThePolynomialOfItsCell() {
        Grid g = Grid.of(X, Y, Z, values(), Beyond.FAULT);
        double[] p = {0.5, 1.1, 4.4};
        int[] cells = new int[3];
        for (int i = 0; i < 3; i++) {
            cells[i] = g.seams(Double.NaN).get(i).cell(p[i]);
        }
        ScalarField piece = g.piece(cells);
        assertThat(value(piece, p[0], p[1], p[2])).isEqualTo(value(g, p[0], p[1], p[2]));
        // a fourth difference of a cubic is 0, also across the faces at x = 0.3 and 0.9; the grid's own is not
        assertThat(fourthDifference(piece)).isCloseTo(0, within(1e-14));
        assertThat(Math.abs(fourthDifference(g))).isGreaterThan(1e-6);
        assertThat(g.piece(new int[] {0, 1, 1})).isSameAs(g);
    }

    private static double fourthDifference(ScalarField f) {
        double h = 0.35;
        return value(f, 0.6 - 2 * h, 1.1, 4.4)
                - 4 * value(f, 0.6 - h, 1.1, 4.4)
                + 6 * value(f, 0.6, 1.1, 4.4)
                - 4 * value(f, 0.6 + h, 1.1, 4.4)
                + value(f, 0.6 + 2 * h, 1.1, 4.4);
    }

    @Test
    void refusesWhatIsNoGrid() {
        assertThatThrownBy(() -> Grid.of(X, Y, Z, new double[3], Beyond.FAULT)).hasMessageContaining("nodes");
        assertThatThrownBy(() -> Grid.of(new double[] {0}, Y, Z, new double[24], Beyond.FAULT))
                .hasMessageContaining("two or more");
        assertThatThrownBy(() -> Grid.of(X, Y, Z, values(), Beyond.LINEAR)).hasMessageContaining("fault or hold");
    }

    private static double f(double x, double y, double z) {
        return 0.5 + 0.05 * Math.sin(0.7 * x) * Math.cos(0.9 * y) + 0.02 * Math.exp(-0.1 * z * z) * x;
    }

    private static double[] values() {
        double[] v = new double[X.length * Y.length * Z.length];
        for (int k = 0; k < Z.length; k++) {
            for (int j = 0; j < Y.length; j++) {
                for (int i = 0; i < X.length; i++) {
                    v[i + X.length * (j + Y.length * k)] = f(X[i], Y[j], Z[k]);
                }
            }
        }
        return v;
    }

    private static double value(ScalarField g, double x, double y, double z) {
        Samples s = new Samples(1);
        g.sample(new double[] {x}, new double[] {y}, new double[] {z}, 1, Double.NaN, Order.VALUE, s);
        return s.value[0];
    }
}
