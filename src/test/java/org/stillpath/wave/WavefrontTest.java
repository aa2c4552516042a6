package org.stillpath.wave;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;

import java.util.List;
import org.junit.jupiter.api.Test;

/** Averages over a pupil against closed forms. Path differences are in waves, the wavelength is 1. */
class WavefrontTest {
    private static final Pupil PUPIL = new Pupil(10, 20);

    @Test
    void defocusHasItsClosedForms() {
        // W = −0.2 ρ²: Noll's fourth coefficient −0.2/(2√3), rms the same, Maréchal's estimate exp(−(2πσ)²); recomputed
        // outside the project from Z4 = √3(2ρ² − 1)
        Wavefront wave = ZernikeTest.over(PUPIL, (x, y) -> -0.2 * (x * x + y * y));
        assertThat(ZernikeFit.of(wave, 11).coefficients()[3]).isCloseTo(-0.057735026918962574, within(1e-15));
        assertThat(wave.rms()).isCloseTo(0.057735026918962574, within(1e-15));
        assertThat(wave.marechal(1)).isCloseTo(0.876696225849463, within(1e-14));
        // Born & Wolf, Principles of Optics, 9.1: (sin πW/(πW))² for W = 0.2
        assertThat(wave.strehl(1)).isCloseTo(0.8751402000833808, within(1e-14));
    }

    @Test
    void marechalsCriterionIsAFourteenthOfAWave() {
        // Born & Wolf 9.3: σ = λ/14 gives 1 − (2π/14)² = 0.79858 and exp(−(2π/14)²) = 0.81757
        double amplitude = Math.sqrt(12) / 14;
        Wavefront wave = ZernikeTest.over(PUPIL, (x, y) -> amplitude * (x * x + y * y));
        assertThat(wave.rms()).isCloseTo(1.0 / 14, within(1e-15));
        assertThat(wave.marechal(1)).isCloseTo(0.817568573328328, within(1e-14));
    }

    @Test
    void marechalsEstimateMeetsTheExactRatioForSmallErrors() {
        // exact and estimate agree to the third order of the phase: the difference falls at least eightfold with half
        // the error
        double last = Double.POSITIVE_INFINITY;
        for (double a : new double[] {0.4, 0.2, 0.1, 0.05}) {
            Wavefront wave = ZernikeTest.over(PUPIL, (x, y) -> a * (x * x * x + x * x * y * y));
            double difference = Math.abs(wave.strehl(1) - wave.marechal(1));
            assertThat(difference).isLessThan(last / 7.5);
            last = difference;
        }
        assertThat(last).isLessThan(2e-5);
    }

    @Test
    void thirdOrderSphericalAberrationIsBalancedByFocus() {
        // rms of ρ⁴ is 2/(3√5) = 0.29814 of a wave at the paraxial focus and 1/(6√5) = 0.07454 at the best: a quarter
        Wavefront wave = ZernikeTest.over(PUPIL, (x, y) -> Math.pow(x * x + y * y, 2));
        assertThat(wave.rms()).isCloseTo(0.29814239699997197, within(1e-14));
        assertThat(wave.withoutTiltAndFocus().rms()).isCloseTo(0.07453559924999299, within(1e-14));
        assertThat(wave.sphere()[3]).isCloseTo(1, within(1e-14));
        assertThat(wave.sphere()[0]).isCloseTo(-1.0 / 6, within(1e-14));
    }

    @Test
    void tiltIsRemovedAndTold() {
        Wavefront wave = ZernikeTest.over(PUPIL, (x, y) -> 3 + 2 * x - 5 * y + 0.1 * (x * x + y * y));
        assertThat(wave.plane()[1]).isCloseTo(2, within(1e-14));
        assertThat(wave.plane()[2]).isCloseTo(-5, within(1e-14));
        assertThat(wave.withoutTilt().rms()).isCloseTo(0.1 / Math.sqrt(12), within(1e-14));
        assertThat(wave.withoutTiltAndFocus().rms()).isLessThan(1e-14);
    }

    @Test
    void averagesDoNotDependOnTheSampling() {
        double[] rms = new double[3];
        double[] strehl = new double[3];
        int i = 0;
        for (Pupil p : List.of(new Pupil(12, 25), new Pupil(16, 33), new Pupil(31, 64))) {
            Wavefront wave =
                    ZernikeTest.over(p, (x, y) -> 0.1 * x * Math.exp(x - y * y)).withoutTilt();
            rms[i] = wave.rms();
            strehl[i++] = wave.strehl(1);
        }
        assertThat(rms[1]).isCloseTo(rms[0], within(1e-12));
        assertThat(rms[2]).isCloseTo(rms[1], within(1e-12));
        assertThat(strehl[2]).isCloseTo(strehl[1], within(1e-12));
    }

    @Test
    void theRimCountsForTheExtremesAlone() {
        List<Pupil.Point> points = PUPIL.pointsWithRim();
        Wavefront wave = new Wavefront(
                points.stream().mapToDouble(Pupil.Point::x).toArray(),
                points.stream().mapToDouble(Pupil.Point::y).toArray(),
                points.stream().mapToDouble(Pupil.Point::weight).toArray(),
                points.stream().mapToDouble(Pupil.Point::x).toArray());
        assertThat(wave.peakToValley()).isCloseTo(2, within(1e-15));
        assertThat(wave.rms()).isCloseTo(0.5, within(1e-15));
    }

    @Test
    void faultySamplesAreRefused() {
        double[] one = {1};
        assertThatThrownBy(() -> new Wavefront(one, one, new double[] {0}, one)).hasMessageContaining("positive");
        assertThatThrownBy(() -> new Wavefront(one, one, one, new double[] {Double.NaN}))
                .hasMessageContaining("sample 0");
        assertThatThrownBy(() -> new Wavefront(one, one, one, new double[2])).hasMessageContaining("equally long");
    }
}
