package org.stillpath.plot;

import org.stillpath.task.BarFigure;
import org.stillpath.task.ChartFigure;
import org.stillpath.task.CurveFigure;
import org.stillpath.task.Figure;
import org.stillpath.task.MapFigure;
import org.stillpath.task.PanelFigure;
import org.stillpath.task.SectionFigure;
import org.stillpath.task.SpotFigure;
import org.stillpath.task.WavefrontFigure;

/** Draws figures: the one place that knows which class draws which kind of {@link Figure}. */
public final class Pictures {
    private Pictures() {}

    /**
     * Lays a figure out at one of the two widths.
     *
     * @param figure what to show
     * @param width how wide; the height follows from what is shown
     * @return the laid-out picture; the same bytes for the same data, on every machine
     */
    public static Picture of(Figure figure, Width width) {
        if (figure instanceof SectionFigure section) {
            return new SectionDrawing(section, width).picture();
        }
        if (figure instanceof CurveFigure curves) {
            return new CurveDrawing(curves, width).picture();
        }
        if (figure instanceof ChartFigure chart) {
            return new ChartDrawing(chart, width).picture();
        }
        if (figure instanceof MapFigure map) {
            return new MapDrawing(map, width).picture();
        }
        if (figure instanceof BarFigure bars) {
            return new BarDrawing(bars, width).picture();
        }
        if (figure instanceof PanelFigure panels) {
            return new PanelDrawing(panels, width).picture();
        }
        if (figure instanceof WavefrontFigure wave) {
            return new WavefrontDrawing(wave, width).picture();
        }
        if (figure instanceof SpotFigure spot) {
            return new SpotDrawing(spot, width).picture();
        }
        throw new IllegalArgumentException("figure " + figure.name() + " is of a kind that nothing draws: "
                + figure.getClass().getSimpleName());
    }
}
