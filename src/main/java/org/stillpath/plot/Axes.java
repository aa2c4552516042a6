package org.stillpath.plot;

import java.util.List;

/** Axes of a plot: thin lines on two sides, ticks outward, the quantity with its unit at the end of each. */
record Axes(Scale across, Scale up) {
    /** Length of a tick, points. */
    private static final double TICK = 3.5;

    private static final double TICK_GAP = 2;
    private static final Pen LINE = Pen.firm(Ink.INK, 0.6);

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

    /** Draws both axes around the plot. */
    void draw(Canvas canvas, Box plot, View view, String acrossName, String upName) {
        canvas.segment(plot.left(), plot.bottom(), plot.right(), plot.bottom(), LINE);
        canvas.segment(plot.left(), plot.bottom(), plot.left(), plot.top(), LINE);
        double baseline = plot.bottom() + TICK + TICK_GAP + Typeface.ASCENDER * Canvas.SIZE;
        for (Scale.Tick tick : across.ticks()) {
            double x = view.x(tick.at());
            canvas.segment(x, plot.bottom(), x, plot.bottom() + TICK, LINE);
            double half = Canvas.width(tick.text()) / 2;
            if (x + half <= plot.right() + 11) {
                canvas.words(tick.text(), x - half, baseline, Ink.INK);
            }
        }
        for (Scale.Tick tick : up.ticks()) {
            double y = view.y(tick.at());
            canvas.segment(plot.left() - TICK, y, plot.left(), y, LINE);
            double x = plot.left() - TICK - TICK_GAP - Canvas.width(tick.text());
            canvas.words(tick.text(), x, y + Typeface.CAPITAL / 2 * Canvas.SIZE, Ink.INK);
        }
        String below = acrossName + " / " + across.unit();
        canvas.words(below, plot.right() - Canvas.width(below), baseline + Canvas.SIZE * 1.25, Ink.INK);
        canvas.words(
                upName + " / " + up.unit(), Canvas.EDGE, plot.top() - Typeface.DESCENDER * Canvas.SIZE - 5, Ink.INK);
    }
}
