package org.stillpath.medium;

import java.util.List;
import java.util.Optional;
import org.stillpath.formula.Chart;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;

/**
 * A quantity as a function of place in a medium's own frame (metres): a formula, a profile, a grid. What the quantity is
 * (an index less one, a temperature) is known to the medium that holds it. Implementations are immutable and may be
 * called from several threads at once.
 */
public interface ScalarField {
    /**
     * Samples the quantity at the first {@code count} points.
     *
     * @param x coordinates in metres of the medium's frame; likewise {@code y} and {@code z}
     * @param wavelength vacuum wavelength in metres; NaN where none is needed
     * @param order what is wanted; arrays of {@code out} beyond it are left as they are
     * @param out receives values, gradients and Hessians in SI; {@code value} is NaN where the quantity is undefined
     */
    void sample(double[] x, double[] y, double[] z, int count, double wavelength, Order order, Samples out);

    /**
     * The same quantity where {@code chart} gives height, clearance and distance in the medium's frame; this one itself
     * where none of them matters. Until told otherwise a quantity stands on {@link Chart#FLAT}.
     */
    default ScalarField on(Chart chart) {
        return this;
    }

    /**
     * The same quantity, taken as an index n or as n − 1, made ready for many points at once; none where that gains nothing.
     *
     * @param fromOne whether the quantity is n − 1
     */
    default Optional<ManyPoints> manyPoints(boolean fromOne) {
        return Optional.empty();
    }

    /** Samples n² − 1 and half the derivatives of n² at many points. Immutable, for any number of threads. */
    @FunctionalInterface
    interface ManyPoints {
        /** As {@link ScalarField#sample}, {@code order} being gradient or Hessian. */
        void sample(double[] x, double[] y, double[] z, int count, double wavelength, Order order, Samples out);
    }

    /**
     * The same quantity with its table joined by another interpolant: what the table leaves open between its rows. Empty where
     * there is no table, or its nodes leave no choice.
     */
    default Optional<ScalarField> joinedOtherwise() {
        return Optional.empty();
    }

    /** Whether the quantity depends on the height alone, or on nothing. */
    default boolean ofHeightAlone() {
        return isConstant();
    }

    /** Whether the quantity is the same everywhere. */
    default boolean isConstant() {
        return false;
    }

    /** Whether the wavelength matters. */
    default boolean needsWavelength() {
        return false;
    }

    /** Margins of the region where the quantity is known, in the medium's frame; each is positive inside. */
    default List<Level> limits() {
        return List.of();
    }

    /** Where the quantity or a derivative of it jumps, in the medium's frame. */
    default List<Seam> seams(double wavelength) {
        return List.of();
    }

    /**
     * The smooth piece that holds in the given cells of {@link #seams}, continued beyond them; this field itself where it
     * is smooth, or cannot be taken apart.
     *
     * @param cells for each seam, in their order, the cell as {@link Seam#cell} counts it
     */
    default ScalarField piece(int[] cells) {
        return this;
    }

    /** Whether value and first two derivatives run through all {@link #seams}. */
    default boolean runsThroughSeams() {
        return false;
    }

    /** Says in words why the quantity is undefined at a point of the medium's frame; empty text where it is defined. */
    default String explain(double x, double y, double z, double wavelength) {
        return "";
    }

    /**
     * The mean along z between two heights as a quantity of x and y, exactly; empty where the field has no better way than
     * to be sampled.
     *
     * @param from lower height, metres of the medium's frame
     * @param to upper height
     */
    default Optional<ScalarField> meanAlongZ(double from, double to) {
        return isConstant() ? Optional.of(this) : Optional.empty();
    }

    /** What was assumed, or is doubtful, about the quantity, in words. */
    default List<String> warnings() {
        return List.of();
    }
}
