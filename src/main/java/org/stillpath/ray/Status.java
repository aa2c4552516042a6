package org.stillpath.ray;

/** How a ray ended. */
public enum Status {
    /** Where it was asked to end. */
    ARRIVED("arrived"),
    /** At a surface, outside its aperture. */
    CLIPPED("clipped"),
    /** It never met the next surface. */
    MISSED("missed"),
    /** At the edge of a medium's valid region, or where its index is undefined. */
    OUTSIDE("outside"),
    /** On the ground. */
    GROUNDED("grounded"),
    /** At a refracting surface, beyond the critical angle. */
    TOTALLY_REFLECTED("totally-reflected"),
    /** It came to the length limit and had not ended. */
    LOST("lost");

    private final String word;

    Status(String word) {
        this.word = word;
    }

    /** The word for it in job files and results. */
    public String word() {
        return word;
    }
}
