package org.stillpath.plot;

import java.awt.BasicStroke;
import java.awt.Color;
import java.awt.Graphics2D;
import java.awt.Stroke;
import java.awt.geom.Rectangle2D;
import java.util.ArrayList;
import java.util.List;
import org.jfree.chart.JFreeChart;
import org.jfree.chart.axis.AxisSpace;
import org.jfree.chart.axis.AxisState;
import org.jfree.chart.axis.NumberAxis;
import org.jfree.chart.axis.NumberTick;
import org.jfree.chart.plot.SeriesRenderingOrder;
import org.jfree.chart.plot.XYPlot;
import org.jfree.chart.renderer.xy.XYLineAndShapeRenderer;
import org.jfree.chart.ui.RectangleEdge;
import org.jfree.chart.ui.RectangleInsets;
import org.jfree.chart.ui.TextAnchor;
import org.jfree.data.xy.XYSeries;
import org.jfree.data.xy.XYSeriesCollection;

/**
 * A chart in the house theme: a JFreeChart of lines over two axes in readable units, thin lines on two sides, ticks outward,
 * no box, no grid. Its plot lies on whole points, since JFreeChart rounds it to them.
 *
 * <p>JFreeChart draws on a {@link Sheet}; JFreeSVG is not used, for its licence is the GPL and it asks Java's font system.
 */
final class Chart {
    private static final float LINE = 0.6f;
    /** Room beside the plot for tick labels, points; more than any needs. */
    private static final double ROOM = 80;

    private final Box plot;
    private final View view;
    private final Axes axes;
    private final XYSeriesCollection lines = new XYSeriesCollection();
    private final XYLineAndShapeRenderer renderer = new XYLineAndShapeRenderer(true, false);

    Chart(Box plot, View view, Axes axes) {
        this.plot = plot;
        this.view = view;
        this.axes = axes;
        renderer.setDrawSeriesLineAsPath(true);
    }

    /** Adds a line in points, drawn above those before it. */
    void line(Polyline line, Pen pen) {
        int series = lines.getSeriesCount();
        XYSeries points = new XYSeries(series, false, true);
        for (int i = 0; i < line.x().length; i++) {
            points.add(
                    view.u(line.x()[i]) / axes.across().unitSize(),
                    view.v(line.y()[i]) / axes.up().unitSize(),
                    false);
        }
        lines.addSeries(points);
        renderer.setSeriesPaint(series, new Color(pen.ink().rgb()), false);
        renderer.setSeriesStroke(series, stroke(pen), false);
    }

    /** Draws axes and lines; the lines are returned for their place among the other items, words are written at once. */
    List<Item> draw(Canvas canvas) {
        NumberAxis across = axis(axes.across(), view.u(plot.left()), view.u(plot.right()));
        NumberAxis up = axis(axes.up(), view.v(plot.bottom()), view.v(plot.top()));
        XYPlot xy = new XYPlot(lines, across, up, renderer);
        xy.setInsets(RectangleInsets.ZERO_INSETS);
        xy.setAxisOffset(RectangleInsets.ZERO_INSETS);
        xy.setOutlineVisible(false);
        xy.setBackgroundPaint(null);
        xy.setDomainGridlinesVisible(false);
        xy.setRangeGridlinesVisible(false);
        xy.setSeriesRenderingOrder(SeriesRenderingOrder.FORWARD);
        AxisSpace space = new AxisSpace();
        space.setLeft(ROOM);
        space.setBottom(ROOM);
        xy.setFixedDomainAxisSpace(space);
        xy.setFixedRangeAxisSpace(space);
        JFreeChart chart = new JFreeChart(null, Sheet.face(), xy, false);
        chart.setBackgroundPaint(null);
        chart.setPadding(RectangleInsets.ZERO_INSETS);
        Sheet sheet = new Sheet(canvas);
        chart.draw(
                sheet,
                new Rectangle2D.Double(plot.left() - ROOM, plot.top(), plot.width() + ROOM, plot.height() + ROOM));
        return sheet.strokes();
    }

    private static NumberAxis axis(Scale scale, double low, double high) {
        NumberAxis axis = new Ruled(scale);
        axis.setAutoRangeIncludesZero(false);
        axis.setRange(low / scale.unitSize(), high / scale.unitSize());
        axis.setTickLabelFont(Sheet.face());
        axis.setLabelFont(Sheet.face());
        Color ink = new Color(Ink.INK.rgb());
        axis.setTickLabelPaint(ink);
        axis.setAxisLinePaint(ink);
        axis.setTickMarkPaint(ink);
        axis.setAxisLineStroke(new BasicStroke(LINE));
        axis.setTickMarkStroke(new BasicStroke(LINE));
        axis.setTickMarkOutsideLength((float) Axes.TICK);
        axis.setTickMarkInsideLength(0);
        axis.setMinorTickMarksVisible(false);
        axis.setTickLabelInsets(new RectangleInsets(Axes.TICK, Axes.TICK, 0, 0));
        return axis;
    }

    private static Stroke stroke(Pen pen) {
        float[] dashes = new float[pen.dashes().size()];
        for (int i = 0; i < dashes.length; i++) {
            dashes[i] = pen.dashes().get(i).floatValue();
        }
        return dashes.length == 0
                ? new BasicStroke((float) pen.width(), BasicStroke.CAP_BUTT, BasicStroke.JOIN_ROUND)
                : new BasicStroke((float) pen.width(), BasicStroke.CAP_BUTT, BasicStroke.JOIN_ROUND, 10, dashes, 0);
    }

    /** An axis with the ticks of a scale, wherever they stand, and their words. */
    private static final class Ruled extends NumberAxis {
        private static final long serialVersionUID = 1L;
        private final transient Scale scale;

        Ruled(Scale scale) {
            this.scale = scale;
        }

        @Override
        @SuppressWarnings("rawtypes")
        public List refreshTicks(Graphics2D g2, AxisState state, Rectangle2D area, RectangleEdge edge) {
            TextAnchor anchor = RectangleEdge.isTopOrBottom(edge) ? TextAnchor.TOP_CENTER : TextAnchor.CENTER_RIGHT;
            List<NumberTick> ticks = new ArrayList<>();
            for (Scale.Tick t : scale.ticks()) {
                double at = t.at() / scale.unitSize();
                if (getRange().contains(at)) {
                    ticks.add(new NumberTick(at, t.text(), anchor, anchor, 0));
                }
            }
            return ticks;
        }
    }
}
