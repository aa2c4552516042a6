package org.stillpath.formula;

import java.util.List;
import java.util.Optional;
import org.stillpath.unit.Dimension;

/** What a formula may know of the place and the light without being given it by name. All are lengths. */
public enum Coordinate {
    /** First Cartesian coordinate of the formula's own frame. */
    X("x"),
    /** Second Cartesian coordinate of the formula's own frame. */
    Y("y"),
    /** Third Cartesian coordinate of the formula's own frame. */
    Z("z"),
    /** Distance from the frame's z axis. */
    R("r"),
    /** Distance from the frame's origin. */
    RHO("rho"),
    /** Vacuum wavelength. */
    WAVELENGTH("wavelength"),
    /** Height above the datum; only along a sight, from a {@link Chart}. */
    HEIGHT("height"),
    /** Height above the ground; only along a sight, from a {@link Chart}. */
    CLEARANCE("clearance"),
    /** Distance along the datum; only along a sight, from a {@link Chart}. */
    DISTANCE("distance");

    /** Those that a {@link Chart} gives. */
    static final List<Coordinate> CHARTED = List.of(HEIGHT, CLEARANCE, DISTANCE);

    private final String word;

    Coordinate(String word) {
        this.word = word;
    }

    /** The word that stands for it in a formula. */
    public String word() {
        return word;
    }

    /** Its dimension. */
    public Dimension dimension() {
        return Dimension.LENGTH;
    }

    /** Whether its values come from a {@link Chart} and not from x, y and z alone. */
    public boolean charted() {
        return slot() >= 0;
    }

    /** Place among {@link #CHARTED}; -1 for the others. */
    int slot() {
        return CHARTED.indexOf(this);
    }

    /** The coordinate of that word, if there is one. */
    public static Optional<Coordinate> of(String word) {
        for (Coordinate c : values()) {
            if (c.word.equals(word)) {
                return Optional.of(c);
            }
        }
        return Optional.empty();
    }
}
