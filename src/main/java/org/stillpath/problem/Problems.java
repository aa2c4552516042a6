package org.stillpath.problem;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;

/**
 * Collects the faults of one input, so that all are told at once. Mutable on purpose; belongs to the reading of one
 * file and is not shared between threads.
 */
public final class Problems {
    /** More faults than this help nobody; the rest are counted only. */
    public static final int LIMIT = 50;

    private final List<Problem> list = new ArrayList<>();
    private int dropped;

    /** Adds a fault of the input. The same fault at the same place is kept once. */
    public void add(Place place, String path, String message) {
        add(Problem.input(place, path, message));
    }

    /** Adds a fault. The same fault at the same place is kept once. */
    public void add(Problem problem) {
        if (list.contains(problem)) {
            return;
        }
        if (list.size() < LIMIT) {
            list.add(problem);
        } else {
            dropped++;
        }
    }

    /** Whether nothing is wrong so far. */
    public boolean isEmpty() {
        return list.isEmpty();
    }

    /** The faults in the order of their places, a closing line telling how many were left out, if any. */
    public List<Problem> list() {
        List<Problem> sorted = new ArrayList<>(list);
        sorted.sort(Comparator.comparing((Problem p) -> p.place().source())
                .thenComparingInt(p -> p.place().line())
                .thenComparingInt(p -> p.place().column()));
        if (dropped > 0) {
            sorted.add(Problem.input(sorted.get(0).place(), "", "and " + dropped + " more faults, not shown"));
        }
        return List.copyOf(sorted);
    }

    /**
     * Ends the reading if anything was wrong.
     *
     * @throws ProblemException with all faults collected, if there is one
     */
    public void throwIfAny() {
        if (!list.isEmpty()) {
            throw new ProblemException(list());
        }
    }
}
