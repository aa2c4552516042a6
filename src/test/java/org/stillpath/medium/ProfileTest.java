package org.stillpath.medium;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.EnumSource;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Frame;
import org.stillpath.geometry.Vector;

class ProfileTest {
    private static final double[] AT = {0, 0.2e-3, 0.5e-3, 0.9e-3};
    private static final double[] INDEX = {1.60, 1.59, 1.56, 1.52};

    @ParameterizedTest
    @EnumSource(Along.class)
    void derivativesAreThoseOfTheValues(Along along) {
        IndexField f = field(along, Interpolation.CLAMPED, Beyond.FAULT, Frame.JOB);
        // n n' is up to 200/m here, n''' about 1e9/m³: differences with h = 0.1 um are off by about 1e-5/m
        Differences.check(f, 0.25e-3, 0.31e-3, 0.27e-3, 1e-7, 1e-3, 1e-5);
    }

    @ParameterizedTest
    @EnumSource(Along.class)
    void aTurnedFrameTurnsTheFieldAndNothingElse(Along along) {
        Frame frame = Frame.tilted(new Vector(0.3e-3, -0.2e-3, 0.1e-3), 0.7, -1.1);
        IndexField home = field(along, Interpolation.CLAMPED, Beyond.FAULT, Frame.JOB);
        IndexField away = field(along, Interpolation.CLAMPED, Beyond.FAULT, frame);
        Vector p = new Vector(0.25e-3, 0.31e-3, 0.27e-3);
        Vector q = frame.toJob(p);
        Samples a = sample(home, p);
        Samples b = sample(away, q);
        assertThat(b.value[0]).isCloseTo(a.value[0], within(1e-14));
        Vector g = frame.directionToJob(new Vector(a.gx[0], a.gy[0], a.gz[0]));
        assertThat(b.gx[0]).isCloseTo(g.x(), within(1e-10));
        assertThat(b.gy[0]).isCloseTo(g.y(), within(1e-10));
        assertThat(b.gz[0]).isCloseTo(g.z(), within(1e-10));
        // dᵀ H d for any direction d is the same number in both frames
        for (Vector d : new Vector[] {new Vector(1, 0, 0), new Vector(0.3, -0.8, 0.5), new Vector(0, 0.6, 0.8)}) {
            assertThat(quadratic(b, frame.directionToJob(d))).isCloseTo(quadratic(a, d), within(1e-6));
        }
        Differences.check(away, q.x(), q.y(), q.z(), 1e-7, 1e-3, 1e-5);
    }

    @Test
    void aShiftedFrameShiftsTheField() {
        IndexField home = field(Along.R, Interpolation.CLAMPED, Beyond.FAULT, Frame.JOB);
        IndexField away = field(Along.R, Interpolation.CLAMPED, Beyond.FAULT, Frame.at(new Vector(1e-3, 0, 5)));
        assertThat(sample(away, new Vector(1.25e-3, 0, 7)).gx[0])
                .isCloseTo(sample(home, new Vector(0.25e-3, 0, 0)).gx[0], within(1e-9));
    }

    @Test
    void onTheAxisTheForceVanishesAndItsDerivativeIsTheLimit() {
        for (Along along : new Along[] {Along.R, Along.RHO}) {
            IndexField f = field(along, Interpolation.CLAMPED, Beyond.FAULT, Frame.JOB);
            Samples on = sample(f, Vector.ZERO);
            Samples near = sample(f, new Vector(1e-12, 0, 0));
            assertThat(on.gx[0]).isZero();
            // the third derivative is 5e9/m³ here, so 1 pm away the curvature differs by 0.005/m²
            assertThat(on.hxx[0]).isCloseTo(near.hxx[0], within(0.01));
            assertThat(on.hyy[0]).isCloseTo(near.hyy[0], within(0.01));
            assertThat(on.hzz[0]).isCloseTo(near.hzz[0], within(0.01));
            assertThat(on.hxx[0]).isNegative();
            assertThat(on.hzz[0] == 0).isEqualTo(along == Along.R);
        }
    }

    @Test
    void limitsEndTheTableAndSayWhere() {
        IndexField f = field(Along.R, Interpolation.CLAMPED, Beyond.FAULT, Frame.at(new Vector(0, 0, 1)));
        assertThat(f.limits()).singleElement().satisfies(l -> {
            double[] g = new double[3];
            assertThat(l.value(0.5e-3, 0, 0, g)).isCloseTo(0.4e-3, within(1e-18));
            assertThat(g).containsExactly(-1, 0, 0);
            assertThat(l.describe()).isEqualTo("r < 0.9 mm, the edge of the table");
        });
        assertThat(Differences.value(f, 2e-3, 0, 0)).isNaN();
        assertThat(f.explain(2e-3, 0, 0)).contains("r = 2 mm", "0 mm to 0.9 mm", "[2 mm, 0 mm, 0 mm]");
        assertThat(f.explain(0.5e-3, 0, 0)).isEmpty();
        assertThat(field(Along.X, Interpolation.CLAMPED, Beyond.FAULT, Frame.JOB)
                        .limits())
                .hasSize(2);
        assertThat(field(Along.X, Interpolation.CLAMPED, Beyond.HOLD, Frame.JOB).limits())
                .isEmpty();
    }

