package org.stillpath.task;

import java.util.OptionalDouble;
import org.stillpath.job.Section;
import org.stillpath.job.Value;
import org.stillpath.unit.Kind;
import org.stillpath.wave.Pupil;

/**
 * The key {@code pupil} of a lens.
 *
 * @param radius metres, at the first vertex or in the stop; absent: the stop's aperture
 * @param sampling where rays go
 */
record PupilSpec(OptionalDouble radius, Pupil sampling) {
    private static final Pupil USUAL = new Pupil(10, 24);

    /** Reads {@code {radius: 0.4 mm, sampling: {radial: 8, angular: 16}}}. */
    static PupilSpec read(Value value) {
        Section s = value.section();
        OptionalDouble radius = s.find("radius")
                .map(v -> OptionalDouble.of(v.positive(Kind.LENGTH)))
                .orElse(OptionalDouble.empty());
        Pupil sampling = s.find("sampling").map(Pupil::read).orElse(USUAL);
        s.finish();
        return new PupilSpec(radius, sampling);
    }
}
