package org.stillpath.medium;

/**
 * What a solid or liquid is made of: a file of {@code media-models/materials}, or a user's own.
 *
 * @param name as it was asked for
 * @param title one line saying what it is
 * @param source where its constants were published
 * @param law its index
 * @param elastic how it expands
 * @param uncertainty of its thermal constants
 * @param wavelengths vacuum wavelengths that the law was published for
 * @param coldest lowest temperature that the constants hold for, kelvin
 * @param hottest highest temperature that they hold for, kelvin
 */
public record Material(
        String name,
        String title,
        String source,
        SolidLaw law,
        Elastic elastic,
        Uncertainty uncertainty,
        Declaration.WavelengthRange wavelengths,
        double coldest,
        double hottest) {
    public Material {
        if (!(coldest > 0 && hottest > coldest)) {
            throw new IllegalArgumentException("temperatures must ascend from above 0 K: " + coldest + ", " + hottest);
        }
    }

    /**
     * Free thermal expansion.
     *
     * @param expansion α, 1/K; 0 for a liquid, which takes the form of its vessel
     * @param poisson Poisson's ratio ν, from −1 to 0.5
     */
    public record Elastic(double expansion, double poisson) {
        public Elastic {
            if (!Double.isFinite(expansion) || !(poisson > -1 && poisson <= 0.5)) {
                throw new IllegalArgumentException(
                        "expansion must be finite, poisson from -1 to 0.5: " + expansion + ", " + poisson);
            }
        }
    }

    /**
     * Relative standard uncertainties of the thermal constants.
     *
     * @param slope of dn/dT
     * @param expansion of α
     */
    public record Uncertainty(double slope, double expansion) {
        public Uncertainty {
            if (!(slope >= 0 && expansion >= 0)) {
                throw new IllegalArgumentException("uncertainties must not be negative: " + slope + ", " + expansion);
            }
        }
    }

    /** The same with other constants. */
    Material with(SolidLaw otherLaw, Elastic otherElastic, Uncertainty other) {
        return new Material(name, title, source, otherLaw, otherElastic, other, wavelengths, coldest, hottest);
    }
}
