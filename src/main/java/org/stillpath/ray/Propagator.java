package org.stillpath.ray;

import org.stillpath.medium.IndexField;

/**
 * Solves the ray equation inside one smooth piece of one medium until the first of several targets is met. Holds scratch
 * space: one object a thread, never shared.
 */
public interface Propagator {
    /** {@link #advance} came upon a place where the field is undefined; the state is the last one before it. */
    int UNDEFINED = -1;

    /** {@link #advance} could not keep its tolerance: the step became too small. */
    int STUCK = -2;

    /**
     * Advances a state to the first zero of any target that accepts it. A target that is zero at the start counts only when
     * the ray comes back to it.
     *
     * @param y the state, see {@link State}; advanced in place, at the zero to round-off
     * @param field a smooth piece of a field
     * @param targets the targets; one of them is met for certain, a length at the latest
     * @param trail receives the places passed
     * @return the index of the target met, {@link #UNDEFINED} or {@link #STUCK}
     */
    int advance(double[] y, IndexField field, Target[] targets, Trail trail);

    /** Number of points at which fields were sampled so far. */
    long evaluations();

    /**
     * Sum of the local errors that the accepted steps so far were estimated to have, as a fraction of the scale (places) and
     * in radians (directions); 0 where the engine does not tell.
     */
    default double localErrors() {
        return 0;
    }

    /** Makes propagators of one kind. */
    @FunctionalInterface
    interface Maker {
        /**
         * A propagator.
         *
         * @param tolerance local error allowed a step, as a fraction of the scale
         * @param scale length of the scene, metres
         * @param stride what limits on steps other than the tolerance are multiplied with, from 0 to 1: a second run with a
         *     smaller stride takes other steps than the first even where the tolerance does not rule them
         */
        Propagator make(double tolerance, double scale, double stride);
    }
}
