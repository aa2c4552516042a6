package org.stillpath.medium;

import java.util.List;
import org.stillpath.formula.Chart;
import org.stillpath.formula.Order;
import org.stillpath.formula.PerThread;
import org.stillpath.formula.Samples;

/**
 * The refractivity of a solid whose temperature varies from place to place, at one wavelength: the temperature through
 * the law by the chain rule, to the Hessian, without differences.
 */
final class SolidField implements ScalarField {
    private final SolidLaw.Slope slope;
    private final ScalarField temperature;
    /** How far beyond its own limits the temperature may be continued, metres. */
    private final double slack;

    private final PerThread<double[]> jets;

    SolidField(SolidLaw.Slope slope, ScalarField temperature, double slack) {
        this(slope, temperature, slack, PerThread.of(() -> new double[3]));
    }

    private SolidField(SolidLaw.Slope slope, ScalarField temperature, double slack, PerThread<double[]> jets) {
        this.slope = slope;
        this.temperature = temperature;
        this.slack = slack;
        this.jets = jets;
    }

    @Override
    public void sample(double[] x, double[] y, double[] z, int count, double wavelength, Order order, Samples out) {
        temperature.sample(x, y, z, count, Double.NaN, order, out);
        double[] jet = jets.get();
        for (int i = 0; i < count; i++) {
            double kelvin = out.value[i];
            if (!(kelvin > 0)) {
                out.undefine(order, i);
                continue;
            }
            slope.jet(kelvin, jet);
            out.value[i] = jet[0];
            if (order == Order.VALUE) {
                continue;
            }
            double tx = out.gx[i];
            double ty = out.gy[i];
            double tz = out.gz[i];
            if (order == Order.HESSIAN) {
                out.hxx[i] = jet[1] * out.hxx[i] + jet[2] * tx * tx;
                out.hxy[i] = jet[1] * out.hxy[i] + jet[2] * tx * ty;
                out.hxz[i] = jet[1] * out.hxz[i] + jet[2] * tx * tz;
                out.hyy[i] = jet[1] * out.hyy[i] + jet[2] * ty * ty;
                out.hyz[i] = jet[1] * out.hyz[i] + jet[2] * ty * tz;
                out.hzz[i] = jet[1] * out.hzz[i] + jet[2] * tz * tz;
            }
            out.gx[i] = jet[1] * tx;
            out.gy[i] = jet[1] * ty;
            out.gz[i] = jet[1] * tz;
        }
    }

    @Override
    public ScalarField on(Chart chart) {
        ScalarField placed = temperature.on(chart);
        return placed == temperature ? this : new SolidField(slope, placed, slack, jets);
    }

    @Override
    public boolean ofHeightAlone() {
        return temperature.ofHeightAlone();
    }

    @Override
    public boolean isConstant() {
        return temperature.isConstant();
    }

    @Override
    public List<Level> limits() {
        return slack == 0
                ? temperature.limits()
                : temperature.limits().stream()
                        .map(l -> (Level) new SlackLevel(l, slack))
                        .toList();
    }

    @Override
    public List<Seam> seams(double wavelength) {
        return temperature.seams(Double.NaN);
    }

    @Override
    public boolean runsThroughSeams() {
        return temperature.runsThroughSeams();
    }

    @Override
    public ScalarField piece(int[] cells) {
        ScalarField piece = temperature.piece(cells);
        return piece == temperature ? this : new SolidField(slope, piece, slack, jets);
    }

    @Override
    public String explain(double x, double y, double z, double wavelength) {
        String why = temperature.explain(x, y, z, Double.NaN);
        if (!why.isEmpty()) {
            return why;
        }
        Scratch s = new Scratch().point(x, y, z);
        temperature.sample(s.x, s.y, s.z, 1, Double.NaN, Order.VALUE, s.samples);
        double kelvin = s.samples.value[0];
        return kelvin > 0 ? "" : "the temperature is " + Told.number(kelvin) + " K, and it must be above 0";
    }
}
