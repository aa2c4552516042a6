package org.stillpath.task;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.List;
import java.util.Objects;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.stillpath.geometry.Vector;

class TasksTest {
    private static final String TRACE = """
            task: trace
            media: {glass: {index: 1.5}}
            train: {from: vacuum, surfaces: [{at: 0 mm, into: glass}]}
            stop-at: {z: 10 mm}
            """;

    @ParameterizedTest
    @CsvSource(
            delimiter = '|',
            value = {
                "{at: 0 mm, into: glas}                           | job.yaml:3:48 | did you mean \"glass\"",
                "{at: 0 mm, into: glass, aperture: -1 mm}         | job.yaml:3:65 | must be greater than 0",
                "{at: 0 mm, into: glass, apperture: 1 mm}         | job.yaml:3:55 | aperture",
                "{at: 0 mm, into: glass, radius: 0 mm}            | job.yaml:3:63 | leave \"radius\" out",
                "{at: 0 mm, into: glass, whole: true}             | job.yaml:3:62 | a plane has no other side",
                "{at: 0 mm, into: glass, tilt: [1 mm, 0]}         | job.yaml:3:62 | an angle is needed",
                "{at: 0 mm, into: glass, powers: {3: 1 1/mm^2}}   | job.yaml:3:67 | even power",
                "{at: 0 mm, into: glass, powers: {4: 1 1/mm^2}}   | job.yaml:3:67 | is needed",
                "{gap: 1 mm, into: glass}                         | job.yaml:3:37 | no vertex before it",
                "{at: 0 mm}                                       | job.yaml:3:31 | says nothing of what it does",
                "{at: 0 mm, lens: 0 mm}                           | job.yaml:3:48 | no lens",
                "{at: 0 mm, action: stop, into: glass}            | job.yaml:3:62 | leave \"into\" out",
                "{at: 2 mm, into: glass}, {at: 1 mm, into: vacuum} | job.yaml:3:56 | put them in order"
            })
    void tellsWhatIsWrongWithASurface(String surfaces, String place, String message) {
        String job = """
                task: lens
                media: {glass: {index: 1.5}}
                train: {from: vacuum, surfaces: [%s]}
                """.formatted(surfaces.trim());
        List<String> faults = Jobs.faults(job);
        assertThat(faults).hasSize(1);
        assertThat(faults.get(0)).contains(message.trim());
        assertThat(faults.get(0)).startsWith("job.yaml:3:");
    }

    @Test
    void tellsThatTwoSurfacesCross() {
        List<String> faults = Jobs.faults("""
                task: lens
                media: {glass: {index: 1.5}}
                train:
                  from: vacuum
                  surfaces:
                    - {at: 0 mm, into: glass, radius: 10 mm, aperture: 6 mm}
                    - {at: 1 mm, into: vacuum, radius: -10 mm, aperture: 6 mm}
                """);
        assertThat(faults).hasSize(1);
        assertThat(faults.get(0)).startsWith("job.yaml:7:").contains("crosses train.surfaces[0]");
    }

    @Test
    void tellsAllFaultsAtOnce() {
        List<String> faults =
                Jobs.faults("task: lens\naccuracy: 2\nwavelength: 5 kg\ntrain: {from: glass, surfaces: []}\n");
        assertThat(faults).hasSize(4);
    }

    @Test
    void refusesTasksThatItDoesNotKnow() {
        assertThat(Jobs.faults("task: trac\nthrough: vacuum\n").get(0)).contains("did you mean \"trace\"");
    }

    @Test
    void spreadsAFanFromMinusToPlus() {
        Result r = Jobs.run("""
                task: trace
                through: vacuum
                rays: [{fan: {from: [0, 0, 0], around: [0, 0, 1], in: yz, half-angle: 45 deg, count: 3}}]
                stop-at: {z: 1 m}
                """);
        assertThat(r.rays()).hasSize(3);
        assertThat(r.rays().get(0).position().y()).isCloseTo(-1, within(1e-15));
        assertThat(r.rays().get(1).position().y()).isCloseTo(0, within(1e-15));
        assertThat(r.rays().get(2).position().y()).isCloseTo(1, within(1e-15));
        assertThat(r.rays().get(2).travelTime()).isCloseTo(Math.sqrt(2) / 299792458, within(1e-23));
    }

