package org.stillpath.medium;

import java.util.Optional;
import org.stillpath.formula.Chart;
import org.stillpath.formula.Coordinate;
import org.stillpath.formula.Order;
import org.stillpath.formula.PerThread;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Frame;
import org.stillpath.geometry.Vector;

/** A chart of the job's coordinates, in the coordinates of a frame. */
final class FramedChart implements GroundChart {
    private final Chart chart;
    private final Frame frame;
    private final PerThread<Scratch> scratch = PerThread.of(Scratch::new);

    private FramedChart(Chart chart, Frame frame) {
        this.chart = chart;
        this.frame = frame;
    }

    /** {@code chart} itself where the frame is the job's. */
    static Chart of(Chart chart, Frame frame) {
        return frame.equals(Frame.JOB) ? chart : new FramedChart(chart, frame);
    }

    @Override
    public void sample(Coordinate coordinate, double[] x, double[] y, double[] z, int count, Order order, Samples out) {
        Scratch s = scratch.get().with(count);
        Vector o = frame.origin();
        Vector a = frame.ex();
        Vector b = frame.ey();
        Vector c = frame.ez();
        for (int i = 0; i < count; i++) {
            s.x[i] = o.x() + x[i] * a.x() + y[i] * b.x() + z[i] * c.x();
            s.y[i] = o.y() + x[i] * a.y() + y[i] * b.y() + z[i] * c.y();
            s.z[i] = o.z() + x[i] * a.z() + y[i] * b.z() + z[i] * c.z();
        }
        chart.sample(coordinate, s.x, s.y, s.z, count, order, out);
        if (order == Order.VALUE || frame.isShiftOnly()) {
            return;
        }
        for (int i = 0; i < count; i++) {
            double gx = out.gx[i];
            double gy = out.gy[i];
            double gz = out.gz[i];
            out.gx[i] = gx * a.x() + gy * a.y() + gz * a.z();
            out.gy[i] = gx * b.x() + gy * b.y() + gz * b.z();
            out.gz[i] = gx * c.x() + gy * c.y() + gz * c.z();
            if (order == Order.HESSIAN) {
                double xx = out.hxx[i];
                double xy = out.hxy[i];
                double xz = out.hxz[i];
                double yy = out.hyy[i];
                double yz = out.hyz[i];
                double zz = out.hzz[i];
                out.hxx[i] = form(xx, xy, xz, yy, yz, zz, a, a);
                out.hxy[i] = form(xx, xy, xz, yy, yz, zz, a, b);
                out.hxz[i] = form(xx, xy, xz, yy, yz, zz, a, c);
                out.hyy[i] = form(xx, xy, xz, yy, yz, zz, b, b);
                out.hyz[i] = form(xx, xy, xz, yy, yz, zz, b, c);
                out.hzz[i] = form(xx, xy, xz, yy, yz, zz, c, c);
            }
        }
    }

    private static double form(double xx, double xy, double xz, double yy, double yz, double zz, Vector u, Vector v) {
        return u.x() * (xx * v.x() + xy * v.y() + xz * v.z())
                + u.y() * (xy * v.x() + yy * v.y() + yz * v.z())
                + u.z() * (xz * v.x() + yz * v.y() + zz * v.z());
    }

    @Override
    public Optional<Seam> groundSeam() {
        return chart instanceof GroundChart g && g.groundSeam().isPresent()
                ? Optional.of(new Seam(
                        new ChartLevel(Coordinate.DISTANCE, this),
                        g.groundSeam().get().knots()))
                : Optional.empty();
    }

    @Override
    public Chart piece(int cell) {
        return chart instanceof GroundChart g ? new FramedChart(g.piece(cell), frame) : this;
    }

    @Override
    public boolean equals(Object o) {
        return o instanceof FramedChart f && f.chart.equals(chart) && f.frame.equals(frame);
    }

    @Override
    public int hashCode() {
        return 31 * chart.hashCode() + frame.hashCode();
    }
}
