package org.stillpath.geometry;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import org.hipparchus.analysis.integration.gauss.GaussIntegrator;
import org.hipparchus.analysis.integration.gauss.GaussIntegratorFactory;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;

/** Gauss points against Hipparchus, whose rule is computed with 40 digits. */
class GaussPointsTest {
    @ParameterizedTest
    @ValueSource(ints = {1, 2, 3, 8, 24, 49, 100, 200})
    void agreeWithHipparchus(int count) {
        GaussIntegrator other = new GaussIntegratorFactory().legendre(count, 0, 1);
        GaussPoints own = GaussPoints.of(count);
        for (int i = 0; i < count; i++) {
            assertThat(own.at(i)).isCloseTo(other.getPoint(i), within(4e-16));
            // of weights that add up to 1
            assertThat(own.weight(i)).isCloseTo(other.getWeight(i), within(1e-16 + 1e-14 * other.getWeight(i)));
        }
    }
}
