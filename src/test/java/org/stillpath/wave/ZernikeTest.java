package org.stillpath.wave;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;

import java.util.List;
import org.junit.jupiter.api.Test;

/** Zernike's polynomials and fits against Noll's table, projections in closed form and their own orthonormality. */
class ZernikeTest {
    @Test
    void numbersAreNolls() {
        // Noll, J. Opt. Soc. Am. 66 (1976) 207, table I: degree and order of numbers 1 to 15, sine as a negative order
        int[] table = {0, 0, 1, 1, 1, -1, 2, 0, 2, -2, 2, 2, 3, -1, 3, 1, 3, -3, 3, 3, 4, 0, 4, 2, 4, -2, 4, 4, 4, -4};
        for (int j = 1; j <= 15; j++) {
            assertThat(Zernike.mode(j).degree()).as("degree of %d", j).isEqualTo(table[2 * j - 2]);
            assertThat(Zernike.mode(j).order()).as("order of %d", j).isEqualTo(table[2 * j - 1]);
        }
    }

    @Test
    void valuesAreNolls() {
        // recomputed outside the project from Noll's formula (1976), two ways: numbers 4 to 11 at r = 0.7, 0.6 rad
        double[] expected = {
            -0.034641016151377546,
            1.1186798886653675,
            0.434919885376193,
            -0.5925055824752242,
            -0.8660630085251854,
            0.944778769709176,
            -0.22042022662817437,
            -1.116692347963395
        };
        double[] values = new double[11];
        Zernike.of(11).values(0.7 * Math.cos(0.6), 0.7 * Math.sin(0.6), values);
        for (int j = 4; j <= 11; j++) {
            assertThat(values[j - 1]).as("Z%d", j).isCloseTo(expected[j - 4], within(1e-13));
        }
    }

    @Test
    void allAreOrthonormalOverTheDisk() {
        Zernike basis = Zernike.of(Zernike.MOST);
        List<Pupil.Point> points = new Pupil(14, 29).points();
        double[][] gram = new double[Zernike.MOST][Zernike.MOST];
        double[] v = new double[Zernike.MOST];
        for (Pupil.Point p : points) {
            basis.values(p.x(), p.y(), v);
            for (int i = 0; i < v.length; i++) {
                for (int j = 0; j < v.length; j++) {
                    gram[i][j] += p.weight() * v[i] * v[j];
                }
            }
        }
        for (int i = 0; i < v.length; i++) {
            for (int j = 0; j < v.length; j++) {
                assertThat(gram[i][j]).as("%d, %d", i + 1, j + 1).isCloseTo(i == j ? 1 : 0, within(3e-10));
            }
        }
    }

    @Test
    void theFourthPowerHasThreeTerms() {
        // ρ⁴ = 1/3 + (√3/6)·Z4 + (1/(6√5))·Z11: projection in closed form
        ZernikeFit fit = ZernikeFit.of(over(new Pupil(6, 12), (x, y) -> Math.pow(x * x + y * y, 2)), 15);
        double[] c = fit.coefficients();
        assertThat(c[0]).isCloseTo(1.0 / 3, within(1e-14));
        assertThat(c[3]).isCloseTo(Math.sqrt(3) / 6, within(1e-14));
        assertThat(c[10]).isCloseTo(1 / (6 * Math.sqrt(5)), within(1e-14));
        assertThat(fit.residual()).isLessThan(1e-14);
        for (int j : new int[] {2, 3, 5, 6, 7, 8, 9, 10, 12, 13, 14, 15}) {
            assertThat(c[j - 1]).as("Z%d", j).isCloseTo(0, within(1e-14));
        }
        assertThat(fit.at(0.3, -0.2)).isCloseTo(0.13 * 0.13, within(1e-14));
    }

    @Test
    void whatTheSumLeavesIsTold() {
        // ρ⁶ holds R6⁰ = 20ρ⁶ − 30ρ⁴ + 12ρ² − 1, of norm √7, with 1/20: its rms 1/(20√7) is beyond Noll's 15
        ZernikeFit fit = ZernikeFit.of(over(new Pupil(8, 16), (x, y) -> Math.pow(x * x + y * y, 3)), 15);
        assertThat(fit.residual()).isCloseTo(1 / (20 * Math.sqrt(7)), within(1e-14));
    }

