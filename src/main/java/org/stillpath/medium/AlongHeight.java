package org.stillpath.medium;

import java.util.List;
import org.stillpath.formula.Chart;
import org.stillpath.formula.Coordinate;
import org.stillpath.formula.Order;
import org.stillpath.formula.PerThread;
import org.stillpath.formula.Samples;

/**
 * A quantity that depends on the height alone. It is worked out in a column over a flat earth, as a function of one
 * variable, and carried over by the chain rule with the chart's own derivatives: the chart is asked once a point, however
 * many quantities the column is made of.
 */
final class AlongHeight implements ScalarField {
    /** The same quantity on the chart: for seams, limits and words. */
    private final ScalarField whole;
    /** The quantity on {@link Chart#FLAT}. */
    private final ScalarField column;

    private final Chart chart;
    private final PerThread<Scratch> scratch;

    private AlongHeight(ScalarField whole, ScalarField column, Chart chart, PerThread<Scratch> scratch) {
        this.whole = whole;
        this.column = column;
        this.chart = chart;
        this.scratch = scratch;
    }

    /** The quantity, which must be {@linkplain ScalarField#ofHeightAlone of height alone}, on a chart. */
    static ScalarField of(ScalarField quantity, Chart chart) {
        if (!quantity.ofHeightAlone()) {
            throw new IllegalArgumentException("quantity must depend on the height alone: " + quantity);
        }
        ScalarField column = quantity.on(Chart.FLAT);
        return chart == Chart.FLAT
                ? column
                : new AlongHeight(quantity.on(chart), column, chart, PerThread.of(Scratch::new));
    }

    @Override
    public void sample(double[] x, double[] y, double[] z, int count, double wavelength, Order order, Samples out) {
        Scratch s = scratch.get().with(count);
        Samples u = s.samples;
        chart.sample(Coordinate.HEIGHT, x, y, z, count, order, u);
        // s.x and s.y stay 0: the column stands on the origin
        column.sample(s.x, s.y, u.value, count, wavelength, order, out);
        if (order != Order.VALUE) {
            for (int i = 0; i < count; i++) {
                chain(out.gz[i], order == Order.HESSIAN ? out.hzz[i] : 0, u, order, out, i);
            }
        }
    }

    /**
     * Fills gradient and Hessian of f(u(x, y, z)) at sample {@code i}.
     *
     * @param f1 f'(u)
     * @param f2 f''(u)
     * @param u the coordinate's samples
     */
    static void chain(double f1, double f2, Samples u, Order order, Samples out, int i) {
        double ux = u.gx[i];
        double uy = u.gy[i];
        double uz = u.gz[i];
        out.gx[i] = f1 * ux;
        out.gy[i] = f1 * uy;
        out.gz[i] = f1 * uz;
        if (order == Order.HESSIAN) {
            out.hxx[i] = f1 * u.hxx[i] + f2 * ux * ux;
            out.hxy[i] = f1 * u.hxy[i] + f2 * ux * uy;
            out.hxz[i] = f1 * u.hxz[i] + f2 * ux * uz;
            out.hyy[i] = f1 * u.hyy[i] + f2 * uy * uy;
            out.hyz[i] = f1 * u.hyz[i] + f2 * uy * uz;
            out.hzz[i] = f1 * u.hzz[i] + f2 * uz * uz;
        }
    }

    @Override
    public ScalarField on(Chart other) {
        return of(whole, other);
    }

    @Override
    public boolean ofHeightAlone() {
        return true;
    }

    @Override
    public boolean isConstant() {
        return column.isConstant();
    }

    @Override
    public List<Level> limits() {
        return whole.limits();
    }

    @Override
    public List<Seam> seams(double wavelength) {
        return whole.seams(wavelength);
    }

    @Override
    public ScalarField piece(int[] cells) {
        return new AlongHeight(whole, column.piece(cells), chart, scratch);
    }

    @Override
    public String explain(double x, double y, double z, double wavelength) {
        double h = new ChartLevel(Coordinate.HEIGHT, chart).value(x, y, z, new double[3]);
        return column.explain(0, 0, h, wavelength);
    }

    @Override
    public List<String> warnings() {
        return whole.warnings();
    }
}
