package org.stillpath.task;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.List;
import java.util.Locale;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.stillpath.wave.Zernike;

/** Spots, aberrations, wavefronts and coupling of the task lens against closed forms and published values. */
class ImagingTest {
    private static final String HEAD = """
            task: lens
            wavelength: 587.56 nm
            accuracy: 1e-12
            media: {a: {index: 1}, b: {index: 1}, g: {index: 1.5}}
            """;

    private static final String BICONVEX = HEAD + """
            train:
              from: a
              surfaces:
                - {at: 0 mm, radius: 100 mm, into: g}
                - {at: 5 mm, radius: -100 mm, into: a}
            """;

    @Test
    void theEdgeRayOfABiconvexLens() {
        // n = 1.5, R = ±100 mm, d = 5 mm, h = 10 mm: paraxial and marginal back focus by an exact trace, two ways,
        // outside
        // the project
        Result r = Jobs.run(BICONVEX + "pupil: {radius: 10 mm}");
        assertThat(value(r, "back-focal-distance")).isCloseTo(99.15966386554622e-3, within(1e-14));
        assertThat(value(r, "longitudinal-aberration")).isCloseTo(-1.6362918268655906e-3, within(1e-14));
        double miss = value(r, "transverse-aberration");
        // the edge ray crosses the axis 97.523 mm behind the lens, at a slope of its height there over that
        assertThat(miss).isNegative();
        assertThat(miss / value(r, "longitudinal-aberration")).isCloseTo(0.10066, within(1e-4));
    }

    @Test
    void thirdOrderSphericalAberrationOfAThinLens() {
        // Jenkins & White, Fundamentals of Optics, ch. 9: 1/s'h − 1/s'p = h²/(8f³n(n−1))·[(n+2)/(n−1)q² + 4(n+1)pq +
        // (3n+2)(n−1)p² + n³/(n−1)] = 1.1667e-4 1/mm for n = 1.5, f = 100 mm, h = 10 mm, q = 1, p = −1; the best form
        // has
        // q = −2(n²−1)p/(n+2) = 5/7 (Coddington). Both are the limit for small heights and thickness, taken here by
        // extrapolation from real rays
        assertThat(thirdOrder(1)).isCloseTo(0.00011666666666666667e3, within(3e-6));
        double a = thirdOrder(0.2);
        double b = thirdOrder(0.7);
        double c = thirdOrder(1.2);
        double best = 0.7 + 0.5 * 0.5 * (a - c) / (a - 2 * b + c);
        assertThat(best).isCloseTo(0.7142857142857143, within(2e-4));
    }

    /** 1/s'h − 1/s'p of third order at h = 10 mm, 1/m, of a lens of 100 mm and a shape. */
    private static double thirdOrder(double q) {
        return 2 * ofThickness(q, 0.04) - ofThickness(q, 0.08);
    }

    private static double ofThickness(double q, double millimetres) {
        // LSA/h² = a + b·h²: from two heights
        double one = reciprocal(q, millimetres, 1) / 1;
        double half = reciprocal(q, millimetres, 0.5) / 0.25;
        return 100 * (4 * half - one) / 3;
    }

    private static double reciprocal(double q, double thickness, double h) {
        // 1/f = (n−1)(1/R1 − 1/R2), q = (R2 + R1)/(R2 − R1)
        double r1 = 2 * 0.5 * 100 / (q + 1);
        String second = q == 1 ? "" : String.format(Locale.ROOT, "radius: %.15f mm, ", 2 * 0.5 * 100 / (q - 1));
        Result r = Jobs.run(HEAD + String.format(Locale.ROOT, """
                train:
                  from: a
                  surfaces:
                    - {at: 0 mm, radius: %.15f mm, into: g}
                    - {at: %.3f mm, %sinto: a}
                pupil: {radius: %.3f mm, sampling: {radial: 2, angular: 4}}
                """, r1, thickness, second, h));
        double paraxial = value(r, "back-focal-distance");
        double edge = paraxial + value(r, "longitudinal-aberration");
        return 1 / edge - 1 / paraxial;
    }