    @Test
    void fillsABundleAndABeam() {
        Result r = Jobs.run("""
                task: trace
                through: vacuum
                rays:
                  - {bundle: {from: [0, 0, 0], around: [0, 0, 1], half-angle: 45 deg, sampling: {radial: 3, angular: 4}}}
                  - {beam: {along: [0, 0, 1], centre: [1 m, 0, 0], across: y, half-width: 1 m, sampling: {radial: 3, angular: 4}}}
                stop-at: {z: 1 m}
                """);
        assertThat(r.rays()).hasSize(24);
        // ρ² are the Gauss points of [0, 1] for three points: ½(1 − √(3/5)), ½, ½(1 + √(3/5)) (Abramowitz and Stegun
        // 25.4.30)
        for (int i = 0; i < 3; i++) {
            double rho = Math.sqrt(0.5 * (1 + (i - 1) * Math.sqrt(0.6)));
            Vector first = r.rays().get(4 * i).position();
            assertThat(first.x()).isCloseTo(rho, within(1e-14));
            assertThat(r.rays().get(12 + 4 * i).position().x()).isCloseTo(1 + rho, within(1e-14));
            assertThat(r.rays().get(4 * i + 1).position().y()).isCloseTo(rho, within(1e-14));
        }
    }

    @Test
    void endsRaysHonestly() {
        Result r = Jobs.run("""
                task: trace
                media:
                  glass: {index: 1.5}
                  rod: {index: "1.5*sqrt(1 - (g*r)^2)", with: {g: 0.1 1/mm}, valid: r < 2 mm}
                train:
                  from: glass
                  surfaces:
                    - {at: 0 mm, into: vacuum, aperture: 1 mm}
                    - {at: 1 mm, into: rod}
                rays:
                  - {from: [0, 2 mm, -1 mm], direction: [0, 0, 1]}
                  - {from: [0, 0, -1 mm], direction: [0, 0.9, 1]}
                  - {from: [0, 0, -1 mm], direction: [0, 0, -1]}
                  - {from: [0, 0, -1 mm], direction: [0, 0.5, 1]}
                  - {from: [0, 0, -1 mm], direction: [0, 0.01, 1]}
                stop-at: {z: 40 mm}
                """);
        assertThat(r.rays().stream().map(RayRow::status))
                .containsExactly("clipped", "totally-reflected", "missed", "outside", "arrived");
        assertThat(r.rays().get(3).note()).contains("r < 2 mm");
        assertThat(Math.hypot(
                        r.rays().get(3).position().x(),
                        r.rays().get(3).position().y()))
                .isCloseTo(2e-3, within(1e-12));
        assertThat(r.headline()).isEqualTo("1 of 5 rays arrived");
    }

    @Test
    void endsARayWhereTheFormulaHasNoValue() {
        Result r = Jobs.run("""
                task: trace
                media: {odd: {index: "1 + sqrt(1 - z/(10 mm))"}}
                through: odd
                rays: [{from: [0, 1 mm, 0], direction: [0, 0, 1]}]
                stop-at: {z: 20 mm}
                """);
        assertThat(r.rays().get(0).status()).isEqualTo("outside");
        assertThat(r.rays().get(0).note()).contains("square root").contains("10");
        assertThat(r.rays().get(0).position().z()).isCloseTo(10e-3, within(1e-9));
    }

    @Test
    void drawsWhatWasAskedFor() {
        Result r = Jobs.run("""
                task: lens
                media: {glass: {index: 1.5}}
                train: {from: vacuum, surfaces: [{at: 0 mm, radius: 50 mm, into: glass}, {at: 5 mm, into: vacuum}]}
                object: {distance: 200 mm, height: 5 mm}
                """, true);
        assertThat(r.figures().stream().map(Figure::name)).containsExactly("rays", "construction");
        SectionFigure construction = (SectionFigure) r.figures().get(1);
        double image = 5e-3 + amount(r, "image-distance");
        double height = 5e-3 * amount(r, "magnification");
        // all principal rays of the construction meet at the tip of the image
        construction.lines().stream()
                .filter(l -> l.role() == SectionFigure.Role.PRINCIPAL_RAY)
                .forEach(l -> {
                    int n = l.u().length;
                    double slope = (l.v()[n - 1] - l.v()[n - 2]) / (l.u()[n - 1] - l.u()[n - 2]);
                    assertThat(l.v()[n - 2] + slope * (image - l.u()[n - 2])).isCloseTo(height, within(1e-12));
                });
    }

    @Test
    void needsAPlaceToStop() {
        assertThat(Jobs.faults(TRACE.replace("z: 10 mm", "") + "rays: [{from: [0, 0, 0], direction: [0, 0, 1]}]\n")
                        .get(0))
                .contains("one place to stop at is needed");
        assertThat(Jobs.faults(TRACE).get(0)).contains("\"rays\" is missing");
    }

    private static double amount(Result r, String name) {
        Quantity q = r.quantities().get(name);
        assertThat(q).isInstanceOf(Quantity.Amount.class);
        return ((Quantity.Amount) Objects.requireNonNull(q)).value();
    }
}
