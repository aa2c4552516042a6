package org.stillpath.cli;

import java.nio.file.InvalidPathException;
import java.nio.file.Path;
import java.util.List;
import java.util.function.BiFunction;
import org.stillpath.io.JobFile;
import org.stillpath.job.Node;
import org.stillpath.job.Sources;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;

/** A job file as named on the command line, with the values of {@code --set} in it. */
final class Job {
    private final JobFile file;
    private final boolean allowOutside;
    /** What was wrong with the text; reading went on, so that everything is told at once. */
    private final Problems problems;

    private Job(JobFile file, boolean allowOutside, Problems problems) {
        this.file = file;
        this.allowOutside = allowOutside;
        this.problems = problems;
    }

    /**
     * Reads a file.
     *
     * @param name as on the command line
     * @param settings texts {@code PATH=VALUE}
     * @throws ProblemException if it cannot be read or is no sound YAML
     */
    static Job read(String name, List<String> settings, boolean allowOutside) {
        Problems problems = new Problems();
        return new Job(JobFile.read(path(name), problems).with(settings, problems), allowOutside, problems);
    }

    /**
     * The path that a text names.
     *
     * @throws ProblemException if it is none
     */
    static Path path(String name) {
        try {
            return Path.of(name);
        } catch (InvalidPathException e) {
            throw new ProblemException(Problem.file(Place.of(name), "this is not the name of a file"));
        }
    }

    /** The job's name: the file's, without folder and ending. */
    String name() {
        return file.name();
    }

    JobFile file() {
        return file;
    }

    /**
     * Hands the job to whoever understands it.
     *
     * @throws ProblemException with what was wrong with the text and what the work says is wrong, together
     */
    <R> R work(BiFunction<Node.Mapping, Sources, R> work) {
        R result;
        try {
            result = work.apply(file.root(), file.sources(allowOutside));
        } catch (ProblemException e) {
            e.problems().forEach(problems::add);
            throw new ProblemException(problems.list());
        }
        problems.throwIfAny();
        return result;
    }

    /** Whether the text itself is sound, so that computing is worth while. */
    boolean isSound() {
        return problems.isEmpty();
    }
}
