package org.stillpath.medium;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.SplittableRandom;
import org.junit.jupiter.api.Test;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;

/** Scattered nodes on a grid: what is quadratic comes back, layers and grids are known, and the residual is told. */
class ScatteredNodesTest {
    private static final double RADIUS = 25e-3;
    private static final double THICK = 10e-3;

    private interface Temperature {
        double at(double x, double y, double z);
    }

    private static double[][] disc(int count, int layers, long seed, Temperature t) {
        SplittableRandom random = new SplittableRandom(seed);
        double[][] c = new double[4][count];
        for (int i = 0; i < count; i++) {
            double r = RADIUS * Math.sqrt(random.nextDouble());
            double a = 2 * Math.PI * random.nextDouble();
            c[0][i] = r * Math.cos(a);
            c[1][i] = r * Math.sin(a);
            c[2][i] = layers == 0 ? THICK * random.nextDouble() : THICK * (i % layers) / (layers - 1);
            c[3][i] = t.at(c[0][i], c[1][i], c[2][i]);
        }
        return c;
    }

    private static ScatteredNodes resampled(double[][] c) {
        assertThat(ScatteredNodes.refusal(c)).isEmpty();
        return ScatteredNodes.resample(c[0], c[1], c[2], c[3]);
    }

    private static double value(ScatteredNodes n, double x, double y, double z) {
        Samples s = new Samples(1);
        n.grid().sample(new double[] {x}, new double[] {y}, new double[] {z}, 1, Double.NaN, Order.VALUE, s);
        return s.value[0];
    }

    @Test
    void linearFieldsComeBackExactly() {
        Temperature t = (x, y, z) -> 300 + 400 * x - 200 * y + 1000 * z;
        ScatteredNodes n = resampled(disc(3000, 0, 7, t));
        assertThat(value(n, 3e-3, -5e-3, 4e-3)).isCloseTo(t.at(3e-3, -5e-3, 4e-3), within(1e-9));
        // corners of the box without nodes are kept within the range of the values, which bends the spline nearby
        assertThat(n.rms()).isLessThan(0.05);
    }

    @Test
    void smoothFieldsComeBackToTheToldResidual() {
        Temperature t = (x, y, z) -> 293 + 15 * Math.exp(-2 * (x * x + y * y) / 144e-6) * (1 - 20 * z);
        ScatteredNodes n = resampled(disc(40_000, 9, 11, t));
        assertThat(n.planes()[2]).isEqualTo(9);
        // a few thousandths of the span at most, at the rim, where neighbours lie on one side alone
        assertThat(n.rms()).isLessThan(1e-4 * 15);
        assertThat(n.most()).isLessThan(3e-3 * 15);
        assertThat(value(n, 2e-3, 1e-3, 3e-3)).isCloseTo(t.at(2e-3, 1e-3, 3e-3), within(3 * n.most()));
    }

    /** Two layers do not tell how the depth curves: it is left straight. */
    @Test
    void twoLayersAreJoinedStraight() {
        Temperature t = (x, y, z) -> 293 + 1e4 * (x * x + y * y) + 500 * z;
        ScatteredNodes n = resampled(disc(6000, 2, 5, t));
        assertThat(value(n, 5e-3, 5e-3, 0.5 * THICK)).isCloseTo(t.at(5e-3, 5e-3, 0.5 * THICK), within(1e-3));
    }

    @Test
    void gridsAreTakenAsTheyAre() {
        double[][] c = new double[4][5 * 4 * 3];
        for (int i = 0; i < c[0].length; i++) {
            int j = 59 - i;
            c[0][i] = (j % 5) * (j % 5) * 1e-3;
            c[1][i] = (j / 5 % 4) * 2e-3;
            int layer = j / 20;
            c[2][i] = layer * 1e-3;
            c[3][i] = 280 + j;
        }
        ScatteredNodes n = resampled(c);
        assertThat(n.exact()).isTrue();
        assertThat(n.planes()).containsExactly(5, 4, 3);
        assertThat(n.most()).isLessThan(1e-10);
    }

    @Test
    void refusesNodesInAPlane() {
        double[][] c = disc(100, 0, 3, (x, y, z) -> 300);
        java.util.Arrays.fill(c[2], 1e-3);
        assertThat(ScatteredNodes.refusal(c))
                .hasValueSatisfying(w -> assertThat(w).contains("same z"));
    }
}
