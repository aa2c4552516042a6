package org.stillpath.medium;

import org.stillpath.formula.Chart;

/** A scalar function of place whose sign matters: the margin of a region, or the coordinate across a seam. */
public interface Level {
    /**
     * The value at a point of the job's coordinates (metres), in any unit that varies smoothly across zero.
     *
     * @param gradient receives the gradient (three values)
     */
    double value(double x, double y, double z, double[] gradient);

    /**
     * The same level where {@code chart} gives height, clearance and distance; this level itself where none of them
     * matters.
     */
    default Level on(Chart chart) {
        return this;
    }

    /** What the level is, for messages: {@code r < 1 mm}. */
    String describe();
}
