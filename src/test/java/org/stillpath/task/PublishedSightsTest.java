package org.stillpath.task;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.Locale;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.stillpath.task.survey.Classical;

/**
 * Sights through the program against values from elsewhere. Recomputed: evaluated from the published formula, or by two other
 * methods with 40 digits, by someone other than the author of the program.
 */
class PublishedSightsTest {
    private static final double R = 6_371_000;

    private static String layered(String temperature, double from, double distance, double to) {
        return String.format(Locale.ROOT, """
                task: sightline
                wavelength: 0.55 um
                accuracy: 1e-12
                media:
                  field:
                    air:
                      law: iag-1999
                      temperature: %s
                      pressure: {value: 1013.25 hPa, at-height: 0 m, hydrostatic: standard}
                through: field
                earth: {radius: 6371 km}
                ground: {height: 0 m}
                from: {height: %s m}
                to: {distance: %s m, height: %s m}
                """, temperature, from, distance, to);
    }

    private static String index(String formula, double from, double distance, double to) {
        return String.format(Locale.ROOT, """
                task: sightline
                accuracy: 1e-12
                media: {field: {index: "%s"}}
                through: field
                earth: {radius: 6371 km}
                ground: {height: 0 m}
                from: {height: %s m}
                to: {distance: %s m, height: %s m}
                """, formula, from, distance, to);
    }

    private static double value(Result r, String key) {
        return r.quantities().get(key) instanceof Quantity.Amount a ? a.value() : Double.NaN;
    }

    private static double phase(double celsius, double hPa) {
        double dry = 287.6155 + 1.62887 / (0.55 * 0.55) + 0.01360 / Math.pow(0.55, 4);
        return 273.15 / 1013.25 * dry * 1e-6 * hPa / (celsius + 273.15);
    }

    /** k of the whole ray from both zenith angles: 1 − (z₁ + z₂ − π) R/D. */
    private static double reciprocal(ImageRow image, double distance) {
        double fore = 0.5 * Math.PI - image.launch();
        double back = 0.5 * Math.PI + image.arrival();
        return Classical.reciprocalCoefficient(distance, fore, back, R);
    }

    @Test
    void opticalPathsOverEqualHeights() {
        // optical path less n of the ends times the chord; two methods, recomputed. The series (2k - k^2) d^3/(24 R^2)
        // of
        // Rueger 1996 gives 0.00038486216, 0.00078479143 and 0.0019964958
        Result isothermal = Jobs.run(layered("288.15 K", 20, 10_000, 20));
        double p = 1013.25 * Math.exp(-9.80665 * 20 / (287.05287 * 288.15));
        assertThat(isothermal.images().get(0).excess() - phase(15, p) * value(isothermal, "chord-length"))
                .isCloseTo(0.0003849498924179, within(1e-10));
        Result inversion = Jobs.run(layered("288.15 K + 0.05 K/m*height", 10, 10_000, 10));
        double q = 1013.25 * Math.pow(288.65 / 288.15, -9.80665 / (287.05287 * 0.05));
        assertThat(inversion.images().get(0).excess() - phase(15.5, q) * value(inversion, "chord-length"))
                .isCloseTo(0.0007849461243818, within(1e-10));
        Result even = Jobs.run(index("1.00028*((6371 km + height)/(6371 km))^(-0.13)", 100, 20_000, 100));
        double ends = 1.00028 * Math.pow(1 + 100 / R, -0.13) - 1;
        assertThat(even.images().get(0).excess() - ends * value(even, "chord-length"))
                .isCloseTo(0.001996990118582, within(1e-9));
    }

