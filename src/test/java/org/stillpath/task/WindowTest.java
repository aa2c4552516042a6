package org.stillpath.task;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.nio.charset.StandardCharsets;
import java.nio.file.Path;
import java.util.List;
import java.util.Objects;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;
import org.stillpath.io.FileSources;
import org.stillpath.io.YamlReader;
import org.stillpath.job.Node;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;

/** The task {@code window} in limits that are known otherwise, and its laws of symmetry. */
class WindowTest {
    private static final double LENGTH = 10e-3;

    /** A plate of fused silica of constants of its own, free, 10 mm thick, 50 mm across, in vacuum. */
    private static String plate(String temperature, String with) {
        return """
                task: window
                wavelength: 1064.15 nm
                accuracy: 1e-11
                media:
                  plate:
                    solid:
                      material: fused-silica
                      temperature: %s
                      expansion: free
                      diameter: 50 mm
                      dn-dt: 9.6e-6 1/K
                      expansion-coefficient: 0.55e-6 1/K
                      poisson-ratio: 0.17
                    with: {T0: 20 degC, %s}
                train:
                  from: vacuum
                  surfaces:
                    - {at: 0 mm, into: plate}
                    - {at: 10 mm, into: vacuum}
                beam: {diameter: 20 mm, profile: uniform}
                sampling: {radial: 8, angular: 16}
                reference: {temperature: 20 degC}
                """.formatted(temperature, with);
    }

    private static Result run(String yaml) {
        Problems problems = new Problems();
        Node.Mapping job = YamlReader.parse(yaml.getBytes(StandardCharsets.UTF_8), "job.yaml", problems);
        problems.throwIfAny();
        return Tasks.run(job, FileSources.of(Path.of("job.yaml"), false), new Tasks.Options(false));
    }

    private static List<String> faults(String yaml) {
        try {
            run(yaml);
            return List.of();
        } catch (ProblemException e) {
            return e.problems().stream().map(Problem::toString).toList();
        }
    }

    private static double value(Result r, String name) {
        return ((Quantity.Amount) Objects.requireNonNull(r.quantities().get(name))).value();
    }

    private static double[] amounts(Result r, String name) {
        return ((Quantity.Amounts) Objects.requireNonNull(r.quantities().get(name))).values();
    }

    private static double[] zernike(Result r) {
        return amounts(r, "zernike");
    }

    /** n of fused silica at 1064.15 nm, 20 °C, absolute: 1.4496291900930955 (Malitson 1965, relative) times air. */
    private static double index() {
        return 1.4496291900930955 * (1 + 2.7e-4);
    }

    /** A uniformly warm free plate changes by L[dn/dT + (n − 1)α]ΔT and is free of stress. */
    @Test
    void warmPlateGrowsAndNoMore() {
        Result r = run(plate("T1", "T1: 35 degC"));
        double alpha = 0.55e-6;
        double expected = LENGTH * (9.6e-6 + (index() - 1) * alpha) * 15;
        // second order: both the index and the thickness change, 15 K α dn/dT
        assertThat(value(r, "optical-path-difference")).isCloseTo(expected, within(3e-5 * expected));
        assertThat(value(r, "wavefront-rms")).isCloseTo(0, within(1e-15));
        assertThat(value(r, "strehl")).isCloseTo(1, within(1e-12));
        assertThat(value(r, "focal-power")).isCloseTo(0, within(1e-11));
    }

    /** A linear temperature leaves a free plate without stress: prism of the index and of the wedge, without 1 + ν. */
    @Test
    void linearTemperatureIsAWedge() {
        Result r = run(plate("T0 + k*x", "k: 0.1 K/mm"));
        double k = 100;
        double expected = LENGTH * k * (9.6e-6 + (index() - 1) * 0.55e-6);
        assertThat(value(r, "deviation-x")).isCloseTo(expected, within(2e-4 * expected));
        assertThat(value(r, "deviation-y")).isCloseTo(0, within(1e-14));
    }

