/**
 * Floor 5: paths between two points.
 *
 * <p>{@link org.stillpath.path.PathSearch} finds the stationary optical paths between two points through a train or a medium,
 * and says which is a minimum. It shoots rays over a cone of directions, takes the miss at the target with its derivative from
 * the Jacobi fields, and polishes what may be a root. In a plane of symmetry the search is one-dimensional.
 *
 * <p>{@link org.stillpath.path.Eikonal} solves |∇S| = n for the first arrival on a grid, with no ray in it: the wavefronts,
 * and an independent value for the least path.
 */
@NullMarked
package org.stillpath.path;

import org.jspecify.annotations.NullMarked;