    @Test
    void everyKnotIsASeamExceptTheAxis() {
        assertThat(field(Along.R, Interpolation.CLAMPED, Beyond.FAULT, Frame.JOB)
                        .seams())
                .singleElement()
                .satisfies(s -> assertThat(s.knots()).containsExactly(0.2e-3, 0.5e-3, 0.9e-3));
        Frame frame = Frame.tilted(new Vector(0, 0, 1e-3), 0.4, 0);
        Seam seam = field(Along.Z, Interpolation.CLAMPED, Beyond.FAULT, frame)
                .seams()
                .get(0);
        Vector onKnot = frame.toJob(new Vector(3, 4, 0.5e-3));
        double[] g = new double[3];
        assertThat(seam.coordinate().value(onKnot.x(), onKnot.y(), onKnot.z(), g))
                .isCloseTo(0.5e-3, within(1e-14));
        assertThat(g[1]).isCloseTo(frame.ez().y(), within(1e-16));
        assertThat(g[2]).isCloseTo(frame.ez().z(), within(1e-16));
    }

    @Test
    void tellsOfATipOnTheAxisAndOfOvershoot() {
        assertThat(profile(Along.R, Interpolation.SPLINE, Beyond.FAULT).warnings())
                .anySatisfy(w -> assertThat(w).contains("tip on the axis", "clamped"));
        assertThat(profile(Along.R, Interpolation.CLAMPED, Beyond.FAULT).warnings())
                .isEmpty();
        Profile step = Profile.of(
                Along.Z,
                Spline.of(
                        new double[] {0, 1e-3, 2e-3, 3e-3},
                        new double[] {0.5, 0.5, 0.6, 0.6},
                        Interpolation.SPLINE,
                        Beyond.FAULT),
                1);
        assertThat(step.warnings()).singleElement().asString().contains("leaves the range", "z = ", "mm");
    }

    @Test
    void anExponentialBeyondFallsOffToVacuum() {
        Profile thin = Profile.of(
                Along.Z,
                Spline.of(new double[] {0, 1000}, new double[] {3e-4, 2e-4}, Interpolation.LINEAR, Beyond.EXPONENTIAL),
                1);
        FieldMedium m = new FieldMedium(Declaration.of("sky"), thin, true, false);
        IndexField f = m.field(Double.NaN, Frame.JOB);
        assertThat(Differences.value(f, 0, 0, 1e6)).isBetween(0.0, 1e-100);
        assertThat(m.warnings()).singleElement().asString().contains("grows", "z = 0 mm");
    }

    private static Profile profile(Along along, Interpolation how, Beyond beyond) {
        double[] excess = new double[INDEX.length];
        for (int i = 0; i < excess.length; i++) {
            excess[i] = INDEX[i] - 1;
        }
        return Profile.of(along, Spline.of(AT, excess, how, beyond), 1);
    }

    private static IndexField field(Along along, Interpolation how, Beyond beyond, Frame frame) {
        return new FieldMedium(Declaration.of("rod"), profile(along, how, beyond), true, false)
                .field(Double.NaN, frame);
    }

    private static Samples sample(IndexField f, Vector p) {
        Samples s = new Samples(1);
        f.sample(new double[] {p.x()}, new double[] {p.y()}, new double[] {p.z()}, 1, Order.HESSIAN, s);
        return s;
    }

    private static double quadratic(Samples s, Vector d) {
        return s.hxx[0] * d.x() * d.x()
                + s.hyy[0] * d.y() * d.y()
                + s.hzz[0] * d.z() * d.z()
                + 2 * (s.hxy[0] * d.x() * d.y() + s.hxz[0] * d.x() * d.z() + s.hyz[0] * d.y() * d.z());
    }

    @ParameterizedTest
    @EnumSource(Interpolation.class)
    void aPieceIsTheFieldInItsCellAndSmoothBeyond(Interpolation how) {
        IndexField f = field(Along.R, how, Beyond.LINEAR, Frame.at(new Vector(0, 0, 1)));
        Seam seam = f.seams().get(0);
        for (double r : new double[] {0.1e-3, 0.3e-3, 0.7e-3, 1.2e-3}) {
            int cell = seam.cell(r);
            IndexField piece = f.piece(new int[] {cell});
            assertThat(Differences.value(piece, r, 0, 0)).isEqualTo(Differences.value(f, r, 0, 0));
            assertThat(f.piece(new int[] {cell})).isSameAs(piece);
            assertThat(piece.seams()).isEmpty();
            if (cell > 0) {
                // on both sides of its lower knot the piece is one polynomial: its gradient does not jump
                double knot = seam.knot(cell - 1);
                double below = sample(piece, new Vector(knot - 1e-12, 0, 0)).gx[0];
                double above = sample(piece, new Vector(knot + 1e-12, 0, 0)).gx[0];
                assertThat(below).isCloseTo(above, within(1e-4));
            }
        }
    }
}
