package org.stillpath.medium;

import java.util.List;
import java.util.Optional;
import org.stillpath.formula.Chart;
import org.stillpath.geometry.Vector;

/**
 * What every medium says about itself, whatever its index.
 *
 * @param name its name in the job
 * @param origin origin of its frame in the job's coordinates, metres, where it overrides the train's
 * @param axis direction of its z axis in the job's coordinates, where it overrides the train's
 * @param valid margins of the region where it may be used, in its own frame; empty: everywhere
 * @param range wavelengths that it was published for
 * @param source where it was published; empty where nothing is said
 * @param warnings what was assumed or is doubtful, whatever the wavelength
 */
public record Declaration(
        String name,
        Optional<Vector> origin,
        Optional<Vector> axis,
        List<Level> valid,
        Optional<WavelengthRange> range,
        String source,
        List<String> warnings) {
    public Declaration {
        valid = List.copyOf(valid);
        warnings = List.copyOf(warnings);
    }

    /** A medium about which nothing but its name is said. */
    public static Declaration of(String name) {
        return new Declaration(name, Optional.empty(), Optional.empty(), List.of(), Optional.empty(), "", List.of());
    }

    /** The margins of {@link #valid()} where {@code chart} gives height, clearance and distance. */
    List<Level> valid(Chart chart) {
        return valid.stream().map(l -> l.on(chart)).toList();
    }

    /** The same with another source. */
    public Declaration withSource(String text) {
        return new Declaration(name, origin, axis, valid, range, text, warnings);
    }

    /** The same with further warnings behind those it has. */
    public Declaration withWarnings(List<String> more) {
        List<String> all = new java.util.ArrayList<>(warnings);
        all.addAll(more);
        return new Declaration(name, origin, axis, valid, range, source, all);
    }

    /**
     * Vacuum wavelengths between which a medium was published.
     *
     * @param shortest in metres
     * @param longest in metres, above {@code shortest}
     */
    public record WavelengthRange(double shortest, double longest) {
        public WavelengthRange {
            if (!(shortest > 0 && longest > shortest)) {
                throw new IllegalArgumentException(
                        "wavelengths must ascend from above 0: " + shortest + ", " + longest);
            }
        }
    }
}
