package org.stillpath.cli;

import java.util.List;
import java.util.Optional;
import java.util.Set;
import org.stillpath.job.Node;
import org.stillpath.job.Section;
import org.stillpath.job.Sources;
import org.stillpath.medium.MediaReader;
import org.stillpath.medium.Medium;
import org.stillpath.problem.Problems;

/** Media that stand in a file of their own, read as if a job had named them. */
final class ShippedMedia {
    /** Keys that a job has and a medium has not. */
    private static final Set<String> JOB_KEYS = Set.of("task", "train", "through", "rays", "media", "study");

    /** Keys that say what a medium is; `from` also starts a path in a job. */
    private static final Set<String> MEDIUM_KEYS = Set.of("index", "air", "solid", "from");

    private ShippedMedia() {}

    /** Whether a file holds a medium rather than a job. */
    static boolean isMedium(Node.Mapping root) {
        return JOB_KEYS.stream().noneMatch(key -> root.find(key).isPresent())
                && MEDIUM_KEYS.stream().anyMatch(key -> root.find(key).isPresent());
    }

    /**
     * Reads a medium.
     *
     * @param declaration what would stand behind its name in a job
     * @param name the name that it goes by
     * @throws org.stillpath.problem.ProblemException if anything is wrong with it
     */
    static Medium read(Node.Mapping declaration, String name, Sources sources) {
        Problems problems = new Problems();
        Node.Mapping media =
                new Node.Mapping(declaration.place(), List.of(new Node.Entry(name, declaration.place(), declaration)));
        Optional<Medium> medium = MediaReader.read(Optional.of(Section.of(media, "media", problems)), sources, problems)
                .find(name);
        problems.throwIfAny();
        return medium.orElseThrow();
    }
}
