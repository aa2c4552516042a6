package org.stillpath.ray;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.ArrayList;
import java.util.Collections;
import java.util.List;
import java.util.Random;
import org.junit.jupiter.api.Test;

/** Error estimates against closed forms: neither too small nor uselessly large. */
class CalibrationTest {
    private static final int CASES = 10_000;

    /**
     * Over 10,000 random rays the true error exceeds the estimate in fewer than one case in a thousand, the estimate is less
     * than 100 times too large in the median (where the true error can be told from rounding), and the asked accuracy is kept.
     */
    @Test
    void estimatesAreHonest() {
        Random random = new Random(20261201);
        AnalyticCase.Kind[] kinds = AnalyticCase.Kind.values();
        int exceeded = 0;
        int missed = 0;
        List<Double> ratios = new ArrayList<>();
        for (int i = 0; i < CASES; i++) {
            double size = Math.pow(10, random.nextInt(5) - 3);
            AnalyticCase c = kinds[i % kinds.length].random(random, size);
            double accuracy = Math.pow(10, -4 - 9 * random.nextDouble());
            Traced end = new Tracer(
                            Train.through(c.field()),
                            new Ending.AtOpticalLength(c.opticalLength()),
                            new Tracer.Settings(accuracy, false, false))
                    .trace(RayStart.of(c.from(), c.direction()));
            assertThat(end.status()).as(c.name() + " " + end.note()).isEqualTo(Status.ARRIVED);
            double place = end.position().minus(c.position()).norm();
            double angle = end.direction().minus(c.momentum().unit()).norm();
            if (place > end.errors().position() || angle > end.errors().direction()) {
                exceeded++;
            }
            double across = c.position().minus(c.from()).norm();
            if (end.accurate() && (place > accuracy * Math.max(across, 1e-3 * end.length()) || angle > accuracy)) {
                missed++;
            }
            if (place > 1e-15 * size) {
                ratios.add(end.errors().position() / place);
            }
        }
        Collections.sort(ratios);
        assertThat(exceeded).isLessThan(CASES / 1000);
        assertThat(missed).isZero();
        assertThat(ratios.size()).isGreaterThan(CASES / 4);
        assertThat(ratios.get(ratios.size() / 2)).isLessThan(100);
    }
}
