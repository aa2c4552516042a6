package org.stillpath.path;

/** Whether, and after which optical length, light first arrives at a target. */
public sealed interface Arrival {
    /**
     * Light arrives.
     *
     * @param opticalLength least optical length in metres; extrapolated where the second order is seen, so it differs from
     *     what {@code fronts} hold by the error of that grid
     * @param error its estimated numerical error in metres, from grids with once, twice and four times the spacing;
     *     infinite where a coarser grid finds no way
     * @param excess optical length less the straight geometric length, metres, with the digits that the difference loses
     * @param order observed order of convergence, from the three grids; NaN where they do not converge, or agree to rounding
     * @param course what the least path passes
     * @param fronts the optical lengths on the finest grid
     */
    record Reached(double opticalLength, double error, double excess, double order, Course course, Fronts fronts)
            implements Arrival {}

    /** What the least path passes on its way. */
    enum Course {
        /** Nothing but the medium. */
        FREE,
        /** A wall, within two cells: the value is good to the first order only. */
        WALL,
        /** The edge of the grid: a wider grid may give less. */
        EDGE
    }

    /**
     * No light arrives within the grid.
     *
     * @param reason in words
     */
    record Unreached(String reason) implements Arrival {}
}
