package org.stillpath.medium;

import java.util.Optional;
import org.stillpath.formula.Chart;

/** A chart whose ground may be a table: what depends on the clearance over it then has seams above its knots. */
interface GroundChart extends Chart {
    /** The places above the knots of the ground; empty where the ground is smooth. */
    Optional<Seam> groundSeam();

    /**
     * The chart over the smooth piece of the ground that holds in a cell of {@link #groundSeam}, continued beyond it.
     *
     * @param cell as {@link Seam#cell} counts it
     */
    Chart piece(int cell);
}