    @Test
    void aSphericalMirrorAndItsEdge() {
        // R = 200 mm, h = 40 mm: the ray crosses the axis R − R/(2 cos θ) = 97.93792738403424 mm from the vertex, sin θ
        // = h/R
        Result r = Jobs.run(HEAD + """
                train: {from: a, surfaces: [{at: 0 mm, action: reflect, radius: -200 mm}]}
                pupil: {radius: 40 mm}
                """);
        assertThat(value(r, "longitudinal-aberration")).isCloseTo(97.93792738403424e-3 - 0.1, within(1e-13));
        assertThat(value(r, "best-focus")).isBetween(0.098, 0.1);
    }

    @Test
    void theAplanaticPointsOfASphereAreFreeOfAberration() {
        // Weierstrass (Born & Wolf 4.2.3): n = 1.5, R = 10 mm: an object R/n from the centre inside is imaged nR from
        // it
        Result r = Jobs.run(HEAD + """
                train: {from: g, surfaces: [{at: 0 mm, radius: -10 mm, into: a}]}
                object: {distance: 16.666666666666668 mm}
                pupil: {radius: 6 mm}
                """);
        assertThat(value(r, "image-distance")).isCloseTo(-25e-3, within(1e-14));
        assertThat(value(r, "longitudinal-aberration")).isCloseTo(0, within(1e-13));
        assertThat(value(r, "spot-radius-rms")).isLessThan(1e-14);
        assertThat(value(r, "wavefront-rms")).isLessThan(1e-15);
        assertThat(value(r, "strehl")).isCloseTo(1, within(1e-12));
        // Abbe's sine condition holds at these points: sin u / sin u' is constant, n m = sin u/sin u'·n/n'
        assertThat(value(r, "numerical-aperture-object") / value(r, "numerical-aperture"))
                .isCloseTo(value(r, "magnification"), within(1e-12));
    }

    @Test
    void aHyperboloidCollimatesWithoutAberration() {
        // Descartes: a plane and a hyperboloid of conic −n² bring a collimated beam to one point at R/(n − 1)
        Result r = Jobs.run(HEAD + """
                train:
                  from: a
                  surfaces: [{at: 0 mm, into: g}, {at: 10 mm, radius: -50 mm, conic: -2.25, into: a}]
                pupil: {radius: 15 mm}
                """);
        assertThat(value(r, "best-focus")).isCloseTo(0.1, within(1e-13));
        assertThat(value(r, "longitudinal-aberration")).isCloseTo(0, within(1e-12));
        assertThat(value(r, "wavefront-rms")).isLessThan(1e-14);
    }

    @Test
    void defocusOfAPerfectLensHasItsStrehlRatio() {
        // W020 = 0.2 waves: (sin πW/(πW))² = 0.8751402 (Born & Wolf 9.1). A sensor off the focus by δ makes W = ½NA²δ,
        // up to
        // terms of NA⁴
        double na = 0.01;
        double wavelength = 587.56e-9;
        double shift = 2 * 0.2 * wavelength / (na * na);
        Result r = Jobs.run(HEAD + String.format(Locale.ROOT, """
                train: {from: a, surfaces: [{at: 0 mm, lens: 100 mm}]}
                pupil: {radius: 1 mm}
                sensor: {at: %.12f mm}
                """, 1e3 * (0.1 + shift)));
        // the reference sphere is that of the sensor, and slopes are tangents: both make terms of δ/f
        assertThat(value(r, "strehl")).isCloseTo(0.8751402000833808, within(0.01));
        assertThat(value(r, "strehl-estimate")).isCloseTo(0.876696225849463, within(0.01));
        assertThat(value(r, "best-focus")).isCloseTo(0.1, within(1e-13));
        assertThat(value(r, "spot-radius-rms")).isCloseTo(na * shift / Math.sqrt(2), within(1e-12));
        // the share of a uniform spot grows with the square of its radius
        assertThat(value(r, "encircled-radius")).isCloseTo(na * shift * Math.sqrt(0.8), within(3e-7));
    }

