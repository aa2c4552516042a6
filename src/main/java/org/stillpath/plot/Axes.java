package org.stillpath.plot;

import java.util.List;

/** Scales and names of the two axes of a {@link Chart}, and the room that they take. */
record Axes(Scale across, Scale up) {
    /** Length of a tick, points. */
    static final double TICK = 3.5;

    /** Room between a tick and its label, points. */
    static final double TICK_GAP = 2;

    /** Room below the plot, points. */
    static final double BELOW = TICK + TICK_GAP + 2 * Canvas.SIZE * 1.25 + Canvas.EDGE - 1;

    /** Room above the plot for the name of the upward axis, points. */
    static final double ABOVE = Canvas.SIZE * 1.25 + 4;

    /** Room that tick labels take at the left of the plot, points. */
    static double leftOf(Scale up) {
        return TICK
                + TICK_GAP
                + up.ticks().stream()
                        .mapToDouble(t -> Canvas.width(t.text()))
                        .max()
                        .orElse(0);
    }

    /** Whether the labels of ticks, {@code points} of paper for a metre, stand clear of each other. */
    static boolean isClear(Scale scale, double points) {
        List<Scale.Tick> ticks = scale.ticks();
        for (int i = 1; i < ticks.size(); i++) {
            double apart = (ticks.get(i).at() - ticks.get(i - 1).at()) * points;
            double half = (Canvas.width(ticks.get(i).text())
                            + Canvas.width(ticks.get(i - 1).text()))
                    / 2;
            if (apart < half + 8) {
                return false;
            }
        }
        return true;
    }

    /** Writes what the axes are, with their units: one at the right end below, one above the left edge. */
    void name(Canvas canvas, Box plot, String acrossName, String upName) {
        double baseline = plot.bottom() + TICK + TICK_GAP + (Typeface.ASCENDER + 1.25) * Canvas.SIZE;
        String below = acrossName + " / " + across.unit();
        canvas.words(below, plot.right() - Canvas.width(below), baseline, Ink.INK);
        canvas.words(
                upName + " / " + up.unit(), Canvas.EDGE, plot.top() - Typeface.DESCENDER * Canvas.SIZE - 5, Ink.INK);
    }
}
