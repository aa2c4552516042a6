package org.stillpath.task;

import java.util.List;

/**
 * Named numbers as horizontal bars from zero, as data: the contributions to an uncertainty, the residuals of a fit.
 *
 * @param name name of the figure and stem of its files
 * @param question what it answers, in a few words
 * @param answer the answer as a sentence
 * @param across the horizontal axis
 * @param bars from above
 * @param limit values beyond plus or minus this deviate; 0 where nothing does
 */
public record BarFigure(
        String name, String question, String answer, ChartFigure.Axis across, List<Bar> bars, double limit)
        implements Figure {
    public BarFigure {
        bars = List.copyOf(bars);
    }

    /**
     * One bar.
     *
     * @param label what it is
     * @param value in SI of the axis, finite
     * @param said the value for people, written at its end
     */
    public record Bar(String label, double value, String said) {}
}
