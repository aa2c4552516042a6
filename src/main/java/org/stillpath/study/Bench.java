package org.stillpath.study;

import java.util.HashSet;
import java.util.List;
import java.util.Set;
import org.stillpath.job.Node;
import org.stillpath.job.Paths;
import org.stillpath.job.Sources;
import org.stillpath.medium.MediaMemory;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;
import org.stillpath.task.Result;
import org.stillpath.task.ResultPath;
import org.stillpath.task.Tasks;

/**
 * One job on which a study works: its tree, its nominal result, what is watched, and who does the runs.
 *
 * @param variant name of the variant; empty for the job itself
 * @param tree the job without its study
 * @param sources files that it names
 * @param memory what all readings have in common
 * @param crew does the runs
 * @param nominal the result at the job's own values
 * @param watch results that are watched
 * @param figures names of the study figures that are wanted
 */
record Bench(
        String variant,
        Node.Mapping tree,
        Sources sources,
        MediaMemory memory,
        Crew crew,
        Result nominal,
        List<Watched> watch,
        List<String> figures) {
    private static final Tasks.Options NUMBERS = new Tasks.Options(false);
    private static final int MOST_TRIALS = 20;
    private static final long TRIAL_NANOSECONDS = 100_000_000;

    /** Name of a stage of this job, for the store. */
    String stage(String name) {
        return variant.isEmpty() ? name : name + " " + variant;
    }

    /** A word for names of tables and figures of this job. */
    String stem(String name) {
        return variant.isEmpty() ? name : name + "-" + variant.replaceAll("[^A-Za-z0-9_-]", "");
    }

    /** The job with values of inputs replaced; all in SI. */
    Node.Mapping with(List<Input> inputs, double[] values) {
        Node.Mapping job = tree;
        Problems problems = new Problems();
        for (int i = 0; i < values.length; i++) {
            Input input = inputs.get(i);
            job = Paths.with(job, input.path(), input.node(values[i]), input.place(), problems);
        }
        problems.throwIfAny();
        return job;
    }

    /** Runs the job with other values and looks the watched results up; never throws for what a user gave. */
    Crew.Run run(List<Input> inputs, double[] values, List<Watched> wanted) {
        return run(() -> with(inputs, values), wanted);
    }

    /** Runs a job like this one. */
    Crew.Run run(java.util.function.Supplier<Node.Mapping> job, List<Watched> wanted) {
        double[] results = new double[wanted.size()];
        try {
            Result r = result(job.get());
            for (int i = 0; i < results.length; i++) {
                results[i] = wanted.get(i)
                        .path()
                        .find(r)
                        .map(ResultPath.Found::value)
                        .orElse(Double.NaN);
            }
            int flags = (r.accuracyReached() ? 0 : Crew.Runs.INACCURATE) | (warnsAnew(r) ? Crew.Runs.WARNED : 0);
            return new Crew.Run(results, flags, "");
        } catch (ProblemException e) {
            return failed(results, told(e.problems()));
        } catch (RuntimeException | StackOverflowError e) {
            String message = e.getMessage() == null ? "" : " (" + e.getMessage() + ")";
            return failed(results, "a fault of the program: " + e.getClass().getSimpleName() + message);
        }
    }

    /** The result of a job like this one. */
    Result result(Node.Mapping job) {
        return Tasks.read(job, sources, memory).run(NUMBERS);
    }

    /**
     * Time that a run of a job like this one takes, seconds: the least of a few, since the first ones also wait for the
     * compiler.
     */
    double secondsARun(Node.Mapping job) {
        long start = System.nanoTime();
        long least = Long.MAX_VALUE;
        for (int i = 0; i < MOST_TRIALS && System.nanoTime() - start < TRIAL_NANOSECONDS; i++) {
            long before = System.nanoTime();
            result(job);
            least = Math.min(least, System.nanoTime() - before);
        }
        return least * 1e-9;
    }

    private boolean warnsAnew(Result r) {
        if (r.warnings().isEmpty()) {
            return false;
        }
        Set<String> known = new HashSet<>(nominal.warnings());
        return r.warnings().stream().anyMatch(w -> !known.contains(w));
    }

    private static Crew.Run failed(double[] results, String fault) {
        java.util.Arrays.fill(results, Double.NaN);
        return new Crew.Run(results, Crew.Runs.FAILED, fault);
    }

    /** The first fault, and how many more there are. */
    private static String told(List<Problem> problems) {
        Problem first = problems.get(0);
        String text = first.place().line() > 0 ? first.toString() : first.path() + ": " + first.message();
        return problems.size() == 1 ? text : text + " (and " + (problems.size() - 1) + " more)";
    }
}
