package org.stillpath.medium;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.stillpath.formula.Chart;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Frame;
import org.stillpath.geometry.Vector;

/**
 * Air whose state varies from place to place. Where temperature, pressure and humidity all depend on the height alone,
 * the field is worked out in a column ({@link AlongHeight}), else in space.
 */
public final class AtmosphereMedium implements Medium {
    private final Declaration declaration;
    private final AirLaw law;
    private final ScalarField temperature;
    private final Pressure pressure;
    private final Humidity humidity;

    AtmosphereMedium(
            Declaration declaration, AirLaw law, ScalarField temperature, Pressure pressure, Humidity humidity) {
        this.declaration = declaration;
        this.law = law;
        this.temperature = temperature;
        this.pressure = pressure;
        this.humidity = humidity;
    }

    @Override
    public Declaration declaration() {
        return declaration;
    }

    /** The law of the index. */
    public AirLaw law() {
        return law;
    }

    /** Whether the pressure is the same everywhere, which no column of air has. */
    public boolean pressureIsConstant() {
        return pressure instanceof Pressure.Given g && g.quantity().isConstant();
    }

    /** The pressure in pascal at a height above the foot of the eye, metres, over flat ground; NaN where it is undefined. */
    public double pressureAt(double height) {
        Scratch s = new Scratch().point(0, 0, height);
        Samples t = new Samples(1);
        Samples w = new Samples(1);
        temperature.on(Chart.FLAT).sample(s.x, s.y, s.z, 1, Double.NaN, Order.VALUE, t);
        humidity.quantity().on(Chart.FLAT).sample(s.x, s.y, s.z, 1, Double.NaN, Order.VALUE, w);
        pressure.on(Chart.FLAT).sample(s.x, s.y, s.z, 1, t, w, Order.VALUE, s.samples);
        return s.samples.value[0];
    }

    /** The pressure of the standard atmosphere at a height, pascal; metres, from -5 km to 86 km. */
    public static double standardPressure(double height) {
        return Us1976.pressureAt(Us1976.geopotential(height));
    }

    @Override
    public IndexField placed(double wavelength, Frame frame, Chart chart) {
        return placed(dispersion(wavelength, false), frame, chart);
    }

    @Override
    public Optional<IndexField> groupField(double wavelength, Frame frame, Chart chart) {
        return Optional.of(placed(dispersion(wavelength, true), frame, FramedChart.of(chart, frame)));
    }

    @Override
    public Optional<Medium> joinedOtherwise() {
        Optional<ScalarField> t = temperature.joinedOtherwise();
        Optional<Humidity> w = humidity.quantity().joinedOtherwise().map(humidity::with);
        boolean tabled = pressure instanceof Pressure.Given g
                && g.quantity().joinedOtherwise().isPresent();
        if (t.isEmpty() && w.isEmpty() && !tabled) {
            return Optional.empty();
        }
        ScalarField warm = t.orElse(temperature);
        Humidity moist = w.orElse(humidity);
        return Optional.of(new AtmosphereMedium(declaration, law, warm, pressure.joinedOtherwise(warm, moist), moist));
    }

    private AirLaw.Dispersion dispersion(double wavelength, boolean group) {
        if (law.dispersive() && !(wavelength > 0)) {
            throw new IllegalArgumentException("medium " + name() + " needs a wavelength above 0 m: " + wavelength);
        }
        return group ? law.group(wavelength) : law.phase(wavelength);
    }

    private IndexField placed(AirLaw.Dispersion dispersion, Frame frame, Chart chart) {
        AirField air = new AirField(law, dispersion, temperature, pressure, humidity);
        ScalarField scalar;
        if (air.ofHeightAlone()) {
            scalar = AlongHeight.of(air, chart);
        } else if (pressure instanceof Pressure.Given) {
            scalar = air.on(chart);
        } else {
            ScalarField column = AlongHeight.of(new PressureColumn(temperature, pressure), chart);
            scalar = new AirField(
                    law,
                    dispersion,
                    temperature.on(chart),
                    new Pressure.Given(column),
                    humidity.with(humidity.quantity().on(chart)));
        }
        PlacedIndex placed = new PlacedIndex(scalar, true, 0, Double.NaN, frame, declaration.valid(chart));
        if (air.isConstant()) {
            Scratch s = new Scratch().point(0, 0, 0);
            scalar.sample(s.x, s.y, s.z, 1, Double.NaN, Order.VALUE, s.samples);
            double n = s.samples.value[0];
            if (!Double.isNaN(n)) {
                return new UniformIndex(n, placed.limits());
            }
        }
        return placed;
    }

    /**
     * The temperature at places over an earth, for a picture of the air.
     *
     * @param frame where the medium's own frame lies in the job, from {@link #frame}
     * @param chart gives height, clearance and distance in the job's coordinates
     * @param x coordinates in metres; {@code z} likewise, as many; y is 0
     * @return kelvin, one a place; NaN where it is undefined
     */
    public double[] temperatures(Frame frame, Chart chart, double[] x, double[] z) {
        ScalarField field = temperature.on(FramedChart.of(chart, frame));
        Samples s = new Samples(1);
        double[] kelvin = new double[x.length];
        for (int i = 0; i < kelvin.length; i++) {
            Vector own = frame.fromJob(new Vector(x[i], 0, z[i]));
            field.sample(
                    new double[] {own.x()},
                    new double[] {own.y()},
                    new double[] {own.z()},
                    1,
                    Double.NaN,
                    Order.VALUE,
                    s);
            kelvin[i] = s.value[0];
        }
        return kelvin;
    }

    @Override
    public boolean needsWavelength() {
        return law.dispersive();
    }

    @Override
    public List<String> warnings() {
        List<String> list = new ArrayList<>(declaration.warnings());
        list.addAll(temperature.warnings());
        if (pressure instanceof Pressure.Given g) {
            list.addAll(g.quantity().warnings());
        }
        list.addAll(humidity.quantity().warnings());
        return List.copyOf(list);
    }

    @Override
    public List<String> warningsAt(double wavelength) {
        List<String> list = new ArrayList<>(Medium.super.warningsAt(wavelength));
        list.addAll(law.warnings(wavelength));
        return List.copyOf(list);
    }

    /** The pressure stays as the job gives it: what is asked for is the effect of temperature alone. */
    @Override
    public Medium atTemperature(double kelvin) {
        return new AtmosphereMedium(declaration, law, new Constant(kelvin), pressure, humidity);
    }

    @Override
    public Medium with(Declaration other) {
        return new AtmosphereMedium(other, law, temperature, pressure, humidity);
    }
}
