/**
 * Floor 5: which paths light takes between two points.
 *
 * <p>{@link org.stillpath.path.Eikonal} finds the first arrival: the least optical length S from a point to everywhere in one
 * medium, from |∇S| = n on a {@link org.stillpath.path.FrontGrid}. It shares no code with the ray engine, so that its value at
 * the target is an independent check of the least path, and its level sets are the wavefronts for a figure.
 */
@NullMarked
package org.stillpath.path;

import org.jspecify.annotations.NullMarked;
