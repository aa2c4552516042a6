package org.stillpath.medium;

import java.util.List;
import org.stillpath.formula.Chart;
import org.stillpath.formula.Order;
import org.stillpath.formula.PerThread;
import org.stillpath.formula.Samples;

/**
 * A pressure that follows from a temperature of height alone, as a quantity of its own: for air whose humidity depends on
 * more than the height. Its seams are those of the temperature, which the air tells already.
 */
final class PressureColumn implements ScalarField {
    private final ScalarField temperature;
    private final Pressure pressure;
    private final PerThread<Samples[]> scratch = PerThread.of(() -> new Samples[] {new Samples(1)});

    PressureColumn(ScalarField temperature, Pressure pressure) {
        this.temperature = temperature;
        this.pressure = pressure;
    }

    @Override
    public void sample(double[] x, double[] y, double[] z, int count, double wavelength, Order order, Samples out) {
        Samples[] held = scratch.get();
        if (held[0].capacity() < count) {
            held[0] = new Samples(count);
        }
        Samples t = held[0];
        temperature.sample(x, y, z, count, Double.NaN, order, t);
        pressure.sample(x, y, z, count, t, t, order, out);
    }

    @Override
    public ScalarField on(Chart chart) {
        return new PressureColumn(temperature.on(chart), pressure.on(chart));
    }

    @Override
    public boolean ofHeightAlone() {
        return true;
    }

    @Override
    public boolean isConstant() {
        return false;
    }

    @Override
    public List<Level> limits() {
        return pressure.limits();
    }

    @Override
    public String explain(double x, double y, double z, double wavelength) {
        return pressure.explain(x, y, z);
    }
}
