/**
 * Floor 2: points, frames and surfaces, all in metres and in the job's right-handed coordinates unless a frame is named.
 *
 * <p>Surfaces are given by an implicit function F(q) with exact gradient and Hessian, which is all that refraction, the
 * jump of the Jacobi fields and the search for a crossing need.
 */
@NullMarked
package org.stillpath.geometry;

import org.jspecify.annotations.NullMarked;
