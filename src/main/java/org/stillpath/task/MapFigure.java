package org.stillpath.task;

import java.util.Arrays;

/**
 * A number over two others, as data: a map.
 *
 * @param name name of the figure and stem of its files
 * @param question what it answers, in a few words
 * @param answer the answer as a sentence
 * @param across the horizontal axis
 * @param up the vertical axis
 * @param value what is mapped
 * @param x places of the columns, ascending or descending, SI
 * @param y places of the rows, likewise
 * @param values by rows, SI; NaN where there is none
 */
public record MapFigure(
        String name,
        String question,
        String answer,
        ChartFigure.Axis across,
        ChartFigure.Axis up,
        ChartFigure.Axis value,
        double[] x,
        double[] y,
        double[] values)
        implements Figure {
    public MapFigure {
        x = x.clone();
        y = y.clone();
        values = values.clone();
        if (values.length != x.length * y.length) {
            throw new IllegalArgumentException("values must be as many as columns times rows: " + values.length + ", "
                    + x.length + ", " + y.length);
        }
    }

    /** A copy. */
    @Override
    public double[] x() {
        return x.clone();
    }

    /** A copy. */
    @Override
    public double[] y() {
        return y.clone();
    }

    /** A copy. */
    @Override
    public double[] values() {
        return values.clone();
    }

    @Override
    public boolean equals(Object o) {
        return o instanceof MapFigure m && name.equals(m.name) && Arrays.equals(values, m.values);
    }

    @Override
    public int hashCode() {
        return name.hashCode() * 31 + Arrays.hashCode(values);
    }
}
