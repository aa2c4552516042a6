package org.stillpath.medium;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.math.BigDecimal;
import java.math.MathContext;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.EnumSource;
import org.stillpath.formula.Chart;
import org.stillpath.formula.Coordinate;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Frame;
import org.stillpath.geometry.Vector;

class EarthChartTest {
    private static final double R = 6371e3;
    private static final Spline HILLS = Spline.of(
            new double[] {-1e3, 0, 4e3, 9e3, 20e3, 60e3},
            new double[] {3, 0, 40, -12, 25, 0},
            Interpolation.SPLINE,
            Beyond.HOLD);

    @Test
    void heightsKeepTheirDigits() {
        MathContext digits = new MathContext(40);
        for (double[] q : new double[][] {{0, 0, 1.5}, {20e3, 0, -30}, {50e3, 300, 1e-3}, {0.5, 0.25, 1e-9}}) {
            // √(x² + y² + (R + z)²) − R with 40 digits
            BigDecimal up = new BigDecimal(q[2]).add(new BigDecimal(R));
            BigDecimal square = up.multiply(up).add(new BigDecimal(q[0]).pow(2)).add(new BigDecimal(q[1]).pow(2));
            double exact = square.sqrt(digits).subtract(new BigDecimal(R)).doubleValue();
            double h = value(EarthChart.sphere(R, Ground.level(0)), Coordinate.HEIGHT, q);
            assertThat(h).isCloseTo(exact, within(4e-16 * (Math.abs(exact) + Math.abs(q[2]))));
        }
    }

    @Test
    void measuresAlongTheDatum() {
        EarthChart earth = EarthChart.sphere(R, Ground.slope(10, 0.03));
        double a = 5e3 / R;
        double[] q = {(R + 70) * Math.sin(a), 0, (R + 70) * Math.cos(a) - R};
        assertThat(value(earth, Coordinate.DISTANCE, q)).isCloseTo(5e3, within(1e-9));
        assertThat(value(earth, Coordinate.HEIGHT, q)).isCloseTo(70, within(2e-9));
        assertThat(value(earth, Coordinate.CLEARANCE, q)).isCloseTo(70 - 10 - 150, within(2e-9));
        EarthChart flat = EarthChart.flat(Ground.slope(10, 0.03));
        assertThat(value(flat, Coordinate.CLEARANCE, new double[] {100, 5, 20})).isCloseTo(7, within(1e-12));
        assertThat(value(flat, Coordinate.HEIGHT, new double[] {100, 5, 20})).isEqualTo(20);
    }

    @ParameterizedTest
    @EnumSource(names = {"HEIGHT", "CLEARANCE", "DISTANCE"})
    void derivativesAreExact(Coordinate c) {
        for (Ground ground : new Ground[] {Ground.level(3), Ground.slope(1, 0.03), Ground.profile(HILLS)}) {
            for (EarthChart earth : new EarthChart[] {EarthChart.flat(ground), EarthChart.sphere(R, ground)}) {
                check(earth, c, 12e3, 40, -9);
                // a small earth, so that its curvature shows in the differences
                check(EarthChart.sphere(5e3, ground), c, 3e3, 40, -900);
                check(
                        FramedChart.of(earth, Frame.along(new Vector(10, 20, 30), new Vector(0.3, 0.5, 0.7))),
                        c,
                        800,
                        40,
                        -9);
            }
        }
    }

    private static void check(Chart chart, Coordinate c, double x, double y, double z) {
        double h = 0.5;
        double[] px = {x, x + h, x - h, x, x, x, x};
        double[] py = {y, y, y, y + h, y - h, y, y};
        double[] pz = {z, z, z, z, z, z + h, z - h};
        Samples s = new Samples(7);
        chart.sample(c, px, py, pz, 7, Order.HESSIAN, s);
        // h² of third derivatives, which are below 1e-6/m² here, and rounding
        double t = 5e-8;
        assertThat(s.gx[0]).isCloseTo(s.value[1] - s.value[2], within(t));
        assertThat(s.gy[0]).isCloseTo(s.value[3] - s.value[4], within(t));
        assertThat(s.gz[0]).isCloseTo(s.value[5] - s.value[6], within(t));
        double u = 1e-9;
        assertThat(s.hxx[0]).isCloseTo(s.gx[1] - s.gx[2], within(u));
        assertThat(s.hxy[0]).isCloseTo(s.gy[1] - s.gy[2], within(u));
        assertThat(s.hxz[0]).isCloseTo(s.gz[1] - s.gz[2], within(u));
        assertThat(s.hyy[0]).isCloseTo(s.gy[3] - s.gy[4], within(u));
        assertThat(s.hyz[0]).isCloseTo(s.gz[3] - s.gz[4], within(u));
        assertThat(s.hzz[0]).isCloseTo(s.gz[5] - s.gz[6], within(u));
    }

    @Test
    void theKnotsOfTheGroundAreSeamsAndPiecesGoOn() {
        EarthChart earth = EarthChart.sphere(R, Ground.profile(HILLS));
        Seam seam = earth.groundSeam().orElseThrow();
        assertThat(seam.knots()).isEqualTo(HILLS.knots());
        Chart piece = earth.piece(2);
        double[] inside = {2e3, 0, 50};
        double[] past = {4.5e3, 0, 50};
        assertThat(value(piece, Coordinate.CLEARANCE, inside)).isEqualTo(value(earth, Coordinate.CLEARANCE, inside));
        double d = value(earth, Coordinate.DISTANCE, past);
        assertThat(value(piece, Coordinate.CLEARANCE, past))
                .isCloseTo(value(earth, Coordinate.HEIGHT, past) - HILLS.value(1, d), within(1e-9));
        assertThat(EarthChart.flat(Ground.level(0)).groundSeam()).isEmpty();
    }

    private static double value(Chart chart, Coordinate c, double[] q) {
        Samples s = new Samples(1);
        chart.sample(c, new double[] {q[0]}, new double[] {q[1]}, new double[] {q[2]}, 1, Order.VALUE, s);
        return s.value[0];
    }
}
