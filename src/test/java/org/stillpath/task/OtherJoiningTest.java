package org.stillpath.task;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.List;
import java.util.Locale;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;

/** What a table of the air leaves open between its rows is computed with a second interpolant. */
class OtherJoiningTest {
    private static final String JOB = """
            task: sightline
            wavelength: 0.55 um
            accuracy: 1e-10
            media:
              field:
                air:
                  law: iag-1999
                  temperature: %s
                  pressure: {value: 1013.25 hPa, at-height: 0 m}
            through: field
            earth: {radius: 6371 km}
            from: {height: 4 m}
            to: {distance: 3 km, height: 8 m}
            """;

    /** A warm skin over the ground, as a formula and as a table of its values. */
    private static String layer() {
        return "290 K - 6.5 K/km*height + 1.5 K*exp(-height/(5 m))";
    }

    private static String table(double step, String interpolate) {
        StringBuilder at = new StringBuilder();
        StringBuilder value = new StringBuilder();
        for (double h = 0; h <= 60; h += step) {
            at.append(h == 0 ? "" : ", ").append(String.format(Locale.ROOT, "%.9g m", h));
            value.append(h == 0 ? "" : ", ")
                    .append(String.format(Locale.ROOT, "%.15g K", 290 - 6.5e-3 * h + 1.5 * Math.exp(-h / 5)));
        }
        return "{profile: {along: height, at: [" + at + "], value: [" + value + "]" + interpolate + "}}";
    }

    @ParameterizedTest
    @ValueSource(doubles = {4, 2, 1, 0.5})
    void theDifferenceOfTwoInterpolantsIsTheErrorOfATable(double step) {
        ImageRow exact = Jobs.run(String.format(JOB, layer())).images().get(0);
        Result r = Jobs.run(String.format(JOB, table(step, "")));
        ImageRow seen = r.images().get(0);
        double wrong = Math.abs(seen.launch() - exact.launch());
        double told = seen.errors().getOrDefault("launch-elevation", 0.0);
        // the layer is 5 m thick; that a table's own error is about the difference of two interpolants is common
        // practice
        assertThat(wrong).isLessThan(1.2 * told);
        assertThat(told).isLessThan(30 * wrong);
        assertThat(seen.errors().getOrDefault("refraction-coefficient", 0.0)).isGreaterThan(told);
        assertThat(r.warnings()).anyMatch(w -> w.contains("told by another interpolant"));
        // which says nothing about the computation
        assertThat(r.accuracyReached()).isTrue();
        assertThat(r.tables().get(0).rows().get(0)).contains(String.format(Locale.ROOT, "%.3g", told));
        // and the headline has no more digits than that leaves
        assertThat(r.headline()).contains(step == 4 ? "24.4 arcsec" : "23.");
    }

    @Test
    void noOtherInterpolantWhereNothingIsOpen() {
        for (String given :
                List.of(layer(), "{profile: {along: height, at: [0 m, 60 m], value: [290 K, 289.6 K]}}", "288.15 K")) {
            Result r = Jobs.run(String.format(JOB, given));
            assertThat(r.warnings()).noneMatch(w -> w.contains("interpolant"));
            assertThat(r.images().get(0).errors().getOrDefault("launch-elevation", 1.0))
                    .isLessThan(1e-11);
        }
    }

    @Test
    void anotherNumberOfImagesIsTold() {
        // a temperature kink swallows an image that smooth joints show (FORMULAS 12: kinks and false images)
        Result r = Jobs.run(String.format(
                        JOB,
                        "{profile: {along: height, at: [0 m, 18 m, 24 m, 300 m], "
                                + "value: [283.15 K, 283.033 K, 287.033 K, 285.239 K], interpolate: linear}}")
                .replace("height: 4 m", "height: 12 m")
                .replace("distance: 3 km, height: 8 m", "distance: 15 km, height: 20 m"));
        assertThat(r.warnings()).anyMatch(w -> w.contains("leave open what is seen"));
    }

    @Test
    void tablesOfHumidityAndPressureAreJoinedOtherwiseToo() {
        String rows = "at: [0 m, 5 m, 20 m, 60 m], value: ";
        Result moist = Jobs.run(String.format(JOB, "288.15 K")
                .replace(
                        "at-height: 0 m}\n",
                        "at-height: 0 m}\n      humidity: {profile: {along: height, " + rows
                                + "[90 %, 40 %, 70 %, 20 %]}}\n"));
        Result pressed = Jobs.run(String.format(JOB, "288.15 K")
                .replace(
                        "{value: 1013.25 hPa, at-height: 0 m}",
                        "{profile: {along: height, " + rows + "[1013.25 hPa, 1012.6 hPa, 1010.9 hPa, 1006.1 hPa]}}"));
        for (Result r : List.of(moist, pressed)) {
            assertThat(r.images().get(0).errors().getOrDefault("launch-elevation", 0.0))
                    .isGreaterThan(1e-9);
        }
    }

    @Test
    void starsStavesAndHorizonsHoldTheDifferenceToo() {
        String air = String.format(JOB, table(4, ", beyond: hold")).replaceFirst("to:.*", "");
        Result stars = Jobs.run(air + "to: {stars: [80 deg]}\n");
        assertThat(stars.stars().get(0).errors().getOrDefault("refraction", 0.0))
                .isGreaterThan(1e-12);
        Result staff = Jobs.run(air + "to: {staff: {distance: 60 m}}\n");
        assertThat(error(staff, "staff-displacement")).isGreaterThan(1e-9);
        Result ship = Jobs.run(air + "to: {distance: 15 km, height: 20 m}\n");
        assertThat(error(ship, "horizon-dip")).isGreaterThan(1e-9);
        assertThat(error(ship, "hidden-height")).isGreaterThan(1e-6);
    }

    private static double error(Result r, String key) {
        return r.quantities().get(key) instanceof Quantity.Amount a ? a.error() : Double.NaN;
    }

    @Test
    void placesNotedAtOneSeamAreNoTurn() {
        // eye and target on rows of a table: roundings of their heights once looked like turning points, and Bouguer's
        // integral was then taken along another ray
        for (int i = 0; i < 20; i++) {
            Result r = Jobs.run(String.format(JOB, table(2, "")));
            assertThat(r.accuracyReached()).isTrue();
        }
    }
}
