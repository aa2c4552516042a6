package org.stillpath.study;

import java.util.Arrays;
import java.util.List;
import java.util.Map;

/**
 * Keeps the runs of a study that are done, so that an interrupted study can go on. Implemented by the floor that writes
 * files. Methods are called by one thread at a time.
 */
public interface Store {
    /**
     * Starts keeping, or finds what an earlier run of the same study kept.
     *
     * @param fingerprint says which study it is: job, files and version
     * @throws org.stillpath.problem.ProblemException if something is kept there that belongs to another study, or another
     *     process works on it
     */
    void open(String fingerprint);

    /** The runs of a stage that an earlier run kept; none for a new study. */
    List<Part> parts(String stage);

    /** Keeps runs; when this returns they outlive the process. */
    void add(String stage, Part part);

    /**
     * Runs that are done.
     *
     * @param from number of the first
     * @param width numbers a run
     * @param results numbers by run, NaN where there was none
     * @param flags bits a run
     * @param faults what went wrong, by number of the run
     */
    record Part(int from, int width, double[] results, byte[] flags, Map<Integer, String> faults) {
        public Part {
            faults = Map.copyOf(faults);
            if (results.length != width * flags.length) {
                throw new IllegalArgumentException(
                        "results must be as many as runs times width: " + results.length + ", " + flags.length);
            }
        }

        @Override
        public boolean equals(Object o) {
            return o instanceof Part p
                    && from == p.from
                    && Arrays.equals(results, p.results)
                    && Arrays.equals(flags, p.flags)
                    && faults.equals(p.faults);
        }

        @Override
        public int hashCode() {
            return 31 * from + Arrays.hashCode(results);
        }
    }

    /** Keeps nothing. */
    static Store none() {
        return Forgetful.NOTHING;
    }

    /** The store that keeps nothing. */
    enum Forgetful implements Store {
        /** The one. */
        NOTHING;

        @Override
        public void open(String fingerprint) {}

        @Override
        public List<Part> parts(String stage) {
            return List.of();
        }

        @Override
        public void add(String stage, Part part) {}
    }
}