    @Test
    void aSensorOffAxisSeesWhatThePerfectLensImages() {
        // an ideal lens maps planes to planes: no distortion, and lines stay lines
        Result r = Jobs.run(HEAD + """
                train: {from: a, surfaces: [{at: 0 mm, lens: 50 mm}]}
                object: {distance: 100 mm, height: [3 mm, 6 mm]}
                pupil: {radius: 4 mm}
                """);
        assertThat(value(r, "distortion")).isCloseTo(0, within(1e-13));
        assertThat(value(r, "line-departure")).isLessThan(1e-14);
        assertThat(value(r, "tangential-focus")).isCloseTo(0.1, within(1e-13));
        assertThat(value(r, "sagittal-focus")).isCloseTo(0.1, within(1e-13));
        assertThat(list(r, "spot-radius-rms-by-field")).hasSize(2);
    }

    @Test
    void distortionBendsALine() {
        // third-order distortion D moves the image of (x, y) by D(x² + y²)/h² times its place: a line y = h from −h to
        // h gets
        // the height h(1 + D(1 + t²)), t from −1 to 1, and the best line leaves 2/3 of D·h at its ends (mean of t²:
        // 1/3)
        Result r = Jobs.run(HEAD + """
                train:
                  from: a
                  surfaces: [{at: -20 mm, action: stop, aperture: 1 mm}, {at: 0 mm, lens: 60 mm}, {at: 5 mm, radius: 60 mm, into: g},
                             {at: 9 mm, into: a}]
                object: {infinity: true, field-angles: [0.5 deg]}
                pupil: {}
                """);
        double height = Double.parseDouble(
                r.tables().get(0).rows().get(0).get(r.tables().get(0).columns().indexOf("image-height [m]")));
        double d = value(r, "distortion");
        assertThat(Math.abs(d)).isGreaterThan(1e-6);
        // 21 points of even spacing: mean of t² is 0.36667
        assertThat(value(r, "line-departure"))
                .isCloseTo(Math.abs(d * height) * (1 - 11.0 / 30), within(0.02 * Math.abs(d * height)));
    }

    @Test
    void fociOfAnObliqueBeamAtOneSurface() {
        // Coddington's equations at a sphere of 40 mm into n = 1.5, chief ray at 20 deg through the vertex: n'cos²θ'/t'
        // =
        // n'/s' = (n'cosθ' − n cosθ)/R for a collimated beam (Welford, Aberrations of Optical Systems, 4.4; from
        // memory)
        double theta = Math.toRadians(20);
        double inner = Math.asin(Math.sin(theta) / 1.5);
        double power = (1.5 * Math.cos(inner) - Math.cos(theta)) / 0.04;
        Result r = Jobs.run(HEAD + """
                train: {from: a, surfaces: [{at: 0 mm, radius: 40 mm, into: g}]}
                object: {infinity: true, field-angles: [20 deg]}
                pupil: {radius: 1 mm}
                """);
        double cos = Math.cos(inner);
        assertThat(value(r, "tangential-focus")).isCloseTo(1.5 * cos * cos / power * cos, within(1e-12));
        assertThat(value(r, "sagittal-focus")).isCloseTo(1.5 / power * cos, within(1e-12));
    }

    @Test
    void thePathDifferenceDoesNotDependOnTheLastPlane() {
        // a plane that changes nothing moves the last vertex, hence the radius of the reference sphere: what that
        // changes is
        // of second order in the miss, ε²/2R, 7 pm for rays that miss by a micrometre
        String more = BICONVEX + "    - {at: 25 mm, into: b}\npupil: {radius: 3 mm}\n";
        Result one = Jobs.run(BICONVEX + "pupil: {radius: 3 mm}");
        Result two = Jobs.run(more);
        assertThat(value(two, "wavefront-rms")).isCloseTo(value(one, "wavefront-rms"), within(7e-12));
        assertThat(value(two, "strehl")).isCloseTo(value(one, "strehl"), within(1e-6));
        double[] a = list(one, "zernike");
        double[] b = list(two, "zernike");
        assertThat(b[10]).isCloseTo(a[10], within(7e-12));
    }

