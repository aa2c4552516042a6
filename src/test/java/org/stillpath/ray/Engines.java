package org.stillpath.ray;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.List;

/** The engines, and rays traced by all of them. */
final class Engines {
    static final List<Propagator.Maker> ALL = List.of(HipparchusPropagator::new, NystromPropagator::new);

    private Engines() {}

    /** A ray by the production engine, once the others have been seen to agree with it to the accuracy asked for. */
    static Traced trace(Train train, Ending ending, Tracer.Settings settings, RayStart start) {
        Traced result = new Tracer(train, ending, settings).trace(start);
        for (Propagator.Maker engine : ALL) {
            agree(new Tracer(train, ending, settings, engine).trace(start), result, settings.accuracy());
        }
        return result;
    }

    /** Asserts that two ends of one ray are the same to the accuracy that both were asked for. */
    static void agree(Traced a, Traced b, double accuracy) {
        assertThat(b.status()).as(a.note() + b.note()).isEqualTo(a.status());
        assertThat(b.element()).isEqualTo(a.element());
        if (a.status() != Status.ARRIVED) {
            return;
        }
        double length = Math.max(a.length(), 1e-300);
        assertThat(a.position().minus(b.position()).norm()).isLessThanOrEqualTo(2 * accuracy * length);
        assertThat(a.direction().minus(b.direction()).norm()).isLessThanOrEqualTo(2 * accuracy);
        assertThat(Math.abs(a.opticalLength() - b.opticalLength()))
                .isLessThanOrEqualTo(2 * accuracy * Math.abs(a.opticalLength()));
    }
}
