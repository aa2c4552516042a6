package org.stillpath.formula;

/**
 * A formula ready to be evaluated at arrays of points. Immutable; may be called from several threads at once. There are
 * two forms with the same results: {@link Formula} itself walks its operations and is the reference, {@link
 * Formula#compiled()} runs bytecode made for it.
 */
public interface ScalarFunction {
    /**
     * Samples the function at the first {@code count} points. Allocates scratch space once a call and nothing a point.
     *
     * @param x points in the formula's own frame, in metres, at least {@code count} of them; likewise {@code y}, {@code z}
     * @param arguments values of {@link Formula#arguments()} in that order, in SI
     * @param wavelength vacuum wavelength in metres; any value if the formula does not use it
     * @param chart gives height, clearance and distance; {@link Chart#NONE} if the formula uses none of them
     * @param order what is wanted; arrays of {@code out} beyond it are left as they are
     * @param out receives the value in SI, its gradient and its Hessian with respect to x, y and z of the same frame. The
     *     value is NaN on a domain fault or an overflow; a derivative that does not exist is NaN or infinite in its own
     *     array; {@link Formula#explain} says why.
     */
    void sample(
            double[] x,
            double[] y,
            double[] z,
            int count,
            double[] arguments,
            double wavelength,
            Chart chart,
            Order order,
            Samples out);

    /** {@link #sample(double[], double[], double[], int, double[], double, Chart, Order, Samples)} without a chart. */
    default void sample(
            double[] x,
            double[] y,
            double[] z,
            int count,
            double[] arguments,
            double wavelength,
            Order order,
            Samples out) {
        sample(x, y, z, count, arguments, wavelength, Chart.NONE, order, out);
    }
}
