package org.stillpath.task;

import java.util.Arrays;

/**
 * Path differences over a round pupil, as data: a map with a scale in lengths and in waves, whose colours part at zero.
 *
 * @param name name of the figure and stem of its files
 * @param question what it answers, in a few words
 * @param answer the answer as a sentence
 * @param across what is to the right: {@code x in the pupil}; {@code up} likewise upward
 * @param radius of the pupil, metres
 * @param wavelength of the scale in waves, vacuum, metres
 * @param side number of columns and of rows of the square about the pupil
 * @param values metres, at the crossings of a square lattice from edge to edge, by rows from below; NaN where no light
 *     comes through, and anything outside the pupil
 */
public record WavefrontFigure(
        String name,
        String question,
        String answer,
        String across,
        String up,
        double radius,
        double wavelength,
        int side,
        double[] values)
        implements Figure {
    public WavefrontFigure {
        if (side < 2 || values.length != side * side) {
            throw new IllegalArgumentException(
                    "values must be as many as side times side, 2 or more: " + values.length + ", " + side);
        }
        if (!(radius > 0 && wavelength > 0)) {
            throw new IllegalArgumentException("radius and wavelength must be positive: " + radius + ", " + wavelength);
        }
        values = values.clone();
    }

    /** The values by rows from below (a copy). */
    @Override
    public double[] values() {
        return values.clone();
    }

    /** Place of a column or row of the lattice over the pupil's radius, from −1 to 1. */
    public double place(int index) {
        return 2.0 * index / (side - 1) - 1;
    }

    @Override
    public boolean equals(Object o) {
        return o instanceof WavefrontFigure f && name.equals(f.name) && Arrays.equals(values, f.values);
    }

    @Override
    public int hashCode() {
        return name.hashCode() * 31 + Arrays.hashCode(values);
    }
}
