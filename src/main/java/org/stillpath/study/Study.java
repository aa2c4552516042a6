package org.stillpath.study;

import java.util.Map;
import java.util.Optional;
import org.stillpath.job.Node;
import org.stillpath.job.Sources;
import org.stillpath.job.Value;
import org.stillpath.problem.Problems;

/** A kind of study. Adding one is one class of this kind, named in {@link Studies}. */
interface Study {
    /** Its key in {@code study:}. */
    String key();

    /** Reads its section; faults are collected, and the plan is only used if there are none. */
    Plan read(Value value, Desk desk);

    /**
     * What reading needs.
     *
     * @param job the job without its study
     * @param variants jobs by name of variant
     * @param sources files
     * @param problems collects faults
     */
    record Desk(Node.Mapping job, Map<String, Node.Mapping> variants, Sources sources, Problems problems) {}

    /** A study of a sound job. */
    interface Plan {
        /** Looks at the nominal result and adds what is wrong with the study in its light, before anything long is run. */
        void bind(Bench bench, Problems problems);

        /** Runs. */
        Finding run(Bench bench);

        /** How many runs of the job it takes at most; 0 where nobody can say beforehand. */
        long runs();

        /** Whether each variant gets a study of its own. */
        default boolean isForEachVariant() {
            return true;
        }

        /** A job that can stand for the nominal one where that cannot be run as it is. */
        default Optional<Node.Mapping> substitute() {
            return Optional.empty();
        }
    }
}
