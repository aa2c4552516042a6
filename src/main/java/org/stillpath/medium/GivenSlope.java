package org.stillpath.medium;

/**
 * A law whose dependence on temperature is replaced by one number, the same at all wavelengths and temperatures: what a
 * user knows of the very piece at hand, or what a budget varies.
 *
 * @param base gives the index at {@code temperature}
 * @param slope dn/dT of the absolute index, 1/K
 * @param temperature about which the index is linear, kelvin
 */
record GivenSlope(SolidLaw base, double slope, double temperature) implements SolidLaw {
    GivenSlope {
        if (!Double.isFinite(slope) || !(temperature > 0)) {
            throw new IllegalArgumentException(
                    "slope must be finite and temperature above 0 K: " + slope + ", " + temperature);
        }
    }

    @Override
    public Slope at(double wavelength) {
        double refractivity = base.at(wavelength).refractivity(temperature);
        return (kelvin, out) -> {
            out[0] = refractivity + slope * (kelvin - temperature);
            out[1] = slope;
            out[2] = 0;
        };
    }

    @Override
    public boolean varies() {
        return slope != 0;
    }
}
