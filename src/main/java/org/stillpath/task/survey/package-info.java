/**
 * Reductions of survey observations through real air, and beside each the textbook formula that would have been used.
 *
 * <p>{@link org.stillpath.task.survey.Classical} holds the formulas alone, in SI and radians, as published. {@link
 * org.stillpath.task.survey.Reduction} follows the ray through the air of the job instead, and gives both answers as {@link
 * org.stillpath.task.survey.Reduced} values, so that a reader sees what the formula leaves out.
 */
@NullMarked
package org.stillpath.task.survey;

import org.jspecify.annotations.NullMarked;
