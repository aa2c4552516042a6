package org.stillpath.task;

import org.stillpath.job.Section;

/** A task: reads its keys of a job into a plan that can be run. Adding a task is one class of this kind, named in {@link Tasks}. */
public interface Task {
    /** Its name in {@code task:}. */
    String name();

    /**
     * Reads the keys of this task; faults are collected in the section, and the plan is only run if there are none.
     *
     * @param job the top of the job; the common keys have been read into {@code scene}
     * @param scene wavelength, accuracy, media and train
     */
    Plan read(Section job, Scene scene);

    /** A job of this task, ready to run as often as wanted. */
    interface Plan {
        /**
         * Computes.
         *
         * @param options what is wanted besides the numbers
         * @throws org.stillpath.problem.ProblemException if the train cannot give what the task asks for
         */
        Result run(Tasks.Options options);
    }
}