    @Test
    void bothZenithAnglesGiveTheMeanCoefficientOfTheRay() {
        // three rays, recomputed by two methods: mountains in the standard atmosphere, and the middle one of three
        // images
        Result mountains = Jobs.run(layered("288.15 K", 500, 50_000, 3000)
                .replaceFirst("temperature: .*\\n *pressure: .*\\n", "atmosphere: us-1976\n"));
        assertThat(reciprocal(mountains.images().get(0), 50_000)).isCloseTo(0.1494847030225, within(1e-10));
        Result superior =
                Jobs.run(layered("283.15 K - 6.5 K/km*height + 2 K*(1 + tanh((height - 20 m)/(3 m)))", 12, 15_000, 10));
        assertThat(superior.images()).hasSize(3);
        assertThat(superior.images().stream().map(i -> reciprocal(i, 15_000)).toList())
                .anySatisfy(k -> assertThat(k).isCloseTo(0.1885201928172, within(1e-10)));
        // it is the sum of the refractions at both ends, over the angle at the earth's centre: exact for any profile,
        // moist too
        Result moist = Jobs.run(layered("298.15 K - 6.5 K/km*height\n          humidity: 80 %", 100, 20_000, 100)
                .replace("\n          humidity", "\n      humidity"));
        ImageRow i = moist.images().get(0);
        assertThat(reciprocal(i, 20_000))
                .isCloseTo((i.refractionAtFrom() + i.refractionAtTo()) * R / 20_000, within(1e-11));
    }

    @Test
    void twoColours() {
        // delta_blue/(delta_blue - delta_red) of 0.400 and 0.850 um: 35.39342746 for a sight whose data are not at hand
        // (recomputed), and N(0.4)/(N(0.4) - N(0.85)) = 35.383956 for a ray that does not know of its own bend
        // (Prilepin; Tengstrom 1969); the ratio moves by some 1e-3 with the sight
        double blue = Jobs.run(
                        layered("288.15 K - 6.5 K/km*height", 100, 20_000, 100).replace("0.55 um", "0.4 um"))
                .images()
                .get(0)
                .refractionAtFrom();
        double red = Jobs.run(
                        layered("288.15 K - 6.5 K/km*height", 100, 20_000, 100).replace("0.55 um", "0.85 um"))
                .images()
                .get(0)
                .refractionAtFrom();
        assertThat(blue / (blue - red)).isCloseTo(35.39342746, within(3e-3));
        assertThat(blue / (blue - red)).isCloseTo(35.383956, within(1.5e-2));
    }

    @Test
    void theGradientAtWhichALevelRayFollowsTheEarth() {
        // from k = 503 P/T^2 (0.0342 + dT/dz) = 1 at 1013.25 hPa and 288.15 K: 0.1287118405776 K/m (recomputed)
        assertThat(Classical.coefficient(101_325, 288.15, 0.1287118405776)).isCloseTo(1, within(6e-9));
        // and the air itself has a duct above it, and none below; 0.3 % off, since 503 is rounded
        for (double gradient : new double[] {0.124, 0.134}) {
            Result r = Jobs.run(layered("288.15 K + " + gradient + " K/m*height", 3, 5_000, 3));
            assertThat(r.warnings().stream().anyMatch(w -> w.contains("a duct")))
                    .isEqualTo(gradient > 0.1287);
        }
    }

    @ParameterizedTest
    @CsvSource({
        // effective radius of the earth over the true one, 1/(1 + R dN/dh), for dN/dh in 1e-6/km; recomputed. The rule
        // of
        // thumb 4/3 is common practice, no source
        "-40, 1.34199366579",
        "-39, 1.330617100293"
    })
    void effectiveRadiusOfTheEarth(double gradient, double factor) {
        Result up = Jobs.run(index("1 + " + gradient + "e-6 1/km*height", 1e-6, 1_000, 20));
        // at the foot n = 1, so that k = -R dN/dh; half-way up the height counts for 2e-6
        double k = value(up, "refraction-coefficient-gradient");
        assertThat(1 / (1 - k)).isCloseTo(factor, within(5e-6)).isCloseTo(4 / 3.0, within(0.01));
    }

    @Test
    void theRadioDuct() {
        // the gradient at which a level ray follows the earth: -156.961230576 per km for R = 6371 km (recomputed)
        for (double gradient : new double[] {-156.9, -157.0}) {
            Result r = Jobs.run(index("1 + " + gradient + "e-6 1/km*height", 3, 1_000, 3));
            assertThat(r.warnings().stream().anyMatch(w -> w.contains("a duct")))
                    .isEqualTo(gradient < -156.961230576);
        }
        // Recommendation ITU-R P.453-14, reference profile 315 exp(-h/7.35 km): 274.9304666 at 1 km, -40.0695334 from 0
        // to
        // 1 km (recomputed): k = -R dN/dh half-way up
        Result r = Jobs.run(index("1 + 315e-6*exp(-height/(7.35 km))", 1e-6, 50_000, 1000));
        double half = 315e-6 / 7350 * Math.exp(-500 / 7350.0);
        assertThat(value(r, "refraction-coefficient-gradient")).isCloseTo(half * R, within(2e-4));
        assertThat(315 * Math.exp(-1 / 7.35) - 315).isCloseTo(-40.06953337546, within(1e-9));
        assertThat(half * 1e9).isCloseTo(40.0695, within(0.05));
    }

