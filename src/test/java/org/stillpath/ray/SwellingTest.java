package org.stillpath.ray;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.nio.charset.StandardCharsets;
import java.nio.file.Path;
import java.util.Optional;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.stillpath.geometry.Displaced;
import org.stillpath.geometry.Frame;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.io.FileSources;
import org.stillpath.io.YamlReader;
import org.stillpath.job.Section;
import org.stillpath.medium.MediaReader;
import org.stillpath.medium.SolidMedium;
import org.stillpath.problem.Problems;

/** How a free plate bulges: limits that plane stress gives, and derivatives. */
class SwellingTest {
    private static final double ALPHA = 0.55e-6;
    private static final double POISSON = 0.17;
    private static final double THICK = 10e-3;
    private static final double RADIUS = 25e-3;

    private static SolidMedium plate(String temperature) {
        String yaml = """
                plate:
                  solid:
                    material: fused-silica
                    temperature: %s
                    expansion: free
                    diameter: 50 mm
                    expansion-coefficient: 0.55e-6 1/K
                    poisson-ratio: 0.17
                  with: {T0: 20 degC, k: 0.1 K/mm, dT: 15 K, w: 6 mm, b: 0.01 K/mm^2}
                """.formatted(temperature);
        Problems problems = new Problems();
        Section media = Section.of(
                YamlReader.parse(yaml.getBytes(StandardCharsets.UTF_8), "job.yaml", problems), "media", problems);
        SolidMedium solid =
                (SolidMedium) MediaReader.read(Optional.of(media), FileSources.of(Path.of("job.yaml"), false), problems)
                        .find("plate")
                        .orElseThrow();
        assertThat(problems.list()).isEmpty();
        return solid;
    }

    private static Swelling swelling(String temperature) {
        return new Swelling(plate(temperature), Frame.JOB, Surface.plane(0), Surface.plane(THICK)).settled();
    }

    private static double at(Swelling s, double x, double y) {
        double[] b = new double[6];
        assertThat(s.jet(x, y, b)).isTrue();
        return b[0];
    }

    @Test
    void uniformAndLinearTemperaturesLeaveNoStress() {
        assertThat(at(swelling("T0 + dT"), 3e-3, 4e-3)).isCloseTo(ALPHA * THICK * 15, within(1e-20));
        Swelling linear = swelling("T0 + k*x - 0.5*k*y");
        assertThat(at(linear, 3e-3, 4e-3)).isCloseTo(ALPHA * THICK * 100 * (3e-3 - 2e-3), within(1e-20));
        // harmonic of the second order: xy
        Swelling saddle = swelling("T0 + b*x*y");
        assertThat(at(saddle, 3e-3, 4e-3)).isCloseTo(ALPHA * THICK * 1e4 * 12e-6, within(1e-20));
    }

    /** (1 + ν)α about the mean over the disc, which of b r² is b a²/2, and α for the mean itself. */
    @Test
    void roundTemperaturesBulgeMoreAboutTheirMean() {
        Swelling s = swelling("T0 + b*r^2");
        double b = 1e4;
        double mean = 0.5 * b * RADIUS * RADIUS;
        for (double r : new double[] {0, 5e-3, 20e-3}) {
            double expected = THICK * ALPHA * ((1 + POISSON) * (b * r * r - mean) + mean);
            assertThat(at(s, 0.6 * r, 0.8 * r)).isCloseTo(expected, within(1e-19));
        }
    }

    /** Through the thickness the mean counts: of z over the plate it is half its end. */
    @Test
    void depthCountsByItsMean() {
        Swelling s = swelling("T0 + k*z");
        assertThat(at(s, 1e-3, 2e-3)).isCloseTo(ALPHA * THICK * 100 * 0.5 * THICK, within(1e-20));
    }

    @ParameterizedTest
    @ValueSource(
            strings = {"T0 + dT*exp(-2*((x - w/3)^2 + y^2)/w^2)*(1 + k*z/dT)", "T0 + k*x + b*x*y + b*x^2*cos(y/w)"})
    void differentiatesExactlyAlsoBetweenCurvedAndTiltedFaces(String temperature) {
        Surface front = Surface.cap(0, 0.1, 0);
        Surface back = new Surface(
                Frame.tilted(new Vector(0, 0, THICK), 0.02, -0.01),
                Surface.cap(0, -0.2, 0).form(),
                false,
                1);
        for (Swelling s : new Swelling[] {
            swelling(temperature), new Swelling(plate(temperature), Frame.JOB, front, back).settled()
        }) {
            double h = 1e-6;
            double[] b = new double[6];
            double[] px = new double[6];
            double[] mx = new double[6];
            double[] py = new double[6];
            double[] my = new double[6];
            double x = 2e-3;
            double y = -1.5e-3;
            s.jet(x, y, b);
            s.jet(x + h, y, px);
            s.jet(x - h, y, mx);
            s.jet(x, y + h, py);
            s.jet(x, y - h, my);
            double slope = 1e-6 * (Math.abs(b[1]) + Math.abs(b[2]));
            double bend = 1e-6 * (Math.abs(b[3]) + Math.abs(b[4]) + Math.abs(b[5]));
            assertThat((px[0] - mx[0]) / (2 * h)).isCloseTo(b[1], within(slope));
            assertThat((py[0] - my[0]) / (2 * h)).isCloseTo(b[2], within(slope));
            assertThat((px[1] - mx[1]) / (2 * h)).isCloseTo(b[3], within(bend));
            assertThat((py[1] - my[1]) / (2 * h)).isCloseTo(b[4], within(bend));
            assertThat((py[2] - my[2]) / (2 * h)).isCloseTo(b[5], within(bend));
        }
    }

    @Test
    void facesMoveApartByHalfEach() {
        Swelling s = swelling("T0 + dT");
        Surface front = Surface.plane(0);
        Surface back = Surface.plane(THICK);
        double half = 0.5 * ALPHA * THICK * 15;
        assertThat(new Displaced(front.form(), s.of(front, true), s.most()).sag(1e-3, 0))
                .isCloseTo(-half, within(1e-20));
        assertThat(new Displaced(back.form(), s.of(back, false), s.most()).sag(1e-3, 0))
                .isCloseTo(half, within(1e-20));
    }
}
