package org.stillpath.medium;

import java.util.Optional;
import org.stillpath.job.Section;
import org.stillpath.job.Sources;
import org.stillpath.unit.Kind;

/** Reads the {@code ground:} of a job: a level, a slope, or a cross-section from a file. */
public final class GroundReader {
    private GroundReader() {}

    /**
     * The ground.
     *
     * @param s {@code {height, slope}} or {@code {file, columns, interpolate}}
     * @param sources has the file
     * @return empty after a fault
     */
    public static Optional<Ground> read(Section s, Sources sources) {
        if (s.has("file")) {
            for (String key : new String[] {"height", "slope"}) {
                if (s.has(key)) {
                    s.fault(key, "`" + key + "` and `file` cannot stand together; the file gives the ground's heights");
                }
            }
            Optional<Ground> ground =
                    new TableReader(sources, s.problems()).ground(s).map(Ground::profile);
            s.finish();
            return ground;
        }
        double height = s.need("height", "0 m").quantity(Kind.LENGTH);
        double slope = s.find("slope").map(v -> v.quantity(Kind.NUMBER)).orElse(0.0);
        s.finish();
        if (Math.abs(slope) > 1) {
            s.fault("slope", "a slope of more than 100 % is a wall; give a cross-section with `file`");
            return Optional.empty();
        }
        return Double.isNaN(height + slope) ? Optional.empty() : Optional.of(Ground.slope(height, slope));
    }
}
