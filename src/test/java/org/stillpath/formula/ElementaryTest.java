package org.stillpath.formula;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.Random;
import java.util.function.DoubleUnaryOperator;
import org.junit.jupiter.api.Test;

/** The array functions against {@link StrictMath}, whose own error is below one ulp (its specification). */
class ElementaryTest {
    private static final int COUNT = 200_000;
    /** An ulp and a half of their own, and up to one of what they are compared with. */
    private static final double ULPS = 2.5;

    @FunctionalInterface
    private interface Array {
        void run(double[] x, int count, double[] out, double[] turns, double[] rest);
    }

    private static void compare(Array array, DoubleUnaryOperator truth, DoubleUnaryOperator draw) {
        double[] x = new double[COUNT];
        Random random = new Random(20261201);
        for (int i = 0; i < COUNT; i++) {
            x[i] = draw.applyAsDouble(random.nextDouble());
        }
        double[] out = new double[COUNT];
        array.run(x, COUNT, out, new double[COUNT], new double[COUNT]);
        for (int i = 0; i < COUNT; i++) {
            double t = truth.applyAsDouble(x[i]);
            if (Double.isFinite(t)) {
                assertThat(Math.abs(out[i] - t))
                        .as("at %s: %s instead of %s", x[i], out[i], t)
                        .isLessThanOrEqualTo(ULPS * Math.ulp(t));
            } else {
                assertThat(Double.compare(out[i], t))
                        .as("at %s: %s", x[i], out[i])
                        .isZero();
            }
        }
    }

    @Test
    void exponentials() {
        compare(Elementary::exp, StrictMath::exp, u -> 20 * u - 10);
        compare(Elementary::exp, StrictMath::exp, u -> 1600 * u - 800);
        compare(Elementary::exp, StrictMath::exp, u -> 1e-6 * (u - 0.5));
    }

    @Test
    void logarithms() {
        compare(Elementary::log, StrictMath::log, u -> 3 * u);
        compare(Elementary::log, StrictMath::log, u -> 1 + 1e-3 * (u - 0.5));
        compare(Elementary::log, StrictMath::log, u -> StrictMath.exp(1400 * u - 700));
        compare(Elementary::log, StrictMath::log, u -> u - 0.5);
    }

    @Test
    void circularFunctions() {
        for (double range : new double[] {1, 20, 1e4, 1e7}) {
            compare(Elementary::sin, StrictMath::sin, u -> range * (2 * u - 1));
            compare(Elementary::cos, StrictMath::cos, u -> range * (2 * u - 1));
        }
    }

    @Test
    void edges() {
        double[] x = {0, -0.0, Double.NaN, Double.POSITIVE_INFINITY, Double.NEGATIVE_INFINITY, 5e-324, 1e308, -1e308};
        int n = x.length;
        double[] out = new double[n];
        Array[] arrays = {Elementary::exp, Elementary::log, Elementary::sin, Elementary::cos};
        DoubleUnaryOperator[] truths = {Math::exp, Math::log, Math::sin, Math::cos};
        for (int k = 0; k < arrays.length; k++) {
            arrays[k].run(x, n, out, new double[n], new double[n]);
            for (int i = 0; i < n; i++) {
                double t = truths[k].applyAsDouble(x[i]);
                assertThat(Double.compare(out[i] + 0.0, t + 0.0))
                        .as("function %d at %s: %s instead of %s", k, x[i], out[i], t)
                        .isZero();
            }
        }
    }
}
