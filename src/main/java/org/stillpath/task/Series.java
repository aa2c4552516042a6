package org.stillpath.task;

import java.util.List;
import java.util.Optional;
import org.stillpath.job.Node;
import org.stillpath.job.Section;
import org.stillpath.job.Sources;
import org.stillpath.problem.Problems;

/**
 * Runs variants of one job that differ in a few values. What all tasks share (media, train, wavelength) is read once as long as
 * the variant has the very same nodes there, as {@link org.stillpath.job.Paths#with} leaves them, and so are the fields and
 * tables that follow from it: ten thousand sights through one air compile its formula once. May be used by several threads at
 * once.
 */
public final class Series {
    private static final List<String> SHARED =
            List.of("title", "wavelength", "accuracy", "media", "train", "through", "study", "figures");

    private final Node.Mapping base;
    private final Sources sources;
    private final Optional<Scene> scene;

    private Series(Node.Mapping base, Sources sources, Optional<Scene> scene) {
        this.base = base;
        this.sources = sources;
        this.scene = scene;
    }

    /**
     * Variants of a job.
     *
     * @param base the job that they start from; it need not be complete
     * @param sources what it may name besides itself
     */
    public static Series of(Node.Mapping base, Sources sources) {
        Problems problems = new Problems();
        Scene scene = Scene.read(Section.of(base, "", problems), sources);
        return new Series(base, sources, problems.isEmpty() ? Optional.of(scene) : Optional.empty());
    }

    /**
     * Reads and runs a variant.
     *
     * @throws org.stillpath.problem.ProblemException with all its faults, or if its train cannot give what the task asks for
     */
    public Result run(Node.Mapping variant, Tasks.Options options) {
        return Tasks.read(variant, sources, same(variant) ? scene : Optional.empty())
                .run(options);
    }

    // the very same node: equal ones would have to be compared to their leaves
    @SuppressWarnings("ReferenceEquality")
    private boolean same(Node.Mapping variant) {
        for (String key : SHARED) {
            Optional<Node> a = base.find(key);
            Optional<Node> b = variant.find(key);
            if (a.isPresent() != b.isPresent() || (a.isPresent() && a.get() != b.get())) {
                return false;
            }
        }
        return true;
    }

    /** Notes in a section that the shared keys are known. */
    static void know(Section top) {
        SHARED.forEach(top::has);
    }
}
