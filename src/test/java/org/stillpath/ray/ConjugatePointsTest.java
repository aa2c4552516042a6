package org.stillpath.ray;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.List;
import java.util.Random;
import org.junit.jupiter.api.Test;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;

class ConjugatePointsTest {
    private static double[] conjugates(Train train, Ending ending, Vector from, Vector direction) {
        Tracer.Settings settings = new Tracer.Settings(1e-10, true, false, Columns.RAY.withConjugates(), 100);
        double[] own = new Tracer(train, ending, settings)
                .trace(RayStart.of(from, direction))
                .conjugates();
        double[] reference = new Tracer(train, ending, settings, HipparchusPropagator::new)
                .trace(RayStart.of(from, direction))
                .conjugates();
        assertThat(own).hasSameSizeAs(reference);
        for (int i = 0; i < own.length; i++) {
            // where they lie is read off interpolants, which differ
            assertThat(own[i]).isCloseTo(reference[i], within(1e-3 * reference[i]));
        }
        return own;
    }

    /** On the axis of a rod of pitch 2π/g a point is imaged every half pitch, in both directions at once (closed form). */
    @Test
    void countsDoublePointsOnTheAxis() {
        double[] found = conjugates(Train.through(Fields.rod(1.6, 0.3)), new Ending.AtZ(25), Vector.ZERO, Vector.Z);
        assertThat(found).hasSize(4);
        for (int i = 0; i < 4; i++) {
            assertThat(found[i]).isCloseTo((i / 2 + 1) * Math.PI / 0.3, within(1e-4));
        }
    }

    /** A point of the fisheye is imaged every half turn of the great circle, in both directions (Maxwell 1854). */
    @Test
    void countsHalfTurnsOfTheFisheye() {
        Random r = new Random(4);
        for (int i = 0; i < 50; i++) {
            Vector from = AnalyticCase.point(r, 0.8);
            double[] found = conjugates(
                    Train.through(Fields.fisheye(2, 1)),
                    new Ending.AtOpticalLength(2.5 * Math.PI),
                    from,
                    AnalyticCase.unit(r));
            assertThat(found).hasSize(4);
        }
    }

    /** An elliptic rod, n² = n0² − gx²x² − gy²y², images x and y apart: points at multiples of π n0/gx and π n0/gy. */
    @Test
    void tellsMeridiansApart() {
        IndexField field = (x, y, z, count, order, out) -> {
            for (int i = 0; i < count; i++) {
                out.value[i] = 1.5 * 1.5 - 1 - 0.16 * x[i] * x[i] - 0.09 * y[i] * y[i];
                out.gx[i] = -0.16 * x[i];
                out.gy[i] = -0.09 * y[i];
                out.gz[i] = 0;
                out.hxx[i] = -0.16;
                out.hxy[i] = 0;
                out.hxz[i] = 0;
                out.hyy[i] = -0.09;
                out.hyz[i] = 0;
                out.hzz[i] = 0;
            }
        };
        double[] found = conjugates(Train.through(field), new Ending.AtZ(30), Vector.ZERO, Vector.Z);
        double[] wanted = {Math.PI * 1.5 / 0.4, Math.PI * 1.5 / 0.3, 2 * Math.PI * 1.5 / 0.4};
        assertThat(found).hasSize(wanted.length);
        for (int i = 0; i < wanted.length; i++) {
            assertThat(found[i]).isCloseTo(wanted[i], within(1e-3));
        }
    }

    /** Behind a lens surface the paraxial image is a double conjugate point: n'/s' = n/s + (n' − n)/R. */
    @Test
    void findsTheImageBehindASurface() {
        Train train = new Train(
                Fields.uniform(1),
                List.of(new Element(Surface.cap(0, 0.05, 0), new Action.Refract(false), Fields.uniform(1.5))));
        double image = 1.5 / (0.5 / 0.05 - 1 / 0.3);
        double[] found = conjugates(train, new Ending.AtZ(0.4), new Vector(0, 0, -0.3), Vector.Z);
        assertThat(found).hasSize(2);
        assertThat(found[0] - 0.3).isCloseTo(image, within(1e-7));
        // a virtual image is none
        assertThat(conjugates(train, new Ending.AtZ(0.4), new Vector(0, 0, -0.05), Vector.Z))
                .isEmpty();
    }
}
