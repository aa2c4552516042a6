package org.stillpath.medium;

import java.util.List;
import org.stillpath.formula.Chart;
import org.stillpath.geometry.Frame;

/**
 * A medium with one number for its index, the same at all wavelengths.
 *
 * @param declaration what is said about it
 * @param index the index, above 0: absolute, or relative to air at 20 °C and 101.325 kPa
 * @param relativeToAir which of the two
 */
public record UniformMedium(Declaration declaration, double index, boolean relativeToAir) implements Medium {
    public UniformMedium {
        if (!(index > 0 && Double.isFinite(index))) {
            throw new IllegalArgumentException("index must be above 0: " + index);
        }
    }

    /** A medium with an absolute index. */
    public static UniformMedium of(String name, double index) {
        return new UniformMedium(Declaration.of(name), index, false);
    }

    @Override
    public IndexField placed(double wavelength, Frame frame, Chart chart) {
        double nu = relativeToAir ? AirState.laboratory().refractivity(wavelength) : 0;
        // n(1 + ν) − 1 without a rounding of n ν
        double refractivity = (index - 1) + index * nu;
        List<Level> limits = declaration.valid().stream()
                .map(l -> FramedLevel.of(l.on(chart), frame))
                .toList();
        return new UniformIndex(refractivity, limits);
    }

    @Override
    public boolean needsWavelength() {
        return relativeToAir;
    }

    @Override
    public Medium with(Declaration other) {
        return new UniformMedium(other, index, relativeToAir);
    }
}