    /**
     * Thermal lens of a parabolic temperature, ΔT = −b r², with f = 1/(2bLΓ), Γ = dn/dT + (n − 1)(1 + ν)α; the published
     * set of the constants gives Γ = 9.889336383824906e-6 1/K (Klein 1990; Sparks 1971), and f = 101119.01963771903 mm with
     * b = 0.05 K/mm² and L = 10 mm (both recomputed from the published formula).
     */
    @Test
    void parabolicTemperatureIsALens() {
        Result r = run(plate("T0 - b*r^2", "b: 0.05 K/mm^2")
                .replace("diameter: 20 mm", "diameter: 2 mm")
                .replace("reference: {temperature: 20 degC}", "reference: none"));
        double f = 101.11901963771903;
        // the formula's n is relative to air, and the plate's second order is of the size of its OPD over L
        assertThat(value(r, "focal-length")).isCloseTo(f, within(2e-4 * f));
        assertThat(1 / value(r, "focal-power-fit")).isCloseTo(f, within(2e-4 * f));
        assertThat(value(r, "focal-power-x")).isCloseTo(value(r, "focal-power-y"), within(1e-11));
    }

    /** Deviation by a gradient across (n linear): asin(n₀ sinh(gL/n₀)), 0.010000245949028975 (catenary ray). */
    @Test
    void wedgeGradientDeviates() {
        String job = """
                task: window
                wavelength: 1064 nm
                accuracy: 1e-12
                media: {plate: {index: n0 + g*x, with: {n0: 1.45, g: %s}}}
                train: {from: vacuum, surfaces: [{at: 0 mm, into: plate}, {at: 10 mm, into: vacuum}]}
                beam: {diameter: 1 um, profile: uniform}
                sampling: {radial: 3, angular: 6}
                """;
        assertThat(value(run(job.formatted("1e-3 1/mm")), "deviation-x")).isCloseTo(0.010000245949028975, within(1e-9));
        // small: L dn/dx, 0.1 mrad for 1e-5 per mm and 10 mm
        assertThat(value(run(job.formatted("1e-5 1/mm")), "deviation-x")).isCloseTo(1e-4, within(1e-9));
    }

    /** Snell's law at a tilted back face: asin(n sin a) − a, toward the thick end; and at a tilted plate none. */
    @Test
    void wedgeAndTiltedPlate() {
        String job = """
                task: window
                wavelength: 1064 nm
                accuracy: 1e-12
                media: {plate: {index: 1.5}}
                train: {from: vacuum, surfaces: [{at: 0 mm, into: plate %s}, {at: 10 mm, into: vacuum %s}]}
                beam: {diameter: 4 mm, profile: uniform}
                incidence: %s
                """;
        double a = Math.toRadians(2);
        Result wedge = run(job.formatted("", ", tilt: [2 deg, 0]", "0"));
        assertThat(Math.abs(value(wedge, "deviation-y"))).isCloseTo(Math.asin(1.5 * Math.sin(a)) - a, within(1e-12));
        assertThat(value(wedge, "deviation-x")).isCloseTo(0, within(1e-14));
        assertThat(value(wedge, "wavefront-rms")).isLessThan(1e-15);
        double t = Math.toRadians(30);
        double inside = Math.asin(Math.sin(t) / 1.5);
        Result oblique = run(job.formatted("", "", "30 deg"));
        assertThat(value(oblique, "deviation-y")).isCloseTo(0, within(1e-14));
        assertThat(value(oblique, "displacement-y"))
                .isCloseTo(LENGTH * (Math.tan(inside) - Math.tan(t)), within(1e-14));
        // path less that of the straight beam: L (n cos t' − cos t)
        assertThat(value(oblique, "optical-path-difference"))
                .isCloseTo(LENGTH * (1.5 * Math.cos(inside) - Math.cos(t)), within(1e-14));
        Result tilted = run(job.formatted(", tilt: [-30 deg, 0]", ", tilt: [-30 deg, 0]", "0"));
        assertThat(value(tilted, "deviation-y")).isCloseTo(0, within(1e-13));
    }

