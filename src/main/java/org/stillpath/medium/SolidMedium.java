package org.stillpath.medium;

import java.util.ArrayList;
import java.util.List;
import org.stillpath.formula.Chart;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Frame;

/**
 * A solid or liquid of a known material, whose temperature may vary from place to place. Its index is absolute.
 *
 * @param declaration what is said about it
 * @param material what it is made of
 * @param temperature in the medium's own frame, kelvin
 * @param free whether it is free to expand, so that its faces bulge
 * @param diameter of the plate in metres; NaN where none is given, which {@code free} does not allow
 */
public record SolidMedium(
        Declaration declaration, Material material, ScalarField temperature, boolean free, double diameter)
        implements Medium {
    /** The temperature at which the surfaces of a train are where the job says, kelvin: 20 °C (ISO 1:2022). */
    public static final double SIZED_AT = AirLaw.ZERO_CELSIUS + 20;

    /** How far a bulged face may stand outside the field of its temperature, over the diameter. */
    private static final double SLACK = 1e-3;

    public SolidMedium {
        if (free && !(diameter > 0)) {
            throw new IllegalArgumentException("a free plate needs a diameter above 0 m: " + diameter);
        }
    }

    @Override
    public IndexField placed(double wavelength, Frame frame, Chart chart) {
        if (!(wavelength > 0)) {
            throw new IllegalArgumentException("medium " + name() + " needs a wavelength above 0 m: " + wavelength);
        }
        SolidLaw.Slope slope = material.law().at(wavelength);
        ScalarField scalar = new SolidField(slope, temperature.on(chart), free ? SLACK * diameter : 0);
        PlacedIndex placed = new PlacedIndex(scalar, true, 0, wavelength, frame, declaration.valid(chart));
        if (!material.law().varies() || temperature.isConstant()) {
            double n = slope.refractivity(kelvinAtOrigin());
            if (Double.isFinite(n)) {
                return new UniformIndex(n, placed.limits());
            }
        }
        return placed;
    }

    private double kelvinAtOrigin() {
        double[] kelvin = temperatures(new double[1], new double[1], new double[1]);
        return Double.isNaN(kelvin[0]) ? SIZED_AT : kelvin[0];
    }

    /**
     * The temperature at places of the medium's own frame, over flat ground.
     *
     * @param x coordinates in metres; {@code y} and {@code z} likewise, as many
     * @return kelvin, one a place; NaN where it is undefined
     */
    public double[] temperatures(double[] x, double[] y, double[] z) {
        Samples s = new Samples(x.length);
        temperature.on(Chart.FLAT).sample(x, y, z, x.length, Double.NaN, Order.VALUE, s);
        return java.util.Arrays.copyOf(s.value, x.length);
    }

    @Override
    public Medium atTemperature(double kelvin) {
        return new SolidMedium(declaration, material, new Constant(kelvin), free, diameter);
    }

    @Override
    public boolean needsWavelength() {
        return true;
    }

    @Override
    public List<String> warnings() {
        List<String> list = new ArrayList<>(declaration.warnings());
        list.addAll(temperature.warnings());
        return List.copyOf(list);
    }

    /**
     * What is doubtful about temperatures that light meets in it; empty where they are within the material's range.
     *
     * @param coldest kelvin
     * @param hottest kelvin
     */
    public List<String> warningsBetween(double coldest, double hottest) {
        boolean within = coldest >= material.coldest() && hottest <= material.hottest();
        if (within || Double.isNaN(coldest + hottest)) {
            return List.of();
        }
        String met = hottest - coldest < 1e-9 * hottest
                ? "the temperature " + Told.celsius(coldest) + " lies"
                : "temperatures from " + Told.celsius(coldest) + " to " + Told.celsius(hottest) + " lie";
        return List.of(met + " outside the range of " + material.name() + " in medium `" + name() + "`, "
                + Told.celsius(material.coldest()) + " to " + Told.celsius(material.hottest()));
    }

    @Override
    public Medium with(Declaration other) {
        return new SolidMedium(other, material, temperature, free, diameter);
    }
}
