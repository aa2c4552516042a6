package org.stillpath.medium;

import org.stillpath.formula.Chart;
import org.stillpath.formula.Coordinate;
import org.stillpath.formula.Formula;
import org.stillpath.formula.Order;
import org.stillpath.formula.PerThread;

/** A formula as a level in a medium's frame: the margin of a condition, or the difference that switches a kink. */
final class FormulaLevel implements Level {
    private final Formula formula;
    private final double[] arguments;
    private final double wavelength;
    private final String text;
    private final Chart chart;
    private final PerThread<Scratch> scratch = PerThread.of(Scratch::new);

    FormulaLevel(Formula formula, double[] arguments, double wavelength, String text, Chart chart) {
        this.chart = chart;
        this.formula = formula;
        this.arguments = arguments;
        this.wavelength = wavelength;
        this.text = text;
    }

    @Override
    public double value(double x, double y, double z, double[] gradient) {
        Scratch s = scratch.get().point(x, y, z);
        formula.sample(s.x, s.y, s.z, 1, arguments, wavelength, chart, Order.GRADIENT, s.samples);
        gradient[0] = s.samples.gx[0];
        gradient[1] = s.samples.gy[0];
        gradient[2] = s.samples.gz[0];
        return s.samples.value[0];
    }

    @Override
    public Level on(Chart other) {
        return formula.coordinates().stream().anyMatch(Coordinate::charted)
                ? new FormulaLevel(formula, arguments, wavelength, text, other)
                : this;
    }

    @Override
    public String describe() {
        return text;
    }
}
