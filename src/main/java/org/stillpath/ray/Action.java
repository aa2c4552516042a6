package org.stillpath.ray;

/** What a surface does to the light that meets it. */
public sealed interface Action {
    /**
     * Refracts by Snell's law into the next medium.
     *
     * @param followTotalReflection whether light beyond the critical angle is reflected and followed, or ends
     */
    record Refract(boolean followTotalReflection) implements Action {}

    /** Reflects back into the medium before it. */
    record Reflect() implements Action {}

    /** Lets light pass inside its aperture and changes nothing. */
    record Stop() implements Action {}

    /**
     * An ideal thin lens: slopes along the light go from x′ to x′ − x/f, and all paths between its conjugates are of equal
     * optical length.
     *
     * @param focalLength f in metres, positive for a converging lens
     */
    record ThinLens(double focalLength) implements Action {
        public ThinLens {
            if (!Double.isFinite(focalLength) || focalLength == 0) {
                throw new IllegalArgumentException("focalLength must be finite and not 0: " + focalLength);
            }
        }
    }
}
