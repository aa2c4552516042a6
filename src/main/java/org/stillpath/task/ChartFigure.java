package org.stillpath.task;

import java.util.Arrays;
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
     * @param x in SI of the horizontal axis; of {@link Style#STEPS} one more than {@code y}
     * @param y in SI of the vertical axis; ignored for {@link Style#MARKS}
     */
    public record Series(Style style, String label, double[] x, double[] y) {
        public Series {
            x = x.clone();
            y = y.clone();
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

        @Override
        public boolean equals(Object o) {
            return o instanceof Series s
                    && style == s.style
                    && label.equals(s.label)
                    && Arrays.equals(x, s.x)
                    && Arrays.equals(y, s.y);
        }

        @Override
        public int hashCode() {
            return Arrays.hashCode(x) * 31 + Arrays.hashCode(y);
        }
    }
}
