/**
 * Floor 0: what is wrong, where, what was expected, and the remedy.
 *
 * <p>A user's fault is a {@link org.stillpath.problem.Problem}. Faults are collected in a {@link
 * org.stillpath.problem.Problems} while a file is read, so that all of them are told at once, and leave the reading code
 * together in one {@link org.stillpath.problem.ProblemException}. A programmer's fault is an {@link
 * java.lang.IllegalArgumentException} and never travels this way.
 */
@NullMarked
package org.stillpath.problem;

import org.jspecify.annotations.NullMarked;
