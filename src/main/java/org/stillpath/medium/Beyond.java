package org.stillpath.medium;

/** What a table does outside its own range. */
public enum Beyond {
    /** Nothing is known there: a ray that leaves the range ends as {@code outside}. */
    FAULT,
    /** The value at the edge goes on; the slope jumps to 0. */
    HOLD,
    /** A straight line with the slope at the edge. */
    LINEAR,
    /**
     * An exponential with the value and the slope at the edge. For an index it acts on n − 1, so that a table of thin
     * air falls off to vacuum.
     */
    EXPONENTIAL;

    /** The word in a job file. */
    public String word() {
        return name().toLowerCase(java.util.Locale.ROOT);
    }
}
