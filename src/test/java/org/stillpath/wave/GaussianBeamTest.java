package org.stillpath.wave;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;

import org.junit.jupiter.api.Test;

/** Gaussian beams and fibres against published closed forms; each was recomputed outside the project. */
class GaussianBeamTest {
    private static final double MICRO = 1e-6;

    @Test
    void aBeamWidensAsKogelnikAndLiSay() {
        // Kogelnik & Li, Appl. Opt. 5 (1966) 1550: waist 0.1 mm, 1064 nm, 50 mm on
        GaussianBeam beam = GaussianBeam.atWaist(1.064e-6, 1e-4, 1e-4).through(gap(0.05, 1));
        assertThat(beam.radii()[0]).isCloseTo(0.19666297739836291e-3, within(1e-14));
        assertThat(1 / beam.curvatures()[0]).isCloseTo(67.43598493606436e-3, within(1e-12));
    }

    @Test
    void aRodsOwnBeamStaysAsItIs() {
        // Kogelnik 1965: w = √(λ/(π n₀ g)), n₀ = 1.6, g = 0.3 1/mm, 1.55 µm
        double w = 0.032060500216546176e-3;
        GaussianBeam beam = GaussianBeam.atWaist(1.55e-6, w, w).through(rod(1.6, 300, 0.0037));
        assertThat(beam.radii()[0]).isCloseTo(w, within(1e-17));
        assertThat(beam.curvatures()[1]).isCloseTo(0, within(1e-9));
    }

    @Test
    void aQuarterPitchRodCollimatesAFibre() {
        // ABCD law: λ/(π w n₀ g) behind a quarter pitch, w = 5.2 µm, 1.55 µm
        GaussianBeam beam =
                GaussianBeam.atWaist(1.55e-6, 5.2 * MICRO, 5.2 * MICRO).through(rod(1.6, 300, Math.PI / 2 / 300));
        assertThat(beam.radii()[0]).isCloseTo(0.19766839887214566e-3, within(1e-15));
    }

    @Test
    void modesOfTwoSizesOverlapAsMarcuseSays() {
        // Marcuse, Bell Syst. Tech. J. 56 (1977) 703: 5.2 and 4.6 µm, aligned and 2 µm apart
        GaussianBeam a = GaussianBeam.atWaist(1.55e-6, 5.2 * MICRO, 5.2 * MICRO);
        GaussianBeam b = GaussianBeam.atWaist(1.55e-6, 4.6 * MICRO, 4.6 * MICRO);
        assertThat(a.overlap(b)).isCloseTo(0.9851180248273962, within(1e-13));
        assertThat(a.overlap(b.moved(0, 2 * MICRO, 0, 0))).isCloseTo(0.8344612878733606, within(1e-13));
        assertThat(b.moved(0, 2 * MICRO, 0, 0).overlap(a)).isCloseTo(0.8344612878733606, within(1e-13));
    }

    @Test
    void tiltAndGapLoseWhatJoyceAndDeLoachSay() {
        // Joyce & DeLoach, Appl. Opt. 23 (1984) 4187: exp(−(πwθ/λ)²) at 1 deg, the slope standing for the angle;
        // and 1/(1 + (z/2z_R)²) over 50 µm
        GaussianBeam a = GaussianBeam.atWaist(1.55e-6, 5.2 * MICRO, 5.2 * MICRO);
        assertThat(a.overlap(a.moved(0, 0, Math.toRadians(1), 0))).isCloseTo(0.9667286227252543, within(1e-13));
        assertThat(a.through(gap(50 * MICRO, 1)).overlap(a)).isCloseTo(0.8277597659241819, within(1e-13));
    }

    @Test
    void overlapsStayThroughLosslessOptics() {
        // an astigmatic, tilted, displaced beam against a round one
        double wavelength = 1e-6;
        double[][] turned = {
            {0.9, 0.1, 40e-6, 5e-6}, {-0.05, 1.1, 8e-6, 30e-6}, {800, -300, 1, 0.2}, {-100, 500, -0.1, 1}
        };
        double[][] m = symplectic(turned);
        GaussianBeam a = GaussianBeam.atWaist(wavelength, 4e-6, 6e-6)
                .moved(1e-6, -0.5e-6, 0.02, 0.03)
                .through(m);
        GaussianBeam b = GaussianBeam.atWaist(wavelength, 5e-6, 5e-6).moved(0.5e-6, 1e-6, 0.03, 0.01);
        assertThat(a.overlap(a)).isCloseTo(1, within(1e-13));
        assertThat(a.overlap(b)).isCloseTo(b.overlap(a), within(1e-13));
        // what both lose through one more train is the same: overlaps do not change through lossless optics
        assertThat(a.through(m).overlap(b.through(m))).isCloseTo(a.overlap(b), within(1e-12));
        assertThat(a.overlap(b)).isBetween(0.01, 0.99);
    }

    @Test
    void faultyBeamsAreRefused() {
        assertThatThrownBy(() -> GaussianBeam.atWaist(1e-6, 0, 1e-6)).hasMessageContaining("positive");
        assertThatThrownBy(() -> GaussianBeam.atWaist(1e-6, 1e-6, 1e-6).overlap(GaussianBeam.atWaist(2e-6, 1e-6, 1e-6)))
                .hasMessageContaining("one wavelength");
    }

    /** A symplectic matrix from factors that are: a shear by a symmetric lens, a symmetric gap, and a turn of meridians. */
    private static double[][] symplectic(double[][] seed) {
        double b = 0.5 * (seed[0][3] + seed[1][2]);
        double c = 0.5 * (seed[2][1] + seed[3][0]);
        double[][] lens = {{1, 0, 0, 0}, {0, 1, 0, 0}, {seed[2][0], c, 1, 0}, {c, seed[3][1], 0, 1}};
        double[][] gap = {{1, 0, seed[0][2], b}, {0, 1, b, seed[1][3]}, {0, 0, 1, 0}, {0, 0, 0, 1}};
        double s = Math.sin(0.3);
        double k = Math.cos(0.3);
        double[][] turn = {{k, s, 0, 0}, {-s, k, 0, 0}, {0, 0, k, s}, {0, 0, -s, k}};
        return times(gap, times(turn, times(lens, gap)));
    }

    private static double[][] times(double[][] a, double[][] b) {
        double[][] c = new double[4][4];
        for (int i = 0; i < 4; i++) {
            for (int j = 0; j < 4; j++) {
                for (int k = 0; k < 4; k++) {
                    c[i][j] += a[i][k] * b[k][j];
                }
            }
        }
        return c;
    }

    private static double[][] gap(double length, double index) {
        double t = length / index;
        return new double[][] {{1, 0, t, 0}, {0, 1, 0, t}, {0, 0, 1, 0}, {0, 0, 0, 1}};
    }

    private static double[][] rod(double n, double g, double length) {
        double k = Math.cos(g * length);
        double s = Math.sin(g * length);
        double b = s / (n * g);
        double c = -n * g * s;
        return new double[][] {{k, 0, b, 0}, {0, k, 0, b}, {c, 0, k, 0}, {0, c, 0, k}};
    }
}