    /** What the plane is put on which the beam is judged does not matter, in the small-signal limit. */
    @Test
    void doesNotDependOnTheReferencePlane() {
        String job = plate("T0 + dT*exp(-2*((x - s)^2 + y^2)/w^2)", "dT: 1 K, w: 12 mm, s: 2 mm");
        String farther = job.replace(
                "    - {at: 10 mm, into: vacuum}", "    - {at: 10 mm, into: vacuum}\n    - {at: 60 mm, into: vacuum}");
        double[] near = zernike(run(job));
        double[] far = zernike(run(farther));
        for (int j = 0; j < near.length; j++) {
            assertThat(far[j]).as("Noll " + (j + 1)).isCloseTo(near[j], within(2e-12));
        }
    }

    /** A scene that is symmetric about the axis has no terms but the round ones, and equal powers in both sections. */
    @Test
    void symmetricScenesHaveNoOddTerms() {
        double[] c = zernike(run(plate("T0 + dT*exp(-2*r^2/w^2)", "dT: 15 K, w: 8 mm")));
        for (int j = 1; j <= c.length; j++) {
            if (j != 1 && j != 4 && j != 11 && j != 22) {
                assertThat(c[j - 1]).as("Noll " + j).isCloseTo(0, within(2e-16));
            }
        }
        assertThat(Math.abs(c[3])).isGreaterThan(1e-8);
    }

    /** A scene that is turned by 30° turns its astigmatism by that angle, and leaves what is round. */
    @Test
    void turnsWithTheScene() {
        String along = "T0 + dT*exp(-2*(x^2/u^2 + y^2/w^2))";
        String turned = "T0 + dT*exp(-2*((x*c + y*s)^2/u^2 + (y*c - x*s)^2/w^2))";
        String with = "dT: 5 K, u: 8 mm, w: 12 mm";
        double angle = Math.toRadians(30);
        double[] a = zernike(run(plate(along, with).replace("angular: 16", "angular: 24")));
        double[] b = zernike(run(plate(turned, with + ", c: " + Math.cos(angle) + ", s: " + Math.sin(angle))
                .replace("angular: 16", "angular: 24")));
        // Noll 5 goes with sin 2θ, 6 with cos 2θ
        assertThat(b[3]).isCloseTo(a[3], within(1e-13));
        assertThat(b[10]).isCloseTo(a[10], within(1e-13));
        assertThat(b[5]).isCloseTo(a[5] * Math.cos(2 * angle), within(1e-13));
        assertThat(b[4]).isCloseTo(a[5] * Math.sin(2 * angle), within(1e-13));
    }

    @ParameterizedTest
    @ValueSource(strings = {"uniform", "gaussian"})
    void rmsDoesNotDependOnTheSampling(String profile) {
        String job = plate("T0 + dT*exp(-2*((x - s)^2 + y^2)/w^2)", "dT: 5 K, w: 8 mm, s: 1 mm")
                .replace("profile: uniform", "profile: " + profile)
                .replace("diameter: 20 mm", "diameter: 10 mm");
        Result few = run(job.replace("radial: 8, angular: 16", "radial: 10, angular: 20"));
        Result many = run(job.replace("radial: 8, angular: 16", "radial: 16, angular: 36"));
        for (String q : List.of("wavefront-rms", "wavefront-rms-refocused", "strehl", "focal-power-fit")) {
            assertThat(value(few, q)).as(q).isCloseTo(value(many, q), within(1e-9 * Math.abs(value(many, q)) + 1e-15));
        }
    }

    /** The OPD of hot air before a cold window: ∫(n − n₀) dz with Ciddor's dn/dT of about −0.9e-6 1/K. */
    @Test
    void hotAirIsOneMoreMedium() {
        Result r = run("""
                task: window
                wavelength: 1064 nm
                media:
                  warm: {air: {temperature: 70 degC, pressure: 1013.25 hPa}}
                  plate: {solid: {material: fused-silica}}
                train:
                  from: vacuum
                  surfaces: [{at: 0 mm, into: warm}, {at: 100 mm, into: plate}, {at: 110 mm, into: vacuum}]
                beam: {diameter: 20 mm}
                reference: {temperature: 20 degC}
                """);
        // refractivity falls as 1/T: 2.69e-4 · (293.15/343.15 − 1) · 100 mm, a tenth of a percent off for
        // compressibility
        double expected = 2.69e-4 * (293.15 / 343.15 - 1) * 0.1;
        assertThat(value(r, "optical-path-difference")).isCloseTo(expected, within(5e-3 * Math.abs(expected)));
    }

