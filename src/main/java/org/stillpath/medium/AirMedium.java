package org.stillpath.medium;

import java.util.ArrayList;
import java.util.List;
import org.stillpath.geometry.Frame;

/**
 * Still air of one state, after {@link Ciddor}.
 *
 * @param declaration what is said about it
 * @param law the law at the state of the air
 */
public record AirMedium(Declaration declaration, Ciddor law) implements Medium {
    /** Carbon dioxide of today's air that is meant where nothing is said: 420 ppm. */
    private static final double CO2 = 420e-6;

    private static final String SOURCE = "P. E. Ciddor, Applied Optics 35 (1996) 1566-1573";

    /** The law for dry air at 20 °C, 101.325 kPa and 420 ppm of carbon dioxide: the air that catalogues refer to. */
    static Ciddor laboratory() {
        return Ciddor.of(293.15, 101325, 0, CO2);
    }

    /** The medium {@code air} that every job has: dry, 20 °C, 101.325 kPa, 420 ppm of carbon dioxide. */
    public static AirMedium builtIn() {
        return new AirMedium(Declaration.of("air").withSource(SOURCE), laboratory());
    }

    @Override
    public IndexField field(double wavelength, Frame frame) {
        List<Level> limits =
                declaration.valid().stream().map(l -> FramedLevel.of(l, frame)).toList();
        return new UniformIndex(law.refractivity(wavelength), limits);
    }

    @Override
    public boolean needsWavelength() {
        return true;
    }

    @Override
    public List<String> warningsAt(double wavelength) {
        List<String> list = new ArrayList<>(Medium.super.warningsAt(wavelength));
        list.addAll(law.warnings(wavelength));
        return List.copyOf(list);
    }

    @Override
    public Medium with(Declaration other) {
        return new AirMedium(other, law);
    }
}
