package org.stillpath.formula;

/**
 * A {@link Program} as short loops over a block of points: what {@link BlockCompiler} makes. Without state, so that any
 * number of threads may share one.
 */
interface BlockKernel {
    /**
     * Computes the outputs at the first {@code count} points; allocates nothing.
     *
     * @param arguments values of the formula's names, in SI
     * @param wavelength vacuum wavelength in metres
     * @param charts samples of the charted coordinates by {@link Coordinate#slot()}; empty if none is used
     * @param out receives as many arrays as the program has outputs
     * @param rows the caller's own, as many as the compiler says, {@code count} long or longer
     * @param cells the caller's own, as many as the compiler says
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
            double[][] rows,
            double[] cells);
}
