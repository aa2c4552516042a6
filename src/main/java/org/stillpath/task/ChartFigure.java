package org.stillpath.task;

import java.util.List;

/**
 * Numbers against numbers: curves, points, bands and histograms over two axes, as data.
 *
 * @param name name of the figure and stem of its files
 * @param question what it answers, in a few words
 * @param answer the answer as a sentence
 * @param across the horizontal axis
 * @param up the vertical axis
 * @param series what is drawn, from the back to the front
 */
public record ChartFigure(String name, String question, String answer, Axis across, Axis up, List<Series> series)
        implements Figure {
    public ChartFigure {
        series = List.copyOf(series);
    }

    /**
     * An axis.
     *
     * @param label what it shows
     * @param unit SI unit symbol of the data
     * @param shown unit of the ticks; empty: one that suits the size
     */
    public record Axis(String label, String unit, String shown) {}

    /** How a series is drawn. */
    public enum Style {
        /** A line: the answer. */
        CURVE,
        /** A dashed line: what the answer is held against. */
        MODEL,
        /** Dots: data. */
        POINTS,
        /** Bars from zero, one between each two of x: a histogram. */
        STEPS,
        /** Vertical lines from below to above, at each x. */
        MARKS
    }

    /**
     * One series. Points that are not finite break a line.
     *
     * @param style how it is drawn
     * @param label what it is; empty for none
     * @param points in SI of both axes; of {@link Style#STEPS} one x more than y, of {@link Style#MARKS} the y are ignored
     */
    public record Series(Style style, String label, Points points) {
        public Series(Style style, String label, double[] x, double[] y) {
            this(style, label, new Points(x, y));
        }

        /** Values to the right (a copy). */
        public double[] x() {
            return points.x();
        }

        /** Values upward (a copy). */
        public double[] y() {
            return points.y();
        }
    }
}
