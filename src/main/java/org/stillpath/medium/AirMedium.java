package org.stillpath.medium;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.stillpath.formula.Chart;
import org.stillpath.geometry.Frame;

/**
 * Still air of one state.
 *
 * @param declaration what is said about it
 * @param state the law and the state
 */
public record AirMedium(Declaration declaration, AirState state) implements Medium {
    /** The medium {@code air} that every job has: dry, 20 °C, 101.325 kPa, 420 ppm of carbon dioxide. */
    public static AirMedium builtIn() {
        AirState state = AirState.laboratory();
        return new AirMedium(Declaration.of("air").withSource(state.law().source()), state);
    }

    @Override
    public IndexField placed(double wavelength, Frame frame, Chart chart) {
        return uniform(state.refractivity(wavelength), frame, chart);
    }

    @Override
    public Optional<IndexField> groupField(double wavelength, Frame frame, Chart chart) {
        return Optional.of(uniform(state.groupRefractivity(wavelength), frame, FramedChart.of(chart, frame)));
    }

    private IndexField uniform(double refractivity, Frame frame, Chart chart) {
        List<Level> limits = declaration.valid(chart).stream()
                .map(l -> FramedLevel.of(l, frame))
                .toList();
        return new UniformIndex(refractivity, limits);
    }

    @Override
    public boolean needsWavelength() {
        return state.law().dispersive();
    }

    @Override
    public List<String> warningsAt(double wavelength) {
        List<String> list = new ArrayList<>(Medium.super.warningsAt(wavelength));
        list.addAll(state.warnings(wavelength));
        return List.copyOf(list);
    }

    @Override
    public Medium atTemperature(double kelvin) {
        return new AirMedium(declaration, state.at(kelvin));
    }

    @Override
    public Medium with(Declaration other) {
        return new AirMedium(other, state);
    }
}
