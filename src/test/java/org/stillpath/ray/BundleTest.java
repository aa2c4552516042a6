package org.stillpath.ray;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.ArrayList;
import java.util.List;
import java.util.Random;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.EnumSource;

/** Rays in bundles against the same rays one at a time, and against closed forms. */
class BundleTest {
    private static final int RAYS = 400;
    private static final double ACCURACY = 1e-9;

    @ParameterizedTest
    @EnumSource(AnalyticCase.Kind.class)
    void endsWhereTheClosedFormSays(AnalyticCase.Kind kind) {
        Random random = new Random(20261201);
        for (int i = 0; i < 6; i++) {
            AnalyticCase c = kind.random(random, 1);
            List<RayStart> starts = new ArrayList<>();
            for (int k = 0; k < RAYS; k++) {
                starts.add(RayStart.of(c.from(), c.direction()));
            }
            Tracer tracer = new Tracer(
                    Train.through(c.field()),
                    new Ending.AtOpticalLength(c.opticalLength()),
                    new Tracer.Settings(ACCURACY, false, false));
            Traced alone = tracer.trace(starts.get(0));
            List<Traced> bundle = tracer.trace(starts);
            assertThat(bundle).hasSize(RAYS);
            for (Traced t : bundle) {
                assertThat(t.status()).isEqualTo(alone.status());
                double off = t.position().minus(c.position()).norm();
                assertThat(off).isLessThanOrEqualTo(t.errors().position());
                assertThat(t.opticalLength())
                        .isCloseTo(c.opticalLength(), org.assertj.core.data.Offset.offset(1e-13 * c.opticalLength()));
                assertThat(t.position().minus(alone.position()).norm())
                        .isLessThanOrEqualTo(
                                t.errors().position() + alone.errors().position());
                assertThat(t.length()).isCloseTo(alone.length(), within(t, alone));
                // equal rays give equal digits wherever they stand in the bundle
                assertThat(t.state()).isEqualTo(bundle.get(0).state());
            }
        }
    }

    private static org.assertj.core.data.Offset<Double> within(Traced a, Traced b) {
        return org.assertj.core.data.Offset.offset(
                a.errors().length() + b.errors().length());
    }
}
