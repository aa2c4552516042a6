package org.stillpath.medium;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;

import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;

class LuneburgSphereTest {
    private static Samples at(LuneburgSphere sphere, double x, double y, double z) {
        Samples s = new Samples(1);
        sphere.sample(new double[] {x}, new double[] {y}, new double[] {z}, 1, Double.NaN, Order.HESSIAN, s);
        return s;
    }

    /**
     * n and ρ at s = nρ for parallel light to a focus at f (Luneburg 1944; Morgan, J. Appl. Phys. 29 (1958) 1358; recomputed
     * from the integral, to 1e-8 as given and to 1e-15 where it is in closed form).
     */
    @ParameterizedTest
    @CsvSource({
        "1.0, 1.3978337531398166, 0.21461779651989335",
        "2.0, 1.1670678447566807, 0.2570544646121634",
        "1.5, 1.1738009748958604, 0.5963532276518206",
        "2.0, 1.1753112117726512, 0"
    })
    void hasThePublishedIndex(double f, double n, double rho) {
        LuneburgSphere sphere = LuneburgSphere.of(1, Double.POSITIVE_INFINITY, f);
        assertThat(1 + at(sphere, 0.6 * rho, 0, 0.8 * rho).value[0]).isCloseTo(n, within(2e-14));
    }

    /** Focus on the rim: n = √(2 − ρ²); both points on the rim: Maxwell's fisheye 2/(1 + ρ²). */
    @Test
    void containsTheClassics() {
        LuneburgSphere classic = LuneburgSphere.of(2, Double.POSITIVE_INFINITY, 2);
        LuneburgSphere fisheye = LuneburgSphere.of(2, 2, 2);
        for (double u = 0; u <= 1; u += 0.05) {
            Samples a = at(classic, 2 * u, 0, 0);
            double n = Math.sqrt(2 - u * u);
            assertThat(1 + a.value[0]).isCloseTo(n, within(2e-14));
            assertThat(a.gx[0]).isCloseTo(-u / n / 2, within(1e-12));
            Samples b = at(fisheye, 0, 2 * u, 0);
            double w = 1 + u * u;
            assertThat(1 + b.value[0]).isCloseTo(2 / w, within(2e-14));
            assertThat(b.gy[0]).isCloseTo(-4 * u / (w * w) / 2, within(1e-12));
            assertThat(b.hxx[0]).isCloseTo(-4 / (w * w) / 4, within(1e-11));
        }
    }

    /** Gradient and Hessian against differences, through the rim too. */
    @Test
    void derivesItself() {
        LuneburgSphere sphere = LuneburgSphere.of(1, 1.2, 3);
        double h = 1e-6;
        for (double[] q : new double[][] {{0.1, 0.2, 0.3}, {0.5, -0.3, 0.6}, {0.7, 0.7, 0.3}}) {
            Samples s = at(sphere, q[0], q[1], q[2]);
            Samples p = at(sphere, q[0] + h, q[1], q[2]);
            Samples m = at(sphere, q[0] - h, q[1], q[2]);
            assertThat(s.gx[0]).isCloseTo((p.value[0] - m.value[0]) / (2 * h), within(1e-9));
            assertThat(s.hxx[0]).isCloseTo((p.gx[0] - m.gx[0]) / (2 * h), within(1e-8));
            assertThat(s.hxy[0]).isCloseTo((p.gy[0] - m.gy[0]) / (2 * h), within(1e-8));
            assertThat(s.hxz[0]).isCloseTo((p.gz[0] - m.gz[0]) / (2 * h), within(1e-8));
        }
    }

    @Test
    void refusesPointsInside() {
        assertThatThrownBy(() -> LuneburgSphere.of(1, 0.9, 2)).hasMessageContaining("at least the radius");
        assertThatThrownBy(() -> LuneburgSphere.of(0, 1, 2)).hasMessageContaining("radius must be positive");
    }
}
