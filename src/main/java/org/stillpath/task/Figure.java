package org.stillpath.task;

/**
 * A figure as data: what it shows, not how it is drawn. The floor {@code plot} turns it into a picture. A figure answers
 * one question; its title is the answer as a sentence.
 */
public sealed interface Figure
        permits SectionFigure,
                CurveFigure,
                PanelFigure,
                ChartFigure,
                MapFigure,
                BarFigure,
                WavefrontFigure,
                SpotFigure {
    /** Name of the figure in {@code figures:} and stem of its files, such as {@code rays}. */
    String name();

    /** The question that the figure answers, in a few words. */
    String question();

    /** The answer as a sentence with the number and its uncertainty. */
    String answer();
}
