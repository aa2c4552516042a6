package org.stillpath.ray;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.stillpath.geometry.Vector;

class NystromPairTest {
    private static NystromPair pair(int order) {
        return order == 6 ? NystromPair.SIX_FOUR : order == 8 ? NystromPair.EIGHT_SIX : NystromPair.TWELVE_TEN;
    }

    /**
     * Row sums c²/2 and the quadrature conditions Σ b' cᵏ = 1/(k + 1), Σ b cᵏ = 1/((k + 1)(k + 2)), for both formulas of a
     * pair (Hairer, Nørsett and Wanner, Solving Ordinary Differential Equations I, section II.14). Two coefficients of the
     * pair of order 12 are near 49, which costs two digits.
     */
    @ParameterizedTest
    @ValueSource(ints = {6, 8, 12})
    void satisfiesTheQuadratureConditions(int order) {
        NystromPair rk = pair(order);
        for (int i = 0; i < rk.stages(); i++) {
            double sum = 0;
            for (double a : rk.a()[i]) {
                sum += a;
            }
            assertThat(sum).isCloseTo(rk.c()[i] * rk.c()[i] / 2, within(3e-14));
        }
        for (int k = 0; k < order; k++) {
            double turn = 0;
            double place = 0;
            double lowTurn = 0;
            double lowPlace = 0;
            for (int i = 0; i < rk.stages(); i++) {
                double power = Math.pow(rk.c()[i], k);
                turn += rk.bp()[i] * power;
                place += rk.b()[i] * power;
                lowTurn += (rk.bp()[i] - rk.bpe()[i]) * power;
                lowPlace += (rk.b()[i] - rk.be()[i]) * power;
            }
            assertThat(turn).isCloseTo(1.0 / (k + 1), within(1e-15));
            if (k + 2 <= order) {
                assertThat(place).isCloseTo(1.0 / ((k + 1) * (k + 2)), within(1e-15));
            }
            if (k + 1 <= rk.lower()) {
                assertThat(lowTurn).isCloseTo(1.0 / (k + 1), within(1e-15));
            }
            if (k + 2 <= rk.lower()) {
                assertThat(lowPlace).isCloseTo(1.0 / ((k + 1) * (k + 2)), within(1e-15));
            }
        }
    }

    /** Halving the steps on a Kepler ellipse, n² = 2a/ρ − 1, divides the error by 2 to the order, within half an order. */
    @ParameterizedTest
    @ValueSource(ints = {6, 8, 12})
    void hasItsOrder(int order) {
        int steps = order == 12 ? 14 : order == 8 ? 48 : 64;
        double coarse = error(pair(order), steps);
        double fine = error(pair(order), 2 * steps);
        assertThat(Math.log(coarse / fine) / Math.log(2)).isGreaterThan(order - 0.6);
    }

    private static double error(NystromPair rk, int steps) {
        AnalyticCase c = AnalyticCase.Kind.KEPLER.random(new java.util.Random(5), 1);
        double e = c.from().norm();
        double[] y = new double[State.size(0)];
        y[0] = c.from().x();
        y[1] = c.from().y();
        y[2] = c.from().z();
        double n = Math.sqrt(2 / e - 1);
        y[3] = n * c.direction().x();
        y[4] = n * c.direction().y();
        y[5] = n * c.direction().z();
        double tau = 2 * Math.PI;
        NystromPropagator propagator = new NystromPropagator(1, 1, 1, rk);
        for (int i = 0; i < steps; i++) {
            propagator.single(y, c.field(), tau / steps);
        }
        // one revolution takes τ = 2πa and ends where it began
        return new Vector(y[0], y[1], y[2]).minus(c.from()).norm();
    }
}
