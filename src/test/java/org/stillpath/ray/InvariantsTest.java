package org.stillpath.ray;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.Random;
import org.junit.jupiter.api.Test;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;

/** What must hold for any ray in any medium, on seeded random rays and media, with the production engine. */
class InvariantsTest {
    private static final int CASES = 2000;

    private static Traced trace(IndexField field, Ending ending, Vector from, Vector direction, double accuracy) {
        return new Tracer(Train.through(field), ending, new Tracer.Settings(accuracy, false, false))
                .trace(RayStart.of(from, direction));
    }

    private static double[][] bumps(Random r, double size) {
        double[][] bumps = new double[3 + r.nextInt(4)][];
        for (int i = 0; i < bumps.length; i++) {
            Vector c = AnalyticCase.point(r, size);
            double w = size * (0.15 + 0.5 * r.nextDouble());
            bumps[i] = new double[] {c.x(), c.y(), c.z(), 0.15 * (2 * r.nextDouble() - 1), w};
        }
        return bumps;
    }

    /** Going back along a ray returns to its start within ten times the asked accuracy. */
    @Test
    void raysAreReversible() {
        Random r = new Random(11);
        for (int i = 0; i < CASES; i++) {
            double size = Math.pow(10, r.nextInt(4) - 3);
            double accuracy = Math.pow(10, -5 - 7 * r.nextDouble());
            IndexField field = Fields.bumps(1.5, bumps(r, size));
            Vector from = AnalyticCase.point(r, size);
            Vector d = AnalyticCase.unit(r);
            Ending ending = new Ending.AtOpticalLength(2.5 * size);
            Traced there = trace(field, ending, from, d, accuracy);
            Traced back =
                    trace(field, ending, there.position(), there.direction().times(-1), accuracy);
            assertThat(there.accurate() && back.accurate()).isTrue();
            assertThat(back.position().minus(from).norm()).isLessThan(10 * accuracy * there.length());
            assertThat(back.direction().plus(d).norm()).isLessThan(10 * accuracy);
        }
    }

    /** The ray-transfer matrix is symplectic: |MᵀJM − J| below 1e-9 of the matrix' scale, between any two planes. */
    @Test
    void transferIsSymplectic() {
        Random r = new Random(12);
        double worst = 0;
        for (int i = 0; i < CASES; i++) {
            double size = Math.pow(10, r.nextInt(4) - 3);
            IndexField field = Fields.bumps(1.5, bumps(r, size));
            Vector d = new Vector(r.nextDouble() - 0.5, r.nextDouble() - 0.5, 1).unit();
            Vector from = AnalyticCase.point(r, size);
            Traced end = new Tracer(
                            Train.through(field),
                            new Ending.AtZ(from.z() + 1.5 * size),
                            new Tracer.Settings(1e-10, true, false))
                    .trace(RayStart.of(from, d));
            if (end.status() != Status.ARRIVED) {
                continue;
            }
            worst = Math.max(worst, asymplecticity(end.transfer(), size));
        }
        assertThat(worst).isLessThan(1e-9);
    }

    /** |MᵀJM − J| over |M|², lengths taken in units of the scene. */
    static double asymplecticity(double[][] m, double size) {
        double[][] u = new double[4][4];
        double largest = 1;
        for (int i = 0; i < 4; i++) {
            for (int j = 0; j < 4; j++) {
                u[i][j] = m[i][j] * (i < 2 == j < 2 ? 1 : i < 2 ? 1 / size : size);
                largest = Math.max(largest, Math.abs(u[i][j]));
            }
        }
        double worst = 0;
        for (int i = 0; i < 4; i++) {
            for (int j = 0; j < 4; j++) {
                double s = 0;
                for (int k = 0; k < 2; k++) {
                    s += u[k][i] * u[k + 2][j] - u[k + 2][i] * u[k][j];
                }
                double wanted = j == i + 2 ? 1 : i == j + 2 ? -1 : 0;
                worst = Math.max(worst, Math.abs(s - wanted));
            }
        }
        return worst / (largest * largest);
    }

