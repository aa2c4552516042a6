package org.stillpath.task;

import java.util.List;
import java.util.Optional;
import org.stillpath.job.Node;
import org.stillpath.job.Section;
import org.stillpath.job.Sources;
import org.stillpath.job.Value;
import org.stillpath.medium.MediaMemory;
import org.stillpath.problem.Problems;

/** The tasks by name, and the way from a job to its result. */
public final class Tasks {
    private static final List<Task> ALL =
            List.of(new TraceTask(), new BetweenTask(), new LensTask(), new SightlineTask(), new WindowTask());

    private Tasks() {}

    /**
     * What is wanted besides the numbers.
     *
     * @param figures whether figures are wanted, which costs further rays
     */
    public record Options(boolean figures) {}

    /** Names of the tasks that this version has. */
    public static List<String> names() {
        return ALL.stream().map(Task::name).toList();
    }

    /**
     * Reads a job and says what is wrong with it; computes nothing.
     *
     * @param job the job
     * @param sources what it may name besides itself
     * @throws org.stillpath.problem.ProblemException with all faults, if there are any
     */
    public static void check(Node.Mapping job, Sources sources) {
        read(job, sources, new MediaMemory());
    }

    /**
     * Reads and runs a job.
     *
     * @throws org.stillpath.problem.ProblemException with all faults of the job, or if its train cannot give what the task
     *     asks for
     */
    public static Result run(Node.Mapping job, Sources sources, Options options) {
        return read(job, sources, new MediaMemory()).run(options);
    }

    /**
     * Reads a job that differs from earlier ones in some values only: media that did not change are not read again, and
     * formulas never are.
     *
     * @param memory what the readings have in common; may be shared between threads
     * @throws org.stillpath.problem.ProblemException with all faults of the job
     */
    public static Task.Plan read(Node.Mapping job, Sources sources, MediaMemory memory) {
        Problems problems = new Problems();
        Section top = Section.of(job, "", problems);
        Value name = top.need("task", "lens");
        Optional<Task> task = find(name);
        Scene scene = Scene.read(top, sources, memory);
        Optional<Task.Plan> plan = task.map(t -> t.read(top, scene));
        if (plan.isPresent()) {
            top.finish();
        }
        problems.throwIfAny();
        return plan.orElseThrow(() -> new IllegalStateException("a job without a task has no faults"));
    }

    private static Optional<Task> find(Value name) {
        if (name.isPlaceholder()) {
            return Optional.empty();
        }
        String word = name.word(names().toArray(String[]::new));
        return ALL.stream().filter(t -> t.name().equals(word)).findFirst();
    }
}
