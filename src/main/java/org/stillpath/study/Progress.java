package org.stillpath.study;

/** Is told how far a study is. Called from one thread at a time, often; implementations decide what is worth showing. */
@FunctionalInterface
public interface Progress {
    /** Tells nobody. */
    Progress SILENT = (stage, done, total) -> {};

    /**
     * Runs were done.
     *
     * @param stage what is being done, in a few words
     * @param done runs done, those of an earlier, interrupted run included
     * @param total runs in this stage; of a stage that may end early the most
     */
    void at(String stage, long done, long total);
}
