package org.stillpath.geometry;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;

import java.util.Random;
import org.junit.jupiter.api.Test;

class SurfaceTest {
    private static final double FLAT_EDGE = Double.POSITIVE_INFINITY;

    /**
     * Sag and slope after ISO 10110-12: R = 20, K = −0.6, A4 = 2e-6 at r = 5 (recomputed from the standard's formula,
     * verified in two ways).
     */
    @Test
    void hasTheSagOfTheStandard() {
        Asphere a = new Asphere(1 / 20.0, 1 / 20.0, -0.6, -0.6, new int[] {4}, new double[] {2e-6});
        double[] f = new double[10];
        for (double phi : new double[] {0, 0.7, 2.1}) {
            double x = 5 * Math.cos(phi);
            double y = 5 * Math.sin(phi);
            assertThat(a.sag(x, y)).isCloseTo(0.6302058546712525, within(1e-15));
            a.evaluate(x, y, 0, f);
            assertThat(-f[1] * Math.cos(phi) - f[2] * Math.sin(phi)).isCloseTo(0.25418484177091666, within(1e-15));
        }
    }

    /** Gradient and Hessian of every form against central differences, which carry some 9 and 6 digits here. */
    @Test
    void derivesItsForms() {
        Form[] forms = {
            new Quadric(0.05, 0.05, 0.02),
            new Asphere(0.05, -0.03, -0.6, 1.5, new int[] {2, 4, 6}, new double[] {1e-3, -2e-5, 1e-7}),
            new Asphere(0, 0.04, 0, -1, new int[] {}, new double[] {})
        };
        double[] f = new double[10];
        double[] p = new double[10];
        double[] m = new double[10];
        double h = 1e-5;
        for (Form form : forms) {
            double[] q = {1.3, -2.1, 0.4};
            form.evaluate(q[0], q[1], q[2], f);
            int[][] index = {{4, 5, 6}, {5, 7, 8}, {6, 8, 9}};
            for (int a = 0; a < 3; a++) {
                double[] up = q.clone();
                double[] down = q.clone();
                up[a] += h;
                down[a] -= h;
                form.evaluate(up[0], up[1], up[2], p);
                form.evaluate(down[0], down[1], down[2], m);
                assertThat(f[1 + a]).isCloseTo((p[0] - m[0]) / (2 * h), within(1e-9));
                for (int b = 0; b < 3; b++) {
                    assertThat(f[index[a][b]]).isCloseTo((p[1 + b] - m[1 + b]) / (2 * h), within(1e-9));
                }
            }
        }
    }

    /** A line's crossings lie on the surface, for caps, whole spheres, cylinders and aspheres, tilted and shifted. */
    @Test
    void meetsLines() {
        Random random = new Random(7);
        Frame frame = Frame.tilted(new Vector(0.2, -0.1, 3), 0.1, -0.2);
        Surface[] surfaces = {
            Surface.plane(3),
            Surface.cap(3, 20, -0.6),
            new Surface(frame, new Quadric(0.05, 0.05, 0.05), true, FLAT_EDGE),
            new Surface(frame, new Asphere(0, 0.04, 0, -1, new int[] {}, new double[] {}), false, FLAT_EDGE),
            new Surface(frame, new Asphere(0.03, 0.04, 0.2, -1, new int[] {4}, new double[] {2e-6}), false, FLAT_EDGE)
        };
        double[] f = new double[10];
        for (Surface surface : surfaces) {
            for (int i = 0; i < 200; i++) {
                Vector from = new Vector(2 * random.nextDouble() - 1, 2 * random.nextDouble() - 1, -10);
                Vector d = new Vector(random.nextDouble() * 0.2 - 0.1, random.nextDouble() * 0.2 - 0.1, 1).unit();
                double s = surface.firstCrossing(from, d, 0, 100);
                Vector q = from.plus(d.times(s));
                surface.evaluate(q.x(), q.y(), q.z(), f);
                assertThat(f[0]).isCloseTo(0, within(1e-13));
                assertThat(surface.holds(q.x(), q.y(), q.z())).isTrue();
            }
        }
    }

    /** A whole sphere is met twice, a cap once. */
    @Test
    void tellsACapFromAWhole() {
        Quadric ball = new Quadric(1, 1, 1);
        Surface whole = new Surface(Frame.JOB, ball, true, FLAT_EDGE);
        Surface cap = new Surface(Frame.JOB, ball, false, FLAT_EDGE);
        Vector from = new Vector(0, 0, 1);
        assertThat(whole.firstCrossing(from, Vector.Z, 0, 10)).isCloseTo(1, within(1e-15));
        assertThat(cap.firstCrossing(from, Vector.Z, 0, 10)).isNaN();
        assertThat(cap.firstCrossing(from, Vector.Z.times(-1), 0, 10)).isCloseTo(1, within(1e-15));
    }

    /** Tilts turn by Rx(ax)·Ry(ay), right-handed; frames go there and back. */
    @Test
    void placesFrames() {
        Frame turned = Frame.tilted(Vector.ZERO, Math.PI / 2, 0);
        assertThat(turned.ez().minus(new Vector(0, -1, 0)).norm()).isLessThan(1e-15);
        Frame both = Frame.tilted(new Vector(1, 2, 3), 0.3, 0.4);
        // Rx(a) Ry(b) ez = (sin b, −sin a cos b, cos a cos b)
        Vector z = new Vector(Math.sin(0.4), -Math.sin(0.3) * Math.cos(0.4), Math.cos(0.3) * Math.cos(0.4));
        assertThat(both.ez().minus(z).norm()).isLessThan(1e-15);
        Frame along = Frame.along(Vector.ZERO, new Vector(0.3, -0.5, -2));
        assertThat(along.ez().minus(new Vector(0.3, -0.5, -2).unit()).norm()).isLessThan(1e-15);
        assertThatThrownBy(() -> new Frame(Vector.ZERO, Vector.Z, Vector.Z, Vector.Z))
                .isInstanceOf(IllegalArgumentException.class);
        assertThatThrownBy(() -> Surface.plane(0).withAperture(-1)).isInstanceOf(IllegalArgumentException.class);
    }
}
