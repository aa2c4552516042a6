package org.stillpath.medium;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.stillpath.formula.Chart;
import org.stillpath.formula.Coordinate;
import org.stillpath.formula.Order;
import org.stillpath.formula.PerThread;
import org.stillpath.formula.Samples;

/**
 * A quantity tabulated along height, clearance or distance and joined by a spline; every knot is a seam, as in {@link
 * Profile}. Apart from that class because the coordinate comes from a chart, point by point with its own derivatives.
 */
final class ChartProfile implements ScalarField {
    /** No cell in particular. */
    private static final int WHOLE = -2;

    private final Coordinate along;
    private final Spline spline;
    private final Chart chart;
    private final List<String> warnings;
    /** The spline's cell that holds everywhere, or {@link #WHOLE}. */
    private final int cell;

    private final PerThread<Samples[]> scratch;

    private ChartProfile(
            Coordinate along,
            Spline spline,
            Chart chart,
            List<String> warnings,
            int cell,
            PerThread<Samples[]> scratch) {
        this.along = along;
        this.spline = spline;
        this.chart = chart;
        this.warnings = warnings;
        this.cell = cell;
        this.scratch = scratch;
    }

    /**
     * A profile along a coordinate of a sight.
     *
     * @param along one that a chart gives
     * @param spline the quantity in SI against the coordinate in metres
     * @param shown what has to be added to a value of the spline to show it in a message: 1 where it holds n − 1
     */
    static ChartProfile of(Coordinate along, Spline spline, double shown) {
        if (!along.charted()) {
            throw new IllegalArgumentException("along must be height, clearance or distance: " + along);
        }
        return new ChartProfile(
                along, spline, Chart.FLAT, Profile.told(along.word(), false, spline, shown), WHOLE, PerThread.of(() ->
                        new Samples[] {new Samples(1)}));
    }

    @Override
    public ScalarField on(Chart other) {
        return new ChartProfile(along, spline, other, warnings, cell, scratch);
    }

    @Override
    public Optional<ScalarField> joinedOtherwise() {
        return spline.joinedOtherwise().map(s -> new ChartProfile(along, s, chart, warnings, cell, scratch));
    }

    @Override
    public boolean ofHeightAlone() {
        return along == Coordinate.HEIGHT;
    }

    @Override
    public void sample(double[] x, double[] y, double[] z, int count, double wavelength, Order order, Samples out) {
        Samples[] held = scratch.get();
        if (held[0].capacity() < count) {
            held[0] = new Samples(count);
        }
        Samples u = held[0];
        chart.sample(along, x, y, z, count, order, u);
        for (int i = 0; i < count; i++) {
            double at = u.value[i];
            int c = cell == WHOLE ? spline.cell(at) : cell;
            out.value[i] = spline.value(c, at);
            if (order != Order.VALUE) {
                double bend = order == Order.HESSIAN ? spline.curvature(c, at) : 0;
                AlongHeight.chain(spline.slope(c, at), bend, u, order, out, i);
            }
        }
    }

    @Override
    public List<Level> limits() {
        if (spline.beyond() != Beyond.FAULT) {
            return List.of();
        }
        Level u = new ChartLevel(along, chart);
        return List.of(new EdgeLevel(u, spline.first(), false), new EdgeLevel(u, spline.last(), true));
    }

    @Override
    public List<Seam> seams(double wavelength) {
        List<Seam> list = new ArrayList<>();
        list.add(new Seam(new ChartLevel(along, chart), spline.knots()));
        groundSeam().ifPresent(list::add);
        return List.copyOf(list);
    }

    private Optional<Seam> groundSeam() {
        return along == Coordinate.CLEARANCE && chart instanceof GroundChart g ? g.groundSeam() : Optional.empty();
    }

    @Override
    public ScalarField piece(int[] cells) {
        Chart ground = groundSeam().isPresent() && chart instanceof GroundChart g ? g.piece(cells[1]) : chart;
        return new ChartProfile(along, spline, ground, warnings, cells[0] - 1, scratch);
    }

    @Override
    public String explain(double x, double y, double z, double wavelength) {
        double u = new ChartLevel(along, chart).value(x, y, z, new double[3]);
        return Profile.outside(along.word(), u, spline);
    }

    @Override
    public List<String> warnings() {
        return warnings;
    }

    /** Places of the table's knots, metres. */
    double[] knots() {
        return spline.knots();
    }
}
