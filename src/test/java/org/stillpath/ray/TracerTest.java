package org.stillpath.ray;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.List;
import org.junit.jupiter.api.Test;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;

class TracerTest {
    private static final Tracer.Settings FINE = new Tracer.Settings(1e-12, true, false);

    private static Traced trace(Train train, Ending ending, Vector from, Vector direction) {
        return Engines.trace(train, ending, FINE, RayStart.of(from, direction));
    }

    private static Element refract(Surface surface, IndexField into) {
        return new Element(surface, new Action.Refract(false), into);
    }

    /** The oscillator solution of the rod n² = n0²(1 − g²r²): x = x0 cos ωt + (p/ω) sin ωt, ω = n0 g, z = pz t (Luneburg). */
    @Test
    void followsTheOscillatorOfTheParabolicRod() {
        double n0 = 1.6;
        double g = 300;
        Vector from = new Vector(0.35e-3, -0.2e-3, 0);
        Vector d = new Vector(0.12, 0.21, 1).unit();
        Traced end = trace(Train.through(Fields.rod(n0, g)), new Ending.AtZ(28.7e-3), from, d);
        double n = n0 * Math.sqrt(1 - g * g * (from.x() * from.x() + from.y() * from.y()));
        double w = n0 * g;
        double t = 28.7e-3 / (n * d.z());
        assertThat(end.status()).isEqualTo(Status.ARRIVED);
        assertThat(end.position().x())
                .isCloseTo(from.x() * Math.cos(w * t) + n * d.x() / w * Math.sin(w * t), within(1e-14));
        assertThat(end.position().y())
                .isCloseTo(from.y() * Math.cos(w * t) + n * d.y() / w * Math.sin(w * t), within(1e-14));
        assertThat(end.position().z()).isCloseTo(28.7e-3, within(1e-17));
        assertThat(end.accurate()).isTrue();
    }

    /** A point of Maxwell's fisheye is imaged at −q a²/|q|² over the optical length π n0 a/2 (Maxwell 1854). */
    @Test
    void closesTheCirclesOfTheFisheye() {
        double a = 10e-3;
        Vector from = new Vector(3e-3, 4e-3, 12e-3);
        Traced end = trace(
                Train.through(Fields.fisheye(2, a)),
                new Ending.AtOpticalLength(Math.PI * a),
                from,
                new Vector(0.3, -0.2, -1));
        Vector image = from.times(-a * a / from.dot(from));
        assertThat(end.position().minus(image).norm()).isLessThan(1e-14);
    }

    /** Snell's law through a plane, and a plate that only displaces (Born and Wolf, section 4.7.2). */
    @Test
    void displacesByAPlate() {
        IndexField air = Fields.uniform(1);
        IndexField glass = Fields.uniform(1.5);
        Train plate = new Train(air, List.of(refract(Surface.plane(0), glass), refract(Surface.plane(0.01), air)));
        double i = Math.PI / 4;
        Traced end =
                trace(plate, new Ending.AtZ(0.02), new Vector(0, 0, -0.01), new Vector(0, Math.sin(i), Math.cos(i)));
        double shift = 0.01 * Math.sin(i) * (1 - Math.cos(i) / Math.sqrt(1.5 * 1.5 - 0.5));
        assertThat((0.03 - end.position().y()) * Math.cos(i)).isCloseTo(shift, within(1e-16));
        assertThat(end.direction().y()).isCloseTo(Math.sin(i), within(1e-15));
    }

    /** The matrix of a quarter-pitch rod between its faces in air, [[0, 1/(n0 g)], [−n0 g, 0]] (Gomez-Reino et al. 2002). */
    @Test
    void carriesTheTransferOfARod() {
        IndexField air = Fields.uniform(1);
        double g = 300;
        double length = Math.PI / 2 / g;
        Train rod = new Train(
                air, List.of(refract(Surface.plane(0), Fields.rod(1.6, g)), refract(Surface.plane(length), air)));
        Traced end = trace(rod, new Ending.BehindLastSurface(), Vector.ZERO, Vector.Z);
        double[][] m = end.transfer();
        assertThat(m[0][0]).isCloseTo(0, within(1e-12));
        assertThat(m[2][0]).isCloseTo(-480, within(1e-9));
        assertThat(m[0][2]).isCloseTo(1 / 480.0, within(1e-14));
        assertThat(m[1][3]).isCloseTo(1 / 480.0, within(1e-14));
    }

    @Test
    void reflectsTotallyBeyondTheCriticalAngle() {
        Train train = new Train(Fields.uniform(1.5), List.of(refract(Surface.plane(0), Fields.uniform(1))));
        Traced end = trace(train, new Ending.AtZ(1), new Vector(0, 0, -1), new Vector(0, 0.7, 0.7));
        assertThat(end.status()).isEqualTo(Status.TOTALLY_REFLECTED);
    }

    /** All paths between the conjugates of an ideal lens are equally long (the contract of the ideal thin lens). */
    @Test
    void equalisesThePathsOfAnIdealLens() {
        IndexField air = Fields.uniform(1);
        Train lens = new Train(air, List.of(new Element(Surface.plane(0), new Action.ThinLens(0.05), air)));
        double axial = 0;
        for (double h : new double[] {0, 0.01, 0.03}) {
            Traced end =
                    trace(lens, new Ending.AtZ(0.15), new Vector(0, 0.004, -0.075), new Vector(0, h - 0.004, 0.075));
            assertThat(end.position().y()).isCloseTo(-0.008, within(1e-15));
            if (h == 0) {
                axial = end.opticalLength();
            }
            assertThat(end.opticalLength()).isCloseTo(axial, within(1e-15));
        }
    }
}
