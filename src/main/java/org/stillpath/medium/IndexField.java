package org.stillpath.medium;

import java.util.List;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;

/**
 * The refractive index as a function of place, at one wavelength, in the job's coordinates (metres). Open for users'
 * own fields. Implementations are immutable and may be called from several threads at once.
 *
 * <p>A field gives what the ray equation in the parameter dτ = ds/n uses: n² − 1, the force ½∇(n²) = n∇n, and its Jacobian
 * ½∇∇(n²), exactly and without finite differences (Luneburg, <i>Mathematical Theory of Optics</i>; Sharma, Kumar and
 * Ghatak, Appl. Opt. 21 (1982) 984). n² − 1 stands in place of n² so that air keeps its digits: with the refractivity N =
 * n − 1 it is N(2 + N), and nothing is lost to cancellation.
 */
public interface IndexField {
    /**
     * Samples the field at the first {@code count} points of the arrays.
     *
     * @param x coordinates in metres, at least {@code count} of them; likewise {@code y} and {@code z}
     * @param order what is wanted; arrays of {@code out} beyond it are left as they are
     * @param out receives n² − 1 in {@code value}, ½∂n²/∂x.. in {@code gx, gy, gz} (1/m) and ½∂²n²/∂x².. in {@code hxx ..
     *     hzz} (1/m²); {@code value} is NaN where the field is undefined, and {@link #explain} says why. Values outside
     *     the {@link #limits} are still computed where the field can be continued, so that an integrator may overstep.
     */
    void sample(double[] x, double[] y, double[] z, int count, Order order, Samples out);

    /** Whether the index is the same everywhere, so that rays are straight. */
    default boolean uniform() {
        return false;
    }

    /** Whether the index depends on the height above the earth alone, as the chart of a sight gives it, or on nothing. */
    default boolean ofHeightAlone() {
        return uniform();
    }

    /** Margins of the region where the field is valid: each is positive inside. Empty: valid everywhere. */
    default List<Level> limits() {
        return List.of();
    }

    /** Where the field or a derivative of it jumps; integration lands on these. Empty for a smooth field. */
    default List<Seam> seams() {
        return List.of();
    }

    /**
     * The smooth piece of the field that holds in the given cells, continued beyond them, so that an integrator may take
     * its stages past a seam before it lands there. A field whose value and first two derivatives run through its seams
     * may return itself.
     *
     * @param cells for each of {@link #seams()}, in their order, the cell as {@link Seam#cell} counts it
     */
    default IndexField piece(int[] cells) {
        return this;
    }

    /**
     * Whether value and first two derivatives run through all seams, so that a step that ends on a seam may sample this field
     * itself in place of its {@link #piece}: rays in different cells can then share a bundle.
     */
    default boolean runsThroughSeams() {
        return seams().isEmpty();
    }

    /**
     * The same field made ready for bundles of rays, which sample many points at once: it may be quicker for those, dear to make,
     * and differ in the last digit. This field itself where nothing is gained. What a point gives never depends on the points
     * beside it.
     */
    default IndexField forBundles() {
        return this;
    }

    /** Says in words why the field is undefined at a point (metres), with the place; empty text where it is defined. */
    default String explain(double x, double y, double z) {
        return "";
    }
}