    /** In rods pz and the skewness x·py − y·px stay; in spheres all of q × p does (Bouguer, Clairaut). */
    @Test
    void symmetricMediaKeepTheirConstants() {
        Random r = new Random(13);
        for (int i = 0; i < CASES; i++) {
            double accuracy = Math.pow(10, -5 - 7 * r.nextDouble());
            AnalyticCase.Kind kind = AnalyticCase.Kind.values()[new int[] {0, 1, 3, 4}[i % 4]];
            AnalyticCase c = kind.random(r, 1);
            Samples s = new Samples(1);
            c.field()
                    .sample(
                            new double[] {c.from().x()},
                            new double[] {c.from().y()},
                            new double[] {c.from().z()},
                            1,
                            Order.VALUE,
                            s);
            Vector p = c.direction().times(Math.sqrt(1 + s.value[0]));
            Traced end =
                    trace(c.field(), new Ending.AtOpticalLength(c.opticalLength()), c.from(), c.direction(), accuracy);
            double[] y = end.state();
            Vector endP = new Vector(y[3], y[4], y[5]);
            Vector before = c.from().cross(p);
            Vector behind = end.position().cross(endP);
            double allowed =
                    10 * accuracy * (end.position().norm() + c.from().norm() + end.length()) * (1 + endP.norm());
            if (kind == AnalyticCase.Kind.ROD) {
                assertThat(Math.abs(endP.z() - p.z())).isLessThan(1e-14);
                assertThat(Math.abs(behind.z() - before.z())).isLessThan(allowed);
            } else {
                assertThat(behind.minus(before).norm()).isLessThan(allowed);
            }
            assertThat(end.errors().drift()).isLessThan(10 * accuracy);
        }
    }

    /** Turning the scene turns the result; making every length k times as long makes the result's lengths so. */
    @Test
    void turnsAndScalesWithTheScene() {
        Random r = new Random(14);
        for (int i = 0; i < CASES; i++) {
            double accuracy = Math.pow(10, -5 - 7 * r.nextDouble());
            double[][] bumps = bumps(r, 1);
            double k = Math.pow(10, 6 * r.nextDouble() - 3);
            double a = 2 * Math.PI * r.nextDouble();
            Vector from = AnalyticCase.point(r, 1);
            Vector d = AnalyticCase.unit(r);
            double[][] turned = new double[bumps.length][];
            for (int b = 0; b < bumps.length; b++) {
                Vector c = turn(new Vector(bumps[b][0], bumps[b][1], bumps[b][2]), a);
                turned[b] = new double[] {k * c.x(), k * c.y(), k * c.z(), bumps[b][3], k * bumps[b][4]};
            }
            Traced plain = trace(Fields.bumps(1.5, bumps), new Ending.AtOpticalLength(2), from, d, accuracy);
            Traced other = trace(
                    Fields.bumps(1.5, turned),
                    new Ending.AtOpticalLength(2 * k),
                    turn(from, a).times(k),
                    turn(d, a),
                    accuracy);
            assertThat(turn(plain.position(), a)
                            .times(k)
                            .minus(other.position())
                            .norm())
                    .isLessThan(2 * accuracy * k * plain.length());
            assertThat(turn(plain.direction(), a).minus(other.direction()).norm())
                    .isLessThan(2 * accuracy);
            assertThat(Math.abs(other.length() - k * plain.length())).isLessThan(2 * accuracy * k * plain.length());
        }
    }

    /** About the axis (1, 1, 1) by the angle a (Rodrigues). */
    private static Vector turn(Vector v, double a) {
        Vector u = new Vector(1, 1, 1).unit();
        double c = Math.cos(a);
        return v.times(c).plus(u.cross(v).times(Math.sin(a))).plus(u.times(u.dot(v) * (1 - c)));
    }
}
