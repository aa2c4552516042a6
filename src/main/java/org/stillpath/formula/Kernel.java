package org.stillpath.formula;

/**
 * A {@link Program} as one piece of machine-near code: what {@link Compiler} makes. Gives what the {@link Evaluator}
 * gives, to the last bit. Without state, so that any number of threads may share one.
 */
interface Kernel {
    /**
     * Computes the outputs at the first {@code count} points; allocates nothing.
     *
     * @param arguments values of the formula's names, in SI
     * @param wavelength vacuum wavelength in metres
     * @param charts samples of the charted coordinates by {@link Coordinate#slot()}; empty if none is used
     * @param out receives as many arrays as the program has outputs
     * @param scratch the caller's own, as long as the compiler says
     */
    void run(
            double[] x,
            double[] y,
            double[] z,
            int count,
            double[] arguments,
            double wavelength,
            Samples[] charts,
            Samples out,
            double[] scratch);

    /** The same at the first point alone, without the preparations of a loop, which cost as much as a short formula. */
    void one(
            double[] x,
            double[] y,
            double[] z,
            int zero,
            double[] arguments,
            double wavelength,
            Samples[] charts,
            Samples out,
            double[] scratch);
}
