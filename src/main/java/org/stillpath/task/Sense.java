package org.stillpath.task;

import java.util.ArrayList;
import java.util.List;
import org.stillpath.medium.AirMedium;
import org.stillpath.medium.AtmosphereMedium;
import org.stillpath.medium.Medium;
import org.stillpath.medium.UniformMedium;
import org.stillpath.unit.Display;

/** Looks for the blunders that users of sights make, and says so in words. Limits from common practice, no source. */
final class Sense {
    /** Sights longer than this feel the pressure's decrease with height. */
    private static final double LONG = 500;
    /** Weather changes the pressure by less than this fraction. */
    private static final double WEATHER = 0.06;
    /** A height at which the pressure differs from the sea's by more than weather. */
    private static final double HIGH = 600;

    private Sense() {}

    static List<String> of(Scene scene, Sight sight) {
        List<String> list = new ArrayList<>();
        Medium m = scene.through().orElseThrow();
        boolean far = sight.to() instanceof Sight.Point p && p.distance().orElse(LONG + 1) > LONG;
        if (m instanceof AirMedium || m instanceof UniformMedium) {
            list.add("medium `" + m.name()
                    + "` is the same everywhere: nothing is refracted; give the air a temperature and a "
                    + "pressure that depend on `height`");
        }
        if (m instanceof AtmosphereMedium a) {
            if (a.pressureIsConstant() && far) {
                list.add(
                        "the pressure is the same at every height; over a long sight that puts the coefficient of refraction "
                                + "off by about a fifth: give {value: 1013.25 hPa, at-height: 0 m}");
            }
            if (a.pressureIsConstant() && sight.eye() > HIGH && sight.eye() < 80e3) {
                double given = a.pressureAt(sight.eye());
                double usual = AtmosphereMedium.standardPressure(sight.eye());
                double sea = AtmosphereMedium.standardPressure(0);
                if (Math.abs(given / usual - 1) > WEATHER && Math.abs(given / sea - 1) < WEATHER) {
                    list.add("the pressure " + Display.in(given, "hPa", 10) + " at the eye's height of "
                            + Display.in(sight.eye(), "m", 1) + " looks reduced to sea level; about "
                            + Display.in(usual, "hPa", 100) + " stands on a barometer there, and that is needed");
                }
            }
        }
        return list;
    }
}