    @Test
    void aSymmetricSceneHasNoOddTerms() {
        Result r = Jobs.run(BICONVEX + "pupil: {radius: 10 mm}");
        double[] c = list(r, "zernike");
        for (int j = 1; j <= c.length; j++) {
            if (Zernike.mode(j).order() != 0) {
                assertThat(c[j - 1]).as("Z%d", j).isCloseTo(0, within(2e-16));
            }
        }
        assertThat(Math.abs(c[10])).isGreaterThan(1e-7);
    }

    @Test
    void aTurnedSceneTurnsTheCoefficients() {
        // the second surface tilted by 2 deg about an axis at 30 deg to the former one
        double turn = Math.toRadians(30);
        double tilt = Math.sin(Math.toRadians(2));
        double[] plain = tilted(Math.toRadians(2), 0);
        // the normal (0, −s, c) turned by 30 deg about z is (s sin, −s cos, c)
        double ay = Math.asin(tilt * Math.sin(turn));
        double ax = Math.asin(tilt * Math.cos(turn) / Math.cos(ay));
        double[] turned = tilted(ax, ay);
        for (int j = 4; j <= 10; j++) {
            Zernike.Mode mode = Zernike.mode(j);
            int m = Math.abs(mode.order());
            int other = mode.degree() == 2 ? 11 - j : mode.degree() == 3 && j < 9 ? 15 - j : 19 - j;
            double cosine = Math.cos(m * turn);
            double sine = mode.order() > 0 ? -Math.sin(m * turn) : Math.sin(m * turn);
            double expected = m == 0 ? plain[j - 1] : cosine * plain[j - 1] + sine * plain[other - 1];
            assertThat(turned[j - 1]).as("Z%d", j).isCloseTo(expected, within(1e-14));
        }
        assertThat(Math.abs(plain[6])).isGreaterThan(1e-7);
    }

    private static double[] tilted(double ax, double ay) {
        return list(Jobs.run(HEAD + String.format(Locale.ROOT, """
                train:
                  from: a
                  surfaces:
                    - {at: 0 mm, radius: 100 mm, into: g}
                    - {at: 5 mm, radius: -100 mm, into: a, tilt: [%.17f rad, %.17f rad]}
                pupil: {radius: 10 mm, sampling: {radial: 10, angular: 24}}
                sensor: {at: 103 mm}
                """, ax, ay)), "zernike");
    }

    @ParameterizedTest
    @ValueSource(strings = {"{radial: 10, angular: 25}", "{radial: 16, angular: 40}"})
    void averagesDoNotDependOnTheSampling(String sampling) {
        String job = """
                task: lens
                wavelength: 633 nm
                accuracy: 1e-12
                media: {rod: {index: 'n0*sqrt(1 - (g*r)^2)', with: {n0: 1.607, g: 0.304 1/mm}}}
                train: {from: air, surfaces: [{at: 0 mm, into: rod}, {at: 2.5 mm, into: air}]}
                object: {distance: 20 mm, height: 1 mm}
                pupil: {radius: 0.4 mm, sampling: %s}
                """;
        Result few = Jobs.run(job.formatted("{radial: 8, angular: 16}"));
        Result many = Jobs.run(job.formatted(sampling));
        for (String name : List.of("spot-radius-rms", "wavefront-rms", "strehl", "best-focus")) {
            assertThat(value(many, name)).as(name).isCloseTo(value(few, name), within(1e-9 * value(few, name)));
        }
    }

