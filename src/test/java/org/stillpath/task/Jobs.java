package org.stillpath.task;

import java.nio.charset.StandardCharsets;
import java.util.List;
import org.stillpath.io.YamlReader;
import org.stillpath.job.Node;
import org.stillpath.job.Paths;
import org.stillpath.job.Sources;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;

/** Runs jobs given as text. */
final class Jobs {
    private Jobs() {}

    /** The result of a job, without figures. */
    static Result run(String yaml) {
        return run(yaml, false);
    }

    static Result run(String yaml, boolean figures) {
        return Tasks.run(read(yaml), Sources.none(), new Tasks.Options(figures));
    }

    /** The result of a variant of a job with one value replaced, run in a series. */
    static Result series(String yaml, String path, String value) {
        Node.Mapping job = read(yaml);
        Problems problems = new Problems();
        Node.Mapping variant = Paths.with(job, path, new Node.Scalar(job.place(), value, false), job.place(), problems);
        problems.throwIfAny();
        return Series.of(job, Sources.none()).run(variant, new Tasks.Options(false));
    }

    /** What is wrong with a job, as the user would read it; empty if nothing is. */
    static List<String> faults(String yaml) {
        try {
            Tasks.check(read(yaml), Sources.none());
            return List.of();
        } catch (ProblemException e) {
            return e.problems().stream().map(Problem::toString).toList();
        }
    }

    private static Node.Mapping read(String yaml) {
        Problems problems = new Problems();
        Node.Mapping job = YamlReader.parse(yaml.getBytes(StandardCharsets.UTF_8), "job.yaml", problems);
        problems.throwIfAny();
        return job;
    }
}