    @Test
    void curvatureAndRefraction() {
        // D^2/(2R) = 78.48061528802 mm and (1 - k) D^2/(2R) = 68.27813530058 mm at 1 km, k = 0.13 (recomputed); the
        // rule of
        // thumb 0.0683 D^2 is common practice, no source. A level sight of 1 km along its chord: the program is exact
        // to
        // third order, D^4/R^3
        String sight = "observed: {zenith-angle: 90 deg, slope-distance: 1000 m}\n";
        String even = "1.00028*((6371 km + height)/(6371 km))^(-K)";
        double straight =
                value(Jobs.run(index(even.replace("K)", "1e-12)"), 0, 1_000, 5) + sight), "height-difference");
        double bent = value(Jobs.run(index(even.replace("K)", "0.13)"), 0, 1_000, 5) + sight), "height-difference");
        assertThat(straight).isCloseTo(0.07848061528802, within(1e-8));
        assertThat(bent).isCloseTo(0.06827813530058, within(1e-8)).isCloseTo(0.0683, within(3e-4));
        // a standard uncertainty of 0.3 of k: D^2/(2R) 0.3 = 23.54418 mm (recomputed)
        double more = value(Jobs.run(index(even.replace("K)", "0.28)"), 0, 1_000, 5) + sight), "height-difference");
        double less = value(
                Jobs.run(index(even.replace("K)", "-0.02)").replace("--", ""), 0, 1_000, 5) + sight),
                "height-difference");
        assertThat(less - more).isCloseTo(0.02354418458641, within(1e-8));
    }

    @Test
    void theGeometricHorizon() {
        // acos(R/(R + h)) of 100 m: 19.26115108155 arc minutes (geometry, recomputed)
        Result r = Jobs.run(index("1", 100, 10_000, 5).replace("through: field", "through: vacuum"));
        assertThat(Math.toDegrees(value(r, "horizon-dip")) * 60).isCloseTo(19.26115108155, within(1e-9));
        // rule of thumb: the mean refraction of a star at the horizon is 34'; common practice, no source
        Result star = Jobs.run(layered("288.15 K", 0, 1_000, 3)
                .replaceFirst("temperature: .*\\n *pressure: .*\\n", "atmosphere: us-1976\n")
                .replaceFirst("to: .*", "to: {stars: [90 deg]}"));
        assertThat(Math.toDegrees(star.stars().get(0).refraction().orElseThrow()) * 60)
                .isCloseTo(34, within(1.0));
    }

    @ParameterizedTest
    @CsvSource({
        // M, N, R in the azimuth (Euler), sqrt(M N), metres, GRS80 (Moritz 1980); recomputed
        "0, 0, 6335439.327084, 6378137.0, 6335439.327084, 6356752.31414",
        "45, 0, 6367381.815567, 6388838.290174, 6367381.815567, 6378101.030201",
        "45, 45, 6367381.815567, 6388838.290174, 6378092.007544, 6378101.030201",
        "47, 30, 6369620.023015, 6389586.785694, 6374600.005671, 6379595.5929",
        "60, 90, 6383453.857255, 6394209.173927, 6394209.173927, 6388829.252328",
        "90, 0, 6399593.625864, 6399593.625864, 6399593.625864, 6399593.625864"
    })
    void radiiOfTheEllipsoid(double latitude, double azimuth, double m, double n, double euler, double gauss) {
        double f = 298.257222101;
        double phi = Math.toRadians(latitude);
        double meridian = Earth.euler(f, phi, 0);
        double prime = Earth.euler(f, phi, Math.PI / 2);
        assertThat(meridian).isCloseTo(m, within(1e-5));
        assertThat(prime).isCloseTo(n, within(1e-5));
        assertThat(Earth.euler(f, phi, Math.toRadians(azimuth))).isCloseTo(euler, within(1e-5));
        assertThat(Math.sqrt(meridian * prime)).isCloseTo(gauss, within(1e-5));
    }
}
