/**
 * Floor 4: the ray equation that follows from Fermat's principle, through media and surfaces.
 *
 * <p>The optical length S = ∫ n ds is stationary along a ray. With p = n·(unit tangent) and the parameter τ, dτ = ds/n,
 * Hamilton's equations of H = (|p|² − n²)/2, with H = 0 on a ray, read
 *
 * <pre>dq/dτ = p    dp/dτ = ½∇(n²)    d(S − L)/dτ = n² − n    dL/dτ = n</pre>
 *
 * <p>(Luneburg, <i>Mathematical Theory of Optics</i>; Sharma, Kumar and Ghatak, Appl. Opt. 21 (1982) 984). S is carried as
 * the geometric length L and the excess S − L, so that air keeps its digits. Neighbouring rays ride along as Jacobi fields
 * δq'' = ½∇∇(n²) δq, with a jump at each surface.
 *
 * <p>{@link org.stillpath.ray.Tracer} takes a ray through a {@link org.stillpath.ray.Train}: from surface to surface with a
 * {@link org.stillpath.ray.Propagator}, which solves the equation inside one smooth piece of one medium, and across
 * surfaces with {@link org.stillpath.ray.Crossing}.
 */
@NullMarked
package org.stillpath.ray;

import org.jspecify.annotations.NullMarked;
