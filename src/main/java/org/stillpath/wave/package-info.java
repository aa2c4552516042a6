/**
 * Floor 5: waves over a pupil and Gaussian beams.
 *
 * <p>A {@link org.stillpath.wave.Pupil} says where to sample a beam, with weights of area, so that averages do not depend on
 * the count of samples. What rays bring back from there is a {@link org.stillpath.wave.Wavefront}: a path difference for each
 * sample. It knows its rms, its tilt and focus, its Strehl ratio; a {@link org.stillpath.wave.ZernikeFit} tells its terms. A
 * {@link org.stillpath.wave.GaussianBeam} goes through a 4×4 ray-transfer matrix and is held against another one.
 *
 * <p>Nothing here traces a ray: path differences come from whoever did.
 */
@NullMarked
package org.stillpath.wave;

import org.jspecify.annotations.NullMarked;
