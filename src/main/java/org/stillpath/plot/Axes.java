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
        return areClear(
                scale.ticks().stream().map(Scale.Tick::text).toList(),
                scale.ticks().stream().mapToDouble(t -> t.at() * points).toArray());
    }

    /** Whether words that stand centred at places along an axis, ascending, are clear of each other. */
    static boolean areClear(List<String> words, double[] places) {
        for (int i = 1; i < places.length; i++) {
            double half = (Canvas.width(words.get(i)) + Canvas.width(words.get(i - 1))) / 2;
            if (places[i] - places[i - 1] < half + 8) {
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
