package org.stillpath.study;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.nio.charset.StandardCharsets;
import java.util.Locale;
import java.util.Random;
import org.junit.jupiter.api.Test;
import org.stillpath.io.YamlReader;
import org.stillpath.job.Node;
import org.stillpath.job.Sources;
import org.stillpath.problem.Problems;
import org.stillpath.task.ImageRow;
import org.stillpath.task.Tasks;

/** Studies of sightlines. */
class SightStudiesTest {
    private static final double ARCSEC = Math.toRadians(1 / 3600.0);

    private static Node.Mapping read(String yaml) {
        Problems problems = new Problems();
        Node.Mapping job = YamlReader.parse(yaml.getBytes(StandardCharsets.UTF_8), "job.yaml", problems);
        problems.throwIfAny();
        return job;
    }

    private static Outcome study(String yaml) {
        return Studies.run(read(yaml), Sources.none(), new Tasks.Options(false), Studies.Means.plain());
    }

    private static Doc at(Doc doc, String... path) {
        Doc here = doc;
        for (String step : path) {
            Doc next = here instanceof Doc.Fields f ? f.values().get(step) : null;
            assertThat(next).as(step).isNotNull();
            here = java.util.Objects.requireNonNull(next);
        }
        return here;
    }

    private static double number(Doc doc, String... path) {
        return ((Doc.Amount) at(doc, path)).value();
    }

    /** Over a hot road, the target 3 mm above the vanishing line, where the two images of a mirage meet. */
    @Test
    void theLinearBudgetIsNotBelievedBesideACaustic() {
        String road = """
                task: sightline
                wavelength: 0.55 um
                media:
                  road:
                    air:
                      law: iag-1999
                      temperature: T0 - 9.8 K/km*height + dT*exp(-height/delta)
                      pressure: {value: 1013.25 hPa, at-height: 0 m}
                    with: {T0: 303.15 K, dT: 12 K, delta: 10 cm}
                through: road
                earth: flat
                from: {height: 1.5 m}
                to: {distance: 800 m, height: %s m}
                study:
                  budget: {inputs: {media.road.with.dT: {standard: 0.25 K}}, samples: 400, seed: 7}
                  watch: [images.0.launch-elevation]
                """;
        Outcome beside = study(String.format(Locale.ROOT, road, 0.183));
        assertThat(at(beside.doc(), "budget", "images.0.launch-elevation", "monte-carlo", "agrees"))
                .isEqualTo(new Doc.Flag(false));
        assertThat(beside.result().warnings())
                .anyMatch(w -> w.contains("the linear budget of the launch elevation of image 0 is not valid"))
                // where the air is hotter the target sinks below the line and is not seen at all
                .anyMatch(w -> w.contains("samples") && w.contains("there is no launch elevation of image 0"));
        Outcome far = study(String.format(Locale.ROOT, road, 0.6));
        assertThat(far.result().warnings()).noneMatch(w -> w.contains("is not valid"));
    }

    private static final String LINE = """
            task: sightline
            wavelength: 0.55 um
            media:
              field:
                air:
                  law: iag-1999
                  temperature: T0 + lapse*height
                  pressure: {value: 1013.25 hPa, at-height: 0 m}
                with: {T0: 288.15 K, lapse: %s K/km}
            through: field
            earth: {radius: 6371 km}
            from: {height: 300 m}
            to: {distance: %s km, height: %s m}
            """;

    /** Three lines from one pillar, both zenith angles of each read with a standard uncertainty of one second of arc. */
    @Test
    void theLapseFollowsFromReciprocalAnglesOfSeveralLines() {
        double lapse = -8.2;
        double[] km = {6, 11, 17};
        double[] heights = {420, 810, 350};
        Random random = new Random(20_261_201);
        StringBuilder match = new StringBuilder();
        StringBuilder variants = new StringBuilder();
        StringBuilder exact = new StringBuilder();
        double weight = 0;
        for (int i = 0; i < 3; i++) {
            ImageRow image = Tasks.run(
                            read(String.format(Locale.ROOT, LINE, lapse, km[i], heights[i])),
                            Sources.none(),
                            new Tasks.Options(false))
                    .images()
                    .get(0);
            variants.append(String.format(
                    Locale.ROOT, "    line%d: {to.distance: %s km, to.height: %s m}%n", i, km[i], heights[i]));
            double[] angles = {image.launch(), -image.arrival()};
            String[] keys = {"launch-elevation", "back-elevation"};
            for (int j = 0; j < 2; j++) {
                String row = "      - {variant: line%d, result: images.0.%s, value: %.17g rad, standard: 1 arcsec}%n";
                exact.append(String.format(Locale.ROOT, row, i, keys[j], angles[j]));
                match.append(String.format(Locale.ROOT, row, i, keys[j], angles[j] + ARCSEC * random.nextGaussian()));
                // d(refraction)/d(lapse) = D/(2R) dk/d(lapse), dk/d(lapse) = 503 P/T^2 about 6.1 m/K
                weight += Math.pow(km[i] * 1e3 / (2 * 6_371_000) * 503 * 1013.25 / (288.15 * 288.15), 2);
            }
        }
        String fit = String.format(Locale.ROOT, LINE, -6.5, 6, 420)
                + "study:\n  fit:\n    unknowns: {media.field.with.lapse: {start: -6.5 K/km, low: -30 K/km, high: 30 K/km}}\n"
                + "    starts: 1\n    match:\n%s  variants:\n" + variants;
        String path = "media.field.with.lapse";
        Outcome known = study(fit.formatted(exact));
        assertThat(number(known.doc(), "fit", "unknowns", path, "value")).isCloseTo(lapse * 1e-3, within(1e-9));
        Outcome read = study(fit.formatted(match));
        double value = number(read.doc(), "fit", "unknowns", path, "value");
        double standard = number(read.doc(), "fit", "unknowns", path, "standard-uncertainty");
        assertThat(value).isCloseTo(lapse * 1e-3, within(3 * standard));
        // first order, from the textbook's k; the heights' thinner air takes some per cent
        assertThat(standard).isCloseTo(ARCSEC / Math.sqrt(weight), within(0.15 * standard));
    }
}
