package org.stillpath.ray;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.List;
import org.junit.jupiter.api.Test;
import org.stillpath.geometry.Frame;
import org.stillpath.geometry.Quadric;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;

/** Refraction at surfaces against published formulas; expected values recomputed from them, two ways where noted. */
class InterfaceTest {
    private static final IndexField AIR = Fields.uniform(1);

    private static Traced trace(Train train, Ending ending, Vector from, Vector direction) {
        return Engines.trace(train, ending, new Tracer.Settings(1e-12, false, false), RayStart.of(from, direction));
    }

    private static Train plane(double before, double behind) {
        return new Train(
                Fields.uniform(before),
                List.of(new Element(Surface.plane(0), new Action.Refract(false), Fields.uniform(behind))));
    }

    /** p' = p + [√(n2² − n1² + (p·N)²) − p·N] N for (0.6, 0, 0.8) from 1 into 1.5 (Born and Wolf, section 3.2). */
    @Test
    void refractsAVector() {
        Vector d = trace(plane(1, 1.5), new Ending.AtZ(1), new Vector(0, 0, -1), new Vector(0.6, 0, 0.8))
                .direction();
        assertThat(d.x()).isCloseTo(0.4, within(1e-15));
        assertThat(d.z()).isCloseTo(0.916515138991168, within(1e-15));
    }

    /** Critical angles asin(n2/n1): 41.245190369612644° for 1.5168, 48.60662639169027° for 1.333, 62.457324845541194° for 1.5 to 1.33. */
    @Test
    void reflectsTotallyFromTheCriticalAngleOn() {
        double[][] rows = {
            {1.5168, 1, 41.245190369612644}, {1.333, 1, 48.60662639169027}, {1.5, 1.33, 62.457324845541194}
        };
        for (double[] row : rows) {
            for (int side = -1; side <= 1; side += 2) {
                double a = Math.toRadians(row[2] + side * 1e-9);
                Traced end = trace(
                        plane(row[0], row[1]),
                        new Ending.AtLength(3),
                        new Vector(0, 0, -1),
                        new Vector(0, Math.sin(a), Math.cos(a)));
                assertThat(end.status()).isEqualTo(side < 0 ? Status.ARRIVED : Status.TOTALLY_REFLECTED);
            }
        }
    }

    /** A 60° prism of index 1.5168 deviates by 38.646695472499886° at least: n = sin((A + D)/2)/sin(A/2) (verified two ways). */
    @Test
    void deviatesByAPrism() {
        double apex = Math.toRadians(60);
        double least = Math.toRadians(38.646695472499886);
        Train prism = new Train(
                AIR,
                List.of(face(new Vector(0, 0, -0.01), apex / 2, 1.5168), face(new Vector(0, 0, 0.01), -apex / 2, 1)));
        for (double off : new double[] {-0.02, 0, 0.02}) {
            // symmetric passage: the ray inside runs along +z when it comes in at half the deviation
            double a = least / 2 + off;
            Traced end = trace(
                    prism,
                    new Ending.AtZ(0.05),
                    new Vector(0, -0.04 * Math.tan(a), -0.05),
                    new Vector(0, Math.sin(a), Math.cos(a)));
            double deviation = Math.acos(end.direction().dot(new Vector(0, Math.sin(a), Math.cos(a))));
            if (off == 0) {
                assertThat(deviation).isCloseTo(least, within(1e-14));
            } else {
                assertThat(deviation).isGreaterThan(least + 1e-5);
            }
        }
    }

    private static Element face(Vector at, double tilt, double into) {
        return new Element(
                new Surface(Frame.tilted(at, tilt, 0), Quadric.PLANE, false, Double.POSITIVE_INFINITY),
                new Action.Refract(false),
                Fields.uniform(into));
    }

    /**
     * A drop of index 1.3333 with one reflection inside: the rainbow ray b/R = 0.8606801786958963 leaves at
     * 42.03450149020016° from the way back, and rays beside it turn by more (Descartes: cos² i = (n² − 1)/3; two ways).
     */
    @Test
    void makesARainbow() {
        Quadric ball = new Quadric(1e3, 1e3, 1e3);
        Surface drop = new Surface(Frame.JOB, ball, true, Double.POSITIVE_INFINITY);
        IndexField water = Fields.uniform(1.3333);
        Train train = new Train(
                AIR,
                List.of(
                        new Element(drop, new Action.Refract(false), water),
                        new Element(drop, new Action.Reflect(), water),
                        new Element(drop, new Action.Refract(false), AIR)));
        double rainbow = Math.toRadians(42.03450149020016);
        for (double b : new double[] {0.84, 0.8606801786958963, 0.88}) {
            Traced end = trace(train, new Ending.AtLength(0.02), new Vector(0, b * 1e-3, -0.01), Vector.Z);
            double angle = Math.acos(-end.direction().z());
            if (b == 0.8606801786958963) {
                assertThat(angle).isCloseTo(rainbow, within(1e-13));
            } else {
                assertThat(angle).isLessThan(rainbow - 1e-4);
            }
        }
    }

    /** A hyperboloid K = −n² on glass of index 1.5 collimates the focus at R/(n − 1): equal paths (Descartes). */
    @Test
    void collimatesByAHyperboloid() {
        double radius = 0.05;
        Train train = new Train(
                AIR,
                List.of(new Element(Surface.cap(0, radius, -2.25), new Action.Refract(false), Fields.uniform(1.5))));
        Vector focus = new Vector(0, 0, -radius / 0.5);
        double axial = Double.NaN;
        for (double a : new double[] {0, 0.05, 0.1, 0.14}) {
            Traced end = trace(train, new Ending.AtZ(0.01), focus, new Vector(0, Math.sin(a), Math.cos(a)));
            if (a == 0) {
                axial = end.opticalLength();
            }
            assertThat(end.status()).isEqualTo(Status.ARRIVED);
            assertThat(end.direction().y()).isCloseTo(0, within(2e-15));
            assertThat(end.opticalLength()).isCloseTo(axial, within(1e-15));
        }
    }
}