    @Test
    void theStopIsThePupil() {
        // a stop of 2 mm behind a lens of 50 mm by 10 mm: seen from the front a hole of 2/(1 − 10/50) mm
        Result r = Jobs.run(HEAD + """
                train: {from: a, surfaces: [{at: 0 mm, lens: 50 mm}, {at: 10 mm, action: stop, aperture: 2 mm}]}
                object: {infinity: true}
                """ + "pupil: {}");
        assertThat(value(r, "numerical-aperture")).isCloseTo(Math.sin(Math.atan(2.5 / 50)), within(1e-12));
        assertThat(value(r, "vignetting")).isZero();
        assertThat(r.warnings()).isEmpty();
    }

    @Test
    void vignettingIsToldWithItsPlace() {
        // half the pupil's area lies beyond 1/√2 of its radius
        Result r = Jobs.run(HEAD + """
                train: {from: a, surfaces: [{at: 0 mm, lens: 50 mm, aperture: 7.0710678 mm}]}
                pupil: {radius: 10 mm, sampling: {radial: 40, angular: 24}}
                """);
        assertThat(value(r, "vignetting")).isCloseTo(0.5, within(0.03));
        assertThat(r.warnings()).anyMatch(w -> w.contains("cut off") && w.contains("clipped at surfaces[0]"));
    }

    @Test
    void aCollimatedImageIsJudgedByItsDirections() {
        // an object in the focus of an ideal lens: no spot, no best focus, a plane wave
        Result r = Jobs.run(HEAD + """
                train: {from: a, surfaces: [{at: 0 mm, lens: 50 mm}]}
                object: {distance: 50 mm, height: 1 mm}
                pupil: {radius: 5 mm}
                """);
        assertThat(r.quantities()).doesNotContainKeys("spot-radius-rms", "best-focus", "distortion");
        assertThat(value(r, "angular-radius-rms")).isLessThan(1e-14);
        assertThat(value(r, "strehl")).isCloseTo(1, within(1e-10));
    }

    @Test
    void aRodsPitchAndAperture() {
        // pitch g L/2π; on the axis the sine of the largest angle is √(n0² − n(a)²) = n0·g·a for this profile
        Result r = Jobs.run("""
                task: lens
                wavelength: 633 nm
                media: {rod: {index: 'n0*sqrt(1 - (g*r)^2)', with: {n0: 1.607, g: 0.304 1/mm}}}
                train: {from: air, surfaces: [{at: 0 mm, into: rod, aperture: 0.9 mm}, {at: 2.5 mm, into: air, aperture: 0.9 mm}]}
                """);
        assertThat(value(r, "pitch")).isCloseTo(0.304 * 2.5 / (2 * Math.PI), within(1e-14));
        assertThat(value(r, "gradient-numerical-aperture")).isCloseTo(1.607 * 0.304 * 0.9, within(1e-13));
    }

    @Test
    void fibresEndToEnd() {
        // Marcuse 1977 (5.2 and 4.6 µm, aligned and 2 µm apart); Joyce & DeLoach 1984 (1 deg of tilt, where their
        // formula has
        // the angle for its sine; 50 µm of gap); recomputed outside the project
        assertThat(coupling("0 mm", "receiver-mode-radius: 4.6 um")).isCloseTo(0.9851180248273962, within(1e-12));
        assertThat(coupling("0 mm", "receiver-mode-radius: 4.6 um, offset: [0, 2 um]"))
                .isCloseTo(0.8344612878733606, within(1e-12));
        assertThat(coupling("0 mm", "tilt: [0, 1 deg]")).isCloseTo(0.9667286227252543, within(4e-6));
        assertThat(coupling("0 mm", "tilt: [1 deg, 0]")).isCloseTo(0.9667286227252543, within(4e-6));
        assertThat(coupling("50 um", "offset: [0, 0]")).isCloseTo(0.8277597659241819, within(1e-12));
    }

