package org.stillpath.medium;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.stillpath.formula.Chart;
import org.stillpath.formula.Order;
import org.stillpath.geometry.Frame;

/**
 * A medium whose index is a formula, a profile, a grid or another scalar field.
 *
 * @param declaration what is said about it
 * @param scalar the scalar f in the medium's own frame
 * @param fromOne whether f is the refractivity n − 1 (kept apart so that thin media lose no digits), else n itself
 * @param relativeToAir whether n is relative to air at 20 °C and 101.325 kPa, else absolute
 */
public record FieldMedium(Declaration declaration, ScalarField scalar, boolean fromOne, boolean relativeToAir)
        implements Medium {

    @Override
    public IndexField placed(double wavelength, Frame frame, Chart chart) {
        if (needsWavelength() && !(wavelength > 0)) {
            throw new IllegalArgumentException("medium " + name() + " needs a wavelength above 0 m: " + wavelength);
        }
        double nu = relativeToAir ? AirState.laboratory().refractivity(wavelength) : 0;
        PlacedIndex placed =
                new PlacedIndex(scalar.on(chart), fromOne, nu, wavelength, frame, declaration.valid(chart));
        if (scalar.isConstant()) {
            Scratch s = new Scratch().point(0, 0, 0);
            placed.sample(s.x, s.y, s.z, 1, Order.VALUE, s.samples);
            double excess = s.samples.value[0];
            if (!Double.isNaN(excess)) {
                // N = √(1 + e) − 1 without cancellation
                return new UniformIndex(excess / (Math.sqrt(1 + excess) + 1), placed.limits());
            }
        }
        return placed;
    }

    @Override
    public Optional<Medium> joinedOtherwise() {
        return scalar.joinedOtherwise().map(s -> new FieldMedium(declaration, s, fromOne, relativeToAir));
    }

    @Override
    public boolean needsWavelength() {
        return relativeToAir || scalar.needsWavelength();
    }

    @Override
    public List<String> warnings() {
        List<String> list = new ArrayList<>(declaration.warnings());
        list.addAll(scalar.warnings());
        return List.copyOf(list);
    }

    @Override
    public Medium with(Declaration other) {
        return new FieldMedium(other, scalar, fromOne, relativeToAir);
    }
}