    @Test
    void aVignettedPupilIsFittedByWhatComesThrough() {
        double[] wanted = new double[15];
        double[] v = new double[15];
        Zernike basis = Zernike.of(15);
        for (int i = 0; i < 15; i++) {
            wanted[i] = 1e-7 * (i % 4 - 1.5);
        }
        List<Pupil.Point> points =
                new Pupil(10, 24).points().stream().filter(p -> p.y() < 0.4).toList();
        double[] x = points.stream().mapToDouble(Pupil.Point::x).toArray();
        double[] y = points.stream().mapToDouble(Pupil.Point::y).toArray();
        double[] w = points.stream().mapToDouble(Pupil.Point::weight).toArray();
        double[] path = new double[x.length];
        for (int s = 0; s < x.length; s++) {
            basis.values(x[s], y[s], v);
            for (int i = 0; i < 15; i++) {
                path[s] += wanted[i] * v[i];
            }
        }
        double[] found = ZernikeFit.of(new Wavefront(x, y, w, path), 15).coefficients();
        for (int i = 0; i < 15; i++) {
            assertThat(found[i]).isCloseTo(wanted[i], within(1e-18));
        }
    }

    @Test
    void aTurnedSceneTurnsTheCoefficients() {
        double turn = 0.4;
        double[] plain =
                ZernikeFit.of(over(new Pupil(8, 20), ZernikeTest::lopsided), 15).coefficients();
        double[] turned = ZernikeFit.of(
                        over(
                                new Pupil(8, 20),
                                (x, y) -> lopsided(
                                        Math.cos(turn) * x + Math.sin(turn) * y,
                                        Math.cos(turn) * y - Math.sin(turn) * x)),
                        15)
                .coefficients();
        for (int j = 2; j <= 15; j++) {
            Zernike.Mode mode = Zernike.mode(j);
            int m = Math.abs(mode.order());
            double expected;
            if (m == 0) {
                expected = plain[j - 1];
            } else {
                int cosine = partner(j, true);
                int sine = partner(j, false);
                expected = mode.order() > 0
                        ? Math.cos(m * turn) * plain[cosine - 1] - Math.sin(m * turn) * plain[sine - 1]
                        : Math.sin(m * turn) * plain[cosine - 1] + Math.cos(m * turn) * plain[sine - 1];
            }
            assertThat(turned[j - 1]).as("Z%d", j).isCloseTo(expected, within(1e-14));
        }
    }

    @Test
    void countsOutOfRangeAreRefused() {
        assertThatThrownBy(() -> Zernike.of(0))
                .isInstanceOf(IllegalArgumentException.class)
                .hasMessageContaining("0");
        assertThatThrownBy(() -> Zernike.of(106)).hasMessageContaining("106");
        assertThatThrownBy(() -> Zernike.mode(0)).isInstanceOf(IllegalArgumentException.class);
    }

    private static int partner(int j, boolean cosine) {
        Zernike.Mode mode = Zernike.mode(j);
        for (int k = Math.max(1, j - 1); k <= j + 1; k++) {
            Zernike.Mode other = Zernike.mode(k);
            if (other.degree() == mode.degree()
                    && Math.abs(other.order()) == Math.abs(mode.order())
                    && other.order() > 0 == cosine) {
                return k;
            }
        }
        throw new AssertionError("no partner of " + j);
    }

    private static double lopsided(double x, double y) {
        return 0.3 * x - 0.2 * x * y + x * x * x + 0.5 * x * x * y * y - 0.1 * y * y * y * y;
    }

    static Wavefront over(Pupil pupil, java.util.function.DoubleBinaryOperator path) {
        List<Pupil.Point> points = pupil.points();
        return new Wavefront(
                points.stream().mapToDouble(Pupil.Point::x).toArray(),
                points.stream().mapToDouble(Pupil.Point::y).toArray(),
                points.stream().mapToDouble(Pupil.Point::weight).toArray(),
                points.stream()
                        .mapToDouble(p -> path.applyAsDouble(p.x(), p.y()))
                        .toArray());
    }
}