    private static double coupling(String distance, String more) {
        Result r = Jobs.run("""
                task: lens
                wavelength: 1.55 um
                media: {a: {index: 1}, b: {index: 1}}
                train: {from: a, surfaces: [{at: 0 mm, into: b}]}
                object: {distance: %s}
                sensor: {at: 0 mm}
                fibres: {mode-radius: 5.2 um, %s}
                """.formatted(distance, more));
        double efficiency = value(r, "coupling-efficiency");
        assertThat(value(r, "coupling-loss")).isCloseTo(-10 * Math.log10(efficiency), within(1e-12));
        return efficiency;
    }

    @Test
    void anAfocalPairOfRodsPassesALightOnWithoutLoss() {
        // two quarter-pitch rods, face to face: a half pitch, which images one end on the other at −1: no loss; a
        // receiver off
        // by 2 µm loses what two equal modes 2 µm apart lose, exp(−d²/w²)
        Result r = Jobs.run("""
                task: lens
                wavelength: 1.55 um
                accuracy: 1e-12
                media: {rod: {index: 'n0*sqrt(1 - (g*r)^2)', with: {n0: 1.6, g: 0.3 1/mm}}, a: {index: 1}}
                train: {from: a, surfaces: [{at: 0 mm, into: rod}, {at: 10.471975511965978 mm, into: a}]}
                object: {distance: 0 mm, height: 3 um}
                sensor: {at: 10.471975511965978 mm}
                fibres: {mode-radius: 5.2 um, offset: [2 um, 0]}
                """);
        assertThat(value(r, "coupling-efficiency")).isCloseTo(Math.exp(-4 / (5.2 * 5.2)), within(1e-9));
    }

    @Test
    void faultsSayWhatIsMissing() {
        assertThat(Jobs.faults(BICONVEX + "pupil: {sampling: {radial: 4, angular: 8}}\n")
                        .get(0))
                .contains("needs a radius");
        assertThat(Jobs.faults(BICONVEX + "fibres: {mode-radius: 5 um}\n").get(0))
                .contains("object");
        assertThat(Jobs.faults(BICONVEX + "figures: [spot]\n").get(0)).contains("pupil");
        assertThat(Jobs.faults(BICONVEX + "figures: [chromatic]\n").get(0)).contains("two wavelengths");
        assertThat(Jobs.faults(BICONVEX + "object: {infinity: true, field-angles: [95 deg]}\n")
                        .get(0))
                .contains("90 deg");
        assertThat(Jobs.faults(BICONVEX + "object: {distance: 0 mm}\npupil: {radius: 1 mm}\n")
                        .get(0))
                .contains("first vertex");
    }

    @Test
    void figuresAndTablesAreThere() {
        Result r = Jobs.run(
                BICONVEX.replace("587.56 nm", "[587.56 nm, 486 nm]")
                        + "object: {infinity: true, field-angles: [0, 2 deg]}\npupil: {radius: 5 mm}\n",
                true);
        assertThat(r.figures().stream().map(Figure::name))
                .containsExactly("rays", "spot", "wavefront", "aberration", "focus", "zernike", "chromatic");
        assertThat(r.tables().stream().map(Table::name)).containsExactly("fields", "aberration", "zernike");
        assertThat(r.tables().get(0).rows()).hasSize(4);
        assertThat(r.cautions()).anyMatch(c -> c.contains("IEC 60825-1") && c.contains("class"));
        assertThat(r.cautions()).anyMatch(c -> c.contains("no diagnosis"));
    }

    static double value(Result r, String name) {
        Quantity q = r.quantities().get(name);
        assertThat(q).as(name).isInstanceOf(Quantity.Amount.class);
        return q instanceof Quantity.Amount a ? a.value() : Double.NaN;
    }

    private static double[] list(Result r, String name) {
        Quantity q = r.quantities().get(name);
        assertThat(q).as(name).isInstanceOf(Quantity.Amounts.class);
        return q instanceof Quantity.Amounts a ? a.values() : new double[0];
    }
}
