package org.stillpath.medium;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.stillpath.formula.Order;

/**
 * A published law for the refractivity n − 1 of moist air, with exact first and second derivatives by temperature,
 * pressure and vapour pressure. Immutable.
 *
 * <p>All laws have one form: a function of the state times a number of the wavelength, once for the dry part and once for
 * the vapour. The two numbers are worked out once a wavelength ({@link Dispersion}); {@link #refractivity} then does
 * plain arithmetic without allocation. The derivatives are written out by hand: dual numbers would cost several times as
 * much in the innermost loop of every ray.
 */
public sealed interface AirLaw permits Ciddor, BirchDowns, IagClosed, RadioP453 {
    /** Places in the array that {@link #refractivity} fills: the value. */
    int N = 0;
    /** ∂N/∂T. */
    int T = 1;
    /** ∂N/∂p. */
    int P = 2;
    /** ∂N/∂e. */
    int E = 3;
    /** ∂²N/∂T². */
    int TT = 4;
    /** ∂²N/∂T∂p. */
    int TP = 5;
    /** ∂²N/∂T∂e. */
    int TE = 6;
    /** ∂²N/∂p². */
    int PP = 7;
    /** ∂²N/∂p∂e. */
    int PE = 8;
    /** ∂²N/∂e². */
    int EE = 9;
    /** Length of that array. */
    int JET = 10;

    /** 0 °C in kelvin. */
    double ZERO_CELSIUS = 273.15;

    /** Carbon dioxide of today's air that is meant where nothing is said: 420 ppm. */
    double USUAL_CO2 = 420e-6;

    /**
     * The dispersion formulas of a law at one wavelength, phase or group.
     *
     * @param dry of the dry part
     * @param vapour of the water vapour
     */
    record Dispersion(double dry, double vapour) {}

    /**
     * The range that a law was published for.
     *
     * @param shortest vacuum wavelength, metres; 0 where there is no end
     * @param longest vacuum wavelength, metres; infinite where there is no end
     * @param coldest kelvin
     * @param warmest kelvin
     * @param lowest pressure, pascal
     * @param highest pressure, pascal; infinite where there is no end
     */
    record Range(double shortest, double longest, double coldest, double warmest, double lowest, double highest) {}

    /** Words of the laws in a job file, the usual one first. */
    static List<String> words() {
        return List.of("ciddor-1996", "birch-downs-1994", "iag-1999", "radio-p453");
    }

    /**
     * The law of that word.
     *
     * @param co2 carbon dioxide as a fraction; laws for one content take no notice ({@link #fixedCo2})
     */
    static Optional<AirLaw> of(String word, double co2) {
        return switch (word) {
            case "ciddor-1996" -> Optional.of(Ciddor.of(co2));
            case "birch-downs-1994" -> Optional.of(new BirchDowns());
            case "iag-1999" -> Optional.of(new IagClosed());
            case "radio-p453" -> Optional.of(new RadioP453());
            default -> Optional.empty();
        };
    }

    /** Its name in messages: {@code Ciddor 1996}. */
    String title();

    /** Where it was published. */
    String source();

    /** The range that it was published for. */
    Range range();

    /** The saturation pressure that a relative humidity refers to with this law: always over water, as usual in meteorology. */
    Saturation saturation();

    /** The one content of carbon dioxide that the law knows, as a fraction; empty where it takes any, or none matters. */
    Optional<Double> fixedCo2();

    /** Whether the wavelength matters. */
    boolean dispersive();

    /**
     * The phase dispersion.
     *
     * @param wavelength vacuum wavelength in metres, above 0; any value where the law is not {@linkplain #dispersive}
     */
    Dispersion phase(double wavelength);

    /** The group dispersion, N − λ dN/dλ. */
    Dispersion group(double wavelength);

    /**
     * The refractivity and its derivatives in SI units.
     *
     * @param d of this law, from {@link #phase} or {@link #group}
     * @param temperature kelvin
     * @param pressure total pressure, pascal
     * @param vapour partial pressure of water vapour, pascal
     * @param order which derivatives are wanted
     * @param jet receives them at the places above; those beyond {@code order} are left as they are
     */
    void refractivity(Dispersion d, double temperature, double pressure, double vapour, Order order, double[] jet);

    /** What of a wavelength lies outside the published range; empty where nothing does. */
    default List<String> warnings(double wavelength) {
        Range r = range();
        if (!(wavelength < r.shortest() || wavelength > r.longest())) {
            return List.of();
        }
        String range = r.longest() == Double.POSITIVE_INFINITY
                ? "from " + Told.length(r.shortest()) + " on"
                : Told.wavelength(r.shortest()) + " to " + Told.wavelength(r.longest());
        return List.of(outside("wavelength", Told.wavelength(wavelength), range));
    }

    /**
     * What of a state of the air lies outside the published range, or cannot be: empty where nothing does.
     *
     * @param where appended to the value, such as {@code " at height 2 km"}; may be empty
     */
    default List<String> warnings(double temperature, double pressure, double vapour, String where) {
        List<String> list = new ArrayList<>();
        Range r = range();
        if (temperature < r.coldest() || temperature > r.warmest()) {
            list.add(outside(
                    "temperature",
                    Told.celsius(temperature) + where,
                    Told.celsius(r.coldest()) + " to " + Told.celsius(r.warmest())));
        }
        if (pressure < r.lowest() || pressure > r.highest()) {
            list.add(outside(
                    "pressure",
                    Told.pressure(pressure) + where,
                    Told.pressure(r.lowest()) + " to " + Told.pressure(r.highest())));
        }
        double saturation = saturation().pressure(temperature, pressure);
        if (vapour > saturation * 1.001) {
            list.add("the vapour pressure " + Told.pressure(vapour) + where + " is above saturation, "
                    + Told.pressure(saturation) + " at " + Told.celsius(temperature));
        }
        return List.copyOf(list);
    }

    private String outside(String what, String value, String range) {
        return "the " + what + " " + value + " lies outside the range of " + title() + " for air, " + range;
    }

    /** σ² in 1/µm² of a vacuum wavelength in metres. */
    static double squaredWavenumber(double wavelength) {
        if (!(wavelength > 0)) {
            throw new IllegalArgumentException("wavelength must be above 0 m: " + wavelength);
        }
        double um = wavelength * 1e6;
        return 1 / (um * um);
    }
}
