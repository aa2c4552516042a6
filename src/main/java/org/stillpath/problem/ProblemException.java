package org.stillpath.problem;

import java.util.List;
import java.util.stream.Collectors;

/** Carries the faults of a user's input out of the code that reads it. Never holds an empty list. */
public final class ProblemException extends RuntimeException {
    private static final long serialVersionUID = 1L;

    private final transient List<Problem> problems;

    /** Wraps the given faults, at least one. */
    public ProblemException(List<Problem> problems) {
        super(problems.stream().map(Problem::toString).collect(Collectors.joining("\n")));
        if (problems.isEmpty()) {
            throw new IllegalArgumentException("problems must not be empty");
        }
        this.problems = List.copyOf(problems);
    }

    /** Wraps one fault. */
    public ProblemException(Problem problem) {
        this(List.of(problem));
    }

    /** All faults, in the order of their places. */
    public List<Problem> problems() {
        return problems;
    }
}
