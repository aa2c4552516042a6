package org.stillpath.medium;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.stillpath.geometry.Vector;
import org.stillpath.job.Node;
import org.stillpath.job.Section;
import org.stillpath.job.Sources;
import org.stillpath.job.Value;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problems;
import org.stillpath.unit.Kind;
import org.stillpath.unit.Quantity;

/**
 * A document that is one medium, shipped or a user's own: the keys of a medium in a job, and {@code title}, {@code
 * source}, {@code note}, {@code range} and {@code samples} beside them.
 *
 * @param name as it was asked for, such as {@code rods/parabolic}
 * @param title one line saying what it is; empty where nothing is said
 * @param medium the medium with the document's own values
 * @param with values of its names, which a job may override
 * @param valid the region as written; empty: everywhere
 * @param note in words, how to use it; empty where nothing is said
 * @param samples points with the index that the source gives there
 */
public record MediumFile(
        String name,
        String title,
        Medium medium,
        Map<String, Quantity> with,
        String valid,
        String note,
        List<Sample> samples) {
    /** What a document may say besides what a medium in a job says. */
    static final List<String> KEYS = List.of("title", "samples");

    public MediumFile {
        samples = List.copyOf(samples);
        with = java.util.Collections.unmodifiableMap(new java.util.LinkedHashMap<>(with));
    }

    /**
     * A point with a known index.
     *
     * @param at in the medium's own frame, metres
     * @param wavelength vacuum wavelength in metres; NaN where none matters
     * @param index what the source gives
     */
    public record Sample(Vector at, double wavelength, double index) {}

    /**
     * Reads a medium file.
     *
     * @param name as for {@link Sources#document}
     * @param sources gives the document
     * @param problems collects the faults in it
     * @throws org.stillpath.problem.ProblemException if there is no such document or it is not sound YAML
     */
    public static MediumFile read(String name, Sources sources, Problems problems) {
        return of(name, sources.document(name, Place.of(name)), sources, problems);
    }

    /** The same for a document that has been read already. */
    public static MediumFile of(String name, Node.Mapping document, Sources sources, Problems problems) {
        Section s = Section.of(document, "", problems);
        String title = s.find("title").map(Value::text).orElse("");
        List<Sample> samples = new ArrayList<>();
        s.find("samples")
                .map(Value::items)
                .orElse(List.of())
                .forEach(v -> sample(v.section()).ifPresent(samples::add));
        MediaReader.Parsed parsed = MediaReader.document(name, s, sources, problems, new FormulaCache());
        String note = s.find("note").map(Value::text).orElse("");
        String valid = s.find("valid").map(Value::text).orElse("");
        return new MediumFile(name, title, parsed.medium(), parsed.with(), valid, note, samples);
    }

    private static Optional<Sample> sample(Section s) {
        double[] at = s.need("at", "[0 mm, 0.2 mm, 0 mm]").point();
        double wavelength =
                s.find("wavelength").map(v -> v.positive(Kind.LENGTH)).orElse(Double.NaN);
        double index = s.need("index", "1.5168").positive(Kind.NUMBER);
        s.finish();
        if (Double.isNaN(at[0] + at[1] + at[2] + index)) {
            return Optional.empty();
        }
        return Optional.of(new Sample(new Vector(at[0], at[1], at[2]), wavelength, index));
    }
}