    @Test
    void severalWavelengthsAreHeldAgainstTheFirst() {
        Result r = run(plate("T0 + k*x", "k: 0.1 K/mm")
                .replace("wavelength: 1064.15 nm", "wavelength: [1064.15 nm, 532 nm]")
                .replace("      dn-dt: 9.6e-6 1/K\n", ""));
        double[] shift = amounts(r, "chromatic-deviation-x");
        assertThat(shift[0]).isEqualTo(0);
        assertThat(shift[1]).isGreaterThan(1e-7);
        assertThat(r.tables()).extracting(Table::name).contains("wavefront", "zernike", "wavelengths");
    }

    @Test
    void clippedBeamsAreToldAndJudgedByWhatComesThrough() {
        Result r = run(plate("T0", "dT: 1 K").replace("into: plate}", "into: plate, aperture: 5 mm}"));
        // a quarter of the area, as far as eight rings tell
        assertThat(value(r, "passed-fraction")).isCloseTo(0.25, within(1.0 / 8));
        assertThat(r.warnings()).anyMatch(w -> w.contains("does not come through") && w.contains("clipped"));
        Result none = run(plate("T0", "dT: 1 K")
                .replace("into: plate}", "into: plate, aperture: 5 mm}")
                .replace("profile: uniform", "profile: uniform, centre: [40 mm, 0]"));
        assertThat(none.headline()).contains("No ray");
        assertThat(value(none, "passed-fraction")).isEqualTo(0);
    }

    @Test
    void tellsWhatIsOutsideItsRange() {
        Result r = run(plate("T1", "T1: 400 degC").replace("1064.15 nm", "4 um"));
        assertThat(r.warnings())
                .anyMatch(w -> w.contains("400 degC") && w.contains("outside the range of fused-silica"))
                .anyMatch(w -> w.contains("4000 nm") && w.contains("210 nm to 3710 nm"));
        assertThat(r.cautions()).anyMatch(c -> c.contains("burn"));
        Result far = run(
                plate("T0 + dT*exp(-2*r^2/w^2)", "dT: 15 K, w: 8 mm").replace("diameter: 20 mm", "diameter: 60 mm"));
        assertThat(far.warnings()).anyMatch(w -> w.contains("beyond the plate"));
        assertThat(far.cautions())
                .anyMatch(c -> c.contains("Stress birefringence"))
                .anyMatch(c -> c.contains("EN 207"))
                .anyMatch(c -> c.contains("break"));
    }

    @ParameterizedTest
    @CsvSource(
            delimiter = '|',
            value = {
                "      diameter: 50 mm             |                                  | needs its `diameter`",
                "material: fused-silica            | material: fused-silicon          | did you mean",
                "profile: uniform                  | profile: uniform, truncate: 1.5  | belongs to `profile: gaussian`",
                "profile: uniform                  | profile: gaussian, truncate: 9   | no light",
                "reference: {temperature: 20 degC} | reference: cold                  | none",
                "reference: {temperature: 20 degC} | reference: {temperature: 20 mm}  | a temperature is needed",
                "reference: {temperature: 20 degC} | incidence: 90 deg                | -89 deg to 89 deg",
                "poisson-ratio: 0.17               | poisson-ratio: 0.7               | between -1 and 0.5",
                "dn-dt: 9.6e-6 1/K                 | dn-dt: 9.6e-6                    | is needed"
            })
    void tellsWhatIsWrong(String from, String to, String message) {
        String job = plate("T1", "T1: 35 degC");
        String line = from.strip().startsWith("diameter") ? "      diameter: 50 mm\n" : from.strip();
        List<String> faults = faults(job.replace(line, to == null ? "" : to.strip()));
        assertThat(faults).isNotEmpty().anyMatch(f -> f.contains(message.strip()));
    }
}
