/**
 * Floor 7: studies over any task. A study runs a job many times with other values at given paths and watches given numbers
 * of the results: {@link org.stillpath.study.SweepStudy}, {@link org.stillpath.study.BatchStudy}, {@link
 * org.stillpath.study.BudgetStudy}, {@link org.stillpath.study.FitStudy}.
 *
 * <p>{@link org.stillpath.study.Studies} reads {@code study:} and is the only way in. A job's tree is read once; a run
 * replaces values in it ({@link org.stillpath.study.Input}), reads the rest again with what stayed the same remembered
 * ({@link org.stillpath.medium.MediaMemory}), and looks results up by path ({@link org.stillpath.task.ResultPath}). The
 * {@link org.stillpath.study.Crew} runs on all cores; what a run gives depends on its number alone, never on the thread or
 * the order, so the digits are the same on any machine. Runs done are handed to a {@link org.stillpath.study.Store}, from
 * which an interrupted study goes on.
 */
@NullMarked
package org.stillpath.study;

import org.jspecify.annotations.NullMarked;
