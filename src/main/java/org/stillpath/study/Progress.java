package org.stillpath.study;

/** Is told how far a study is. Called from one thread at a time, often; implementations decide what is worth showing. */
@FunctionalInterface
public interface Progress {
    /** Tells nobody. */
    Progress SILENT = (stage, done, total) -> {};

    /**
     * The work is about to begin.
     *
     * @param runs runs that it takes at most
     * @param seconds time that they take at most, guessed from a few runs at the job's own values
     */
    default void ahead(long runs, double seconds) {}

    /**
     * Runs were done.
     *
     * @param stage what is being done, in a few words
     * @param done runs done, those of an earlier, interrupted run included
     * @param total runs in this stage; of a stage that may end early the most
     */
    void at(String stage, long done, long total);
}
